package screen

import (
	"math"
	"testing"

	"gioui.org/font"
	"gioui.org/op"
	"gioui.org/text"
	"golang.org/x/image/math/fixed"

	"halfvalue/app/drafting"
)

// The width that a drawing reckons with is that of the shaper which paints it.
func TestMeasuredAsShaped(t *testing.T) {
	fonts, shaper := drafting.NewFonts(), NewShaper()
	for _, bold := range []bool{false, true} {
		for _, s := range []string{"Exposure time", "1 min 39 s", "SFD 700 mm", "iso17636-1:2013/B", "7.5 µSv/h (0.75 mrem/h)", "AVA To, W13"} {
			f := font.Font{Typeface: "Go"}
			if bold {
				f.Weight = font.Bold
			}
			shaper.LayoutString(text.Parameters{Font: f, PxPerEm: fixed.I(64), MaxWidth: 1 << 20, MaxLines: 1}, s)
			end := fixed.Int26_6(0)
			for g, ok := shaper.NextGlyph(); ok; g, ok = shaper.NextGlyph() {
				end = max(end, g.X+g.Advance)
			}
			shaped, measured := float64(end)/64, fonts.Width(s, 64, bold)
			if math.Abs(shaped-measured) > 0.01*shaped {
				t.Errorf("%q bold %v: shaped %.1f px, measured %.1f", s, bold, shaped, measured)
			}
		}
	}
}

// Every kind of item paints without a renderer, and clips are balanced.
func TestPaintsEveryItem(t *testing.T) {
	d := drafting.New(drafting.NewFonts(), drafting.Rect{X1: 200, Y1: 200})
	d.Hatch(drafting.Ring(drafting.Pt{X: 60, Y: 60}, 50, 40), "steel", drafting.Line)
	d.Dimension(drafting.Dimension{A: drafting.Pt{X: 10, Y: 10}, B: drafting.Pt{X: 10, Y: 150}, Text: "SFD", Size: 14, Break: true})
	d.Line(drafting.Pt{X: 0, Y: 3}, drafting.Pt{X: 200, Y: 3}, drafting.Bold, drafting.Rope, drafting.Cord()...)
	for _, symbol := range []func(drafting.Pt, float64, drafting.Ink){d.Warning, d.Check, d.Cross, d.Plus, d.Minus, d.Diameter, d.Erase, d.Keypad, d.Ruler} {
		symbol(drafting.Pt{X: 100, Y: 100}, 24, drafting.Line)
	}
	for _, scale := range []float32{1, 1.5, 3} {
		p := Painter{Shaper: NewShaper(), Palette: drafting.PaperLight(), PxPerDp: scale}
		p.Paint(new(op.Ops), d)
	}
}
