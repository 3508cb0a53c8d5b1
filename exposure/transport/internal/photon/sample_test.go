package photon

import (
	"math"
	"testing"

	"halfvalue/materials"
)

func medium(t testing.TB, name string) *Medium {
	t.Helper()
	m, err := materials.Lookup(name)
	if err != nil {
		t.Fatal(err)
	}
	med, err := NewMedium(m)
	if err != nil {
		t.Fatal(err)
	}
	return med
}

// The mean share of energy that an electron takes from a photon, free
// electrons: Klein and Nishina's law integrated here on a fine grid, and the
// values of the Evans tables (The Atomic Nucleus, from memory): 0.138 at 0.1
// MeV, 0.440 at 1 MeV.
func TestComptonFollowsKleinNishina(t *testing.T) {
	for _, row := range []struct{ keV, evans float64 }{{30, 0}, {100, 0.138}, {300, 0}, {1000, 0.440}, {3000, 0}} {
		k := row.keV / electronKeV
		var sum, lost float64
		for i := range 20000 {
			mu := -1 + (float64(i)+0.5)/10000
			p := kleinNishina(k, mu)
			sum += p
			lost += p * (1 - 1/(1+k*(1-mu)))
		}
		want := lost / sum
		if total := sum * 1e-4 * 2 * math.Pi; math.Abs(total/kleinNishinaTotal(k)-1) > 1e-4 {
			t.Errorf("%g keV: total cross section %g, integral %g", row.keV, kleinNishinaTotal(k), total)
		}
		if row.evans > 0 && math.Abs(want/row.evans-1) > 0.005 {
			t.Errorf("%g keV: electrons take %g, published %g", row.keV, want, row.evans)
		}
		r, got := newRandom(1, uint64(row.keV)), 0.0
		const n = 400000
		for range n {
			e, c := r.compton(row.keV, 0)
			if math.Abs(e*(1+k*(1-c))/row.keV-1) > 1e-9 {
				t.Fatalf("%g keV: energy %g does not fit cosine %g", row.keV, e, c)
			}
			got += (1 - e/row.keV) / n
		}
		if math.Abs(got/want-1) > 0.005 {
			t.Errorf("%g keV: sampled electrons take %g, law says %g", row.keV, got, want)
		}
	}
}

// The mean of the cosine of coherent scattering of shape q, sampled and summed.
func TestCoherentFollowsItsLaw(t *testing.T) {
	for _, q := range []float64{0.5, 10, 300, 1e5} {
		var sum, mean float64
		for i := range 2_000_000 {
			u := (float64(i) + 0.5) / 2e6
			mu := 1 - 2*u
			p := (1 + mu*mu) / (1 + q*u)
			sum, mean = sum+p, mean+p*mu
		}
		if got := coherentIntegral(q); math.Abs(got/(sum*1e-6)-1) > 1e-3 {
			t.Errorf("q %g: integral %g, summed %g", q, got, sum*1e-6)
		}
		r, got := newRandom(2, uint64(q*10)), 0.0
		const n = 300000
		for range n {
			got += r.coherent(q) / n
		}
		if math.Abs(got-mean/sum) > 0.004 {
			t.Errorf("q %g: mean cosine %g, want %g", q, got, mean/sum)
		}
	}
}

// The one free length of each shape is fixed by XCOM alone; the shapes that
// come out are compared with published atomic form factors and incoherent
// scattering functions (Hubbell et al. 1975, taken from xraylib 4.0's
// FF_Rayl and SF_Compt, seen) by momentum transfer x in 1/angstrom.
func TestShapesOfBoundElectrons(t *testing.T) {
	rows := []struct {
		element   string
		x         float64
		form2, sf float64 // (F/Z)^2 and S/Z
	}{
		{"Fe", 0.2, 0.594, 0.222}, {"Fe", 0.5, 0.195, 0.488}, {"Fe", 1, 0.0628, 0.711}, {"Fe", 2, 0.0147, 0.873},
		{"Pb", 0.2, 0.713, 0.127}, {"Pb", 0.5, 0.349, 0.297}, {"Pb", 1, 0.132, 0.490}, {"Pb", 2, 0.0317, 0.695},
		{"Al", 0.2, 0.496, 0.311}, {"Al", 0.5, 0.191, 0.579}, {"Al", 1, 0.0320, 0.819},
	}
	const keV = 100
	for _, row := range rows {
		c, f := medium(t, row.element).at(keV)
		u := math.Pow(row.x*hcKeVA/keV, 2)
		form2 := 1 / (1 + (c.shape+f*c.dshape)*u)
		v := math.Pow(u, 0.75)
		sf := v / (v + c.bound + f*c.dbound)
		if math.Abs(form2-row.form2) > 0.08 {
			t.Errorf("%s at x %g: squared form factor %.3f, published %.3f", row.element, row.x, form2, row.form2)
		}
		if math.Abs(sf-row.sf) > 0.12 {
			t.Errorf("%s at x %g: incoherent function %.3f, published %.3f", row.element, row.x, sf, row.sf)
		}
	}
}

// Cross sections on the walk's grid against those of package materials.
func TestMediumAgreesWithMaterials(t *testing.T) {
	for _, name := range []string{"water", "Fe", "Pb", "concrete", "U"} {
		m, err := materials.Lookup(name)
		if err != nil {
			t.Fatal(err)
		}
		med := medium(t, name)
		for e := 10.3; e < 3900; e *= 1.037 {
			if got, want := med.MuRho(e), m.MuRho(e); math.Abs(got/want-1) > 2e-4 && !nearEdge(m, e) {
				t.Errorf("%s at %.4g keV: %g cm2/g, want %g", name, e, got, want)
			}
		}
	}
}

// nearEdge tells whether the cell of an energy may hold an edge.
func nearEdge(m *materials.Material, e float64) bool {
	a, b := m.MuRho(e*0.995), m.MuRho(e*1.005)
	return b > a
}

func TestFluorescenceYieldsLinesOfTheElement(t *testing.T) {
	lead := medium(t, "Pb")
	r := newRandom(3, 0)
	seen := map[float64]int{}
	for range 20000 {
		seen[math.Round(lead.fluorescent(r, 100))]++
	}
	// K-alpha-1 74.97, K-alpha-2 72.80, K-beta about 84.9 (common practice)
	if seen[75] < seen[73] || seen[73] < seen[85] || seen[85] == 0 {
		t.Errorf("lead lines by keV: %v, want 75 > 73 > 85 > none", seen)
	}
	if c, f := lead.at(87); c.live+f*c.dlive > 0.3 {
		t.Errorf("below its edge lead fluoresces: %g photons after a collision", c.live+f*c.dlive)
	}
	if c, f := lead.at(90); c.live+f*c.dlive < 0.7 {
		t.Errorf("above its edge lead does not fluoresce: %g photons after a collision", c.live+f*c.dlive)
	}
}
