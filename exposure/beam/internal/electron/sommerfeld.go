package electron

import (
	"math"
	"math/cmplx"
)

// sommerfeldToElwert is the ratio of Sommerfeld's exact non-relativistic
// bremsstrahlung spectrum in a Coulomb field (Ann Phys 11, 257, 1931, in
// Biedenharn's form) to the Born spectrum times Elwert's factor.
func sommerfeldToElwert(z int, keV, photonKeV float64) float64 {
	before := float64(z) * FineStructure / Beta(keV)
	after := float64(z) * FineStructure / Beta(keV-photonKeV)
	return coulombRatio(before, after)
}

// coulombRatio takes the Sommerfeld parameters alpha Z/beta of the electron
// before and after; after > before > 0. Next to the soft end, where the two
// are almost equal, it keeps the value at a distance of 1 %.
func coulombRatio(before, after float64) float64 {
	after = max(after, 1.02*before)
	return gaunt(before, after) / gauntElwert(before, after)
}

// gauntElwert is the Gaunt factor of Born and Elwert.
func gauntElwert(before, after float64) float64 {
	return math.Sqrt(3) / math.Pi * math.Log((after+before)/(after-before)) *
		after * -math.Expm1(-2*math.Pi*before) / (before * -math.Expm1(-2*math.Pi*after))
}

// gaunt is Sommerfeld's Gaunt factor in an attractive field,
//
//	g = sqrt(3) pi x d|F|^2/dx / ((exp(2 pi before) - 1)(1 - exp(-2 pi after)))
//
// with F = 2F1(i before, i after; 1; x) and x = -4 before after/(after-before)^2.
func gaunt(before, after float64) float64 {
	a, b := complex(0, before), complex(0, after)
	d := (after - before) * (after - before)
	x := -4 * before * after / d
	y := d / ((after + before) * (after + before)) // 1/(1-x)
	f := hypergeometric(a, b, 1, x, y)
	df := a * b * hypergeometric(a+1, b+1, 2, x, y)
	slope := 2 * real(cmplx.Conj(f)*df)
	return math.Sqrt(3) * math.Pi * x * slope / (math.Expm1(2*math.Pi*before) * -math.Expm1(-2*math.Pi*after))
}

// hypergeometric is 2F1(a, b; c; x) for x < 0 and y = 1/(1-x), by its series
// where x > -1/2 and else by the series in y (Abramowitz and Stegun 15.3.8);
// a-b must be no integer.
func hypergeometric(a, b, c complex128, x, y float64) complex128 {
	if x > -0.5 {
		return series(a, b, c, x)
	}
	ln := complex(math.Log(y), 0)
	first := cmplx.Exp(a*ln+lnGamma(c)+lnGamma(b-a)-lnGamma(b)-lnGamma(c-a)) * series(a, c-b, a-b+1, y)
	second := cmplx.Exp(b*ln+lnGamma(c)+lnGamma(a-b)-lnGamma(a)-lnGamma(c-b)) * series(b, c-a, b-a+1, y)
	return first + second
}

func series(a, b, c complex128, x float64) complex128 {
	sum, term := complex128(1), complex128(1)
	for n := range 400 {
		k := complex(float64(n), 0)
		term *= (a + k) * (b + k) / (c + k) * complex(x/float64(n+1), 0)
		sum += term
		if cmplx.Abs(term) < 1e-15*cmplx.Abs(sum) {
			break
		}
	}
	return sum
}

// lnGamma is the logarithm of the gamma function by Lanczos' sum (g = 7, nine
// terms), by reflection left of 1/2.
func lnGamma(z complex128) complex128 {
	if real(z) < 0.5 {
		return cmplx.Log(math.Pi/cmplx.Sin(math.Pi*z)) - lnGamma(1-z)
	}
	z--
	sum := complex(0.99999999999980993, 0)
	for i, c := range [...]float64{676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
		12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7} {
		sum += complex(c, 0) / (z + complex(float64(i+1), 0))
	}
	t := z + 7.5
	return complex(math.Log(2*math.Pi)/2, 0) + (z+0.5)*cmplx.Log(t) - t + cmplx.Log(sum)
}
