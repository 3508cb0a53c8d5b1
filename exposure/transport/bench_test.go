package transport

import (
	"math"
	"testing"

	"halfvalue/materials"
)

func lookup(t testing.TB, name string) *materials.Material {
	t.Helper()
	m, err := materials.Lookup(name)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// kramers is a crude tube spectrum for tests of speed and of sums: photons in
// 1 keV bins, 1/E - 1/E0, behind 3 mm Al.
func kramers(t testing.TB, kv float64) (keV, perCM2 []float64) {
	al := lookup(t, "Al")
	for e := 10.5; e < kv; e++ {
		keV = append(keV, e)
		perCM2 = append(perCM2, (kv/e-1)*math.Exp(-3*al.MuPerMM(e)))
	}
	return keV, perCM2
}

func BenchmarkSlabSteel(b *testing.B) { benchmarkSlab(b, 450, Layer{lookup(b, "carbon-steel"), 20}) }
func BenchmarkSlabStainless(b *testing.B) {
	benchmarkSlab(b, 450, Layer{lookup(b, "stainless-304"), 20})
}
func BenchmarkSlabThreeLayers(b *testing.B) {
	benchmarkSlab(b, 450, Layer{lookup(b, "mineral-wool"), 80}, Layer{lookup(b, "carbon-steel"), 10}, Layer{lookup(b, "water"), 100})
}

func benchmarkSlab(b *testing.B, kv float64, layers ...Layer) {
	e, n := kramers(b, kv)
	for b.Loop() {
		if _, err := Slab(layers, e, n); err != nil {
			b.Fatal(err)
		}
	}
}
