package materials

import "sort"

// spline is a cubic through all its nodes: not-a-knot at both ends from four
// nodes on, a parabola through three, a straight line through two. Both
// coordinates are logarithms where the package uses it.
type spline struct {
	x, y, s []float64 // nodes, values, slopes
}

// newSpline needs two or more nodes in rising order of x.
func newSpline(x, y []float64) spline {
	n := len(x)
	if n < 2 || len(y) != n {
		panic("materials: a spline needs two or more nodes")
	}
	h := make([]float64, n-1)
	q := make([]float64, n-1) // secants
	for i := range h {
		h[i] = x[i+1] - x[i]
		if h[i] <= 0 {
			panic("materials: the nodes of a spline must rise")
		}
		q[i] = (y[i+1] - y[i]) / h[i]
	}
	switch n {
	case 2:
		return spline{x, y, []float64{q[0], q[0]}}
	case 3:
		c := (q[1] - q[0]) / (h[0] + h[1])
		return spline{x, y, []float64{q[0] - c*h[0], q[0] + c*h[0], q[1] + c*h[1]}}
	}
	return spline{x, y, notAKnot(h, q)}
}

// notAKnot solves for the slopes at the nodes: continuous second derivative
// inside, continuous third derivative at the last but one node of each end.
func notAKnot(h, q []float64) []float64 {
	n := len(h) + 1
	lo, di, up, r := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	for i := 1; i < n-1; i++ {
		lo[i], di[i], up[i] = h[i], 2*(h[i-1]+h[i]), h[i-1]
		r[i] = 3 * (h[i]*q[i-1] + h[i-1]*q[i])
	}
	d := h[0] + h[1]
	di[0], up[0] = h[1], d
	r[0] = ((h[0]+2*d)*h[1]*q[0] + h[0]*h[0]*q[1]) / d
	a, b := h[n-3], h[n-2]
	d = a + b
	lo[n-1], di[n-1] = d, a
	r[n-1] = (b*b*q[n-3] + (2*d+b)*a*q[n-2]) / d
	for i := 1; i < n; i++ {
		w := lo[i] / di[i-1]
		di[i] -= w * up[i-1]
		r[i] -= w * r[i-1]
	}
	r[n-1] /= di[n-1]
	for i := n - 2; i >= 0; i-- {
		r[i] = (r[i] - up[i]*r[i+1]) / di[i]
	}
	return r
}

// at gives value and slope at x; outside the nodes the end piece goes on.
func (p spline) at(x float64) (y, slope float64) {
	i := min(max(sort.SearchFloat64s(p.x, x)-1, 0), len(p.x)-2)
	h := p.x[i+1] - p.x[i]
	q := (p.y[i+1] - p.y[i]) / h
	t := x - p.x[i]
	c3 := (p.s[i] + p.s[i+1] - 2*q) / (h * h)
	c2 := (q-p.s[i])/h - c3*h
	return p.y[i] + t*(p.s[i]+t*(c2+t*c3)), p.s[i] + t*(2*c2+t*3*c3)
}
