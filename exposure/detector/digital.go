package detector

import (
	"math"
	"sync"

	"halfvalue/materials"
)

// Layer is the sensitive layer of a digital detector: what absorbs, how much
// of it, how well the image keeps its statistics, and the signal to noise
// ratio at which structure noise ends the gain of dose.
type Layer struct {
	Name       string
	material   *materials.Material
	gPerCM2    float64
	efficiency float64 // share of the absorbed quanta's statistics that is kept
	mostSNRn   float64
	Source     string
}

// layers holds the plate and the panel. Figures are common practice for the
// kind, not of a make, and uncertain by about a factor of two in dose.
var layers = sync.OnceValue(func() (l struct{ plate, panel Layer }) {
	l.plate = newLayer("imaging plate", "bafbr", 0.6*4.96*0.015, 0.3, 350,
		"0.15 mm of phosphor packed to 60 %, read-out keeps 30 % of the statistics: common practice, from memory")
	l.panel = newLayer("flat panel", "gd2o2s", 0.5*7.44*0.02, 0.6, 2500,
		"0.2 mm of phosphor packed to 50 %, read-out keeps 60 % of the statistics: common practice, from memory")
	return l
})

func newLayer(name, material string, gPerCM2, efficiency, most float64, source string) Layer {
	m, err := materials.Lookup(material)
	if err != nil {
		panic("detector: " + err.Error())
	}
	return Layer{name, m, gPerCM2, efficiency, most, source}
}

// Plate is a usual imaging plate, Panel a usual flat panel.
func Plate() Layer { return layers().plate }

// Panel is a usual flat panel.
func Panel() Layer { return layers().panel }

// pixelCM2 is the area that normalised signal to noise ratios mean: a square
// of 88.6 um, as ISO 17636-2 normalises (SNR x 88.6 um / SRb).
const pixelCM2 = 88.6e-4 * 88.6e-4

// Quanta is what a beam leaves in a layer, per unit of exposure: sums of
// absorbed energy and of its square.
type Quanta struct{ sum, square float64 }

// Add counts perCM2 photons of keV. What a photon leaves is its energy where
// it is absorbed by the photoelectric effect, its mean recoil where it is not.
func (l Layer) Add(q *Quanta, keV, perCM2 float64) {
	if keV < FirstKeV || keV > LastKeV || perCM2 <= 0 {
		return
	}
	mu := l.material.MuRho(keV)
	hit := -math.Expm1(-mu*l.gPerCM2) * perCM2
	photo := l.material.MuRhoOf(materials.Photoelectric, keV) / mu
	recoil := l.material.MuRhoOf(materials.Incoherent, keV) / mu
	t := comptonKeV(keV)
	q.sum += hit * (photo*keV + recoil*t)
	q.square += hit * (photo*keV*keV + recoil*t*t)
}

// SNRn gives the normalised signal to noise ratio for exposure times the
// quanta of one unit: quantum noise and structure noise add as squares.
func (l Layer) SNRn(q Quanta, exposure float64) float64 {
	if q.square <= 0 {
		return 0
	}
	quantum := exposure * q.sum * q.sum / q.square * pixelCM2 * l.efficiency
	return math.Sqrt(1 / (1/quantum + 1/(l.mostSNRn*l.mostSNRn)))
}

// Exposure gives how many units the wanted ratio takes: the inverse of SNRn;
// false when the layer cannot reach it or nothing arrives.
func (l Layer) Exposure(q Quanta, snrN float64) (float64, bool) {
	left := 1/(snrN*snrN) - 1/(l.mostSNRn*l.mostSNRn)
	unit := 0.0
	if q.square > 0 {
		unit = q.sum * q.sum / q.square * pixelCM2 * l.efficiency
	}
	if left <= 0 || unit <= 0 {
		return 0, false
	}
	return 1 / (left * unit), true
}

// MostSNRn is the ratio that no dose exceeds.
func (l Layer) MostSNRn() float64 { return l.mostSNRn }

// PerUnit gives the equivalent number of quanta per unit of exposure.
func (q Quanta) PerUnit() float64 {
	if q.square <= 0 {
		return 0
	}
	return q.sum * q.sum / q.square
}

// AbsorbedKeV gives the energy absorbed per cm2 and unit of exposure: the signal.
func (q Quanta) AbsorbedKeV() float64 { return q.sum }
