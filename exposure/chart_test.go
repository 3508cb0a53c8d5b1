package exposure

import (
	"math"
	"testing"
)

func steps(first, last float64, n int) []float64 {
	out := make([]float64, n)
	for i := range out {
		out[i] = first + (last-first)*float64(i)/float64(n-1)
	}
	return out
}

var chartKV = []float64{80, 100, 120, 140, 160, 180, 200, 220}

// A chart gives what Reckon gives; lines rise with thickness and fall with kV.
func TestChart(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	c, err := ChartOf(p, Calibration{FilmFactor: 1.5}, chartKV, steps(2, 60, 30))
	if err != nil {
		t.Fatal(err)
	}
	for i, line := range c.Lines {
		for j, mm := range line.MM {
			q := withTube(steelShot(mm, "C5"), line.KV)
			r, err := Reckon(q, Calibration{FilmFactor: 1.5}, exposureOnly())
			if err != nil || math.Abs(r.Exposure.Seconds/line.Seconds[j]-1) > 1e-12 || math.Abs(line.Exposure[j]/line.Seconds[j]*60-5) > 1e-9 {
				t.Fatalf("%g kV, %g mm: %g s, Reckon gives %+v (%v)", line.KV, mm, line.Seconds[j], r.Exposure, err)
			}
			if j > 0 && line.Exposure[j] <= line.Exposure[j-1] {
				t.Errorf("%g kV: %g mA min at %g mm after %g", line.KV, line.Exposure[j], mm, line.Exposure[j-1])
			}
			if i > 0 && j < len(c.Lines[i-1].MM) && line.Exposure[j] >= c.Lines[i-1].Exposure[j] {
				t.Errorf("%g mm: %g mA min at %g kV, less kV takes %g", mm, line.Exposure[j], line.KV, c.Lines[i-1].Exposure[j])
			}
		}
	}
	if first := c.Lines[0]; len(first.MM) == 0 || len(first.MM) == 30 {
		t.Errorf("80 kV answers %d of 30 thicknesses to 60 mm", len(first.MM))
	}
	sealed, err := ChartOf(withSealed(steelShot(20, "C5"), "Ir-192"), Calibration{}, nil, steps(5, 80, 20))
	if err != nil || len(sealed.Lines) != 1 || sealed.Unit != "GBq min" || sealed.Lines[0].Nuclide != "Ir-192" || len(sealed.Lines[0].MM) < 10 {
		t.Errorf("sealed: %+v, %v", sealed, err)
	}
	for _, bad := range [][2][]float64{{{10}, {5}}, {{200}, nil}, {{200}, {5, 4}}, {{200}, {0}}, {{math.NaN()}, {5}}, {{200}, {math.NaN()}}} {
		if c, err := ChartOf(p, Calibration{}, bad[0], bad[1]); err == nil {
			t.Errorf("chart of %v was answered with %+v", bad, c)
		}
	}
}

// Behind the part there is no more of any energy than before, and the sum of
// the unscattered photons is what the layers let through.
func TestSpectra(t *testing.T) {
	p := withTube(steelShot(20, "C5"), 200)
	s, err := SpectraOf(p)
	if err != nil {
		t.Fatal(err)
	}
	var before, after, scatter float64
	for i := range s.KeV {
		if s.After[i] > s.Before[i]*1.1 {
			t.Errorf("%g keV: %g behind, %g before", s.KeV[i], s.After[i], s.Before[i])
		}
		before, after = before+s.Before[i], after+s.After[i]
	}
	for i, n := range s.Scatter {
		scatter += n
		if n > 0 && !(s.ScatterKeV[i] >= s.ScatterEdgesKeV[i] && s.ScatterKeV[i] <= s.ScatterEdgesKeV[i+1] && s.ScatterKeV[i] <= 200) {
			t.Errorf("scatter at %g keV outside its bin %g to %g", s.ScatterKeV[i], s.ScatterEdgesKeV[i], s.ScatterEdgesKeV[i+1])
		}
	}
	if !(before > 0 && after > 0 && after < before/50 && scatter > after/3 && scatter < after*5) {
		t.Errorf("before %g, behind %g, scattered %g", before, after, scatter)
	}
}

func BenchmarkChart(b *testing.B) {
	p, mm := withTube(steelShot(20, "C5"), 200), steps(1, 60, 60)
	points := 0
	for b.Loop() {
		c, err := ChartOf(p, Calibration{}, []float64{160, 180, 200, 220, 250, 300, 350, 400}, mm)
		if err != nil {
			b.Fatal(err)
		}
		points = 0
		for _, l := range c.Lines {
			points += len(l.MM)
		}
	}
	b.ReportMetric(float64(points), "points")
}
