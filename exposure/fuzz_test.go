package exposure

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
)

// FuzzReckon feeds the engine whatever decodes as a plan: it answers or refuses,
// never panics, and its answer holds no NaN and nothing infinite (JSON has no
// word for them). Ten minutes: go test ./exposure -fuzz FuzzReckon -fuzztime 10m
func FuzzReckon(f *testing.F) {
	for _, p := range plan.Demos() {
		text, err := plan.Encode(p)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(text)
	}
	r := rand.New(rand.NewPCG(7, 7))
	for range 20 {
		if text, err := plan.Encode(randomPlan(r)); err == nil {
			f.Add(text)
		}
	}
	f.Fuzz(func(t *testing.T, text []byte) {
		p, err := plan.Decode(text)
		if err != nil {
			return
		}
		whole(t, p)
	})
}

// whole holds an answer to being finite, ordered and complete.
func whole(t *testing.T, p plan.Plan) {
	t.Helper()
	r, err := Reckon(p, Calibration{})
	if err != nil {
		if err.Error() == "" || strings.Contains(err.Error(), "NaN") {
			t.Errorf("refused with %q", err)
		}
		return
	}
	if _, err := json.Marshal(r); err != nil {
		t.Fatalf("the answer is no JSON: %v", err)
	}
	e := r.Exposure
	if !(e.SecondsLow > 0 && e.SecondsLow <= e.Seconds && e.Seconds <= e.SecondsHigh) || len(r.Cautions) == 0 {
		t.Fatalf("exposure %+v", e)
	}
	for _, l := range r.Boundary {
		if !(l.Metres > 0) {
			t.Fatalf("boundary %+v", l)
		}
	}
	for _, s := range r.Workings {
		if math.IsNaN(s.Value) || math.IsInf(s.Value, 0) || s.Name == "" {
			t.Fatalf("working %+v", s)
		}
	}
}

// Plans at the ends of every range are answered or refused like any other.
func TestEndsOfTheRanges(t *testing.T) {
	ends := func(path string) []float64 {
		row, _ := plan.FieldAt(path)
		return []float64{row.Min, row.Max}
	}
	for _, class := range []string{"C1", "C6"} {
		for _, mm := range append(ends("part.layers[].mm"), 20) {
			for _, sfd := range append(ends("setup.sfdMM"), 700) {
				for _, density := range ends("detector.film.density") {
					base := steelShot(mm, class)
					base.Setup.SFDMM, base.Detector.Film.Density = sfd, density
					for _, kV := range ends("source.tube.kv") {
						p := withTube(base, kV)
						p.Source.Tube.Filters = nil
						whole(t, p)
					}
					for _, n := range plan.Nuclides() {
						for _, a := range ends("source.sealed.activityGBq") {
							p := withSealed(base, n)
							p.Source.Sealed.ActivityGBq = a
							whole(t, p)
						}
					}
				}
			}
		}
	}
}

// Random plans of several layers, all sources and films.
func TestRandomPlansAreWhole(t *testing.T) {
	r := rand.New(rand.NewPCG(20261201, 2))
	for range 150 {
		p := randomPlan(r)
		p.Site.Limits = []plan.Limit{{Name: "barrier", RateUSvPerH: 7.5, AveragingMin: 1}}
		whole(t, p)
	}
}
