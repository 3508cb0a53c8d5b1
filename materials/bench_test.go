package materials

import "testing"

// energies in steps that jump about, so that no look-up helps the next.
func scattered() []float64 {
	keV := make([]float64, 1024)
	for i := range keV {
		keV[i] = 10 + float64((i*389)%1024)*0.78
	}
	return keV
}

var sink float64

// BenchmarkMuRho is one look-up of the total for one element, as xraylib's
// CS_Total does it; against_xraylib.sh runs both.
func BenchmarkMuRho(b *testing.B) {
	for _, name := range []string{"Fe", "Pb", "stainless-316l"} {
		b.Run(name, func(b *testing.B) {
			m, keV := lookup(b, name), scattered()
			m.MuRho(100)
			i := 0
			for b.Loop() {
				sink += m.MuRho(keV[i&1023])
				i++
			}
		})
	}
}

// BenchmarkMuPerMMInto is the whole spectrum of a 450 kV tube, 450 bins.
func BenchmarkMuPerMMInto(b *testing.B) {
	m := lookup(b, "carbon-steel")
	keV, dst := make([]float64, 450), make([]float64, 450)
	for i := range keV {
		keV[i] = float64(i) + 1
	}
	b.ReportAllocs()
	for b.Loop() {
		m.MuPerMMInto(dst, keV)
	}
}

// BenchmarkFirstUse is what a material of nine elements costs once.
func BenchmarkFirstUse(b *testing.B) {
	parts := lookup(b, "n06625").Fractions()
	for b.Loop() {
		m, err := New("x", 8, parts)
		if err != nil {
			b.Fatal(err)
		}
		sink += m.MuRho(100)
	}
}

// BenchmarkTable is unpacking and parsing the embedded table, once a run.
func BenchmarkTable(b *testing.B) {
	for b.Loop() {
		if _, err := parseTable(xcomGZ); err != nil {
			b.Fatal(err)
		}
	}
}
