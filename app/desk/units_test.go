package desk

import (
	"math"
	"testing"
)

// Conversions are exact by definition: 1 in = 25.4 mm, 1 ft = 304.8 mm,
// 1 Ci = 37 GBq, 1 mrem = 10 uSv (NIST SP 811, appendix B; from memory).
func TestTypedUnits(t *testing.T) {
	for _, c := range []struct {
		units Units
		kind  Kind
		text  string
		want  float64
	}{
		{SI, Length, "820", 820},
		{SI, Length, "2 in", 50.8},
		{SI, Length, "2in", 50.8},
		{SI, Length, "1 1/2 in", 38.1},
		{SI, Length, "1/4\"", 6.35},
		{SI, Length, "27,5", 27.5},
		{SI, Length, "0.7 m", 700},
		{SI, Length, "2 FT", 609.6},
		{Customary, Length, "28", 711.2},
		{Customary, Length, "700 mm", 700},
		{SI, Activity, "0.5 Ci", 18.5},
		{SI, Activity, "620 GBq", 620},
		{SI, Activity, "620 GBQ", 620},
		{SI, Activity, "1.5 TBq", 1500},
		{Customary, Activity, "50", 1850},
		{Customary, Activity, "500 mCi", 18.5},
		{SI, DoseRate, "2 mrem/h", 20},
		{SI, Dose, "2 mrem", 20},
		{SI, Dose, "0.02 mSv", 20},
		{SI, Time, "2 min", 120},
		{SI, PerHour, "6 /h", 6},
		{SI, Plain, "2.3", 2.3},
	} {
		got, err := c.units.Parse(c.kind, c.text)
		if err != nil || math.Abs(got-c.want) > 1e-9*c.want {
			t.Errorf("%q: %v, %v; want %v", c.text, got, err, c.want)
		}
	}
	for _, text := range []string{"", "mm", "2 2", "1/0", "1 2 3", "five", "2 in 3", "1e999", "--3", "/h"} {
		if v, err := SI.Parse(Length, text); err == nil {
			t.Errorf("%q was taken for %v", text, v)
		}
	}
}

func TestFormatAndParseAreInverse(t *testing.T) {
	for _, u := range []Units{SI, Customary} {
		for _, k := range []Kind{Length, Distance, Voltage, Current, Activity, DoseRate, Dose} {
			for _, v := range []float64{0.01, 1, 7.5, 254, 1850} {
				got, err := u.Parse(k, u.Format(k, v, 6))
				if err != nil || math.Abs(got-v) > 1e-5*v {
					t.Errorf("%v %v: %q reads back as %v, %v", u, v, u.Format(k, v, 6), got, err)
				}
			}
		}
	}
}

func TestOutwardNeverRoundsInward(t *testing.T) {
	for v := 0.11; v < 3000; v *= 1.0137 {
		for _, u := range []Units{SI, Customary} {
			got, err := u.Parse(Distance, u.Outward(v))
			if err != nil || got < v*(1-1e-9) {
				t.Fatalf("%v m is shown as %s, which is %v m, %v", v, u.Outward(v), got, err)
			}
		}
	}
}

func TestClock(t *testing.T) {
	for s, want := range map[float64]string{3.14: "3.1 s", 9.97: "10.0 s", 59.4: "59 s", 59.6: "1 min 00 s", 185: "3 min 05 s", 3599.6: "1 h 00 min", 5400: "1 h 30 min", -1: "–"} {
		if got := Clock(s); got != want {
			t.Errorf("%v s: %q, want %q", s, got, want)
		}
	}
	if got := Clock(math.NaN()); got != "–" {
		t.Errorf("no number: %q", got)
	}
}

func TestSignificant(t *testing.T) {
	for v, want := range map[float64]string{0: "0", 1234567: "1 230 000", 0.05678: "0.0568", 2.3: "2.3", 99.96: "100", 12.04: "12"} {
		if got := Significant(v, 3); got != want {
			t.Errorf("%v: %q, want %q", v, got, want)
		}
	}
}
