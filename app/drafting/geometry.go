package drafting

import "math"

// Pt is a point in dp.
type Pt struct{ X, Y float64 }

// Add returns p + q.
func (p Pt) Add(q Pt) Pt { return Pt{p.X + q.X, p.Y + q.Y} }

// Sub returns p - q.
func (p Pt) Sub(q Pt) Pt { return Pt{p.X - q.X, p.Y - q.Y} }

// Mul returns p scaled by k.
func (p Pt) Mul(k float64) Pt { return Pt{p.X * k, p.Y * k} }

// Len is the distance from the origin.
func (p Pt) Len() float64 { return math.Hypot(p.X, p.Y) }

// unit is the direction of p; the zero point has none and gives (1, 0).
func (p Pt) unit() Pt {
	if l := p.Len(); l > 0 {
		return p.Mul(1 / l)
	}
	return Pt{1, 0}
}

// turned is p turned by a quarter clockwise as seen.
func (p Pt) turned() Pt { return Pt{-p.Y, p.X} }

// Polar is the point at distance r and angle a from p.
func (p Pt) Polar(r, a float64) Pt { return Pt{p.X + r*math.Cos(a), p.Y + r*math.Sin(a)} }

// Rect is a rectangle in dp; it is empty unless X0 < X1 and Y0 < Y1.
type Rect struct{ X0, Y0, X1, Y1 float64 }

// W is the width.
func (r Rect) W() float64 { return r.X1 - r.X0 }

// H is the height.
func (r Rect) H() float64 { return r.Y1 - r.Y0 }

// Empty says whether nothing is inside.
func (r Rect) Empty() bool { return !(r.X1 > r.X0 && r.Y1 > r.Y0) }

// Mid is the centre.
func (r Rect) Mid() Pt { return Pt{(r.X0 + r.X1) / 2, (r.Y0 + r.Y1) / 2} }

// Inset is r less a margin on each side.
func (r Rect) Inset(m float64) Rect { return Rect{r.X0 + m, r.Y0 + m, r.X1 - m, r.Y1 - m} }

// Grow is r with a margin added on each side.
func (r Rect) Grow(m float64) Rect { return r.Inset(-m) }

// Moved is r shifted.
func (r Rect) Moved(dx, dy float64) Rect { return Rect{r.X0 + dx, r.Y0 + dy, r.X1 + dx, r.Y1 + dy} }

// And is what r and s share.
func (r Rect) And(s Rect) Rect {
	return Rect{math.Max(r.X0, s.X0), math.Max(r.Y0, s.Y0), math.Min(r.X1, s.X1), math.Min(r.Y1, s.Y1)}
}

// Or is the smallest rectangle round both; an empty one counts for nothing.
func (r Rect) Or(s Rect) Rect {
	switch {
	case r.Empty():
		return s
	case s.Empty():
		return r
	}
	return Rect{math.Min(r.X0, s.X0), math.Min(r.Y0, s.Y0), math.Max(r.X1, s.X1), math.Max(r.Y1, s.Y1)}
}

// Holds says whether s lies inside r, to a thousandth.
func (r Rect) Holds(s Rect) bool {
	const e = 1e-3
	return s.X0 >= r.X0-e && s.Y0 >= r.Y0-e && s.X1 <= r.X1+e && s.Y1 <= r.Y1+e
}

// Has says whether p lies inside r.
func (r Rect) Has(p Pt) bool { return p.X >= r.X0 && p.X <= r.X1 && p.Y >= r.Y0 && p.Y <= r.Y1 }

// CutLeft parts w off the left; what is left comes second.
func (r Rect) CutLeft(w float64) (part, rest Rect) {
	x := math.Min(r.X0+w, r.X1)
	return Rect{r.X0, r.Y0, x, r.Y1}, Rect{x, r.Y0, r.X1, r.Y1}
}

// CutRight parts w off the right.
func (r Rect) CutRight(w float64) (part, rest Rect) {
	x := math.Max(r.X1-w, r.X0)
	return Rect{x, r.Y0, r.X1, r.Y1}, Rect{r.X0, r.Y0, x, r.Y1}
}

// CutTop parts h off the top.
func (r Rect) CutTop(h float64) (part, rest Rect) {
	y := math.Min(r.Y0+h, r.Y1)
	return Rect{r.X0, r.Y0, r.X1, y}, Rect{r.X0, y, r.X1, r.Y1}
}

// CutBottom parts h off the bottom.
func (r Rect) CutBottom(h float64) (part, rest Rect) {
	y := math.Max(r.Y1-h, r.Y0)
	return Rect{r.X0, y, r.X1, r.Y1}, Rect{r.X0, r.Y0, r.X1, y}
}

// Columns parts r into n columns with a gap between.
func (r Rect) Columns(n int, gap float64) []Rect {
	out := make([]Rect, n)
	w := (r.W() - gap*float64(n-1)) / float64(n)
	for i := range out {
		x := r.X0 + float64(i)*(w+gap)
		out[i] = Rect{x, r.Y0, x + w, r.Y1}
	}
	return out
}

// Rows parts r into n rows with a gap between.
func (r Rect) Rows(n int, gap float64) []Rect {
	out := make([]Rect, n)
	h := (r.H() - gap*float64(n-1)) / float64(n)
	for i := range out {
		y := r.Y0 + float64(i)*(h+gap)
		out[i] = Rect{r.X0, y, r.X1, y + h}
	}
	return out
}
