package photon

import (
	"math"

	"halfvalue/materials"
)

// grazing is the cosine below which a crossing counts with the mean of 1/cos
// of an even field, 2/grazing, instead of its own: that keeps the variance
// finite.
const grazing = 0.04

// Plane is what leaves one slab per incident photon.
type Plane struct {
	Flux     [ExitBins]float64                 // scattered fluence behind the slab, photons/cm2 per incident photon/cm2
	FluxKeV  [ExitBins]float64                 // times energy
	Forward  [AngleBins][AngleExitBins]float64 // photons out of the far side
	Backward [AngleBins][AngleExitBins]float64 // photons out of the near side
	Kerma    float64                           // pGy cm2 per incident photon/cm2: scattered air kerma behind the slab
	Current  float64                           // energy out of the far side, keV, scattered
	Return   float64                           // energy out of the near side, keV
}

// add adds s times the tally q.
func (p *Plane) add(q *Plane, s float64) {
	for i := range p.Flux {
		p.Flux[i] += s * q.Flux[i]
		p.FluxKeV[i] += s * q.FluxKeV[i]
	}
	for a := range p.Forward {
		for i := range p.Forward[a] {
			p.Forward[a][i] += s * q.Forward[a][i]
			p.Backward[a][i] += s * q.Backward[a][i]
		}
	}
	p.Kerma += s * q.Kerma
	p.Current += s * q.Current
	p.Return += s * q.Return
}

// KermaPerFluence is air kerma per photon/cm2 in pGy cm2: 0.1602 pGy per keV/g.
func KermaPerFluence(e float64) float64 { return 0.1602176634 * e * materials.MuEnRhoAir(e) }

// kermaOfCell is KermaPerFluence at the lower end of each cell and one more.
var kermaOfCell = func() (k [cellCount + 1]float64) {
	for i := range k {
		k[i] = KermaPerFluence(math.Float64frombits(firstBits + uint64(i)<<cellShift))
	}
	return k
}()

func kerma(e float64) float64 {
	bits := math.Float64bits(e) - firstBits
	i, t := bits>>cellShift, float64(int64(bits&cellMask))*cellStep
	return kermaOfCell[i]*(1-t) + kermaOfCell[i+1]*t
}

func (p *Plane) leave(w, e, u float64) {
	f := w / u
	if u < grazing {
		f = w * (2 / grazing)
	}
	i := ExitBin(e)
	p.Flux[i] += f
	p.FluxKeV[i] += f * e
	p.Kerma += f * kerma(e)
	p.Current += w * e
	p.Forward[angleBin(u)][i/2] += w
}

func (p *Plane) back(w, e, u float64) {
	p.Return += w * e
	p.Backward[angleBin(u)][ExitBin(e)/2] += w
}
