package touch

import (
	"gioui.org/gesture"
	"gioui.org/io/pointer"

	"halfvalue/app/drafting"
)

// scrollState is how far an area is scrolled.
type scrollState struct {
	gesture gesture.Scroll
	offset  float64 // dp
	most    float64 // dp
}

func (b *Bench) runScroll(s *scrollState) {
	lim := int(s.most * b.scale())
	at := int(s.offset * b.scale())
	d := s.gesture.Update(b.Gtx.Metric, b.Gtx.Source, b.Gtx.Now, gesture.Vertical,
		pointer.ScrollRange{}, pointer.ScrollRange{Min: -at, Max: lim - at})
	s.offset = min(max(s.offset+float64(d)/b.scale(), 0), s.most)
}

// Scroll draws content of a height in a box. What does not fit is reached by
// drag, by wheel and by two buttons at the lower right. The content is drawn by
// the function into a rectangle of the full height, moved as scrolled.
func (b *Bench) Scroll(key string, box drafting.Rect, height float64, draw func(drafting.Rect)) {
	s := b.scrolls[key]
	if s == nil {
		s = &scrollState{}
		b.scrolls[key] = s
	}
	view := box
	if height > box.H()+0.5 {
		strip, rest := box.CutRight(b.scrollStrip(box))
		view = rest
		defer b.scrollButtons(key, strip, s)
	}
	s.most = max(0, height-box.H())
	s.offset = min(s.offset, s.most)
	b.add(target{kind: scrollTarget, key: key, box: view})
	outer := b.shade
	b.shade = view
	b.Clip(drafting.Box(view))
	b.Scrolling()
	draw(drafting.Rect{X0: view.X0, Y0: view.Y0 - s.offset, X1: view.X1, Y1: view.Y0 - s.offset + max(height, view.H())})
	b.Still()
	b.Unclip()
	b.shade = outer
	b.add(target{kind: endScroll, box: view})
}

// ScrollWidth is the width that content has in a box of a width when it has a
// height: the buttons take a column where it does not fit.
func (b *Bench) ScrollWidth(box drafting.Rect, height float64) float64 {
	if height > box.H()+0.5 {
		return box.W() - b.scrollStrip(box)
	}
	return box.W()
}

// scrollStrip is the width of the buttons: one above the other, or side by
// side where the area is too low for both.
func (b *Bench) scrollStrip(box drafting.Rect) float64 {
	if box.H() < 2*b.Look.Target {
		return 2 * b.Look.Target
	}
	return b.Look.Target
}

// ScrollTo brings a place of the content to the top of its area.
func (b *Bench) ScrollTo(key string, at float64) {
	if s := b.scrolls[key]; s != nil {
		s.offset = at
	}
}

func (b *Bench) scrollButtons(key string, strip drafting.Rect, s *scrollState) {
	side := b.Look.Target
	page := max(strip.H()-side, side/2)
	up := drafting.Rect{X0: strip.X0, Y0: strip.Y0, X1: strip.X1, Y1: strip.Y0 + side}
	down := drafting.Rect{X0: strip.X0, Y0: strip.Y1 - side, X1: strip.X1, Y1: strip.Y1}
	if strip.H() < 2*side {
		half := strip.Columns(2, 0)
		up, down = half[0], half[1]
	}
	if down.Y0 > up.Y1 {
		b.Line(drafting.Pt{X: strip.Mid().X, Y: up.Y1}, drafting.Pt{X: strip.Mid().X, Y: down.Y0}, drafting.Hair, drafting.Ghost)
	}
	if run := down.Y0 - up.Y1; strip.H() > 2*side && run > 24 && s.most > 0 {
		grip := max(16, run*strip.H()/(strip.H()+s.most))
		y := up.Y1 + (run-grip)*s.offset/s.most
		b.Fill(drafting.Box(drafting.Rect{X0: strip.Mid().X - 2, Y0: y, X1: strip.Mid().X + 2, Y1: y + grip}), drafting.Faint)
	}
	b.chevron(up, key+": up", drafting.Pt{Y: -1}, s.offset > 0, func() { s.offset = max(0, s.offset-page) })
	b.chevron(down, key+": down", drafting.Pt{Y: 1}, s.offset < s.most, func() { s.offset = min(s.most, s.offset+page) })
}

func (b *Bench) chevron(r drafting.Rect, label string, dir drafting.Pt, able bool, do func()) {
	ink := drafting.Ghost
	if able {
		ink = drafting.Line
		b.Target(r, label, label, do)
		b.Ring(label, r)
	}
	b.Chevron(r.Mid(), 22, dir, ink)
}
