package materials

import (
	"math"
	"testing"
)

func TestMuEnAirNIST(t *testing.T) {
	var file struct {
		Rows []struct {
			KeV, CM2PerG float64
			Confidence   string
		}
	}
	published(t, "nist-mu-en-air.json", &file)
	if len(file.Rows) < 20 {
		t.Fatalf("%d rows, want 20 or more", len(file.Rows))
	}
	for _, r := range file.Rows {
		if got := MuEnRhoAir(r.KeV); off(got, r.CM2PerG) > 1e-4 {
			t.Errorf("%g keV: %.5g cm2/g, NIST (%s) %.5g", r.KeV, got, r.Confidence, r.CM2PerG)
		}
	}
}

// TestMuEnAirFromCrossSections recomputes mu_en/rho of air from the cross
// sections: all of a photoelectric event but argon's K fluorescence stays,
// a Compton event leaves the electron's mean energy by Klein and Nishina for
// a free electron, a pair leaves all but its rest energy; bremsstrahlung is
// not subtracted, so that above 1 MeV NIST must lie below by its share, which
// rises to about 7 % at 20 MeV. Binding adds up to 1.4 % where Compton energy
// transfer is small, 40 to 150 keV. Below 20 keV, where the figures are from
// memory, the two agree within 0.2 %.
func TestMuEnAirFromCrossSections(t *testing.T) {
	air, argon := lookup(t, "air"), lookup(t, "Ar")
	for u := 0.0; u <= 1; u += 1.0 / 400 {
		keV := math.Pow(LastKeV, u)
		kept := air.MuRhoOf(Photoelectric, keV) - argonEscape(argon, keV)
		kept += air.MuRhoOf(Incoherent, keV) * comptonKept(keV/510.99895)
		kept += (air.MuRhoOf(PairNuclear, keV) + air.MuRhoOf(PairElectron, keV)) * max(0, 1-pairKeV/keV)
		d := MuEnRhoAir(keV)/kept - 1
		low, high := -0.003, 0.003
		switch {
		case keV > 600:
			low, high = -0.004*keV/1000-0.0015, 0
		case keV > 22:
			low, high = -0.003, 0.016
		}
		if !(d >= low && d <= high) {
			t.Errorf("%.5g keV: mu_en/rho %.5g, from the cross sections %.5g (%+.2f %%)", keV, MuEnRhoAir(keV), kept, 100*d)
		}
	}
}

// argonEscape is the energy that leaves as argon's K fluorescence, as a part
// of the air's photoelectric coefficient.
func argonEscape(argon *Material, keV float64) float64 {
	e := table()[18]
	if keV < e.KEdgeKeV {
		return 0
	}
	return 0.012827 * argon.MuRhoOf(Photoelectric, keV) * e.KShare * e.KYield * e.KLines[0].KeV / keV
}

// comptonKept is the mean share of the photon's energy that a free electron at
// rest takes, k being the energy in electron rest masses (Klein and Nishina).
func comptonKept(k float64) float64 {
	const n = 2000
	var all, kept float64
	for i := range n {
		c := -1 + 2*(float64(i)+0.5)/n
		p := 1 / (1 + k*(1-c))
		d := p * p * (p + 1/p - 1 + c*c)
		all += d
		kept += d * (1 - p)
	}
	return kept / all
}

func TestMuEnAirRange(t *testing.T) {
	for _, keV := range []float64{math.Nextafter(1, 0), math.Nextafter(20000, 1e9), 0, -5, math.NaN(), math.Inf(1), math.Inf(-1)} {
		if v := MuEnRhoAir(keV); !math.IsNaN(v) {
			t.Errorf("%g keV: %g, want NaN", keV, v)
		}
	}
	if off(MuEnRhoAir(1), 3599) > 1e-9 || off(MuEnRhoAir(20000), 0.01311) > 1e-6 {
		t.Errorf("ends %g and %g, want 3599 and 0.01311", MuEnRhoAir(1), MuEnRhoAir(20000))
	}
	if below, above := MuEnRhoAir(math.Nextafter(3.2029, 0)), MuEnRhoAir(3.2029); off(below, 133) > 1e-9 || off(above, 146) > 1e-9 {
		t.Errorf("argon's edge: %g and %g, want 133 and 146", below, above)
	}
}

func TestMuEnAirRefusesBrokenTables(t *testing.T) {
	for _, s := range []string{
		`{`, `{"keV":[1,20000],"cm2PerG":[1]}`, `{"keV":[2,20000],"cm2PerG":[1,1]}`, `{"keV":[1,2000],"cm2PerG":[1,1]}`,
		`{"keV":[1,5,4,20000],"cm2PerG":[1,1,1,1]}`, `{"keV":[1,20000],"cm2PerG":[1,0]}`, `{"keV":[],"cm2PerG":[]}`,
	} {
		if _, _, err := parseMuEnAir([]byte(s)); err == nil {
			t.Errorf("%s is taken", s)
		}
	}
}
