package beam

import (
	"math"
	"strings"
	"sync"
	"testing"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// material looks a catalogue name up.
func material(t testing.TB, name string) *materials.Material {
	t.Helper()
	m, err := materials.Lookup(name)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

func TestBins(t *testing.T) {
	s := tube(t, "W", 137.3, plan.Filter{Material: "Sn", MM: 1}, plan.Filter{Material: "Pb", MM: 0.1})
	at := float64(CutoffKeV)
	edges := map[float64]bool{}
	for i, w := range s.WidthKeV {
		if i > 0 && !(s.KeV[i] > s.KeV[i-1]) {
			t.Fatalf("energies do not rise at %g keV", s.KeV[i])
		}
		if w == 0 {
			continue
		}
		if w > 1+1e-9 || math.Abs(s.KeV[i]-w/2-at) > 1e-9 {
			t.Errorf("bin at %g keV is %g wide and starts at %g, want %g", s.KeV[i], w, s.KeV[i]-w/2, at)
		}
		at = s.KeV[i] + w/2
		edges[math.Round(at*1e4)/1e4] = true
	}
	for _, z := range []int{50, 74, 82} {
		e, err := materials.ElementByZ(z)
		if err != nil {
			t.Fatal(err)
		}
		if !edges[math.Round(e.KEdgeKeV*1e4)/1e4] {
			t.Errorf("the K edge of %s at %g keV is inside a bin", e.Symbol, e.KEdgeKeV)
		}
	}
}

// TestMoreFilterIsLess: behind more of anything no bin and no sum grows.
func TestMoreFilterIsLess(t *testing.T) {
	for _, name := range []string{"Be", "Al", "Cu", "Sn", "Pb", "carbon-steel", "air"} {
		var last Spectrum
		for i, mm := range []float64{0, 0.01, 0.1, 1, 10, 100} {
			s := tube(t, "W", 160, plan.Filter{Material: name, MM: mm})
			if i > 0 {
				if !(s.KermaMGy() < last.KermaMGy() && s.AmbientUSv() < last.AmbientUSv()) {
					t.Errorf("%g mm %s: kerma %g after %g", mm, name, s.KermaMGy(), last.KermaMGy())
				}
				for j := range s.PerCM2 {
					if s.PerCM2[j] > last.PerCM2[j] {
						t.Errorf("%g mm %s: bin at %g keV grew", mm, name, s.KeV[j])
					}
				}
			}
			last = s
		}
	}
}

// TestOrderOfFiltersIsNothing: a narrow beam does not care.
func TestOrderOfFiltersIsNothing(t *testing.T) {
	a, b := plan.Filter{Material: "Al", MM: 2}, plan.Filter{Material: "Cu", MM: 0.5}
	one, two := tube(t, "W", 120, a, b).KermaMGy(), tube(t, "W", 120, b, a).KermaMGy()
	half := tube(t, "W", 120, plan.Filter{Material: "Al", MM: 1}, b, plan.Filter{Material: "Al", MM: 1}).KermaMGy()
	through := tube(t, "W", 120, a).Through(material(t, "Cu"), 0.5).KermaMGy()
	for _, v := range []float64{two, half, through} {
		if math.Abs(v/one-1) > 1e-6 { // bins split at other edges for Through
			t.Errorf("kerma %.12g, want %.12g", v, one)
		}
	}
}

// TestMoreVoltageIsMore, for every target and anode angle.
func TestMoreVoltageIsMore(t *testing.T) {
	for _, target := range targetSymbols {
		for _, deg := range []float64{5, 12, 20, 45} {
			var kerma, photons float64
			for kV := 20.0; kV <= 450; kV += 2.5 {
				s, err := Tube(plan.Tube{KV: kV, Target: target, AnodeDeg: deg, Waveform: "constant",
					Filters: []plan.Filter{{Material: "Al", MM: 1}}})
				if err != nil {
					t.Fatal(err)
				}
				k, n := s.KermaMGy(), s.PhotonsPerCM2()
				if !(k > kerma && n > photons) {
					t.Errorf("%s, %g deg, %g kV: kerma %g after %g, photons %g after %g", target, deg, kV, k, kerma, n, photons)
				}
				kerma, photons = k, n
			}
		}
	}
}

// TestFlatterAnodeIsLess: the flatter the ray leaves, the more stays behind.
func TestFlatterAnodeIsLess(t *testing.T) {
	var last float64
	for deg := 5.0; deg <= 45; deg += 2.5 {
		s, err := Tube(plan.Tube{KV: 200, Target: "W", AnodeDeg: deg, Waveform: "constant"})
		if err != nil {
			t.Fatal(err)
		}
		if k := s.KermaMGy(); !(k > last) {
			t.Errorf("%g deg: kerma %g after %g", deg, k, last)
		} else {
			last = k
		}
	}
}

// TestTablesAgainstIntegral: interpolation stays within 0.4 % of the integral
// that the tables hold, done afresh with its own cross sections.
func TestTablesAgainstIntegral(t *testing.T) {
	tg, err := targetNamed("W")
	if err != nil {
		t.Fatal(err)
	}
	rule := newGauss(48)
	for _, kV := range []float64{23, 61, 137, 333, 449} {
		for _, kappa := range []float64{0.15, 0.31, 0.52, 0.77, 0.93, 0.99} {
			k := kappa * kV
			var want float64
			for i, x := range rule.x {
				e := k + (kV-k)*x
				s := slowedAt(tg.rows, kV, e/kV)
				want += rule.w[i] * tg.matter.Bremsstrahlung(e, k) / tg.matter.Stopping(e) * s.track * s.doppler
			}
			want *= 6.02214076e23 / tg.matter.A * k * k
			got := math.Exp(tg.thick.yield.at(math.Log(kV), math.Sqrt(kappa)))
			if math.Abs(got/want-1) > 0.004 {
				t.Errorf("%g kV, %g keV: %.5g, integral %.5g (%+.2f %%)", kV, k, got, want, (got/want-1)*100)
			}
		}
	}
}

func TestPulsedIsLess(t *testing.T) {
	for _, kV := range []float64{25, 100, 160, 300} {
		constant := tube(t, "W", kV, plan.Filter{Material: "Al", MM: 3})
		for _, w := range []string{"two-pulse", "self-rectified"} {
			p, err := Tube(plan.Tube{KV: kV, Target: "W", AnodeDeg: 20, Waveform: w, Filters: []plan.Filter{{Material: "Al", MM: 3}}})
			if err != nil {
				t.Fatal(err)
			}
			if r := constant.KermaMGy() / p.KermaMGy(); !(r > 1.3 && r < 3.3) {
				t.Errorf("%g kV %s: constant potential gives %.2f times as much, NCRP 49 says 1.5 to 2 from 100 kV", kV, w, r)
			}
			if !(p.MeanKeV() < constant.MeanKeV()) {
				t.Errorf("%g kV %s: mean %g keV, constant %g", kV, w, p.MeanKeV(), constant.MeanKeV())
			}
		}
	}
}

func TestTubeRefuses(t *testing.T) {
	good := head(200)
	for _, r := range []struct {
		change func(*plan.Tube)
		say    string
	}{
		{func(p *plan.Tube) { p.Target = "Pb" }, `target "Pb"`},
		{func(p *plan.Tube) { p.Target = "w" }, `target "w"`},
		{func(p *plan.Tube) { p.KV = 19.9 }, `"19.9" kV`},
		{func(p *plan.Tube) { p.KV = 451 }, "20 to 450"},
		{func(p *plan.Tube) { p.KV = math.NaN() }, `"NaN"`},
		{func(p *plan.Tube) { p.AnodeDeg = 0 }, "5 to 45"},
		{func(p *plan.Tube) { p.Waveform = "dc" }, `waveform "dc"`},
		{func(p *plan.Tube) { p.Filters = []plan.Filter{{Material: "al", MM: 1}} }, "filter 1"},
		{func(p *plan.Tube) { p.Filters = []plan.Filter{{Material: "Al", MM: -1}} }, "0 to 100"},
		{func(p *plan.Tube) { p.Filters = []plan.Filter{{Material: "Al", MM: math.NaN()}} }, "0 to 100"},
	} {
		p := good
		r.change(&p)
		if _, err := Tube(p); err == nil || !strings.Contains(err.Error(), r.say) {
			t.Errorf("want an error with %q, got %v", r.say, err)
		}
	}
}

// TestTubeFromManySides: first use and reuse from many goroutines at once.
func TestTubeFromManySides(t *testing.T) {
	want := tube(t, "Rh", 90).KermaMGy()
	var wait sync.WaitGroup
	for i := range 24 {
		wait.Go(func() {
			s, err := Tube(plan.Tube{KV: 90, Target: targetSymbols[i%6], AnodeDeg: 20, Waveform: "constant"})
			if err != nil || !(s.KermaMGy() > 0) {
				t.Errorf("%s: %v", targetSymbols[i%6], err)
			}
			if targetSymbols[i%6] == "Rh" && s.KermaMGy() != want {
				t.Error("another goroutine's scratch came through")
			}
		})
	}
	wait.Wait()
}

// TestHalfWaveIsFine holds the few voltages of a cycle against 400.
func TestHalfWaveIsFine(t *testing.T) {
	tg, err := targetNamed("W")
	if err != nil {
		t.Fatal(err)
	}
	sums := func(kV float64, cycle []moment, filters []layer) (kerma, mean float64) {
		b := new(bins)
		b.lay(tg, filters, kV)
		for _, m := range cycle {
			if kV*m.voltage > lowTableKV {
				b.add(ThickTarget, tg, kV*m.voltage, 20, m.charge)
			}
		}
		s := b.spectrum()
		s.filter(filters)
		return s.KermaMGy(), s.MeanKeV()
	}
	const n = 400
	var fine []moment
	var all float64
	for i := range n {
		v := math.Sin(math.Pi / 2 * (float64(i) + 0.5) / n)
		c := min(1, math.Pow(v/saturation, 1.5))
		fine = append(fine, moment{v, c})
		all += c
	}
	for i := range fine {
		fine[i].charge /= all
	}
	for _, kV := range []float64{60, 160, 300} {
		for _, f := range []layer{{material(t, "Al"), 2}, {material(t, "Fe"), 10}} {
			k, m := sums(kV, halfWave(), []layer{f})
			wantK, wantM := sums(kV, fine, []layer{f})
			if math.Abs(k/wantK-1) > 0.01 || math.Abs(m/wantM-1) > 0.002 {
				t.Errorf("%g kV behind %g mm %s: kerma %+.2f %%, mean energy %+.2f %%", kV, f.mm, f.material.Name(), (k/wantK-1)*100, (m/wantM-1)*100)
			}
		}
	}
}
