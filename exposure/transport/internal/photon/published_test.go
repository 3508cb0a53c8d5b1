package photon

import (
	"encoding/json"
	"flag"
	"math"
	"os"
	"testing"

	"halfvalue/materials"
)

var long = flag.Bool("long", false, "many histories in the comparison with published build-up factors")

type buildUpFile struct {
	ID         string
	Citation   string
	Confidence string
	Tolerance  float64
	Rows       []struct {
		Medium    string
		KeV       float64
		MFP       []float64
		Factor    []float64
		Tolerance float64 // of the row, with its reason in Note
		Note      string
	}
}

// The same walk around a point source in an endless medium, without coherent
// scattering and with free electrons as the published calculations have it.
func TestPublishedBuildUpFactors(t *testing.T) {
	histories := 100_000
	if *long {
		histories = 3_000_000
	}
	for _, id := range []string{"buildup-goldstein-wilkins", "buildup-ansi-6.4.3"} {
		text, err := os.ReadFile("../../../../testdata/" + id + ".json")
		if err != nil {
			t.Fatal(err)
		}
		var file buildUpFile
		if err := json.Unmarshal(text, &file); err != nil {
			t.Fatal(err)
		}
		for _, row := range file.Rows {
			m, err := materials.Lookup(row.Medium)
			if err != nil {
				t.Fatal(err)
			}
			med, err := NewMediumOf(m, true, true)
			if err != nil {
				t.Fatal(err)
			}
			b, err := Sphere{Medium: med, KeV: row.KeV, RadiiMFP: row.MFP, Histories: histories, Seed: 7, Workers: 2}.Run()
			if err != nil {
				t.Fatal(err)
			}
			tolerance := row.Tolerance
			if tolerance == 0 {
				tolerance = file.Tolerance
			}
			for i, x := range row.MFP {
				off := b[i].Factor/row.Factor[i] - 1
				t.Logf("%s %4g keV %2g mfp: %7.2f published %6.2f  %+5.1f %% (+-%.1f)  %s", row.Medium, row.KeV, x, b[i].Factor, row.Factor[i], 100*off, 100*b[i].RelErr, id)
				if math.Abs(off) > tolerance+2*b[i].RelErr {
					t.Errorf("%s: %s %g keV %g mfp: %.3g, published %g, off by %+.1f %%, allowed %.0f", id, row.Medium, row.KeV, x, b[i].Factor, row.Factor[i], 100*off, 100*tolerance)
				}
			}
		}
	}
}
