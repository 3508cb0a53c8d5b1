package boundary

import (
	"encoding/json"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// beamOf gives the spectrum of a row of broadbeam-layers.json; tubes with 3 mm
// Al of filter to 150 kV and 0.5 mm Cu above, as in therapy heads of the time.
func beamOf(t *testing.T, name string) beam.Spectrum {
	t.Helper()
	if kv, ok := strings.CutSuffix(name, " kV"); ok {
		v, err := strconv.ParseFloat(kv, 64)
		if err != nil {
			t.Fatal(err)
		}
		filters := []plan.Filter{{Material: "Al", MM: 3}}
		if v > 150 {
			filters = []plan.Filter{{Material: "Cu", MM: 0.5}}
		}
		s, err := beam.Tube(plan.Tube{KV: v, MA: 1, FocusMM: 1, Target: "W", AnodeDeg: 20, Waveform: "constant", ConeDeg: 40, Filters: filters})
		if err != nil {
			t.Fatal(err)
		}
		return s
	}
	n, err := beam.NuclideByName(name)
	if err != nil {
		t.Fatal(err)
	}
	return n.Bare()
}

// thickness gives where the barrier passes a share.
func thickness(b *barrier, share float64) float64 {
	lo, hi := 0.0, 1e5
	for range 80 {
		if mid := (lo + hi) / 2; b.ln(mid) > math.Log(share) {
			lo = mid
		} else {
			hi = mid
		}
	}
	return lo
}

// TestWallsAgainstPublishedLayers compares the dose behind the larger of the
// published layers at high attenuation with a tenth (a half for steel).
func TestWallsAgainstPublishedLayers(t *testing.T) {
	data, err := os.ReadFile("../../testdata/broadbeam-layers.json")
	if err != nil {
		t.Fatal(err)
	}
	var file struct {
		Rows []struct {
			Beam, Material string
			HVLMM, TVLMM   []float64
		}
	}
	if err := json.Unmarshal(data, &file); err != nil {
		t.Fatal(err)
	}
	counted := 0
	for _, row := range file.Rows {
		name := map[string]string{"lead": "Pb"}[row.Material]
		if name == "" {
			name = row.Material
		}
		m, err := materials.Lookup(name)
		if err != nil {
			t.Fatal(err)
		}
		layer, share := row.HVLMM, 0.5
		if len(row.TVLMM) > 0 {
			layer, share = row.TVLMM, 0.1
		}
		largest := 0.0
		for _, v := range layer {
			largest = max(largest, v)
		}
		b, err := newBarrier(m, largest/10, largest*12, beamOf(t, row.Beam))
		if err != nil {
			t.Fatal(err)
		}
		from := thickness(b, highAttenuation)
		dose := math.Exp(b.ln(from+largest)-b.ln(from)) / share
		t.Logf("%s %s: dose behind %.3g mm more is %.2f of the published; over-predicted by %.0f %%", row.Beam, row.Material, largest, dose, 100*(dose-1))
		if dose < 0.95 {
			t.Errorf("%s %s: %.3g mm passes %.2f of what is published, want 0.95 or more", row.Beam, row.Material, largest, dose)
		}
		counted++
	}
	if counted < 24 {
		t.Errorf("%d rows", counted)
	}
}

// highAttenuation is where the published layers begin: "approximate, at high
// attenuation". Steel's half-value layers hold over the three decades before.
const highAttenuation = 1e-4

// TestSteelOverThreeDecades: behind steel, no decade of dose is crossed in less
// than the listed layers and their logarithm ask for.
func TestSteelOverThreeDecades(t *testing.T) {
	steel, err := materials.Lookup("carbon-steel")
	if err != nil {
		t.Fatal(err)
	}
	for beam, hvl := range map[string]float64{"Ir-192": 13, "Co-60": 22} {
		b, err := newBarrier(steel, 1, 400, beamOf(t, beam))
		if err != nil {
			t.Fatal(err)
		}
		for mm := hvl; mm < 10*hvl; mm += hvl {
			want := math.Pow(0.5, mm/hvl)
			if got := math.Exp(b.ln(mm)); got < 0.95*want {
				t.Errorf("%s behind %g mm of steel: %.3g, published layers give %.3g", beam, mm, got, want)
			}
		}
	}
}
