package rules

import (
	"fmt"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
	"halfvalue/materials"
)

// Facts is what the rules ask of a plan. Zero means unknown or not there, and a
// check that needs what is unknown stays undecided.
type Facts struct {
	// Source.
	KV      float64 // 0 with a sealed source
	Nuclide string  // "" with a tube
	ConeDeg float64 // full opening of the useful beam

	// Part.
	Family  string  // materials.Material.Family of the thickest layer; "" when layers of families differ by more than a tenth
	WMM     float64 // penetrated thickness on the central ray
	ThinMM  float64 // least of all sections
	ThickMM float64 // most of all sections
	WeldMM  float64 // width of the cap

	// Setup.
	Setup setup.Geometry
	Shots int // planned

	// Detector.
	Detector  string      // film, plate or panel
	Class     string      // C1 to C6
	ScreensMM *[2]float64 // lead; nil with a panel
	SRbUM     float64
	Density   []Density // film, with base and fog; the part itself first
	SNRn      []Density // plate or panel: Value is the normalised ratio

	// What a developed film or a crank tells.
	TravelShare float64 // source travel over exposure time
	Wire        int     // thinnest wire that shows, its number; 0 unknown
}

// Density is the reading at one place of the part.
type Density struct {
	At    string
	Value float64
}

// FactsOf fills in everything that follows from a valid plan without physics:
// all but Density beyond the part itself, TravelShare and Wire.
func FactsOf(p plan.Plan) (Facts, error) {
	n, _ := p.Normalised()
	g, err := setup.Of(n)
	if err != nil {
		return Facts{}, err
	}
	_, thin, thick := setup.Sections(n.Part)
	f := Facts{WMM: n.Part.TotalMM(), ThinMM: thin.MM, ThickMM: thick.MM, WeldMM: n.Part.WeldMM, Setup: g, Shots: n.Setup.Shots}
	if f.Family, err = family(n.Part.Layers); err != nil {
		return Facts{}, err
	}
	if t := n.Source.Tube; t != nil {
		f.KV, f.ConeDeg = t.KV, t.ConeDeg
	} else if s := n.Source.Sealed; s != nil {
		f.Nuclide, f.ConeDeg = s.Nuclide, s.ConeDeg
	}
	switch d := n.Detector; {
	case d.Film != nil:
		f.Detector, f.Class, f.ScreensMM = "film", d.Film.Class, d.Film.ScreensMM
		f.Density = []Density{{"part", d.Film.Density}}
	case d.Plate != nil:
		f.Detector, f.ScreensMM, f.SRbUM = "plate", d.Plate.ScreensMM, d.Plate.SRbUM
		f.SNRn = []Density{{"part", d.Plate.SNRn}}
	case d.Panel != nil:
		f.Detector, f.SRbUM = "panel", d.Panel.SRbUM
		f.SNRn = []Density{{"part", d.Panel.SNRn}}
	}
	return f, nil
}

// family is that of the layers, weighed by thickness; gases do not count, and
// "" where no family has nine tenths. An element counts with the family that it
// is the metal of.
func family(layers []plan.Layer) (string, error) {
	by, all := map[string]float64{}, 0.0
	most := ""
	for _, l := range layers {
		m, err := materials.Lookup(l.Material)
		if err != nil {
			return "", fmt.Errorf("part: %w", err)
		}
		name := m.Family()
		if metal, ok := metals[l.Material]; ok {
			name = metal
		}
		if name == "gas" {
			continue
		}
		by[name] += l.MM
		all += l.MM
		if by[name] > by[most] {
			most = name
		}
	}
	if by[most] < 0.9*all {
		return "", nil
	}
	return most, nil
}

// metals are the elements that rules speak of as a family.
var metals = map[string]string{"Fe": "steel", "Al": "aluminium", "Mg": "magnesium", "Ti": "titanium", "Cu": "copper", "Ni": "nickel", "Zr": "zirconium"}
