package transport

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// Range of the energies that are taken, keV. Photons below CutKeV are taken as
// absorbed; from there to 15 keV the tables' first node stands.
const (
	CutKeV = photon.CutKeV
	MaxKeV = 3000
)

// Layer is one material that the beam passes.
type Layer struct {
	Material *materials.Material
	MM       float64 // 0 to 100000 mm
}

// Exit is what leaves the far side of a slab in an open, wide field that falls
// on it normally.
type Exit struct {
	Primary  []float64 // uncollided fluence, photons/cm2, one for each input energy
	EdgesKeV []float64 // n+1 edges of the exit bins
	MeanKeV  []float64 // n mean energies of the scattered photons, the middle of the bin where there are none
	Scatter  []float64 // n scattered fluences, photons/cm2, path length per volume: 1/cos weighted
	RelErr   float64   // one sigma of the scattered air kerma from the sampling, relative
}

// Slab gives what leaves a stack of layers, ordered from source to detector,
// for a fluence perCM2 of photons at the energies keV on its face.
func Slab(layers []Layer, keV, perCM2 []float64) (Exit, error) {
	if err := checkLayers(layers); err != nil {
		return Exit{}, err
	}
	if err := checkSpectrum(keV, perCM2); err != nil {
		return Exit{}, err
	}
	s := newStack(layers, keV)
	out := Exit{Primary: make([]float64, len(keV)), EdgesKeV: slices.Clone(photon.ExitEdgesKeV),
		MeanKeV: make([]float64, exitBins), Scatter: make([]float64, exitBins)}
	for i, n := range perCM2 {
		out.Primary[i] = n * math.Exp(-s.upTo[len(s.upTo)-1][i])
	}
	sc := s.scatter(keV, perCM2)
	var kerma float64
	for i := range sc.flux {
		out.MeanKeV[i] = (photon.ExitEdgesKeV[i] + photon.ExitEdgesKeV[i+1]) / 2
		if f := sc.flux[i]; f > 0 {
			out.Scatter[i], out.MeanKeV[i] = f, sc.keV[i]/f
			kerma += f * photon.KermaPerFluence(out.MeanKeV[i])
		}
	}
	if kerma > 0 {
		out.RelErr = math.Sqrt(sc.err2) / kerma
	}
	return out, nil
}

func checkLayers(layers []Layer) error {
	if len(layers) == 0 {
		return fmt.Errorf("slab without layers: give at least one, 0 mm thick if need be")
	}
	for i, l := range layers {
		if l.Material == nil {
			return fmt.Errorf("layer %d of the slab has no material", i+1)
		}
		if !(l.MM >= 0 && l.MM <= 1e5) {
			return fmt.Errorf("layer %d of the slab, %q: thickness \"%g\" mm is outside 0 to 100000", i+1, l.Material.Name(), l.MM)
		}
	}
	return nil
}

func checkSpectrum(keV, perCM2 []float64) error {
	if len(keV) == 0 || len(keV) != len(perCM2) {
		return fmt.Errorf("spectrum of \"%d\" energies and \"%d\" fluences: give one fluence for each energy, at least one", len(keV), len(perCM2))
	}
	for i, e := range keV {
		if !(e >= 1 && e <= MaxKeV) {
			return fmt.Errorf("energy \"%g\" keV of the spectrum is outside 1 to %d", e, MaxKeV)
		}
		if n := perCM2[i]; !(n >= 0) || math.IsInf(n, 1) {
			return fmt.Errorf("fluence \"%g\" /cm2 at %g keV is not a number from 0", n, e)
		}
	}
	return nil
}

// stack is a list of layers with the optical depths of a spectrum.
type stack struct {
	layers []Layer
	own    [][]float64 // by layer, by energy: mean free paths of the layer
	upTo   [][]float64 // and of all layers up to and with it
}

// newStack merges neighbours of one material.
func newStack(layers []Layer, keV []float64) *stack {
	s := &stack{}
	for _, l := range layers {
		if n := len(s.layers); n > 0 && s.layers[n-1].Material == l.Material {
			s.layers[n-1].MM += l.MM
			continue
		}
		s.layers = append(s.layers, l)
	}
	for j, l := range s.layers {
		x := make([]float64, len(keV))
		l.Material.MuPerMMInto(x, keV)
		sum := make([]float64, len(keV))
		for i := range x {
			x[i] *= l.MM
			sum[i] = x[i]
			if j > 0 {
				sum[i] += s.upTo[j-1][i]
			}
		}
		s.own, s.upTo = append(s.own, x), append(s.upTo, sum)
	}
	return s
}

// scatter combines the layers: behind layer j stands what a slab wholly of its
// material and as many mean free paths thick as all layers so far would send
// out, plus what the layers before it sent into it more (or less) than a slab
// of its material would have, carried through it. For layers of one material
// that is exact.
func (s *stack) scatter(keV, perCM2 []float64) spread {
	var now spread
	for j := range s.layers {
		b := blendOf(s.layers[j].Material)
		next := single(b, keV, perCM2, s.upTo[j])
		if j > 0 {
			before := single(b, keV, perCM2, s.upTo[j-1])
			carried := now.minus(&before).through(s.layers[j], b)
			next.plus(carried)
			next.err2 = max(next.err2, now.err2)
		}
		next.clamp()
		now = next
	}
	return now
}

func single(b *blend, keV, perCM2, x []float64) spread {
	f := newFold()
	for i, e := range keV {
		if e >= CutKeV {
			f.add(b, e, x[i], perCM2[i])
		}
	}
	return f.result()
}

func (a *spread) minus(b *spread) *spread {
	d := &spread{}
	for i := range a.flux {
		d.flux[i], d.keV[i] = a.flux[i]-b.flux[i], a.keV[i]-b.keV[i]
	}
	return d
}

func (a *spread) plus(b *spread) {
	for i := range a.flux {
		a.flux[i] += b.flux[i]
		a.keV[i] += b.keV[i]
	}
}

func (a *spread) clamp() {
	for i := range a.flux {
		if !(a.flux[i] > 0 && a.keV[i] > 0) {
			a.flux[i], a.keV[i] = 0, 0
		}
	}
}

// slant is the path of scattered photons through a layer over its thickness.
const slant = 1.6

// through carries scattered photons, or a difference of such, through a layer:
// attenuated along a slanted path, with the scatter that they make in turn.
func (a *spread) through(l Layer, b *blend) *spread {
	out := &spread{}
	up, down := newFold(), newFold()
	for i, n := range a.flux {
		if n == 0 {
			continue
		}
		e := (photon.ExitEdgesKeV[i] + photon.ExitEdgesKeV[i+1]) / 2
		if m := a.keV[i] / n; m > photon.ExitEdgesKeV[i] && m < photon.ExitEdgesKeV[i+1] {
			e = m
		}
		x := l.Material.MuPerMM(e) * l.MM * slant
		v := n * math.Exp(-x)
		out.flux[i] += v
		out.keV[i] += v * e
		if n > 0 {
			up.add(b, e, x, n)
		} else {
			down.add(b, e, x, -n)
		}
	}
	plus, minus := up.result(), down.result()
	out.plus(plus.minus(&minus))
	return out
}
