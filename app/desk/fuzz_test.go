package desk

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
)

// anyIntent picks an intent of every kind there is, with good and bad values.
func anyIntent(r *rand.Rand, s State) Intent {
	qs := Quantities(s.Plan)
	q := qs[r.IntN(len(qs))]
	cs := choices(s.Plan, s.Rules)
	c := cs[r.IntN(len(cs))]
	o := c.Options[r.IntN(len(c.Options))]
	pick := func(list ...Intent) Intent { return list[r.IntN(len(list))] }
	panels := []Panel{{}, {DialPanel, q.Field}, {ChoicePanel, c.Field}, {CheckPanel, "none"}, {WorkingPanel, ""}, {LogPanel, ""}, {LookPanel, ""}, {DialPanel, "gone"}}
	for _, k := range s.Answer.Checks {
		panels = append(panels, Panel{CheckPanel, k.ID})
	}
	switch r.IntN(12) {
	case 0, 1, 2:
		return Set{Field: q.Field, To: q.Value * (0.7 + 0.6*r.Float64()), More: r.IntN(2) == 0}
	case 3:
		return pick(Set{Field: q.Field, To: q.Min}, Set{Field: q.Field, To: q.Max}, Set{Field: q.Field, To: math.Inf(1)}, Set{Field: "x", To: 1}, Set{Field: q.Field, To: -1})
	case 4:
		return Type{Field: q.Field, Text: []string{"12", "2 in", "0.5 Ci", "1e400", "", "-3 mm", "1 1/2 in", "µ"}[r.IntN(8)]}
	case 5:
		return pick(Choose{c.Field, o.Value}, Choose{c.Field, "no such"})
	case 6:
		return pick(Rename{"weld"}, Rename{strings.Repeat("é", 130)}, SetAt{s.Plan.At.AddDate(0, r.IntN(40)-10, 0)}, AtNow{}, AddLayer{r.IntN(4) - 1}, DropLayer{r.IntN(4) - 1}, TakeMend{"none"})
	case 7:
		return pick(Undo{}, Undo{}, Redo{})
	case 8:
		return Show{panels[r.IntN(len(panels))]}
	case 9:
		return pick(Close{}, Dismiss{}, Trace{r.IntN(6)}, GoTo{BookSheet}, GoTo{ShotSheet}, GoTo{"x"}, SetUnits{SI}, SetUnits{Customary}, SetUnits{"x"}, SetLight{Slate}, SetLight{"x"}, SetText{r.IntN(300)}, SetGloves{true})
	case 10:
		return pick(Log{By: "R. Amsel", GivenSeconds: 60}, Log{}, OpenEntry{uint64(r.IntN(5))}, Older{}, Newer{}, VerifyBook{}, Recompute{}, PlanFromEntry{})
	}
	return pick(Load{"other", s.PlanBytes}, Load{"bad", []byte("{}")}, Load{"other demo", demoAt(r.IntN(6))})
}

func demoAt(i int) []byte {
	data, err := plan.Encode(plan.Demos()[i])
	if err != nil {
		panic(err)
	}
	return data
}

// walk applies random intents and checks what must hold after each.
func walk(t *testing.T, seed uint64, steps int) {
	r := rand.New(rand.NewPCG(seed, 1))
	d := open(newWorld())
	var path []string
	defer func() {
		if e := recover(); e != nil {
			t.Fatalf("seed %d: panic %v after\n%s", seed, e, strings.Join(path, "\n"))
		}
	}()
	for range steps {
		in := anyIntent(r, d.State())
		path = append(path, fmt.Sprintf("%#v", in))
		d.Apply(in)
		if err := sound(d); err != nil {
			t.Fatalf("seed %d: %v after\n%s", seed, err, strings.Join(path, "\n"))
		}
	}
}

// sound says what is wrong with a desk's state, if anything.
func sound(d *Desk) error {
	s := d.State()
	p, err := plan.Decode(s.PlanBytes)
	if err != nil {
		return fmt.Errorf("the plan on the desk does not decode: %w", err)
	}
	if !p.Equal(s.Plan) {
		return fmt.Errorf("plan and bytes differ")
	}
	if e := s.Answer.Exposure.Seconds; s.Fault == "" && !(e > 0 && !math.IsInf(e, 0)) {
		return fmt.Errorf("exposure time %v", e)
	}
	if s.Panel.Kind == DialPanel {
		if _, ok := QuantityOf(s.Plan, s.Panel.Field); !ok {
			return fmt.Errorf("the dial is open on %q, which is not there", s.Panel.Field)
		}
	}
	if s.Text < 100 || s.Text > 200 {
		return fmt.Errorf("text at %d %%", s.Text)
	}
	return nil
}

func TestRandomWalksNeverPanic(t *testing.T) {
	for seed := range uint64(6) {
		walk(t, seed, 250)
	}
}

func FuzzWalk(f *testing.F) {
	f.Add(uint64(1))
	f.Fuzz(func(t *testing.T, seed uint64) { walk(t, seed, 60) })
}

// Undoing everything gives the bytes of the start, redoing everything those of
// the end, whatever was done between.
func TestUndoRestoresTheSameBytes(t *testing.T) {
	for seed := range uint64(4) {
		r := rand.New(rand.NewPCG(seed, 2))
		d := open(newWorld())
		start := string(d.State().PlanBytes)
		for range 120 {
			if in := anyIntent(r, d.State()); in != (Undo{}) && in != (Redo{}) {
				d.Apply(in)
			}
		}
		d.Settle()
		end := string(d.State().PlanBytes)
		steps := 0
		for ; d.State().UndoName != ""; steps++ {
			d.Apply(Undo{})
		}
		if got := string(d.State().PlanBytes); got != start {
			t.Fatalf("seed %d: after %d undos\n%s\nwant\n%s", seed, steps, got, start)
		}
		for d.State().RedoName != "" {
			d.Apply(Redo{})
		}
		if got := string(d.State().PlanBytes); got != end || steps == 0 {
			t.Fatalf("seed %d: after %d redos\n%s\nwant\n%s", seed, steps, got, end)
		}
	}
}
