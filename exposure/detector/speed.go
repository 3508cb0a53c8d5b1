package detector

import (
	"sync"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
)

// The beam of ISO 7004: about 220 kV behind 8.00 mm copper, half-value layer
// 3.5 +-0.2 mm copper, lead screens of 0.02 to 0.15 mm (seen).
var (
	iso7004 = plan.Tube{KV: 220, MA: 1, FocusMM: 1, Target: "W", AnodeDeg: 20, Waveform: "constant",
		Filters: []plan.Filter{{Material: "Cu", MM: 8}}}
	iso7004Screens = [2]float64{0.15, 0.15}
)

// ISO7004Beam gives the simulated beam in which film speed is defined.
func ISO7004Beam() (beam.Spectrum, error) { return beam.Tube(iso7004) }

// perMGy is the response, nGy in the emulsion, per mGy of air kerma in the beam
// of ISO 7004.
var perMGy = sync.OnceValue(func() float64 {
	s, err := ISO7004Beam()
	if err != nil {
		panic("detector: the beam of ISO 7004: " + err.Error())
	}
	s = s.InAir(beam.AirPathMM)
	screens := NewScreens(iso7004Screens)
	var sum float64
	for i, e := range s.KeV {
		sum += s.PerCM2[i] * screens.Response(e)
	}
	return sum / s.KermaMGy()
})

// EquivalentMGy turns a response in nGy into the dose that a film answers to:
// air kerma in the beam of ISO 7004 that blackens it as much.
func EquivalentMGy(responseNGy float64) float64 { return responseNGy / perMGy() }
