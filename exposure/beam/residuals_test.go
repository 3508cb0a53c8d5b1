package beam

import (
	"math"
	"os"
	"testing"
)

// published is the project's folder of published values.
func published(t testing.TB, c Continuum) []Residual {
	t.Helper()
	rows, err := Residuals(os.DirFS("../../testdata"), c)
	if err != nil {
		t.Fatal(err)
	}
	return rows
}

func TestPublishedValues(t *testing.T) {
	for _, r := range published(t, ThickTarget) {
		t.Logf("%-26s %-24s %-22s published %8.4g ours %8.4g (%+.1f %%)", r.File, r.Name, r.Quantity, r.Published, r.Ours, r.Percent())
		if r.Gate && !r.Holds() {
			t.Errorf("%s: %s: %s is %.4g %s, published %.4g, tolerance %.3g (%s)", r.File, r.Name, r.Quantity, r.Ours, r.Unit, r.Published, r.Tolerance, r.Citation)
		}
	}
}

// TestModelsSideBySide: the engine's continuum is the one that wins on all rows
// together, and it holds the bounds that the package states.
func TestModelsSideBySide(t *testing.T) {
	beyond := map[Continuum]int{}
	for _, c := range []Continuum{ThickTarget, Ebel, FinkelshteinPavlova} {
		var sum, size, worst float64
		n := 0
		for _, r := range published(t, c) {
			if r.Gate && r.File != "nuclides-constants.json" && !r.Holds() {
				beyond[c]++
			}
			if r.Quantity == "HVL1 in Cu" && r.File != "iso4037-nominal.json" {
				sum += r.Percent()
				size += math.Abs(r.Percent())
				worst = max(worst, math.Abs(r.Percent()))
				n++
			}
		}
		t.Logf("%-30v HVL1 of %d rows: mean %+.2f %%, mean size %.2f %%, worst %.2f %%; %d gated rows beyond tolerance", c, n, sum/float64(n), size/float64(n), worst, beyond[c])
		if c == ThickTarget && !(n == 20 && size/float64(n) < 2 && worst < 4) {
			t.Errorf("%v: beyond the stated error", c)
		}
	}
	if beyond[ThickTarget] != 0 || beyond[Ebel] <= beyond[ThickTarget] || beyond[FinkelshteinPavlova] <= beyond[ThickTarget] {
		t.Errorf("rows beyond tolerance: %v", beyond)
	}
}
