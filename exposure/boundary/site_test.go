package boundary

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"testing"
	"time"

	"halfvalue/exposure/plan"
)

func reading(usv float64) plan.Reading {
	return plan.Reading{XM: 0, YM: 50, USvPerH: usv, Meter: "M-04", Calibrated: time.Date(2026, 6, 1, 0, 0, 0, 0, time.UTC), RangeUSvPerH: 1e7, ResponseS: 3, HeldS: 20, State: "exposed"}
}

func withReadings(t *testing.T, r ...plan.Reading) *Field {
	p := plan.Demo()
	p.Site.Readings = r
	return fieldOf(t, tubeInput(t, p), WithoutScatter())
}

func TestReadingAboveWidensEveryRopeByItsRoot(t *testing.T) {
	f := withReadings(t)
	predicted := f.Exposed(Vec{0, 50, 1}).Total()
	g := withReadings(t, reading(predicted*1.44)).Measured()
	for _, deg := range []float64{0, 10, 90, 200} {
		near(t, "widened", g.Distance(g.Levels()[0], deg), 1.2*f.Distance(f.Levels()[0], deg), 1e-6)
	}
	p := plan.Demo()
	in := tubeInput(t, p)
	full := fieldOf(t, in).Exposed(Vec{0, 50, 1}).Total()
	p.Site.Readings = []plan.Reading{reading(full * 4)}
	near(t, "lines", linesOf(t, tubeInput(t, p))["barrier open"].RopeMetres, 2*linesOf(t, in)["barrier open"].RopeMetres, 1e-6)
	near(t, "lines without spread", linesOf(t, tubeInput(t, p))["barrier open"].Metres, linesOf(t, in)["barrier open"].Metres, 1e-12)
}

func TestReadingsNeverNarrowAndDoubtIsTold(t *testing.T) {
	predicted := withReadings(t).Exposed(Vec{0, 50, 1}).Total()
	edit := func(usv float64, change func(*plan.Reading)) plan.Reading {
		r := reading(usv)
		if change != nil {
			change(&r)
		}
		return r
	}
	for _, row := range []struct {
		name    string
		r       plan.Reading
		verdict string
		stop    bool
		factor  float64
	}{
		{"as predicted", edit(predicted*0.9, nil), ReadsConfirms, false, 1},
		{"far below", edit(predicted*0.3, nil), ReadsFarBelow, true, 1},
		{"zero", edit(0, nil), ReadsNothing, true, 1},
		{"off scale below", edit(predicted*0.9, func(r *plan.Reading) { r.RangeUSvPerH = predicted * 0.9 }), ReadsNothing, false, 1},
		{"too short", edit(predicted*0.9, func(r *plan.Reading) { r.HeldS = 1 }), ReadsNothing, false, 1},
		{"no calibration", edit(predicted*0.9, func(r *plan.Reading) { r.Calibrated = time.Time{} }), ReadsNothing, false, 1},
		{"too short but above", edit(predicted*1.5, func(r *plan.Reading) { r.HeldS = 1 }), ReadsAbove, false, 1.5},
		{"calibration factor", edit(predicted, func(r *plan.Reading) { r.Factor = 1.3 }), ReadsAbove, false, 1.3},
		{"far above", edit(predicted*3, nil), ReadsAbove, true, 3},
		{"off, background", edit(0.2, func(r *plan.Reading) { r.State = "off" }), ReadsBeamIsOff, false, 1},
		{"off, but something is on", edit(40, func(r *plan.Reading) { r.State = "off" }), ReadsBeamIsOff, true, 1},
	} {
		list, factor := withReadings(t, row.r).Judge()
		if v := list[0]; v.Verdict != row.verdict || v.StopAndLook != row.stop || math.Abs(factor-row.factor) > 1e-9 {
			t.Errorf("%s: %+v, factor %g; want %s, stop %v, %g", row.name, v, factor, row.verdict, row.stop, row.factor)
		}
	}
}

func TestTimeAllowedRoundsDown(t *testing.T) {
	for _, row := range []struct {
		dose, rate float64
		want       time.Duration
	}{{20, 1000, 72 * time.Second}, {20, 999.9, 72 * time.Second}, {20, 7.5, 160 * time.Minute}, {20, 7.51, 159 * time.Minute}, {20, 0, mostAllowed}, {20, math.NaN(), 0}, {20, math.Inf(1), 0}, {0, 1, 0}} {
		if got := TimeAllowed(row.dose, row.rate); got != row.want {
			t.Errorf("%g uSv at %g uSv/h: %v, want %v", row.dose, row.rate, got, row.want)
		}
	}
}

