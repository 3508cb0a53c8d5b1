package sheet

import (
	"math"

	"halfvalue/app/drafting"
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
