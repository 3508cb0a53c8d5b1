package boundary

import (
	"math"
	"math/rand/v2"
	"os"
	"strconv"
	"testing"

	"halfvalue/exposure/plan"
)

// randomInput is a shot on a random site: every other one a sealed source, some
// of those with a collimator or a container.
func randomInput(t testing.TB, rng *rand.Rand) Input {
	site := randomSite(rng)
	var in Input
	if rng.IntN(2) == 0 {
		p := plan.Demo()
		p.Source.Tube.Filters = append(p.Source.Tube.Filters, plan.Filter{Material: "Cu", MM: rng.Float64() * 3})
		p.Site = site
		in = tubeInput(t, p)
	} else {
		in = sealedInput(t, []string{"Ir-192", "Se-75", "Co-60"}[rng.IntN(3)], 20+rng.Float64()*3000, func(s *plan.Sealed) {
			if rng.IntN(2) == 0 {
				s.ConeDeg, s.Collimator = 60, []plan.Filter{{Material: "W", MM: 5 + rng.Float64()*15}}
			}
		})
		if rng.IntN(3) == 0 {
			site.Container = &plan.Container{XM: rng.Float64()*8 - 4, YM: rng.Float64()*8 - 4}
		}
		limits := in.Plan.Site.Limits
		in.Plan.Site = site
		if len(site.Limits) == 0 {
			in.Plan.Site.Limits = limits
		}
	}
	in.ExposureSecondsHigh = 10 + rng.Float64()*600
	return in
}

// bruteForce holds the distance on a bearing against points along it, fine
// near the contour, coarse elsewhere: nothing outside it exceeds the level, and
// right inside it the level is exceeded.
func bruteForce(t *testing.T, f *Field, l Level, deg float64) {
	t.Helper()
	d := f.Distance(l, deg)
	u := direction(deg, 0)
	at := func(r float64) float64 { return f.At(l, f.focus.plus(u.times(r)).onLevel(f)) }
	for r := d * (1 + 1e-6); r < d+2; r += 0.05 {
		if v := at(r); v > l.USvPerH*(1+1e-6) {
			t.Fatalf("%.4g deg: contour at %.6g m, but %.6g uSv/h of %.6g at %.6g m", deg, d, v, l.USvPerH, r)
		}
	}
	for r := d + 2; r < 2*d+100; r += 1 {
		if v := at(r); v > l.USvPerH*(1+1e-6) {
			t.Fatalf("%.4g deg: contour at %.6g m, but %.6g uSv/h of %.6g at %.6g m", deg, d, v, l.USvPerH, r)
		}
	}
	if d > LeastRopeM*1.03 && !(at(d*0.9999) > l.USvPerH) && !(at(d*0.98) > l.USvPerH) {
		t.Fatalf("%.4g deg: contour at %.6g m, but only %.6g uSv/h of %.6g within 2 %% inside it", deg, d, at(d*0.98), l.USvPerH)
	}
}

func (v Vec) onLevel(f *Field) Vec { v.Z = f.site.LevelM; return v }

func TestContourAgainstBruteForce(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 5))
	for range 60 {
		in := randomInput(t, rng)
		f := fieldOf(t, in)
		for _, l := range f.Levels() {
			for range 8 {
				bruteForce(t, f, l, rng.Float64()*360)
			}
		}
	}
}

// TestContourAgainstGrid holds the polygon of 720 bearings against a grid.
func TestContourAgainstGrid(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	for n := range 12 {
		in := randomInput(t, rng)
		f := fieldOf(t, in)
		l := f.Levels()[0]
		c := f.Contour(l, 720)
		most := c.WorstM
		exceeded, inside := 0, 0
		for range 4000 {
			r, deg := most*1.2*math.Sqrt(rng.Float64()), rng.Float64()*360
			if r < LeastRopeM {
				continue
			}
			q := f.focus.plus(direction(deg, 0).times(r)).onLevel(f)
			i := 0
			for i < len(c.BearingsDeg)-1 && c.BearingsDeg[i+1] <= deg {
				i++
			}
			j := (i + 1) % len(c.BearingsDeg)
			polygon := max(c.Metres[i], c.Metres[j])
			if f.At(l, q) > l.USvPerH {
				exceeded++
				if r > polygon*1.005 {
					t.Errorf("site %d: %.5g deg, %.5g m exceeds the level outside the contour, %.5g m", n, deg, r, polygon)
				}
			} else if r < polygon {
				inside++
			}
		}
		if exceeded == 0 {
			t.Errorf("site %d: no point of the grid exceeds the level", n)
		}
	}
}

// sites is how many random sites are tried: HALFVALUE_SITES=50000 for the long form.
func sites(t *testing.T, short int) int {
	if v := os.Getenv("HALFVALUE_SITES"); v != "" {
		n, err := strconv.Atoi(v)
		if err != nil {
			t.Fatal(err)
		}
		return n
	}
	return short
}

// TestRandomSites: another wall, without scatter, enlarges nothing; with it
// only by what it scatters itself. More strength and time shrink nothing.
func TestRandomSites(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 7))
	worst := 0.0
	for n := range sites(t, 60) {
		in := randomInput(t, rng)
		walled := in
		walled.Plan.Site.Walls = append([]plan.Wall{{Name: "new", Material: "concrete", MM: 150, HeightM: 3,
			Points: []plan.Point{{XM: 4 + rng.Float64()*10, YM: -9}, {XM: 6 + rng.Float64()*10, YM: 9}}}}, in.Plan.Site.Walls...)
		more := in
		more.Strength *= 1.5
		more.ExposureSecondsHigh *= 1.3
		a, b, c, d, e := fieldOf(t, in), fieldOf(t, walled), fieldOf(t, more), fieldOf(t, in, WithoutScatter()), fieldOf(t, walled, WithoutScatter())
		for range 4 {
			deg := rng.Float64() * 360
			l := a.Levels()[0]
			m := c.Levels()[0]
			plain, more := a.Distance(l, deg), c.Distance(m, deg)
			wall, bare, bareWall := b.Distance(l, deg), d.Distance(l, deg), e.Distance(l, deg)
			for _, v := range []float64{plain, more, wall, bare, bareWall} {
				if !(v >= LeastRopeM) || math.IsInf(v, 0) {
					t.Fatalf("site %d, %.4g deg: distance %g", n, deg, v)
				}
			}
			if more < plain*(1-1e-7) {
				t.Fatalf("site %d, %.4g deg: more strength and time shrink %.6g m to %.6g m", n, deg, plain, more)
			}
			if bareWall > bare*(1+1e-7) {
				t.Fatalf("site %d, %.4g deg: a wall enlarges %.6g m to %.6g m without scatter", n, deg, bare, bareWall)
			}
			worst = max(worst, wall/plain-1)
		}
	}
	t.Logf("a wall's own scatter enlarges a boundary by %.1f %% at most", worst*100)
	if worst > 1 {
		t.Errorf("a wall's scatter enlarges a boundary by %.0f %%", worst*100)
	}
}
