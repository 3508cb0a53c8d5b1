package sheet

import (
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
	"halfvalue/exposure/plan"
)

// headRoom and footRoom are what the side view leaves above the source and
// below the film.
func (u *UI) headRoom() float64 { return 62 + u.look.Small()*1.3 }

func (u *UI) footRoom() float64 { return u.look.Small()*2 + 22 }

// low says whether a view is too low for SFD to be written along its line.
func (u *UI) low(height float64) bool {
	room := height - u.headRoom() - u.footRoom() - 24
	return room < u.bench.Fonts.Width(u.brief("SFD", u.s.Filled.Setup.SFDMM), u.look.Small(), true)
}

// sideMargins is the room for the dimensions left and right of the side view.
func (u *UI) sideMargins(height float64) (left, right float64) {
	small := u.look.Small()
	text := u.bText()
	if u.low(height) {
		f := "f " + u.s.Units.Format(desk.Length, u.s.Filled.Setup.SFDMM-u.s.Filled.SpanMM(), 4)
		right = 46 + math.Max(u.bench.Fonts.Width(text, small, true), u.bench.Fonts.Width(f, small, true))
		return u.bench.Fonts.Width(u.brief("SFD", u.s.Filled.Setup.SFDMM), small, true) + 44, right
	}
	return small*2 + 26, 46 + u.bench.Fonts.Width(text, small, true)
}

// brief is a dimension without its unit, as drawings have it.
func (u *UI) brief(symbol string, mm float64) string {
	v, _ := u.s.Units.In(desk.Length, mm)
	return symbol + " " + desk.Significant(v, 3)
}

// bText is the dimension b as it is written.
func (u *UI) bText() string {
	return "b " + u.s.Units.Format(desk.Length, u.s.Filled.SpanMM(), 4)
}

// title writes what a view is in its lower left corner, with a bar of a round
// length for its scale; a scale of zero says that there is none.
func (u *UI) title(r drafting.Rect, text string, dpPerMM float64) {
	b := &u.bench
	st := u.look.Caption()
	y := r.Y1 - touch.Unit
	end := b.Text(drafting.Pt{X: r.X0 + touch.Unit, Y: y}, b.Fit(text, r.W()-2*touch.Unit, st), st).X1
	if dpPerMM <= 0 {
		return
	}
	mm := u.s.Units.RoundStep(desk.Length, 0.2*r.W()/dpPerMM)
	bar := drafting.Rect{X0: end + 12, Y0: y - 8, X1: end + 12 + mm*dpPerMM, Y1: y}
	label := u.s.Units.Format(desk.Length, mm, 2)
	if bar.X1+6+b.Fonts.Width(label, st.Size, false) > r.X1-4 {
		return
	}
	mid := bar.Mid().X
	b.Fill(drafting.Box(drafting.Rect{X0: bar.X0, Y0: bar.Y0 + 2, X1: mid, Y1: bar.Y1 - 1}), drafting.Line)
	b.Frame(drafting.Rect{X0: bar.X0, Y0: bar.Y0 + 2, X1: bar.X1, Y1: bar.Y1 - 1}, drafting.Thin, drafting.Line)
	b.Text(drafting.Pt{X: bar.X1 + 6, Y: y}, label, st)
}

// diameter writes De inside the pipe, or left of it where it is too small, and
// returns what to touch.
func (u *UI) diameter(g sight, p plan.Plan, y float64) drafting.Rect {
	b, small := &u.bench, u.look.Small()
	outer := p.Part.ODMM / 2 * g.scale
	text := "De " + u.s.Units.Format(desk.Length, p.Part.ODMM, 4)
	w := b.Fonts.Width(text, small, true)
	st := drafting.Style{Size: small, Bold: true, Ink: drafting.Line, Align: drafting.Middle, Knock: true}
	at := drafting.Pt{X: g.cx, Y: y + drafting.CapHeight*small/2}
	if w > 1.7*outer {
		at.X, st.Align = g.cx-outer-8, drafting.End
		if at.X-w < g.view.X0-4 {
			return drafting.Rect{X0: g.cx - outer, X1: g.cx + outer, Y0: y - outer, Y1: y + outer}
		}
	}
	return b.Text(at, text, st)
}

