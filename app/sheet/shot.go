package sheet

import (
	"math"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// shotSheet draws the Shot sheet: the drawing, the stamps, the title block,
// and the panel that is open.
func (u *UI) shotSheet(area drafting.Rect) {
	b := &u.bench
	b.Frame(area, drafting.Bold, drafting.Line)
	in := area.Inset(drafting.Bold)
	if wide(b.Area) {
		u.shotWide(in)
		return
	}
	u.shotTall(in)
}

// shotWide puts the title block at the right of the drawing.
func (u *UI) shotWide(in drafting.Rect) {
	b := &u.bench
	share := 0.30 + 0.14*(u.look.Text-1)
	block, view := in.CutRight(math.Max(300, in.W()*share))
	u.titleBlock(drafting.Rect{X0: block.X0 + drafting.Bold/2, Y0: block.Y0, X1: block.X1, Y1: block.Y1}, false)
	b.Line(drafting.Pt{X: block.X0, Y: block.Y0}, drafting.Pt{X: block.X0, Y: block.Y1}, drafting.Bold, drafting.Line)
	if u.s.Panel.Kind != desk.NoPanel {
		view = u.panelBelow(view, 0.86)
	} else {
		view = u.stamps(view)
	}
	u.drawing(view)
}

// shotTall stacks the drawing over the title block.
func (u *UI) shotTall(in drafting.Rect) {
	b := &u.bench
	answer := u.answerHeight(in.W())
	if u.s.Panel.Kind != desk.NoPanel {
		if in.H()-answer < u.panelHeight(in.W(), 0) && u.s.Panel.Kind == desk.DialPanel {
			answer = 0 // a stated refusal leaves no room for both; the drawing and the dial show the figures
		}
		most := in.H() - answer
		height := math.Min(u.panelHeight(in.W(), most), most)
		if most-height < u.headRoom()+u.footRoom()+math.Max(40, 2.6*u.look.Small()) {
			height = most // too little is left for a drawing
		}
		panel, rest := in.CutBottom(height)
		band, view := rest.CutBottom(answer)
		u.panelIn(panel)
		if answer > 0 {
			u.answerBand(band)
		}
		u.drawing(view)
		return
	}
	view, rest := in.CutTop(in.H() * 0.5)
	b.Line(drafting.Pt{X: rest.X0, Y: rest.Y0}, drafting.Pt{X: rest.X1, Y: rest.Y0}, drafting.Bold, drafting.Line)
	narrow := in.W() < 560*u.look.Text
	if !narrow {
		view = u.stamps(view)
	}
	u.drawing(view)
	u.titleBlock(rest, narrow)
}

// panelBelow draws the open panel at the foot of a view and returns what is
// left of it.
func (u *UI) panelBelow(view drafting.Rect, most float64) drafting.Rect {
	panel, rest := view.CutBottom(math.Min(u.panelHeight(view.W(), view.H()*most), view.H()*most))
	u.panelIn(panel)
	return rest
}

// stamps draws the checks in a grid at the foot of a view; without rules
// there is none.
func (u *UI) stamps(view drafting.Rect) drafting.Rect {
	checks := u.s.Answer.Checks
	if len(checks) == 0 {
		return view
	}
	b := &u.bench
	columns := max(1, int(view.W()/(230*u.look.Text)))
	height := u.stampHeight()
	rows := (len(checks) + columns - 1) / columns
	full := float64(rows)*(height+touch.Unit) + touch.Unit
	box, rest := view.CutBottom(math.Min(full, view.H()*0.4))
	b.Line(drafting.Pt{X: box.X0, Y: box.Y0}, drafting.Pt{X: box.X1, Y: box.Y0}, drafting.Thin, drafting.Line)
	box.Y0 += drafting.Thin
	b.Scroll("Checks", box, full-drafting.Thin, func(r drafting.Rect) {
		w := (r.W() - touch.Unit*float64(columns+1)) / float64(columns)
		for i, c := range checks {
			x := r.X0 + touch.Unit + float64(i%columns)*(w+touch.Unit)
			y := r.Y0 + touch.Unit + float64(i/columns)*(height+touch.Unit) - drafting.Thin
			u.stamp(drafting.Rect{X0: x, Y0: y, X1: x + w, Y1: y + height}, c)
		}
	})
	return rest
}

// stampHeight is that of a name and one line.
func (u *UI) stampHeight() float64 {
	return math.Max(u.look.Target, u.look.Small()*drafting.Leading*2+touch.Unit)
}

func (u *UI) stamp(r drafting.Rect, c desk.Check) {
	mark := map[string]touch.Mark{desk.Holds: touch.Holds, desk.Short: touch.Struck}
	m, ok := mark[c.Verdict]
	if !ok {
		m = touch.Open
	}
	room := r.W() - u.look.Target - 2*touch.Unit
	u.bench.Stamp(touch.Stamp{Box: r, Mark: m, Key: c.ID, Name: u.bench.Fit(capital(c.Name), room, drafting.Style{Size: u.look.Small(), Bold: true}), Text: u.stampText(c, room),
		Label: capital(c.Name) + ": " + verdictWord(c.Verdict) + ". " + u.checkText(c), Do: u.toggle(desk.Panel{Kind: desk.CheckPanel, Field: c.ID})})
}

// stampText is what a check says in one line: its words if they fit, else its
// figure against its limit, else the beginning of its words.
func (u *UI) stampText(c desk.Check, room float64) string {
	st := u.look.Caption()
	text := u.checkText(c)
	if u.bench.Fonts.Width(text, st.Size, false) <= room {
		return text
	}
	if c.Value != 0 && c.Limit != 0 {
		figures := strings.TrimSpace(desk.Significant(c.Value, 3) + ", limit " + desk.Significant(c.Limit, 3) + " " + unitText(c.Unit))
		if u.bench.Fonts.Width(figures, st.Size, false) <= room {
			return figures
		}
	}
	return u.bench.Fit(text, room, st)
}

func verdictWord(v string) string {
	switch v {
	case desk.Holds:
		return "holds"
	case desk.Short:
		return "falls short"
	}
	return "not decided"
}

// checkText is a check in words.
func (u *UI) checkText(c desk.Check) string {
	if c.Text != "" {
		return c.Text
	}
	return desk.Significant(c.Value, 4) + " against " + desk.Significant(c.Limit, 4) + " " + unitText(c.Unit)
}

// drawing draws side view and section next to each other, the section only
// where there is room for both.
func (u *UI) drawing(view drafting.Rect) {
	side, section := view, drafting.Rect{}
	width := math.Min(view.W()*0.46, 400*u.look.Text)
	left, right := u.sideMargins(view.H())
	if view.W()-width >= left+right+64 && u.sectionFits(view.H(), width) {
		section, side = view.CutRight(width)
	}
	u.room, u.place = side, "side "
	u.sideView(side, !section.Empty())
	if !section.Empty() {
		u.room, u.place = section, "section "
		u.detailView(section)
	}
}
