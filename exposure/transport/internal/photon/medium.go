package photon

import (
	"fmt"
	"math"

	"halfvalue/materials"
)

// CutKeV is the energy below which a photon is taken as absorbed on the spot.
const CutKeV = 10

// MaxKeV is the highest energy of a source photon.
const MaxKeV = 4000

const (
	electronKeV = 510.99895
	thomson     = 0.0794078 // square of the classical electron radius, 1e-24 cm2
	avogadro    = 0.602214076
	hcKeVA      = 12.39842 // keV times angstrom
)

// Medium holds the cross sections of one material on a grid of energies that
// is indexed by the bits of the energy, so that a step needs no search.
type Medium struct {
	name  string
	cells []cell
	lines []fluorescer
}

// cell holds coefficients linear inside a 256th of an octave: value at its
// lower end and rise to the upper.
type cell struct {
	mu, dmu       float64 // cm2/g, total with coherent
	live, dlive   float64 // photons after a collision per photon before it
	inc, dinc     float64 // share of incoherent scattering in live
	coh, dcoh     float64 // and of coherent
	pair, dpair   float64 // and of annihilation photons; the rest is fluorescence
	shape, dshape float64 // of the coherent angle, see coherentShape
	bound, dbound float64 // of the incoherent angle, see boundShape
}

// fluorescer is an element whose K lines lie above the cut.
type fluorescer struct {
	edgeKeV float64
	mass    float64 // of the medium
	yield   float64 // K photons per photoelectric absorption above the edge, of lines above the cut
	keV     []float64
	upTo    []float64 // summed shares
	photo   *materials.Material
}

const (
	cellBits  = 8
	cellShift = 52 - cellBits
	cellMask  = 1<<cellShift - 1
	cellStep  = 1.0 / (1 << cellShift)
	firstBits = (0x3ff + 3) << 52 // the bits of 8 keV
	cellCount = 9 << cellBits     // 8 to 4096 keV
)

// node is a cell's end while the grid is built.
type node struct{ mu, live, inc, coh, pair, shape, bound float64 }

// NewMedium tabulates a material.
func NewMedium(m *materials.Material) (*Medium, error) { return newMedium(m, false, false) }

// NewMediumOf tabulates a material with the simplifications of older
// calculations, to compare with them: without coherent scattering, and with
// electrons that are free, which scatter by the law of Klein and Nishina at
// all angles.
func NewMediumOf(m *materials.Material, withoutCoherent, freeElectrons bool) (*Medium, error) {
	return newMedium(m, withoutCoherent, freeElectrons)
}

func newMedium(m *materials.Material, withoutCoherent, freeElectrons bool) (*Medium, error) {
	if m == nil {
		return nil, fmt.Errorf("photon: no material given")
	}
	med := &Medium{name: m.Name(), cells: make([]cell, cellCount)}
	var err error
	if med.lines, err = fluorescers(m); err != nil {
		return nil, err
	}
	thomsonMass, electrons := thomsonPerGram(m), electronsPerGram(m)
	at := func(i int) node {
		e := math.Float64frombits(firstBits + uint64(i)<<cellShift)
		return med.node(m, e, thomsonMass, electrons, withoutCoherent, freeElectrons)
	}
	a := at(0)
	for i := range med.cells {
		b := at(i + 1)
		med.cells[i] = cell{
			a.mu, b.mu - a.mu, a.live, b.live - a.live, a.inc, b.inc - a.inc,
			a.coh, b.coh - a.coh, a.pair, b.pair - a.pair, a.shape, b.shape - a.shape,
			a.bound, b.bound - a.bound,
		}
		a = b
	}
	return med, nil
}

func (med *Medium) node(m *materials.Material, e, thomsonMass, electrons float64, withoutCoherent, freeElectrons bool) node {
	inc, coh := m.MuRhoOf(materials.Incoherent, e), m.MuRhoOf(materials.Coherent, e)
	pair := m.MuRhoOf(materials.PairNuclear, e) + m.MuRhoOf(materials.PairElectron, e)
	var fluo float64
	for i := range med.lines {
		fluo += med.lines[i].perGram(e)
	}
	mu := m.MuRho(e)
	if withoutCoherent {
		mu, coh = mu-coh, 0
	}
	var bound float64
	if freeElectrons {
		free := electrons * kleinNishinaTotal(e/electronKeV)
		mu, inc = mu-inc+free, free
	} else {
		bound = boundShape(e, inc/electrons)
	}
	after := inc + coh + 2*pair + fluo
	return node{mu, after / mu, inc / after, coh / after, 2 * pair / after,
		coherentShape(coh / thomsonMass), bound}
}

// perGram is the element's production of K photons at an energy, cm2/g of the medium.
func (f *fluorescer) perGram(e float64) float64 {
	if e < f.edgeKeV {
		return 0
	}
	return f.mass * f.yield * f.photo.MuRhoOf(materials.Photoelectric, e)
}

