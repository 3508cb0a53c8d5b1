package transport

import (
	"math"
	"testing"
)

// against compares the table's scattered to primary air kerma with a run of
// the Monte Carlo on the layers as they are; the mean energies of the scattered
// photons must agree too.
func against(t *testing.T, what string, layers []Layer, keV, perCM2 []float64, allowed, allowedKeV float64) {
	t.Helper()
	r, err := Simulation{Histories: 40000, Seed: 11, Workers: 2}.Slab(layers, keV, perCM2)
	if err != nil {
		t.Fatal(err)
	}
	p, s := behind(t, layers, keV, perCM2)
	want := r.Scattered / r.Primary
	off, mean := s/p/want-1, meanEnergy(t, layers, keV, perCM2)
	t.Logf("%-36s S/P %7.4f direct %7.4f (%.1f %%)  %+5.1f %%  mean keV %.1f direct %.1f", what, s/p, want, 100*r.RelErr, 100*off, mean, r.MeanKeV)
	if math.Abs(off) > allowed+2*r.RelErr {
		t.Errorf("%s: scattered to primary %.4g, direct %.4g: off by %+.1f %%, allowed %.0f", what, s/p, want, 100*off, 100*allowed)
	}
	if math.Abs(mean/r.MeanKeV-1) > allowedKeV {
		t.Errorf("%s: mean energy of scattered photons %.4g keV, direct %.4g", what, mean, r.MeanKeV)
	}
}

func sum(v []float64) (s float64) {
	for _, x := range v {
		s += x
	}
	return s
}

func meanEnergy(t *testing.T, layers []Layer, keV, perCM2 []float64) float64 {
	x, err := Slab(layers, keV, perCM2)
	if err != nil {
		t.Fatal(err)
	}
	var e float64
	for i, n := range x.Scatter {
		e += n * x.MeanKeV[i]
	}
	return e / sum(x.Scatter)
}
