package photon

import (
	"fmt"
	"testing"
	"time"

	"halfvalue/materials"
)

func medium(t testing.TB, name string) *Medium {
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

func TestTry(t *testing.T) {
	for _, c := range []struct {
		m string
		e float64
	}{{"Fe", 100}, {"Fe", 500}, {"water", 60}, {"water", 1000}, {"Pb", 100}, {"Pb", 1000}, {"Pb", 50}, {"Fe", 20}, {"Pb", 3000}, {"concrete", 150}, {"U", 118}} {
		med := medium(t, c.m)
		mu := med.MuRho(c.e)
		var planes []float64
		for _, x := range []float64{0.05, 0.1, 0.25, 0.5, 1, 1.5, 2, 3, 4, 5, 6, 7, 8, 10, 12} {
			planes = append(planes, x/mu)
		}
		t0 := time.Now()
		r, err := Slab{Layers: []Layer{{med, 12 / mu}}, Planes: planes, KeV: []float64{c.e}, Histories: 100000, Seed: 1}.Run()
		if err != nil {
			t.Fatal(err)
		}
		fmt.Printf("%s %g keV  %.2fs %d collisions (%.2f M/s)", c.m, c.e, time.Since(t0).Seconds(), r.Collisions, float64(r.Collisions)/time.Since(t0).Seconds()/1e6)
		n := len(planes) - 1
		fmt.Printf(" balance %.5f\n", (r.Uncollided+r.Planes[n].Current+r.Planes[n].Return+r.Deposited)/r.Incident)
		for k := range planes {
			fmt.Printf(" %.3f(%.1f%%)", r.Planes[k].Kerma/r.Primary[k], 100*r.RelErr[k])
		}
		fmt.Println()
	}
}
