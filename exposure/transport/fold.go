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
	sum [][]coefficients // by base, by node
}

func newFold() *fold {
	t := table()
	f := &fold{sum: make([][]coefficients, len(t))}
	return f
}

// add asks for photons of an energy, x mean free paths of material, n photons/cm2 incident.
func (f *fold) add(b *blend, keV, x, n float64) {
	if !(n > 0) || x <= 0 {
		return
	}
	ln := math.Log(keV)
	var w [4]float64
	k, m := planeWeights(x, &w)
	for _, s := range b.at(ln) {
		if s.weight == 0 {
			continue
		}
		t := &table()[s.base]
		if f.sum[s.base] == nil {
			f.sum[s.base] = make([]coefficients, len(t.nodes))
		}
		j := search(t.lnKeV, ln)
		u := (ln - t.lnKeV[j]) / (t.lnKeV[j+1] - t.lnKeV[j])
		u = max(0, min(1, u)) // below the first node its ratios stand, which are larger
		f.sum[s.base][j].add(&t.nodes[j], keV, x, n*s.weight*(1-u), k, w[:m])
		f.sum[s.base][j+1].add(&t.nodes[j+1], keV, x, n*s.weight*u, k, w[:m])
	}
}

// spent is the exponent past which a photon's share is dropped: 1e-26 of it at most.
const spent = 60

func (c *coefficients) add(node *node, keV, x, n float64, k int, w []float64) {
	last := planes[planeCount-1]
	ex := node.decay * min(x, last)
	if x > last {
		ex += node.beyond * (x - last)
	}
	if n == 0 || ex > spent {
		return
	}
	a := n * math.Exp(-ex)
	for i, v := range w {
		c.amount[k+i] += a * v
	}
	c.shift += a * (1/keV - node.inverse)
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
