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
	layers = merged(layers)
	out := Exit{Primary: make([]float64, len(keV)), EdgesKeV: slices.Clone(photon.ExitEdgesKeV),
		MeanKeV: make([]float64, exitBins), Scatter: make([]float64, exitBins)}
	out.pass(layers, keV, perCM2)
	e, n := condensed(keV, perCM2)
	sc := newStack(layers, e).scatter(e, n)
	var kerma float64
	for i := range sc.flux {
		out.MeanKeV[i] = (photon.ExitEdgesKeV[i] + photon.ExitEdgesKeV[i+1]) / 2
		if f := sc.flux[i]; f > 0 {
			// The sums of photons and of energy are interpolated each for
			// itself; in a nearly empty bin their ratio may leave it.
			out.Scatter[i] = f
			out.MeanKeV[i] = min(max(sc.keV[i]/f, photon.ExitEdgesKeV[i]), photon.ExitEdgesKeV[i+1])
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

// merged joins neighbours of one material and leaves out what has no thickness.
func merged(layers []Layer) []Layer {
	var out []Layer
	for _, l := range layers {
		if n := len(out); n > 0 && out[n-1].Material == l.Material {
			out[n-1].MM += l.MM
		} else if l.MM > 0 {
			out = append(out, l)
		}
	}
	return out
}

// pass fills in the primary.
func (x *Exit) pass(layers []Layer, keV, perCM2 []float64) {
	mu := make([]float64, len(keV))
	for _, l := range layers {
		l.Material.MuPerMMInto(mu, keV)
		for i, m := range mu {
			x.Primary[i] += m * l.MM
		}
	}
	for i, n := range perCM2 {
		x.Primary[i] = n * math.Exp(-x.Primary[i])
	}
}

// condensed joins neighbouring energies that lie within 1 %, for the scatter,
// which changes slowly with energy: at 10 mean free paths that moves it by
// less than 0.2 %.
func condensed(keV, perCM2 []float64) (e, n []float64) {
	e, n = make([]float64, 0, len(keV)), make([]float64, 0, len(keV))
	var first, photons, energy float64
	flush := func() {
		if photons > 0 {
			e, n = append(e, energy/photons), append(n, photons)
		}
		photons, energy = 0, 0
	}
	for i, k := range keV {
		if k < CutKeV || perCM2[i] == 0 {
			continue
		}
		if k > first*1.01 || k < first {
			flush()
			first = k
		}
		photons += perCM2[i]
		energy += perCM2[i] * k
	}
	flush()
	return e, n
}

// newStack finds the optical depths.
func newStack(layers []Layer, keV []float64) *stack {
	s := &stack{layers: layers}
	for j, l := range layers {
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

// scatter combines the layers. Behind layer j comes what the primary makes in
// it and what earlier layers sent into it, carried through. That leaves out
// photons that cross the border more than once. How much they are is known
// where all layers so far were of the last one's material: the table for the
// whole depth against the same sum. That ratio, bin by bin, mends the sum; in
// part only if the layer before absorbs more, since it returns less.
func (s *stack) scatter(keV, perCM2 []float64) spread {
	var now spread
	primary := make([]float64, len(keV))
	for j, l := range s.layers {
		b := blendOf(l.Material)
		if j == 0 {
			now = single(b, keV, perCM2, s.upTo[0])
			continue
		}
		for i, n := range perCM2 {
			primary[i] = n * math.Exp(-s.upTo[j-1][i])
		}
		fresh := single(b, keV, primary, s.own[j])
		whole := single(b, keV, perCM2, s.upTo[j])
		alike := single(b, keV, perCM2, s.upTo[j-1])
		alike = alike.through(l, b)
		alike.plus(&fresh)
		next := now.through(l, b)
		next.plus(&fresh)
		next.mend(&whole, &alike, returning(s.layers[j-1].Material, l.Material))
		next.err2 = max(now.err2, whole.err2)
		now = next
	}
	return now
}

// returning is the power of the mending ratio: 1, down to 1/2 as the layer
// before absorbs more than the layer itself.
func returning(before, own *materials.Material) float64 {
	const keV = 100
	return 1 - 0.5*max(0, min(1, absorbing(before, keV)-absorbing(own, keV)))
}

// mend multiplies each bin by (whole/alike)^power.
func (a *spread) mend(whole, alike *spread, power float64) {
	for i := range a.flux {
		if whole.flux[i] > 0 && alike.flux[i] > 0 {
			r := math.Pow(max(0.3, min(3, whole.flux[i]/alike.flux[i])), power)
			a.flux[i] *= r
			a.keV[i] *= r
		}
	}
}

func single(b *blend, keV, perCM2, x []float64) spread {
	f := newFold()
	for i := len(keV) - 1; i >= 0; i-- { // the hard ones first, see spent
		f.add(b, keV[i], x[i], perCM2[i])
	}
	return f.result()
}

func (a *spread) plus(b *spread) {
	for i := range a.flux {
		a.flux[i] += b.flux[i]
		a.keV[i] += b.keV[i]
	}
}

// slanted gives the share of scattered photons that pass x mean free paths of
// thickness uncollided, and the path that one direction would need for that.
// Their fluence is taken as proportional to the cosine; Gauss' rule of three points.
func slanted(x float64) (share, path float64) {
	share = 0.1396540*math.Exp(-x/0.2123405) + 0.4584822*math.Exp(-x/0.5905331) + 0.4018638*math.Exp(-x/0.9114120)
	return share, -math.Log(share)
}

// through carries scattered photons through a layer, with the scatter that
// they make in turn.
func (a *spread) through(l Layer, b *blend) spread {
	var out spread
	again := newFold()
	for i, n := range a.flux {
		if n == 0 {
			continue
		}
		e := a.keV[i] / n
		share, path := slanted(l.Material.MuPerMM(e) * l.MM)
		out.flux[i] += n * share
		out.keV[i] += n * share * e
		again.add(b, e, path, n)
	}
	made := again.result()
	out.plus(&made)
	return out
}
