package transport

import (
	"math"

	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// BroadTransmission gives the share of a weighted fluence that comes through a
// wall mm thick, hit normally, uncollided and scattered, in a wide field. For
// slanted rays take ObliqueMM, not the length along the ray. NaN for input that
// Slab would refuse.
func BroadTransmission(m *materials.Material, mm float64, keV, perCM2 []float64, weight func(keV float64) float64) float64 {
	exit, err := Slab([]Layer{{m, mm}}, keV, perCM2)
	if err != nil {
		return math.NaN()
	}
	var in, out float64
	for i, e := range keV {
		w := weight(e)
		in += perCM2[i] * w
		out += exit.Primary[i] * w
	}
	for i, n := range exit.Scatter {
		if n > 0 {
			out += n * weight(exit.MeanKeV[i])
		}
	}
	if !(in > 0) {
		return math.NaN()
	}
	return min(1, out/in)
}

// KermaPerFluence gives air kerma per photon/cm2 in pGy cm2, at 1 to 20000 keV: a weight for BroadTransmission.
func KermaPerFluence(keV float64) float64 { return photon.KermaPerFluence(keV) }

// Oblique rays: how much of the added path counts, and the steepest angle that counts.
const (
	obliqueCredit = 0.2
	obliqueMost   = 60.0
)

// ObliqueMM gives the thickness of a wall, hit normally, that stands for a wall
// mm thick hit at angleDeg from its normal, 0 to 90. Scattered photons leave
// the slanted path for the short way out, so the length along the ray,
// mm/cos(angle), promises too much: 4 times too little dose behind 10 mean free
// paths of concrete at 45 deg, 15 times at 60. A fifth of the added length is
// credited, up to 60 deg, which our Monte Carlo finds safe for concrete, steel
// and lead at 60 to 1250 keV; it errs outward.
func ObliqueMM(mm, angleDeg float64) float64 {
	a := min(math.Abs(angleDeg), obliqueMost) * math.Pi / 180
	return mm * (1 + obliqueCredit*(1/math.Cos(a)-1))
}
