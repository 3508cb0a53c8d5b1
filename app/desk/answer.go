package desk

import "halfvalue/exposure/working"

// Answer is a reckoning in the form that the sheets show.
type Answer struct {
	Exposure    Exposure
	Beam        Beam
	Density     []Spot
	Checks      []Check
	Boundary    []Rope
	Cautions    []string
	Working     []working.Step
	Unsharpness float64 // geometric, mm; 0 not computed
	ActivityGBq float64 // sealed source, decayed to the plan's time; 0 with a tube
	SNR         []Signal
	Spread      []Share // of the time, largest first
	Engine      string  // version of the physics
}

// Exposure is the time for the wanted density and its spread.
type Exposure struct {
	Seconds, SecondsLow, SecondsHigh float64
	MAMin                            float64 // tube; 0 with a sealed source
	GBqMin                           float64 // sealed source; 0 with a tube
}

// Beam is the beam after its filters and before the part.
type Beam struct {
	MeanKeV                float64
	KermaRateMGyPerMinAt1m float64
}

// Spot is one place of the part on the image.
type Spot struct {
	At                   string
	ThicknessMM, Density float64
}

// Signal is one place of the part on a plate or a panel.
type Signal struct {
	At                string
	ThicknessMM, SNRn float64
}

// Share is what one input adds to the spread of the time, as one standard
// deviation relative to the time.
type Share struct {
	Name     string
	Relative float64
}

// Verdicts of a check.
const (
	Holds     = "holds"
	Short     = "short"
	Undecided = "undecided"
)

// Check is one rule applied to the plan.
type Check struct {
	ID      string
	Name    string
	Verdict string // Holds, Short or Undecided
	Value   float64
	Limit   float64
	Unit    string
	Text    string // in words, what is compared with what
	Source  string
	Mend    *Mend
}

// Mend is the change of one quantity that would make a check hold.
type Mend struct {
	Field  string
	To     float64
	Choice string // instead of To where the quantity is a choice
	Text   string
}

// Rope is one distance of the boundary.
type Rope struct {
	Limit     string
	Direction string // open, through, leakage, scatter or transit
	Metres    float64
	Within    bool // the limit is never exceeded outside 1 m
}

// Worst returns the outermost rope, which decides; false without any.
func (a Answer) Worst() (Rope, bool) {
	var worst Rope
	for _, r := range a.Boundary {
		if r.Metres > worst.Metres {
			worst = r
		}
	}
	return worst, worst.Metres > 0
}
