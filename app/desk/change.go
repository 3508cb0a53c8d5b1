package desk

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/plan"
)

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
	name := l.Label() + " from " + l.Text(d.state.Units)
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
