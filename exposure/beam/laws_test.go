package beam

import (
	"encoding/json"
	"math"
	"os"
	"slices"
	"testing"

	"halfvalue/exposure/plan"
)

// laws is testdata/duane-hunt-moseley.json.
type laws struct {
	DuaneHunt []struct{ KV, Angstrom, Tolerance float64 }
	Moseley   []struct {
		Symbol                             string
		Z                                  int
		FormulaAngstrom, MeasuredAngstrom  float64
		FormulaKeV, MeasuredKeV, Tolerance float64
	}
	Edges []struct {
		Target string
		KV     float64
		Lines  bool
	}
	LinesKeV []struct {
		Target    string
		KeV       []float64
		Tolerance float64
	}
}

func readLaws(t *testing.T) laws {
	t.Helper()
	data, err := os.ReadFile("../../testdata/duane-hunt-moseley.json")
	if err != nil {
		t.Fatal(err)
	}
	var l laws
	if err := json.Unmarshal(data, &l); err != nil {
		t.Fatal(err)
	}
	if len(l.DuaneHunt) == 0 || len(l.Moseley) == 0 || len(l.Edges) == 0 || len(l.LinesKeV) == 0 {
		t.Fatal("duane-hunt-moseley.json lacks a part")
	}
	return l
}

// tube is the spectrum of a bare tube with a thin window.
func tube(t testing.TB, target string, kV float64, filters ...plan.Filter) Spectrum {
	t.Helper()
	s, err := Tube(plan.Tube{KV: kV, Target: target, AnodeDeg: 20, Waveform: "constant", Filters: filters})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// lineEnergies are those of the lines in s that carry photons.
func lineEnergies(s Spectrum) []float64 {
	var out []float64
	for i, w := range s.WidthKeV {
		if w == 0 && s.PerCM2[i] > 0 {
			out = append(out, s.KeV[i])
		}
	}
	return out
}

func TestDuaneHunt(t *testing.T) {
	for _, r := range readLaws(t).DuaneHunt {
		if got := DuaneHuntAngstrom(r.KV); math.Abs(got-r.Angstrom) > r.Tolerance {
			t.Errorf("%g kV: %.6g angstrom, published %.6g", r.KV, got, r.Angstrom)
		}
	}
	for _, kV := range []float64{20, 69.525, 137.3, 200, 450} {
		s := tube(t, "W", kV)
		n := s.Len() - 1
		if end := s.KeV[n] + s.WidthKeV[n]/2; math.Abs(end-kV) > 1e-9 {
			t.Errorf("%g kV: the last bin ends at %.12g", kV, end)
		}
		if !(s.PerCM2[n] > 0) {
			t.Errorf("%g kV: the last bin is empty", kV)
		}
	}
}

func TestMoseley(t *testing.T) {
	for _, r := range readLaws(t).Moseley {
		keV := MoseleyKAlphaKeV(r.Z)
		switch {
		case r.FormulaAngstrom > 0 && math.Abs(AngstromKeV/keV-r.FormulaAngstrom) > r.Tolerance:
			t.Errorf("%s: formula gives %.4f angstrom, published %.4f", r.Symbol, AngstromKeV/keV, r.FormulaAngstrom)
		case r.FormulaKeV > 0 && math.Abs(keV-r.FormulaKeV) > r.Tolerance:
			t.Errorf("%s: formula gives %.2f keV, published %.2f", r.Symbol, keV, r.FormulaKeV)
		}
		strongest := tubeLine(t, r.Symbol)
		measured := r.MeasuredKeV
		if r.MeasuredAngstrom > 0 {
			measured = AngstromKeV / r.MeasuredAngstrom // doublet
		}
		if math.Abs(strongest/measured-1) > 0.002 {
			t.Errorf("%s: strongest line at %.3f keV, measured K-alpha %.3f", r.Symbol, strongest, measured)
		}
	}
	if l := MoseleyLAlphaKeV(74); math.Abs(l/8.398-1) > 0.02 {
		t.Errorf("W L-alpha by the formula %.3f keV, measured 8.398", l)
	}
}

// tubeLine is the energy of the strongest K line of target.
func tubeLine(t *testing.T, target string) float64 {
	s := tube(t, target, 120)
	best, keV := 0.0, 0.0
	for i, w := range s.WidthKeV {
		if w == 0 && s.PerCM2[i] > best && (target != "W" || s.KeV[i] > 50) {
			best, keV = s.PerCM2[i], s.KeV[i]
		}
	}
	return keV
}

func TestLinesAboveTheEdgeOnly(t *testing.T) {
	for _, r := range readLaws(t).Edges {
		s := tube(t, r.Target, r.KV)
		has := slices.ContainsFunc(lineEnergies(s), func(e float64) bool { return e > 15 })
		if has != r.Lines {
			t.Errorf("%s at %g kV: lines %v, want %v", r.Target, r.KV, has, r.Lines)
		}
	}
}

func TestLineEnergiesAreMeasured(t *testing.T) {
	for _, r := range readLaws(t).LinesKeV {
		have := lineEnergies(tube(t, r.Target, 200))
		for _, want := range r.KeV {
			if !slices.ContainsFunc(have, func(e float64) bool { return math.Abs(e-want) <= r.Tolerance }) {
				t.Errorf("%s: no line at %.4f keV, have %v", r.Target, want, have)
			}
		}
	}
}
