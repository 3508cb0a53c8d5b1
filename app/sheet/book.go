package sheet

import (
	"fmt"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// bookSheet draws the log: state of the book, entries newest first, and the
// entry that is open with its working.
func (u *UI) bookSheet(area drafting.Rect) {
	b := &u.bench
	b.Frame(area, drafting.Bold, drafting.Line)
	in := area.Inset(drafting.Bold)
	v := u.s.Book
	if v.Fault != "" && len(v.Page) == 0 {
		b.Paragraph(in.Inset(2*touch.Unit), "There is no book: "+v.Fault, u.look.Plain())
		return
	}
	if wide(b.Area) {
		list, entry := in.CutLeft(in.W() * 0.42)
		b.Line(drafting.Pt{X: list.X1, Y: in.Y0}, drafting.Pt{X: list.X1, Y: in.Y1}, drafting.Bold, drafting.Line)
		u.bookList(list)
		if v.Open != nil {
			u.entry(entry, *v.Open)
		} else {
			if len(v.Page) > 0 && !u.opened {
				u.emit(desk.OpenEntry{Number: v.Page[0].Number}) // there is room for one beside the list
			}
			u.opened = true
			b.Paragraph(entry.Inset(2*touch.Unit), "Touch an entry to see its plan, its figures and their working.", u.look.Plain())
		}
		return
	}
	if v.Open != nil {
		u.entry(in, *v.Open)
		return
	}
	u.bookList(in)
}

// bookList draws the state of the book and a page of entries.
func (u *UI) bookList(r drafting.Rect) {
	b := &u.bench
	v := u.s.Book
	in := r.Inset(touch.Unit)
	side := b.Fonts.Width("Verify", u.look.Body(), true) + 4*touch.Unit
	top, rest := in.CutTop(max(u.look.Target, u.verdictHeight(in.W()-side)))
	verify, words := top.CutRight(side)
	b.Button(touch.Button{Box: verify, Label: "Verify", Do: u.do(desk.VerifyBook{})})
	u.verdict(words)
	_, rest = rest.CutTop(touch.Unit)
	foot, list := rest.CutBottom(u.look.Target)
	turn := foot.Columns(2, touch.Unit)
	last := uint64(0)
	if n := len(v.Page); n > 0 {
		last = v.Page[n-1].Number
	}
	b.Button(touch.Button{Box: turn[0], Label: "Newer", Off: v.Before == 0, Do: u.do(desk.Newer{})})
	b.Button(touch.Button{Box: turn[1], Label: "Older", Off: last <= 1, Do: u.do(desk.Older{})})
	list, _ = list.CutTop(list.H() - touch.Unit)
	u.entries(list)
}

// verdictText says how many entries there are and whether they verified.
func (u *UI) verdictText() (count, state string) {
	v := u.s.Book
	count = fmt.Sprintf("%d entries", v.Count)
	if v.Count == 1 {
		count = "1 entry"
	}
	switch d := v.Verdict; {
	case d == nil:
		return count, "not verified in this session"
	case d.Holds():
		return count, fmt.Sprintf("all %d hold, verified %s", d.Entries, d.At.Format("15:04:05"))
	default:
		return count, fmt.Sprintf("%d faults: %s", len(d.Faults), d.Faults[0])
	}
}

// verdictMark is the room of the verdict's symbol.
func (u *UI) verdictMark() float64 {
	if u.s.Book.Verdict == nil {
		return 0
	}
	return 36
}

func (u *UI) verdictHeight(width float64) float64 {
	count, state := u.verdictText()
	width -= u.verdictMark() + touch.Unit
	return u.bench.Height(width, count, u.look.Strong()) + u.bench.Height(width, state, u.look.Caption())
}

func (u *UI) verdict(r drafting.Rect) {
	b := &u.bench
	count, state := u.verdictText()
	b.Words(r, count+", "+state)
	h := u.verdictHeight(r.W())
	mark, words := r.CutLeft(u.verdictMark())
	if d := u.s.Book.Verdict; d != nil && d.Holds() {
		b.Check(mark.Mid(), 22, drafting.Line)
	} else if d != nil {
		b.Warning(mark.Mid(), 24, drafting.Rope)
	}
	y := words.Mid().Y - h/2
	words.X1 -= touch.Unit
	words.Y0 = y + b.Paragraph(drafting.Rect{X0: words.X0, Y0: y, X1: words.X1, Y1: r.Y1}, count, u.look.Strong())
	b.Paragraph(words, state, u.look.Caption())
}

func (u *UI) entries(r drafting.Rect) {
	b := &u.bench
	page := u.s.Book.Page
	if len(page) == 0 {
		b.Paragraph(r, "No entry yet. A shot that is logged on the Shot sheet stands here, and nothing is ever changed or deleted.", u.look.Plain())
		return
	}
	heights := make([]float64, len(page))
	full := 0.0
	for i, e := range page {
		heights[i] = u.rowHeight(r.W()-u.look.Target, e) + 4
		full += heights[i]
	}
	b.Scroll("Entries", r, full, func(in drafting.Rect) {
		y := in.Y0
		for i, e := range page {
			box := drafting.Rect{X0: in.X0, Y0: y, X1: in.X1, Y1: y + heights[i] - 4}
			y += heights[i]
			if box.Y1 >= r.Y0 && box.Y0 <= r.Y1 {
				u.entryRow(box, e)
			}
		}
	})
}

// numberRoom is the width that an entry's number takes at the left of its row.
func (u *UI) numberRoom(e desk.Entry) float64 {
	w := u.bench.Fonts.Width(fmt.Sprint(e.Number), u.look.Body(), true)
	return max(w, u.bench.Fonts.Width("000", u.look.Body(), true)) + 2.5*touch.Unit
}

// rowTexts are the lines of an entry in the list.
func (u *UI) rowTexts(e desk.Entry) [3]piece {
	return [3]piece{
		{text: e.Title, style: u.look.Strong()},
		{text: e.At.Format("2006-01-02 15:04") + ", " + e.By, style: u.look.Caption()},
		{text: "given " + desk.Clock(e.GivenSeconds) + ", planned " + plannedText(e), style: u.look.Caption()},
	}
}

// plannedText is the exposure as planned in one line.
func plannedText(e desk.Entry) string {
	x := e.Then
	switch {
	case x.Seconds == 0:
		return e.Planned
	case x.GBqMin > 0:
		return desk.Clock(x.Seconds) + ", " + desk.Significant(x.GBqMin, 3) + " GBq min"
	case x.MAMin > 0:
		return desk.Clock(x.Seconds) + ", " + desk.Significant(x.MAMin, 3) + " mA min"
	}
	return desk.Clock(x.Seconds)
}

func (u *UI) rowHeight(width float64, e desk.Entry) float64 {
	h := float64(touch.Unit)
	for _, t := range u.rowTexts(e) {
		h += u.bench.Height(width-u.numberRoom(e)-touch.Unit, t.text, t.style)
	}
	return max(u.look.Target, h)
}

func (u *UI) entryRow(r drafting.Rect, e desk.Entry) {
	b := &u.bench
	open := u.s.Book.Open != nil && u.s.Book.Open.Number == e.Number
	label, key := fmt.Sprintf("Entry %d, %s", e.Number, e.Title), fmt.Sprintf("entry %d", e.Number)
	switch {
	case open || b.Pressed(key):
		b.Fill(drafting.Box(r), drafting.BeamWash)
		b.Frame(r, drafting.Bold, drafting.Line)
	default:
		b.Fill(drafting.Box(r), drafting.Block)
		b.Line(drafting.Pt{X: r.X0, Y: r.Y1}, drafting.Pt{X: r.X1, Y: r.Y1}, drafting.Hair, drafting.Faint)
	}
	room := u.numberRoom(e)
	end := u.look.Strong()
	end.Align = drafting.End
	b.Text(drafting.Pt{X: r.X0 + room - 1.5*touch.Unit, Y: r.Y0 + touch.Unit/2 + drafting.Ascent*end.Size}, fmt.Sprint(e.Number), end)
	in := drafting.Rect{X0: r.X0 + room, Y0: r.Y0 + touch.Unit/2, X1: r.X1 - touch.Unit, Y1: r.Y1}
	for _, t := range u.rowTexts(e) {
		in.Y0 += b.Paragraph(in, t.text, t.style)
	}
	b.Target(r, key, label, u.do(desk.OpenEntry{Number: e.Number}))
	b.Ring(key, r)
}
