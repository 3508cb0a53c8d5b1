package exposure

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"halfvalue/exposure/plan"
)

// draw changes a plan by one deviate of each input that has a place in it, and
// gives the factor on the time of those that have none.
func draw(p plan.Plan, list []Contribution, r *rand.Rand) (plan.Plan, float64) {
	p = p.Clone()
	factor := 1.0
	for _, c := range list {
		f := 1 + c.Input/100*r.NormFloat64()
		switch c.Name {
		case "kV":
			p.Source.Tube.KV *= f
		case "mA":
			p.Source.Tube.MA *= f
		case "filters":
			for i := range p.Source.Tube.Filters {
				p.Source.Tube.Filters[i].MM *= f
			}
		case "activity":
			p.Source.Sealed.ActivityGBq *= f
		case "SFD":
			p.Setup.SFDMM *= f
		case "thickness of the part", "density of the material":
			for i := range p.Part.Layers {
				p.Part.Layers[i].MM *= f
			}
		default:
			factor *= math.Exp(c.Input / 100 * r.NormFloat64())
		}
	}
	return p, factor
}

// The linearised spread against sampling of the whole physics.
func TestSpreadAgainstSampling(t *testing.T) {
	thin := withTube(steelShot(6, "C4"), 120)
	thin.Source.Tube.Filters = append(thin.Source.Tube.Filters, plan.Filter{Material: "Cu", MM: 1})
	stated := withTube(steelShot(25, "C5"), 220)
	stated.Uncertainty = plan.Uncertainty{KVPct: 3, ThicknessPct: 4, SpeedPct: 5}
	for _, p := range []plan.Plan{withTube(steelShot(20, "C5"), 200), thin, stated, withSealed(steelShot(30, "C3"), "Ir-192"), withSealed(steelShot(12, "C5"), "Se-75")} {
		p.Setup.BMM = 60 // room for thicker parts
		r := mustReckon(t, p)
		random := rand.New(rand.NewPCG(1, 2026))
		const n = 1200
		logs := make([]float64, 0, n)
		for range n {
			q, factor := draw(p, r.Spread, random)
			one, err := Reckon(q, Calibration{}, exposureOnly())
			if err != nil {
				t.Fatal(err)
			}
			logs = append(logs, math.Log(one.Exposure.Seconds*factor))
		}
		mean, sum := 0.0, 0.0
		for _, x := range logs {
			mean += x / n
		}
		for _, x := range logs {
			sum += (x - mean) * (x - mean) / (n - 1)
		}
		linear, sampled := total(r.Spread), math.Sqrt(sum)
		inside := 0
		for _, x := range logs {
			if x > math.Log(r.Exposure.SecondsLow) && x < math.Log(r.Exposure.SecondsHigh) {
				inside++
			}
		}
		share := float64(inside) / n
		t.Logf("%.1f %% linearised, %.1f %% sampled, %.1f %% of the samples inside", linear*100, sampled*100, share*100)
		if math.Abs(linear/sampled-1) > 0.08 || share < 0.93 || share > 0.975 {
			t.Errorf("spread %g linearised, %g sampled, share inside %g", linear, sampled, share)
		}
	}
}

func TestSpreadNamesItsSources(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	p.Uncertainty = plan.Uncertainty{KVPct: 10}
	r := mustReckon(t, p)
	if !slices.IsSortedFunc(r.Spread, func(a, b Contribution) int { return int(math.Copysign(1, b.Relative-a.Relative)) }) {
		t.Errorf("not in order: %+v", r.Spread)
	}
	if first := r.Spread[0]; first.Name != "kV" || first.From != "plan" || first.Input != 10 {
		t.Errorf("first is %+v, want the kV of the plan", first)
	}
	for _, d := range r.Density {
		if !(d.DensityLow < d.Density && d.Density < d.DensityHigh) {
			t.Errorf("density %+v", d)
		}
	}
	less := mustReckon(t, p, WithTestShots(3, 3))
	if total(less.Spread) >= total(r.Spread) {
		t.Errorf("test shots leave %g of %g", total(less.Spread), total(r.Spread))
	}
}

// A film's own data stand in place of its class's.
func TestFilmData(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	base := mustReckon(t, p).Exposure.Seconds
	p.Detector.Film.Data = plan.FilmData{KsMGy: 5.26 * 2}
	if got := mustReckon(t, p).Exposure.Seconds; math.Abs(got/base/2-1) > 1e-9 {
		t.Errorf("twice the Ks takes %g times as long", got/base)
	}
	p.Detector.Film.Data = plan.FilmData{G2: 4, G4: 8}
	var field *plan.FieldError
	if _, err := Reckon(p, Calibration{}); !asField(err, &field) || field.Field != "detector.film.data.g4" {
		t.Errorf("a straight curve was taken: %v", err)
	}
}
