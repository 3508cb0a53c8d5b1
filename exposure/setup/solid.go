package setup

import (
	"math"
	"slices"
)

// Vec is a point or a direction, mm.
type Vec struct{ X, Y, Z float64 }

// Sub gives v - w.
func (v Vec) Sub(w Vec) Vec { return Vec{v.X - w.X, v.Y - w.Y, v.Z - w.Z} }

// Add gives v + w.
func (v Vec) Add(w Vec) Vec { return Vec{v.X + w.X, v.Y + w.Y, v.Z + w.Z} }

// Times gives v scaled by k.
func (v Vec) Times(k float64) Vec { return Vec{v.X * k, v.Y * k, v.Z * k} }

// Dot gives the scalar product.
func (v Vec) Dot(w Vec) float64 { return v.X*w.X + v.Y*w.Y + v.Z*w.Z }

// Len gives the length.
func (v Vec) Len() float64 { return math.Hypot(math.Hypot(v.X, v.Y), v.Z) }

// Ray is the straight way of a photon from source to film.
type Ray struct{ From, To Vec }

// Len gives the length of the ray, mm.
func (r Ray) Len() float64 { return r.To.Sub(r.From).Len() }

// At gives the point mm behind From.
func (r Ray) At(mm float64) Vec { return r.From.Add(r.To.Sub(r.From).Times(mm / r.Len())) }

// Span is a stretch of a ray inside a solid, mm behind From.
type Span struct{ In, Out float64 }

// Solid is a shape that a ray passes. Spans gives the stretches inside it, in
// order, apart from each other, clipped to the ray.
type Solid interface{ Spans(r Ray) []Span }

// ThroughMM is the length of the ray inside the solid, mm.
func ThroughMM(s Solid, r Ray) float64 {
	sum := 0.0
	for _, p := range s.Spans(r) {
		sum += p.Out - p.In
	}
	return sum
}

// Slab lies between two planes square to Normal, which has length 1, at the
// distances Low and High from the origin.
type Slab struct {
	Normal    Vec
	Low, High float64
}

// Spans implements Solid.
func (s Slab) Spans(r Ray) []Span {
	n := r.Len()
	at := r.From.Dot(s.Normal)
	slope := r.To.Sub(r.From).Dot(s.Normal) / n
	if slope == 0 {
		if at > s.Low && at < s.High {
			return []Span{{0, n}}
		}
		return nil
	}
	a, b := (s.Low-at)/slope, (s.High-at)/slope
	return clip(min(a, b), max(a, b), n)
}

// Cylinder is a round bar along the direction Axis, which has length 1,
// through Centre, without ends.
type Cylinder struct {
	Centre, Axis Vec
	Radius       float64
}

// Spans implements Solid.
func (c Cylinder) Spans(r Ray) []Span {
	n := r.Len()
	u := r.To.Sub(r.From).Times(1 / n)
	across := u.Sub(c.Axis.Times(u.Dot(c.Axis)))
	d := r.From.Sub(c.Centre)
	d = d.Sub(c.Axis.Times(d.Dot(c.Axis)))
	a := across.Dot(across)
	if a < 1e-24 {
		if d.Len() < c.Radius {
			return []Span{{0, n}}
		}
		return nil
	}
	nearest := -across.Dot(d) / a
	p := d.Add(across.Times(nearest)).Len()
	if p >= c.Radius {
		return nil
	}
	half := math.Sqrt((c.Radius - p) * (c.Radius + p) / a)
	return clip(nearest-half, nearest+half, n)
}

func clip(in, out, n float64) []Span {
	in, out = max(in, 0), min(out, n)
	if in >= out {
		return nil
	}
	return []Span{{in, out}}
}

// Minus is what of A is not in B.
type Minus struct{ A, B Solid }

// Spans implements Solid.
func (m Minus) Spans(r Ray) []Span {
	holes := m.B.Spans(r)
	var left []Span
	for _, s := range m.A.Spans(r) {
		for _, h := range holes {
			if h.Out <= s.In || h.In >= s.Out {
				continue
			}
			if h.In > s.In {
				left = append(left, Span{s.In, h.In})
			}
			s.In = h.Out
		}
		if s.In < s.Out {
			left = append(left, s)
		}
	}
	return left
}

// Both is what is in A and in B.
type Both struct{ A, B Solid }

// Spans implements Solid.
func (m Both) Spans(r Ray) []Span {
	var list []Span
	for _, s := range m.A.Spans(r) {
		for _, t := range m.B.Spans(r) {
			if in, out := max(s.In, t.In), min(s.Out, t.Out); in < out {
				list = append(list, Span{in, out})
			}
		}
	}
	return list
}

// Union is what is in any of them.
type Union []Solid

// Spans implements Solid.
func (u Union) Spans(r Ray) []Span {
	var all []Span
	for _, s := range u {
		all = append(all, s.Spans(r)...)
	}
	slices.SortFunc(all, func(a, b Span) int {
		switch {
		case a.In < b.In:
			return -1
		case a.In > b.In:
			return 1
		}
		return 0
	})
	var merged []Span
	for _, s := range all {
		if k := len(merged); k > 0 && s.In <= merged[k-1].Out {
			merged[k-1].Out = max(merged[k-1].Out, s.Out)
			continue
		}
		merged = append(merged, s)
	}
	return merged
}

// Pipe is a straight pipe along Y around the origin.
type Pipe struct{ ODMM, WallMM float64 }

// Outer is its outside radius, mm.
func (p Pipe) Outer() float64 { return p.ODMM / 2 }

// Inner is its inside radius, mm.
func (p Pipe) Inner() float64 { return p.ODMM/2 - p.WallMM }

var alongY = Vec{0, 1, 0}

// Spans implements Solid.
func (p Pipe) Spans(r Ray) []Span {
	return Minus{Cylinder{Axis: alongY, Radius: p.Outer()}, Cylinder{Axis: alongY, Radius: p.Inner()}}.Spans(r)
}