func TestPersonGetsRateTimesTime(t *testing.T) {
	p := plan.Demo()
	p.Site.Limits = append(p.Site.Limits, plan.Limit{Name: "hour", DoseUSv: 20, Per: "hour"})
	f := fieldOf(t, tubeInput(t, p), WithoutScatter())
	d := f.Dose(plan.Person{Name: "console", Role: "crew", YM: -10})
	rate := 2500 * mostAmbientPerKerma / 100
	near(t, "shot", d.PerShotUSv, rate*120/3600, 1e-9)
	near(t, "hour", d.PerHourUSv, rate*6*120/3600, 1e-9)
	near(t, "job", d.PerJobUSv, rate*6*120/3600*HoursPerJob, 1e-9)
	if a := d.Allowed[0]; a.Seconds > 20/(rate*1.25)*3600 || a.Seconds < 20/(rate*1.25)*3600-60 {
		t.Errorf("allowed %+v", a)
	}
}

// The dose of a source cranked past a point far off is the rate times the time;
// beside the middle of the tube it is the closed form of a line.
func TestTransitDose(t *testing.T) {
	in := sealedInput(t, "Ir-192", 1850, nil)
	in.Plan.Site.Container = &plan.Container{XM: 0, YM: -6, SpeedMPerS: 0.5}
	f := fieldOf(t, in, WithoutScatter())
	bare := in.Spectrum.AmbientUSv() * in.Strength * 3600
	near(t, "far off", f.TransitDoseUSv(Vec{300, -3, 1}), bare/90000*12/3600, 1e-3)
	near(t, "beside it", f.TransitDoseUSv(Vec{2, -3, 1}), bare*2*math.Atan(3.0/2)/2/0.5/3600, 1e-9)
	near(t, "worst moment", f.Bare(Vec{2, -3, 1}), bare/4, 1e-9)
	in.Plan.Site.Container.TubeM = 12
	near(t, "twice the tube", fieldOf(t, in, WithoutScatter()).TransitDoseUSv(Vec{2, -3, 1}), bare*2*math.Atan(3.0/2)/2/0.5/3600*2, 1e-9)
	near(t, "stored", f.Stored(Vec{0, -4, 1}), 5, 1e-9)
}

func TestCollimatedSourceIsBareOnItsWay(t *testing.T) {
	in := sealedInput(t, "Ir-192", 1850, func(s *plan.Sealed) {
		s.ConeDeg, s.Collimator = 60, []plan.Filter{{Material: "W", MM: 15}}
	})
	f := fieldOf(t, in, WithoutScatter())
	want := math.Sqrt(in.Spectrum.AmbientUSv() * in.Strength * 3600 / 7.5)
	for _, deg := range []float64{0, 90, 180} {
		near(t, "bare all round", f.Distance(f.Levels()[0], deg), want, 1e-6)
	}
	if v := f.Exposed(Vec{0, -10, 1}).Total(); v > in.Spectrum.AmbientUSv()*in.Strength*36/10 {
		t.Errorf("behind the collimator %g uSv/h", v)
	}
}

// A pipe narrower than the cone gets the open beam's rope; a plate that is
// proved to hold every ray is credited.
func TestPartCredit(t *testing.T) {
	pipe := tubeInput(t, plan.Demos()[2])
	pipe.Plan.Site.Limits = plan.Demo().Site.Limits
	f := fieldOf(t, pipe, WithoutScatter(), WithoutLeakage())
	near(t, "pipe", f.Distance(f.Levels()[0], 0), math.Sqrt(pipe.Spectrum.AmbientUSv()*pipe.Strength*3600/7.5), 1e-6)
	p := plan.Demo()
	p.Site.PartWidthMM, p.Site.PartHeightMM = 400, 400
	small := fieldOf(t, tubeInput(t, p), WithoutScatter(), WithoutLeakage())
	q := Vec{0, 30, 1}
	if small.Exposed(q).Beam != small.openAt1m/900 || small.Traced(q).Beam >= small.Exposed(q).Beam || small.Traced(Vec{10, 30, 1}).Beam != small.openAt1m/1000 {
		t.Errorf("400 mm part in a cone 510 mm wide: rope %g, traced %g", small.Exposed(q).Beam, small.Traced(q).Beam)
	}
	p.Site.PartWidthMM, p.Site.PartHeightMM = 520, 520
	large := fieldOf(t, tubeInput(t, p), WithoutScatter(), WithoutLeakage())
	if large.Exposed(q).Beam != large.throughAt1m/900 {
		t.Errorf("520 mm part: %g, want it credited", large.Exposed(q).Beam)
	}
}

