package electron

import "math"

// Bremsstrahlung gives the cross section per photon energy, cm2/keV, for an
// electron of kinetic energy keV to make a photon of photonKeV in the field
// of one atom, integrated over all directions; 0 where photonKeV >= keV.
//
// It is the relativistic Born approximation (Bethe and Heitler; formula 3BN of
// Koch and Motz, Rev Mod Phys 31, 920, 1959) times Elwert's Coulomb factor,
// times three corrections: the ratio of Sommerfeld's exact non-relativistic
// result to Elwert's (at most 30 %, see sommerfeldToElwert), the screening of
// a Thomas-Fermi atom (see screened), and 1 + (alpha Z)^2 (photonKeV/keV)^4
// for the strong field at the tip, where Elwert's factor is known to be too
// small for heavy atoms; detailed balance with the photoelectric cross section
// gives 1.2 to 1.4 for tungsten at 300 keV. Against the radiation yields
// that are published for thick targets the result is within about 10 %.
func (m Matter) Bremsstrahlung(keV, photonKeV float64) float64 {
	if !(photonKeV > 0 && photonKeV < keV) {
		return 0
	}
	eta := float64(m.Z) * FineStructure
	kappa := photonKeV / keV
	tip := 1 + eta*eta*kappa*kappa*kappa*kappa
	return born(m.Z, keV, photonKeV) * elwert(m.Z, keV, photonKeV) * sommerfeldToElwert(m.Z, keV, photonKeV) *
		screened(m.Z, keV, photonKeV) * tip
}

// born is formula 3BN, cm2/keV.
func born(z int, keV, photonKeV float64) float64 {
	e0 := keV/RestKeV + 1
	k := photonKeV / RestKeV
	e := e0 - k
	p0, p := math.Sqrt(e0*e0-1), math.Sqrt(e*e-1)
	l := 2 * math.Log((e0*e+p0*p-1)/k)
	eps0, eps := 2*math.Log(e0+p0), 2*math.Log(e+p)
	p02, p2 := p0*p0, p*p
	bracket := 4.0/3 - 2*e0*e*(p2+p02)/(p2*p02) + eps0*e/(p0*p02) + eps*e0/(p*p2) - eps*eps0/(p0*p) +
		l*(8*e0*e/(3*p0*p)+k*k*(e0*e0*e*e+p02*p2)/(p0*p02*p*p2)+
			k/(2*p0*p)*((e0*e+p02)/(p0*p02)*eps0-(e0*e+p2)/(p*p2)*eps+2*k*e0*e/(p2*p02)))
	zz := float64(z * z)
	return FineStructure * zz * RadiusCM * RadiusCM * p / p0 / photonKeV * bracket
}

// elwert is Elwert's factor: the electron's density at the nucleus after
// against before.
func elwert(z int, keV, photonKeV float64) float64 {
	before, after := Beta(keV), Beta(keV-photonKeV)
	a := 2 * math.Pi * float64(z) * FineStructure
	return before * (1 - math.Exp(-a/before)) / (after * (1 - math.Exp(-a/after)))
}

// screened is the share of the Born cross section that the electrons of the
// atom leave: the ratio of the non-relativistic Born result in the potential
// exp(-r/a)/r to that in 1/r, a being the Thomas-Fermi radius.
func screened(z int, keV, photonKeV float64) float64 {
	p0, p := Momentum(keV), Momentum(keV-photonKeV)
	s := math.Cbrt(float64(z)) * FineStructure / 0.885
	most, least, s2 := (p0+p)*(p0+p), (p0-p)*(p0-p), s*s
	bare := math.Log(most/least) / 2
	return (math.Log((most+s2)/(least+s2))/2 + s2/2*(1/(most+s2)-1/(least+s2))) / bare
}
