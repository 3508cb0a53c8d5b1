package rules

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/plan"
)

// Mend is the change of one quantity that makes a check hold.
type Mend struct {
	Field string  // path in the plan, "setup.sfdMM"
	From  any     // what stands there: float64, int or string
	To    any     // what to set: Exact rounded to the safe side by less than half a per cent
	Exact float64 // where the check just holds; the number of a film class or of shots
	Text  string  // "SFD 812 mm would hold"
}

// knob is a quantity of the plan and the way it may be turned.
type knob struct {
	field string
	turn  turn
	least int // of whole numbers
}

type turn int

const (
	up turn = iota
	down
	step   // whole numbers, upward
	finest // film classes, toward C1
)

func rising(field string) knob           { return knob{field: field, turn: up} }
func falling(field string) knob          { return knob{field: field, turn: down} }
func whole(field string, least int) knob { return knob{field, step, least} }
func finer(field string) knob            { return knob{field: field, turn: finest} }

// FactsFunc gives the facts of a changed plan. Whatever it gives must follow
// from the plan alone. An error means that the plan is no good.
type FactsFunc func(plan.Plan) (Facts, error)

// Mends gives, for a check of the set that falls short, every change of one
// quantity that makes it hold, each the smallest of its kind, in the rule's own
// order; none where nothing of the plan helps. It solves by halving against
// facts: a quantity is followed from where it stands to the end of its range,
// and the first stretch in which the verdict turns is closed in on to 1e-12.
func (s Set) Mends(p plan.Plan, id string, facts FactsFunc) []Mend { return s.mends(p, id, facts, 0) }

// Mend gives the first of Mends without solving for the others; false where
// there is none.
func (s Set) Mend(p plan.Plan, id string, facts FactsFunc) (Mend, bool) {
	list := s.mends(p, id, facts, 1)
	if len(list) == 0 {
		return Mend{}, false
	}
	return list[0], true
}

func (s Set) mends(p plan.Plan, id string, facts FactsFunc, most int) []Mend {
	f, err := facts(p)
	if err != nil {
		return nil
	}
	row, rule, ok := s.row(id, f)
	if !ok || row.finish(rule.judge(f)).Verdict != Short {
		return nil
	}
	solver := solver{set: s, plan: p, facts: facts, id: id}
	var list []Mend
	for _, k := range rule.knobs(f) {
		if slices.ContainsFunc(list, func(m Mend) bool { return m.Field == k.field }) {
			continue
		}
		if m, ok := solver.solve(k); ok {
			if list = append(list, m); len(list) == most {
				break
			}
		}
	}
	return list
}

// NeedsEngine tells whether the check goes by the readings of the sections or
// by the exposure time, which only the engine knows for a changed plan; the
// other checks are served by FactsOf.
func (s Set) NeedsEngine(id string) bool {
	return slices.ContainsFunc(s.Rows, func(r Row) bool {
		return r.ID == id && (r.Density != nil || r.Spread != nil || r.SNR != nil || r.Travel != nil)
	})
}

// Broken names the checks that fall short after a change and did not before.
func (s Set) Broken(before, after Facts) []string {
	was := map[string]Verdict{}
	for _, c := range s.Apply(before) {
		was[c.ID] = c.Verdict
	}
	var list []string
	for _, c := range s.Apply(after) {
		if c.Verdict == Short && was[c.ID] != Short {
			list = append(list, c.ID)
		}
	}
	return list
}

// row gives the row that judges these facts for the ID.
func (s Set) row(id string, f Facts) (Row, rule, bool) {
	for _, r := range s.Rows {
		if r.ID == id && r.For.covers(f) && r.For.coversFamily(f) {
			if rule, err := r.rule(); err == nil && rule.applies(f) {
				return r, rule, true
			}
		}
	}
	return Row{}, nil, false
}

type solver struct {
	set   Set
	plan  plan.Plan
	facts FactsFunc
	id    string
}

// holds tells whether the check holds with another value at the field. A check
// that turns from short to undecided does not hold.
func (s solver) holds(field string, to any) bool {
	p, err := s.plan.With(field, to)
	return err == nil && p.ValidateFor([]string{p.Rules}) == nil && s.judge(p)
}

// between is holds for a value between two that make valid plans: what is
// allowed of a quantity is one stretch, so the plan need not be validated.
func (s solver) between(field string, to any) bool {
	p, err := s.plan.With(field, to)
	return err == nil && s.judge(p)
}