func fluorescers(m *materials.Material) ([]fluorescer, error) {
	var all []fluorescer
	for _, part := range m.Fractions() {
		el, err := materials.ElementByZ(part.Z)
		if err != nil {
			return nil, err
		}
		if el.KEdgeKeV <= CutKeV || el.KYield == 0 {
			continue
		}
		photo, err := materials.Lookup(el.Symbol)
		if err != nil {
			return nil, err
		}
		// both a little off the edge: the element's edge and that of the cross
		// sections come from different tables
		above := photo.MuRhoOf(materials.Photoelectric, el.KEdgeKeV*1.001)
		below := photo.MuRhoOf(materials.Photoelectric, el.KEdgeKeV*0.999)
		f := fluorescer{edgeKeV: el.KEdgeKeV, mass: part.Mass, photo: photo}
		var sum float64
		for _, l := range el.KLines {
			if l.KeV > CutKeV {
				sum += l.Share
				f.keV, f.upTo = append(f.keV, l.KeV), append(f.upTo, sum)
			}
		}
		if sum == 0 {
			continue
		}
		for i := range f.upTo {
			f.upTo[i] /= sum
		}
		f.yield = (1 - below/above) * el.KYield * sum
		all = append(all, f)
	}
	return all, nil
}

// thomsonPerGram is the coherent cross section that the medium would have at
// zero momentum transfer, times 3/8: pi r^2 times the sum of Z^2 over the atoms, cm2/g.
func thomsonPerGram(m *materials.Material) float64 {
	var z2 float64
	for _, p := range m.Fractions() {
		el, err := materials.ElementByZ(p.Z)
		if err != nil {
			continue // fractions hold elements 1 to 92 only
		}
		z2 += p.Mass / el.AtomicWeight * float64(p.Z*p.Z)
	}
	return math.Pi * thomson * avogadro * z2
}

// electronsPerGram counts electrons, 1e24/g.
func electronsPerGram(m *materials.Material) float64 {
	var n float64
	for _, p := range m.Fractions() {
		el, err := materials.ElementByZ(p.Z)
		if err != nil {
			continue
		}
		n += p.Mass / el.AtomicWeight * float64(p.Z)
	}
	return avogadro * n
}

// coherentShape finds q in the coherent law (1+mu^2)/(1+q u), u = (1-mu)/2,
// that gives the tabulated cross section: ratio is that cross section over pi
// r^2 Z^2. The square of the form factor is so taken as Z^2/(1+(x/a)^2), with x
// the momentum transfer and one length 1/a for each energy, fixed by XCOM.
func coherentShape(ratio float64) float64 {
	lo, hi := 0.0, 1.0
	for coherentIntegral(hi) > ratio && hi < 1e9 {
		hi *= 4
	}
	for range 60 {
		mid := (lo + hi) / 2
		if coherentIntegral(mid) > ratio {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

// coherentIntegral is the integral of (1+mu^2)/(1+q u) over mu from -1 to 1;
// 1+mu^2 = 2(1-2u+2u^2) and dmu = 2 du.
func coherentIntegral(q float64) float64 {
	if q < 1e-2 {
		return 8.0/3 - q*4/3 + q*q*14/15
	}
	l := math.Log1p(q)
	return 4 / q * (l - 1 + 2*(l-1)/q + 2*l/(q*q))
}

// boundShape finds c in the incoherent scattering function v/(v+c), v =
// ((1-mu)/2)^(3/4), that brings the law of Klein and Nishina down to the
// tabulated cross section, 1e-24 cm2 per electron. The binding of the
// electrons takes away small angles; how much of them is so fixed by XCOM.
func boundShape(e, perElectron float64) float64 {
	k := e / electronKeV
	var v, law [boundNodes]float64
	for i := range v {
		r := (float64(i) + 0.5) / boundNodes // (1-mu)/2 = r^2, to see the small angles
		v[i] = r * math.Sqrt(r)
		law[i] = kleinNishina(k, 1-2*r*r) * 4 * r / boundNodes * 2 * math.Pi
	}
	sigma := func(c float64) float64 {
		var sum float64
		for i := range v {
			sum += law[i] * v[i] / (v[i] + c)
		}
		return sum
	}
	if sigma(0) <= perElectron {
		return 0
	}
	lo, hi := 0.0, 1e-6
	for sigma(hi) > perElectron {
		hi *= 4
	}
	for range 40 {
		if mid := (lo + hi) / 2; sigma(mid) > perElectron {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

const boundNodes = 100

// kleinNishina is the cross section per steradian of a free electron, 1e-24 cm2.
func kleinNishina(k, mu float64) float64 {
	p := 1 / (1 + k*(1-mu))
	return thomson / 2 * p * p * (p + 1/p - 1 + mu*mu)
}

// kleinNishinaTotal is its integral over all angles, 1e-24 cm2.
func kleinNishinaTotal(k float64) float64 {
	l := math.Log1p(2 * k)
	return 2 * math.Pi * thomson * ((1+k)/(k*k)*(2*(1+k)/(1+2*k)-l/k) + l/(2*k) - (1+3*k)/((1+2*k)*(1+2*k)))
}

// at finds the cell of an energy and the place in it, 0 to 1.
func (med *Medium) at(e float64) (*cell, float64) {
	bits := math.Float64bits(e) - firstBits
	return &med.cells[bits>>cellShift], float64(int64(bits&cellMask)) * cellStep
}

// MuRho gives the total coefficient with coherent scattering, cm2/g, as the
// walk sees it; the energy must be 10 to 4000 keV.
func (med *Medium) MuRho(e float64) float64 {
	c, t := med.at(e)
	return c.mu + t*c.dmu
}
