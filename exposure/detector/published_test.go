package detector

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// published reads a file of published values.
func published(t testing.TB, name string, into any) {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "..", "testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

func lookup(t testing.TB, name string) *materials.Material {
	t.Helper()
	m, err := materials.Lookup(name)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// source is a head behind its window or a nuclide, per unit of strength.
func source(t testing.TB, kV float64, nuclide string) beam.Spectrum {
	t.Helper()
	var s beam.Spectrum
	var err error
	if nuclide != "" {
		s, err = beam.Sealed(plan.Sealed{Nuclide: nuclide, SizeMM: 3, Basis: beam.Output})
	} else {
		s, err = beam.Tube(plan.Tube{KV: kV, MA: 1, FocusMM: 3, Target: "W", AnodeDeg: 20, Waveform: "constant", Filters: []plan.Filter{{Material: "Be", MM: 2.4}}})
	}
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// behind gives what a film makes of unscattered and of scattered radiation, and
// the air kerma of both, behind a slab.
func behind(t testing.TB, s beam.Spectrum, material string, mm float64, screens Screens) (primary, scattered, kerma float64) {
	t.Helper()
	x, err := transport.Slab([]transport.Layer{{Material: lookup(t, material), MM: mm}}, s.KeV, s.PerCM2)
	if err != nil {
		t.Fatal(err)
	}
	for i, n := range x.Primary {
		primary += n * screens.Response(s.KeV[i])
		kerma += n * beam.KermaPerFluence(s.KeV[i])
	}
	for i, n := range x.Scatter {
		scattered += n * screens.Response(x.MeanKeV[i])
		kerma += n * beam.KermaPerFluence(x.MeanKeV[i])
	}
	return primary, scattered, kerma
}

func TestGradientsAreTheClassFloors(t *testing.T) {
	var file struct {
		GradientFloors []struct {
			Class                      string
			G2, G4, GranularityCeiling float64
		}
	}
	published(t, "film-classes.json", &file)
	for _, row := range file.GradientFloors {
		f, err := FilmByClass(row.Class)
		if err != nil {
			t.Fatal(err)
		}
		g2, g4 := f.Gradient(f.BaseAndFog+2), f.Gradient(f.BaseAndFog+4)
		if math.Abs(g2/row.G2-1) > 1e-9 || math.Abs(g4/row.G4-1) > 1e-6 {
			t.Errorf("%s: gradients %g at 2 and %g at 4, class floors %g and %g", row.Class, g2, g4, row.G2, row.G4)
		}
		if f.Granularity > row.GranularityCeiling {
			t.Errorf("%s: granularity %g above %g", row.Class, f.Granularity, row.GranularityCeiling)
		}
	}
}

func TestSpeedsLieInTheirClass(t *testing.T) {
	var file struct {
		Ks []struct {
			Class             string
			LeastMGy, MostMGy float64
		}
	}
	published(t, "film-speed.json", &file)
	last := math.Inf(1)
	for _, row := range file.Ks {
		f, err := FilmByClass(row.Class)
		if err != nil {
			t.Fatal(err)
		}
		x, err := f.DoseMGy(f.BaseAndFog + 2)
		if err != nil || math.Abs(x/f.KsMGy-1) > 1e-9 {
			t.Errorf("%s: density 2 above base and fog takes %g mGy (%v), Ks is %g", row.Class, x, err, f.KsMGy)
		}
		if x < row.LeastMGy*(1-1e-9) || x > row.MostMGy*(1+1e-9) {
			t.Errorf("%s: Ks %g mGy is outside %g to %g", row.Class, x, row.LeastMGy, row.MostMGy)
		}
		if x >= last {
			t.Errorf("%s is not faster than the class before it", row.Class)
		}
		last = x
	}
}

func TestISO7004Beam(t *testing.T) {
	var file struct {
		Beam struct{ HVLMMCu, Within, ScreensLeastMM, ScreensMostMM float64 }
	}
	published(t, "film-speed.json", &file)
	s, err := ISO7004Beam()
	if err != nil {
		t.Fatal(err)
	}
	hvl, _ := s.InAir(beam.AirPathMM).HVL(lookup(t, "Cu"))
	t.Logf("HVL %.3g mm Cu, mean %.0f keV", hvl, s.MeanKeV())
	if math.Abs(hvl-file.Beam.HVLMMCu) > file.Beam.Within {
		t.Errorf("HVL %g mm Cu, the standard asks %g +-%g", hvl, file.Beam.HVLMMCu, file.Beam.Within)
	}
	for _, mm := range iso7004Screens {
		if mm < file.Beam.ScreensLeastMM || mm > file.Beam.ScreensMostMM {
			t.Errorf("screen of %g mm, the standard asks %g to %g", mm, file.Beam.ScreensLeastMM, file.Beam.ScreensMostMM)
		}
	}
	// A film in that beam answers to its air kerma, one to one.
	s = s.InAir(beam.AirPathMM)
	var x float64
	for i, n := range s.PerCM2 {
		x += EquivalentMGy(n * Response(s.KeV[i], iso7004Screens))
	}
	if math.Abs(x/s.KermaMGy()-1) > 1e-9 {
		t.Errorf("the film answers to %g mGy of %g", x, s.KermaMGy())
	}
}

// The published effect of lead screens, reported. What must hold: screens slow
// down soft beams, gain with the hardness of the beam up to Ir-192, and lie
// within 0.3 of the published relative exposure.
func TestLeadScreensAgainstNone(t *testing.T) {
	var file struct {
		Rows []struct {
			Name, Nuclide                 string
			KV, SteelMM, RelativeExposure float64
		}
	}
	published(t, "film-screens.json", &file)
	none, lead := NewScreens([2]float64{}), NewScreens([2]float64{0.1, 0.1})
	last := math.Inf(1)
	for _, row := range file.Rows {
		s := source(t, row.KV, row.Nuclide)
		p0, s0, _ := behind(t, s, "carbon-steel", row.SteelMM, none)
		p1, s1, _ := behind(t, s, "carbon-steel", row.SteelMM, lead)
		got := (p0 + s0) / (p1 + s1)
		t.Logf("%s, %g mm steel: relative exposure %.2f, published %.2f", row.Name, row.SteelMM, got, row.RelativeExposure)
		if math.Abs(got-row.RelativeExposure) > 0.3 || got >= last {
			t.Errorf("%s: relative exposure %g (published %g), after %g of the softer beam", row.Name, got, row.RelativeExposure, last)
		}
		last = got
	}
	soft := source(t, 60, "")
	p0, s0, _ := behind(t, soft, "al-6061", 10, none)
	p1, s1, _ := behind(t, soft, "al-6061", 10, lead)
	if got := (p0 + s0) / (p1 + s1); got < 1.5 {
		t.Errorf("60 kV: relative exposure with lead %g, the front screen should cost more", got)
	}
}

// Scattered to unscattered radiation at the film: reported. What the handbook
// prints must be met within 30 %, what is from memory within a factor of 2.
func TestScatterAtTheFilm(t *testing.T) {
	var file struct {
		Rows []struct {
			Name, Nuclide, Material, Confidence string
			KV, MM, Ratio                       float64
		}
	}
	published(t, "film-scatter.json", &file)
	for _, row := range file.Rows {
		p, s, _ := behind(t, source(t, row.KV, row.Nuclide), row.Material, row.MM, NewScreens([2]float64{0.1, 0.1}))
		t.Logf("%s: %.2f, published %.2f (%s)", row.Name, s/p, row.Ratio, row.Confidence)
		within := 2.0
		if strings.HasPrefix(row.Confidence, "seen") {
			within = 1.3
		}
		if r := s / p / row.Ratio; r < 1/within || r > within {
			t.Errorf("%s: %g, published %g (%s)", row.Name, s/p, row.Ratio, row.Confidence)
		}
	}
}

// The dose that gamma rays take against the beam of ISO 7004: it falls out of
// the response and is reported; published figures are from memory.
func TestGammaTakesMoreDose(t *testing.T) {
	var file struct {
		DoseFactors []struct {
			Nuclide     string
			Least, Most float64
			Confidence  string
		}
	}
	published(t, "film-speed.json", &file)
	last := 1.0
	for _, row := range file.DoseFactors {
		p, s, kerma := behind(t, source(t, 0, row.Nuclide), "carbon-steel", 20, NewScreens([2]float64{0.1, 0.1}))
		got := kerma / EquivalentMGy(p+s)
		t.Logf("%s behind 20 mm steel: %.2f times the dose of ISO 7004's beam, published %g to %g (%s)", row.Nuclide, got, row.Least, row.Most, row.Confidence)
		if got <= last {
			t.Errorf("%s: factor %g is not above %g", row.Nuclide, got, last)
		}
		last = got
	}
}
