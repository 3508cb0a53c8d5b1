package beam

import (
	"math"

	"halfvalue/exposure/beam/internal/electron"
)

// ebelScale and finkelshteinScale bring the two models to the outputs that
// thickScale was fitted to.
const (
	ebelScale         = 0.394
	finkelshteinScale = 7.47
)

// ebel is Ebel's formula: photons per keV and unit of strength at photon
// energy keV, and the share that leaves, from the photoelectric coefficient
// photo in cm2/g.
func (t *target) ebel(kV, sine, keV, photo float64) (gen, out float64) {
	z := float64(t.matter.Z)
	lnZ := math.Log(z)
	x := 1.109 - 0.00435*z + 0.00175*kV
	m := 0.1382 - 0.9211/math.Sqrt(z)
	n := math.Pow(kV, m) * (0.1904 - 0.2236*lnZ + 0.1292*lnZ*lnZ - 0.0149*lnZ*lnZ*lnZ)
	j := 0.0135 * z
	deepest := t.matter.A / z * (0.787e-5*math.Sqrt(j)*math.Pow(kV, 1.5) + 0.735e-6*kV*kV)
	lnU := math.Log(kV / keV)
	depth := deepest * lnU * (0.49269 - 1.0987*n + 0.78557*n*n) / (0.70256 - 1.09865*n + 1.0046*n*n + lnU)
	q := photo * 2 * depth * math.Sqrt(1-sine*sine) / sine // incidence at 90 deg minus the take-off angle
	out = 1
	if q > 1e-9 {
		out = -math.Expm1(-q) / q
	}
	const perSrToCM2 = 1e-4 // at 1 m
	return ebelScale * 1.35e9 * perSrToCM2 * z * math.Pow(kV/keV-1, x), out
}

// finkelshtein is the formula of Finkelshtein and Pavlova with Philibert's
// absorption; mu in cm2/g is the target's.
func (t *target) finkelshtein(kV, sine, keV, mu float64) (gen, out float64) {
	z := float64(t.matter.Z)
	a := 0.2010 - 0.00069*z
	if t.matter.Z <= 45 {
		a = 0.2986 - 0.002857*z
	}
	l := math.Log(33.397 * (2*kV + keV) / z)
	r := 1 - 0.0081517*z + 3.613e-5*z*z + 0.009583*z*math.Exp(-kV/keV) + 0.001141*kV
	h := 1.2 * t.matter.A / (z * z)
	h /= 1 + h
	q := mu * (math.Pow(kV, 1.65) - math.Pow(keV, 1.65)) / 4e5
	out = sine * sine / ((sine + q) * (sine + h*q))
	return finkelshteinScale * electron.PerMAs * 6.7e-12 * z * (kV/keV - 1) * math.Pow(kV/(2*keV), a) * r / l, out
}
