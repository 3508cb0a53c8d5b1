package exposure

import (
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/rules"
	"halfvalue/exposure/setup"
	"halfvalue/exposure/working"
	"halfvalue/materials"
)

// Image is what one place of the part shows: how strongly a little more of its
// material marks the image, and the thinnest wire that should just be seen.
type Image struct {
	At            string  `json:"at"`
	MuPerMM       float64 `json:"muPerMM"`       // attenuation of the unscattered beam there, as the detector weighs it
	ScatterShare  float64 `json:"scatterShare"`  // of all that the detector answers to, 0 to 1
	ContrastPerMM float64 `json:"contrastPerMM"` // film: density per mm; plates and panels: share of the signal per mm
	SNRn          float64 `json:"snrN"`          // normalised signal to noise ratio there
	UnsharpMM     float64 `json:"unsharpMM"`     // geometry and detector together; 0 where the detector's is not stated
	WireMM        float64 `json:"wireMM"`        // diameter of the wire that should just show; 0 where that is not decided
	Wire          int     `json:"wire"`          // thinnest wire of ISO 19232-1 that should show, W1 to W19; 0 none or not decided
}

// The law of visibility is Rose's (J. Opt. Soc. Am. 38, 196, 1948): a detail is
// seen when its signal is k times the noise of the area that it covers. A wire d
// wide blurred to w = sqrt(d^2 + u^2) adds pi d^2/(4 w) of material over w times
// the length that the standard asks to be seen:
//
//	mu (1-s) (pi/4) d^2/w  SNR_N sqrt(w L)/88.6 um = k
//
// It leaves out the eye's own limits and the screen that it looks at.
const (
	roseK     = 5.0    // Rose: 5 for certain seeing
	wireSeeMM = 10.0   // ISO 19232-1: 10 mm of the wire
	squareMM  = 0.0886 // side of the square that SNR_N means
)

// look adds what a place shows to the reckoning.
func (s *shot) look(r *Reckoning, at string, layers []plan.Layer, f field, seconds float64) error {
	mu, primary, err := s.contrast(layers)
	if err != nil {
		return err
	}
	total := f.signal() / s.square()
	if !(primary > 0 && total > 0) {
		r.Image = append(r.Image, Image{At: at})
		return nil
	}
	i := Image{At: at, MuPerMM: mu, ScatterShare: max(0, 1-primary/total)}
	i.ContrastPerMM = mu * (1 - i.ScatterShare)
	reading := s.receptor.reading(f.receptorRate, seconds)
	i.SNRn = reading
	if film := s.receptor.film; film != nil {
		i.ContrastPerMM *= film.Gradient(reading) / math.Ln10
		i.SNRn = film.SNRn(reading)
	}
	if own, ok := s.unsharp(); ok {
		i.UnsharpMM = setup.TotalMM(r.Geometry.UgMM, own)
		i.WireMM, i.Wire = thinnestWire(mu*(1-i.ScatterShare)*i.SNRn, i.UnsharpMM)
	}
	r.Image = append(r.Image, i)
	return nil
}

// contrast gives the attenuation of the thickest layer's material, 1/mm, in the
// unscattered beam behind the layers as the detector weighs it, and that beam's
// signal before inverse square.
func (s *shot) contrast(layers []plan.Layer) (muPerMM, primary float64, err error) {
	sp := s.at(depthMM(layers))
	var m *materials.Material
	for i, l := range layers {
		next, err := materials.Lookup(l.Material)
		if err != nil {
			return 0, 0, err
		}
		sp = sp.Through(next, l.MM)
		if i == thickest(layers) {
			m = next
		}
	}
	mu := make([]float64, sp.Len())
	m.MuPerMMInto(mu, sp.KeV)
	var sum float64
	for i, n := range sp.PerCM2 {
		v := s.receptor.signal(sp.KeV[i], n)
		primary += v
		sum += v * mu[i]
	}
	return sum / primary, primary, nil
}

// signal is what the detector makes of perCM2 photons: dose for film, absorbed
// energy for plates and panels.
func (r receptor) signal(keV, perCM2 float64) float64 {
	one := receptorRate{strength: 1}
	one.primary = r.take(&one.quanta, keV, perCM2)
	return one.signal()
}

func (r receptorRate) signal() float64 {
	if r.primary+r.scatter > 0 {
		return r.primary + r.scatter
	}
	return r.quanta.AbsorbedKeV() * r.strength
}

// unsharp is the detector's own unsharpness, mm: for film by the beam, for
// plates and panels twice the basic spatial resolution (ISO 17636-2); false
// where that is not stated.
func (s *shot) unsharp() (float64, bool) {
	var um float64
	switch d := s.plan.Detector; {
	case d.Film != nil:
		own, err := setup.InherentOfTube(s.kV())
		if n := s.plan.Source.Sealed; n != nil {
			own, err = setup.InherentOfNuclide(n.Nuclide)
		}
		return own.MM, err == nil
	case d.Plate != nil:
		um = d.Plate.SRbUM
	case d.Panel != nil:
		um = d.Panel.SRbUM
	}
	return 2 * um / 1000, um > 0
}

func (s *shot) kV() float64 {
	if t := s.plan.Source.Tube; t != nil {
		return t.KV
	}
	return beam.LeastKV
}

// thinnestWire solves the law of visibility for d; a is the relative contrast
// per mm times SNR_N. It rises with d, so the root is one.
func thinnestWire(a, unsharpMM float64) (mm float64, number int) {
	seen := func(d float64) bool {
		w := math.Hypot(d, unsharpMM)
		return a*math.Pi/4*d*d/w*math.Sqrt(w*wireSeeMM)/squareMM >= roseK
	}
	lo, hi := 1e-4, 20.0
	if !seen(hi) {
		return 0, 0
	}
	for range 60 {
		if mid := (lo + hi) / 2; seen(mid) {
			hi = mid
		} else {
			lo = mid
		}
	}
	for n := 1; rules.WireMM(n) > 0 && rules.WireMM(n) >= hi*(1-1e-12); n++ {
		number = n
	}
	return hi, number
}

// lookSteps is the working of what a place shows.
func lookSteps(list []Image) []working.Step {
	var out []working.Step
	for _, i := range list {
		if i.WireMM == 0 {
			continue
		}
		out = append(out, working.Step{ID: "image.wire." + i.At, Name: "wire that should just show at " + i.At, Symbol: "d",
			Formula: "mu (1-s) (pi/4) d^2/w SNR_N sqrt(w L)/88.6 um = k, w = sqrt(d^2 + u^2)", Value: i.WireMM, Unit: "mm",
			Inputs: []working.Input{
				{Symbol: "mu", Name: "attenuation behind the part", Value: i.MuPerMM, Unit: "1/mm"},
				{Symbol: "s", Name: "share of scattered radiation", Value: i.ScatterShare},
				{Symbol: "SNR_N", Name: "signal to noise ratio", Value: i.SNRn},
				{Symbol: "u", Name: "unsharpness", Value: i.UnsharpMM, Unit: "mm"},
				{Symbol: "L", Name: "length that must be seen", Value: wireSeeMM, Unit: "mm", Source: "ISO 19232-1"},
				{Symbol: "k", Name: "threshold", Value: roseK, Source: "Rose 1948"},
			}, Source: "Rose, J. Opt. Soc. Am. 38, 196 (1948)", Note: "the eye and the viewer are left out; expect it within three wires"})
	}
	return out
}
