package photon

import (
	"math"
	"sort"
)

// particle is a photon between two collisions, or about to collide.
type particle struct {
	z, u, e, w float64
	layer      int
	plane      int // first plane not yet crossed
}

// walker does one batch.
type walker struct {
	*geometry
	r          *random
	planes     []Plane
	deposited  float64
	collisions int64
	seen       []float64 // worth of collisions by window bin, for the pilot
	todo       []particle
}

func newWalker(g *geometry, seed, stream uint64) *walker {
	return &walker{geometry: g, r: newRandom(seed, stream), planes: make([]Plane, len(g.planes)), seen: make([]float64, windowBins)}
}

// early shapes the depths of the first collisions, with x mean free paths of a
// stack of X: half have the density 1/(x+early), so that thin slabs get their
// share, half are even.
const early = 0.4

// run starts n first collisions, stratified over source lines and, inside a
// line, over depth.
func (w *walker) run(n int) {
	for i := range n {
		q := (float64(i) + w.r.unit()) / float64(n)
		line := sort.SearchFloat64s(w.upTo, q)
		line = min(line, len(w.keV)-1)
		from := w.upTo[line] - w.share[line]
		q = (q - from) / w.share[line]
		w.start(line, min(max(q, 0), 1))
		for len(w.todo) > 0 {
			p := w.todo[len(w.todo)-1]
			w.todo = w.todo[:len(w.todo)-1]
			w.follow(p)
		}
	}
	for k := range w.planes {
		var mean Plane
		mean.add(&w.planes[k], 1/float64(n))
		w.planes[k] = mean
	}
	for b := range w.seen {
		w.seen[b] /= float64(n)
	}
	w.deposited /= float64(n)
}

// start puts a source photon at its first collision, the q-th part of the way
// through the density of depths.
func (w *walker) start(line int, q float64) {
	e, all := w.keV[line], w.depth[line]
	span := math.Log1p(all / early)
	var x float64
	if q < 0.5 {
		x = early * math.Expm1(2*q*span)
	} else {
		x = (2*q - 1) * all
	}
	density := 0.5/((x+early)*span) + 0.5/all
	z, layer := w.depthOf(e, x*w.cosine)
	p := particle{z: z, u: w.cosine, e: e, layer: layer, w: math.Exp(-x) / density}
	p.plane = sort.SearchFloat64s(w.geometry.planes, z)
	if p.plane < len(w.planes) {
		w.collide(p)
	}
}

// collide reduces the weight by what is absorbed, applies the window and puts
// the scattered photons on the list.
func (w *walker) collide(p particle) {
	m := w.layers[p.layer].Medium
	c, t := m.at(p.e)
	in := p.w * p.e
	p.w *= c.live + t*c.dlive
	bin := w.window.bin(p.layer, p.z)
	w.seen[bin] += w.window.worth(&p)
	n := w.window.split(&p, bin, w.r)
	w.deposited += in
	w.collisions += int64(n)
	for range n {
		q := p
		q.e, q.u = m.collide(w.r, c, t, p.e, p.u)
		if q.e < CutKeV {
			continue
		}
		w.deposited -= q.w * q.e
		w.todo = append(w.todo, q)
	}
}

// cross scores the planes up to depth z that p passes for the first time.
func (w *walker) cross(p *particle, z float64) {
	for p.plane < len(w.planes) && w.geometry.planes[p.plane] <= z {
		w.planes[p.plane].leave(p.w, p.e, p.u)
		p.plane++
	}
}

// follow moves a photon to its next collision, or out.
func (w *walker) follow(p particle) {
	free := -math.Log(w.r.unit())
	for {
		step := free / w.layers[p.layer].Medium.MuRho(p.e)
		z := p.z + p.u*step
		if p.u > 0 {
			end := w.bounds[p.layer]
			if stop := w.window.stop(&p, min(z, end)); stop < min(z, end) {
				w.cross(&p, stop)
				p.z = stop
				n := w.window.split(&p, w.window.bin(p.layer, stop), w.r)
				if n == 0 {
					return
				}
				for range n - 1 {
					w.todo = append(w.todo, p)
				}
				free = -math.Log(w.r.unit())
				continue
			}
			w.cross(&p, min(z, end))
			if z > end {
				if p.layer == len(w.layers)-1 {
					return
				}
				free -= (end - p.z) / p.u * w.layers[p.layer].Medium.MuRho(p.e)
				p.z = end
				p.layer++
				continue
			}
		} else {
			var start float64
			if p.layer > 0 {
				start = w.bounds[p.layer-1]
			}
			if z < start {
				if p.layer == 0 {
					w.planes[p.plane].back(p.w, p.e, -p.u)
					return
				}
				free -= (start - p.z) / p.u * w.layers[p.layer].Medium.MuRho(p.e)
				p.z = start
				p.layer--
				continue
			}
		}
		if p.plane == len(w.planes) {
			return
		}
		p.z = z
		w.collide(p)
		return
	}
}
