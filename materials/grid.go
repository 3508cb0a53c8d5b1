package materials

import (
	"math"
	"slices"
)

// A grid is a curve made ready for fast look-up: the octaves of energy are cut
// into 64 cells each, a cell holds a cubic in the energy, and the bits of the
// energy are the index, so that a look-up needs neither a search nor a
// logarithm. Against the interpolants it is off by less than 3e-7 above 3 keV
// and 2e-5 below (a test holds it to that). A cell with a break inside holds
// NaN and sends the look-up to the pieces.
type grid struct {
	cells  []cubic
	pieces []piece // rising, only those of cells with a break
}

// cubic is c0 + c1 t + c2 t^2 + c3 t^3, t from 0 to 1 over its interval.
type cubic [4]float64

type piece struct {
	from, to float64 // keV, from <= E < to
	cubic    cubic
}

const (
	cellBits  = 6 // 64 cells an octave
	cellShift = 52 - cellBits
	oneBits   = 0x3ff << 52 // the bits of 1 keV
	cellMask  = 1<<cellShift - 1
	cellStep  = 1.0 / (1 << cellShift)
)

// newGrid tabulates curve, which gives value and derivative at an energy, on
// the side of an edge where probe lies. The breaks, edges above all, rise.
func newGrid(breaks []float64, curve func(keV, probe float64) (v, dv float64)) *grid {
	return fill(breaks, func(_ int, from, to float64) cubic { return hermite(from, to, curve) }, curve)
}

// mixGrids adds the grids of elements by mass; only the cells with a break are
// tabulated anew.
func mixGrids(parts []*grid, mass, breaks []float64, curve func(keV, probe float64) (v, dv float64)) *grid {
	return fill(breaks, func(i int, _, _ float64) (sum cubic) {
		for j, g := range parts {
			for k, c := range g.cells[i] {
				sum[k] += mass[j] * c
			}
		}
		return sum
	}, curve)
}

// fill makes the cells without a break by whole and the others by piece.
func fill(breaks []float64, whole func(i int, from, to float64) cubic, curve func(keV, probe float64) (v, dv float64)) *grid {
	g := &grid{cells: make([]cubic, (math.Float64bits(LastKeV)-oneBits)>>cellShift+1)}
	for i := range g.cells {
		from := math.Float64frombits(oneBits + uint64(i)<<cellShift)
		to := math.Float64frombits(oneBits + uint64(i+1)<<cellShift)
		lo, _ := slices.BinarySearch(breaks, math.Nextafter(from, to))
		hi, _ := slices.BinarySearch(breaks, to)
		if lo == hi {
			g.cells[i] = whole(i, from, to)
			continue
		}
		g.cells[i] = cubic{math.NaN()}
		for _, e := range append(slices.Clone(breaks[lo:hi]), to) {
			g.pieces = append(g.pieces, piece{from, e, hermite(from, e, curve)})
			from = e
		}
	}
	return g
}

// hermite gives the cubic with the curve's values and derivatives at both ends.
func hermite(from, to float64, curve func(keV, probe float64) (v, dv float64)) cubic {
	h, mid := to-from, (from+to)/2
	a, da := curve(from, mid)
	b, db := curve(to, mid)
	da, db = da*h, db*h
	return cubic{a, da, 3*(b-a) - 2*da - db, 2*(a-b) + da + db}
}

// at gives the curve's value; NaN outside 1 to 20000 keV and for NaN. At an
// edge it is the value above it.
func (g *grid) at(keV float64) float64 {
	bits := math.Float64bits(keV) - oneBits
	i := bits >> cellShift
	if i >= uint64(len(g.cells)) || keV > LastKeV {
		return math.NaN()
	}
	c := &g.cells[i]
	v := c.at(float64(int64(bits&cellMask)) * cellStep)
	if v != v {
		return g.piece(keV)
	}
	return v
}

func (c *cubic) at(t float64) float64 { return c[0] + t*(c[1]+t*(c[2]+t*c[3])) }

func (g *grid) piece(keV float64) float64 {
	i, found := slices.BinarySearchFunc(g.pieces, keV, func(p piece, e float64) int {
		switch {
		case p.to <= e:
			return -1
		case p.from > e:
			return 1
		}
		return 0
	})
	if !found {
		return math.NaN()
	}
	p := &g.pieces[i]
	return p.cubic.at((keV - p.from) / (p.to - p.from))
}
