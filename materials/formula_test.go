package materials

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"
)

// massOf gives an element's fraction, 0 where it has none.
func massOf(f []Fraction, symbol string) float64 {
	for _, p := range f {
		if table()[p.Z].Symbol == symbol {
			return p.Mass
		}
	}
	return 0
}

// TestFormulaPublished: mass fractions that handbooks print.
func TestFormulaPublished(t *testing.T) {
	for _, c := range []struct {
		formula, symbol string
		mass            float64
		source          string
	}{
		{"H2O", "H", 0.111894, "NIST, composition of water, from memory"},
		{"CH2", "C", 0.856289, "NIST, composition of polyethylene, from memory"},
		{"C5H8O2", "O", 0.319614, "NIST, composition of PMMA, from memory"},
		{"CsI", "I", 0.488451, "NIST, composition of caesium iodide, from memory"},
		{"Gd2O2S", "Gd", 0.830766, "NIST, composition of gadolinium oxysulfide, from memory"},
		{"SiO2", "Si", 0.4674, "common practice"},
		{"Ca3(PO4)2", "Ca", 0.3876, "common practice: tricalcium phosphate has 38.8 % calcium"},
		{"Fe3O4", "Fe", 0.7236, "common practice: magnetite has 72.4 % iron"},
		{"CaSO4(H2O)2", "Ca", 0.2328, "common practice: gypsum has 23.3 % calcium"},
		{"Al2(SO4)3", "Al", 0.1577, "common practice"},
	} {
		f, err := ParseFormula(c.formula)
		if err != nil {
			t.Errorf("%s: %v", c.formula, err)
			continue
		}
		if got := massOf(f, c.symbol); math.Abs(got-c.mass) > 1.5e-4 {
			t.Errorf("%s: %s is %.6f by mass, want %.6f (%s)", c.formula, c.symbol, got, c.mass, c.source)
		}
	}
}

func TestFormulaRefused(t *testing.T) {
	for formula, want := range map[string]string{
		"":                         "no elements",
		"h2o":                      "unknown element",
		"H2 O":                     "unknown element",
		"Xx":                       "unknown element",
		"2H":                       "unknown element",
		"NpO2":                     "unknown element",
		"H2O)":                     "closes nothing",
		"(H2O":                     "not closed",
		"()":                       "empty",
		"H()":                      "empty",
		"H0":                       "count",
		"H0.0":                     "count",
		"H1.2.3":                   "count",
		"H.":                       "count",
		"H1e3":                     "unknown element",
		"H-1":                      "unknown element",
		"H1000001":                 "count",
		"Fe\xff":                   "unknown element",
		strings.Repeat("(", 30):    "deeper",
		strings.Repeat("H2", 2000): "at most 200",
	} {
		_, err := ParseFormula(formula)
		if err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%.40q: %v, want %q", formula, err, want)
		}
	}
}

// TestFormulaGroups: a group with a count is the same as its atoms written out,
// the order of symbols does not count, and a common factor cancels.
func TestFormulaGroups(t *testing.T) {
	same := [][2]string{
		{"Ca3(PO4)2", "Ca3P2O8"}, {"H2O", "OH2"}, {"C2H4", "CH2"}, {"(H2O)3", "H2O"}, {"(Fe(CN)6)2", "Fe2C12N12"}, {"Fe0.95O", "Fe95O100"}, {"HOH", "H2O"},
	}
	for _, p := range same {
		a, errA := ParseFormula(p[0])
		b, errB := ParseFormula(p[1])
		if errA != nil || errB != nil || len(a) != len(b) {
			t.Fatalf("%v: %v, %v", p, errA, errB)
		}
		for i := range a {
			if a[i].Z != b[i].Z || math.Abs(a[i].Mass-b[i].Mass) > 1e-12 {
				t.Errorf("%s is not %s: %v, %v", p[0], p[1], a, b)
			}
		}
	}
}

// randomFormula writes a formula and the atoms that it holds.
func randomFormula(r *rand.Rand, depth int) (string, [MaxZ + 1]float64) {
	var b strings.Builder
	var atoms [MaxZ + 1]float64
	for range 1 + r.IntN(3) {
		if depth > 0 && r.IntN(3) == 0 {
			text, inner := randomFormula(r, depth-1)
			b.WriteString("(" + text + ")3")
			for z, a := range inner {
				atoms[z] += 3 * a
			}
			continue
		}
		z := 1 + r.IntN(MaxZ)
		b.WriteString(table()[z].Symbol + "2.5")
		atoms[z] += 2.5
	}
	return b.String(), atoms
}

func TestFormulaRandom(t *testing.T) {
	r := rand.New(rand.NewPCG(1, 2))
	for range 2000 {
		text, atoms := randomFormula(r, 3)
		if len(text) > 200 {
			continue
		}
		f, err := ParseFormula(text)
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		var sum float64
		for z := range atoms {
			if z > 0 {
				sum += atoms[z] * table()[z].AtomicWeight
			}
		}
		for _, p := range f {
			if want := atoms[p.Z] * table()[p.Z].AtomicWeight / sum; math.Abs(p.Mass-want) > 1e-12 {
				t.Fatalf("%q: element %d is %g, want %g", text, p.Z, p.Mass, want)
			}
		}
	}
}

// FuzzParseFormula: whatever the text, the answer is an error or fractions in
// rising Z, positive, that sum to 1; nothing panics.
func FuzzParseFormula(f *testing.F) {
	for _, s := range []string{"H2O", "Ca3(PO4)2", "Fe0.95O", "((((H))))", "(", ")", "H.5", "U1000000", "H0.000001", ""} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		parts, err := ParseFormula(s)
		if err != nil {
			return
		}
		var sum float64
		for i, p := range parts {
			if !(p.Mass > 0) || i > 0 && p.Z <= parts[i-1].Z {
				t.Fatalf("%q gives %v", s, parts)
			}
			sum += p.Mass
		}
		if math.Abs(sum-1) > 1e-9 {
			t.Fatalf("%q sums to %g", s, sum)
		}
	})
}
