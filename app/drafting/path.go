package drafting

import "math"

// verb is what a segment of a path does.
type verb uint8

const (
	move verb = iota
	line
	cube
	shut
)

// Segment is one step of a path, for painters.
type Segment struct {
	verb    verb
	A, B, P Pt // control points of a curve, and where the step ends
}

// Path is a set of contours. The zero Path is empty and ready.
type Path struct{ segs []Segment }

// MoveTo starts a contour.
func (p *Path) MoveTo(q Pt) *Path { p.segs = append(p.segs, Segment{verb: move, P: q}); return p }

// LineTo goes straight to q.
func (p *Path) LineTo(q Pt) *Path { p.segs = append(p.segs, Segment{verb: line, P: q}); return p }

// CubeTo goes to q by a cubic curve.
func (p *Path) CubeTo(a, b, q Pt) *Path {
	p.segs = append(p.segs, Segment{verb: cube, A: a, B: b, P: q})
	return p
}

// Close ends the contour where it started.
func (p *Path) Close() *Path { p.segs = append(p.segs, Segment{verb: shut}); return p }

// Empty says whether the path has no segment.
func (p *Path) Empty() bool { return len(p.segs) == 0 }

// Walk calls the functions for each segment in order.
func (p *Path) Walk(moveTo, lineTo func(Pt), cubeTo func(a, b, q Pt), closed func()) {
	for _, s := range p.segs {
		switch s.verb {
		case move:
			moveTo(s.P)
		case line:
			lineTo(s.P)
		case cube:
			cubeTo(s.A, s.B, s.P)
		case shut:
			closed()
		}
	}
}

// Poly is a path through points, closed if asked for.
func Poly(closed bool, pts ...Pt) Path {
	var p Path
	for i, q := range pts {
		if i == 0 {
			p.MoveTo(q)
		} else {
			p.LineTo(q)
		}
	}
	if closed {
		p.Close()
	}
	return p
}

// Box is the path round a rectangle.
func Box(r Rect) Path {
	return Poly(true, Pt{r.X0, r.Y0}, Pt{r.X1, r.Y0}, Pt{r.X1, r.Y1}, Pt{r.X0, r.Y1})
}

// Round is the path round a rectangle with rounded corners.
func Round(r Rect, radius float64) Path {
	q := math.Min(radius, math.Min(r.W(), r.H())/2)
	var p Path
	p.MoveTo(Pt{r.X0 + q, r.Y0})
	p.LineTo(Pt{r.X1 - q, r.Y0})
	p.ArcAbout(Pt{r.X1 - q, r.Y0 + q}, q, -math.Pi/2, math.Pi/2)
	p.LineTo(Pt{r.X1, r.Y1 - q})
	p.ArcAbout(Pt{r.X1 - q, r.Y1 - q}, q, 0, math.Pi/2)
	p.LineTo(Pt{r.X0 + q, r.Y1})
	p.ArcAbout(Pt{r.X0 + q, r.Y1 - q}, q, math.Pi/2, math.Pi/2)
	p.LineTo(Pt{r.X0, r.Y0 + q})
	p.ArcAbout(Pt{r.X0 + q, r.Y0 + q}, q, math.Pi, math.Pi/2)
	return *p.Close()
}

// Arc is a circular arc about c from an angle over a sweep; positive sweeps
// go clockwise as seen.
func Arc(c Pt, r, from, sweep float64) Path {
	var p Path
	p.MoveTo(c.Polar(r, from))
	p.ArcAbout(c, r, from, sweep)
	return p
}

// Circle is a closed circle.
func Circle(c Pt, r float64) Path {
	p := Arc(c, r, 0, 2*math.Pi)
	return *p.Close()
}

// Ring is the area between two circles about one centre.
func Ring(c Pt, outer, inner float64) Path {
	p := Circle(c, outer)
	in := Arc(c, inner, 0, -2*math.Pi)
	p.segs = append(p.segs, in.Close().segs...)
	return p
}

