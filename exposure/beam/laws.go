package beam

// AngstromKeV is h c: wavelength in angstrom times photon energy in keV
// (CODATA 2018).
const AngstromKeV = 12.39841984

// rydbergKeV is the Rydberg energy, keV (CODATA 2018).
const rydbergKeV = 0.013605693

// DuaneHuntAngstrom gives the shortest wavelength of a tube at kV, 12.398
// angstrom / kV: the whole energy of an electron in one photon. Spectra end
// there exactly.
func DuaneHuntAngstrom(kV float64) float64 { return AngstromKeV / kV }

// MoseleyKAlphaKeV gives the energy of K-alpha of element z by Moseley's law,
// 3/4 Ry (Z-1)^2: within 1 % to copper, 8 % low at tungsten. It is a check of
// order; Tube uses measured lines.
func MoseleyKAlphaKeV(z int) float64 { return 0.75 * rydbergKeV * float64((z-1)*(z-1)) }

// MoseleyLAlphaKeV gives the energy of L-alpha by Moseley's law,
// 5/36 Ry (Z-7.4)^2.
func MoseleyLAlphaKeV(z int) float64 {
	return 5.0 / 36 * rydbergKeV * (float64(z) - 7.4) * (float64(z) - 7.4)
}
