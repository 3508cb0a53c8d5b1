package transport

import (
	"fmt"
	"math"

	"halfvalue/materials"
)

// Barrier is a wall of one material before one spectrum, made ready for many
// thicknesses. It is safe for concurrent use.
type Barrier struct {
	mostMM, stepMM float64
	ln             []float64                // logarithm of the transmission
	beyond         func(mm float64) float64 // transmission past the nodes
}

const barrierNodes = 400

// NewBarrier tabulates BroadTransmission to mostMM, denser for thin walls;
// between its 400 thicknesses it is off by less than 0.5 %. Past mostMM every
// call folds the tables anew. It keeps the slices it is given.
func NewBarrier(m *materials.Material, mostMM float64, keV, perCM2 []float64, weight func(keV float64) float64) (*Barrier, error) {
	if !(mostMM > 0 && mostMM <= 1e5) {
		return nil, fmt.Errorf("barrier to \"%g\" mm: want above 0 to 100000", mostMM)
	}
	if err := checkLayers([]Layer{{m, mostMM}}); err != nil {
		return nil, err
	}
	if err := checkSpectrum(keV, perCM2); err != nil {
		return nil, err
	}
	b := &Barrier{mostMM: mostMM, stepMM: mostMM / (barrierNodes * barrierNodes)}
	b.beyond = func(mm float64) float64 { return BroadTransmission(m, min(mm, 1e5), keV, perCM2, weight) }
	for i := range barrierNodes + 1 {
		t := b.beyond(b.stepMM * float64(i) * float64(i))
		if math.IsNaN(t) {
			return nil, fmt.Errorf("barrier of %q: the weighted spectrum is empty", m.Name())
		}
		b.ln = append(b.ln, math.Log(max(t, 1e-300)))
	}
	return b, nil
}

// Transmission gives the share that comes through mm of the wall, hit normally,
// 0 to 1; 1 for no thickness.
func (b *Barrier) Transmission(mm float64) float64 {
	if !(mm > 0) {
		return 1
	}
	if mm > b.mostMM {
		return b.beyond(mm)
	}
	u := math.Sqrt(mm / b.stepMM)
	i := min(int(u), barrierNodes-1)
	lo, hi := b.stepMM*float64(i*i), b.stepMM*float64((i+1)*(i+1))
	return math.Exp(b.ln[i] + (b.ln[i+1]-b.ln[i])*(mm-lo)/(hi-lo))
}
