package detector

import "math"

const electronKeV = 510.99895

// rangeGPerCM2 is the electron range of Katz and Penfold (Rev. Mod. Phys. 24,
// 28, 1952), 10 keV to 2.5 MeV; below, the formula's own continuation.
func rangeGPerCM2(keV float64) float64 {
	t := max(keV, 1) / 1000
	return 0.412 * math.Pow(t, 1.265-0.0954*math.Log(t))
}

// cavityWeight is Burlin's d: the mean share of the electrons of the wall over
// a cavity of mean chord g, both in g/cm2; 1-d is the share of its own.
func cavityWeight(keV, g float64) float64 {
	x := g * math.Log(100) / rangeGPerCM2(keV)
	if x < 1e-9 {
		return 1
	}
	return -math.Expm1(-x) / x
}

// stopping is the mass collision stopping power of electrons by Bethe's
// formula (ICRU 37) up to a factor common to all media; below twice the mean
// excitation energy the formula fails and its value there stands.
func stopping(keV, zOverA, excitationKeV float64) float64 {
	t := max(keV, 2*excitationKeV)
	tau := t / electronKeV
	b2 := tau * (tau + 2) / ((tau + 1) * (tau + 1))
	f := 1 - b2 + (tau*tau/8-(2*tau+1)*math.Ln2)/((tau+1)*(tau+1))
	q := t / excitationKeV
	return zOverA / b2 * (math.Log(q*q) + math.Log(1+tau/2) + f)
}

// comptonKeV is the mean energy of a recoil electron, by Klein and Nishina:
// the ratio of energy transfer and total cross section (Evans' closed forms).
func comptonKeV(keV float64) float64 {
	a := keV / electronKeV
	l := math.Log1p(2 * a)
	total := (1+a)/(a*a)*(2*(1+a)/(1+2*a)-l/a) + l/(2*a) - (1+3*a)/((1+2*a)*(1+2*a))
	scattered := l/(a*a*a) + 2*(1+a)*(2*a*a-2*a-1)/(a*a*(1+2*a)*(1+2*a)) + 8*a*a/(3*(1+2*a)*(1+2*a)*(1+2*a))
	if a < 0.002 { // the closed forms cancel; first terms of their series
		return keV * a * (1 - 2.2*a)
	}
	return keV * (1 - scattered/(2*total))
}
