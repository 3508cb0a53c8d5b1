package materials

import (
	"fmt"
	"math"
	"slices"
)

// Process is one way in which photons interact.
type Process int

// The processes. Coherent is Rayleigh scattering, incoherent is Compton
// scattering from bound electrons.
const (
	Coherent Process = iota
	Incoherent
	Photoelectric
	PairNuclear
	PairElectron
	processes
)

// total is the slot of the sum of all processes.
const total = processes

// String gives the name of the process in words.
func (p Process) String() string {
	if p < 0 || p >= processes {
		return fmt.Sprintf("Process(%d)", int(p))
	}
	return [...]string{"coherent", "incoherent", "photoelectric", "pair nuclear", "pair electron"}[p]
}

// Fraction is an element's share of a material by mass.
type Fraction struct {
	Z    int
	Mass float64 // 0 to 1
}

// Part is a material's share of a mixture by mass.
type Part struct {
	Material *Material
	Mass     float64 // any positive amount; only the ratios count
}

// Material is a substance of known composition and density. It is immutable
// and safe for concurrent use.
type Material struct {
	name, title, family, source, confidence string
	density                                 float64
	*coefficients
}

// coefficients depend on the composition alone and are tabulated on first use.
type coefficients struct {
	fractions []Fraction // rising Z, sum 1
	tables    lazyGrids
}

// Range of densities that New takes, g/cm3: thin gas to beyond osmium.
const (
	minDensity = 1e-6
	maxDensity = 25
)

// New makes a material from mass fractions, which must be positive and sum to
// 1 within 0.001; they are then scaled to 1. An element may stand more than once.
func New(name string, densityGPerCM3 float64, parts []Fraction) (*Material, error) {
	if name == "" {
		return nil, fmt.Errorf("material without a name: give one, such as \"carbon-steel\"")
	}
	if !(densityGPerCM3 >= minDensity && densityGPerCM3 <= maxDensity) {
		return nil, fmt.Errorf("material %q: density \"%g\" g/cm3 is outside %g to %g", name, densityGPerCM3, minDensity, float64(maxDensity))
	}
	var mass [MaxZ + 1]float64
	var sum float64
	for _, p := range parts {
		if p.Z < 1 || p.Z > MaxZ {
			return nil, fmt.Errorf("material %q: atomic number \"%d\" is outside 1 to %d", name, p.Z, MaxZ)
		}
		if !(p.Mass > 0 && p.Mass <= 1.001) {
			return nil, fmt.Errorf("material %q: mass fraction \"%g\" of element %d is outside 0 to 1", name, p.Mass, p.Z)
		}
		mass[p.Z] += p.Mass
		sum += p.Mass
	}
	if !(math.Abs(sum-1) <= 0.001) {
		return nil, fmt.Errorf("material %q: mass fractions sum to \"%g\", want 1 within 0.001", name, sum)
	}
	c := &coefficients{}
	for z, m := range mass {
		if m > 0 {
			c.fractions = append(c.fractions, Fraction{z, m / sum})
		}
	}
	return &Material{name: name, title: name, density: densityGPerCM3, coefficients: c}, nil
}

// Compound makes a material from a chemical formula such as "Ca3(PO4)2" or
// "Fe0.95O"; ParseFormula describes what is understood.
func Compound(name, formula string, densityGPerCM3 float64) (*Material, error) {
	parts, err := ParseFormula(formula)
	if err != nil {
		return nil, fmt.Errorf("material %q: %w", name, err)
	}
	return New(name, densityGPerCM3, parts)
}

// Mixture makes a material from others by mass.
func Mixture(name string, densityGPerCM3 float64, parts []Part) (*Material, error) {
	var sum float64
	for i, p := range parts {
		if p.Material == nil {
			return nil, fmt.Errorf("material %q: part %d of the mixture has no material", name, i+1)
		}
		if !(p.Mass > 0 && p.Mass < math.Inf(1)) {
			return nil, fmt.Errorf("material %q: mass \"%g\" of %q is not positive", name, p.Mass, p.Material.name)
		}
		sum += p.Mass
	}
	var f []Fraction
	for _, p := range parts {
		for _, q := range p.Material.fractions {
			f = append(f, Fraction{q.Z, q.Mass * p.Mass / sum})
		}
	}
	return New(name, densityGPerCM3, f)
}

// WithDensity gives the same composition at another density, 1e-6 to 25 g/cm3.
// It shares the tables of m and costs nothing.
func (m *Material) WithDensity(gPerCM3 float64) (*Material, error) {
	if !(gPerCM3 >= minDensity && gPerCM3 <= maxDensity) {
		return nil, fmt.Errorf("material %q: density \"%g\" g/cm3 is outside %g to %g", m.name, gPerCM3, minDensity, float64(maxDensity))
	}
	d := *m
	d.density = gPerCM3
	return &d, nil
}

// Name gives the name in plans: "carbon-steel", "Fe".
func (m *Material) Name() string { return m.name }

// Title gives the name in words: "Carbon steel".
func (m *Material) Title() string { return m.title }

// Family gives what hatches and rules go by: steel, cast-iron, aluminium,
// magnesium, titanium, copper, nickel, zirconium, heavy, concrete, mineral,
// liquid, plastic, gas or element; empty for a material made with New,
// Compound or Mixture.
func (m *Material) Family() string { return m.family }

// DensityGPerCM3 gives the density.
func (m *Material) DensityGPerCM3() float64 { return m.density }

// Fractions gives the elements by mass in rising Z; they sum to 1.
func (m *Material) Fractions() []Fraction { return slices.Clone(m.fractions) }

// Source tells where composition and density are from.
func (m *Material) Source() string { return m.source }

// Confidence tells how sure the source is: "seen", "common practice", "from
// memory", and what the spread of density and composition is.
func (m *Material) Confidence() string { return m.confidence }

// EdgesKeV gives the absorption edges of the material's elements from 1 keV up,
// rising, each once. Between two of them every coefficient is smooth.
func (m *Material) EdgesKeV() []float64 {
	var e []float64
	for _, f := range m.fractions {
		e = append(e, table()[f.Z].edges()...)
	}
	slices.Sort(e)
	return slices.Compact(e)
}

// MuRho gives the total mass attenuation coefficient with coherent scattering
// in cm2/g at 1 to 20000 keV, NaN outside. At an absorption edge it is the
// value above the edge. It is within 0.3 % of the nodes of NIST's tables; the
// package's tests hold it against xraylib between them.
func (m *Material) MuRho(keV float64) float64 { return m.grid(total).at(keV) }

// MuRhoOf gives one process in cm2/g at 1 to 20000 keV, NaN outside.
func (m *Material) MuRhoOf(p Process, keV float64) float64 {
	if p < 0 || p >= processes {
		return math.NaN()
	}
	return m.grid(p).at(keV)
}

// MuPerMM gives the linear attenuation coefficient in 1/mm at the material's
// density, NaN outside 1 to 20000 keV.
func (m *Material) MuPerMM(keV float64) float64 { return m.grid(total).at(keV) * (m.density / 10) }

// MuPerMMInto puts the linear attenuation coefficient in 1/mm at every energy
// into dst, which must be at least as long as keV. It allocates nothing once
// the material's table is made.
func (m *Material) MuPerMMInto(dst, keV []float64) {
	g, k := m.grid(total), m.density/10
	dst = dst[:len(keV)]
	for i, e := range keV {
		dst[i] = g.at(e) * k
	}
}

// grid gives the table of a process or of the total, made on first use.
func (c *coefficients) grid(p Process) *grid {
	return c.tables.get(p, c.tabulate)
}
