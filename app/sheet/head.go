package sheet

import (
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/exposure/plan"
)

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
