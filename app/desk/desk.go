package desk

import (
	"fmt"
	"math"
	"slices"
	"time"

	"halfvalue/exposure/plan"
)

// Options are what a desk is opened with besides its platform.
type Options struct {
	Reckon Reckoner
	Rules  []Option // rule sets that a plan may name; none: those that come with the program
	Plan   []byte   // plan to open instead of the last one
	People []string // who may log, until the book knows better
}

// Desk is the state and the only thing that changes it. It is used from one
// goroutine.
type Desk struct {
	platform Platform
	reckon   Reckoner
	rules    []Option
	state    State
	book     Book
	past     []step // what Undo goes back to, the last step last
	future   []step // what Redo goes to
	pushed   int    // steps ever made
	scrub    string // field whose step is still open
	event    string // identity of the log button's press that is not yet acknowledged
	trace    tracer
}

// step is one change: its name and the plan's bytes on its other side.
type step struct {
	name string
	data []byte
}

// maxSteps bounds the memory that undo holds; a plan has about 1 KB.
const maxSteps = 1000

// Open makes a desk on the given plan, else on the last one, else on the demo
// job. It never fails: what could not be read is stated in the State, and the
// demo job is always there.
func Open(p Platform, o Options) *Desk {
	d := &Desk{platform: p, reckon: o.Reckon, rules: o.Rules}
	if d.rules == nil {
		d.rules = plainOptions(plan.RuleSets()...)
	}
	d.state = State{Units: SI, Light: Paper, Text: 100, Sheet: ShotSheet, People: o.People}
	d.openSettings()
	d.openPlan(o.Plan)
	d.openBook()
	d.reckonNow()
	return d
}

func (d *Desk) openPlan(given []byte) {
	data := given
	if data == nil {
		last, err := d.platform.LastPlan()
		if err != nil {
			d.state.Notice = "the last plan could not be read: " + err.Error()
		}
		data = last
	}
	if data != nil {
		p, err := d.decode(data)
		if err == nil {
			d.place(p, data)
			return
		}
		d.refuse(fmt.Errorf("the last plan was not opened: %w", err))
	}
	d.place(plan.Demo(), demoBytes())
}

// demoBytes is the demo job's plan as bytes.
func demoBytes() []byte {
	data, err := plan.Encode(plan.Demo())
	if err != nil {
		panic("desk: the demo job has no bytes: " + err.Error())
	}
	return data
}

// place makes a plan current together with its bytes.
func (d *Desk) place(p plan.Plan, data []byte) {
	d.state.Plan, d.state.PlanBytes = p, data
	d.state.Filled, d.state.Defaults = p.Normalised()
	d.state.Demo = string(data) == string(demoBytes())
}

// State returns what the sheets show. Slices in it are shared: read only.
func (d *Desk) State() State {
	s := d.state
	s.UndoName, s.RedoName = lastName(d.past), lastName(d.future)
	s.Rules = d.rules
	return s
}

func lastName(steps []step) string {
	if len(steps) == 0 {
		return ""
	}
	return steps[len(steps)-1].name
}

// Apply does what a hand asked for. It never fails: a change that is refused
// leaves the plan as it was and is stated in State.Refusal.
func (d *Desk) Apply(in Intent) {
	if s, ok := in.(Set); !ok || s.Field != d.scrub {
		d.settle(in)
	}
	switch in := in.(type) {
	case Set:
		d.set(in)
	case Type:
		d.typeIn(in)
	case Choose:
		d.choose(in)
	case Rename:
		d.change("title", func(p *plan.Plan) { p.Title = in.Title })
	case SetAt:
		d.change("time of the shot", func(p *plan.Plan) { p.At = in.To })
	case AtNow:
		d.change("time of the shot", func(p *plan.Plan) { p.At = d.minute() })
	case AddLayer:
		d.addLayer(in.After)
	case DropLayer:
		d.dropLayer(in.Index)
	case TakeMend:
		d.takeMend(in.Check)
	case Load:
		d.load(in.Name, in.Data)
	case Undo:
		d.swap(&d.past, &d.future)
	case Redo:
		d.swap(&d.future, &d.past)
	default:
		d.applyView(in)
	}
}

// minute is the wall clock to the minute.
func (d *Desk) minute() time.Time { return d.platform.Now().UTC().Truncate(time.Minute) }

