package exposure

import (
	"encoding/json"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"testing"
	"time"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// published reads a file of published values.
func published(t testing.TB, name string, into any) {
	t.Helper()
	data, err := os.ReadFile(filepath.Join("..", "testdata", name))
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

// steelShot is the plan of the usual comparison: mm of steel, 700 mm, density
// 2.0, a film class, lead screens of 0.1 mm, no site.
func steelShot(mm float64, class string) plan.Plan {
	return plan.Plan{
		Plan: 1, Part: plan.Part{Layers: []plan.Layer{{Material: "carbon-steel", MM: mm}}},
		Setup:    plan.Setup{Kind: plan.SingleWall, SFDMM: 700},
		Detector: plan.Detector{Film: &plan.Film{Class: class, Density: 2, ScreensMM: &[2]float64{0.1, 0.1}}},
	}
}

func withTube(p plan.Plan, kV float64) plan.Plan {
	p.Source = plan.Source{Tube: &plan.Tube{KV: kV, MA: 5, FocusMM: 3, Filters: []plan.Filter{{Material: "Be", MM: 2.4}}}}
	return p
}

var assayed = time.Date(2026, 11, 1, 0, 0, 0, 0, time.UTC)

func withSealed(p plan.Plan, nuclide string) plan.Plan {
	p.Source = plan.Source{Sealed: &plan.Sealed{Nuclide: nuclide, ActivityGBq: 1850, Assayed: assayed, SizeMM: 3}}
	p.At = assayed.Add(30 * 24 * time.Hour)
	return p
}

func mustReckon(t testing.TB, p plan.Plan, opts ...Option) Reckoning {
	t.Helper()
	r, err := Reckon(p, Calibration{}, opts...)
	if err != nil {
		t.Fatalf("%v in %+v", err, p)
	}
	return r
}

func TestExposureWindows(t *testing.T) {
	var file struct {
		Rows []struct {
			Name        string
			Least, Most float64
		}
	}
	published(t, "exposure-windows.json", &file)
	got := []float64{*mustReckon(t, withTube(steelShot(20, "C5"), 200)).Exposure.MAMin, *mustReckon(t, withSealed(steelShot(20, "C5"), "Ir-192")).Exposure.GBqMin}
	for i, row := range file.Rows {
		t.Logf("%s: %.4g (%g to %g)", row.Name, got[i], row.Least, row.Most)
		if !(got[i] >= row.Least && got[i] <= row.Most) {
			t.Errorf("%s: %g is outside %g to %g", row.Name, got[i], row.Least, row.Most)
		}
	}
}

// How the exposure moves with thickness, kV and film class: a report, with the
// order that must hold.
func TestExposureMoves(t *testing.T) {
	last := map[string]float64{}
	for _, mm := range []float64{10, 20, 30} {
		for _, kV := range []float64{200, 180, 160} {
			for _, class := range []string{"C5", "C4"} {
				v := *mustReckon(t, withTube(steelShot(mm, class), kV)).Exposure.MAMin
				t.Logf("steel %g mm, %g kV, %s: %.3g mA min", mm, kV, class, v)
				for _, key := range []string{fmt.Sprint(mm, kV), fmt.Sprint(mm, class), fmt.Sprint(kV, class)} {
					if v <= last[key] {
						t.Errorf("steel %g mm, %g kV, %s: %g is not above %g", mm, kV, class, v, last[key])
					}
					last[key] = v
				}
			}
		}
	}
}

func TestHandbookArithmetic(t *testing.T) {
	var file struct {
		Distance []struct {
			Name                         string
			FromIn, ToIn, Factor, RelTol float64
		}
		LogExposure []struct {
			Name                             string
			MAMin, From, To, Becomes, RelTol float64
		}
		PointKernel struct {
			Name                                                                                                                                          string
			MuRhoCm2PerG, DensityGPerCM3, CM, DetectorCM, PhotonsPerS, MFP, UncollidedPerCM2S, BuildUp, MRPerH, RelTol, MRRelTol, NistMFP, NistUncollided float64
		}
	}
	published(t, "handbook-arithmetic.json", &file)
	for _, row := range file.Distance {
		from, to := withTube(steelShot(20, "C5"), 200), withTube(steelShot(20, "C5"), 200)
		from.Setup.SFDMM, to.Setup.SFDMM = row.FromIn*25.4, row.ToIn*25.4
		got := mustReckon(t, to, WithoutAir()).Exposure.Seconds / mustReckon(t, from, WithoutAir()).Exposure.Seconds
		if math.Abs(got/row.Factor-1) > row.RelTol {
			t.Errorf("%s: factor %g", row.Name, got)
		}
	}
	for _, row := range file.LogExposure {
		if got := row.MAMin * math.Pow(10, row.To-row.From); math.Abs(got/row.Becomes-1) > row.RelTol {
			t.Errorf("%s: %g", row.Name, got)
		}
	}
	k := file.PointKernel
	iron, err := materials.Lookup("Fe")
	if err != nil {
		t.Fatal(err)
	}
	kernel := func(mfp float64) float64 {
		return k.PhotonsPerS * math.Exp(-mfp) / (4 * math.Pi * k.DetectorCM * k.DetectorCM)
	}
	flux := kernel(k.MuRhoCm2PerG * k.DensityGPerCM3 * k.CM)
	mR := flux * k.BuildUp * beam.KermaPerFluence(1000) * 3600 / beam.MGyPerR * 1000
	for what, pair := range map[string][3]float64{
		"mean free paths": {k.MuRhoCm2PerG * k.DensityGPerCM3 * k.CM, k.MFP, k.RelTol}, "uncollided": {flux, k.UncollidedPerCM2S, k.RelTol}, "mR/h": {mR, k.MRPerH, k.MRRelTol},
		"mean free paths with NIST's mu": {iron.MuPerMM(1000) * k.CM * 10, k.NistMFP, k.RelTol}, "uncollided with NIST's mu": {kernel(iron.MuPerMM(1000) * k.CM * 10), k.NistUncollided, k.RelTol},
	} {
		if math.Abs(pair[0]/pair[1]-1) > pair[2] {
			t.Errorf("point kernel, %s: %g, published %g", what, pair[0], pair[1])
		}
	}
}

// 12.7 mm copper at 220 kV has the effect of 17.8 mm steel (factor 1.4, seen).
func TestCopperAgainstSteel(t *testing.T) {
	p := withTube(steelShot(17.8, "C5"), 220)
	steel := mustReckon(t, p).Exposure.Seconds
	lo, hi := 5.0, 30.0
	for range 40 {
		mid := (lo + hi) / 2
		p.Part.Layers = []plan.Layer{{Material: "copper", MM: mid}}
		if mustReckon(t, p).Exposure.Seconds < steel {
			lo = mid
		} else {
			hi = mid
		}
	}
	factor := 17.8 / lo
	t.Logf("computed equivalence of copper to steel at 220 kV: %.2f (handbook 1.4)", factor)
	if math.Abs(factor-1.4) > 0.15 {
		t.Errorf("factor %g, handbook 1.4", factor)
	}
}

// Twice the distance takes four times as long, to 1e-9, without the air.
func TestInverseSquareExact(t *testing.T) {
	for _, p := range []plan.Plan{withTube(steelShot(20, "C5"), 200), withTube(steelShot(3, "C4"), 60)} {
		far := p
		far.Setup.SFDMM *= 2
		if got := mustReckon(t, far, WithoutAir()).Exposure.Seconds / mustReckon(t, p, WithoutAir()).Exposure.Seconds; math.Abs(got/4-1) > 1e-9 {
			t.Errorf("factor %.15g", got)
		}
	}
	// A sealed source decays during the exposure; at constant strength it is exact too.
	p := withSealed(steelShot(20, "C5"), "Ir-192")
	far := p
	far.Setup.SFDMM *= 2
	near, away := mustReckon(t, p, WithoutAir()).Exposure.Seconds, mustReckon(t, far, WithoutAir()).Exposure.Seconds
	lambda := math.Ln2 / (73.83 * 86400)
	undecayed := func(s float64) float64 { return -math.Expm1(-lambda*s) / lambda }
	if got := undecayed(away) / undecayed(near); math.Abs(got/4-1) > 1e-9 {
		t.Errorf("sealed: factor %.15g", got)
	}
}

// randomPlan is a plan that a crew might make; not all have an answer.
func randomPlan(r *rand.Rand) plan.Plan {
	names := []string{"carbon-steel", "stainless-304", "copper", "al-42000", "titanium", "concrete", "water", "lead", "polyethylene", "n06625"}
	p := steelShot(20, []string{"C1", "C2", "C3", "C4", "C5", "C6"}[r.IntN(6)])
	p.Part.Layers = nil
	for range 1 + r.IntN(3) {
		p.Part.Layers = append(p.Part.Layers, plan.Layer{Material: names[r.IntN(len(names))], MM: math.Exp(r.Float64()*4 - 1)})
	}
	p.Setup.SFDMM = 400 + r.Float64()*1500
	p.Detector.Film.Density = 1.5 + 2.5*r.Float64()
	if r.IntN(3) == 0 {
		p.Detector.Film.ScreensMM = &[2]float64{}
	}
	if r.IntN(2) == 0 {
		return withSealed(p, []string{"Ir-192", "Se-75", "Co-60", "Yb-169", "Tm-170"}[r.IntN(5)])
	}
	return withTube(p, 40+r.Float64()*410)
}

// More thickness, more distance or more density wanted never shortens the
// time. HALFVALUE_RANDOM_PLANS asks for the long form.
func TestMonotone(t *testing.T) {
	n := 400
	if v := os.Getenv("HALFVALUE_RANDOM_PLANS"); v != "" {
		fmt.Sscan(v, &n)
	}
	random := rand.New(rand.NewPCG(20261201, 1))
	answered := 0
	for i := range n {
		p := randomPlan(random)
		base, err := Reckon(p, Calibration{}, exposureOnly())
		if err != nil {
			continue
		}
		answered++
		changes := map[string]func(*plan.Plan){
			"thickness": func(q *plan.Plan) {
				q.Part.Layers = slices.Clone(q.Part.Layers)
				q.Part.Layers[random.IntN(len(q.Part.Layers))].MM *= 1 + random.Float64()
			},
			"distance": func(q *plan.Plan) { q.Setup.SFDMM *= 1 + random.Float64() },
			"density":  func(q *plan.Plan) { f := *q.Detector.Film; f.Density += random.Float64(); q.Detector.Film = &f },
		}
		for _, name := range []string{"thickness", "distance", "density"} {
			q := p
			changes[name](&q)
			more, err := Reckon(q, Calibration{}, exposureOnly())
			// In a stack the layers' scatter is combined from tables with a
			// statistical error of their own: it may ripple by that.
			slack := 1e-12
			if len(p.Part.Layers) > 1 && name == "thickness" {
				slack = 5e-3
			}
			if err == nil && more.Exposure.Seconds < base.Exposure.Seconds*(1-slack) {
				t.Errorf("plan %d: more %s takes %g s instead of %g s: %+v -> %+v", i, name, more.Exposure.Seconds, base.Exposure.Seconds, p.Part.Layers, q.Part.Layers)
			}
		}
	}
	if answered < n/3 {
		t.Fatalf("only %d of %d plans had an answer", answered, n)
	}
}

// The same atoms packed denser never shorten the time.
func TestDenserMaterial(t *testing.T) {
	p := withTube(steelShot(1, "C5"), 120)
	p.Part.Layers = []plan.Layer{{Material: "sand", MM: 40}}
	sand, err := materials.Lookup("sand")
	if err != nil {
		t.Fatal(err)
	}
	last := 0.0
	for _, g := range []float64{1, 1.3, 1.6, 2.0, 2.6} {
		p.Part.Layers[0].MM = 40 * g / sand.DensityGPerCM3() // mass per area is what density makes of a thickness
		p.Setup.BMM = 120
		if s := mustReckon(t, p, WithoutAir()).Exposure.Seconds; s < last {
			t.Errorf("at %g g/cm3: %g s after %g s", g, s, last)
		} else {
			last = s
		}
	}
}

// Calibration moves the time by its factors and nothing of the dose field.
func TestCalibrationMovesTimesOnly(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	p.Site.Limits = []plan.Limit{{Name: "barrier", RateUSvPerH: 7.5, AveragingMin: 1}}
	base := mustReckon(t, p)
	for _, c := range []Calibration{{2, 0}, {0, 0.5}, {3, 1.5}, {0.1, 0.1}, {10, 10}} {
		r, err := Reckon(p, c)
		if err != nil {
			t.Fatal(err)
		}
		f, _ := c.factor()
		if math.Abs(r.Exposure.Seconds/base.Exposure.Seconds/f-1) > 1e-9 {
			t.Errorf("%+v: time by %g", c, r.Exposure.Seconds/base.Exposure.Seconds)
		}
		for i, l := range r.Boundary {
			if l.Metres != base.Boundary[i].Metres || l.RateAt1m != base.Boundary[i].RateAt1m {
				t.Errorf("%+v moved the boundary: %+v, was %+v", c, l, base.Boundary[i])
			}
		}
	}
	for _, c := range []Calibration{{0.01, 1}, {-1, 1}, {math.NaN(), 1}, {1, math.Inf(1)}} {
		if _, err := Reckon(p, c); err == nil {
			t.Errorf("%+v was taken", c)
		}
	}
}

// Every figure of the answer is finite and has a working.
func TestDemosAreWhole(t *testing.T) {
	for _, p := range plan.Demos() {
		r := mustReckon(t, p)
		data, err := json.Marshal(r)
		if err != nil {
			t.Fatalf("%s: %v", p.Title, err)
		}
		if len(r.Workings) < 10 || len(r.Cautions) == 0 || len(r.Boundary) == 0 || len(r.Spread) < 4 {
			t.Errorf("%s: %s", p.Title, data)
		}
		if !(r.Exposure.SecondsLow < r.Exposure.Seconds && r.Exposure.Seconds < r.Exposure.SecondsHigh) {
			t.Errorf("%s: spread %+v", p.Title, r.Exposure)
		}
		if p.Detector.Film != nil && math.Abs(r.Density[0].Density-p.Detector.Film.Density) > 1e-6 {
			t.Errorf("%s: density %g, wanted %g", p.Title, r.Density[0].Density, p.Detector.Film.Density)
		}
	}
}

// A run that does not fit its hour, and a shot that takes days, are refused
// with the field.
func TestRefusals(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	p.Site = plan.Site{ShotsPerHour: 200, Limits: []plan.Limit{{Name: "barrier", RateUSvPerH: 7.5, AveragingMin: 1}}}
	var field *plan.FieldError
	if _, err := Reckon(p, Calibration{}); !asField(err, &field) || field.Field != "site.shotsPerHour" {
		t.Errorf("200 shots an hour: %v", err)
	}
	if _, err := Reckon(withTube(steelShot(150, "C1"), 100), Calibration{}); !asField(err, &field) || field.Field != "part.layers" {
		t.Errorf("150 mm at 100 kV: %v", err)
	}
}

func asField(err error, to **plan.FieldError) bool {
	f, ok := err.(*plan.FieldError)
	*to = f
	return ok
}

// Plates and panels take their time from the signal to noise ratio.
func TestDigital(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	p.Detector = plan.Detector{Plate: &plan.Plate{SNRn: 100, PixelUM: 50}}
	plate := mustReckon(t, p)
	if math.Abs(plate.SNR[0].SNRn-100) > 1e-6 || len(plate.Density) != 0 {
		t.Errorf("plate: %+v", plate.SNR)
	}
	p.Detector.Plate.SNRn = 150
	if more := mustReckon(t, p); more.Exposure.Seconds < 2*plate.Exposure.Seconds {
		t.Errorf("SNR 150 takes %g s, 100 takes %g s", more.Exposure.Seconds, plate.Exposure.Seconds)
	}
	p.Detector = plan.Detector{Panel: &plan.Panel{SNRn: 100, PixelUM: 100}}
	if panel := mustReckon(t, p); panel.Exposure.Seconds >= plate.Exposure.Seconds {
		t.Errorf("panel %g s, plate %g s", panel.Exposure.Seconds, plate.Exposure.Seconds)
	}
	p.Detector.Panel.SNRn = 4000
	if _, err := Reckon(p, Calibration{}); err == nil {
		t.Error("a ratio that no dose reaches was taken")
	}
}

func BenchmarkReckon(b *testing.B) {
	p := withTube(steelShot(20, "C5"), 200)
	p.Rules = "iso17636-1:2013/B"
	p.Site = plan.Site{ShotsPerHour: 6, Limits: []plan.Limit{{Name: "barrier", RateUSvPerH: 7.5, AveragingMin: 1}}}
	var took []time.Duration
	for b.Loop() {
		start := time.Now()
		mustReckon(b, p)
		took = append(took, time.Since(start))
	}
	slices.Sort(took)
	b.ReportMetric(float64(took[len(took)/2].Microseconds()), "median-us")
}
