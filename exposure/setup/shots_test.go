package setup

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"testing"
)

// points is testdata/standards-*.json.
type points struct {
	Source     string `json:"source"`
	Confidence string `json:"confidence"`
	Shots      []struct {
		Way       string  `json:"way"`
		K         float64 `json:"k"`
		TOverDe   float64 `json:"tOverDe"`
		DeOverSFD float64 `json:"deOverSFD"`
		DeOverF   float64 `json:"deOverF"`
		Exact     float64 `json:"exact"`
		Within    float64 `json:"within"`
	} `json:"shots"`
}

func TestShotsPublished(t *testing.T) {
	data, err := os.ReadFile("../../testdata/standards-shots.json")
	if err != nil {
		t.Fatal(err)
	}
	var file points
	if err := json.Unmarshal(data, &file); err != nil {
		t.Fatal(err)
	}
	if len(file.Shots) < 4 || file.Source == "" || file.Confidence == "" {
		t.Fatalf("%d points of %q", len(file.Shots), file.Source)
	}
	for _, row := range file.Shots {
		p := Pipe{100, 100 * row.TOverDe}
		way, axis := Far, p.ODMM/row.DeOverSFD-p.Outer()
		if row.Way == "near" {
			way, axis = Near, p.ODMM/row.DeOverF+p.Outer()
		}
		s, err := p.ShotsAround(way, axis, row.K)
		if err != nil || math.Abs(s.Exact-row.Exact) > row.Within {
			t.Errorf("%+v: %v shots, %v", row, s.Exact, err)
		}
		if float64(s.N) < s.Exact || float64(s.N) >= s.Exact+1 {
			t.Errorf("%v shots are rounded to %d", s.Exact, s.N)
		}
	}
}

// worst walks the weld, each place in the shot whose film lies there, and gives
// the longest path over the wall. It uses the tracer of solid_test.go. The
// joints between films are on the grid.
func worst(p Pipe, way Ring, axis float64, n int) float64 {
	most := 0.0
	const grid = 40 // places between the middle of a shot and the joint
	for i := range grid + 1 {
		angle := math.Pi / float64(n) * float64(i) / grid
		x, z := p.Outer()*math.Sin(angle), -p.Outer()*math.Cos(angle)
		if way != Far {
			z = -z
		}
		most = max(most, wallAt(p, axis, x, z))
	}
	return most / p.WallMM
}

// wallAt is the path in one wall of the ray through a place of the outer
// surface. From outside it meets both walls at the same slant, so half of the
// whole chord is one wall.
func wallAt(p Pipe, axis, x, z float64) float64 {
	from := Vec{Z: axis}
	u := Vec{X: x, Z: z}.Sub(from)
	if axis < p.Inner() {
		return pipeWalk(Ray{from, from.Add(u.Times(1 + 1e-9))}, p.Outer(), p.Inner())
	}
	return pipeWalk(Ray{from, from.Add(u.Times(1 + 4*p.Outer()/u.Len()))}, p.Outer(), p.Inner()) / 2
}

func TestCoverage(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 8))
	fewer := 0
	for range 2000 {
		p := Pipe{40 + 600*rng.Float64(), 0}
		p.WallMM = p.ODMM * (0.01 + 0.12*rng.Float64())
		k := []float64{1.1, 1.2}[rng.IntN(2)]
		if rng.IntN(10) == 0 {
			p.WallMM = p.ODMM * (0.13 + 0.36*rng.Float64())
		}
		way := Ring(rng.IntN(3))
		axis := p.Outer() * (1.02 + 4*rng.Float64())
		if way == NearInside {
			axis = p.Inner() * (0.7 + 0.28*rng.Float64())
		} else if way == Far && rng.IntN(3) == 0 {
			axis = p.Inner() * rng.Float64()
		}
		s, err := p.ShotsAround(way, axis, k)
		if err != nil {
			t.Fatal(err)
		}
		if got := worst(p, way, axis, s.N); got > k*(1+1e-9) {
			t.Fatalf("%+v way %d, source %v off the axis, K %v: %d shots leave a place at %v walls", p, way, axis, k, s.N, got)
		}
		if s.N > 1 && (1+k*k)*p.WallMM < p.ODMM {
			if got := worst(p, way, axis, s.N-1); got <= k {
				t.Fatalf("%+v way %d, source %v off the axis, K %v: %d shots would do (%v walls), told %v", p, way, axis, k, s.N-1, got, s.Exact)
			}
			fewer++
		}
	}
	if fewer < 1500 {
		t.Errorf("only %d cases tried with a shot less", fewer)
	}
}

