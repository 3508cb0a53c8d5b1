package photon

import "math"

// window is the weight that a photon should have by depth. Its bins are even
// in the optical depth that the stack has for the source's mean energy.
type window struct {
	from    []float64 // by layer: optical depth where it starts
	slope   []float64 // by layer: bins per g/cm2
	begin   []float64 // by layer: depth where it starts
	inverse [windowBins]float64
	perKeV  float64             // one over the mean energy of the source
	peak    [windowBins]float64 // the largest inverse up to here
	center  [windowBins]float64 // optical depth
}

const (
	windowBins = 64
	// collisions per history that the window aims at
	perHistory = 15
)

func newWindow(g *geometry) window {
	var w window
	var e float64
	for i, k := range g.keV {
		e += g.share[i] * k
	}
	w.perKeV = 1 / e
	all := g.opticalDepth(e, g.bounds[len(g.bounds)-1])
	var z, x float64
	for i, l := range g.layers {
		mu := l.Medium.MuRho(e)
		w.from = append(w.from, x/all*windowBins)
		w.slope = append(w.slope, mu/all*windowBins)
		w.begin = append(w.begin, z)
		x += mu * (g.bounds[i] - z)
		z = g.bounds[i]
	}
	for b := range w.center {
		w.center[b] = (float64(b) + 0.5) / windowBins * all
	}
	return w
}

func (w *window) bin(layer int, z float64) int {
	b := int(w.from[layer] + (z-w.begin[layer])*w.slope[layer])
	return max(0, min(windowBins-1, b))
}

// stop gives the depth where a photon on its way down to z, in its layer,
// should be split because it flies too heavy, or z. Whether it stops at a depth
// must not hang on how far it would have gone, else its free path could not be
// drawn anew.
func (w *window) stop(p *particle, z float64) float64 {
	last := w.bin(p.layer, z)
	worth := w.worth(p)
	if worth*w.peak[last] <= 2 {
		return z
	}
	for b := w.bin(p.layer, p.z) + 1; b <= last; b++ {
		if worth*w.inverse[b] > 2 {
			// a hair inside the bin, so that rounding cannot put it back
			return w.begin[p.layer] + (float64(b)+1e-6-w.from[p.layer])/w.slope[p.layer]
		}
	}
	return z
}

// pilot sets the window from the weight of collisions that short runs find,
// first with a slow guess, then with what the guess found.
func (g *geometry) pilot(seed uint64) {
	w := &g.window
	slope := 0.8 * g.softest()
	for b, x := range w.center {
		w.inverse[b] = math.Exp(slope*x) * w.wanted(x)
	}
	w.crest()
	for i := range 3 {
		p := newWalker(g, seed, pilotStream+uint64(i))
		p.run(pilotStarts)
		w.set(p.seen)
	}
}

// softest is how much less the stack can attenuate photons that have lost
// energy than those of the mean source energy: below 1 above a K edge.
func (g *geometry) softest() float64 {
	var e, top float64
	for i, k := range g.keV {
		e += g.share[i] * k
		top = max(top, k)
	}
	all := g.bounds[len(g.bounds)-1]
	least := g.opticalDepth(e, all)
	at := least
	for k := CutKeV * 1.0; k < top; k *= 1.01 {
		least = min(least, g.opticalDepth(k, all))
	}
	return least / at
}

const (
	pilotStarts = 1000
	pilotStream = 1 << 32
)

// wanted is the density of collisions over depth, up to a factor.
func (w *window) wanted(x float64) float64 {
	all := w.center[windowBins-1]
	return 1/((x+early)*math.Log1p(all/early)) + 2*x/(all*all)
}

// set gives each depth its share of the collisions. seen is the worth of
// collisions per source photon by bin; where the pilot hardly saw a bin, it is
// taken to fall a little faster than the source's own beam.
func (w *window) set(seen []float64) {
	fall := math.Exp(-1.2 * (w.center[1] - w.center[0]))
	var sum, last float64
	for b := range seen {
		sum += w.wanted(w.center[b])
	}
	for b := range seen {
		last = max(seen[b], last*fall)
		w.inverse[b] = perHistory * w.wanted(w.center[b]) / sum / last
	}
	w.crest()
}

func (w *window) crest() {
	var high float64
	for b, v := range w.inverse {
		high = max(high, v)
		w.peak[b] = high
	}
}

const maxSplit = 50

// worth is the weight by which a photon is judged: soft ones, which reach less
// far and are collided with more often, count less.
func (w *window) worth(p *particle) float64 { return p.w * math.Sqrt(p.e*w.perKeV) }

// split gives the number of photons, 0 to maxSplit, that stand for p in a bin
// of the window, and sets their weight.
func (w *window) split(p *particle, bin int, r *random) int {
	ratio := w.worth(p) * w.inverse[bin]
	if ratio <= 2 && ratio >= 0.5 {
		return 1
	}
	n := int(ratio + r.unit())
	if n > maxSplit {
		p.w /= maxSplit
		return maxSplit
	}
	p.w /= ratio
	return n
}
