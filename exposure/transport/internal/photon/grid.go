package photon

import "math"

// ExitEdgesKeV are the edges of the bins of energy of photons that leave.
var ExitEdgesKeV = []float64{10, 13, 16, 20, 25, 30, 36, 43, 50, 58, 66, 75, 85, 95, 106, 120, 135, 150, 170, 195, 225,
	260, 300, 350, 400, 460, 530, 610, 700, 850, 1020, 1250, 1550, 2000, 2500, 3000, 4000}

// AngleEdgesDeg are the edges of the bins of angle against the normal of the
// surface that a photon leaves.
var AngleEdgesDeg = []float64{0, 10, 20, 30, 45, 60, 75, 90}

// Sizes of the tallies. The energy bins of the angular tallies are pairs of
// the exit bins.
const (
	ExitBins      = 36
	AngleBins     = 7
	AngleExitBins = ExitBins / 2
)

// exitOfCell is the exit bin of the lower end of each cell.
var exitOfCell = func() (bins [cellCount]uint8) {
	for i := range bins {
		e := math.Float64frombits(firstBits + uint64(i)<<cellShift)
		k := 0
		for k+1 < ExitBins && ExitEdgesKeV[k+1] <= e {
			k++
		}
		bins[i] = uint8(k)
	}
	return bins
}()

// ExitBin gives the bin of an energy of 10 to 4000 keV.
func ExitBin(e float64) int {
	k := int(exitOfCell[(math.Float64bits(e)-firstBits)>>cellShift])
	for k+1 < ExitBins && e >= ExitEdgesKeV[k+1] {
		k++
	}
	return k
}

var angleCos = func() (c [AngleBins]float64) {
	for i := range c {
		c[i] = math.Cos(AngleEdgesDeg[i+1] * math.Pi / 180)
	}
	return c
}()

// angleBin gives the bin of the cosine against the outward normal, 0 to 1.
func angleBin(u float64) int {
	for i, c := range angleCos {
		if u > c {
			return i
		}
	}
	return AngleBins - 1
}
