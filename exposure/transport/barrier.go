package transport

import (
	"fmt"
	"math"

	"halfvalue/materials"
)

// Barrier is a wall of one material before one spectrum, made ready for many
// thicknesses.
type Barrier struct {
	stepMM float64
	ln     []float64 // logarithm of the transmission
}

const barrierNodes = 400

// NewBarrier tabulates BroadTransmission to mostMM; beyond, the last slope
// stands, which is never steeper than the truth.
func NewBarrier(m *materials.Material, mostMM float64, keV, perCM2 []float64, weight func(keV float64) float64) (*Barrier, error) {
	if !(mostMM > 0 && mostMM <= 1e5) {
		return nil, fmt.Errorf("barrier to \"%g\" mm: want above 0 to 100000", mostMM)
	}
	b := &Barrier{stepMM: mostMM / (barrierNodes * barrierNodes)}
	for i := range barrierNodes + 1 {
		mm := b.stepMM * float64(i) * float64(i)
		if _, err := Slab([]Layer{{m, mm}}, keV, perCM2); err != nil {
			return nil, err
		}
		t := BroadTransmission(m, mm, keV, perCM2, weight)
		if !(t >= 0) {
			return nil, fmt.Errorf("barrier of %q: the weighted spectrum is empty", m.Name())
		}
		b.ln = append(b.ln, math.Log(max(t, 1e-300)))
	}
	return b, nil
}

// Transmission gives the share that comes through mm of the wall, 0 to 1.
func (b *Barrier) Transmission(mm float64) float64 {
	if !(mm > 0) {
		return 1
	}
	u := math.Sqrt(mm / b.stepMM)
	i := min(int(u), barrierNodes-1)
	lo, hi := b.stepMM*float64(i*i), b.stepMM*float64((i+1)*(i+1))
	return math.Exp(b.ln[i] + (b.ln[i+1]-b.ln[i])*(mm-lo)/(hi-lo))
}