// ArcAbout continues the contour along an arc. Each piece of at most a quarter
// is one cubic; it is off by less than 3e-4 of the radius.
func (p *Path) ArcAbout(c Pt, r, from, sweep float64) *Path {
	n := int(math.Ceil(math.Abs(sweep)/(math.Pi/2) - 1e-9))
	if n < 1 {
		return p
	}
	step := sweep / float64(n)
	k := 4.0 / 3 * math.Tan(step/4) * r
	for i := range n {
		a0 := from + float64(i)*step
		a1 := a0 + step
		s, e := c.Polar(r, a0), c.Polar(r, a1)
		p.CubeTo(Pt{s.X - k*math.Sin(a0), s.Y + k*math.Cos(a0)}, Pt{e.X + k*math.Sin(a1), e.Y - k*math.Cos(a1)}, e)
	}
	return p
}

// Append adds the contours of q.
func (p *Path) Append(q Path) *Path { p.segs = append(p.segs, q.segs...); return p }

// Bounds is the rectangle round all points, control points included.
func (p *Path) Bounds() Rect {
	b := Rect{math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)}
	grow := func(q Pt) {
		b = Rect{math.Min(b.X0, q.X), math.Min(b.Y0, q.Y), math.Max(b.X1, q.X), math.Max(b.Y1, q.Y)}
	}
	p.Walk(grow, grow, func(a, c, q Pt) { grow(a); grow(c); grow(q) }, func() {})
	return b
}

// Straight returns the two ends of a path that is one straight line.
func (p *Path) Straight() (a, b Pt, ok bool) {
	if len(p.segs) == 2 && p.segs[0].verb == move && p.segs[1].verb == line {
		return p.segs[0].P, p.segs[1].P, true
	}
	return Pt{}, Pt{}, false
}

// AsBox returns the rectangle of a path that is one upright rectangle.
func (p *Path) AsBox() (Rect, bool) {
	if len(p.segs) != 5 || p.segs[4].verb != shut {
		return Rect{}, false
	}
	a, b, c, d := p.segs[0].P, p.segs[1].P, p.segs[2].P, p.segs[3].P
	ok := p.segs[1].verb == line && p.segs[2].verb == line && p.segs[3].verb == line &&
		a.Y == b.Y && b.X == c.X && c.Y == d.Y && d.X == a.X
	return Rect{a.X, a.Y, c.X, c.Y}, ok
}

// Dashed is the path cut into dashes: on, off, on, off ... in dp. Curves are
// followed by chords of about 2 dp.
func (p *Path) Dashed(pattern []float64) Path {
	total := 0.0
	for _, v := range pattern {
		total += v
	}
	if len(pattern) == 0 || total <= 0 {
		return *p
	}
	c := dasher{pattern: pattern, left: pattern[0], pen: true}
	p.Walk(c.start, c.to, c.along, func() { c.to(c.first) })
	return c.out
}

// dasher walks a path and lifts its pen.
type dasher struct {
	out        Path
	pattern    []float64
	i          int
	left       float64
	pen        bool
	first, now Pt
}

func (c *dasher) start(q Pt) {
	c.i, c.left, c.pen, c.first, c.now = 0, c.pattern[0], true, q, q
	c.out.MoveTo(q)
}

func (c *dasher) to(q Pt) {
	for {
		d := q.Sub(c.now)
		l := d.Len()
		if l <= c.left {
			c.left -= l
			c.step(q)
			return
		}
		c.step(c.now.Add(d.Mul(c.left / l)))
		c.i = (c.i + 1) % len(c.pattern)
		c.left, c.pen = c.pattern[c.i], !c.pen
		if c.pen {
			c.out.MoveTo(c.now)
		}
	}
}

func (c *dasher) step(q Pt) {
	if c.pen {
		c.out.LineTo(q)
	}
	c.now = q
}

func (c *dasher) along(a, b, q Pt) {
	s := c.now
	n := 1 + int((a.Sub(s).Len()+b.Sub(a).Len()+q.Sub(b).Len())/2)
	for i := 1; i <= n; i++ {
		t := float64(i) / float64(n)
		u := 1 - t
		c.to(Pt{u*u*u*s.X + 3*u*u*t*a.X + 3*u*t*t*b.X + t*t*t*q.X, u*u*u*s.Y + 3*u*u*t*a.Y + 3*u*t*t*b.Y + t*t*t*q.Y})
	}
}
