package drafting

import (
	"math"
	"slices"
	"strings"
	"testing"
)

func TestTicksFallOn125(t *testing.T) {
	for _, c := range []struct {
		axis Axis
		n    int
		want []float64
	}{
		{Axis{Lo: 0, Hi: 10}, 5, []float64{0, 2, 4, 6, 8, 10}},
		{Axis{Lo: 0, Hi: 1}, 4, []float64{0, 0.5, 1}},
		{Axis{Lo: 233, Hi: 2100}, 4, []float64{500, 1000, 1500, 2000}},
		{Axis{Lo: 1, Hi: 100, Log: true}, 8, []float64{1, 2, 5, 10, 20, 50, 100}},
		{Axis{Lo: 3, Hi: 700, Log: true}, 3, []float64{10, 100}},
		{Axis{Lo: 5, Hi: 5}, 3, nil},
	} {
		got := c.axis.Ticks(c.n)
		if !slices.EqualFunc(got, c.want, func(a, b float64) bool { return math.Abs(a-b) < 1e-9*math.Max(1, b) }) {
			t.Errorf("%v with %d: %v, want %v", c.axis, c.n, got, c.want)
		}
	}
}

func TestTicksStayInside(t *testing.T) {
	for lo := 0.013; lo < 5000; lo *= 1.37 {
		for _, ratio := range []float64{1.2, 3.5, 40, 9000} {
			for _, log := range []bool{false, true} {
				a := Axis{Lo: lo, Hi: lo * ratio, Log: log}
				ticks := a.Ticks(6)
				for i, v := range ticks {
					if v < a.Lo*(1-1e-9) || v > a.Hi*(1+1e-9) || (i > 0 && v <= ticks[i-1]) {
						t.Fatalf("%v: ticks %v", a, ticks)
					}
				}
				if len(ticks) > 14 {
					t.Fatalf("%v: %d ticks", a, len(ticks))
				}
			}
		}
	}
}

func TestAxisInverse(t *testing.T) {
	for _, a := range []Axis{{Lo: 2, Hi: 300, From: 10, To: 400, Log: true}, {Lo: -5, Hi: 12, From: 300, To: 20}} {
		for _, at := range []float64{15, 77.7, 260} {
			if got := a.At(a.Value(at)); math.Abs(got-at) > 1e-9 {
				t.Errorf("%v: %v comes back as %v", a, at, got)
			}
		}
	}
}

// An arc of cubics stays within 3e-4 of its radius.
func TestArcIsRound(t *testing.T) {
	c := Pt{100, 50}
	p := Arc(c, 80, 0.3, 5)
	now := Pt{}
	worst := 0.0
	p.Walk(func(q Pt) { now = q }, func(q Pt) {}, func(a, b, q Pt) {
		for k := 0.0; k <= 1; k += 0.05 {
			u := 1 - k
			x := u*u*u*now.X + 3*u*u*k*a.X + 3*u*k*k*b.X + k*k*k*q.X
			y := u*u*u*now.Y + 3*u*u*k*a.Y + 3*u*k*k*b.Y + k*k*k*q.Y
			worst = math.Max(worst, math.Abs(Pt{x, y}.Sub(c).Len()/80-1))
		}
		now = q
	}, func() {})
	if worst > 3e-4 {
		t.Fatalf("off by %v of the radius", worst)
	}
	if end := c.Polar(80, 5.3); now.Sub(end).Len() > 1e-9 {
		t.Fatalf("ends at %v, want %v", now, end)
	}
}

// Dashes cover the share of the path that the pattern says.
func TestDashes(t *testing.T) {
	line := Poly(false, Pt{0, 0}, Pt{300, 0}, Pt{300, 700})
	d := line.Dashed([]float64{6, 4})
	drawn, now := 0.0, Pt{}
	d.Walk(func(q Pt) { now = q }, func(q Pt) { drawn += q.Sub(now).Len(); now = q }, func(_, _, q Pt) {}, func() {})
	if math.Abs(drawn-600) > 1e-6 {
		t.Fatalf("%v of 1000 drawn, want 600", drawn)
	}
}

