package transport

import (
	"encoding/json"
	"math"
	"os"
	"slices"
	"strconv"
	"strings"
	"testing"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
)

func read(t testing.TB, name string, into any) {
	t.Helper()
	text, err := os.ReadFile("../../testdata/" + name + ".json")
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(text, into); err != nil {
		t.Fatal(err)
	}
}

// source gives the spectrum of "200 kV" behind 3 mm Al, or of a nuclide in a capsule.
func source(t testing.TB, name string) beam.Spectrum {
	t.Helper()
	if kv, ok := strings.CutSuffix(name, " kV"); ok {
		v, err := strconv.ParseFloat(kv, 64)
		if err != nil {
			t.Fatal(err)
		}
		s, err := beam.Tube(plan.Tube{KV: v, MA: 1, FocusMM: 1, Target: "W", AnodeDeg: 20, Waveform: "constant", Filters: []plan.Filter{{Material: "Al", MM: 3}}})
		if err != nil {
			t.Fatal(err)
		}
		return s
	}
	n, err := beam.NuclideByName(name)
	if err != nil {
		t.Fatal(err)
	}
	return n.Output(3)
}

type layerFile struct {
	Tolerance float64
	AddLines  map[string]struct {
		KeV, PerDecay             []float64
		BesideKeV, BesidePerDecay float64
	}
	Rows []struct {
		Beam, Material string
		HVLMM, TVLMM   []float64
		Tolerance      float64
	}
}

// withLines adds the weak lines that the file names, unless the spectrum has them.
func (f *layerFile) withLines(name string, s beam.Spectrum) (keV, perCM2 []float64) {
	keV, perCM2 = slices.Clone(s.KeV), slices.Clone(s.PerCM2)
	add := f.AddLines[name]
	for i, e := range add.KeV {
		if slices.Max(keV) > e-5 {
			continue
		}
		for j, k := range s.KeV {
			if math.Abs(k-add.BesideKeV) < 0.5 {
				keV, perCM2 = append(keV, e), append(perCM2, s.PerCM2[j]*add.PerDecay[i]/add.BesidePerDecay)
			}
		}
	}
	return keV, perCM2
}

func TestPublishedBroadBeamLayers(t *testing.T) {
	var file layerFile
	read(t, "broadbeam-layers", &file)
	most := map[string]float64{"lead": 300, "concrete": 2000, "carbon-steel": 600}
	for _, row := range file.Rows {
		keV, perCM2 := file.withLines(row.Beam, source(t, row.Beam))
		b, err := NewBarrier(lookup(t, row.Material), most[row.Material], keV, perCM2, KermaPerFluence)
		if err != nil {
			t.Fatal(err)
		}
		tolerance := file.Tolerance
		if row.Tolerance > 0 {
			tolerance = row.Tolerance
		}
		for _, kind := range []struct {
			name   string
			factor float64
			want   []float64
		}{{"HVL", 2, row.HVLMM}, {"TVL", 10, row.TVLMM}} {
			if len(kind.want) == 0 {
				continue
			}
			var ours []float64
			for _, from := range []float64{1e-1, 1e-2, 1e-3, 1e-4, 1e-5} {
				ours = append(ours, thicknessFor(b, from/kind.factor)-thicknessFor(b, from))
			}
			lo, hi := slices.Min(ours), slices.Max(ours)
			t.Logf("%-7s %-12s %s from 1/10 to 1/100000: %s mm, published %v", row.Beam, row.Material, kind.name, figures(ours), kind.want)
			if hi < slices.Min(kind.want)*(1-tolerance) || lo > slices.Max(kind.want)*(1+tolerance) {
				t.Errorf("%s %s %s: %.3g to %.3g mm, published %v, allowed %.0f %% beyond", row.Beam, row.Material, kind.name, lo, hi, kind.want, 100*tolerance)
			}
		}
	}
}

func figures(v []float64) string {
	var s []string
	for _, x := range v {
		s = append(s, strconv.FormatFloat(x, 'g', 3, 64))
	}
	return strings.Join(s, " ")
}

// thicknessFor inverts a barrier by halving.
func thicknessFor(b *Barrier, transmission float64) float64 {
	lo, hi := 0.0, 5000.0
	for range 60 {
		if mid := (lo + hi) / 2; b.Transmission(mid) > transmission {
			lo = mid
		} else {
			hi = mid
		}
	}
	return lo
}

