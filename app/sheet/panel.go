package sheet

import (
	"math"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// panelHeight is how high the open panel wants to be in a width, where it may
// have at most a height. The strip gives way before the dial does.
func (u *UI) panelHeight(width, most float64) float64 {
	pad := 2.0 * touch.Unit
	switch u.s.Panel.Kind {
	case desk.DialPanel:
		h := u.dial.Height(&u.bench)
		if full := h + u.stripHeight() + touch.Unit; !u.besides(width) && !u.dial.Keypad && full+pad <= most {
			h = full
		}
		return h + pad
	case desk.LogPanel:
		return u.logHeight() + pad
	case desk.LookPanel:
		return u.lookHeight(width) + pad
	case desk.CheckPanel:
		return u.checkHeight(width-u.look.Target-3*touch.Unit) + pad
	}
	return 460 * math.Sqrt(u.look.Text)
}

// besides says whether dial and strip stand next to each other.
func (u *UI) besides(width float64) bool { return width >= 680 }

func (u *UI) stripHeight() float64 { return 110 + u.look.Small()*3 }

// panelIn draws the open panel.
func (u *UI) panelIn(r drafting.Rect) {
	b := &u.bench
	b.Cover("panel", r)
	b.Fill(drafting.Box(r), drafting.Sheet)
	b.Line(drafting.Pt{X: r.X0, Y: r.Y0}, drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Bold, drafting.Line)
	in := r.Inset(touch.Unit)
	shut, rest := in.CutRight(u.look.Target)
	shut.Y1 = shut.Y0 + u.look.Target
	b.Button(touch.Button{Box: shut, Label: "Close", Symbol: b.Cross, Do: u.do(desk.Close{})})
	rest.X1 = shut.X0 - touch.Unit
	switch u.s.Panel.Kind {
	case desk.DialPanel:
		u.dialPanel(rest, in)
	case desk.ChoicePanel:
		u.choicePanel(rest)
	case desk.CheckPanel:
		u.checkPanel(rest)
	case desk.WorkingPanel:
		u.workingPanel(rest)
	case desk.LogPanel:
		u.logPanel(rest)
	case desk.LookPanel:
		u.lookPanel(rest)
	}
}

// dialPanel draws dial and trade-off strip. The rows below the close button
// use the whole width.
func (u *UI) dialPanel(rest, in drafting.Rect) {
	q, ok := u.known.quantities[u.s.Panel.Field]
	if !ok {
		return
	}
	notch := in.X1 - rest.X1
	if u.besides(in.W() + 2*touch.Unit) {
		strip, dial := in.CutLeft(math.Min(in.W()*0.45, 460))
		_, dial = dial.CutLeft(2 * touch.Unit)
		u.dial.Layout(&u.bench, dial, notch, u.dialSpec(q))
		u.tradeOff(strip, q)
		return
	}
	dial, strip := in.CutTop(u.dial.Height(&u.bench))
	u.dial.Layout(&u.bench, dial, notch, u.dialSpec(q))
	if _, strip = strip.CutTop(touch.Unit); strip.H() >= 70+3*u.look.Small() {
		u.tradeOff(strip, q)
	}
}

func (u *UI) dialSpec(q desk.Quantity) touch.DialSpec {
	units := u.s.Units
	return touch.DialSpec{
		Field: q.Field, Label: q.Label(), Value: q.Value, Text: q.Text(units), Min: q.Min, Max: q.Max, Log: q.Log,
		Step:   func(v float64) float64 { return u.step(q, v) },
		Usual:  q.UsualIn(units),
		Figure: func(v float64) string { f, _ := units.In(q.Kind, v); return desk.Significant(f, 4) },
		Units:  desk.TypedUnits(q.Kind, units),
		Unit:   units.Base(q.Kind, 1),
		Set:    func(v float64, more bool) { u.emit(desk.Set{Field: q.Field, To: v, More: more}) },
		Typed:  func(text string) { u.emit(desk.Type{Field: q.Field, Text: text}) },
		Close:  func() { u.emit(desk.Close{}) },
	}
}

// step is a quantity's step in the shown units: a round figure of those.
func (u *UI) step(q desk.Quantity, v float64) float64 {
	f, _ := u.s.Units.In(q.Kind, 1)
	if f == 1 {
		return q.Step(v)
	}
	return u.s.Units.RoundStep(q.Kind, q.Step(v))
}

// tradeOff draws the strip of the open dial.
func (u *UI) tradeOff(r drafting.Rect, q desk.Quantity) {
	c := u.s.Curve
	if c.Field != q.Field {
		return
	}
	units := u.s.Units
	in := func(v float64) float64 { f, _ := units.In(q.Kind, v); return f }
	points := make([]touch.StripPoint, len(c.Points))
	for i, p := range c.Points {
		points[i] = touch.StripPoint{X: in(p.X), Y: p.Seconds, Short: p.Short, Gap: p.Refused}
		points[i].Thin, points[i].Fat = extremes(p.Density)
	}
	u.strip.Layout(&u.bench, r, touch.StripSpec{
		Field: q.Field, Label: q.Label(), Points: points, Lo: in(c.From), Hi: in(c.To), Log: q.Log,
		Now:     touch.StripPoint{X: in(q.Value), Y: u.s.Answer.Exposure.Seconds},
		XTitle:  strings.TrimSuffix(q.Symbol+", "+unitName(units, q.Kind), ", "),
		XFigure: func(v float64) string { return desk.Significant(v, 3) },
		YFigure: shortClock,
		Read: func(p touch.StripPoint) string {
			t := q.Symbol + " " + units.Format(q.Kind, units.Base(q.Kind, p.X), 3) + ": " + desk.Clock(p.Y)
			if p.Thin > 0 {
				t += ", D " + desk.Significant(p.Fat, 2) + " to " + desk.Significant(p.Thin, 2)
			}
			if p.Short {
				t += ", a rule falls short"
			}
			return t
		},
	})
}

// extremes are the densities at the thinnest and the thickest section; 0 with
// one section only.
func extremes(spots []desk.Spot) (thin, thick float64) {
	if len(spots) < 2 {
		return 0, 0
	}
	lo, hi := spots[0], spots[0]
	for _, s := range spots[1:] {
		if s.ThicknessMM < lo.ThicknessMM {
			lo = s
		}
		if s.ThicknessMM > hi.ThicknessMM {
			hi = s
		}
	}
	return lo.Density, hi.Density
}

func unitName(u desk.Units, k desk.Kind) string {
	_, name := u.In(k, 1)
	return name
}

// shortClock writes a time on an axis.
func shortClock(s float64) string {
	switch {
	case s >= 7200:
		return desk.Significant(s/3600, 2) + " h"
	case s >= 60:
		return desk.Significant(s/60, 2) + " min"
	}
	return desk.Significant(s, 2) + " s"
}

// SetKeypad puts the dial's keypad out or away, as its button does.
func (u *UI) SetKeypad(out bool) { u.dial.Keypad = out }
