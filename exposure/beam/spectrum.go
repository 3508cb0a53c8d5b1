package beam

import (
	"math"

	"halfvalue/materials"
)

// Spectrum is the fluence of a beam by photon energy, free of scatter, at 1 m
// from the source in vacuum, per unit of strength: per mA s for a tube, per
// GBq s for a sealed source. The slices have one length and run by rising
// energy; a Spectrum is a value, its slices are shared and never changed.
type Spectrum struct {
	KeV      []float64 // energy of a line, or the middle of a bin
	WidthKeV []float64 // width of the bin; 0 marks a line at its exact energy
	PerCM2   []float64 // photons per cm2 in the bin, not per keV
}

// Len gives the number of bins and lines.
func (s Spectrum) Len() int { return len(s.KeV) }

// Through gives the narrow beam behind mm of m: what neither is absorbed nor
// scattered. It shares the energies of s.
func (s Spectrum) Through(m *materials.Material, mm float64) Spectrum {
	out := Spectrum{s.KeV, s.WidthKeV, make([]float64, len(s.KeV))}
	m.MuPerMMInto(out.PerCM2, s.KeV)
	for i, mu := range out.PerCM2 {
		out.PerCM2[i] = s.PerCM2[i] * math.Exp(-mu*mm)
	}
	return out
}

// AirPathMM is the path of dry air that the published beam qualities include:
// ISO 4037 measures at 1 m.
const AirPathMM = 1000

// InAir gives the beam behind mm of dry air; the published beam qualities and
// `table hvl` mean AirPathMM of it.
func (s Spectrum) InAir(mm float64) Spectrum { return s.Through(dryAir(), mm) }

// PhotonsPerCM2 gives the fluence of all energies.
func (s Spectrum) PhotonsPerCM2() float64 {
	var sum float64
	for _, n := range s.PerCM2 {
		sum += n
	}
	return sum
}

// MeanKeV gives the mean energy weighted by fluence, as ISO 4037 does; NaN for
// an empty beam.
func (s Spectrum) MeanKeV() float64 {
	var sum, photons float64
	for i, n := range s.PerCM2 {
		sum += n * s.KeV[i]
		photons += n
	}
	return sum / photons
}

// KermaMGy gives the air kerma free in air at 1 m without an air path, mGy per
// unit of strength.
func (s Spectrum) KermaMGy() float64 {
	var sum float64
	for i, n := range s.PerCM2 {
		sum += n * KermaPerFluence(s.KeV[i])
	}
	return sum
}

// AmbientUSv gives the ambient dose equivalent H*(10) at 1 m without an air
// path, uSv per unit of strength.
func (s Spectrum) AmbientUSv() float64 {
	var sum float64
	for i, n := range s.PerCM2 {
		sum += n * KermaPerFluence(s.KeV[i]) * AmbientPerKerma(s.KeV[i])
	}
	return sum * 1000
}

// HVL gives the first and the second half-value layer in mm of m: the narrow
// beam's air kerma falls to a half behind the first and to a quarter behind
// both. They are roots of the sum over the spectrum, exact to 1e-12 of
// themselves; NaN for an empty beam. The air between source and detector is
// the caller's: take InAir first for a published quality.
func (s Spectrum) HVL(m *materials.Material) (hvl1MM, hvl2MM float64) {
	mu := make([]float64, len(s.KeV))
	kerma := make([]float64, len(s.KeV))
	m.MuPerMMInto(mu, s.KeV)
	var all float64
	for i, n := range s.PerCM2 {
		kerma[i] = n * KermaPerFluence(s.KeV[i])
		all += kerma[i]
	}
	if !(all > 0) {
		return math.NaN(), math.NaN()
	}
	half := thickness(mu, kerma, all/2, 0)
	return half, thickness(mu, kerma, all/4, half) - half
}

// thickness solves sum kerma exp(-mu x) = want from below. The logarithm of
// the sum is convex, so Newton's steps on it never pass the root.
func thickness(mu, kerma []float64, want, x float64) float64 {
	for range 100 {
		var sum, slope float64
		for i, k := range kerma {
			t := k * math.Exp(-mu[i]*x)
			sum += t
			slope += t * mu[i]
		}
		step := math.Log(sum/want) * sum / slope
		x += step
		if math.Abs(step) <= 1e-13*x {
			break
		}
	}
	return x
}
