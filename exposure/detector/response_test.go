package detector

import (
	"math"
	"testing"

	"halfvalue/exposure/beam"
)

// Mean recoil energies by Klein and Nishina: Attix, Introduction to
// Radiological Physics, table (from memory, good to 1 %).
func TestComptonRecoil(t *testing.T) {
	for _, row := range []struct{ keV, share float64 }{{10, 0.0187}, {100, 0.138}, {200, 0.216}, {500, 0.344}, {1000, 0.440}, {1500, 0.493}} {
		if got := comptonKeV(row.keV) / row.keV; math.Abs(got/row.share-1) > 0.01 {
			t.Errorf("%g keV: recoil takes %.4f, published %.4f", row.keV, got, row.share)
		}
	}
	// The series and the closed form meet.
	if a, b := comptonKeV(1.0219), comptonKeV(1.0221); math.Abs(b/a-1) > 0.002 {
		t.Errorf("%g and %g where the series ends", a, b)
	}
}

// Ranges of Katz and Penfold's relation: 14 mg/cm2 at 100 keV, 0.42 g/cm2 at 1
// MeV (handbook values, from memory).
func TestElectronRange(t *testing.T) {
	for _, row := range []struct{ keV, gPerCM2, within float64 }{{100, 0.0135, 0.05}, {1000, 0.412, 0.001}, {2000, 0.95, 0.03}} {
		if got := rangeGPerCM2(row.keV); math.Abs(got/row.gPerCM2-1) > row.within {
			t.Errorf("%g keV: range %g g/cm2, published %g", row.keV, got, row.gPerCM2)
		}
	}
}

// A bare film answers, per air kerma, most at some 40 to 60 keV, an order of
// magnitude more than at 1 MeV, and evenly above 0.5 MeV (common knowledge of
// film dosimetry).
func TestBareFilmOverKerma(t *testing.T) {
	perKerma := func(keV float64) float64 { return Response(keV, [2]float64{}) / beam.KermaPerFluence(keV) }
	best, at := 0.0, 0.0
	for e := 10.0; e < 1500; e *= 1.02 {
		if v := perKerma(e); v > best {
			best, at = v, e
		}
	}
	t.Logf("most per air kerma at %.0f keV, %.0f times that at 1 MeV", at, best/perKerma(1000))
	if at < 30 || at > 65 || best < 10*perKerma(1000) {
		t.Errorf("most at %g keV, %g times 1 MeV", at, best/perKerma(1000))
	}
	if r := perKerma(600) / perKerma(1250); math.Abs(r-1) > 0.1 {
		t.Errorf("600 keV against 1250 keV: %g", r)
	}
}

// Responses are positive and finite everywhere, thicker front screens never
// help below lead's K edge, and any screens of use give the same electrons.
func TestScreens(t *testing.T) {
	for _, mm := range [][2]float64{{}, {0.02, 0.02}, {0.1, 0.1}, {0.1, 0}, {0, 0.1}, {3, 3}} {
		s := NewScreens(mm)
		for e := 1.0; e < 4000; e *= 1.01 {
			if v := s.Response(e); !(v >= 0) || math.IsInf(v, 0) {
				t.Fatalf("screens %v: response %g at %g keV", mm, v, e)
			}
		}
	}
	for _, e := range []float64{40, 60, 85} {
		last := math.Inf(1)
		for _, mm := range []float64{0.02, 0.05, 0.1, 0.2, 0.5} {
			v := Response(e, [2]float64{mm, 0.1})
			if v >= last {
				t.Errorf("%g keV: %g behind %g mm of lead after %g", e, v, mm, last)
			}
			last = v
		}
	}
}

// Plates: the ratio grows with the root of the dose until structure noise ends
// it, and Exposure is the inverse of SNRn.
func TestSNRn(t *testing.T) {
	for _, l := range []Layer{Plate(), Panel()} {
		var q Quanta
		l.Add(&q, 120, 1e6)
		l.Add(&q, 60, 5e5)
		low, more := l.SNRn(q, 0.01), l.SNRn(q, 0.04)
		if r := more / low; math.Abs(r-2) > 0.1 {
			t.Errorf("%s: four times the dose gives %g times the ratio", l.Name, r)
		}
		if top := l.SNRn(q, 1e9); math.Abs(top/l.MostSNRn()-1) > 1e-3 {
			t.Errorf("%s: ends at %g, want %g", l.Name, top, l.MostSNRn())
		}
		for _, snr := range []float64{20, 100, 300} {
			u, ok := l.Exposure(q, snr)
			if !ok || math.Abs(l.SNRn(q, u)/snr-1) > 1e-9 {
				t.Errorf("%s: ratio %g at %g units (%v) comes back as %g", l.Name, snr, u, ok, l.SNRn(q, u))
			}
		}
		if _, ok := l.Exposure(q, l.MostSNRn()); ok {
			t.Errorf("%s: its last ratio was answered", l.Name)
		}
		if _, ok := l.Exposure(Quanta{}, 50); ok || l.SNRn(Quanta{}, 1) != 0 {
			t.Errorf("%s: an answer without radiation", l.Name)
		}
	}
}

func BenchmarkResponse(b *testing.B) {
	s := NewScreens([2]float64{0.1, 0.1})
	for b.Loop() {
		s.Response(143)
	}
}
