// Package electron slows electrons down in a thick piece of one element and
// gives the bremsstrahlung that they make on the way: stopping power, range,
// a single-scattering walk, and the cross section of bremsstrahlung with its
// Coulomb and screening corrections. It serves the tube's target and the beta
// particles of a sealed source; it knows no geometry of either.
package electron

import "math"

// Physical constants (CODATA 2018).
const (
	RestKeV       = 510.99895      // m c^2 of the electron
	FineStructure = 1 / 137.035999 // alpha
	RadiusCM      = 2.8179403e-13  // classical radius of the electron, cm
	Avogadro      = 6.02214076e23  // 1/mol
	PerMAs        = 6.241509074e15 // electrons in one mA s
)

// Matter is one element as electrons see it.
type Matter struct {
	Z    int
	A    float64 // atomic weight
	JKeV float64 // mean excitation energy, keV
}

// Beta gives v/c of an electron of kinetic energy keV.
func Beta(keV float64) float64 {
	t := keV / RestKeV
	return math.Sqrt(t*(t+2)) / (t + 1)
}

// Momentum gives the momentum of an electron in units of m c.
func Momentum(keV float64) float64 {
	t := keV / RestKeV
	return math.Sqrt(t * (t + 2))
}

// Stopping gives the collision stopping power in keV cm2/g at kinetic energy
// keV, 1 to 1000 keV: Bethe's formula for electrons with the mean excitation
// energy of ICRU 37, lowered at small energies as by Joy and Luo (1989). The
// density effect, under 1 % below 500 keV, is left out.
func (m Matter) Stopping(keV float64) float64 {
	j := m.JKeV / (1 + 0.85*m.JKeV/keV)
	t := keV / RestKeV
	b2 := t * (t + 2) / ((t + 1) * (t + 1))
	f := (1 - b2) * (1 + t*t/8 - (2*t+1)*math.Ln2)
	r := RestKeV / j
	return 153.536 * float64(m.Z) / m.A / b2 * (math.Log(t*t*(t+2)/2*r*r) + f)
}

// Range gives the path in g/cm2 on which an electron of kinetic energy keV
// comes to rest, slowing down continuously.
func (m Matter) Range(keV float64) float64 {
	const steps = 400
	var sum float64
	for i := range steps {
		sum += 1 / m.Stopping(keV*(float64(i)+0.5)/steps)
	}
	return sum * keV / steps
}
