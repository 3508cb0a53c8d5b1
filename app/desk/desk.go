package desk

import (
	"fmt"
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

func (d *Desk) answer(a Answer) {
	d.state.Answer, d.state.Fault = a, ""
	d.state.Refusal, d.state.Notice = nil, ""
	d.state.Checked = len(a.Checks) > 0
	d.closeGone()
	d.retrace()
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
