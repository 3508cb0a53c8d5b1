package materials

import (
	"math"
	"strings"
	"sync"
	"testing"
)

func TestMixtureIsTheSumOfItsParts(t *testing.T) {
	fe, pb, water := lookup(t, "Fe"), lookup(t, "Pb"), lookup(t, "water")
	m, err := Mixture("shot in water", 5, []Part{{fe, 2}, {pb, 1}, {water, 1}})
	if err != nil {
		t.Fatal(err)
	}
	for _, keV := range []float64{1, 7.112, 20, 88.004, 150, 1100, 20000} {
		want := 0.5*fe.MuRho(keV) + 0.25*pb.MuRho(keV) + 0.25*water.MuRho(keV)
		if off(m.MuRho(keV), want) > 3e-7 {
			t.Errorf("%g keV: %g, want %g", keV, m.MuRho(keV), want)
		}
	}
	if off(m.MuPerMM(100), m.MuRho(100)*0.5) > 1e-14 {
		t.Errorf("linear %g per mm from %g cm2/g at 5 g/cm3", m.MuPerMM(100), m.MuRho(100))
	}
}

func TestNewScalesAndMerges(t *testing.T) {
	m, err := New("x", 1, []Fraction{{8, 0.4}, {1, 0.1}, {8, 0.5004}})
	if err != nil {
		t.Fatal(err)
	}
	f := m.Fractions()
	if len(f) != 2 || f[0].Z != 1 || math.Abs(f[0].Mass+f[1].Mass-1) > 1e-15 {
		t.Errorf("fractions %v", f)
	}
	f[0].Mass = 7
	if m.Fractions()[0].Mass == 7 {
		t.Error("a material shares its fractions with its callers")
	}
}

func TestRefused(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	iron := []Fraction{{26, 1}}
	fe := lookup(t, "Fe")
	cases := map[string]func() (*Material, error){
		"without a name":                         func() (*Material, error) { return New("", 1, iron) },
		`"0" g/cm3`:                              func() (*Material, error) { return New("x", 0, iron) },
		`"-1" g/cm3`:                             func() (*Material, error) { return New("x", -1, iron) },
		`"NaN" g/cm3`:                            func() (*Material, error) { return New("x", nan, iron) },
		`"+Inf" g/cm3`:                           func() (*Material, error) { return New("x", inf, iron) },
		`"26" g/cm3`:                             func() (*Material, error) { return New("x", 26, iron) },
		`sum to "0"`:                             func() (*Material, error) { return New("x", 1, nil) },
		`sum to "0.9"`:                           func() (*Material, error) { return New("x", 1, []Fraction{{26, 0.9}}) },
		`sum to "2"`:                             func() (*Material, error) { return New("x", 1, []Fraction{{26, 1}, {26, 1}}) },
		`number "93"`:                            func() (*Material, error) { return New("x", 1, []Fraction{{93, 1}}) },
		`number "0"`:                             func() (*Material, error) { return New("x", 1, []Fraction{{0, 1}}) },
		`fraction "-1"`:                          func() (*Material, error) { return New("x", 1, []Fraction{{26, -1}, {8, 1}, {7, 1}}) },
		`fraction "NaN"`:                         func() (*Material, error) { return New("x", 1, []Fraction{{26, nan}}) },
		"no material":                            func() (*Material, error) { return Mixture("x", 1, []Part{{nil, 1}}) },
		`mass "0"`:                               func() (*Material, error) { return Mixture("x", 1, []Part{{fe, 0}}) },
		`mass "+Inf"`:                            func() (*Material, error) { return Mixture("x", 1, []Part{{fe, inf}}) },
		"unknown element":                        func() (*Material, error) { return Compound("x", "Zz", 1) },
		`"30" g/cm3 is`:                          func() (*Material, error) { return fe.WithDensity(30) },
		`material "fe"`:                          func() (*Material, error) { return Lookup("fe") },
		`such as "carbon-steel"`:                 func() (*Material, error) { return Lookup("Carbon-Steel") },
		`such as "n06625"`:                       func() (*Material, error) { return Lookup("N6625") },
		`material ""`:                            func() (*Material, error) { return Lookup("") },
		"material \"" + strings.Repeat("x", 100): func() (*Material, error) { return Lookup(strings.Repeat("x", 100)) },
	}
	for want, make := range cases {
		if m, err := make(); m != nil || err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("got %v, want an error with %q", err, want)
		}
	}
}

func TestWithDensity(t *testing.T) {
	wool := lookup(t, "mineral-wool")
	dense, err := wool.WithDensity(0.24)
	if err != nil {
		t.Fatal(err)
	}
	if off(dense.MuPerMM(60), 2*wool.MuPerMM(60)) > 1e-14 || wool.DensityGPerCM3() != 0.12 {
		t.Errorf("linear %g at twice the density of %g", dense.MuPerMM(60), wool.MuPerMM(60))
	}
}

func TestLookupSamePointer(t *testing.T) {
	for _, name := range []string{"Fe", "carbon-steel"} {
		if lookup(t, name) != lookup(t, name) {
			t.Errorf("%q gives two materials", name)
		}
	}
}

// TestConcurrent asks a fresh material from many sides at once.
func TestConcurrent(t *testing.T) {
	m, err := Compound("x", "Fe3O4", 5)
	if err != nil {
		t.Fatal(err)
	}
	want := directTotal(m, 100)
	var wait sync.WaitGroup
	for range 16 {
		wait.Go(func() {
			if off(m.MuRho(100), want) > 1e-6 || math.IsNaN(m.MuRhoOf(Coherent, 30)) {
				t.Errorf("got %g, want %g", m.MuRho(100), want)
			}
		})
	}
	wait.Wait()
}

// TestEdges: the edges of an alloy are those of its elements, and at each the
// coefficient jumps up.
func TestEdges(t *testing.T) {
	m, err := Mixture("x", 10, []Part{{lookup(t, "Pb"), 1}, {lookup(t, "W"), 1}})
	if err != nil {
		t.Fatal(err)
	}
	edges := m.EdgesKeV()
	if n := len(edges); n != 18 || edges[n-1] != 88.004 || edges[n-2] != 69.525 {
		t.Errorf("%d edges %v, want 18 that end with tungsten's and lead's K", n, edges)
	}
	for _, e := range edges {
		if above, below := m.MuRho(e), m.MuRho(math.Nextafter(e, 0)); above < 1.003*below {
			t.Errorf("%g keV: %g below and %g above", e, below, above)
		}
	}
}