// TestFilmShowsItsShare holds the arc on the film to the ray: the tracer finds
// where the ray leaves the film's circle.
func TestFilmShowsItsShare(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 10))
	for range 300 {
		p := Pipe{60 + 500*rng.Float64(), 0}
		p.WallMM = p.ODMM * (0.02 + 0.08*rng.Float64())
		axis, gap, lap := p.Outer()*(1.05+3*rng.Float64()), 10*rng.Float64(), 5*rng.Float64()
		run, err := p.RunAround(Far, axis, 1.1, gap, lap)
		if err != nil {
			t.Fatal(err)
		}
		if run.FilmMM > run.ShownMM*(1+1e-9) {
			t.Errorf("film of %v mm reads beyond the %v mm within K", run.FilmMM, run.ShownMM)
		}
		if math.Abs(run.ArcMM*float64(run.N)-math.Pi*p.ODMM) > 1e-9*p.ODMM {
			t.Errorf("%d shots of %v mm are not the girth of %v mm", run.N, run.ArcMM, math.Pi*p.ODMM)
		}
		radius := p.Outer() + gap
		place := p.Place(math.Pi/float64(run.N) + lap/p.Outer())
		u := place.Sub(Vec{Z: axis})
		lo, hi := 1.0, 1+4*radius/u.Len()
		for range 100 {
			m := (lo + hi) / 2
			if q := (Vec{Z: axis}).Add(u.Times(m)); math.Hypot(q.X, q.Z) < radius {
				lo = m
			} else {
				hi = m
			}
		}
		q := (Vec{Z: axis}).Add(u.Times(lo))
		want := 2 * radius * math.Acos(-q.Z/radius)
		if math.Abs(run.FilmMM-want) > 1e-6*want {
			t.Errorf("film %v mm, traced %v (%+v, source %v)", run.FilmMM, want, p, axis)
		}
	}
}

func TestShotsRefuses(t *testing.T) {
	p := Pipe{100, 5}
	for _, row := range []struct {
		way  Ring
		axis float64
		k    float64
	}{{Far, 47, 1.1}, {Near, 20, 1.1}, {NearInside, 60, 1.1}, {Far, 200, 1}, {Far, 200, math.NaN()}, {Far, math.NaN(), 1.1}, {Far, -1, 1.1}} {
		if s, err := p.ShotsAround(row.way, row.axis, row.k); err == nil {
			t.Errorf("%+v is accepted: %+v", row, s)
		}
	}
	if _, err := (Pipe{100, 50}).ShotsAround(Far, 200, 1.1); err == nil {
		t.Error("a bar is accepted as a pipe")
	}
	if _, err := p.RunAround(Far, 200, 1.1, 0, 90); err == nil {
		t.Error("an overlap of more than a shot is accepted")
	}
}

// TestThetaOfThickWalls: continuous where the formula ends, and never nothing.
func TestThetaOfThickWalls(t *testing.T) {
	for _, k := range []float64{1.1, 1.2} {
		last := math.Pi / 2
		for share := 0.01; share < 0.499; share += 0.001 {
			p := Pipe{100, 100 * share}
			theta := p.Theta(k)
			if !(theta > 0 && theta <= math.Asin(p.Inner()/p.Outer())+1e-9) || theta > last+0.05 {
				t.Fatalf("t/De %v, K %v: theta %v rad", share, k, theta)
			}
			last = theta
		}
		edge := 1 / (1 + k*k)
		if a, b := (Pipe{100, 100 * (edge - 1e-9)}).Theta(k), (Pipe{100, 100 * (edge + 1e-9)}).Theta(k); math.Abs(a-b) > 1e-4 {
			t.Errorf("K %v: theta jumps from %v to %v rad", k, a, b)
		}
	}
	if _, err := (Pipe{100, 5}).ShotsAround(Near, 50.0000001, 1.1); err == nil {
		t.Error("a source on the wall takes no end of shots")
	}
}

func TestPlateShots(t *testing.T) {
	const sfd, k, thick = 700, 1.1, 20
	half := PlateHalfMM(sfd, k)
	r := Ray{Vec{Z: sfd}, Vec{X: half}}
	if got := ThroughMM(Slab{alongZ, 0, thick}, r); math.Abs(got-k*thick) > 1e-9 {
		t.Errorf("at the end of the film the ray passes %v mm, want %v", got, k*thick)
	}
	n, err := ShotsAlong(2000, sfd, thick, 10, k)
	if err != nil || n != int(math.Ceil(2000/(2*half*(sfd-thick)/sfd-20))) {
		t.Errorf("%d shots, %v", n, err)
	}
	if _, err := ShotsAlong(2000, 100, 20, 90, k); err == nil {
		t.Error("an overlap of more than a shot is accepted")
	}
}
