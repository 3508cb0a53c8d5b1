package beam

import "math"

// table is a smooth function on a regular grid of two coordinates, kept as
// cubic Lagrange interpolation reads it.
type table struct {
	x0, dx float64
	y0, dy float64
	rows   [][]float64 // by x, then y
}

// newTable fills a table of nx by ny nodes from x0 to x1 and y0 to y1.
func newTable(x0, x1 float64, nx int, y0, y1 float64, ny int, f func(x, y float64) float64) *table {
	t := &table{x0: x0, dx: (x1 - x0) / float64(nx-1), y0: y0, dy: (y1 - y0) / float64(ny-1)}
	for i := range nx {
		row := make([]float64, ny)
		for j := range row {
			row[j] = f(x0+float64(i)*t.dx, y0+float64(j)*t.dy)
		}
		t.rows = append(t.rows, row)
	}
	return t
}

// row writes the nodes in y at x into dst.
func (t *table) row(x float64, dst []float64) {
	i, w := lagrange((x-t.x0)/t.dx, len(t.rows))
	a, b, c, d := t.rows[i], t.rows[i+1], t.rows[i+2], t.rows[i+3]
	for j := range dst {
		dst[j] = w[0]*a[j] + w[1]*b[j] + w[2]*c[j] + w[3]*d[j]
	}
}

// at gives the value at x, y.
func (t *table) at(x, y float64) float64 {
	i, w := lagrange((x-t.x0)/t.dx, len(t.rows))
	j, v := lagrange((y-t.y0)/t.dy, len(t.rows[0]))
	var sum float64
	for k := range w {
		r := t.rows[i+k]
		sum += w[k] * (v[0]*r[j] + v[1]*r[j+1] + v[2]*r[j+2] + v[3]*r[j+3])
	}
	return sum
}

// lagrange gives the first of the four nodes of n to read at position p, in
// steps from node 0, and their weights.
func lagrange(p float64, n int) (first int, w [4]float64) {
	first = max(0, min(int(math.Floor(p))-1, n-4))
	t := p - float64(first)
	a, b, c, d := t, t-1, t-2, t-3
	return first, [4]float64{-b * c * d / 6, a * c * d / 2, -a * b * d / 2, a * b * c / 6}
}

// gauss holds nodes on 0..1 and weights of Gauss-Legendre integration.
type gauss struct{ x, w []float64 }

// newGauss gives the rule of n nodes, by Newton's method on the polynomial.
func newGauss(n int) gauss {
	g := gauss{make([]float64, n), make([]float64, n)}
	for i := range n {
		z := math.Cos(math.Pi * (float64(i) + 0.75) / (float64(n) + 0.5))
		var slope float64
		for range 50 {
			p, q := 1.0, 0.0
			for j := range n {
				p, q = (float64(2*j+1)*z*p-float64(j)*q)/float64(j+1), p
			}
			slope = float64(n) * (z*p - q) / (z*z - 1)
			step := p / slope
			z -= step
			if math.Abs(step) < 1e-15 {
				break
			}
		}
		g.x[i] = (1 - z) / 2
		g.w[i] = 1 / ((1 - z*z) * slope * slope)
	}
	return g
}
