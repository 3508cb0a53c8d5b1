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
	top, rest := in.CutTop(u.look.Target)
	verify, words := top.CutRight(110 * u.look.Text)
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

// verdict says how many entries there are and whether they verified.
func (u *UI) verdict(r drafting.Rect) {
	b := &u.bench
	v := u.s.Book
	text := fmt.Sprintf("%d entries", v.Count)
	if v.Count == 1 {
		text = "1 entry"
	}
	state := "not verified in this session"
	if d := v.Verdict; d != nil {
		state = fmt.Sprintf("all %d hold, verified %s", d.Entries, d.At.Format("15:04:05"))
		if !d.Holds() {
			state = fmt.Sprintf("%d faults: %s", len(d.Faults), d.Faults[0])
		}
		c := drafting.Pt{X: r.X0 + 14, Y: r.Mid().Y}
		if d.Holds() {
			b.Check(c, 22, drafting.Line)
		} else {
			b.Warning(c, 24, drafting.Rope)
		}
		_, r = r.CutLeft(36)
	}
	h := b.Height(r.W()-touch.Unit, state, u.look.Caption())
	y := r.Mid().Y - (u.look.Body()*1.3+h)/2
	b.Paragraph(drafting.Rect{X0: r.X0, Y0: y, X1: r.X1, Y1: r.Y1}, text, u.look.Strong())
	b.Paragraph(drafting.Rect{X0: r.X0, Y0: y + u.look.Body()*1.3, X1: r.X1 - touch.Unit, Y1: r.Y1}, state, u.look.Caption())
	b.Words(r, text+", "+state)
}

func (u *UI) entries(r drafting.Rect) {
	b := &u.bench
	page := u.s.Book.Page
	if len(page) == 0 {
		b.Paragraph(r, "No entry yet. A shot that is logged on the Shot sheet stands here, and nothing is ever changed or deleted.", u.look.Plain())
		return
	}
	row := max(u.look.Target, u.look.Body()*1.3+u.look.Small()*1.3*2+touch.Unit)
	b.Scroll("Entries", r, float64(len(page))*(row+4), func(in drafting.Rect) {
		for i, e := range page {
			y := in.Y0 + float64(i)*(row+4)
			box := drafting.Rect{X0: in.X0, Y0: y, X1: in.X1, Y1: y + row}
			if box.Y1 < r.Y0 || box.Y0 > r.Y1 {
				continue
			}
			u.entryRow(box, e)
		}
	})
}

func (u *UI) entryRow(r drafting.Rect, e desk.Entry) {
	b := &u.bench
	open := u.s.Book.Open != nil && u.s.Book.Open.Number == e.Number
	label := fmt.Sprintf("Entry %d, %s", e.Number, e.Title)
	ink := drafting.Line
	switch {
	case open || b.Pressed(label):
		b.Fill(drafting.Box(r), drafting.BeamWash)
		b.Frame(r, drafting.Bold, drafting.Line)
	default:
		b.Fill(drafting.Box(r), drafting.Block)
		b.Line(drafting.Pt{X: r.X0, Y: r.Y1}, drafting.Pt{X: r.X1, Y: r.Y1}, drafting.Hair, drafting.Faint)
	}
	number := fmt.Sprint(e.Number)
	strong, cap := u.look.Strong(), u.look.Caption()
	strong.Ink = ink
	wide := max(b.Fonts.Width("0000", strong.Size, true), b.Fonts.Width(number, strong.Size, true))
	x := r.X0 + touch.Unit
	y := r.Y0 + touch.Unit/2 + drafting.Ascent*strong.Size
	end := strong
	end.Align = drafting.End
	b.Text(drafting.Pt{X: x + wide, Y: y}, number, end)
	left := x + wide + touch.Unit*1.5
	width := r.X1 - touch.Unit - left
	b.Text(drafting.Pt{X: left, Y: y}, b.Fit(e.Title, width, strong), strong)
	y += u.look.Small() * 1.3
	b.Text(drafting.Pt{X: left, Y: y}, b.Fit(e.At.Format("2006-01-02 15:04")+"  "+e.By, width, cap), cap)
	y += u.look.Small() * 1.3
	b.Text(drafting.Pt{X: left, Y: y}, b.Fit("given "+desk.Clock(e.GivenSeconds)+", planned "+e.Planned, width, cap), cap)
	b.Target(r, label, u.do(desk.OpenEntry{Number: e.Number}))
	b.Ring(label, r)
}
