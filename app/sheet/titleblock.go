package sheet

import (
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// cell is one field of the title block.
type cell struct {
	caption, value, note string
	big                  bool        // the sheet's answer
	rope                 bool        // marked as the boundary
	span                 int         // columns, 1 or 2
	check                *desk.Check // a stamp instead
	panel                desk.Panel
	do                   desk.Intent // instead of a panel
	label                string      // of its target
}

// titleBlock draws the answer and what the shot rests on, in cells that can
// be touched, and the buttons to log and to see the working.
// The stamps stand in it where they have no room of their own.
func (u *UI) titleBlock(r drafting.Rect, stamps bool) {
	b := &u.bench
	foot, cells := r.CutBottom(u.look.Target + 2*touch.Unit)
	buttons := foot.Inset(touch.Unit).Columns(2, touch.Unit)
	b.Button(touch.Button{Box: buttons[0], Label: "Log shot", Strong: true, Off: u.s.Fault != "" || u.s.Book.Fault != "", Do: u.toggle(desk.Panel{Kind: desk.LogPanel})})
	b.Button(touch.Button{Box: buttons[1], Label: "Working", Selected: u.s.Panel.Kind == desk.WorkingPanel, Do: u.toggle(desk.Panel{Kind: desk.WorkingPanel})})
	b.Line(drafting.Pt{X: foot.X0, Y: foot.Y0}, drafting.Pt{X: foot.X1, Y: foot.Y0}, drafting.Thin, drafting.Line)
	u.grid("Title block", cells, u.shotCells(stamps))
}

// grid flows cells into rows; what does not fit scrolls.
func (u *UI) grid(key string, r drafting.Rect, cells []cell) {
	b := &u.bench
	height := u.gridRows(r.W(), u.columns(r.W()), cells, nil)
	width := b.ScrollWidth(r, height)
	height = u.gridRows(width, u.columns(width), cells, nil)
	b.Scroll(key, r, height, func(in drafting.Rect) {
		u.gridRows(in.W(), u.columns(in.W()), cells, func(box drafting.Rect, c cell) { u.cell(box.Moved(in.X0, in.Y0), c) })
	})
}

// columns is into how many columns a title block of a width is parted.
func (u *UI) columns(width float64) int {
	return max(1, min(4, int(width/(116*u.look.Text))))
}

// gridRows places cells in n columns and returns the height of all rows.
func (u *UI) gridRows(width float64, n int, cells []cell, place func(drafting.Rect, cell)) float64 {
	unit := width / float64(n)
	y := 0.0
	for i := 0; i < len(cells); {
		used, row := 0, i
		for i < len(cells) && used+min(cells[i].span, n) <= n {
			used += min(cells[i].span, n)
			i++
		}
		h, x, free := 0.0, 0.0, n-used
		widths := make([]float64, 0, 4)
		for k := row; k < i; k++ {
			w := unit * float64(min(cells[k].span, n))
			if k == i-1 {
				w += unit * float64(free)
			}
			widths = append(widths, w)
			h = math.Max(h, u.cellHeight(w, cells[k]))
		}
		for k := row; k < i; k++ {
			w := widths[k-row]
			if place != nil {
				place(drafting.Rect{X0: x, Y0: y, X1: x + w, Y1: y + h}, cells[k])
			}
			x += w
		}
		y += h
	}
	return y
}

// valueStyle is large for the answer where it fits on its line.
func (u *UI) valueStyle(c cell, width float64) drafting.Style {
	if big := u.look.Answer(); c.big && u.bench.Fonts.Width(c.value, big.Size, true) <= width {
		return big
	}
	return u.look.Strong()
}

func (u *UI) cellHeight(width float64, c cell) float64 {
	b := &u.bench
	if c.check != nil {
		return u.stampHeight() + touch.Unit
	}
	w := width - 2*touch.Unit - u.ropeRoom(c)
	h := 1.5*touch.Unit + b.Height(w, c.caption, u.look.Caption()) + b.Height(w, c.value, u.valueStyle(c, w))
	if c.note != "" {
		h += b.Height(w, c.note, u.look.Caption())
	}
	if c.touchable() {
		h = math.Max(h, u.look.Target)
	}
	return h
}

// ropeRoom is the width of the cord that marks the boundary's cell.
func (u *UI) ropeRoom(c cell) float64 {
	if c.rope {
		return touch.Unit + 4
	}
	return 0
}

func (u *UI) cell(r drafting.Rect, c cell) {
	b := &u.bench
	open := c.panel.Kind != desk.NoPanel && u.s.Panel == c.panel
	switch {
	case open || b.Pressed(c.key()):
		b.Fill(drafting.Box(r), drafting.BeamWash)
	case c.touchable():
		b.Fill(drafting.Box(r.Inset(0.5)), drafting.Block)
	}
	b.Line(drafting.Pt{X: r.X0, Y: r.Y1 - 1}, drafting.Pt{X: r.X1, Y: r.Y1 - 1}, drafting.Hair, drafting.Faint)
	b.Line(drafting.Pt{X: r.X1 - 1, Y: r.Y0}, drafting.Pt{X: r.X1 - 1, Y: r.Y1}, drafting.Hair, drafting.Faint)
	if c.check != nil {
		u.stamp(r.Inset(touch.Unit/2), *c.check)
		return
	}
	in := drafting.Rect{X0: r.X0 + touch.Unit + u.ropeRoom(c), Y0: r.Y0 + 0.6*touch.Unit, X1: r.X1 - touch.Unit, Y1: r.Y1}
	if c.rope {
		b.Line(drafting.Pt{X: r.X0 + 8, Y: r.Y0 + 6}, drafting.Pt{X: r.X0 + 8, Y: r.Y1 - 6}, 4, drafting.Rope, drafting.Cord()...)
	}
	in.Y0 += b.Paragraph(in, c.caption, u.look.Caption())
	in.Y0 += b.Paragraph(in, c.value, u.valueStyle(c, in.W()))
	if c.note != "" {
		b.Paragraph(in, c.note, u.look.Caption())
	}
	text := c.caption + ", " + c.value
	if c.note != "" {
		text += ", " + c.note
	}
	if !c.touchable() {
		b.Words(r, text)
		return
	}
	label := c.label
	if label == "" {
		label = text
	}
	act := u.toggle(c.panel)
	if c.do != nil {
		act = u.do(c.do)
	}
	b.Target(r, c.key(), label, act)
	b.Ring(c.key(), r)
}

// key is the cell's identity from frame to frame.
func (c cell) key() string { return "cell " + c.caption + string(c.panel.Kind) + " " + c.panel.Field }

func (c cell) touchable() bool { return c.panel.Kind != desk.NoPanel || c.do != nil }

// answerHeight is the height of the band that keeps the answer in view while a
// panel is open.
func (u *UI) answerHeight(width float64) float64 {
	return u.gridRows(width, 2, u.bandCells(), nil)
}

func (u *UI) answerBand(r drafting.Rect) {
	b := &u.bench
	b.Line(drafting.Pt{X: r.X0, Y: r.Y0}, drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Bold, drafting.Line)
	u.gridRows(r.W(), 2, u.bandCells(), func(box drafting.Rect, c cell) { u.cell(box.Moved(r.X0, r.Y0), c) })
}

func (u *UI) bandCells() []cell {
	t, r := u.timeCell(), u.ropeCell()
	t.big, r.big = false, false
	if w, ok := u.s.Answer.Worst(); ok {
		r.value, r.note = desk.SI.Outward(w.Metres)+" / "+desk.Customary.Outward(w.Metres), ""
	}
	if u.look.Text > 1.2 && t.panel.Kind != desk.NoPanel {
		t.note = ""
	}
	t.span, r.span = 1, 1
	return []cell{t, r}
}