// settle ends a scrub: its step of undo closes and the plan is kept on disk.
func (d *Desk) settle(in Intent) {
	if _, tracing := in.(Trace); tracing || d.scrub == "" {
		return
	}
	d.scrub = ""
	d.dropIdleStep()
	d.save()
}

// dropIdleStep forgets a step that ended where it began.
func (d *Desk) dropIdleStep() {
	if n := len(d.past); n > 0 && string(d.past[n-1].data) == string(d.state.PlanBytes) {
		d.past = d.past[:n-1]
	}
}

// Settle keeps everything on disk; the window calls it when it loses focus.
func (d *Desk) Settle() { d.settle(nil) }

func (d *Desk) set(in Set) {
	l, ok := placeOf(d.state.Plan, in.Field)
	if !ok {
		d.refuse(&Refusal{Field: in.Field, Value: fmt.Sprint(in.To), Allowed: "a quantity of this plan", Mend: "touch the dimension on the drawing"})
		return
	}
	if !(in.To >= l.Min-1e-9*l.Max && in.To <= l.Max*(1+1e-9)) {
		d.refuse(d.outside(l.Quantity, in.To))
		return
	}
	to := math.Min(math.Max(tidy(in.To), l.Min), l.Max)
	open := d.scrub == in.Field
	name := l.Label() + " " + l.Text(d.state.Units)
	before := d.pushed
	d.replace(name, open, func(p *plan.Plan) { l.set(p, to) })
	if in.More && d.pushed > before {
		d.scrub = in.Field
	}
	if open && !in.More {
		d.scrub = ""
		d.dropIdleStep()
	}
	if !in.More {
		d.save()
	}
}

// tidy rounds to nine significant digits, so that 1.5 in is 38.1 mm and no
// scrub leaves a tail of digits in the plan file.
func tidy(v float64) float64 {
	if v == 0 || math.IsInf(v, 0) {
		return v
	}
	p := math.Pow(10, 8-math.Floor(math.Log10(math.Abs(v))))
	return math.Round(v*p) / p
}

func (d *Desk) outside(q Quantity, v float64) error {
	u := d.state.Units
	near := q.Min
	if v > q.Max {
		near = q.Max
	}
	return &Refusal{Field: q.Field, Value: u.Format(q.Kind, v, 4),
		Allowed: u.Format(q.Kind, q.Min, 4) + " to " + u.Format(q.Kind, q.Max, 4), Mend: "the nearest allowed is " + u.Format(q.Kind, near, 4)}
}

func (d *Desk) typeIn(in Type) {
	q, ok := QuantityOf(d.state.Plan, in.Field)
	if !ok {
		d.set(Set{Field: in.Field})
		return
	}
	v, err := d.state.Units.Parse(q.Kind, in.Text)
	if err != nil {
		d.refuse(&Refusal{Field: in.Field, Value: in.Text, Allowed: "a figure with or without a unit", Mend: err.Error()})
		return
	}
	d.set(Set{Field: in.Field, To: v})
}

func (d *Desk) choose(in Choose) {
	c, ok := ChoiceOf(d.state.Plan, d.rules, in.Field)
	if !ok {
		d.refuse(&Refusal{Field: in.Field, Value: in.To, Allowed: "a choice of this plan", Mend: "touch the block on the drawing"})
		return
	}
	for _, o := range c.Options {
		if o.Value == in.To {
			d.change(c.Name+" "+o.Title, func(p *plan.Plan) {
				if in.To == "sealed" && p.At.IsZero() {
					p.At = d.minute()
				}
				c.set(p, in.To)
			})
			return
		}
	}
	d.refuse(&Refusal{Field: in.Field, Value: in.To, Allowed: "one of the list", Mend: "choose from the list"})
}

func (d *Desk) addLayer(after int) {
	n := len(d.state.Plan.Part.Layers)
	if after < 0 || after >= n {
		d.refuse(fmt.Errorf("part.layers: there is no layer %d of %d", after+1, n))
		return
	}
	d.change("add a layer", func(p *plan.Plan) {
		keepGap(p, func() { p.Part.Layers = slices.Insert(p.Part.Layers, after+1, p.Part.Layers[after]) })
	})
}

func (d *Desk) dropLayer(i int) {
	n := len(d.state.Plan.Part.Layers)
	if i < 0 || i >= n || n == 1 {
		d.refuse(fmt.Errorf("part.layers: layer %d of %d cannot be taken out; a part has at least one", i+1, n))
		return
	}
	d.change("take a layer out", func(p *plan.Plan) {
		keepGap(p, func() { p.Part.Layers = slices.Delete(p.Part.Layers, i, i+1) })
	})
}

