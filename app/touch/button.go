package touch

import (
	"strings"

	"halfvalue/app/drafting"
)

// Button is a target with words or a symbol.
type Button struct {
	Box      drafting.Rect
	Label    string // what a screen reader says; what is written where Text is empty
	Text     string
	Symbol   func(c drafting.Pt, side float64, ink drafting.Ink) // instead of words, or above them
	Do       func()
	Hold     func(repeat bool) // repeats while pressed; called with false when let go
	Selected bool
	Off      bool // shown, but does nothing now
	Strong   bool // filled: the one thing to do next
	Bare     bool // no frame
	Align    drafting.Align
}

// Button draws a button and names its target.
func (b *Bench) Button(t Button) {
	text := t.Text
	if text == "" && t.Symbol == nil {
		text = t.Label
	}
	ground, ink := b.buttonInks(t)
	if ground != drafting.Sheet || !t.Bare {
		b.Fill(drafting.Box(t.Box), ground)
	}
	if !t.Bare {
		width := drafting.Thin
		if t.Selected {
			width = drafting.Bold
		}
		frame := drafting.Line
		if t.Off {
			frame = drafting.Ghost
		}
		b.Frame(t.Box, width, frame)
	}
	b.buttonFace(t, text, ink)
	if !t.Off {
		b.targetAs(target{kind: clickTarget, key: t.Label, label: t.Label, box: t.Box, do: t.Do, hold: t.Hold, selected: t.Selected})
		b.Ring(t.Label, t.Box)
	}
}

func (b *Bench) buttonInks(t Button) (ground, ink drafting.Ink) {
	switch {
	case t.Off:
		return drafting.Sheet, drafting.Faint
	case b.Pressed(t.Label), t.Selected, t.Strong:
		return drafting.Line, drafting.Reverse
	case t.Bare:
		return drafting.Sheet, drafting.Line
	}
	return drafting.Block, drafting.Line
}

func (b *Bench) buttonFace(t Button, text string, ink drafting.Ink) {
	in := t.Box.Inset(Unit)
	style := drafting.Style{Size: b.Look.Body(), Ink: ink, Align: t.Align, Bold: t.Strong || t.Selected}
	if t.Align == drafting.Start && t.Symbol == nil {
		style.Align = drafting.Middle
	}
	if t.Symbol != nil && text == "" {
		t.Symbol(t.Box.Mid(), 24, ink)
		return
	}
	if t.Symbol != nil {
		style.Size, style.Align = b.Look.Small(), drafting.Middle
		h := 24 + 4 + style.Size
		top := t.Box.Mid().Y - h/2
		t.Symbol(drafting.Pt{X: t.Box.Mid().X, Y: top + 12}, 22, ink)
		b.Text(drafting.Pt{X: t.Box.Mid().X, Y: top + 28 + drafting.CapHeight*style.Size}, text, style)
		return
	}
	b.fitLines(in, text, style)
}

// fits says whether wrapped text has room in a box without breaking a word.
func (b *Bench) fits(in drafting.Rect, text string, style drafting.Style) bool {
	for _, word := range strings.Fields(text) {
		if b.Fonts.Width(word, style.Size, style.Bold) > in.W() {
			return false
		}
	}
	lines := len(b.Fonts.Wrap(text, style.Size, style.Bold, in.W()))
	return (float64(lines)-1)*style.Size*1.2+style.Size*drafting.CapHeight <= in.H()
}

// fitLines writes text centred in a box, on as many lines as it needs.
func (b *Bench) fitLines(in drafting.Rect, text string, style drafting.Style) {
	if !b.fits(in, text, style) {
		in, style.Size = in.Grow(Unit-2), b.Look.Small()
	}
	lines := b.Fonts.Wrap(text, style.Size, style.Bold, in.W())
	step := style.Size * 1.2
	y := in.Mid().Y - step*float64(len(lines)-1)/2
	for _, l := range lines {
		b.TextIn(drafting.Rect{X0: in.X0, Y0: y, X1: in.X1, Y1: y}, l, style)
		y += step
	}
}

// ButtonHeight is the least height of a button with a text in a width.
func (b *Bench) ButtonHeight(text string, width float64) float64 {
	lines := len(b.Fonts.Wrap(text, b.Look.Body(), true, width-2*Unit))
	return max(b.Look.Target, float64(lines)*b.Look.Body()*1.2+2*Unit)
}
