package plan

import (
	"slices"
	"strings"
)

// Field is one row of the table of fields: what a field of a plan is, what may
// stand in it and what holds where it is left out. Validation, the dial of the
// app and the page FIELDS.md all read this one table.
type Field struct {
	Path     string    // "source.tube.filters[].mm"; [] stands for any index
	Kind     Kind      // what stands there
	Required bool      // inside its object
	Unit     string    // of a number; empty for a bare one
	Min, Max float64   // a number's range, a text's length in characters, a list's length
	Step     float64   // of the dial's plus and minus; numbers only
	Usual    []float64 // values that the trade sets, the dial's detents
	Default  string    // what holds where it is left out, in words; empty when required
	Meaning  string    // one sentence
}

// Kind is what stands in a field.
type Kind string

// The kinds of field.
const (
	Number Kind = "number"
	Text   Kind = "text"
	Name   Kind = "name" // one of a list, see Field.Names
	Time   Kind = "time" // RFC 3339 with zone
	List   Kind = "list"
	Object Kind = "object"
)

// Fields gives the whole table in the order of the plan file.
func Fields() []Field {
	list := slices.Clone(table)
	for i := range list {
		list[i].Usual = slices.Clone(list[i].Usual)
	}
	return list
}

// FieldAt gives the row of a path; indices may stand in it:
// "part.layers[1].mm". A row of a list of objects is an object.
func FieldAt(path string) (Field, bool) {
	path = pattern(path)
	if i, ok := byPath[path]; ok {
		return table[i], true
	}
	if list, ok := strings.CutSuffix(path, "[]"); ok {
		if i, ok := byPath[list]; ok && table[i].Kind == List {
			return Field{Path: path, Kind: Object, Required: true, Meaning: "one of " + list}, true
		}
	}
	return Field{}, false
}

// Names gives what may stand in a field of kind Name, nil for other fields.
func (f Field) Names() []string {
	if f.Kind != Name {
		return nil
	}
	return slices.Clone(f.names())
}

// names is Names without the copy.
func (f Field) names() []string {
	if strings.HasSuffix(f.Path, "material") {
		return materialNames()
	}
	switch f.Path {
	case "source.sealed.nuclide":
		return Nuclides()
	case "rules":
		return RuleSets()
	}
	return fixedNames[f.Path]
}

var fixedNames = map[string][]string{
	"source.tube.target":   Targets,
	"source.tube.waveform": Waveforms,
	"source.sealed.basis":  Bases,
	"setup.kind":           Kinds,
	"setup.image":          Images,
	"setup.side":           Sides,
	"detector.film.class":  Classes,
	"site.limits[].per":    Periods,

	"site.people[].role":         Roles,
	"site.readings[].state":      States,
	"site.readings[].collimator": Collimators,
}

// pattern turns part.layers[1].mm into part.layers[].mm.
func pattern(path string) string {
	if !strings.Contains(path, "[") {
		return path
	}
	b := make([]byte, 0, len(path))
	inside := false
	for i := range len(path) {
		c := path[i]
		if c == ']' {
			inside = false
		}
		if !inside {
			b = append(b, c)
		}
		if c == '[' {
			inside = true
		}
	}
	return string(b)
}

var byPath = func() map[string]int {
	m := make(map[string]int, len(table))
	for i, f := range table {
		m[f.Path] = i
	}
	return m
}()