func (d *Desk) takeMend(id string) {
	for _, c := range d.state.Answer.Checks {
		if c.ID == id && c.Mend != nil {
			d.mend(*c.Mend)
			return
		}
	}
	d.refuse(fmt.Errorf("check %q has no mend to take", id))
}

func (d *Desk) mend(m Mend) {
	if m.Choice != "" {
		d.choose(Choose{Field: m.Field, To: m.Choice})
		return
	}
	d.set(Set{Field: m.Field, To: m.To})
}

func (d *Desk) load(name string, data []byte) {
	p, err := d.decode(data)
	if err != nil {
		d.refuse(fmt.Errorf("%s: %w", name, err))
		return
	}
	d.accept("open "+name, false, p, append([]byte(nil), data...))
	d.save()
}

// change makes one whole step of undo and keeps it.
func (d *Desk) change(name string, edit func(*plan.Plan)) {
	if d.replace(name, false, edit) {
		d.save()
	}
}

// replace edits a copy of the plan and accepts it if plan and physics do. With
// merge it belongs to the step that is open.
func (d *Desk) replace(name string, merge bool, edit func(*plan.Plan)) bool {
	p := d.state.Plan.Clone()
	edit(&p)
	p, data, err := d.check(p)
	if err != nil {
		d.refuse(err)
		return false
	}
	return d.accept(name, merge, p, data)
}

// accept makes a plan current if it has an answer.
func (d *Desk) accept(name string, merge bool, p plan.Plan, data []byte) bool {
	if string(data) == string(d.state.PlanBytes) {
		d.state.Refusal = nil
		return true
	}
	a, err := d.reckon(p)
	if err != nil {
		d.refuse(err)
		return false
	}
	if !merge {
		d.past = append(d.past, step{name, d.state.PlanBytes})
		d.pushed++
		d.past = d.past[max(0, len(d.past)-maxSteps):]
	}
	d.future = nil
	d.place(p, data)
	d.answer(a)
	return true
}

func (d *Desk) answer(a Answer) {
	d.state.Answer, d.state.Fault = a, ""
	d.state.Refusal, d.state.Notice = nil, ""
	d.state.Checked = len(a.Checks) > 0
	d.closeGone()
	d.retrace()
}

// swap takes the last step of one stack back and puts the present on the other.
func (d *Desk) swap(from, to *[]step) {
	n := len(*from)
	if n == 0 {
		return
	}
	s := (*from)[n-1]
	*from = (*from)[:n-1]
	*to = append(*to, step{s.name, d.state.PlanBytes})
	p, err := d.decode(s.data)
	if err != nil {
		panic("desk: a plan that was accepted does not decode: " + err.Error())
	}
	d.place(p, s.data)
	d.reckonNow()
	d.save()
}

// reckonNow reckons the current plan; a plan without an answer stays on the
// sheet and says why.
func (d *Desk) reckonNow() {
	a, err := d.reckon(d.state.Plan)
	if err != nil {
		d.answer(Answer{})
		d.state.Fault = err.Error()
		return
	}
	refusal, notice := d.state.Refusal, d.state.Notice
	d.answer(a)
	d.state.Refusal, d.state.Notice = refusal, notice
}

// closeGone closes a panel whose quantity or check is no longer there.
func (d *Desk) closeGone() {
	p := d.state.Panel
	gone := false
	switch p.Kind {
	case DialPanel:
		_, ok := QuantityOf(d.state.Plan, p.Field)
		gone = !ok
	case ChoicePanel:
		_, ok := ChoiceOf(d.state.Plan, d.rules, p.Field)
		gone = !ok
	case CheckPanel:
		gone = true
		for _, c := range d.state.Answer.Checks {
			gone = gone && c.ID != p.Field
		}
	}
	if gone {
		d.state.Panel = Panel{}
	}
}

// refuse states why a change was not made.
func (d *Desk) refuse(err error) { d.state.Refusal = refusalOf(err) }

func (d *Desk) save() {
	d.state.SaveErr = ""
	if err := d.platform.SavePlan(d.state.PlanBytes); err != nil {
		d.state.SaveErr = "the plan is not kept on disk: " + err.Error()
	}
}