// Scatter to primary against the figures of a first simple Monte Carlo, in its
// own terms (no coherent scattering), and what the tables, which count
// photons that scattered coherently as scattered, say to the same plates.
func TestScatterToPrimaryOfSteel(t *testing.T) {
	var file struct {
		Tolerance float64
		Rows      []struct {
			Beam, Material       string
			MM, ScatterToPrimary float64
		}
	}
	read(t, "broadbeam-scatter-to-primary", &file)
	for _, row := range file.Rows {
		s := source(t, row.Beam)
		l := []Layer{{lookup(t, row.Material), row.MM}}
		sim, err := Simulation{Histories: 60000, Seed: 5, Workers: 2, WithoutCoherent: true}.Slab(l, s.KeV, s.PerCM2)
		if err != nil {
			t.Fatal(err)
		}
		p, sc := behind(t, l, s.KeV, s.PerCM2)
		got := sim.Scattered / sim.Primary
		t.Logf("%s %g mm: %.3f without coherent (+-%.1f %%), given %.2f (%+.1f %%); table, all scattering: %.3f", row.Beam, row.MM, got, 100*sim.RelErr, row.ScatterToPrimary, 100*(got/row.ScatterToPrimary-1), sc/p)
		if math.Abs(got/row.ScatterToPrimary-1) > file.Tolerance {
			t.Errorf("%s %g mm: scattered to primary %.3f, given %.2f", row.Beam, row.MM, got, row.ScatterToPrimary)
		}
	}
}

// Walls past the table's last thickness, 20 mean free paths: never less comes
// through than a direct run says.
func TestBeyondTheTableIsNeverTooLittle(t *testing.T) {
	for _, row := range []struct {
		material string
		keV, mfp float64
	}{{"concrete", 300, 24}, {"carbon-steel", 400, 24}, {"lead", 500, 24}, {"lead", 110, 24}, {"water", 60, 24}} {
		m := lookup(t, row.material)
		l := []Layer{{m, row.mfp / m.MuPerMM(row.keV)}}
		sim, err := Simulation{Histories: 16000, Seed: 3, Workers: 2}.Slab(l, []float64{row.keV}, []float64{1})
		if err != nil {
			t.Fatal(err)
		}
		p, s := behind(t, l, []float64{row.keV}, []float64{1})
		ratio := (p + s) / (sim.Primary + sim.Scattered)
		t.Logf("%s %g keV %g mfp: table over direct %.2f (+-%.1f %%)", row.material, row.keV, row.mfp, ratio, 100*sim.RelErr)
		if ratio < 1-0.03-2*sim.RelErr {
			t.Errorf("%s %g keV %g mfp: table lets %.3g of the direct run's air kerma through", row.material, row.keV, row.mfp, ratio)
		}
	}
}

// Slanted rays: the thickness that stands for the slanted wall never lets less
// through than a direct run.
func TestObliqueWallsAreNeverTooThick(t *testing.T) {
	for _, name := range []string{"concrete", "carbon-steel", "lead"} {
		m := lookup(t, name)
		for _, keV := range []float64{60, 120, 400, 1250} {
			for _, deg := range []float64{45, 60, 75} {
				for _, mfp := range []float64{1, 6} {
					mm := mfp / m.MuPerMM(keV)
					sim, err := Simulation{Histories: 4000, Seed: 3, Workers: 2, Cosine: math.Cos(deg * math.Pi / 180)}.Slab([]Layer{{m, mm}}, []float64{keV}, []float64{1})
					if err != nil {
						t.Fatal(err)
					}
					p, s := behind(t, []Layer{{m, ObliqueMM(mm, deg)}}, []float64{keV}, []float64{1})
					if ratio := (p + s) / (sim.Primary + sim.Scattered); ratio < 1-0.02-2*sim.RelErr {
						t.Errorf("%s %g keV %g mfp at %g deg: stands for %.3g of the direct run's air kerma", name, keV, mfp, deg, ratio)
					}
				}
			}
		}
	}
	if ObliqueMM(100, 0) != 100 || ObliqueMM(100, 89) != ObliqueMM(100, 80) {
		t.Error("straight or grazing rays get a wrong thickness")
	}
}

func TestBarrierIsTheTransmission(t *testing.T) {
	s := source(t, "200 kV")
	m := lookup(t, "lead")
	b, err := NewBarrier(m, 10, s.KeV, s.PerCM2, beam.KermaPerFluence)
	if err != nil {
		t.Fatal(err)
	}
	last, worst := 1.0, 0.0
	for mm := 0.0; mm < 12; mm += 0.0371 {
		got := b.Transmission(mm)
		if got > last {
			t.Fatalf("more comes through %g mm than through less", mm)
		}
		last = got
		worst = max(worst, math.Abs(got/BroadTransmission(m, mm, s.KeV, s.PerCM2, beam.KermaPerFluence)-1))
	}
	if worst > 0.005 {
		t.Errorf("a barrier is off by %.2f %%", 100*worst)
	}
	if b.Transmission(0) != 1 || b.Transmission(-1) != 1 {
		t.Error("no wall must let all through")
	}
}

func BenchmarkBarrier(b *testing.B) {
	s := source(b, "200 kV")
	w, err := NewBarrier(lookup(b, "concrete"), 1000, s.KeV, s.PerCM2, beam.KermaPerFluence)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		w.Transmission(321)
	}
}
