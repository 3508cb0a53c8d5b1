package beam

import (
	"math"
	"testing"
	"time"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// whole checks that a step can be followed.
func whole(t *testing.T, steps []working.Step) map[string]working.Step {
	t.Helper()
	out := map[string]working.Step{}
	for _, s := range steps {
		if s.ID == "" || s.Name == "" || s.Symbol == "" || s.Formula == "" || s.Unit == "" || math.IsNaN(s.Value) {
			t.Errorf("step %+v is incomplete", s)
		}
		if s.Source == "" && s.Note == "" {
			t.Errorf("step %s names no source", s.ID)
		}
		out[s.ID] = s
	}
	return out
}

func TestTubeWorking(t *testing.T) {
	h := head(200)
	s, err := Tube(h)
	if err != nil {
		t.Fatal(err)
	}
	steps := whole(t, TubeWorking(h, s))
	if got := steps["beam.output"].Value; got != s.KermaMGy()*60 {
		t.Errorf("output %g, spectrum gives %g", got, s.KermaMGy()*60)
	}
	if got := len(steps["beam.fluence"].Inputs); got != 5+len(h.Filters) {
		t.Errorf("%d inputs, want the tube's 5 and each filter", got)
	}
}

func TestSealedWorking(t *testing.T) {
	d := plan.Sealed{Nuclide: "Ir-192", ActivityGBq: 1850, SizeMM: 3, Basis: Output, Assayed: time.Date(2026, 11, 1, 0, 0, 0, 0, time.UTC)}
	s, err := Sealed(d)
	if err != nil {
		t.Fatal(err)
	}
	list, err := SealedWorking(d, time.Date(2026, 12, 1, 8, 0, 0, 0, time.UTC), s)
	if err != nil {
		t.Fatal(err)
	}
	steps := whole(t, list)
	// 30.333 days: 1850 GBq x exp(-30.333 ln2/73.83), by hand.
	if got := steps["source.activity"].Value; math.Abs(got-1391.6) > 0.5 {
		t.Errorf("activity %g GBq, by hand 1391.6", got)
	}
	if _, err := SealedWorking(plan.Sealed{Nuclide: "Xx-1"}, time.Time{}, s); err == nil {
		t.Error("an unknown nuclide got a working")
	}
}

// TestSpreadHoldsThePublished: what the package states as its error covers
// every gated output.
func TestSpreadHoldsThePublished(t *testing.T) {
	for _, r := range published(t, ThickTarget) {
		if r.Quantity != "air kerma at 1 m" || !r.Gate {
			continue
		}
		kV := 150.0
		if r.File == "tube-output-icrp33.json" {
			kV = 200
		}
		if s := OutputSpread(plan.Tube{KV: kV, Target: "W", Waveform: "constant"}); math.Abs(r.Percent()) > s*100 {
			t.Errorf("%s: %+.1f %%, stated %.0f %%", r.Name, r.Percent(), s*100)
		}
	}
}

// TestScaleIsTheFit repeats the one fit: the scale makes the largest residual
// of the gated outputs, each against its own tolerance, as small as can be.
func TestScaleIsTheFit(t *testing.T) {
	for _, c := range []Continuum{ThickTarget, Ebel, FinkelshteinPavlova} {
		rows := published(t, c)
		best, least := 0.0, math.Inf(1)
		for f := 0.8; f < 1.25; f += 0.0005 {
			var worst float64
			for _, r := range rows {
				if r.Quantity == "air kerma at 1 m" && r.Gate {
					worst = max(worst, math.Abs(f*r.Ours-r.Published)/r.Tolerance)
				}
			}
			if worst < least {
				best, least = f, worst
			}
		}
		t.Logf("%v: scale %g x %.4f, largest residual %.2f of its tolerance", c, c.Scale(), best, least)
		if math.Abs(best-1) > 0.005 {
			t.Errorf("%v: the documented scale %g is not the fit, %g is", c, c.Scale(), c.Scale()*best)
		}
	}
}
