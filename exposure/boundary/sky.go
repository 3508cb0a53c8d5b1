package boundary

import (
	"math"

	"halfvalue/exposure/beam"
)

// Air that scatters: dense, cold air errs outward.
const (
	skyAirKgPerM3   = 1.3
	electronsPerKg  = 0.49919 * 6.02214076e26 // dry air, Z/A of NIST
	electronRadiusM = 2.8179403e-15
)

// skyOf gives the air scatter of a beam by the angle between its axis and the
// way to the point, every degree 0 to 180: uSv/h times metres, per unit of the
// spectrum and second, for H = K / distance.
//
// Single Compton scattering, in closed form along each ray: a ray at phi to
// the way of length d brings n / (d sin phi) times the integral of dsigma/dOmega
// from phi to 180 deg. Nothing is taken off for air or walls on the way, which
// makes up for what scatters more than once. What of a cone points down is
// counted as if there were no ground; of a source bare all round one half is.
func skyOf(s beam.Spectrum, halfDeg float64) []float64 {
	tail := skyTail(s)
	k := make([]float64, 181)
	if halfDeg >= 90 {
		var sum float64
		for phi := range 180 {
			sum += (tail[phi] + tail[phi+1]) / 2 * math.Pi / 180
		}
		for i := range k {
			k[i] = math.Pi * sum // 2 pi over the sphere, one half of it
		}
		return k
	}
	for i := range k {
		k[i] = overCone(tail, float64(i), halfDeg)
	}
	return k
}

const (
	skyRings  = 8
	skySpokes = 16
)

// overCone sums tail(phi)/sin(phi) over the cone's solid angle, its axis at
// axisDeg from the way to the point.
func overCone(tail []float64, axisDeg, halfDeg float64) float64 {
	var sum float64
	c, s := cosDeg(axisDeg), sinDeg(axisDeg)
	for ring := range skyRings {
		// rings of equal width in angle, at their middle
		polar := (float64(ring) + 0.5) / skyRings * halfDeg
		lo, hi := float64(ring)/skyRings*halfDeg, float64(ring+1)/skyRings*halfDeg
		omega := 2 * math.Pi * (cosDeg(lo) - cosDeg(hi)) / skySpokes
		for spoke := range skySpokes {
			az := (float64(spoke) + 0.5) * 360 / skySpokes
			phi := acosDeg(c*cosDeg(polar) + s*sinDeg(polar)*cosDeg(az))
			sum += omega * inTable(tail, phi) / max(sinDeg(phi), sinDeg(0.5))
		}
	}
	return sum
}

// skyTail gives n times the integral of dsigma/dOmega H*(10)(E') from phi to
// 180 deg over the spectrum.
func skyTail(s beam.Spectrum) []float64 {
	keV, perCM2 := grouped(s)
	at := make([]float64, 181)
	n := skyAirKgPerM3 * electronsPerKg
	for g, e := range keV {
		for deg := range at {
			sigma, out := kleinNishina(e, cosDeg(float64(deg)))
			at[deg] += perCM2[g] * n * sigma * ambientPerFluence(out)
		}
	}
	tail := make([]float64, 181)
	for deg := 179; deg >= 0; deg-- {
		tail[deg] = tail[deg+1] + (at[deg]+at[deg+1])/2*math.Pi/180
	}
	return tail
}

// kleinNishina gives the cross section of an electron in m2/sr and the energy
// of the scattered photon.
func kleinNishina(keV, cos float64) (m2PerSr, outKeV float64) {
	p := 1 / (1 + keV/510.99895*(1-cos))
	return electronRadiusM * electronRadiusM / 2 * p * p * (p + 1/p - (1 - cos*cos)), keV * p
}
