package touch

import (
	"image"
	"math"
	"strings"
	"testing"
	"time"

	"gioui.org/io/input"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/unit"

	"halfvalue/app/drafting"
)

// drawn lays one frame out and returns what it drew.
func drawn(draw func(b *Bench)) []drafting.Item {
	var b Bench
	var r input.Router
	var ops op.Ops
	gtx := layout.Context{Ops: &ops, Now: time.Unix(0, 0), Source: r.Source(), Metric: unit.Metric{PxPerDp: 1, PxPerSp: 1}, Constraints: layout.Exact(image.Pt(400, 200))}
	b.Begin(gtx, NewLook())
	draw(&b)
	b.End()
	r.Frame(&ops)
	return b.Drawing.Items
}

// shape is what a drawing looks like to somebody who sees no colour: strokes,
// fills, widths and dashes without their ink.
func shape(items []drafting.Item) string {
	var out strings.Builder
	for _, it := range items {
		if it.Kind == drafting.TextItem {
			continue
		}
		b := it.Path.Bounds()
		out.WriteString(strings.Join([]string{string('a' + rune(it.Kind)), drafting.Plain(it.Width), drafting.Plain(b.W()), drafting.Plain(b.H()), drafting.Plain(float64(len(it.Dash)))}, " ") + "\n")
	}
	return out.String()
}

func TestStampsDifferWithoutColour(t *testing.T) {
	seen := map[string]Mark{}
	for _, m := range []Mark{Holds, Struck, Open} {
		key := shape(drawn(func(b *Bench) {
			b.Stamp(Stamp{Box: drafting.Rect{X0: 10, Y0: 10, X1: 250, Y1: 66}, Mark: m, Name: "Least f", Text: "680", Key: "f", Label: "Least f"})
		}))
		if other, ok := seen[key]; ok {
			t.Errorf("mark %d looks like mark %d", m, other)
		}
		seen[key] = m
	}
}

func spec(value float64) DialSpec {
	return DialSpec{Field: "x", Label: "SFD", Value: value, Min: 20, Max: 20000, Log: true, Step: func(v float64) float64 { return 5 }, Usual: []float64{700, 800, 1000}}
}

// A drag and the drag back meet, and the ruler shows a value where the drag to
// it would end.
func TestScaleIsConsistent(t *testing.T) {
	s := spec(700)
	for _, log := range []bool{true, false} {
		s.Log = log
		for _, dx := range []float64{-300, -20, 55, 210} {
			v := s.moved(700, dx)
			if log {
				if back := s.moved(v, -dx); math.Abs(back-700) > 1e-9 {
					t.Errorf("drag of %v and back ends at %v", dx, back)
				}
			}
			if at := s.place(100, v); math.Abs(at-(100-dx)) > 1e-9 {
				t.Errorf("log %v: %v stands at %v, a drag of %v brings it there from 100", log, v, at, dx)
			}
		}
	}
}

func TestDetentsAndEnds(t *testing.T) {
	s := spec(700)
	for v, want := range map[float64]float64{695: 700, 808: 800, 750: 750, 752: 750, 3: 20, 1e9: 20000} {
		if got := s.settle(v); got != want {
			t.Errorf("%v settles at %v, want %v", v, got, want)
		}
	}
}

// The crosshair reads between points in ratios of time, and not across a gap.
func TestCrosshairReads(t *testing.T) {
	points := []StripPoint{{X: 1, Y: 10}, {X: 3, Y: 40}, {X: 4, Gap: true}, {X: 5, Y: 50}}
	if p, ok := between(points, 2); !ok || math.Abs(p.Y-20) > 1e-9 {
		t.Errorf("half way from 10 to 40 is %v, want 20", p.Y)
	}
	for _, x := range []float64{0.5, 3.5, 4.5, 6} {
		if p, ok := between(points, x); ok {
			t.Errorf("read %v at %v, where there is nothing", p.Y, x)
		}
	}
}
