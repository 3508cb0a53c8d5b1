// Package working holds the steps behind a number: what an auditor needs to
// follow it with paper and pencil. Every figure that the engine answers with
// carries one.
package working

// Step is one line of a working: a quantity, the formula it came from, the
// values that went in and the figure that came out.
type Step struct {
	ID      string  `json:"id"`      // stable name, "exposure.seconds"
	Name    string  `json:"name"`    // in words: "exposure time"
	Symbol  string  `json:"symbol"`  // "t"
	Formula string  `json:"formula"` // "t = K(D) / rate at the film"
	Inputs  []Input `json:"inputs,omitempty"`
	Value   float64 `json:"value"`
	Unit    string  `json:"unit,omitzero"`
	Source  string  `json:"source,omitzero"` // where the formula or the figure is published, or "common practice", or "from memory"
	Note    string  `json:"note,omitzero"`   // what it leaves out, and to which side it errs
}

// Input is one value that went into a step.
type Input struct {
	Symbol string  `json:"symbol"`
	Name   string  `json:"name,omitzero"`
	Value  float64 `json:"value"`
	Text   string  `json:"text,omitzero"` // for what is no number: a material, a class
	Unit   string  `json:"unit,omitzero"`
	Source string  `json:"source,omitzero"`
}
