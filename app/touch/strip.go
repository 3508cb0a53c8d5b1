package touch

import (
	"math"

	"halfvalue/app/drafting"
)

// Strip is the trade-off strip: exposure time against the quantity that the
// dial turns, with today's point on the curve, the places where a rule falls
// short hatched, and a crosshair under the finger. The zero Strip is ready.
type Strip struct {
	cross float64 // x of the crosshair, base unit; NaN or zero with on false
	on    bool
	field string
}

// StripPoint is one reckoned point.
type StripPoint struct {
	X, Y      float64
	Thin, Fat float64 // density at the thinnest and the thickest section; both 0: not shown
	Short     bool
	Gap       bool // no answer here
}

// StripSpec is what the strip shows.
type StripSpec struct {
	Field   string
	Label   string
	Points  []StripPoint
	Lo, Hi  float64
	Log     bool
	Now     StripPoint
	XTitle  string
	XFigure func(float64) string
	YFigure func(float64) string
	Read    func(StripPoint) string // what the crosshair says
	Set     func(x float64, more bool)
}

// Layout draws the strip.
func (t *Strip) Layout(b *Bench, r drafting.Rect, s StripSpec) {
	if t.field != s.Field {
		t.field, t.on = s.Field, false
	}
	small := b.Look.Small()
	plot := drafting.Rect{X0: r.X0 + small*3.6, Y0: r.Y0 + small*1.8, X1: r.X1 - small*1.2, Y1: r.Y1 - small*1.3 - 8}
	if plot.W() < 60 || plot.H() < 40 || !(s.Hi > s.Lo) {
		return
	}
	x := drafting.Axis{Lo: s.Lo, Hi: s.Hi, From: plot.X0, To: plot.X1, Log: s.Log}
	y := timeAxis(s, plot)
	b.Text(drafting.Pt{X: r.X0, Y: r.Y0 + small}, b.fit("exposure time against "+s.XTitle, r.W(), small, false), drafting.Style{Size: small, Ink: drafting.Faint})
	t.shadeShort(b, s, x, plot)
	b.Vertical(drafting.Scale{Axis: y, Across: plot.X0, Reach: plot.X1, Size: small, Marks: timeMarks(), Format: s.YFigure})
	b.Horizontal(drafting.Scale{Axis: x, Across: plot.Y1, Reach: plot.Y0, Size: small, Count: max(2, int(plot.W()/(small*5))), Format: s.XFigure})
	b.Clip(drafting.Box(plot))
	t.densities(b, s, x, plot)
	t.curve(b, s, x, y)
	b.Unclip()
	t.today(b, s, x, y, plot)
	t.crosshair(b, s, x, y, plot)
	b.DragTarget(plot, "Trade-off of "+s.Label, func(g Drag) { t.touched(s, x, g) })
}

// timeAxis runs over what is reckoned, at least a factor of two, in ratios.
func timeAxis(s StripSpec, plot drafting.Rect) drafting.Axis {
	lo, hi := s.Now.Y, s.Now.Y
	for _, p := range s.Points {
		if !p.Gap && p.Y > 0 {
			lo, hi = math.Min(lo, p.Y), math.Max(hi, p.Y)
		}
	}
	if !(lo > 0) {
		lo, hi = 1, 10
	}
	if hi < 2*lo {
		m := math.Sqrt(hi * lo)
		lo, hi = m/1.5, m*1.5
	}
	return drafting.Axis{Lo: lo / 1.15, Hi: hi * 1.15, From: plot.Y1, To: plot.Y0, Log: true}
}

// timeMarks are the times that a clock face has.
func timeMarks() []float64 {
	return []float64{0.1, 0.2, 0.5, 1, 2, 5, 10, 20, 30, 60, 120, 300, 600, 1200, 1800, 3600, 7200, 18000, 36000, 86400, 172800}
}

// shadeShort hatches where a rule falls short.
func (t *Strip) shadeShort(b *Bench, s StripSpec, x drafting.Axis, plot drafting.Rect) {
	for i, p := range s.Points {
		if !p.Short && !p.Gap {
			continue
		}
		lo, hi := s.Lo, s.Hi
		if i > 0 {
			lo = (s.Points[i-1].X + p.X) / 2
		}
		if i+1 < len(s.Points) {
			hi = (p.X + s.Points[i+1].X) / 2
		}
		box := drafting.Rect{X0: x.At(lo), Y0: plot.Y0, X1: x.At(hi), Y1: plot.Y1}
		if box.Empty() {
			continue
		}
		if p.Gap {
			b.Fill(drafting.Box(box), drafting.Block)
			continue
		}
		b.Fill(drafting.Box(box), drafting.RopeWash)
		b.Short(drafting.Box(box))
	}
}

func (t *Strip) curve(b *Bench, s StripSpec, x, y drafting.Axis) {
	var p drafting.Path
	pen := false
	for _, q := range s.Points {
		if q.Gap || q.Y <= 0 {
			pen = false
			continue
		}
		at := drafting.Pt{X: x.At(q.X), Y: y.At(q.Y)}
		if pen {
			p.LineTo(at)
		} else {
			p.MoveTo(at)
		}
		pen = true
	}
	if !p.Empty() {
		b.Stroke(p, drafting.Bold, drafting.Line)
	}
}

