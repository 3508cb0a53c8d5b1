package transport

import "testing"

// behind gives primary and scattered air kerma behind layers.
func behind(t testing.TB, layers []Layer, keV, perCM2 []float64) (primary, scattered float64) {
	t.Helper()
	x, err := Slab(layers, keV, perCM2)
	if err != nil {
		t.Fatal(err)
	}
	for i, e := range keV {
		primary += x.Primary[i] * KermaPerFluence(e)
	}
	for i, e := range x.MeanKeV {
		scattered += x.Scatter[i] * KermaPerFluence(e)
	}
	return primary, scattered
}

// In an open field without end a thin slab of light material sends more air
// kerma behind it than came: what it scatters sideways arrives on a slant and
// counts by its path. That rise is real and stays under rise per step.
func TestMoreThicknessMoreScatterPerPrimaryLessKerma(t *testing.T) {
	const rise = 1.001
	for _, name := range []string{"carbon-steel", "stainless-304", "al-6061", "concrete", "lead", "water", "brass"} {
		m := lookup(t, name)
		for _, kv := range []float64{60, 160, 320} {
			e, n := kramers(t, kv)
			ratio, kerma := 0.0, 1e300
			for mm := 0.5; mm < 40; mm *= 1.3 {
				p, s := behind(t, []Layer{{m, mm}}, e, n)
				if p < 1e-12 {
					break
				}
				if s/p <= ratio {
					t.Errorf("%s %g kV: scatter to primary %g at %.3g mm is not above %g of the thinner slab", name, kv, s/p, mm, ratio)
				}
				if p+s >= kerma*rise {
					t.Errorf("%s %g kV: air kerma %g behind %.3g mm is not below %g of the thinner slab", name, kv, p+s, mm, kerma)
				}
				ratio, kerma = s/p, p+s
			}
		}
	}
}
