package setup

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
)

func near(t *testing.T, what string, got, want, within float64) {
	t.Helper()
	if !(math.Abs(got-want) <= within) {
		t.Errorf("%s: %v, want %v", what, got, want)
	}
}

func demoPlan(t *testing.T, title string) plan.Plan {
	t.Helper()
	for _, p := range plan.Demos() {
		if strings.HasPrefix(p.Title, title) {
			return p
		}
	}
	t.Fatalf("no demo plan %q", title)
	return plan.Plan{}
}

// TestOf holds each demo setup to figures worked with pencil from its sizes.
func TestOf(t *testing.T) {
	for _, row := range []struct {
		title         string
		f, b, tt, w   float64
		ug, axis      float64
		sourceToPart  float64
		magnification float64
	}{
		{"KF-12", 680, 20, 20, 20, 3.0 * 20 / 680, 0, 680, 700.0 / 680},
		{"KF-04", 760 - 60.3, 60.3, 3.9, 7.8, 3 * 60.3 / 699.7, 760 - 30.15, 699.7, 760 / 699.7},
		{"KF-07", 342.9, 7.1, 7.1, 14.2, 3 * 7.1 / 342.9, 350 - 84.15, 181.7, 350 / 342.9},
		{"KF-09", 387.5, 12.5, 12.5, 25, 3 * 12.5 / 387.5, 400 - 161.95, 76.1, 400 / 387.5},
		{"Impeller", 855, 45, 18, 18, 3.0 * 45 / 855, 0, 855, 900.0 / 855},
		{"Flange", 840, 60, 55, 55, 3.0 * 60 / 840, 0, 840, 900.0 / 840},
	} {
		g, err := Of(demoPlan(t, row.title))
		if err != nil {
			t.Errorf("%s: %v", row.title, err)
			continue
		}
		for _, v := range []struct {
			what      string
			got, want float64
		}{{"f", g.FMM, row.f}, {"b", g.BMM, row.b}, {"t", g.TMM, row.tt}, {"w", g.WMM, row.w}, {"Ug", g.UgMM, row.ug}, {"axis", g.FromAxisMM, row.axis},
			{"source to part", g.SourceToPartMM, row.sourceToPart}, {"M", g.Magnification, row.magnification}, {"f + b", g.FMM + g.BMM, g.SFDMM}} {
			near(t, row.title+" "+v.what, v.got, v.want, 1e-9)
		}
		if len(g.Working()) < 3 {
			t.Errorf("%s: %d steps of working", row.title, len(g.Working()))
		}
	}
}

func TestOfInsideAndGap(t *testing.T) {
	p := demoPlan(t, "KF-09")
	p.Setup = plan.Setup{Kind: plan.Panoramic, SFDMM: 161.95}
	p.Part.Layers = p.Part.Layers[:1]
	g, err := Of(p)
	if err != nil || g.FromAxisMM > 1e-9 || g.SourceToPartMM != 0 {
		t.Errorf("on the axis: %+v, %v", g, err)
	}
	if r, err := g.Run(1.1, 10); err != nil || r.N != 1 {
		t.Errorf("on the axis: %+v, %v", r, err)
	}
	p.Setup = plan.Setup{Kind: plan.SingleWall, Side: plan.Inside, SFDMM: 290, BMM: 20}
	g, err = Of(p)
	if err != nil || g.Ring() != Far {
		t.Errorf("inside, towards the far wall: %+v, %v", g, err)
	}
	near(t, "source off the axis", g.FromAxisMM, 290-161.95-7.5, 1e-9)
	p.Setup = plan.Setup{Kind: plan.SingleWall, SFDMM: 500}
	g, err = Of(p)
	if err != nil || g.Ring() != Near {
		t.Errorf("outside, film inside: %+v, %v", g, err)
	}
	near(t, "source off the axis", g.FromAxisMM, 500-12.5+161.95, 1e-9)
	p = demoPlan(t, "KF-07")
	p.Setup.BMM = 178.3
	if g, _ = Of(p); math.Abs(g.GapMM-10) > 1e-9 || math.Abs(g.BMM-17.1) > 1e-9 {
		t.Errorf("film 10 mm off the pipe: gap %v, b %v", g.GapMM, g.BMM)
	}
	if _, err := (Geometry{}).Run(1.1, 0); err == nil {
		t.Error("a run round a plate is accepted")
	}
}

