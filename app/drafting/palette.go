package drafting

import "math"

// Ink names a colour by what it means.
type Ink uint8

// The inks.
const (
	Sheet    Ink = iota // the paper itself
	Block               // a cell or a panel raised from it
	Line                // ink: outlines, figures
	Faint               // second ink: captions, dimension lines
	Ghost               // rules and grids that only guide
	Beam                // the beam's edges and axis
	BeamWash            // where the beam passes
	Rope                // the boundary
	RopeWash            // ground of a boundary's figure, and where a rule falls short
	Reverse             // what stands on filled ink
	Focus               // ring round what the keyboard acts on
	inks
)

// RGB is a colour without transparency.
type RGB struct{ R, G, B uint8 }

// Palette gives the colours of one light.
type Palette [inks]RGB

// PaperLight is for sun: dark ink on warm white.
func PaperLight() Palette {
	return Palette{
		Sheet: {252, 250, 244}, Block: {243, 239, 228}, Line: {16, 22, 28}, Faint: {66, 74, 82}, Ghost: {205, 200, 186},
		Beam: {148, 84, 0}, BeamWash: {255, 232, 184}, Rope: {186, 44, 18}, RopeWash: {250, 222, 212}, Reverse: {252, 250, 244}, Focus: {16, 22, 28},
	}
}

// SlateLight is for the night: pale ink on dark slate.
func SlateLight() Palette {
	return Palette{
		Sheet: {17, 22, 27}, Block: {27, 34, 41}, Line: {240, 242, 243}, Faint: {176, 186, 194}, Ghost: {58, 68, 77},
		Beam: {255, 186, 66}, BeamWash: {50, 40, 18}, Rope: {255, 122, 92}, RopeWash: {64, 28, 20}, Reverse: {17, 22, 27}, Focus: {240, 242, 243},
	}
}

// SafeLight is for the dark room: long-wave red on black and nothing else, so
// every meaning rests on weight, dash, hatch and letter.
func SafeLight() Palette {
	return Palette{
		Sheet: {0, 0, 0}, Block: {28, 0, 0}, Line: {255, 0, 0}, Faint: {222, 0, 0}, Ghost: {84, 0, 0},
		Beam: {255, 0, 0}, BeamWash: {48, 0, 0}, Rope: {255, 0, 0}, RopeWash: {56, 0, 0}, Reverse: {0, 0, 0}, Focus: {255, 0, 0},
	}
}

// Contrast is the ratio of relative luminances, 1 to 21 (WCAG 2, from sRGB).
func Contrast(a, b RGB) float64 {
	x, y := a.luminance(), b.luminance()
	if x < y {
		x, y = y, x
	}
	return (x + 0.05) / (y + 0.05)
}

func (c RGB) luminance() float64 {
	lin := func(v uint8) float64 {
		s := float64(v) / 255
		if s <= 0.04045 {
			return s / 12.92
		}
		return math.Pow((s+0.055)/1.055, 2.4)
	}
	return 0.2126*lin(c.R) + 0.7152*lin(c.G) + 0.0722*lin(c.B)
}
