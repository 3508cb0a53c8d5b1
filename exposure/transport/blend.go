package transport

import (
	"math"
	"sync"

	"halfvalue/materials"
)

// share is the weight of one base in a blend.
type share struct {
	base   int
	weight float64
}

// blend stands for a material as a mixture of two neighbouring bases, in mean
// free path space, one pair for each energy of blendKeV.
type blend struct {
	pairs [][2]share
}

// blendKeV are the energies where the pairs are found, even in the logarithm.
const (
	blendCount = 48
	blendFirst = 10.0
	blendLast  = 3000.0
)

var (
	blendLn    = math.Log(blendFirst)
	blendPerLn = (blendCount - 1) / math.Log(blendLast/blendFirst)
)

var blends sync.Map // *materials.Material to *blend

func blendOf(m *materials.Material) *blend {
	if b, ok := blends.Load(m); ok {
		return b.(*blend)
	}
	b := &blend{}
	for i := range blendCount {
		e := blendFirst * math.Exp(float64(i)/(blendCount-1)*math.Log(blendLast/blendFirst))
		b.pairs = append(b.pairs, bracket(m, e))
	}
	blends.Store(m, b)
	return b
}

// at gives the pair for an energy: the nearest of the blend.
func (b *blend) at(lnKeV float64) [2]share {
	i := int((lnKeV-blendLn)*blendPerLn + 0.5)
	return b.pairs[max(0, min(blendCount-1, i))]
}

// absorbing is the ratio of photoelectric to incoherent, which tells how far
// scattered photons get against unscattered ones; it rises with Z at an energy
// that lies on one side of all K edges concerned.
func absorbing(m *materials.Material, keV float64) float64 {
	return math.Log(m.MuRhoOf(materials.Photoelectric, keV) / m.MuRhoOf(materials.Incoherent, keV))
}

// comparedAt is the energy at which a material is compared with the bases for
// photons of keV. Scattered photons lose energy until absorption takes over,
// so it is not the energy of the incident photons, but one where the ratio of
// photoelectric to incoherent still tells; edges are kept out of the way.
func comparedAt(m *materials.Material, keV float64) float64 {
	var heavy float64
	for _, f := range m.Fractions() {
		if f.Z > 50 {
			heavy += f.Mass
		}
	}
	if heavy > 0.01 {
		return math.Min(200, math.Max(120, keV))
	}
	return math.Min(100, math.Max(30, keV))
}

// bracket finds the two bases between whose ratios the material's ratio lies.
func bracket(m *materials.Material, keV float64) [2]share {
	e := comparedAt(m, keV)
	own := absorbing(m, e)
	lo, hi := -1, -1
	var loR, hiR float64
	for i, b := range table() {
		r := absorbing(b.material, e)
		if r <= own && (lo < 0 || r > loR) {
			lo, loR = i, r
		}
		if r >= own && (hi < 0 || r < hiR) {
			hi, hiR = i, r
		}
	}
	switch {
	case lo < 0:
		return [2]share{{hi, 1}, {hi, 0}}
	case hi < 0 || lo == hi || hiR == loR:
		return [2]share{{lo, 1}, {lo, 0}}
	}
	w := (own - loR) / (hiR - loR)
	return [2]share{{lo, 1 - w}, {hi, w}}
}