// TestEllipse traces the two edges of the weld to the film.
func TestEllipse(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 12))
	for range 1000 {
		p := Pipe{20 + 90*rng.Float64(), 3}
		gap, weld, open := 8*rng.Float64(), 4+16*rng.Float64(), 15*rng.Float64()
		sfd := (p.ODMM + gap) * (1.5 + 10*rng.Float64())
		e, err := p.EllipseFor(sfd, gap, weld, open)
		if err != nil {
			t.Fatal(err)
		}
		// where the line from the source through a point meets the film
		shadow := func(y, h float64) float64 { return e.OffsetMM + (y-e.OffsetMM)*sfd/(sfd-h) }
		// source towards +Y: the upper weld falls to -Y
		got := shadow(-weld/2, gap) - shadow(weld/2, gap+p.ODMM)
		near(t, "opening", got, open, 1e-9*sfd)
		near(t, "opening by the inverse", p.OpenAt(e.OffsetMM, sfd, gap, weld), open, 1e-9*sfd)
		tilt := radians(e.TiltDeg)
		near(t, "metal on the tilted ray", p.EllipseThroughMM(e.OffsetMM, sfd, gap), 2*p.WallMM/math.Cos(tilt), 1e-9*sfd)
	}
	if _, err := (Pipe{60.3, 3.9}).EllipseFor(60, 0, 8, 8); err == nil {
		t.Error("a source inside the pipe is accepted")
	}
}

func TestPanorama(t *testing.T) {
	rng := rand.New(rand.NewPCG(13, 14))
	for range 200 {
		p := Pipe{100 + 900*rng.Float64(), 0}
		p.WallMM = p.ODMM * (0.01 + 0.1*rng.Float64())
		off := p.Inner() * rng.Float64() * 0.99
		in, err := p.Panorama(off, 5)
		if err != nil {
			t.Fatal(err)
		}
		most := 0.0
		for i := range 3600 {
			a := 2 * math.Pi * float64(i) / 3600
			r := Ray{Vec{Z: off}, Vec{X: 2 * p.Outer() * math.Cos(a), Z: off + 2*p.Outer()*math.Sin(a)}}
			most = max(most, pipeWalk(r, p.Outer(), p.Inner()))
		}
		near(t, "longest path", in.MostWallMM, most, 1e-9*p.ODMM)
		near(t, "rate ratio", in.RateRatio, math.Pow((p.Outer()+5+off)/(p.Outer()+5-off), 2), 1e-9*in.RateRatio)
		if k := 1.1; in.MostWallMM > k*p.WallMM != (off > p.MostOffMM(k)) {
			t.Errorf("%+v, source %v off the axis passes %v walls, most %v mm off", p, off, in.MostWallMM/p.WallMM, p.MostOffMM(k))
		}
	}
	if _, err := (Pipe{100, 5}).Panorama(46, 0); err == nil {
		t.Error("a source in the wall is accepted")
	}
}

func TestPipeTable(t *testing.T) {
	sizes := PipeSizes()
	if len(sizes) < 30 {
		t.Errorf("%d sizes", len(sizes))
	}
	last := 0.0
	for _, s := range sizes {
		if s.ODMM <= last || s.Source == "" || s.Trust == "" || len(s.Walls) == 0 {
			t.Errorf("size %+v is out of order or lacks a source", s)
		}
		last = s.ODMM
		rising := 0.0
		for _, w := range s.Walls {
			if w.MM <= 0 || w.MM >= s.ODMM/2 {
				t.Errorf("NPS %s schedule %s: wall %v mm", s.NPS, w.Schedule, w.MM)
			}
			if n := 0; w.Schedule[0] != 'S' && w.Schedule[0] != 'X' {
				if fmt.Sscan(w.Schedule, &n); w.MM <= rising {
					t.Errorf("NPS %s schedule %s: wall %v mm is not above the schedule before", s.NPS, w.Schedule, w.MM)
				}
				rising = w.MM
			}
		}
	}
	if p, err := PipeBy("6", "40"); err != nil || p != (Pipe{168.3, 7.11}) {
		t.Errorf("NPS 6 schedule 40: %+v, %v (ASME B36.10M, from memory)", p, err)
	}
	for _, q := range [][2]string{{"7", "40"}, {"6", "41"}} {
		if _, err := PipeBy(q[0], q[1]); err == nil {
			t.Errorf("NPS %s schedule %s is known", q[0], q[1])
		}
	}
}

