package beam

import (
	"math"
	"testing"

	"halfvalue/exposure/plan"
)

func TestHVLOfOneLine(t *testing.T) {
	m := material(t, "Pb")
	s := Spectrum{KeV: []float64{661.66}, WidthKeV: []float64{0}, PerCM2: []float64{3}}
	want := math.Ln2 / m.MuPerMM(661.66)
	h1, h2 := s.HVL(m)
	if math.Abs(h1/want-1) > 1e-12 || math.Abs(h2/want-1) > 1e-12 {
		t.Errorf("%.15g and %.15g mm, want %.15g twice", h1, h2, want)
	}
}

// TestHVLIsARoot: behind the layers the kerma is a half and a quarter, and a
// filtered beam only hardens.
func TestHVLIsARoot(t *testing.T) {
	for _, kV := range []float64{20, 80, 200, 450} {
		s := tube(t, "W", kV, plan.Filter{Material: "Be", MM: 2.4})
		for _, name := range []string{"Al", "Cu", "carbon-steel", "Pb"} {
			m := material(t, name)
			h1, h2 := s.HVL(m)
			k := s.KermaMGy()
			half, quarter := s.Through(m, h1).KermaMGy()/k, s.Through(m, h1+h2).KermaMGy()/k
			if math.Abs(half-0.5) > 1e-12 || math.Abs(quarter-0.25) > 1e-12 || h2 < h1*(1-1e-9) && name != "Pb" {
				t.Errorf("%g kV in %s: %.4g and %.4g mm leave %.15g and %.15g", kV, name, h1, h2, half, quarter)
			}
		}
	}
	if h1, h2 := (Spectrum{}).HVL(material(t, "Cu")); !math.IsNaN(h1) || !math.IsNaN(h2) {
		t.Error("an empty beam has a half-value layer")
	}
}

func TestThroughLeavesItsInput(t *testing.T) {
	s := tube(t, "W", 100)
	k := s.KermaMGy()
	a := s.Through(material(t, "Cu"), 1).Through(material(t, "Cu"), 2).KermaMGy()
	b := s.Through(material(t, "Cu"), 3).KermaMGy()
	if s.KermaMGy() != k {
		t.Error("Through changed the beam it was given")
	}
	if math.Abs(a/b-1) > 1e-12 {
		t.Errorf("1 and 2 mm leave %g, 3 mm %g", a, b)
	}
}

// TestAmbientPerKerma holds the nodes, the ends and, between the nodes, the
// formula fitted by ICRU 57 (from memory): x/(1.465 x^2 - 4.414 x + 4.789) +
// 0.7006 atan(0.6519 x), x = ln(E/9.85 keV).
func TestAmbientPerKerma(t *testing.T) {
	for _, p := range ambient {
		if got := AmbientPerKerma(p[0]); math.Abs(got/p[1]-1) > 1e-12 {
			t.Errorf("%g keV: %g Sv/Gy, ICRP 74 %g", p[0], got, p[1])
		}
	}
	for e := 20.0; e <= 3000; e *= 1.03 {
		x := math.Log(e / 9.85)
		want := x/(1.465*x*x-4.414*x+4.789) + 0.7006*math.Atan(0.6519*x)
		if got := AmbientPerKerma(e); math.Abs(got/want-1) > 0.03 {
			t.Errorf("%.4g keV: %.4g Sv/Gy, ICRU's formula %.4g", e, got, want)
		}
	}
	if AmbientPerKerma(3) != AmbientPerKerma(10) || AmbientPerKerma(9000) != AmbientPerKerma(3000) {
		t.Error("the ends do not hold outside the table")
	}
}

// TestKermaOfALine by hand: 1e9 photons/cm2 of 100 keV, NIST's 0.02325 cm2/g.
func TestKermaOfALine(t *testing.T) {
	s := Spectrum{KeV: []float64{100}, WidthKeV: []float64{0}, PerCM2: []float64{1e9}}
	if want := 1e9 * 100 * 0.02325 * 1.602176634e-10; math.Abs(s.KermaMGy()/want-1) > 0.003 {
		t.Errorf("%g mGy, by hand %g", s.KermaMGy(), want)
	}
	if want := s.KermaMGy() * 1650; math.Abs(s.AmbientUSv()/want-1) > 1e-9 {
		t.Errorf("%g uSv, by hand %g", s.AmbientUSv(), want)
	}
}