// densities draws the density at the thinnest and the thickest section on a
// scale of its own, 0 at the foot and 5 at the top, labelled at their ends.
func (t *Strip) densities(b *Bench, s StripSpec, x drafting.Axis, plot drafting.Rect) {
	d := drafting.Axis{Lo: 0, Hi: 5, From: plot.Y1, To: plot.Y0}
	var thin, fat drafting.Path
	var last StripPoint
	for _, q := range s.Points {
		if q.Gap || q.Thin <= 0 || q.Fat <= 0 {
			continue
		}
		a, c := drafting.Pt{X: x.At(q.X), Y: d.At(q.Thin)}, drafting.Pt{X: x.At(q.X), Y: d.At(q.Fat)}
		if thin.Empty() {
			thin.MoveTo(a)
			fat.MoveTo(c)
		} else {
			thin.LineTo(a)
			fat.LineTo(c)
		}
		last = q
	}
	if last.X == 0 {
		return
	}
	b.Stroke(thin, drafting.Medium, drafting.Faint, 8, 4)
	b.Stroke(fat, drafting.Medium, drafting.Faint, 2, 3)
	st := drafting.Style{Size: b.Look.Small(), Ink: drafting.Line, Align: drafting.End, Knock: true}
	at := func(v float64) drafting.Pt {
		return drafting.Pt{X: min(x.At(last.X), plot.X1) - 6, Y: clamp(d.At(v)-5, plot.Y0+st.Size, plot.Y1-4)}
	}
	if a, c := at(last.Thin), at(last.Fat); c.Y-a.Y > st.Size*1.3 {
		b.Text(a, "D thin", st)
		b.Text(c, "D thick", st)
	}
}

// today marks the plan's own point.
func (t *Strip) today(b *Bench, s StripSpec, x, y drafting.Axis, plot drafting.Rect) {
	at := drafting.Pt{X: x.At(s.Now.X), Y: y.At(s.Now.Y)}
	if !plot.Grow(1).Has(at) {
		return
	}
	b.Line(drafting.Pt{X: at.X, Y: at.Y}, drafting.Pt{X: at.X, Y: plot.Y1}, drafting.Thin, drafting.Beam, 4, 3)
	b.Line(drafting.Pt{X: plot.X0, Y: at.Y}, drafting.Pt{X: at.X, Y: at.Y}, drafting.Thin, drafting.Beam, 4, 3)
	b.Fill(drafting.Circle(at, 7), drafting.Sheet)
	b.Spot(at, 4, drafting.Beam)
}

func (t *Strip) touched(s StripSpec, x drafting.Axis, g Drag) {
	t.cross, t.on = clamp(x.Value(g.At.X), s.Lo, s.Hi), true
	if g.Done {
		t.on = g.Moved
	}
}

// crosshair reads the curve under the finger.
func (t *Strip) crosshair(b *Bench, s StripSpec, x, y drafting.Axis, plot drafting.Rect) {
	if !t.on {
		return
	}
	p, ok := between(s.Points, t.cross)
	if !ok {
		return
	}
	at := drafting.Pt{X: x.At(p.X), Y: y.At(p.Y)}
	b.Line(drafting.Pt{X: at.X, Y: plot.Y0}, drafting.Pt{X: at.X, Y: plot.Y1}, drafting.Thin, drafting.Line)
	b.Line(drafting.Pt{X: plot.X0, Y: at.Y}, drafting.Pt{X: plot.X1, Y: at.Y}, drafting.Thin, drafting.Line)
	st := drafting.Style{Size: b.Look.Small(), Bold: true, Ink: drafting.Line, Knock: true}
	text := s.Read(p)
	w := b.Fonts.Width(text, st.Size, true)
	left := clamp(at.X+8, plot.X0+4, plot.X1-w-4)
	top := at.Y - 10
	if top < plot.Y0+st.Size {
		top = at.Y + st.Size + 8
	}
	b.Text(drafting.Pt{X: left, Y: top}, text, st)
}

// between interpolates the curve at x, in ratios of time.
func between(points []StripPoint, x float64) (StripPoint, bool) {
	for i := 1; i < len(points); i++ {
		a, b := points[i-1], points[i]
		if a.Gap || b.Gap || x < a.X || x > b.X || !(b.X > a.X) || a.Y <= 0 || b.Y <= 0 {
			continue
		}
		t := (x - a.X) / (b.X - a.X)
		near := a
		if t > 0.5 {
			near = b
		}
		return StripPoint{X: x, Y: a.Y * math.Pow(b.Y/a.Y, t), Thin: a.Thin + t*(b.Thin-a.Thin), Fat: a.Fat + t*(b.Fat-a.Fat), Short: near.Short}, true
	}
	return StripPoint{}, false
}
