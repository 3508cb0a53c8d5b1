package touch

import (
	"gioui.org/text"

	"halfvalue/app/drafting"
	"halfvalue/app/drafting/screen"
)

// Type sizes in dp at 100 %: there are three and no more.
const (
	smallSize = 14
	bodySize  = 18
	largeSize = 40
)

// Unit is the grid that everything stands on, dp.
const Unit = 8

// Look is how everything is shown. It is made once; light, text and gloves
// may change between frames.
type Look struct {
	Palette drafting.Palette
	Text    float64 // 1 to 2
	Target  float64 // least side of a target, dp: 56, with gloves 72
	Fonts   *drafting.Fonts
	Shaper  *text.Shaper
}

// NewLook makes a look in paper light with the bundled fonts.
func NewLook() *Look {
	return &Look{Palette: drafting.PaperLight(), Text: 1, Target: 56, Fonts: drafting.NewFonts(), Shaper: screen.NewShaper()}
}

// Small is the size of captions and of dimension text.
func (l *Look) Small() float64 { return smallSize * l.Text }

// Body is the size of what is read.
func (l *Look) Body() float64 { return bodySize * l.Text }

// Large is the size of the answer.
func (l *Look) Large() float64 { return largeSize * l.Text }

// Caption is the style of captions.
func (l *Look) Caption() drafting.Style {
	return drafting.Style{Size: l.Small(), Ink: drafting.Faint}
}

// Plain is the style of what is read.
func (l *Look) Plain() drafting.Style {
	return drafting.Style{Size: l.Body(), Ink: drafting.Line}
}

// Strong is the style of figures and names.
func (l *Look) Strong() drafting.Style {
	return drafting.Style{Size: l.Body(), Bold: true, Ink: drafting.Line}
}

// Answer is the style of the one figure that a sheet is about.
func (l *Look) Answer() drafting.Style {
	return drafting.Style{Size: l.Large(), Bold: true, Ink: drafting.Line}
}