func TestFilmFor(t *testing.T) {
	if f, err := FilmFor(200, 70); err != nil || f.Name != "10 x 24 cm" {
		t.Errorf("%+v, %v", f, err)
	}
	if _, err := FilmFor(600, 70); err == nil {
		t.Error("a film of 600 mm is found")
	}
	r := Run{Shots: Shots{N: 3}, ArcMM: 100}
	if m := r.Belt(); len(m) != 3 || m[2].Text != "2" || m[2].ArcMM != 200 || r.FilmNames()[2] != "2-0" {
		t.Errorf("belt %v, films %v", m, r.FilmNames())
	}
}

func TestUnsharpness(t *testing.T) {
	// ASME V T-274: Ug = F d/D; 3 mm focus, 20 mm part, 700 mm SFD
	near(t, "Ug", UgMM(3, 680, 20), 0.08823529411764706, 1e-15)
	near(t, "total", TotalMM(0.3, 0.4), 0.5, 1e-12)
	last := 0.0
	for kV := 20.0; kV <= 450; kV++ {
		u, err := InherentOfTube(kV)
		if err != nil || u.MM < last || u.Source == "" || u.Confidence == "" {
			t.Errorf("%v kV: %+v, %v", kV, u, err)
		}
		last = u.MM
	}
	for _, kV := range []float64{19.9, 450.1, math.NaN()} {
		if _, err := InherentOfTube(kV); err == nil {
			t.Errorf("%v kV is accepted", kV)
		}
	}
	for _, n := range plan.Nuclides() {
		if u, err := InherentOfNuclide(n); err != nil || u.MM <= 0 {
			t.Errorf("%s: %+v, %v", n, u, err)
		}
	}
	if _, err := InherentOfNuclide("Cs-137"); err == nil {
		t.Error("a nuclide without a row is known")
	}
}

func TestRoom(t *testing.T) {
	near(t, "cone to the corner", ConeHalfDeg(700, 400, 300), degrees(math.Atan(250.0/700)), 1e-12)
	near(t, "cone on the film", ConeRadiusMM(40, 700), 700*math.Tan(math.Pi/9), 1e-9)
	if !math.IsInf(ConeRadiusMM(360, 700), 1) {
		t.Error("a panoramic head ends somewhere")
	}
	if s, err := TravelShare(6000, 600, 400); err != nil || math.Abs(s-0.05) > 1e-12 {
		t.Errorf("travel share %v, %v", s, err)
	}
	if _, err := TravelShare(6000, 0, 400); err == nil {
		t.Error("a source that does not travel is accepted")
	}
	near(t, "bend of 90 deg", BendRoomMM(13, 150, 90), 163, 1e-9)
	g := Geometry{SourceToPartMM: 680, GapMM: 5}
	for _, row := range []struct {
		room Room
		fits bool
	}{{Room{1000, 50}, true}, {Room{800, 50}, false}, {Room{1000, 20}, false}} {
		if why := row.room.Fits(g, Needs{BehindFocusMM: 200, CassetteMM: 15, HandMM: 20}); (why == "") != row.fits {
			t.Errorf("%+v: %q", row.room, why)
		}
	}
}

func TestRunCone(t *testing.T) {
	p := Pipe{168.3, 7.1}
	r, err := p.RunAround(Far, 265.85, 1.1, 0, 10)
	if err != nil {
		t.Fatal(err)
	}
	half := math.Pi/float64(r.N) + 10/p.Outer()
	want := math.Atan(p.Outer() * math.Sin(half) / (265.85 + p.Outer()*math.Cos(half)))
	near(t, "cone of a run", r.ConeHalfDeg(p, 265.85), degrees(want), 1e-9)
}

func ExamplePipe_ShotsAround() {
	p := Pipe{ODMM: 168.3, WallMM: 7.1}
	s, _ := p.ShotsAround(Far, 300-p.Outer(), 1.1) // film against the pipe, SFD 300 mm
	fmt.Printf("%.2f, so %d shots %.1f deg apart\n", s.Exact, s.N, s.PitchDeg)
	// Output: 5.55, so 6 shots 60.0 deg apart
}
