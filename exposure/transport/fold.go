package transport

import (
	"math"

	"halfvalue/exposure/transport/internal/photon"
)

// spread is scattered fluence by exit bin, with energy moments.
type spread struct {
	flux [exitBins]float64 // photons/cm2
	keV  [exitBins]float64 // times energy
	err2 float64           // square of the error of its air kerma, pGy
}

// coefficients collect what a spectrum asks of one base: how much of each
// node's energy and thickness, and how far the node's photons must be shifted
// in inverse energy, which Compton scattering carries through.
type coefficients struct {
	amount [planeCount]float64
	shift  float64 // sum of amount times (1/E - 1/node)
	weight float64
}

// fold is one use of the tables.
type fold struct {
	sum   [][]coefficients // by base, by node
	least float64          // the smallest exponent so far
}

func newFold() *fold {
	return &fold{sum: make([][]coefficients, len(table())), least: math.Inf(1)}
}

// add asks for photons of an energy, x mean free paths of material, n
// photons/cm2 incident. Between the two nodes of energy and the two bases the
// decay is interpolated like the tables that it belongs to: one exponential serves all four.
func (f *fold) add(b *blend, keV, x, n float64) {
	if !(n > 0) || x <= 0 {
		return
	}
	lg := octaves(keV)
	t := table()
	var at [2]place
	var decay, beyond float64
	pair := b.at(lg)
	for i, s := range pair {
		if s.weight == 0 {
			continue
		}
		p := t[s.base].find(lg)
		lo, hi := &t[s.base].nodes[p.node], &t[s.base].nodes[p.node+1]
		decay += s.weight * (lo.decay + p.part*(hi.decay-lo.decay))
		beyond += s.weight * (lo.beyond + p.part*(hi.beyond-lo.beyond))
		at[i] = p
	}
	last := planes[planeCount-1]
	ex := decay * min(x, last)
	if x > last {
		ex += beyond * (x - last)
	}
	if ex > f.least+spent {
		return
	}
	f.least = min(f.least, ex)
	a := n * math.Exp(-ex)
	var w [4]float64
	k, m := planeWeights(x, &w)
	for i, s := range pair {
		if s.weight == 0 {
			continue
		}
		sum := f.sum[s.base]
		if sum == nil {
			sum = make([]coefficients, len(t[s.base].nodes))
			f.sum[s.base] = sum
		}
		p, v := at[i], a*s.weight
		nodes := t[s.base].nodes
		sum[p.node].add(1/keV-nodes[p.node].inverse, v*(1-p.part), k, w[:m])
		sum[p.node+1].add(1/keV-nodes[p.node+1].inverse, v*p.part, k, w[:m])
	}
}

// place is where an energy lies between the nodes of a base.
type place struct {
	node int
	part float64 // 0 to 1
}

// find gives the place of an energy; below the first node its ratios stand,
// which are larger.
func (b *base) find(lg float64) place {
	j := int(b.start[max(0, min(startCount-1, int(lg*startsPerOctave)))])
	for j < len(b.octaves)-2 && b.octaves[j+1] <= lg {
		j++
	}
	u := (lg - b.octaves[j]) / (b.octaves[j+1] - b.octaves[j])
	return place{j, max(0, min(1, u))}
}

// octaves counts octaves above 8 keV, straight inside each: a logarithm for
// interpolation that costs nothing.
func octaves(keV float64) float64 {
	return float64(int64(math.Float64bits(keV)-eightKeV)) * (1.0 / (1 << 52))
}

const (
	eightKeV        = (0x3ff + 3) << 52 // the bits of 8 keV
	startsPerOctave = 16
	startCount      = 9 * startsPerOctave
)

// spent is how much more attenuated than another a photon may be before it is
// dropped: 1e-26 of it then comes through at most.
const spent = 60

func (c *coefficients) add(shift, a float64, k int, w []float64) {
	for i, v := range w {
		c.amount[k+i] += a * v
	}
	c.shift += a * shift
	c.weight += a
}

// search gives the interval of a rising list that holds v, from the ends.
func search(list []float64, v float64) int {
	lo, hi := 0, len(list)-1
	for hi-lo > 1 {
		if m := (lo + hi) / 2; list[m] <= v {
			lo = m
		} else {
			hi = m
		}
	}
	return lo
}

// planeWeights interpolates over thickness: straight below half a mean free
// path, cubic above, the last node beyond. It gives the first node and how many.
func planeWeights(x float64, w *[4]float64) (first, count int) {
	last := planeCount - 1
	if x >= planes[last] {
		w[0] = 1
		return last, 1
	}
	k := search(planes, x)
	if planes[k+1] <= 0.5 {
		t := (x - planes[k]) / (planes[k+1] - planes[k])
		w[0], w[1] = 1-t, t
		return k, 2
	}
	first = min(k-1, last-3)
	var d [4]float64
	for i := range d {
		d[i] = x - planes[first+i]
	}
	l := &lagrange[first]
	w[0] = d[1] * d[2] * d[3] * l[0]
	w[1] = d[0] * d[2] * d[3] * l[1]
	w[2] = d[0] * d[1] * d[3] * l[2]
	w[3] = d[0] * d[1] * d[2] * l[3]
	return first, 4
}

// lagrange holds the reciprocals of the products of the distances of four
// neighbouring nodes, from each first one.
var lagrange = func() (l [planeCount - 3][4]float64) {
	for first := range l {
		for i := range 4 {
			v := 1.0
			for j := range 4 {
				if j != i {
					v *= planes[first+i] - planes[first+j]
				}
			}
			l[first][i] = 1 / v
		}
	}
	return l
}()

// result sums the tables.
func (f *fold) result() spread {
	var out spread
	for i := range f.sum {
		for j := range f.sum[i] {
			if c := &f.sum[i][j]; c.weight > 0 {
				c.deposit(&table()[i].nodes[j], &out)
			}
		}
	}
	return out
}

func (c *coefficients) deposit(n *node, out *spread) {
	var flux, keV [exitBins]float64
	var err float64
	for k, a := range c.amount {
		if a == 0 {
			continue
		}
		err += a * n.kerma[k] * n.relErr[k]
		from, energy := &n.flux[k], &n.energy[k]
		for i := range n.bins {
			flux[i] += a * from[i]
			keV[i] += a * energy[i]
		}
	}
	out.err2 += err * err
	shift := c.shift / c.weight
	for i, v := range flux[:n.bins] {
		if v == 0 || keV[i] == 0 {
			continue
		}
		e := 1 / (v/keV[i] + shift)
		to := binOf(e, i)
		out.flux[to] += v
		out.keV[to] += v * e
	}
}

// binOf gives the bin of an energy near bin i.
func binOf(e float64, i int) int {
	for i > 0 && e < photon.ExitEdgesKeV[i] {
		i--
	}
	for i < exitBins-1 && e >= photon.ExitEdgesKeV[i+1] {
		i++
	}
	return i
}
