package photon

import (
	"fmt"
	"math"
	"sort"
	"sync"
)

// Layer is one material of a stack.
type Layer struct {
	Medium  *Medium
	GPerCM2 float64 // mass thickness
}

// Slab describes a run: a plane-parallel beam falls on a stack of layers,
// normally if Cosine is not set. Planes inside the stack stand for thinner slabs: what crosses a
// plane for the first time is what leaves the far side of the slab that ends
// there, since a photon's way up to then does not know what lies behind. So
// one run answers for every thickness.
type Slab struct {
	Layers    []Layer
	Planes    []float64 // rising depths, g/cm2; the last is the whole stack; nil: only the last
	KeV       []float64 // source lines
	Weight    []float64 // photons in each, any unit; nil: one each
	Cosine    float64   // of the beam against the normal; 0: 1
	Histories int       // first collisions in all batches
	Batches   int       // 0: 16
	Seed      uint64
	Workers   int // 0: 1
}

// Result is the mean over the batches.
type Result struct {
	Planes     []Plane
	Primary    []float64 // uncollided air kerma behind each plane, pGy cm2 per incident photon/cm2
	RelErr     []float64 // one sigma of Kerma, relative; 1 where nothing came
	Incident   float64   // energy per incident photon, keV
	Uncollided float64   // energy that leaves uncollided behind the last plane, keV
	Deposited  float64   // energy left in the whole stack by collisions, keV
	Collisions int64     // of split photons, for the speed
}

// Run does the histories.
func (s Slab) Run() (Result, error) {
	g, err := newGeometry(s)
	if err != nil {
		return Result{}, err
	}
	g.pilot(s.Seed)
	batches := s.Batches
	if batches == 0 {
		batches = 16
	}
	each := max(1, s.Histories/batches)
	all := make([]*walker, batches)
	var wg sync.WaitGroup
	next := make(chan int)
	for range max(1, s.Workers) {
		wg.Go(func() {
			for b := range next {
				w := newWalker(g, s.Seed, uint64(b)+1)
				w.run(each)
				all[b] = w
			}
		})
	}
	for b := range all {
		next <- b
	}
	close(next)
	wg.Wait()
	return g.gather(all), nil
}

// geometry is what all batches share and do not change.
type geometry struct {
	layers []Layer
	bounds []float64 // depths where layers end
	planes []float64
	keV    []float64
	upTo   []float64 // summed share of the source lines
	share  []float64
	depth  []float64 // mean free paths through the whole stack along the beam, for each line
	cosine float64
	window window
}

func newGeometry(s Slab) (*geometry, error) {
	g := &geometry{layers: s.Layers, planes: s.Planes, keV: s.KeV, cosine: 1}
	if s.Cosine != 0 {
		g.cosine = s.Cosine
	}
	if !(g.cosine > 0.01 && g.cosine <= 1) {
		return nil, fmt.Errorf("photon: cosine \"%g\" of the beam is outside 0.01 to 1", s.Cosine)
	}
	var z float64
	for i, l := range s.Layers {
		if l.Medium == nil || !(l.GPerCM2 > 0) || math.IsInf(l.GPerCM2, 0) {
			return nil, fmt.Errorf("photon: layer %d needs a medium and a positive mass thickness, got \"%g\"", i+1, l.GPerCM2)
		}
		z += l.GPerCM2
		g.bounds = append(g.bounds, z)
	}
	if len(g.bounds) == 0 || len(s.KeV) == 0 || s.Histories < 1 {
		return nil, fmt.Errorf("photon: a run needs layers, source lines and histories")
	}
	if g.planes == nil {
		g.planes = []float64{z}
	}
	if n := len(g.planes); !sort.Float64sAreSorted(g.planes) || !(g.planes[0] > 0) || math.Abs(g.planes[n-1]/z-1) > 1e-9 {
		return nil, fmt.Errorf("photon: planes must rise from above 0 to the whole depth %g", z)
	}
	g.planes = append([]float64(nil), g.planes...)
	g.planes[len(g.planes)-1] = z
	if err := g.source(s); err != nil {
		return nil, err
	}
	g.window = newWindow(g)
	return g, nil
}

func (g *geometry) source(s Slab) error {
	var sum float64
	for i, e := range s.KeV {
		if !(e > CutKeV && e <= MaxKeV) {
			return fmt.Errorf("photon: source energy \"%g\" keV is outside %d to %d", e, CutKeV, MaxKeV)
		}
		w := 1.0
		if s.Weight != nil {
			w = s.Weight[i]
		}
		if !(w >= 0) {
			return fmt.Errorf("photon: source weight \"%g\" is negative", w)
		}
		sum += w
		g.share = append(g.share, w)
		g.upTo = append(g.upTo, sum)
		g.depth = append(g.depth, g.opticalDepth(e, g.bounds[len(g.bounds)-1])/g.cosine)
	}
	if !(sum > 0) {
		return fmt.Errorf("photon: the source is empty")
	}
	for i := range g.share {
		g.share[i] /= sum
		g.upTo[i] /= sum
	}
	return nil
}

// opticalDepth counts mean free paths from the surface to depth z.
func (g *geometry) opticalDepth(e, z float64) float64 {
	var x, from float64
	for i, l := range g.layers {
		x += l.Medium.MuRho(e) * (min(z, g.bounds[i]) - from)
		if z <= g.bounds[i] {
			break
		}
		from = g.bounds[i]
	}
	return x
}

// depthOf is the inverse of opticalDepth; it gives the layer too.
func (g *geometry) depthOf(e, x float64) (z float64, layer int) {
	var from float64
	for i, l := range g.layers {
		mu := l.Medium.MuRho(e)
		if d := mu * (g.bounds[i] - from); x <= d || i == len(g.layers)-1 {
			return min(from+x/mu, g.bounds[i]), i
		} else {
			x -= d
		}
		from = g.bounds[i]
	}
	return from, len(g.layers) - 1
}

// gather adds the batches in order and turns what came back through the near
// side before a plane was reached into sums over the slabs.
func (g *geometry) gather(all []*walker) Result {
	n := len(g.planes)
	r := Result{Planes: make([]Plane, n), Primary: make([]float64, n), RelErr: make([]float64, n)}
	sum2 := make([]float64, n)
	for _, w := range all {
		s := 1 / float64(len(all))
		for k := range w.planes {
			r.Planes[k].add(&w.planes[k], s)
			sum2[k] += s * w.planes[k].Kerma * w.planes[k].Kerma
		}
		r.Deposited += s * w.deposited
		r.Collisions += w.collisions
	}
	for k := range r.Planes {
		p := &r.Planes[k]
		if k > 0 {
			p.Return += r.Planes[k-1].Return
			for a := range p.Backward {
				for i := range p.Backward[a] {
					p.Backward[a][i] += r.Planes[k-1].Backward[a][i]
				}
			}
		}
		r.RelErr[k] = 1
		if p.Kerma > 0 {
			v := (sum2[k] - p.Kerma*p.Kerma) / float64(max(1, len(all)-1))
			r.RelErr[k] = min(1, math.Sqrt(max(0, v))/p.Kerma)
		}
		for i, e := range g.keV {
			r.Primary[k] += g.share[i] * math.Exp(-g.opticalDepth(e, g.planes[k])/g.cosine) * kerma(e)
		}
	}
	for i, e := range g.keV {
		r.Incident += g.share[i] * e
		r.Uncollided += g.share[i] * e * math.Exp(-g.depth[i])
	}
	return r
}
