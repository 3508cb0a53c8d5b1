package electron

// Targets gives the elements that serve as a tube's target, by rising Z, with
// atomic weights as of IUPAC and mean excitation energies of ICRU 37.
func Targets() []Matter {
	return []Matter{
		{24, 51.996, 0.257},
		{29, 63.546, 0.322},
		{42, 95.95, 0.424},
		{45, 102.906, 0.449},
		{74, 183.84, 0.727},
		{79, 196.967, 0.790},
	}
}