// Dimension text is parallel to its line and read from below or from the right.
func TestDimensionTextIsParallel(t *testing.T) {
	for _, c := range []struct {
		a, b Pt
		turn float64
	}{
		{Pt{10, 100}, Pt{300, 100}, 0},
		{Pt{300, 100}, Pt{10, 100}, 0},
		{Pt{100, 10}, Pt{100, 300}, -math.Pi / 2},
		{Pt{100, 300}, Pt{100, 10}, -math.Pi / 2},
		{Pt{0, 0}, Pt{200, 200}, math.Pi / 4},
	} {
		d := New(NewFonts(), Rect{X1: 400, Y1: 400})
		d.Dimension(Dimension{A: c.a, B: c.b, Text: "f 680 mm", Size: 14})
		for _, it := range d.Items {
			if it.Kind == TextItem && math.Abs(it.Text.Turn-c.turn) > 1e-9 {
				t.Errorf("%v to %v: text turned by %v, want %v", c.a, c.b, it.Text.Turn, c.turn)
			}
		}
	}
}

// Hatches of all families differ from each other, without a colour.
func TestHatchesDiffer(t *testing.T) {
	families := []string{"steel", "cast-iron", "aluminium", "magnesium", "titanium", "copper", "nickel", "zirconium", "heavy", "concrete", "mineral", "liquid", "plastic", "gas", "element"}
	seen := map[string]string{}
	for _, f := range families {
		d := New(NewFonts(), Rect{X1: 100, Y1: 100})
		d.Hatch(Box(Rect{X1: 100, Y1: 100}), f, Line)
		key := ""
		for _, it := range d.Items {
			if it.Kind == StrokeItem {
				key += strings.Repeat("|", len(it.Path.segs)) + plainList(it.Dash)
				a := it.Path.segs[1].P.Sub(it.Path.segs[0].P)
				key += Plain(math.Round(math.Atan2(a.Y, a.X)*100)) + ";"
			}
		}
		if other, ok := seen[key]; ok {
			t.Errorf("%s is hatched like %s", f, other)
		}
		seen[key] = f
	}
}

func plainList(v []float64) string {
	out := ""
	for _, x := range v {
		out += Plain(x) + ","
	}
	return out
}

func TestWrap(t *testing.T) {
	f := NewFonts()
	for _, c := range []struct {
		text  string
		width float64
		want  string
	}{
		{"a bc def", 1000, "a bc def"},
		{"one two", f.Width("one", 14, false) + 1, "one|two"},
		{"iso17636-1:2013/B", f.Width("iso17636-1:2", 14, false), "iso17636-1:|2013/B"},
		{"x\ny", 100, "x|y"},
		{"", 100, ""},
	} {
		if got := strings.Join(f.Wrap(c.text, 14, false, c.width), "|"); got != c.want {
			t.Errorf("%q in %.0f: %q, want %q", c.text, c.width, got, c.want)
		}
	}
	for _, l := range f.Wrap("incomprehensibilities of iso17636-1:2013", 14, true, 40) {
		if w := f.Width(l, 14, true); w > 40 {
			t.Errorf("%q is %v wide", l, w)
		}
	}
}

// Contrast is that of WCAG 2: black on white is 21:1, and mid grey #767676 on
// white is the well-known 4.54:1 (WCAG 2.1 understanding 1.4.3; from memory).
func TestContrast(t *testing.T) {
	white := RGB{255, 255, 255}
	if c := Contrast(RGB{}, white); math.Abs(c-21) > 1e-9 {
		t.Errorf("black on white is %v", c)
	}
	if c := Contrast(white, RGB{0x76, 0x76, 0x76}); math.Abs(c-4.54) > 0.01 {
		t.Errorf("#767676 on white is %v", c)
	}
}

func TestDigitsAreTabular(t *testing.T) {
	f := NewFonts()
	for _, bold := range []bool{false, true} {
		for _, r := range "123456789" {
			if f.Width(string(r), 100, bold) != f.Width("0", 100, bold) {
				t.Errorf("%c is not as wide as 0", r)
			}
		}
	}
}
