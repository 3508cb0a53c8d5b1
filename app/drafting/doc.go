// Package drafting is the drawing kit of the sheets: a display list of lines,
// hatches, dimension lines, axes and text, and nothing that knows a screen.
// Painters in subpackages put a Drawing on a Gio screen (drafting/screen) or
// into an SVG file (drafting/svg), so the same code draws both.
//
// Coordinates are in dp, x to the right, y downward, angles in radians and
// clockwise as seen. Colours are named by what they mean (Ink), never by
// their figure; a Palette gives the figures for one light. Text is measured
// with the bundled Go fonts, so a layout does not depend on a painter.
//
// The spirit is that of ISO 128 and ISO 129: line weights that differ by
// meaning, dimension text parallel to its line and above it, break lines
// where a distance is cut short, hatches that tell materials apart.
//
//	d := drafting.New(drafting.NewFonts(), drafting.Rect{X1: 400, Y1: 300})
//	d.Line(drafting.Pt{X: 20, Y: 20}, drafting.Pt{X: 380, Y: 20}, drafting.Bold, drafting.Line)
//	d.Dimension(drafting.Dimension{A: a, B: b, Off: 24, Text: "SFD 700 mm", Size: 14})
package drafting
