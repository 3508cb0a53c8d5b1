package beam

import (
	"math"
	"sync"

	"halfvalue/exposure/beam/internal/electron"
)

// thickTables hold what a thick target generates, by the logarithm of the
// electron's first energy (x) and by the square root of photon energy over
// electron energy (y).
type thickTables struct {
	yield *table // ln of photons per keV and electron in all directions, times k^2/(T0-k)
	depth *table // mean depth of generation, g/cm2 over the range
	form  *table // square of the mean depth over its variance
	reach *table // ln of the range, g/cm2, by x alone
}

const (
	energyNodes = 24
	shareNodes  = 28
	leastRoot   = 0.05 // of photon energy over electron energy: 1.1 keV at 450 kV
)

var slowingRule = sync.OnceValue(func() gauss { return newGauss(20) })

// newThickTables integrates over the slowing down of electrons in t.
func newThickTables(t *target) *thickTables {
	x0, x1 := math.Log(lowTableKV), math.Log(MostKV+1.0)
	cross := newTable(math.Log(CutoffKeV*0.9), x1, energyNodes, leastRoot, 1, shareNodes, func(x, y float64) float64 {
		keV := math.Exp(x)
		k := keV * min(y*y, 0.9999)
		return math.Log(t.matter.Bremsstrahlung(keV, k) * k)
	})
	tt := &thickTables{}
	at := func(x, y float64) (yield, mean, square float64) { return t.generated(cross, math.Exp(x), y*y) }
	tt.yield = newTable(x0, x1, energyNodes, leastRoot, 1, shareNodes, func(x, y float64) float64 {
		yield, _, _ := at(x, y)
		return math.Log(yield)
	})
	tt.depth = newTable(x0, x1, energyNodes, leastRoot, 1, shareNodes, func(x, y float64) float64 {
		_, mean, _ := at(x, y)
		return mean
	})
	tt.form = newTable(x0, x1, energyNodes, leastRoot, 1, shareNodes, func(x, y float64) float64 {
		_, mean, square := at(x, y)
		return mean * mean / (square - mean*mean)
	})
	tt.reach = newTable(x0, x1, energyNodes, 0, 1, 4, func(x, _ float64) float64 {
		return math.Log(t.matter.Range(math.Exp(x)))
	})
	return tt
}

// depthForm is the square of the mean depth over the variance of the depth of
// electrons that have the same energy left: 3.3 for every target and energy
// within the walk's noise, except next to the surface.
const depthForm = 3.3

// generated gives, for electrons of keV in t and photons of the share kappa of
// it, photon energy squared over (keV - photon energy) times the photons per
// keV and electron, emission towards the beam as if it were so everywhere, and
// the first two moments of their depth in ranges.
func (t *target) generated(cross *table, keV, kappa float64) (yield, mean, square float64) {
	kappa = min(kappa, 0.9999)
	k := kappa * keV
	rule := slowingRule()
	var sum, first, second float64
	for i, v := range rule.x {
		e := k + (keV-k)*v
		s := slowedAt(t.rows, keV, e/keV)
		part := rule.w[i] * math.Exp(cross.at(math.Log(e), math.Sqrt(k/e))) / t.matter.Stopping(e) * s.track * s.doppler
		sum += part
		first += part * s.depth
		second += part * s.depth * s.depth * (1 + 1/depthForm)
	}
	yield = sum * electron.Avogadro / t.matter.A * k
	return yield, first / sum, second / sum
}
