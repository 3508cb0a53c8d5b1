package transport

import (
	"math"

	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// BroadTransmission gives the share of a weighted fluence that comes through a
// wall mm thick, uncollided and scattered, in a wide field. NaN for input that
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