func (s solver) judge(p plan.Plan) bool {
	f, err := s.facts(p)
	if err != nil {
		return false
	}
	row, rule, ok := s.set.row(s.id, f)
	return ok && row.finish(rule.judge(f)).Verdict == Holds
}

func (s solver) solve(k knob) (Mend, bool) {
	from, ok := s.plan.Value(k.field)
	if !ok {
		return Mend{}, false
	}
	m := Mend{Field: k.field, From: from}
	switch k.turn {
	case step:
		m.To, ok = s.stepUp(k)
	case finest:
		m.To, ok = s.finer(k.field, from)
	default:
		var x float64
		if x, ok = s.close(k, from.(float64)); ok {
			m.Exact, m.To = x, s.rounded(k, x)
		}
	}
	if !ok {
		return Mend{}, false
	}
	switch to := m.To.(type) {
	case int:
		m.Exact = float64(to)
	case string:
		m.Exact = float64(classNumber(to))
	}
	m.Text = mendText(k.field, m.To)
	return m, true
}

func (s solver) stepUp(k knob) (int, bool) {
	from, _ := s.plan.Value(k.field)
	row, _ := plan.FieldAt(k.field)
	for n := max(from.(int)+1, k.least); n <= int(row.Max); n++ {
		if s.holds(k.field, n) {
			return n, true
		}
	}
	return 0, false
}

func (s solver) finer(field string, from any) (string, bool) {
	for n := classNumber(from.(string)) - 1; n >= 1; n-- {
		if c := fmt.Sprintf("C%d", n); s.holds(field, c) {
			return c, true
		}
	}
	return "", false
}

// stretches is how many parts, equal in their ratio, a range is searched in.
const stretches = 24

// close finds the value nearest to from at which the check holds.
func (s solver) close(k knob, from float64) (float64, bool) {
	row, ok := plan.FieldAt(k.field)
	if !ok {
		return 0, false
	}
	end := row.Max
	if k.turn == down {
		end = row.Min
	}
	at := func(i int) float64 {
		share := float64(i) / stretches
		if from > 0 && end > 0 {
			return from * math.Pow(end/from, share)
		}
		return from + (end-from)*share
	}
	for i := 1; i <= stretches; i++ {
		good := at(i)
		if i == stretches {
			good = end
		}
		if !s.holds(k.field, good) {
			continue
		}
		bad := at(i - 1)
		for range 60 {
			if mid := (bad + good) / 2; math.Abs(good-bad) <= 1e-12*math.Abs(good) {
				break
			} else if s.between(k.field, mid) {
				good = mid
			} else {
				bad = mid
			}
		}
		return good, true
	}
	return 0, false
}

// rounded is exact in few figures, on the side where the check holds, less than
// half a per cent away.
func (s solver) rounded(k knob, exact float64) float64 {
	if exact == 0 {
		return exact
	}
	for digits := 0; digits < 12; digits++ {
		size := math.Pow(10, math.Floor(math.Log10(exact))-float64(digits))
		x := math.Ceil(exact/size*(1-1e-9)) * size
		if k.turn == down {
			x = math.Floor(exact/size*(1+1e-9)) * size
		}
		x = tidy(x)
		if math.Abs(x-exact) <= 0.005*exact && s.holds(k.field, x) {
			return x
		}
	}
	return exact
}

// tidy drops the noise of a product of decimals.
func tidy(x float64) float64 {
	var y float64
	if _, err := fmt.Sscanf(fmt.Sprintf("%.12g", x), "%g", &y); err != nil {
		return x
	}
	return y
}

// called is what people call a quantity of the plan.
var called = map[string]string{
	"setup.sfdMM": "SFD", "setup.bMM": "b", "setup.shots": "shots", "source.tube.focusMM": "a focus of", "source.sealed.sizeMM": "a source of",
	"source.tube.kv": "a tube voltage of", "detector.film.density": "density", "detector.film.class": "film class",
	"detector.film.screensMM[0]": "a front screen of", "detector.film.screensMM[1]": "a back screen of",
	"detector.plate.snrN": "SNR_N", "detector.panel.snrN": "SNR_N",
}

func mendText(field string, to any) string {
	row, _ := plan.FieldAt(field)
	if n, ok := to.(int); ok && field == "setup.shots" {
		return say("%d shots would hold", n)
	}
	text := say("%s %v", called[field], to)
	if x, ok := to.(float64); ok {
		text = say("%s %s", called[field], formatted(x))
	}
	if row.Unit != "" {
		text += " " + row.Unit
	}
	return text + " would hold"
}

func formatted(x float64) string { return say("%.12g", x) }
