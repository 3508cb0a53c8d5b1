package photon

import (
	"math"
	"reflect"
	"strings"
	"testing"
)

func slab(t testing.TB, s Slab) Result {
	t.Helper()
	r, err := s.Run()
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// What goes in comes out or stays: uncollided, scattered forward, back, and
// left in collisions. Closure is 0.2 %; splitting and roulette keep it on average only.
func TestEnergyIsConserved(t *testing.T) {
	for _, row := range []struct {
		medium string
		keV    float64
	}{{"water", 60}, {"Fe", 150}, {"Pb", 100}, {"Pb", 2500}, {"concrete", 660}, {"U", 118}} {
		m := medium(t, row.medium)
		for _, x := range []float64{0.3, 3, 12} {
			r := slab(t, Slab{Layers: []Layer{{m, x / m.MuRho(row.keV)}}, KeV: []float64{row.keV}, Histories: 30000, Seed: 4})
			out := r.Uncollided + r.Planes[0].Current + r.Planes[0].Return + r.Deposited
			// pair production turns energy into mass and annihilation gives it back, both at the same point
			if math.Abs(out/r.Incident-1) > 0.002 {
				t.Errorf("%s %g keV %g mfp: %.5f of the energy accounted for", row.medium, row.keV, x, out/r.Incident)
			}
		}
	}
}

func TestSameForAnyNumberOfWorkers(t *testing.T) {
	m := medium(t, "Fe")
	s := Slab{Layers: []Layer{{m, 20}}, Planes: []float64{2, 5, 20}, KeV: []float64{90, 200}, Weight: []float64{2, 1}, Histories: 8000, Seed: 9}
	s.Workers = 1
	a := slab(t, s)
	s.Workers = 5
	if b := slab(t, s); !reflect.DeepEqual(a, b) {
		t.Error("one and five workers give different results")
	}
	s.Seed = 10
	if b := slab(t, s); reflect.DeepEqual(a, b) {
		t.Error("another seed gives the same result")
	}
}

// A plane inside a stack stands for the slab that ends there.
func TestPlanesAreSlabs(t *testing.T) {
	m := medium(t, "Al")
	deep := slab(t, Slab{Layers: []Layer{{m, 40}}, Planes: []float64{3, 12, 40}, KeV: []float64{80}, Histories: 200000, Seed: 1})
	for k, z := range []float64{3, 12} {
		alone := slab(t, Slab{Layers: []Layer{{m, z}}, KeV: []float64{80}, Histories: 200000, Seed: 2})
		compare(t, "scattered air kerma", deep.Planes[k].Kerma, alone.Planes[0].Kerma, 4*math.Hypot(deep.RelErr[k], alone.RelErr[0]))
		compare(t, "returned energy", deep.Planes[k].Return, alone.Planes[0].Return, 0.02)
	}
}

// Cutting a slab into layers of the same medium changes nothing.
func TestLayersOfOneMediumAreOne(t *testing.T) {
	m := medium(t, "Fe")
	whole := slab(t, Slab{Layers: []Layer{{m, 16}}, KeV: []float64{150}, Histories: 200000, Seed: 1})
	cut := slab(t, Slab{Layers: []Layer{{m, 5}, {m, 1}, {m, 10}}, KeV: []float64{150}, Histories: 200000, Seed: 2})
	compare(t, "scattered air kerma", cut.Planes[0].Kerma, whole.Planes[0].Kerma, 4*math.Hypot(cut.RelErr[0], whole.RelErr[0]))
	if math.Abs(cut.Primary[0]/whole.Primary[0]-1) > 1e-9 {
		t.Errorf("primary %g, want %g", cut.Primary[0], whole.Primary[0])
	}
}

func compare(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got/want-1) <= tolerance) {
		t.Errorf("%s: %g and %g differ by more than %.2f %%", what, got, want, 100*tolerance)
	}
}

// The stated error is that of repetition: over seeds, the results spread as
// they say.
func TestErrorIsHonest(t *testing.T) {
	m := medium(t, "concrete")
	var sum, sum2, stated float64
	const n = 30
	for seed := range uint64(n) {
		r := slab(t, Slab{Layers: []Layer{{m, 40}}, KeV: []float64{150}, Histories: 4000, Seed: seed})
		v := r.Planes[0].Kerma
		sum, sum2 = sum+v/n, sum2+v*v/n
		stated += r.RelErr[0] / n
	}
	seen := math.Sqrt((sum2-sum*sum)*n/(n-1)) / sum
	if seen > 1.6*stated || seen < stated/1.6 {
		t.Errorf("results spread by %.2f %%, stated %.2f %%", 100*seen, 100*stated)
	}
}

func TestBadRunsAreRefused(t *testing.T) {
	m := medium(t, "Fe")
	good := Slab{Layers: []Layer{{m, 1}}, KeV: []float64{100}, Histories: 10}
	for _, row := range []struct {
		change func(*Slab)
		want   string
	}{
		{func(s *Slab) { s.Layers = nil }, "needs layers"},
		{func(s *Slab) { s.Layers = []Layer{{m, 0}} }, "positive mass thickness"},
		{func(s *Slab) { s.Layers = []Layer{{nil, 1}} }, "needs a medium"},
		{func(s *Slab) { s.KeV = []float64{9} }, "outside 10 to 4000"},
		{func(s *Slab) { s.KeV = []float64{math.NaN()} }, "outside 10 to 4000"},
		{func(s *Slab) { s.Weight = []float64{-1} }, "negative"},
		{func(s *Slab) { s.Weight = []float64{0} }, "empty"},
		{func(s *Slab) { s.Planes = []float64{2, 1} }, "planes must rise"},
		{func(s *Slab) { s.Planes = []float64{0.5, 0.9} }, "planes must rise"},
		{func(s *Slab) { s.Histories = 0 }, "histories"},
	} {
		s := good
		row.change(&s)
		if _, err := s.Run(); err == nil || !strings.Contains(err.Error(), row.want) {
			t.Errorf("error %v, want one with %q", err, row.want)
		}
	}
	if _, err := (Sphere{Medium: m, KeV: 5, RadiiMFP: []float64{1}, Histories: 1}).Run(); err == nil {
		t.Error("a sphere of 5 keV is not refused")
	}
	if _, err := NewMedium(nil); err == nil {
		t.Error("a medium of nothing is not refused")
	}
}

func BenchmarkSlabSteel200keV(b *testing.B) {
	m := medium(b, "Fe")
	var collisions, histories int64
	for b.Loop() {
		const n = 20000
		r := slab(b, Slab{Layers: []Layer{{m, 12 / m.MuRho(200)}}, KeV: []float64{200}, Histories: n, Seed: 1})
		collisions += r.Collisions
		histories += n
	}
	b.ReportMetric(float64(histories)/b.Elapsed().Seconds(), "histories/s/core")
	b.ReportMetric(float64(collisions)/b.Elapsed().Seconds(), "collisions/s/core")
}
