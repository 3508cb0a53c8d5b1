package boundary

import (
	"math"
	"math/rand/v2"
	"testing"
	"time"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

func tubeInput(t testing.TB, p plan.Plan) Input {
	t.Helper()
	p, _ = p.Normalised()
	s, err := beam.Tube(*p.Source.Tube)
	if err != nil {
		t.Fatal(err)
	}
	return Input{Plan: p, Spectrum: s, Strength: p.Source.Tube.MA, ExposureSecondsHigh: 120}
}

// sealedInput is a source of gbq on the part of the demo.
func sealedInput(t testing.TB, nuclide string, gbq float64, edit func(*plan.Sealed)) Input {
	t.Helper()
	p := plan.Demo()
	at := time.Date(2026, 12, 1, 8, 0, 0, 0, time.UTC)
	src := plan.Sealed{Nuclide: nuclide, ActivityGBq: gbq, Assayed: at, SizeMM: 3}
	if edit != nil {
		edit(&src)
	}
	p.At, p.Source = at, plan.Source{Sealed: &src}
	p, _ = p.Normalised()
	s, err := beam.Sealed(*p.Source.Sealed)
	if err != nil {
		t.Fatal(err)
	}
	return Input{Plan: p, Spectrum: s, Strength: gbq, ExposureSecondsHigh: 120}
}

func linesOf(t testing.TB, in Input) map[string]Line {
	t.Helper()
	lines, steps, err := Lines(in)
	if err != nil {
		t.Fatal(err)
	}
	if len(steps) <= len(lines) {
		t.Errorf("%d lines have only %d steps of working", len(lines), len(steps))
	}
	out := map[string]Line{}
	for _, l := range lines {
		if !(l.Metres > 0) || math.IsInf(l.Metres, 0) || l.RopeMetres < l.Metres {
			t.Errorf("line %+v: want a distance above 0 and a rope no nearer", l)
		}
		out[l.Limit+" "+l.Direction] = l
	}
	return out
}

func near(t *testing.T, what string, got, want, share float64) {
	t.Helper()
	if !(math.Abs(got-want) <= share*math.Abs(want)) {
		t.Errorf("%s: got %.8g, want %.8g within %g", what, got, want, share)
	}
}

func TestOpenIsTheClosedForm(t *testing.T) {
	in := tubeInput(t, plan.Demo())
	l := linesOf(t, in)["barrier open"]
	rate := in.Spectrum.AmbientUSv() * 5 * 3600
	near(t, "open", l.Metres, math.Sqrt(rate/7.5), 1e-12)
	near(t, "rope", l.RopeMetres, math.Sqrt(rate*1.25/7.5), 1e-12)
}

func TestLeakageIsTheClassFigureTurnedOutward(t *testing.T) {
	in := tubeInput(t, plan.Demo())
	l := linesOf(t, in)["barrier leakage"]
	near(t, "2.5 mGy/h as H*(10)", l.RateAt1m, 2500*mostAmbientPerKerma, 1e-12)
	for keV := 10.0; keV < 3000; keV *= 1.01 {
		if k := beam.AmbientPerKerma(keV); k > mostAmbientPerKerma {
			t.Fatalf("%g keV has %g Sv/Gy, above the largest that is taken", keV, k)
		}
	}
}

// 1 Ci of bare Ir-192 at 1 m: 5.1 mSv/h (physics.md section 5, 0.139 uSv m2/(MBq h)).
func TestClassicIridium(t *testing.T) {
	in := sealedInput(t, "Ir-192", 37, nil)
	ls := linesOf(t, in)
	near(t, "1 Ci Ir-192 at 1 m, uSv/h", ls["barrier open"].RateAt1m, 5100, 0.03)
	near(t, "transit", ls["barrier transit"].Metres, ls["barrier open"].Metres, 1e-12)
	near(t, "7.5 uSv/h", ls["barrier transit"].Metres, math.Sqrt(5100/7.5), 0.015)
}

// Tungsten of which 4 half-value layers of H*(10) are taken as the program's
// own transmission gives them: 1/16 of the dose, a quarter of the distance.
func TestCollimatorOfFourHalfValueLayers(t *testing.T) {
	in := sealedInput(t, "Ir-192", 1850, nil)
	w, err := materials.Lookup("W")
	if err != nil {
		t.Fatal(err)
	}
	bare := linesOf(t, in)["barrier open"]
	lo, hi := 1.0, 60.0
	for range 60 {
		mid := (lo + hi) / 2
		v, err := in.behindCollimator([]plan.Filter{{Material: "W", MM: mid}})
		if err != nil {
			t.Fatal(err)
		}
		if v > bare.RateAt1m/16 {
			lo = mid
		} else {
			hi = mid
		}
	}
	if hvl := lo / 4; !(hvl > 2 && hvl < 3.6) {
		t.Errorf("half-value layer of Ir-192 in %s is %.2f mm, want 2 to 3.6 (3.3 mm deep in the wall, common practice; the first four are softer)", w.Name(), hvl)
	}
	with := sealedInput(t, "Ir-192", 1850, func(s *plan.Sealed) {
		s.ConeDeg, s.Collimator = 60, []plan.Filter{{Material: "W", MM: lo}}
	})
	l := linesOf(t, with)
	near(t, "collimator", l["barrier leakage"].Metres, bare.Metres/4, 1e-6)
	near(t, "transit stays bare", l["barrier transit"].Metres, bare.Metres, 1e-12)
}

func TestDoseAndRateGiveDifferentRopes(t *testing.T) {
	p := plan.Demo()
	p.Site.Limits = []plan.Limit{{Name: "uk", RateUSvPerH: 7.5, AveragingMin: 1}, {Name: "us", DoseUSv: 20, Per: "hour"}, {Name: "year", DoseUSv: 1000, Per: "year", Occupancy: 0.25}}
	in := tubeInput(t, p)
	ls := linesOf(t, in)
	rate := in.Spectrum.AmbientUSv() * 5 * 3600
	near(t, "us", ls["us open"].Metres, math.Sqrt(rate*6*120/3600/20), 1e-12)
	near(t, "year", ls["year open"].Metres, math.Sqrt(rate*HoursPerYear*0.2*0.25/1000), 1e-12)
	p.Site.ShotsPerHour = 0
	near(t, "all hour", linesOf(t, tubeInput(t, p))["us open"].Metres, math.Sqrt(rate/20), 1e-12)
	p.Site.ShotsPerHour = 0.5
	near(t, "a whole shot falls into an hour", linesOf(t, tubeInput(t, p))["us open"].Metres, math.Sqrt(rate*120/3600/20), 1e-12)
}

func TestWithinIsToldAsOneMetre(t *testing.T) {
	p := plan.Demo()
	p.Site.Limits = []plan.Limit{{Name: "high", DoseUSv: 1e7, Per: "hour"}}
	for _, l := range linesOf(t, tubeInput(t, p)) {
		if l.Metres != 1 || !l.Within {
			t.Errorf("%+v: want 1 m and within", l)
		}
	}
}

func TestMoreNeverShrinksTheLine(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	for range 200 {
		in := sealedInput(t, []string{"Ir-192", "Se-75", "Co-60"}[rng.IntN(3)], 10+rng.Float64()*4000, nil)
		in.Plan.Site.Limits = []plan.Limit{{Name: "dose", DoseUSv: 1 + rng.Float64()*50, Per: "hour"}}
		in.Plan.Site.ShotsPerHour = float64(1 + rng.IntN(20))
		more := in
		more.Strength *= 1 + rng.Float64()
		more.ExposureSecondsHigh *= 1 + rng.Float64()
		a, b := linesOf(t, in), linesOf(t, more)
		for k, l := range a {
			if b[k].Metres < l.Metres*(1-1e-12) {
				t.Fatalf("%s: more activity and time give %.6g m, less %.6g m", k, b[k].Metres, l.Metres)
			}
		}
	}
}

func TestRoundOut(t *testing.T) {
	for in, want := range map[float64]float64{1: 1, 1.01: 1.5, 19.6: 20, 20.01: 21, 137: 137} {
		if got := RoundOutM(in); got != want {
			t.Errorf("RoundOutM(%g) is %g, want %g", in, got, want)
		}
	}
}

func BenchmarkLines(b *testing.B) {
	in := tubeInput(b, plan.Demo())
	b.ReportAllocs()
	for b.Loop() {
		if _, _, err := Lines(in); err != nil {
			b.Fatal(err)
		}
	}
}
