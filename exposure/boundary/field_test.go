package boundary

import (
	"math"
	"math/rand/v2"
	"testing"

	"halfvalue/exposure/plan"
)

func fieldOf(t testing.TB, in Input, opts ...Option) *Field {
	t.Helper()
	f, err := NewField(in, opts...)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

// tenWalls is a yard of ten walls and sheds round the source.
func tenWalls() []plan.Wall {
	var walls []plan.Wall
	for i := range 10 {
		c := direction(float64(i)*36+5, 0).times(6 + 3*float64(i%4))
		along := direction(float64(i)*36+95+float64(i%3)*20, 0).times(2.5)
		walls = append(walls, plan.Wall{Name: string(rune('a' + i)), Material: []string{"concrete", "brick", "carbon-steel"}[i%3], MM: []float64{200, 115, 20}[i%3], HeightM: 3,
			Points: []plan.Point{{XM: c.X - along.X, YM: c.Y - along.Y}, {XM: c.X + along.X, YM: c.Y + along.Y}}})
	}
	return walls
}

func TestFieldOpenBeamIsTheClosedForm(t *testing.T) {
	in := tubeInput(t, plan.Demo())
	f := fieldOf(t, in, WithoutScatter(), WithoutLeakage())
	l := f.Levels()[0]
	c := f.Contour(l, 720)
	want := math.Sqrt(in.Spectrum.AmbientUSv() * 5 * 3600 / 7.5)
	for i, deg := range c.BearingsDeg {
		off := math.Abs(math.Mod(deg+180, 360) - 180)
		switch {
		case off < 20:
			near(t, "open beam", c.Metres[i], want, 1e-6)
			near(t, "rope", c.RopeMetres[i], want*math.Sqrt(1.25), 1e-6)
		case off > 20.0005 && c.Metres[i] != LeastRopeM:
			t.Errorf("%.4g deg: %g m outside the beam", deg, c.Metres[i])
		}
	}
}

func TestLeakageAloneIsACircle(t *testing.T) {
	p := plan.Demo()
	p.Site.Beam.ElevationDeg = 90
	f := fieldOf(t, tubeInput(t, p), WithoutScatter())
	want := math.Sqrt(2500 * mostAmbientPerKerma / 7.5)
	for i, m := range f.Contour(f.Levels()[0], 90).Metres {
		near(t, "leakage", m, want, 1e-6)
		_ = i
	}
}

func TestDosesAdd(t *testing.T) {
	in := tubeInput(t, plan.Demo())
	q := Vec{2, 20, 1}
	all, beam := fieldOf(t, in, WithoutScatter()).Exposed(q), fieldOf(t, in, WithoutScatter(), WithoutLeakage()).Exposed(q)
	near(t, "beam and leakage", all.Total(), beam.Total()+2500*mostAmbientPerKerma/404, 1e-9)
}

// turned rotates every place of a site and the beam.
func turned(p plan.Plan, deg float64) plan.Plan {
	p = p.Clone()
	c, s := cosDeg(deg), sinDeg(deg)
	turn := func(x, y *float64) { *x, *y = *x*c+*y*s, *y*c-*x*s }
	b := &p.Site.Beam
	turn(&b.XM, &b.YM)
	b.BearingDeg = math.Mod(b.BearingDeg+deg, 360)
	for i := range p.Site.Walls {
		for j := range p.Site.Walls[i].Points {
			turn(&p.Site.Walls[i].Points[j].XM, &p.Site.Walls[i].Points[j].YM)
		}
	}
	return p
}

func TestTurningTheSiteTurnsTheContour(t *testing.T) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	f := fieldOf(t, tubeInput(t, p))
	g := fieldOf(t, tubeInput(t, turned(p, 137)))
	for deg := 0.25; deg < 360; deg += 7 {
		near(t, "turned", g.Distance(g.Levels()[0], deg+137), f.Distance(f.Levels()[0], deg), 1e-6)
	}
}

func TestMirroredStaysMirrored(t *testing.T) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	m := p.Clone()
	for i := range m.Site.Walls {
		for j := range m.Site.Walls[i].Points {
			m.Site.Walls[i].Points[j].XM *= -1
		}
	}
	f, g := fieldOf(t, tubeInput(t, p)), fieldOf(t, tubeInput(t, m))
	for deg := 0.25; deg < 360; deg += 7 {
		near(t, "mirrored", g.Distance(g.Levels()[0], 360-deg), f.Distance(f.Levels()[0], deg), 1e-6)
	}
}

// randomSite is a plan with walls, tube or sealed, at random.
func randomSite(rng *rand.Rand) plan.Site {
	s := plan.Site{Beam: plan.Beam{BearingDeg: rng.Float64() * 360, HeightM: 0.5 + rng.Float64()*2}, ShotsPerHour: float64(rng.IntN(12))}
	for i := range rng.IntN(6) {
		a := Vec{rng.Float64()*60 - 30, rng.Float64()*60 - 30, 0}
		b := a.plus(direction(rng.Float64()*360, 0).times(1 + rng.Float64()*15))
		w := plan.Wall{Name: string(rune('a' + i)), HeightM: 1 + rng.Float64()*4, Points: []plan.Point{{XM: a.X, YM: a.Y}, {XM: b.X, YM: b.Y}}}
		if rng.IntN(8) > 0 {
			w.Material, w.MM = []string{"concrete", "brick", "Pb"}[rng.IntN(3)], 5+rng.Float64()*200
		}
		s.Walls = append(s.Walls, w)
	}
	if rng.IntN(2) == 0 {
		s.Limits = []plan.Limit{{Name: "rate", RateUSvPerH: 0.5 + rng.Float64()*40, AveragingMin: 1}}
	} else {
		s.Limits = []plan.Limit{{Name: "dose", DoseUSv: 1 + rng.Float64()*50, Per: "hour"}}
	}
	return s
}

func BenchmarkNewField(b *testing.B) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	in := tubeInput(b, p)
	b.ReportAllocs()
	for b.Loop() {
		fieldOf(b, in)
	}
}

func BenchmarkContour720TenWalls(b *testing.B) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	f := fieldOf(b, tubeInput(b, p))
	l := f.Levels()[0]
	b.ReportAllocs()
	for b.Loop() {
		f.Contour(l, 720)
	}
}

func BenchmarkExposed(b *testing.B) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	f := fieldOf(b, tubeInput(b, p))
	q := Vec{30, 20, 1}
	for b.Loop() {
		f.Exposed(q)
	}
}
