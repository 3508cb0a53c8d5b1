package transport

import (
	"math"
	"strings"
	"testing"

	"halfvalue/materials"
)

func TestBadInputIsRefusedWithTheValueAndTheRange(t *testing.T) {
	steel := lookup(t, "carbon-steel")
	ok := []Layer{{steel, 10}}
	for _, row := range []struct {
		layers      []Layer
		keV, perCM2 []float64
		want        string
	}{
		{nil, []float64{100}, []float64{1}, "without layers"},
		{[]Layer{{nil, 1}}, []float64{100}, []float64{1}, "layer 1 of the slab has no material"},
		{[]Layer{{steel, 1}, {steel, -2}}, []float64{100}, []float64{1}, `"-2" mm is outside 0 to 100000`},
		{[]Layer{{steel, math.NaN()}}, []float64{100}, []float64{1}, `"NaN" mm is outside`},
		{[]Layer{{steel, math.Inf(1)}}, []float64{100}, []float64{1}, `"+Inf" mm is outside`},
		{ok, nil, nil, "at least one"},
		{ok, []float64{100}, []float64{1, 2}, "one fluence for each energy"},
		{ok, []float64{0.5}, []float64{1}, `"0.5" keV of the spectrum is outside 1 to 3000`},
		{ok, []float64{3001}, []float64{1}, `"3001" keV`},
		{ok, []float64{math.NaN()}, []float64{1}, `"NaN" keV`},
		{ok, []float64{100}, []float64{-1}, `fluence "-1"`},
		{ok, []float64{100}, []float64{math.NaN()}, `fluence "NaN"`},
		{ok, []float64{100}, []float64{math.Inf(1)}, `fluence "+Inf"`},
	} {
		if _, err := Slab(row.layers, row.keV, row.perCM2); err == nil || !strings.Contains(err.Error(), row.want) {
			t.Errorf("error %v, want one with %q", err, row.want)
		}
		if _, err := (Simulation{Histories: 10}).Slab(row.layers, row.keV, row.perCM2); err == nil {
			t.Errorf("a simulation takes what Slab refuses: %q", row.want)
		}
		if len(row.layers) == 1 && row.want != "at least one" {
			if got := BroadTransmission(row.layers[0].Material, row.layers[0].MM, row.keV, row.perCM2, KermaPerFluence); !math.IsNaN(got) {
				t.Errorf("a wall takes what Slab refuses (%q): %g", row.want, got)
			}
		}
	}
	if _, err := NewBarrier(steel, 0, []float64{100}, []float64{1}, KermaPerFluence); err == nil {
		t.Error("a barrier of no thickness is not refused")
	}
	if _, err := NewBarrier(steel, 10, []float64{100}, []float64{0}, KermaPerFluence); err == nil {
		t.Error("a barrier before an empty spectrum is not refused")
	}
	if _, err := Emitted(nil, 10, []float64{100}, []float64{1}); err == nil {
		t.Error("an emission of no material is not refused")
	}
}

// The ends of the range are taken, and nothing is NaN, whatever the material.
func TestEveryMaterialAnswersAtTheEndsOfTheRange(t *testing.T) {
	list := materials.Catalogue()
	for z := 1; z <= materials.MaxZ; z++ {
		el, err := materials.ElementByZ(z)
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, lookup(t, el.Symbol))
	}
	keV, n := []float64{1, 5, 10, 14, 15, 60, 88.0046, 500, 1022, 3000}, []float64{1, 1, 1, 1, 1, 1, 1, 1, 1, 1}
	for _, m := range list {
		for _, mm := range []float64{0, 1e-6, 0.01, 1, 50, 1e4, 1e5} {
			x, err := Slab([]Layer{{m, mm}}, keV, n)
			if err != nil {
				t.Fatalf("%s %g mm: %v", m.Name(), mm, err)
			}
			for i, v := range x.Scatter {
				if !(v >= 0) || math.IsInf(v, 0) || !(x.MeanKeV[i] >= x.EdgesKeV[i]*0.999 && x.MeanKeV[i] <= x.EdgesKeV[i+1]*1.001) {
					t.Fatalf("%s %g mm: bin %d has %g photons of %g keV, edges %g and %g", m.Name(), mm, i, v, x.MeanKeV[i], x.EdgesKeV[i], x.EdgesKeV[i+1])
				}
			}
			if !(x.RelErr >= 0 && x.RelErr < 0.2) {
				t.Errorf("%s %g mm: error %g", m.Name(), mm, x.RelErr)
			}
			if mm == 0 && sum(x.Scatter) != 0 {
				t.Errorf("%s of no thickness scatters %g", m.Name(), sum(x.Scatter))
			}
		}
	}
}
