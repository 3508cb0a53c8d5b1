package beam

import (
	"math"

	"halfvalue/exposure/beam/internal/electron"
	"halfvalue/materials"
)

// bremsstrahlung gives what the betas of n make in their own source, per decay
// and cm2 at 1 m, as made: nothing absorbed yet.
//
// The spectrum of each branch is the allowed shape p E (E0-E)^2 with the Fermi
// function of the daughter in Bethe and Bacher's form; every beta is stopped
// inside (its range in the oxide is 0.6 mm). On the way it radiates by the
// cross section of package electron in the source's compound, evenly in all
// directions, as the tube's target does but without loss through the surface.
// Internal bremsstrahlung, some per cent more, is left out.
func (n *Nuclide) bremsstrahlung() Spectrum {
	parts := n.metal.Fractions()
	var s Spectrum
	var most float64
	for _, b := range n.Betas {
		most = max(most, b.EndKeV)
	}
	for lo := n.CutoffKeV; lo < most; {
		width := max(2, math.Floor(lo/50)*2)
		hi := min(lo+width, most)
		s.push((lo+hi)/2, hi-lo, 0)
		lo = hi
	}
	const steps = 80
	slow := make([]float64, steps) // electrons per decay that have the energy or more, over the stopping power
	for j := range steps {
		e := most * (float64(j) + 0.5) / steps
		var above float64
		for _, b := range n.Betas {
			above += b.Yield * b.above(e)
		}
		slow[j] = above / stopping(parts, e) * most / steps
	}
	for i, k := range s.KeV {
		var sum float64
		for j := range steps {
			e := most * (float64(j) + 0.5) / steps
			if e <= k {
				continue
			}
			for _, p := range parts {
				if m := sourceMatter(p); m.Z > 1 {
					sum += slow[j] * m.Bremsstrahlung(e, k) * electron.Avogadro / m.A * p.Mass
				}
			}
		}
		s.PerCM2[i] = sum * s.WidthKeV[i]
	}
	return s
}

// above gives the share of the branch's electrons that have at least keV.
func (b Beta) above(keV float64) float64 {
	const steps = 200
	var all, over float64
	for i := range steps {
		e := b.EndKeV * (float64(i) + 0.5) / steps
		n := b.shape(e)
		all += n
		over += n * min(max((e-keV)/(b.EndKeV/steps)+0.5, 0), 1)
	}
	return over / all
}

// shape is the allowed spectrum, in any unit.
func (b Beta) shape(keV float64) float64 {
	p := electron.Momentum(keV)
	e := keV/electron.RestKeV + 1
	az := float64(b.DaughterZ) * electron.FineStructure
	eta := 2 * math.Pi * az / electron.Beta(keV)
	relativistic := math.Pow(e*e*(1+4*az*az)-1, math.Sqrt(1-az*az)-1)
	left := b.EndKeV - keV
	return p * e * left * left * eta / -math.Expm1(-eta) * relativistic
}

// stopping is Bragg's sum of stopping powers, keV cm2/g.
func stopping(parts []materials.Fraction, keV float64) float64 {
	var sum float64
	for _, p := range parts {
		sum += p.Mass * sourceMatter(p).Stopping(keV)
	}
	return sum
}

// sourceMatter is an element as electrons see it, its mean excitation energy
// by the rule of thumb of ICRU 37: 10 eV per electron for heavy atoms, 95 eV
// for oxygen in a solid.
func sourceMatter(p materials.Fraction) electron.Matter {
	e, err := materials.ElementByZ(p.Z)
	if err != nil {
		panic("beam: " + err.Error())
	}
	j := 0.01 * float64(p.Z)
	if p.Z == 8 {
		j = 0.0952
	}
	return electron.Matter{Z: p.Z, A: e.AtomicWeight, JKeV: j}
}
