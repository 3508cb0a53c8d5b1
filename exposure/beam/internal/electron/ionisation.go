package electron

import "math"

// Ionisation gives the cross section, cm2, for an electron of kinetic energy
// keV to knock out one of n electrons bound with shellKeV; 0 below shellKeV.
// It is the formula of Casnati, Tartari and Baraldi (J Phys B 15, 155, 1982)
// with Gryzinski's relativistic factor.
func Ionisation(keV, shellKeV float64, n int) float64 {
	if keV <= shellKeV {
		return 0
	}
	const (
		rydbergKeV = 0.01360569
		bohrCM     = 5.2917721e-9
	)
	u := keV / shellKeV
	j := RestKeV / shellKeV
	q := (1 + j) * (1 + j)
	r := (1 + 2*j) / (u + 2*j) * (u + j) * (u + j) / q *
		math.Pow((1+u)*(u+2*j)*q/(j*j*(1+2*j)+u*(u+2*j)*q), 1.5)
	psi := math.Pow(shellKeV/rydbergKeV, -0.0318+0.3160/u-0.1135/(u*u))
	phi := 10.57 * math.Exp(-1.736/u+0.317/(u*u))
	return float64(n) * bohrCM * bohrCM * rydbergKeV * rydbergKeV * r * psi * phi * math.Log(u) / (shellKeV * keV)
}
