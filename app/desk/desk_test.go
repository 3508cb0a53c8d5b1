package desk

import (
	"bytes"
	"errors"
	"math"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
)

func TestOpensOnDemoThenOnLastPlan(t *testing.T) {
	w := newWorld()
	d := open(w)
	s := d.State()
	if !s.Demo || s.Plan.Title != plan.Demo().Title || s.Fault != "" || !(s.Answer.Exposure.Seconds > 0) {
		t.Fatalf("first start shows %q, fault %q, %v s", s.Plan.Title, s.Fault, s.Answer.Exposure.Seconds)
	}
	d.Apply(Set{Field: "setup.sfdMM", To: 820})
	again := open(w).State()
	if again.Plan.Setup.SFDMM != 820 || again.Demo {
		t.Fatalf("second start has SFD %v, demo %v", again.Plan.Setup.SFDMM, again.Demo)
	}
}

func TestBrokenLastPlanIsStatedAndTheDemoStands(t *testing.T) {
	w := newWorld()
	w.plan = []byte(`{"plan":1,"oops":2}`)
	s := open(w).State()
	if s.Refusal == nil || !strings.Contains(s.Refusal.Error(), "oops") || !s.Demo {
		t.Fatalf("refusal %v, demo %v", s.Refusal, s.Demo)
	}
}

// Doubling the distance takes four times the time but for the air on the way:
// inverse square is the fact that is checked here, through the whole desk.
func TestChangeMovesTheReckoning(t *testing.T) {
	d := open(newWorld())
	before := d.State().Answer.Exposure.Seconds
	d.Apply(Type{Field: "setup.sfdMM", Text: "1.4 m"})
	s := d.State()
	if s.Plan.Setup.SFDMM != 1400 {
		t.Fatalf("1.4 m was taken for %v mm: %v", s.Plan.Setup.SFDMM, s.Refusal)
	}
	if ratio := s.Answer.Exposure.Seconds / before; ratio < 4 || ratio > 4.8 {
		t.Fatalf("doubling SFD multiplied the time by %v", ratio)
	}
}

func TestRefusedChangeKeepsThePlanAndSaysWhatMends(t *testing.T) {
	for _, c := range []struct {
		in   Intent
		want string // part of the message
	}{
		{Set{Field: "source.tube.kv", To: 230}, "200 kV"}, // the head's limit
		{Set{Field: "setup.sfdMM", To: 5}, "mm"},
		{Set{Field: "setup.sfdMM", To: math.NaN()}, "mm"},
		{Set{Field: "no.such", To: 1}, "no.such"},
		{Type{Field: "setup.sfdMM", Text: "2 furlongs"}, "furlongs"},
		{Type{Field: "setup.sfdMM", Text: ""}, "figure"},
		{Type{Field: "source.tube.kv", Text: "2 in"}, "in"},
		{Choose{Field: "detector.film.class", To: "C9"}, "C9"},
		{Choose{Field: "nothing", To: "C5"}, "nothing"},
		{DropLayer{Index: 0}, "at least one"},
		{AddLayer{After: 7}, "no layer"},
		{TakeMend{Check: "none"}, "none"},
		{Load{Name: "bad.json", Data: []byte("{")}, "bad.json"},
		{Rename{Title: strings.Repeat("x", 200)}, "title"},
	} {
		d := open(newWorld())
		before := append([]byte(nil), d.State().PlanBytes...)
		d.Apply(c.in)
		s := d.State()
		if s.Refusal == nil || !strings.Contains(s.Refusal.Error(), c.want) {
			t.Errorf("%#v: refusal %v does not say %q", c.in, s.Refusal, c.want)
		}
		if !bytes.Equal(before, s.PlanBytes) || s.UndoName != "" {
			t.Errorf("%#v changed the plan", c.in)
		}
	}
}

func TestScrubIsOneStepOfUndo(t *testing.T) {
	w := newWorld()
	d := open(w)
	start := string(d.State().PlanBytes)
	saves := w.saves
	for v := 700.0; v <= 800; v += 10 {
		d.Apply(Set{Field: "setup.sfdMM", To: v, More: v < 800})
		d.Apply(Trace{Points: 1})
	}
	if w.saves != saves+1 {
		t.Errorf("a scrub was written to disk %d times, want once, when it settles", w.saves-saves)
	}
	d.Apply(Undo{})
	if got := string(d.State().PlanBytes); got != start {
		t.Fatalf("undo gives\n%s\nwant\n%s", got, start)
	}
	d.Apply(Redo{})
	if got := d.State().Plan.Setup.SFDMM; got != 800 {
		t.Fatalf("redo gives SFD %v", got)
	}
}

