package sheet

import (
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// sideView draws source, beam, part and film to scale with their dimensions.
// What is touched opens its dial. Marked, it shows where Section A is cut.
func (u *UI) sideView(r drafting.Rect, marked bool) {
	b := &u.bench
	small := u.look.Small()
	p := u.s.Filled
	left, right := u.sideMargins(r.H())
	view := drafting.Rect{X0: r.X0 + left, Y0: r.Y0 + u.headRoom(), X1: r.X1 - right, Y1: r.Y1 - u.footRoom()}
	if view.W() < 40 || view.H() < math.Max(40, 2.6*small) {
		return
	}
	g := newSight(p, view)
	b.Clip(drafting.Box(r))
	u.beam(g, p)
	u.sidePart(g, p)
	u.sideFilm(g, p)
	u.axis(g)
	u.head(g, p, r)
	if marked && g.surface-g.source > 40 {
		u.mark(g)
	}
	b.Unclip()
	u.sideDimensions(g, p, r, small)
	u.title(r, "Side view", g.scale)
}

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

// beam washes where the beam passes and draws its edges.
func (u *UI) beam(g sight, p plan.Plan) {
	b := &u.bench
	v := drafting.Rect{X0: g.view.X0 - 8, Y0: g.source, X1: g.view.X1 + 8, Y1: g.film}
	b.Clip(drafting.Box(v))
	defer b.Unclip()
	if g.halfCone == 0 {
		b.Fill(drafting.Box(v), drafting.BeamWash)
		for i := range 16 {
			a := float64(i) * math.Pi / 8
			b.Line(drafting.Pt{X: g.cx, Y: g.source}.Polar(20, a), drafting.Pt{X: g.cx, Y: g.source}.Polar(34, a), drafting.Thin, drafting.Beam)
		}
		return
	}
	upper := g.film
	if g.cut {
		upper = g.cutA
		u.beamPiece(g, p, g.cutB, g.film)
	}
	u.beamPiece(g, p, g.source, upper)
}

// beamPiece draws the cone between two levels.
func (u *UI) beamPiece(g sight, p plan.Plan, y0, y1 float64) {
	b := &u.bench
	w0, w1 := g.reach(g.depthAt(y0, p)), g.reach(g.depthAt(y1, p))
	b.Fill(drafting.Poly(true, drafting.Pt{X: g.cx - w0, Y: y0}, drafting.Pt{X: g.cx + w0, Y: y0}, drafting.Pt{X: g.cx + w1, Y: y1}, drafting.Pt{X: g.cx - w1, Y: y1}), drafting.BeamWash)
	for _, side := range []float64{-1, 1} {
		b.Line(drafting.Pt{X: g.cx + side*w0, Y: y0}, drafting.Pt{X: g.cx + side*w1, Y: y1}, drafting.Medium, drafting.Beam, drafting.Edge()...)
	}
}

// mark draws the ends of the cut that Section A shows.
func (u *UI) mark(g sight) {
	b := &u.bench
	st := drafting.Style{Size: u.look.Small(), Bold: true, Ink: drafting.Line}
	b.Line(drafting.Pt{X: g.cx, Y: g.surface - 16}, drafting.Pt{X: g.cx, Y: g.surface - 3}, 3, drafting.Line)
	b.Line(drafting.Pt{X: g.cx, Y: g.film + 9}, drafting.Pt{X: g.cx, Y: g.film + 20}, 3, drafting.Line)
	b.Text(drafting.Pt{X: g.cx + 6, Y: g.surface - 5}, "A", st)
}

// axis draws the central ray and, where the distance is broken, the break.
func (u *UI) axis(g sight) {
	b := &u.bench
	b.Line(drafting.Pt{X: g.cx, Y: g.source - 6}, drafting.Pt{X: g.cx, Y: g.film + 10}, drafting.Thin, drafting.Beam, drafting.Chain()...)
	if !g.cut {
		return
	}
	gap := drafting.Rect{X0: g.view.X0 - 12, Y0: g.cutA, X1: g.view.X1 + 12, Y1: g.cutB}
	b.Fill(drafting.Box(gap), drafting.Sheet)
	b.BreakLine(drafting.Pt{X: gap.X0, Y: gap.Y0}, drafting.Pt{X: gap.X1, Y: gap.Y0}, drafting.Line)
	b.BreakLine(drafting.Pt{X: gap.X0, Y: gap.Y1}, drafting.Pt{X: gap.X1, Y: gap.Y1}, drafting.Line)
}

// family is a material's family for its hatch.
func family(name string) string {
	m, err := materials.Lookup(name)
	if err != nil {
		return ""
	}
	return m.Family()
}

// sidePart draws the part: a plate, or a pipe in section.
func (u *UI) sidePart(g sight, p plan.Plan) {
	if p.Part.ODMM > 0 && p.Part.WallMM > 0 {
		u.pipe(g, p)
		return
	}
	b := &u.bench
	half := math.Min(g.view.W()/2, math.Max(1.15*g.reach(p.Setup.SFDMM-p.SpanMM()), 60))
	y := g.surface
	for _, l := range p.Part.Layers {
		r := drafting.Rect{X0: g.cx - half, Y0: y, X1: g.cx + half, Y1: y + l.MM*g.scale}
		b.Fill(drafting.Box(r), drafting.Sheet)
		b.Hatch(drafting.Box(r), family(l.Material), drafting.Line)
		b.Line(drafting.Pt{X: r.X0, Y: r.Y0}, drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Medium, drafting.Line)
		b.Line(drafting.Pt{X: r.X0, Y: r.Y1}, drafting.Pt{X: r.X1, Y: r.Y1}, drafting.Medium, drafting.Line)
		y = r.Y1
	}
	for _, side := range []float64{-1, 1} {
		x := g.cx + side*half
		b.Stroke(drafting.Poly(false, drafting.Pt{X: x, Y: g.surface - 6}, drafting.Pt{X: x, Y: (g.surface+y)/2 - 3}, drafting.Pt{X: x + 4, Y: (g.surface + y) / 2}, drafting.Pt{X: x - 4, Y: (g.surface+y)/2 + 2}, drafting.Pt{X: x, Y: (g.surface+y)/2 + 5}, drafting.Pt{X: x, Y: y + 6}), drafting.Thin, drafting.Line)
	}
}

// pipe draws a pipe's section: outside below the source, or round it where
// the source stands in the middle.
func (u *UI) pipe(g sight, p plan.Plan) {
	b := &u.bench
	outer, wall := p.Part.ODMM/2*g.scale, p.Part.WallMM*g.scale
	c := drafting.Pt{X: g.cx, Y: g.surface + outer}
	if p.Setup.Kind == plan.Panoramic {
		c.Y = g.back - outer
	}
	inner := math.Max(outer-wall, 0)
	if bore := boreFamily(p); bore != "" {
		b.Hatch(drafting.Circle(c, inner), bore, drafting.Faint)
	}
	ring := drafting.Ring(c, outer, inner)
	b.Fill(ring, drafting.Sheet)
	b.Hatch(ring, family(p.Part.Layers[0].Material), drafting.Line)
	b.Stroke(drafting.Circle(c, outer), drafting.Medium, drafting.Line)
	b.Stroke(drafting.Circle(c, inner), drafting.Medium, drafting.Line)
}

// boreFamily is the family of what fills a pipe between its two walls.
func boreFamily(p plan.Plan) string {
	if !p.Setup.DoubleWall() || len(p.Part.Layers) < 3 {
		return ""
	}
	return family(p.Part.Layers[len(p.Part.Layers)/2].Material)
}

// sideFilm draws the film as a bold line where it stands.
func (u *UI) sideFilm(g sight, p plan.Plan) {
	b := &u.bench
	half := math.Min(g.view.W()/2, math.Max(g.reach(p.Setup.SFDMM)*0.9, 50))
	if p.Part.ODMM > 0 {
		half = math.Min(half, math.Max(p.Part.ODMM*g.scale*0.7, 40))
	}
	y := g.film + 2
	b.Line(drafting.Pt{X: g.cx - half, Y: y}, drafting.Pt{X: g.cx + half, Y: y}, 4, drafting.Line)
	b.Line(drafting.Pt{X: g.cx - half, Y: y + 5}, drafting.Pt{X: g.cx + half, Y: y + 5}, drafting.Thin, drafting.Line)
}

// head draws the tube head or the source with its collimator, and its name.
func (u *UI) head(g sight, p plan.Plan, r drafting.Rect) {
	b := &u.bench
	at := drafting.Pt{X: g.cx, Y: g.source}
	var text, field string
	if t := p.Source.Tube; t != nil {
		u.tubeHead(at, t.AnodeDeg)
		text, field = u.s.Units.Format(desk.Voltage, t.KV, 3)+", "+u.s.Units.Format(desk.Current, t.MA, 3), "source.tube.kv"
	} else if s := p.Source.Sealed; s != nil {
		u.capsule(at, len(s.Collimator) > 0 && g.halfCone > 0, g.halfCone)
		text, field = s.Nuclide, "source.sealed.activityGBq"
	}
	st := drafting.Style{Size: u.look.Small(), Bold: true, Ink: drafting.Line, Align: drafting.Middle}
	y := g.source - 58 - drafting.Descent*st.Size
	b.Text(drafting.Pt{X: at.X, Y: y}, b.Fit(text, r.W()-16, st), st)
	u.open(drafting.Rect{X0: at.X - 44, Y0: y - st.Size, X1: at.X + 44, Y1: g.source + 4}, field, text)
}

// open makes a target at least as large as a target must be that opens a dial
// on a field, with the quantity's name and value as its label.
func (u *UI) open(r drafting.Rect, field, _ string) {
	q, ok := u.known.quantities[field]
	if !ok {
		return
	}
	label := q.Label() + ", " + q.Text(u.s.Units)
	u.openAs(r, label, desk.Panel{Kind: desk.DialPanel, Field: field})
}

func (u *UI) openAs(r drafting.Rect, label string, p desk.Panel) {
	least := u.look.Target
	if w := least - r.W(); w > 0 {
		r.X0, r.X1 = r.X0-w/2, r.X1+w/2
	}
	if h := least - r.H(); h > 0 {
		r.Y0, r.Y1 = r.Y0-h/2, r.Y1+h/2
	}
	r = inside(r, u.room)
	u.bench.Target(r, label, u.toggle(p))
	u.bench.Ring(label, r)
	if u.s.Panel == p {
		u.bench.Stroke(drafting.Box(r.Inset(1)), drafting.Medium, drafting.Beam)
	}
}

// inside moves a rectangle into another, and cuts what is too large.
func inside(r, room drafting.Rect) drafting.Rect {
	dx := math.Max(0, room.X0-r.X0) - math.Max(0, r.X1-room.X1)
	dy := math.Max(0, room.Y0-r.Y0) - math.Max(0, r.Y1-room.Y1)
	return r.Moved(dx, dy).And(room)
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

// tubeHead draws a housing with its anode, as a symbol, not to scale.
func (u *UI) tubeHead(at drafting.Pt, anodeDeg float64) {
	b := &u.bench
	box := drafting.Rect{X0: at.X - 36, Y0: at.Y - 52, X1: at.X + 36, Y1: at.Y + 2}
	b.Fill(drafting.Round(box, 6), drafting.Block)
	b.Stroke(drafting.Round(box, 6), drafting.Bold, drafting.Line)
	slope := math.Tan(anodeDeg * math.Pi / 180)
	top := at.Y - 40
	b.Fill(drafting.Poly(true, drafting.Pt{X: at.X - 22, Y: top}, drafting.Pt{X: at.X + 2, Y: top}, drafting.Pt{X: at.X + 2, Y: at.Y - 4}, drafting.Pt{X: at.X - 22, Y: at.Y - 4 - 24*math.Min(slope, 1)}), drafting.Faint)
	b.Line(drafting.Pt{X: at.X + 26, Y: at.Y - 30}, drafting.Pt{X: at.X + 6, Y: at.Y - 6}, drafting.Thin, drafting.Beam, 3, 2)
	b.Fill(drafting.Box(drafting.Rect{X0: at.X - 12, Y0: at.Y, X1: at.X + 12, Y1: at.Y + 4}), drafting.Sheet)
	b.Spot(at, 3.5, drafting.Beam)
}

// capsule draws a sealed source at the end of its guide tube, with the
// collimator open downward if there is one.
func (u *UI) capsule(at drafting.Pt, collimated bool, half float64) {
	b := &u.bench
	b.Stroke(*new(drafting.Path).MoveTo(drafting.Pt{X: at.X, Y: at.Y - 10}).CubeTo(drafting.Pt{X: at.X, Y: at.Y - 44}, drafting.Pt{X: at.X + 20, Y: at.Y - 46}, drafting.Pt{X: at.X + 60, Y: at.Y - 46}), 4, drafting.Faint)
	if collimated {
		ring := drafting.Arc(at, 24, math.Pi/2+half, 2*math.Pi-2*half)
		ring.LineTo(at.Polar(11, math.Pi/2-half))
		ring.ArcAbout(at, 11, math.Pi/2-half, -(2*math.Pi - 2*half))
		ring.Close()
		b.Fill(ring, drafting.Sheet)
		b.Hatch(ring, "heavy", drafting.Line)
		b.Stroke(ring, drafting.Medium, drafting.Line)
	}
	b.Spot(at, 4, drafting.Beam)
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
