package materials

import (
	"math"
	"regexp"
	"slices"
	"strings"
	"testing"
)

func TestCatalogueRows(t *testing.T) {
	list := Catalogue()
	if len(list) < 40 {
		t.Fatalf("%d materials, want 40 or more", len(list))
	}
	kebab := regexp.MustCompile(`^[a-z0-9]+([-.][a-z0-9]+)*$`)
	if !slices.IsSortedFunc(list, func(a, b *Material) int { return strings.Compare(a.Name(), b.Name()) }) {
		t.Error("the catalogue is not sorted by name")
	}
	for _, m := range list {
		if !kebab.MatchString(m.Name()) {
			t.Errorf("%q is no name of small letters, digits, hyphens and decimal points", m.Name())
		}
		if m.Title() == "" || m.Source() == "" || !strings.Contains(m.Confidence(), "seen") && !strings.Contains(m.Confidence(), "memory") && !strings.Contains(m.Confidence(), "practice") {
			t.Errorf("%s: title %q, source %q, confidence %q", m.Name(), m.Title(), m.Source(), m.Confidence())
		}
		var sum float64
		for _, f := range m.Fractions() {
			sum += f.Mass
			if !(f.Mass > 0) {
				t.Errorf("%s: fraction %+v", m.Name(), f)
			}
		}
		if math.Abs(sum-1) > 1e-12 {
			t.Errorf("%s: fractions sum to %g", m.Name(), sum)
		}
		if same := lookup(t, m.Name()); same != m {
			t.Errorf("%s: the catalogue and Lookup give two materials", m.Name())
		}
	}
}

// TestCatalogueDensities: an alloy's density lies within 5 % of the ideal
// mixture of its elements, carbon taken as graphite and dissolved gases left
// out; of the other families each has its span.
func TestCatalogueDensities(t *testing.T) {
	span := map[string][2]float64{
		"concrete": {1.5, 4}, "mineral": {0.05, 7.5}, "liquid": {0.7, 1.1}, "plastic": {0.03, 2.3}, "gas": {1e-4, 0.01},
	}
	for _, m := range Catalogue() {
		if s, ok := span[m.Family()]; ok {
			if d := m.DensityGPerCM3(); d < s[0] || d > s[1] {
				t.Errorf("%s: %g g/cm3 is outside %v of the family %s", m.Name(), d, s, m.Family())
			}
			continue
		}
		ideal := idealDensity(m)
		if off(m.DensityGPerCM3(), ideal) > 0.05 {
			t.Errorf("%s: %g g/cm3, its elements mix to %.3g", m.Name(), m.DensityGPerCM3(), ideal)
		}
	}
}

func idealDensity(m *Material) float64 {
	var mass, volume float64
	for _, f := range m.Fractions() {
		density := table()[f.Z].DensityGPerCM3
		switch {
		case f.Z == 6:
			density = 2.26
		case density < 0.01:
			continue
		}
		mass += f.Mass
		volume += f.Mass / density
	}
	return mass / volume
}

// TestCatalogueCovers names what the trade meets most; plans and other
// packages count on these names.
func TestCatalogueCovers(t *testing.T) {
	for name, family := range map[string]string{
		"carbon-steel": "steel", "steel-13crmo4-5": "steel", "stainless-304": "steel", "stainless-316l": "steel", "duplex": "steel", "super-duplex": "steel",
		"grey-iron": "cast-iron", "nodular-iron": "cast-iron", "al-6082": "aluminium", "al-42000": "aluminium", "mg-az91": "magnesium",
		"ti-grade-2": "titanium", "ti-6al-4v": "titanium", "copper": "copper", "brass": "copper", "bronze": "copper", "cu-ni-90-10": "copper",
		"n06625": "nickel", "zr-702": "zirconium", "tungsten": "heavy", "tungsten-heavy-alloy": "heavy", "lead": "heavy", "uranium": "heavy",
		"concrete": "concrete", "heavy-concrete": "concrete", "water": "liquid", "oil": "liquid", "refractory-brick": "mineral",
		"mineral-wool": "mineral", "calcium-silicate": "mineral", "sand": "mineral", "soil": "mineral", "glass-laminate": "plastic",
		"carbon-laminate": "plastic", "polyethylene": "plastic", "pmma": "plastic", "rubber": "plastic", "air": "gas",
		"agbr-emulsion": "mineral", "bafbr": "mineral", "gd2o2s": "mineral", "csi": "mineral", "Fe": "element", "U": "element",
	} {
		if m := lookup(t, name); m.Family() != family {
			t.Errorf("%s: family %q, want %q", name, m.Family(), family)
		}
	}
}

func TestCatalogueRefused(t *testing.T) {
	good := `"name":"x","title":"X","family":"steel","density":7.8,"source":"s","confidence":"seen"`
	for rows, want := range map[string]string{
		`{`:                              "unexpected EOF",
		`{"materials":[{` + good + `}]}`: "exactly one",
		`{"materials":[{` + good + `,"formula":"Fe","mass":{"Fe":1}}]}`:                                  "exactly one",
		`{"materials":[{` + good + `,"formula":"Xx"}]}`:                                                  "unknown element",
		`{"materials":[{` + good + `,"mass":{"Xx":1}}]}`:                                                 "unknown element",
		`{"materials":[{` + good + `,"mass":{"Fe":0.9}}]}`:                                               "sum to",
		`{"materials":[{` + good + `,"mass":{"C":1.2},"balance":"Fe"}]}`:                                 "outside 0 to 1",
		`{"materials":[{` + good + `,"balance":"Xx"}]}`:                                                  "unknown element",
		`{"materials":[{` + good + `,"mix":{"y":1}}]}`:                                                   "no earlier row",
		`{"materials":[{` + good + `,"formula":"Fe"},{` + good + `,"formula":"Fe"}]}`:                    "stands twice",
		`{"materials":[{"name":"x","title":"X","family":"steel","density":7.8,"formula":"Fe"}]}`:         "want a title",
		`{"materials":[{` + strings.Replace(good, `"steel"`, `"metal"`, 1) + `,"formula":"Fe"}]}`:        "unknown family",
		`{"materials":[{` + strings.Replace(good, `"steel"`, `"element"`, 1) + `,"formula":"Fe"}]}`:      "unknown family",
		`{"materials":[{` + strings.Replace(good, `"name":"x"`, `"name":"Fe"`, 1) + `,"formula":"Fe"}]}`: "is an element",
		`{"materials":[{` + strings.Replace(good, `7.8`, `780`, 1) + `,"formula":"Fe"}]}`:                "density",
		`{"materials":[{` + strings.Replace(good, `"title"`, `"tittle"`, 1) + `,"formula":"Fe"}]}`:       "unknown field",
	} {
		if _, err := parseCatalogue([]byte(rows)); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%s: %v, want %q", rows, err, want)
		}
	}
}