// sideDimensions draws SFD at the left, f and b at the right, the focus at the
// source and De below, each with its target.
func (u *UI) sideDimensions(g sight, p plan.Plan, r drafting.Rect, small float64) {
	b := &u.bench
	units := u.s.Units
	x := r.X0 + small + 16
	if u.low(r.H()) {
		x = g.view.X0 - 20
	}
	ext := func(x0, y, x1 float64) {
		b.Line(drafting.Pt{X: x0, Y: y}, drafting.Pt{X: x1, Y: y}, drafting.Hair, drafting.Faint)
	}
	ext(x-4, g.source, g.cx-42)
	ext(x-4, g.film+2, g.view.X0+4)
	sfd := b.Dimension(drafting.Dimension{A: drafting.Pt{X: x, Y: g.source}, B: drafting.Pt{X: x, Y: g.film + 2}, Text: "SFD " + units.Format(desk.Length, p.Setup.SFDMM, 4), Brief: u.brief("SFD", p.Setup.SFDMM), Size: small, Bold: true, Ink: drafting.Line, Break: g.cut, Left: true})
	u.open(sfd.And(r), "setup.sfdMM", "")

	xr := g.view.X1 + 22
	ext(g.cx+42, g.source, xr+4)
	ext(g.view.X1-4, g.surface, xr+4)
	ext(g.view.X1-4, g.film+2, xr+4)
	f := b.Dimension(drafting.Dimension{A: drafting.Pt{X: xr, Y: g.source}, B: drafting.Pt{X: xr, Y: g.surface}, Text: "f " + units.Format(desk.Length, p.Setup.SFDMM-p.SpanMM(), 4), Brief: u.brief("f", p.Setup.SFDMM-p.SpanMM()), Size: small, Bold: true, Ink: drafting.Line, Break: g.cut})
	f.Y1 = math.Min(f.Y1, g.surface-u.look.Target/2)
	u.open(f.And(r), "setup.fMM", "")
	bd := b.Dimension(drafting.Dimension{A: drafting.Pt{X: xr, Y: g.surface}, B: drafting.Pt{X: xr, Y: g.film + 2}, Text: u.bText(), Size: small, Bold: true, Ink: drafting.Line})
	u.open(bd.And(drafting.Rect{X0: r.X0, Y0: g.surface - 6, X1: r.X1, Y1: r.Y1}), "setup.bMM", "")
	u.coneDimension(g, p, small)
	u.partTarget(g, p)
}

// coneDimension writes the opening of the beam as an arc inside it.
func (u *UI) coneDimension(g sight, p plan.Plan, small float64) {
	if g.halfCone == 0 {
		return
	}
	b := &u.bench
	field, deg := "source.tube.coneDeg", 0.0
	if t := p.Source.Tube; t != nil {
		deg = t.ConeDeg
	} else {
		field, deg = "source.sealed.coneDeg", p.Source.Sealed.ConeDeg
	}
	at := drafting.Pt{X: g.cx, Y: g.source}
	foot := g.surface
	if g.cut {
		foot = g.cutA
	}
	radius := math.Min(math.Max((foot-g.source)*0.5, 50), 150)
	if radius > foot-g.source-10 {
		return
	}
	b.Stroke(drafting.Arc(at, radius, math.Pi/2-g.halfCone, 2*g.halfCone), drafting.Thin, drafting.Beam)
	st := drafting.Style{Size: small, Bold: true, Ink: drafting.Line, Align: drafting.Middle, Knock: true}
	box := b.Text(drafting.Pt{X: at.X, Y: at.Y + radius + drafting.CapHeight*small/2}, u.s.Units.Format(desk.Angle, deg, 3), st)
	u.open(box, field, "")
}

// partTarget lets the part be touched in the side view, and gives a pipe its
// diameter.
func (u *UI) partTarget(g sight, p plan.Plan) {
	if p.Part.ODMM > 0 {
		c := g.surface + p.Part.ODMM/2*g.scale
		if p.Setup.Kind == plan.Panoramic {
			c = g.back - p.Part.ODMM/2*g.scale
		}
		u.open(u.diameter(g, p, c), "part.odMM", "")
		return
	}
	u.open(drafting.Rect{X0: g.cx - 60, Y0: g.surface, X1: g.cx + 60, Y1: g.back}, "part.layers[0].mm", "")
}
