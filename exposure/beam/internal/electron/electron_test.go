package electron

import (
	"math"
	"testing"
)

// near fails unless got is within tol of want, as a share of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got/want-1) <= tol) {
		t.Errorf("%s: %.5g, want %.5g within %g %%", what, got, want, tol*100)
	}
}

// TestStopping holds the stopping power against NIST's ESTAR (ICRU 37), from
// memory, MeV cm2/g. ESTAR takes the density effect away, up to 2 % at 1 MeV.
func TestStopping(t *testing.T) {
	al := Matter{13, 26.982, 0.166}
	lead := Matter{82, 207.2, 0.823}
	for _, r := range []struct {
		m              Matter
		keV, want, tol float64
	}{
		{al, 10, 16.49, 0.02}, {al, 100, 3.177, 0.01}, {al, 1000, 1.465, 0.03},
		{lead, 100, 1.964, 0.02}, {lead, 1000, 1.003, 0.03},
	} {
		near(t, "stopping power", r.m.Stopping(r.keV)/1000, r.want, r.tol)
	}
}

// TestRange holds the range against ESTAR, from memory, g/cm2.
func TestRange(t *testing.T) {
	al := Matter{13, 26.982, 0.166}
	near(t, "range at 100 keV", al.Range(100), 0.01872, 0.02)
	near(t, "range at 1 MeV", al.Range(1000), 0.555, 0.03)
}

// TestBackscatter holds the walk against measured backscatter coefficients at
// normal incidence, 20 to 60 keV (Heinrich 1966, Drescher et al. 1970; from
// memory, +-0.02). Continuous slowing down leaves a little too many inside.
func TestBackscatter(t *testing.T) {
	want := map[int]float64{24: 0.26, 29: 0.31, 42: 0.38, 74: 0.48, 79: 0.50}
	for _, m := range Targets() {
		w, ok := want[m.Z]
		if !ok {
			continue
		}
		if got := m.Walk(40, 0, 3000, 10, 1).Back; math.Abs(got-w) > 0.05 {
			t.Errorf("Z %d: %.3f of the electrons come back, measured %.2f", m.Z, got, w)
		}
	}
}

// TestWalkIsOrdered checks what must hold for any target: electrons only get
// lost and only go deeper as they slow down, and none is lost at the start.
func TestWalkIsOrdered(t *testing.T) {
	s := Targets()[1].Walk(30, 20, 2000, 10, 7)
	for i := 1; i < len(s.Track); i++ {
		if s.Track[i] < s.Track[i-1]-1e-9 || s.Depth[i] > s.Depth[i-1]+0.01 {
			t.Errorf("bin %d: track %.3f after %.3f, depth %.3f after %.3f", i, s.Track[i-1], s.Track[i], s.Depth[i-1], s.Depth[i])
		}
	}
	if again := Targets()[1].Walk(30, 20, 2000, 10, 7); again.Track[3] != s.Track[3] || again.Back != s.Back {
		t.Error("the same seed gave another walk")
	}
}

// TestCoulombRatio holds Sommerfeld's factor against mpmath 1.2.1 (hyp2f1, 20
// digits), computed apart from this code; y is (after-before)/(after+before).
func TestCoulombRatio(t *testing.T) {
	for _, r := range []struct{ before, y, want float64 }{
		{0.1, 0.1, 0.998681}, {1, 0.02, 0.885631}, {1, 0.1, 0.920237}, {1, 0.5, 0.991137}, {1, 0.9, 1.002764},
		{3, 0.1, 0.807866}, {3, 0.6, 0.957417}, {6, 0.05, 0.692870}, {6, 0.9, 0.949159},
	} {
		near(t, "ratio", coulombRatio(r.before, r.before*(1+r.y)/(1-r.y)), r.want, 1e-5)
	}
}

// TestYield holds the radiation yield of a thick target against the rule of
// Compton and Allison, 1.1e-9 Z V (common practice, +-25 % at 100 kV) and lead
// at 100 keV against ESTAR's 1.16e-2 (from memory).
func TestYield(t *testing.T) {
	for _, m := range Targets() {
		near(t, "rule of thumb", m.yield(100), 1.1e-9*float64(m.Z)*1e5, 0.3)
	}
	near(t, "lead at 100 keV", Matter{82, 207.2, 0.823}.yield(100), 1.16e-2, 0.15)
}

// yield is the share of the energy of an electron of keV that is radiated
// while it stops inside.
func (m Matter) yield(keV float64) float64 {
	const n = 60
	var sum float64
	for i := range n {
		e := keV * (float64(i) + 0.5) / n
		var radiated float64
		for j := range n {
			k := e * (float64(j) + 0.5) / n
			radiated += m.Bremsstrahlung(e, k) * k * e / n
		}
		sum += radiated / m.Stopping(e) * keV / n
	}
	return sum * Avogadro / m.A / keV
}

// TestBremsstrahlungEnds checks the ends of the cross section: nothing at or
// above the electron's energy, finite and positive just below it.
func TestBremsstrahlungEnds(t *testing.T) {
	m := Targets()[4]
	for _, k := range []float64{0, 100, 101, math.NaN()} {
		if v := m.Bremsstrahlung(100, k); v != 0 {
			t.Errorf("photon of %g keV from 100 keV: %g, want 0", k, v)
		}
	}
	tip, near := m.Bremsstrahlung(100, 99.999), m.Bremsstrahlung(100, 99)
	if !(tip > 0 && math.Abs(tip/near-1) < 0.05) {
		t.Errorf("tip %g, 1 %% below %g", tip, near)
	}
}

// TestIonisation holds the K shell of copper against measurements collected by
// Llovet et al. (J Phys Chem Ref Data 43, 013102, 2014): about 400 b at 25 keV
// (from memory, +-20 %), and nothing below the edge.
func TestIonisation(t *testing.T) {
	if v := Ionisation(8.9, 8.979, 2); v != 0 {
		t.Errorf("below the edge: %g", v)
	}
	near(t, "copper K at 25 keV", Ionisation(25, 8.979, 2)*1e24, 400, 0.2)
}
