package beam

import (
	"testing"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// head is a tube as crews have it.
func head(kV float64) plan.Tube {
	return plan.Tube{KV: kV, MA: 5, Target: "W", AnodeDeg: 20, Waveform: "constant",
		Filters: []plan.Filter{{Material: "Be", MM: 2.4}, {Material: "al-1050a", MM: 0.5}}}
}

func BenchmarkTube200(b *testing.B) { benchmarkTube(b, head(200)) }
func BenchmarkTube450(b *testing.B) { benchmarkTube(b, head(450)) }
func BenchmarkPulsed200(b *testing.B) {
	t := head(200)
	t.Waveform = "self-rectified"
	benchmarkTube(b, t)
}

func benchmarkTube(b *testing.B, t plan.Tube) {
	b.ReportAllocs()
	for b.Loop() {
		s, err := Tube(t)
		if err != nil {
			b.Fatal(err)
		}
		if !(s.KermaMGy() > 0 && s.AmbientUSv() > 0 && s.MeanKeV() > 0) {
			b.Fatal("no beam")
		}
	}
}

func BenchmarkHVL(b *testing.B) {
	s, err := Tube(head(200))
	if err != nil {
		b.Fatal(err)
	}
	m, err := materials.Lookup("Cu")
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		s.HVL(m)
	}
}

func BenchmarkSealed(b *testing.B) {
	for _, n := range []string{"Ir-192", "Tm-170"} {
		b.Run(n, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Sealed(plan.Sealed{Nuclide: n, SizeMM: 3}); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkFirstTarget is what the first spectrum of a target costs more.
func BenchmarkFirstTarget(b *testing.B) {
	for b.Loop() {
		newTarget("W")
	}
}
