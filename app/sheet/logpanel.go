package sheet

import (
	"math"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// logHeight is what the log panel needs.
func (u *UI) logHeight() float64 {
	return u.look.Body()*1.5 + 4*(u.look.Target+touch.Unit) + u.look.Small()*3 + touch.Unit
}

// logPanel asks who logs the shot and what was given.
func (u *UI) logPanel(r drafting.Rect) {
	r = u.heading(r, "Log this shot")
	row, small := u.look.Target+touch.Unit, u.look.Small()
	u.bench.Scroll("Log panel", r, 4*row+small*1.5, func(in drafting.Rect) {
		at := func(y float64) drafting.Rect {
			return drafting.Rect{X0: in.X0, Y0: in.Y0 + y, X1: in.X1, Y1: in.Y0 + y + u.look.Target}
		}
		u.peopleRow(at(0))
		u.fieldAt(at(row), "Another name", &u.name)
		u.bench.Text(drafting.Pt{X: in.X0, Y: in.Y0 + 2*row + drafting.Ascent*small}, "Time really given", u.look.Caption())
		u.givenStepper(at(2*row + small*1.5))
		by := u.logger()
		u.bench.Button(touch.Button{Box: at(3*row + small*1.5), Label: "Append to the book", Strong: true, Off: by == "", Do: func() {
			u.emit(desk.Log{By: by, GivenSeconds: u.given})
		}})
	})
}

// peopleRow offers who logged before.
func (u *UI) peopleRow(r drafting.Rect) {
	b := &u.bench
	people := u.s.People[:min(len(u.s.People), max(1, int(r.W()/(120*u.look.Text))))]
	if len(people) == 0 {
		b.TextIn(r, "Nobody has logged here yet", u.look.Caption())
		return
	}
	for i, box := range r.Columns(len(people), touch.Unit) {
		p := people[i]
		b.Button(touch.Button{Box: box, Label: "By " + p, Text: b.Fit(p, box.W()-2*touch.Unit, u.look.Strong()), Selected: u.who == p && u.name.Len() == 0,
			Do: func() { u.who = p; u.name.SetText("") }})
	}
}

// logger is who logs: what was typed, else who was chosen.
func (u *UI) logger() string {
	if t := strings.TrimSpace(u.name.Text()); t != "" {
		return t
	}
	return u.who
}

func (u *UI) givenStepper(r drafting.Rect) {
	b := &u.bench
	minus, rest := r.CutLeft(u.look.Target)
	plus, mid := rest.CutRight(u.look.Target)
	step := func(sign float64) {
		st := 1.0
		if u.given >= 600 {
			st = 10
		}
		u.given = math.Max(0, math.Min(86400, u.given+sign*st))
	}
	hold := func(sign float64) func(bool) {
		return func(repeat bool) {
			if repeat {
				step(sign)
			}
		}
	}
	b.Button(touch.Button{Box: minus, Label: "Less time given", Symbol: b.Minus, Do: func() { step(-1) }, Hold: hold(-1)})
	b.Button(touch.Button{Box: plus, Label: "More time given", Symbol: b.Plus, Do: func() { step(1) }, Hold: hold(1)})
	b.Frame(mid, drafting.Thin, drafting.Line)
	st := u.look.Strong()
	st.Align = drafting.Middle
	b.TextIn(mid, desk.Clock(u.given), st)
	b.Words(mid, "Time given, "+desk.Clock(u.given))
}
