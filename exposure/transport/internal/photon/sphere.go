package photon

import (
	"fmt"
	"math"
	"sync"
)

// Sphere describes a run around a point source that sends out equally in all
// directions, in a medium without end.
type Sphere struct {
	Medium    *Medium
	KeV       float64
	RadiiMFP  []float64 // rising, mean free paths of the source photons
	Histories int
	Batches   int // 0: 16
	Seed      uint64
	Workers   int // 0: 1
}

// BuildUp is the air kerma of all photons over that of the uncollided ones.
type BuildUp struct {
	Factor, RelErr float64
}

// beyondMFP is how far past the last radius the medium is followed.
const beyondMFP = 3

// Run does the histories and gives the build-up factor at each radius.
func (s Sphere) Run() ([]BuildUp, error) {
	n := len(s.RadiiMFP)
	if s.Medium == nil || n == 0 || s.Histories < 1 || !(s.KeV > CutKeV && s.KeV <= MaxKeV) {
		return nil, fmt.Errorf("photon: a sphere needs a medium, radii, histories and an energy of %d to %d keV", CutKeV, MaxKeV)
	}
	f := newField(s)
	for i := range 3 {
		w := &shellWalker{field: f, r: newRandom(s.Seed, pilotStream+uint64(i)), kerma: make([]float64, n)}
		w.run(pilotStarts)
		f.window.set(w.seen[:])
	}
	batches := s.Batches
	if batches == 0 {
		batches = 16
	}
	all := make([]*shellWalker, batches)
	var wg sync.WaitGroup
	next := make(chan int)
	for range max(1, s.Workers) {
		wg.Go(func() {
			for b := range next {
				w := &shellWalker{field: f, r: newRandom(s.Seed, uint64(b)+1), kerma: make([]float64, n)}
				w.run(max(1, s.Histories/batches))
				all[b] = w
			}
		})
	}
	for b := range all {
		next <- b
	}
	close(next)
	wg.Wait()
	out := make([]BuildUp, n)
	for k, x := range s.RadiiMFP {
		var sum, sum2 float64
		for _, w := range all {
			v := w.kerma[k] / (math.Exp(-x) * kerma(s.KeV))
			sum, sum2 = sum+v, sum2+v*v
		}
		m := float64(batches)
		mean := sum / m
		sigma := math.Sqrt(max(0, sum2/m-mean*mean) / max(1, m-1))
		out[k] = BuildUp{1 + mean, sigma / (1 + mean)}
	}
	return out, nil
}

// field is what the batches share. Lengths are in mean free paths of the
// source photons.
type field struct {
	med    *Medium
	keV    float64
	mu     float64
	radii  []float64
	out    float64
	window window
}

func newField(s Sphere) *field {
	f := &field{med: s.Medium, keV: s.KeV, mu: s.Medium.MuRho(s.KeV), radii: s.RadiiMFP}
	f.out = s.RadiiMFP[len(s.RadiiMFP)-1] + beyondMFP
	w := window{perKeV: 1 / s.KeV, from: []float64{0}, slope: []float64{windowBins / f.out}, begin: []float64{0}}
	for b := range w.center {
		x := (float64(b) + 0.5) / windowBins * f.out
		w.center[b] = x
		w.inverse[b] = math.Exp(0.8 * x)
	}
	w.crest()
	f.window = w
	return f
}

type shellWalker struct {
	*field
	r     *random
	kerma []float64
	seen  [windowBins]float64
	todo  []particle // z is the radius, u the cosine against it
}

func (w *shellWalker) run(n int) {
	for i := range n {
		q := (float64(i) + w.r.unit()) / float64(n)
		x := q * w.out
		w.collide(particle{z: x, u: 1, e: w.keV, w: math.Exp(-x) * w.out})
		for len(w.todo) > 0 {
			p := w.todo[len(w.todo)-1]
			w.todo = w.todo[:len(w.todo)-1]
			w.follow(p)
		}
	}
	for k := range w.kerma {
		w.kerma[k] /= float64(n)
	}
	for b := range w.seen {
		w.seen[b] /= float64(n)
	}
}

func (w *shellWalker) collide(p particle) {
	c, t := w.med.at(p.e)
	p.w *= c.live + t*c.dlive
	bin := w.window.bin(0, p.z)
	w.seen[bin] += w.window.worth(&p)
	for range w.window.split(&p, bin, w.r) {
		q := p
		q.e, q.u = w.med.collide(w.r, c, t, p.e, p.u)
		if q.e >= CutKeV {
			w.todo = append(w.todo, q)
		}
	}
}

// follow moves a photon to its next collision, splitting it on its way out
// where it grows too heavy.
func (w *shellWalker) follow(p particle) {
	for {
		step := -math.Log(w.r.unit()) * w.mu / w.med.MuRho(p.e)
		along := p.z * p.u             // place on the line, from its point nearest the source
		near2 := p.z*p.z - along*along // square of that nearest distance
		stop, split := w.stop(&p, along, near2, step)
		w.score(&p, along, near2, stop)
		at := along + stop
		p.z = math.Sqrt(near2 + at*at)
		p.u = max(-1, min(1, at/p.z))
		if p.z >= w.out {
			return
		}
		if !split {
			w.collide(p)
			return
		}
		n := w.window.split(&p, w.window.bin(0, p.z), w.r)
		if n == 0 {
			return
		}
		for range n - 1 {
			w.todo = append(w.todo, p)
		}
	}
}

// stop gives the part of the step that is flown before the photon is split, if it is.
func (w *shellWalker) stop(p *particle, along, near2, step float64) (float64, bool) {
	end := along + step
	if end <= 0 {
		return step, false
	}
	far := math.Sqrt(near2 + end*end)
	from := p.z
	if along < 0 {
		from = math.Sqrt(max(0, near2))
	}
	first, last := w.window.bin(0, from)+1, w.window.bin(0, far)
	worth := w.window.worth(p)
	if worth*w.window.peak[last] <= 2 {
		return step, false
	}
	for b := first; b <= last; b++ {
		if worth*w.window.inverse[b] > 2 {
			r := (float64(b) + 1e-6) / w.window.slope[0]
			return math.Sqrt(max(0, r*r-near2)) - along, true
		}
	}
	return step, false
}

// score adds the kerma of the crossings of each sphere on a straight piece,
// per photon of the source times the sphere's area.
func (w *shellWalker) score(p *particle, along, near2, step float64) {
	for k, r := range w.radii {
		half2 := r*r - near2
		if half2 <= 0 {
			continue
		}
		half := math.Sqrt(half2)
		cos := half / r
		for _, s := range [2]float64{half - along, -half - along} {
			if s > 0 && s <= step {
				if cos < grazing {
					cos = grazing / 2
				}
				w.kerma[k] += p.w / cos * kerma(p.e)
			}
		}
	}
}
