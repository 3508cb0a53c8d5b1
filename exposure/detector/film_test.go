package detector

import (
	"math"
	"testing"
)

// The curve rises strictly and smoothly from base and fog, saturates, and its
// inverse is exact.
func TestDensityCurve(t *testing.T) {
	for _, f := range Films() {
		if d := f.Density(0); d != f.BaseAndFog {
			t.Errorf("%s: density %g without dose, want base and fog %g", f.Class, d, f.BaseAndFog)
		}
		last, slope := f.BaseAndFog, 0.0
		for i := range 400 {
			x := f.KsMGy * math.Pow(10, float64(i-200)/100)
			d := f.Density(x)
			if d < last || d == last && d < f.MostDensity() {
				t.Fatalf("%s: density %g at %g mGy after %g", f.Class, d, x, last)
			}
			if i > 1 && math.Abs(d-last-slope) > 0.01 {
				t.Fatalf("%s: the curve has a corner at %g mGy", f.Class, x)
			}
			slope, last = d-last, d
			if net := d - f.BaseAndFog; net > 0.001 && d < f.MostDensity() {
				back, err := f.DoseMGy(d)
				if err != nil || math.Abs(back/x-1) > 1e-9 {
					t.Fatalf("%s: density %g is %g mGy (%v), it was made by %g", f.Class, d, back, err, x)
				}
			}
		}
		if top := f.Density(1e9); math.Abs(top-(f.MostDensity()-f.BaseAndFog)/0.98-f.BaseAndFog) > 1e-9 {
			t.Errorf("%s: saturates at %g", f.Class, top)
		}
	}
}

// A straight film has gradient 2.303 D; ours is never steeper than its dose
// curve can be, and the gradient is the slope of the curve.
func TestGradientIsTheSlope(t *testing.T) {
	for _, f := range Films() {
		for _, net := range []float64{0.5, 1, 2, 3, 4} {
			d := f.BaseAndFog + net
			x, err := f.DoseMGy(d)
			if err != nil {
				t.Fatal(err)
			}
			const h = 1e-5
			slope := (f.Density(x*math.Pow(10, h)) - f.Density(x*math.Pow(10, -h))) / (2 * h)
			if g := f.Gradient(d); math.Abs(g/slope-1) > 1e-6 {
				t.Errorf("%s: gradient %g at %g, slope %g", f.Class, g, d, slope)
			}
		}
		if f.Gradient(f.BaseAndFog) != 0 || f.Gradient(1000) != 0 {
			t.Errorf("%s: a gradient outside the curve", f.Class)
		}
	}
}

func TestFilmRefusals(t *testing.T) {
	if _, err := FilmByClass("c5"); err == nil {
		t.Error("class \"c5\" was taken")
	}
	f, err := FilmByClass("C5")
	if err != nil {
		t.Fatal(err)
	}
	for _, d := range []float64{f.BaseAndFog, -1, f.MostDensity(), 99, math.NaN()} {
		if x, err := f.DoseMGy(d); err == nil {
			t.Errorf("density %g was answered with %g mGy", d, x)
		}
	}
}