func TestGapsCountAndUnknownMaterialCountsAsNone(t *testing.T) {
	p := plan.Demo()
	wall := func(name, material string, mm, from, to float64) plan.Wall {
		return plan.Wall{Name: name, Material: material, MM: mm, HeightM: 3, Points: []plan.Point{{XM: from, YM: 10}, {XM: to, YM: 10}}}
	}
	p.Site.Walls = []plan.Wall{wall("left", "concrete", 300, -9, -0.1), wall("right", "concrete", 300, 0.1, 9), wall("sheet", "", 0, -9, 9)}
	f := fieldOf(t, tubeInput(t, p), WithoutScatter(), WithoutLeakage())
	near(t, "through the gap", f.Exposed(Vec{0, 20, 1}).Beam, f.openAt1m/400, 1e-9)
	if v := f.Exposed(Vec{2, 20, 1}).Beam; v > f.openAt1m/404/10 {
		t.Errorf("behind the wall %g", v)
	}
	low := p.Clone()
	for i := range low.Site.Walls {
		low.Site.Walls[i].HeightM = 0.9
	}
	g := fieldOf(t, tubeInput(t, low), WithoutScatter(), WithoutLeakage())
	near(t, "over a low wall", g.Exposed(Vec{2, 20, 1}).Beam, g.openAt1m/404, 1e-9)
}

func TestObliquePathIsLonger(t *testing.T) {
	p := plan.Demo()
	p.Site.Walls = []plan.Wall{{Name: "w", Material: "concrete", MM: 100, HeightM: 9, Points: []plan.Point{{XM: -90, YM: 10}, {XM: 90, YM: 10}}}}
	f := fieldOf(t, tubeInput(t, p), WithoutScatter(), WithoutLeakage())
	b := f.shields.barriers[0][ofBeam]
	q := direction(15, 0).times(40).plus(Vec{0, 0, 1})
	near(t, "oblique", f.Exposed(q).Beam, f.openAt1m/1600*math.Exp(b.ln(100/cosDeg(15))), 1e-9)
}

func TestFloorInEveryShadow(t *testing.T) {
	p := plan.Demo()
	p.Site.Walls = []plan.Wall{{Name: "w", Material: "Pb", MM: 100, HeightM: 9, Points: []plan.Point{{XM: -90, YM: 10}, {XM: 90, YM: 10}}}}
	f := fieldOf(t, tubeInput(t, p))
	d := f.Exposed(Vec{0, 30, 1})
	if !(d.Sky > 0) || !(d.Sky > d.Beam) || d.Sky > f.openAt1m/900/2 {
		t.Errorf("behind 100 mm of lead: %+v", d)
	}
}

func TestSiteEncodesAndCarriesTheCard(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 3))
	for range 6 {
		in := randomInput(t, rng)
		in.Plan.Site.People = []plan.Person{{Name: "gate", XM: 12, YM: 3}}
		in.Plan.Site.Calls = []plan.Call{{Name: "officer on call", Phone: "ext. 12"}}
		s, err := NewSite(in)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := json.Marshal(s); err != nil {
			t.Fatal(err)
		}
		if (s.Card != nil) != (in.Plan.Source.Sealed != nil) {
			t.Errorf("card %v", s.Card)
		}
		for i, c := range s.Contours {
			for j := range c.Metres {
				if c.RopeMetres[j] < c.Metres[j] || s.Traced[i].Metres[j] > c.Metres[j]*(1+1e-6) {
					t.Fatalf("rope %g, contour %g, traced %g", c.RopeMetres[j], c.Metres[j], s.Traced[i].Metres[j])
				}
			}
			for _, row := range s.Table {
				if row.Metres[i] < c.sector(row.BearingDeg, 7.5) {
					t.Fatalf("table %+v below its sector", row)
				}
			}
		}
	}
}

func TestCardIsTheBareSource(t *testing.T) {
	in := sealedInput(t, "Ir-192", 37, func(s *plan.Sealed) {
		s.ConeDeg, s.Collimator = 60, []plan.Filter{{Material: "W", MM: 15}}
	})
	c, err := NewCard(in)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "an hour at 1 m, spread taken off", c.DoseUSv[0][4]/(1+in.spread()), 5100, 0.03)
	near(t, "20 m", c.DoseUSv[4][4], c.DoseUSv[0][4]/400, 1e-9)
	if open := math.Sqrt(5100 * 0.97 / 7.5); c.Ropes[0].Metres < open {
		t.Errorf("card's rope %g m is nearer than the bare source's %g", c.Ropes[0].Metres, open)
	}
}

func TestAveragingNeedsAnOfficer(t *testing.T) {
	p := plan.Demo()
	f := fieldOf(t, tubeInput(t, p))
	if n := len(f.Levels()); n != 1 {
		t.Fatalf("%d levels", n)
	}
	p.Site.AveragingAllowedBy = "J. Okoro"
	f = fieldOf(t, tubeInput(t, p), WithoutScatter(), WithoutLeakage())
	ls := f.Levels()
	if len(ls) != 2 {
		t.Fatalf("%d levels, want both ropes", len(ls))
	}
	near(t, "averaged", f.Distance(ls[1], 0), f.Distance(ls[0], 0)*math.Sqrt(0.2), 1e-6)
}

func BenchmarkNewSite(b *testing.B) {
	p := plan.Demo()
	p.Site.Walls = tenWalls()
	in := tubeInput(b, p)
	for b.Loop() {
		if _, err := NewSite(in); err != nil {
			b.Fatal(err)
		}
	}
}