func TestScrubThatEndsWhereItBeganIsNoStep(t *testing.T) {
	d := open(newWorld())
	for _, v := range []float64{720, 740, 700} {
		d.Apply(Set{Field: "setup.sfdMM", To: v, More: true})
	}
	d.Apply(Dismiss{})
	if name := d.State().UndoName; name != "" {
		t.Fatalf("undo offers %q", name)
	}
}

func TestThicknessKeepsTheGapToTheFilm(t *testing.T) {
	d := open(newWorld())
	d.Apply(Set{Field: "setup.bMM", To: 26})
	d.Apply(Set{Field: "part.layers[0].mm", To: 30})
	if p := d.State().Plan; p.Setup.BMM != 36 || p.GapMM() != 6 {
		t.Fatalf("b %v, gap %v, refusal %v", p.Setup.BMM, p.GapMM(), d.State().Refusal)
	}
}

func TestEveryQuantityCanBeTurnedToItsEnds(t *testing.T) {
	for _, demo := range plan.Demos() {
		data, err := plan.Encode(demo)
		if err != nil {
			t.Fatal(err)
		}
		for _, q := range Quantities(demo) {
			w := newWorld()
			w.plan = data
			d := open(w)
			if q.Value < q.Min-1e-9 || q.Value > q.Max+1e-9 {
				t.Errorf("%s %s: %v is outside %v to %v", demo.Title, q.Field, q.Value, q.Min, q.Max)
			}
			step := q.Step(q.Value)
			if !(step > 0) {
				t.Errorf("%s: step %v", q.Field, step)
			}
			for _, to := range []float64{q.Min, q.Max, q.Value} {
				d.Apply(Set{Field: q.Field, To: to})
				got, ok := QuantityOf(d.State().Plan, q.Field)
				switch {
				case d.State().Refusal != nil: // stated, and the plan stands
				case !ok:
					t.Errorf("%s is gone after %v", q.Field, to)
				case math.Abs(got.Value-to) > 1e-6*math.Max(1, to) && to != 0:
					t.Errorf("%s %s: set %v, is %v", demo.Title, q.Field, to, got.Value)
				}
			}
		}
	}
}

func TestUnsavedPlanIsStated(t *testing.T) {
	w := newWorld()
	w.noSave = errors.New("no space left")
	d := open(w)
	d.Apply(Set{Field: "setup.sfdMM", To: 820})
	if s := d.State(); !strings.Contains(s.SaveErr, "no space left") || s.Plan.Setup.SFDMM != 820 {
		t.Fatalf("got %q", s.SaveErr)
	}
}

func TestSwapToSealedSourceTakesTheClock(t *testing.T) {
	d := open(newWorld())
	d.Apply(Choose{Field: "source", To: "sealed"})
	s := d.State()
	if s.Refusal != nil || s.Plan.Source.Sealed == nil || s.Plan.At.IsZero() || s.Answer.ActivityGBq <= 0 {
		t.Fatalf("refusal %v, plan %+v", s.Refusal, s.Plan.Source)
	}
	d.Apply(Type{Field: "source.sealed.activityGBq", Text: "40 Ci"})
	if got := d.State().Plan.Source.Sealed.ActivityGBq; got != 1480 {
		t.Fatalf("40 Ci is %v GBq: %v", got, d.State().Refusal)
	}
}

func TestCurveIsTracedCoarseFirst(t *testing.T) {
	d := open(newWorld())
	d.Apply(Show{Panel{Kind: DialPanel, Field: "part.layers[0].mm"}})
	for i := 0; !d.State().Curve.Whole; i++ {
		if i > curvePoints {
			t.Fatal("the curve is never whole")
		}
		d.Apply(Trace{Points: 4})
	}
	c := d.State().Curve
	last := 0.0
	for i, p := range c.Points {
		if p.Refused {
			continue
		}
		if p.Seconds < last || (i > 0 && p.X <= c.Points[i-1].X) {
			t.Fatalf("more steel took less time at %v mm: %v s after %v s", p.X, p.Seconds, last)
		}
		last = p.Seconds
	}
	d.Apply(Set{Field: "part.layers[0].mm", To: 21, More: true})
	if !d.State().Curve.Whole {
		t.Fatal("scrubbing the curve's own quantity threw the curve away")
	}
	d.Apply(Set{Field: "setup.sfdMM", To: 800})
	if d.State().Curve.Whole {
		t.Fatal("the curve did not follow another quantity")
	}
}
