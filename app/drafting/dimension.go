package drafting

import "math"

// Dimension is a dimension line in the spirit of ISO 129: extension lines from
// the two points, a line with arrows between them, and the text parallel to
// the line and above it, to be read from below or from the right. Where the
// distance is too small the arrows stand outside, and the text beyond B or,
// at an upright line, level to the right of it.
type Dimension struct {
	A, B  Pt
	Off   float64 // distance of the line from A-B, positive to the left of A to B as drawn on paper with y up, that is: a B to the right of A puts the line above for a positive Off
	Text  string
	Brief string // stands instead where Text is too long for the line
	Size  float64
	Bold  bool
	Ink   Ink
	Left  bool // level text of an upright line stands at its left
	// Break cuts the line with a zigzag: the distance is not drawn whole.
	Break bool
}

// arrow lengths in dp.
const (
	arrowLong = 11.0
	arrowHalf = 2.6
)

// Arrow fills an arrow head with its tip at a point, pointing along dir.
func (d *Drawing) Arrow(tip, dir Pt, ink Ink) {
	u := dir.unit()
	n := u.turned()
	back := tip.Sub(u.Mul(arrowLong))
	d.Fill(Poly(true, tip, back.Add(n.Mul(arrowHalf)), back.Sub(n.Mul(arrowHalf))), ink)
}

// Dimension draws a dimension and returns what its text and line cover, for a
// target to be put round it.
func (d *Drawing) Dimension(m Dimension) Rect {
	u := m.B.Sub(m.A).unit()
	n := Pt{u.Y, -u.X} // left of A to B with y up
	a, b := m.A.Add(n.Mul(m.Off)), m.B.Add(n.Mul(m.Off))
	d.extension(m.A, a, m.Ink)
	d.extension(m.B, b, m.Ink)
	length := b.Sub(a).Len()
	inside := length >= 3*arrowLong
	d.dimensionLine(a, b, u, inside, m)
	return d.dimensionText(a, b, u, m).Or(Poly2(a, b))
}

// Poly2 is the rectangle round two points.
func Poly2(a, b Pt) Rect {
	return Rect{math.Min(a.X, b.X), math.Min(a.Y, b.Y), math.Max(a.X, b.X), math.Max(a.Y, b.Y)}
}

// extension goes from just off the feature to just past the line.
func (d *Drawing) extension(from, to Pt, ink Ink) {
	v := to.Sub(from)
	if v.Len() < 4 {
		return
	}
	u := v.unit()
	d.Line(from.Add(u.Mul(3)), to.Add(u.Mul(4)), Thin, ink)
}

func (d *Drawing) dimensionLine(a, b, u Pt, inside bool, m Dimension) {
	if !inside {
		d.Line(a.Sub(u.Mul(2*arrowLong)), b.Add(u.Mul(2*arrowLong)), Thin, m.Ink)
		d.Arrow(a, u, m.Ink)
		d.Arrow(b, u.Mul(-1), m.Ink)
		return
	}
	if m.Break {
		mid := a.Add(b).Mul(0.5).Add(u.Mul(b.Sub(a).Len() * 0.32))
		d.zigzag(a, b, mid, u, m.Ink)
	} else {
		d.Line(a, b, Thin, m.Ink)
	}
	d.Arrow(a, u.Mul(-1), m.Ink)
	d.Arrow(b, u, m.Ink)
}

// zigzag draws a line from a to b with one break at a point on it.
func (d *Drawing) zigzag(a, b, mid, u Pt, ink Ink) {
	n := u.turned()
	d.Stroke(Poly(false, a, mid.Sub(u.Mul(5)), mid.Sub(u.Mul(2)).Add(n.Mul(7)), mid.Add(u.Mul(2)).Sub(n.Mul(7)), mid.Add(u.Mul(5)), b), Thin, ink)
}

func (d *Drawing) dimensionText(a, b, u Pt, m Dimension) Rect {
	// Read from below or from the right: the text's own direction points right,
	// or upward where the line is upright.
	dir := u
	if dir.X < -1e-6 || (math.Abs(dir.X) <= 1e-6 && dir.Y > 0) {
		dir = dir.Mul(-1)
	}
	up := Pt{dir.Y, -dir.X}
	room := b.Sub(a).Len() - 2*arrowLong
	w := d.Fonts.Width(m.Text, m.Size, m.Bold)
	if w > room && m.Brief != "" {
		if short := d.Fonts.Width(m.Brief, m.Size, m.Bold); short <= room {
			m.Text, w = m.Brief, short
		}
	}
	mid := a.Add(b).Mul(0.5)
	if w > room {
		if math.Abs(u.X) < 1e-6 {
			return d.levelText(mid, m)
		}
		mid = b.Add(u.Mul(2*arrowLong + w/2 + 2))
	}
	at := mid.Add(up.Mul(4))
	return d.Text(at, m.Text, Style{Size: m.Size, Bold: m.Bold, Ink: Line, Align: Middle, Turn: math.Atan2(dir.Y, dir.X), Knock: true})
}

// levelText stands beside an upright line that is too short for it.
func (d *Drawing) levelText(mid Pt, m Dimension) Rect {
	st := Style{Size: m.Size, Bold: m.Bold, Ink: Line, Knock: true}
	at := Pt{mid.X + 8, mid.Y + CapHeight*m.Size/2}
	text := m.Text
	if m.Left {
		at.X, st.Align = mid.X-8, End
		if m.Brief != "" {
			text = m.Brief
		}
	}
	return d.Text(at, text, st)
}

// BreakLine draws the long thin zigzag of ISO 128 across a view from a to b:
// what lies there is left out.
func (d *Drawing) BreakLine(a, b Pt, ink Ink) {
	u := b.Sub(a).unit()
	n := u.turned()
	l := b.Sub(a).Len()
	var p Path
	p.MoveTo(a)
	for _, t := range []float64{0.3, 0.7} {
		m := a.Add(u.Mul(l * t))
		p.LineTo(m.Sub(u.Mul(6))).LineTo(m.Sub(u.Mul(2)).Add(n.Mul(8))).LineTo(m.Add(u.Mul(2)).Sub(n.Mul(8))).LineTo(m.Add(u.Mul(6)))
	}
	p.LineTo(b)
	d.Stroke(p, Thin, ink)
}

// Leader draws a thin line from a text's place to what it names, with a dot
// on it.
func (d *Drawing) Leader(from, to Pt, ink Ink) {
	d.Line(from, to, Thin, ink)
	d.Fill(Circle(to, 2.5), ink)
}
