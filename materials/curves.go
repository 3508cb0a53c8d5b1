package materials

import (
	"math"
	"sort"
	"sync"
)

// Range of the tables, keV.
const (
	FirstKeV = 1
	LastKeV  = 20000
)

// Thresholds of pair production in the field of a nucleus and of an electron,
// keV, as XCOM has them.
const (
	pairKeV    = 1022
	tripletKeV = 2044
)

const avogadro = 0.602214076 // per mol, times 1e-24 cm2

// curves are the interpolants of one element, logarithm of cm2/g against
// logarithm of keV.
type curves struct {
	coherent, incoherent spline
	photo                []segment
	pair                 spline    // of sigma/(1-1022/E)^3, nucleus and electrons together
	electrons            float64   // per 1e-24 g: Z N/A, scales the triplet curve
	breaks               []float64 // where segments meet, keV: edges, mostly
}

// segment is the photoelectric curve from one edge to the next.
type segment struct {
	fromKeV float64
	spline  spline
}

// curves gives the interpolants, made on first use.
func (r *record) interpolants() *curves {
	r.once.Do(func() {
		c := &curves{electrons: float64(r.Z) * avogadro / r.AtomicWeight}
		c.coherent = smooth(r.nodes, func(n node) float64 { return n.coherent })
		c.incoherent = smooth(r.nodes, func(n node) float64 { return n.incoherent })
		c.pair = aboveThreshold(r.nodes, pairKeV)
		c.photo = segments(r.nodes)
		for _, s := range c.photo[1:] {
			c.breaks = append(c.breaks, s.fromKeV)
		}
		r.curves = c
	})
	return r.curves
}

// smooth runs through a process that knows no edges. Nodes closer than 1 % to
// the one before are left out: there the five digits of the table would set
// the slope, not the physics.
func smooth(nodes []node, of func(node) float64) spline {
	var x, y []float64
	for _, n := range nodes {
		u := math.Log(n.keV)
		if len(x) > 0 && u-x[len(x)-1] < 0.01 {
			continue
		}
		x, y = append(x, u), append(y, math.Log(of(n)))
	}
	return newSpline(x, y)
}

// segments cuts the photoelectric curve at its edges. Where the outermost
// interval of a cut is under 2 % wide it becomes a straight line of its own:
// the value printed at an edge is too coarse to set the slope beyond the node
// beside it (mercury above 15, actinium above 20 and thulium above 60 keV swung by 1 to 5 %).
func segments(nodes []node) []segment {
	var all []segment
	start := 0
	for i := 1; i <= len(nodes); i++ {
		if i < len(nodes) && nodes[i].keV != nodes[i-1].keV {
			continue
		}
		part := nodes[start:i]
		start = i
		if n := len(part); n > 2 && part[1].keV < part[0].keV*narrow {
			all = append(all, photoSegment(part[:2]))
			part = part[1:]
		}
		var tail []node
		if n := len(part); n > 2 && part[n-1].keV < part[n-2].keV*narrow {
			tail, part = part[n-2:], part[:n-1]
		}
		if len(part) > 1 {
			all = append(all, photoSegment(part))
		}
		if tail != nil {
			all = append(all, photoSegment(tail))
		}
	}
	return all
}

// narrow is the ratio of energies below which an interval beside an edge
// stands alone. Tin (29.2 to 30 keV) and platinum (78.4 to 80 keV) have the
// same flaw in slightly wider intervals; they keep the plain rule, as xraylib
// does, and read up to 2.7 % high at 31 to 39 keV and up to 4 % low or 2 % high
// at 81 to 145 keV against the line between their neighbours in Z.
const narrow = 1.02

func photoSegment(part []node) segment {
	x, y := make([]float64, len(part)), make([]float64, len(part))
	for i, n := range part {
		x[i], y[i] = math.Log(n.keV), math.Log(n.photo)
	}
	return segment{part[0].keV, newSpline(x, y)}
}

// aboveThreshold runs through sigma/(1-threshold/E)^3, which is smooth and
// nowhere zero, as the cross section itself is not.
func aboveThreshold(nodes []node, threshold float64) spline {
	var x, y []float64
	for _, n := range nodes {
		if n.keV <= threshold || n.pair == 0 {
			continue
		}
		u := math.Log(n.keV)
		if len(x) > 0 && u == x[len(x)-1] {
			continue
		}
		x, y = append(x, u), append(y, math.Log(n.pair/cube(1-threshold/n.keV)))
	}
	return newSpline(x, y)
}

// triplet is pair production in the field of one electron, 1e-24 cm2 over
// (1-2044/E)^3. XCOM's arrays hold only the sum of both pair processes; it
// falls apart without a model because the nucleus counts as Z^2 and the
// electrons as Z: from hydrogen H and helium He, per atom, e = (4 H - He)/2.
// The corrections that break this (Coulomb, screening) are of the order of
// (Z/137)^2; the split found agrees with lithium, beryllium and carbon within
// 2 % to 20 MeV. The sum is never touched.
var triplet = sync.OnceValue(func() spline {
	h, he := table()[1].nodes, table()[2].nodes
	helium := map[float64]float64{}
	for _, n := range he {
		helium[n.keV] = n.pair
	}
	var nodes []node
	for _, n := range h {
		if b, ok := helium[n.keV]; ok && n.keV > 2500 {
			e := (4*n.pair*1.00794 - b*4.002602) / 2 / avogadro // the atomic weights that XCOM used
			nodes = append(nodes, node{keV: n.keV, pair: e})
		}
	}
	return aboveThreshold(nodes, tripletKeV)
})

// at gives one process in cm2/g and its derivative by keV. Which side of an
// edge is meant is told by probe, an energy on that side.
func (c *curves) at(p Process, keV, probe float64) (v, dv float64) {
	u := math.Log(keV)
	switch p {
	case Coherent:
		return powerOf(c.coherent, u, keV)
	case Incoherent:
		return powerOf(c.incoherent, u, keV)
	case Photoelectric:
		i := sort.Search(len(c.photo), func(i int) bool { return c.photo[i].fromKeV > probe })
		return powerOf(c.photo[max(i-1, 0)].spline, u, keV)
	case PairElectron:
		v, dv = fromThreshold(triplet(), tripletKeV, u, keV)
		return v * c.electrons, dv * c.electrons
	case PairNuclear:
		v, dv = fromThreshold(c.pair, pairKeV, u, keV)
		e, de := c.at(PairElectron, keV, probe)
		return v - e, dv - de
	}
	return math.NaN(), math.NaN()
}

// powerOf turns a curve of logarithms back into values.
func powerOf(s spline, u, keV float64) (v, dv float64) {
	y, slope := s.at(u)
	v = math.Exp(y)
	return v, v * slope / keV
}

func fromThreshold(s spline, threshold, u, keV float64) (v, dv float64) {
	if keV <= threshold {
		return 0, 0
	}
	v, dv = powerOf(s, u, keV)
	f := 1 - threshold/keV
	return v * cube(f), dv*cube(f) + v*3*f*f*threshold/(keV*keV)
}

func cube(x float64) float64 { return x * x * x }
