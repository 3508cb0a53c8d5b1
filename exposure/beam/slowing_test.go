package beam

import (
	"encoding/json"
	"math"
	"testing"

	"halfvalue/exposure/beam/internal/electron"
)

// TestSlowingRegenerates walks one cell of data/slowing.json again, copper at
// 10 keV, with the file's seed and number of electrons. Processors differ in
// the last bits, after which a walk takes another way: 2 % is allowed.
func TestSlowingRegenerates(t *testing.T) {
	var file struct {
		Seed    uint64  `json:"seed"`
		TiltDeg float64 `json:"tiltDeg"`
	}
	if err := json.Unmarshal(slowingJSON, &file); err != nil {
		t.Fatal(err)
	}
	for _, m := range electron.Targets() {
		if m.Z != 29 {
			continue
		}
		want := slowings()[29][0]
		got := m.Walk(want.KeV, file.TiltDeg, 30000, len(want.Track), file.Seed)
		for i := range want.Track {
			if math.Abs(got.Track[i]-want.Track[i]) > 0.02 || math.Abs(got.Depth[i]-want.Depth[i]) > 0.01 || math.Abs(got.Doppler[i]-want.Doppler[i]) > 0.02 {
				t.Errorf("bin %d: %.4f %.4f %.4f, file %.4f %.4f %.4f", i, got.Track[i], got.Depth[i], got.Doppler[i], want.Track[i], want.Depth[i], want.Doppler[i])
			}
		}
	}
}

func TestSlowingData(t *testing.T) {
	for z, rows := range slowings() {
		if len(rows) < 2 {
			t.Errorf("Z %d: %d energies", z, len(rows))
		}
		for i, r := range rows {
			if i > 0 && !(r.KeV > rows[i-1].KeV) || len(r.Track) != len(r.Depth) || len(r.Track) != len(r.Doppler) {
				t.Errorf("Z %d, %g keV: rows out of order or of uneven length", z, r.KeV)
			}
			for j := range r.Track {
				if !(r.Track[j] > 0 && r.Track[j] < 1.1 && r.Depth[j] > 0 && r.Depth[j] < 0.6 && r.Doppler[j] > 0.5 && r.Doppler[j] < 1.1) {
					t.Errorf("Z %d, %g keV, bin %d: %g %g %g", z, r.KeV, j, r.Track[j], r.Depth[j], r.Doppler[j])
				}
			}
		}
	}
	if len(slowings()) != len(targetSymbols) {
		t.Errorf("%d targets in data/slowing.json, want %d", len(slowings()), len(targetSymbols))
	}
}

func TestSlowedAtTheSurface(t *testing.T) {
	s := slowedAt(slowings()[74], 150, 1)
	b := electron.Beta(150)
	if s.track != 1 || s.depth != 0 || math.Abs(s.doppler-2*b/math.Log((1+b)/(1-b))) > 1e-12 {
		t.Errorf("an electron that has just arrived: %+v", s)
	}
}

func TestGauss(t *testing.T) {
	g := newGauss(8)
	var sum float64
	for i, x := range g.x {
		sum += g.w[i] * math.Pow(x, 15)
	}
	if math.Abs(sum-1.0/16) > 1e-14 {
		t.Errorf("x^15 over 0..1 is %.16g, want 1/16", sum)
	}
}

func TestTableIsExactForCubics(t *testing.T) {
	f := func(x, y float64) float64 { return 1 + x*x*x - 2*x*y*y + y*y*y }
	tb := newTable(-1, 2, 7, 0, 1, 5, f)
	row := make([]float64, 5)
	for _, x := range []float64{-1, -0.3, 1.1, 2} {
		tb.row(x, row)
		for _, y := range []float64{0, 0.1, 0.77, 1} {
			if got := tb.at(x, y); math.Abs(got-f(x, y)) > 1e-12 {
				t.Errorf("at %g, %g: %g, want %g", x, y, got, f(x, y))
			}
		}
		if math.Abs(row[2]-f(x, 0.5)) > 1e-12 {
			t.Errorf("row at %g: %g, want %g", x, row[2], f(x, 0.5))
		}
	}
}
