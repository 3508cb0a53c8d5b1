package rules

import (
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"halfvalue/exposure/plan"
)

var long = flag.Bool("long", false, "20,000 random plans for the mends instead of 1,000")

// modelFacts stands in for the engine: places that are thicker and thinner
// than the part, whose density moves away from its own as kV falls, and a
// crank. It is a model of the test, not of the physics.
func modelFacts(p plan.Plan) (Facts, error) {
	f, err := FactsOf(p)
	if err != nil {
		return f, err
	}
	contrast := 0.5
	if f.KV > 0 {
		contrast = 60 / f.KV
	}
	if f.Detector == "film" {
		d := p.Detector.Film.Density
		f.Density = append(f.Density, Density{"thick", d * math.Exp(-contrast)}, Density{"thin", d * math.Exp(contrast/2)})
	}
	if f.Nuclide != "" {
		f.TravelShare = 40000 / (f.Setup.SFDMM * f.Setup.SFDMM)
	}
	return f, nil
}

// TestMends holds each mend to its word: applied, its check holds; a hundredth
// back towards the old value, or one step back for classes and shots, it does
// not.
func TestMends(t *testing.T) {
	plans := 1000
	if *long {
		plans = 20000
	}
	rng := rand.New(rand.NewPCG(31, 32))
	fields := map[string]int{}
	for range plans {
		p := randomPlan(rng)
		p.Rules = Ours().Names()[rng.IntN(len(Ours().Names()))]
		s := set(t, p.Rules)
		f, err := modelFacts(p)
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range s.Apply(f) {
			mends := s.Mends(p, c.ID, modelFacts)
			first, ok := s.Mend(p, c.ID, modelFacts)
			if ok != (len(mends) > 0) || ok && first != mends[0] {
				t.Fatalf("%+v: first mend %+v of %+v", c, first, mends)
			}
			if c.Verdict != Short && len(mends) > 0 {
				t.Fatalf("%+v needs no mend and has %+v", c, mends)
			}
			for _, m := range mends {
				fields[m.Field]++
				holdMend(t, s, p, c, m)
			}
		}
	}
	for _, want := range []string{"setup.sfdMM", "source.tube.focusMM", "source.sealed.sizeMM", "setup.shots", "detector.film.class", "detector.film.density", "source.tube.kv", "detector.film.screensMM[0]", "detector.panel.snrN"} {
		if fields[want] == 0 {
			t.Errorf("no mend of %s in %d plans: %v", want, plans, fields)
		}
	}
}

func holdMend(t *testing.T, s Set, p plan.Plan, c Check, m Mend) {
	t.Helper()
	try := func(v any) bool {
		q, err := p.With(m.Field, v)
		if err != nil {
			t.Fatal(err)
		}
		if q.Validate() != nil {
			return false
		}
		f, err := modelFacts(q)
		if err != nil {
			return false
		}
		for _, d := range s.Apply(f) {
			if d.ID == c.ID {
				return d.Verdict == Holds
			}
		}
		return false
	}
	if !try(m.To) {
		t.Fatalf("%s %+v: mended with %+v it does not hold", p.Rules, c, m)
	}
	switch to := m.To.(type) {
	case int:
		if try(to - 1) {
			t.Fatalf("%s %+v: %d shots would do, not %+v", p.Rules, c, to-1, m)
		}
	case string:
		if back := fmt.Sprintf("C%d", classNumber(to)+1); try(back) {
			t.Fatalf("%s %+v: %s would do, not %+v", p.Rules, c, back, m)
		}
	case float64:
		from := m.From.(float64)
		if back := m.Exact + 0.01*(from-m.Exact); try(back) {
			t.Fatalf("%s %+v: %v would do, not %+v", p.Rules, c, back, m)
		}
		if math.Abs(to-m.Exact) > 0.005*m.Exact {
			t.Fatalf("%+v is rounded by too much", m)
		}
		if back := to * (1 - 0.01*sign(to-from)); math.Abs(to-from) > 0.01*to && try(back) {
			t.Fatalf("%s %+v: %v would do, not %+v", p.Rules, c, back, m)
		}
	}
}

func sign(x float64) float64 { return math.Copysign(1, x) }

func TestMendOfDensity(t *testing.T) {
	p := plan.Demo()
	p.Rules = "asme-v-2:2021"
	p.Detector.Film.Density = 1.5
	facts := func(p plan.Plan) (Facts, error) {
		f, err := FactsOf(p)
		f.Density = append(f.Density, Density{"thin", p.Detector.Film.Density * 2.25})
		return f, err
	}
	s := set(t, p.Rules)
	m := s.Mends(p, "density", facts)
	if len(m) != 0 {
		t.Errorf("%+v, but 1.8 at the part makes 4.05 at the thin place", m)
	}
	p.Rules = "iso17636-1:2013/B"
	m = set(t, p.Rules).Mends(p, "density", facts)
	if len(m) == 0 || m[0].Field != "detector.film.density" || m[0].To != 2.2 || m[0].Text != "density 2.2 would hold" {
		t.Errorf("%+v", m)
	}
}

func TestBroken(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	before, after := plate(20), plate(20)
	after.Class, after.Density[0].Value = "C5", 2
	if got := fmt.Sprint(s.Broken(before, after)); got != "[density film-class]" {
		t.Errorf("broken: %s", got)
	}
	if got := s.Broken(after, before); len(got) != 0 {
		t.Errorf("broken by a change for the better: %v", got)
	}
}

func ExampleSet_Apply() {
	p := plan.Demo()
	p.Setup.SFDMM = 300
	set, _ := Ours().Set(p.Rules)
	facts, _ := FactsOf(p)
	for _, c := range set.Apply(facts) {
		if c.Verdict == Short {
			fmt.Printf("%s: %.0f, limit %.0f %s\n", c.ID, c.Value, c.Limit, c.Unit)
			fmt.Println(set.Mends(p, c.ID, FactsOf)[0].Text)
		}
	}
	// Output:
	// min-f: 280, limit 332 mm
	// SFD 352 mm would hold
	// film-class: 5, limit 4 class C
	// film class C4 would hold
}

func BenchmarkApply(b *testing.B) {
	p := plan.Demo()
	s, err := Ours().Set(p.Rules)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		f, err := FactsOf(p)
		if err != nil {
			b.Fatal(err)
		}
		s.Apply(f)
	}
}

func BenchmarkMend(b *testing.B) {
	p := plan.Demo()
	p.Setup.SFDMM = 300
	s, err := Ours().Set(p.Rules)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if len(s.Mends(p, "min-f", FactsOf)) == 0 {
			b.Fatal("no mend")
		}
	}
}
