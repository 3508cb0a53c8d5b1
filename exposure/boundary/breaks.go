package boundary

import (
	"math"
	"slices"
)

// findBreaks finds the distances where the level may jump: at walls, at the
// edges of their shadows and of the beam.
func (r *ray) findBreaks(most float64) {
	s, f, list := r.s, r.s.f, r.breaks[:0]
	least := float64(LeastRopeM)
	add := func(r float64) {
		if r > least && r < most {
			list = append(list, r)
		}
	}
	for i := range r.shields.legs {
		l := &r.shields.legs[i]
		s.legBreaks(l, r.u, most, add)
	}
	if s.levelM != f.focus.Z || f.axis.Z != 0 {
		s.coneBreaks(r.u, add)
	}
	r.wallsTo = most
	for _, b := range list {
		r.wallsTo = min(r.wallsTo, b)
	}
	s.looks(least, most, add)
	slices.SortFunc(list, func(a, b float64) int {
		switch {
		case a > b:
			return -1
		case a < b:
			return 1
		}
		return 0
	})
	r.breaks = list
}

func (s *search) legBreaks(l *leg, u Vec, most float64, add func(float64)) {
	f := s.f
	o := f.focus
	if at, _, ok := (&leg{ax: l.ax, ay: l.ay, dx: l.dx, dy: l.dy, nx: l.nx, ny: l.ny, heightM: math.Inf(1)}).hit(Vec{o.X, o.Y, 0}, u.times(most)); ok {
		d := at * most
		add(d)
		if s.levelM != o.Z && l.heightM != o.Z {
			add(d * (s.levelM - o.Z) / (l.heightM - o.Z)) // where the ray clears the top
		}
	}
	for _, src := range s.others {
		if src == o {
			continue
		}
		for _, e := range [2]Vec{{X: l.ax, Y: l.ay}, {X: l.ax + l.dx, Y: l.ay + l.dy}} {
			wx, wy := e.X-src.X, e.Y-src.Y
			cross := u.X*wy - u.Y*wx
			if cross == 0 {
				continue
			}
			sx, sy := src.X-o.X, src.Y-o.Y
			if (sx*u.Y-sy*u.X)/cross < 1-1e-12 { // behind the end, seen from the source
				continue
			}
			add((sx*wy - sy*wx) / cross)
		}
	}
}

// looks adds distances where the level may not fall with distance: beside what
// stands off the source, and where walls are passed over at a slant.
func (s *search) looks(least, most float64, add func(float64)) {
	to := min(most, 2*s.offsetM+0.1)
	if s.levelM != s.f.focus.Z {
		to = most
	}
	for r := least * lookRatio; r < to; r *= lookRatio {
		add(r)
	}
}

const lookRatio = 1.08

// coneBreaks adds where the bearing enters or leaves the cone.
func (s *search) coneBreaks(u Vec, add func(float64)) {
	f := s.f
	z := s.levelM - f.focus.Z
	a, c2 := u.dot(f.axis), f.cosHalf*f.cosHalf
	p := a*a - c2
	q := 2 * a * z * f.axis.Z
	k := z*z*f.axis.Z*f.axis.Z - c2*z*z
	if p == 0 {
		if q != 0 {
			add(-k / q)
		}
		return
	}
	if d := q*q - 4*p*k; d >= 0 {
		add((-q + math.Sqrt(d)) / (2 * p))
		add((-q - math.Sqrt(d)) / (2 * p))
	}
}
