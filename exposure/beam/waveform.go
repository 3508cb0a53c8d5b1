package beam

import (
	"fmt"
	"math"
	"sync"
)

// moment is a part of the cycle: voltage against the peak, and the share of
// the charge that passes then.
type moment struct{ voltage, charge float64 }

// saturation is the share of the peak voltage from which the filament, no
// longer the space charge, limits the current of a pulsed head.
const saturation = 0.5

// waveform gives the parts of the cycle. With constant potential there is one.
// Two-pulse and self-rectified heads see half waves of a sine; the current
// follows the voltage to the power 3/2 (Child's law) up to saturation and is
// constant above. Both conduct on the same half wave, so the same mean current
// gives the same spectrum; what a head's transformer sags under load and how
// its filament is set are unknown: allow 15 % on the output.
func waveform(name string) ([]moment, error) {
	switch name {
	case "constant":
		return constant, nil
	case "two-pulse", "self-rectified":
		return halfWave(), nil
	}
	return nil, fmt.Errorf("waveform %q is unknown: want constant, two-pulse or self-rectified", name)
}

var constant = []moment{{1, 1}}

// halfWave divides a quarter of a sine at the knee of the current and each
// part by Gauss-Legendre; sums over a spectrum are within 1 % of those of a
// fine division.
var halfWave = sync.OnceValue(func() []moment {
	knee := math.Asin(saturation)
	var out []moment
	var all float64
	panel := func(n int, from, to float64) {
		rule := newGauss(n)
		for i, x := range rule.x {
			v := math.Sin(from + (to-from)*x)
			charge := rule.w[i] * (to - from) * min(1, math.Pow(v/saturation, 1.5))
			out = append(out, moment{v, charge})
			all += charge
		}
	}
	panel(2, 0, knee)
	panel(5, knee, math.Pi/2)
	for i := range out {
		out[i].charge /= all
	}
	return out
})
