package setup

import (
	"math"
	"math/rand/v2"
	"testing"
)

// The tracer of these tests shares nothing with the solids: it only knows
// whether a point is inside a wall, walks the ray and closes in on each surface
// by halving.

// walk gives the length of the ray inside, from membership alone; it may miss
// what is thinner than one of its steps.
func walk(r Ray, inside func(Vec) bool, steps int) float64 {
	point := func(s float64) Vec {
		return Vec{r.From.X + s*(r.To.X-r.From.X), r.From.Y + s*(r.To.Y-r.From.Y), r.From.Z + s*(r.To.Z-r.From.Z)}
	}
	length := math.Sqrt(math.Pow(r.To.X-r.From.X, 2) + math.Pow(r.To.Y-r.From.Y, 2) + math.Pow(r.To.Z-r.From.Z, 2))
	sum, entered, was := 0.0, 0.0, inside(point(0))
	for i := 1; i <= steps; i++ {
		a, b := float64(i-1)/float64(steps), float64(i)/float64(steps)
		is := inside(point(b))
		if is == was {
			continue
		}
		for range 60 {
			if m := (a + b) / 2; inside(point(m)) == was {
				a = m
			} else {
				b = m
			}
		}
		if is {
			entered = (a + b) / 2
		} else {
			sum += (a+b)/2 - entered
		}
		was = is
	}
	if was {
		sum += 1 - entered
	}
	return sum * length
}

// pipeWalk is walk for a pipe. The distance from the axis falls and rises once
// along a ray, so its least point splits the ray into two stretches with at
// most one crossing of either surface: nothing can be missed.
func pipeWalk(r Ray, outer, inner float64) float64 {
	distance := func(s float64) float64 {
		x, z := r.From.X+s*(r.To.X-r.From.X), r.From.Z+s*(r.To.Z-r.From.Z)
		return math.Sqrt(x*x + z*z)
	}
	lo, hi := 0.0, 1.0
	for range 200 {
		a, b := lo+(hi-lo)*0.45, lo+(hi-lo)*0.55
		if distance(a) < distance(b) {
			hi = b
		} else {
			lo = a
		}
	}
	least := (lo + hi) / 2
	within := func(radius float64) float64 {
		if distance(least) >= radius {
			return 0
		}
		end := func(in, out float64) float64 {
			if distance(out) <= radius {
				return out
			}
			for range 100 {
				if m := (in + out) / 2; distance(m) < radius {
					in = m
				} else {
					out = m
				}
			}
			return (in + out) / 2
		}
		return end(least, 1) - end(least, 0)
	}
	length := math.Sqrt(math.Pow(r.To.X-r.From.X, 2) + math.Pow(r.To.Y-r.From.Y, 2) + math.Pow(r.To.Z-r.From.Z, 2))
	return (within(outer) - within(inner)) * length
}

func TestPipeAgainstTracer(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	hits := 0
	for range 5000 {
		outer := 5 + 500*rng.Float64()
		inner := outer * (0.5 + 0.48*rng.Float64())
		r := randomRay(rng, outer)
		got, want := ThroughMM(Pipe{2 * outer, outer - inner}, r), pipeWalk(r, outer, inner)
		if math.Abs(got-want) > 1e-9*max(1, want) {
			t.Fatalf("pipe of radii %v and %v, ray %+v: %v mm, traced %v", outer, inner, r, got, want)
		}
		if want > 0 {
			hits++
		}
	}
	if hits < 2500 {
		t.Errorf("only %d of 5000 rays met the wall", hits)
	}
}

// randomRay runs from somewhere to somewhere; about one in four starts inside.
func randomRay(rng *rand.Rand, size float64) Ray {
	at := func(reach float64) Vec {
		return Vec{(2*rng.Float64() - 1) * reach, (2*rng.Float64() - 1) * reach, (2*rng.Float64() - 1) * reach}
	}
	from := at(3 * size)
	if rng.IntN(4) == 0 {
		from = at(0.3 * size)
	}
	aim := at(0.9 * size)
	return Ray{from, aim.Add(aim.Sub(from).Times(rng.Float64() * 2))}
}

func TestPlateAgainstTracer(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for range 5000 {
		thick := 0.5 + 100*rng.Float64()
		sfd := thick * (1.1 + 20*rng.Float64())
		x, y := (2*rng.Float64()-1)*2*sfd, (2*rng.Float64()-1)*2*sfd
		r := Ray{Vec{0, 0, sfd}, Vec{x, y, 0}}
		// similar triangles, no direction cosines
		want := math.Sqrt(x*x+y*y+sfd*sfd) * thick / sfd
		if got := ThroughMM(Slab{alongZ, 0, thick}, r); math.Abs(got-want) > 1e-9*max(1, want) {
			t.Fatalf("plate %v, ray %+v: %v mm, traced %v", thick, r, got, want)
		}
	}
}

func TestJointsAgainstTracer(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	for i := range 300 {
		run := Pipe{100 + 300*rng.Float64(), 5 + 15*rng.Float64()}
		branch := Pipe{run.ODMM * (0.3 + 0.6*rng.Float64()), 3 + 8*rng.Float64()}
		r := randomRay(rng, run.Outer())
		ring := func(a, b float64, p Pipe) (in, wall bool) {
			q := math.Sqrt(a*a + b*b)
			return q < p.Inner(), q >= p.Inner() && q < p.Outer()
		}
		inNozzle := func(v Vec) bool {
			inRun, wall := ring(v.X, v.Z, run)
			inBore, branchWall := ring(v.X, v.Y, branch)
			if v.Z < 0 {
				return wall
			}
			return wall && !inBore || branchWall && !inRun && !wall
		}
		check(t, i, "nozzle", Nozzle{run, branch}, r, inNozzle)
		f := Flange{branch, branch.ODMM * 1.8, 20}
		inFlange := func(v Vec) bool {
			q := math.Sqrt(v.X*v.X + v.Z*v.Z)
			return v.Y > 0 && q >= branch.Inner() && (q < branch.Outer() || v.Y < 20 && q < branch.ODMM*0.9)
		}
		check(t, i, "flange", f, r, inFlange)
	}
}

func check(t *testing.T, i int, what string, s Solid, r Ray, inside func(Vec) bool) {
	t.Helper()
	if got, want := ThroughMM(s, r), walk(r, inside, 20000); math.Abs(got-want) > 1e-9*max(1, want) {
		t.Errorf("%s %d, ray %+v: %v mm, traced %v", what, i, r, got, want)
	}
}

func TestNozzleExtremes(t *testing.T) {
	n := Nozzle{Pipe{168.3, 7.1}, Pipe{60.3, 3.9}}
	crown, flank, err := n.ExtremesMM(Vec{Z: 500}, 60)
	if err != nil || !(crown > 0 && flank > 0) {
		t.Errorf("crown %v, flank %v, %v", crown, flank, err)
	}
	// The flank wall of the run is met at a slant, the crown nearly square on.
	if flank <= crown {
		t.Errorf("flank %v mm is not more than the crown's %v mm", flank, crown)
	}
	if _, _, err := (Nozzle{Pipe{60.3, 3.9}, Pipe{168.3, 7.1}}).ExtremesMM(Vec{Z: 500}, 60); err == nil {
		t.Error("a branch wider than its run is accepted")
	}
}
