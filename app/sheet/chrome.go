package sheet

import (
	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// Caution is what stands on every sheet.
const Caution = "Results are an aid. Site radiation rules, the licence and licensed supervision govern."

// FogCaution is added in safelight.
const FogCaution = "A lit screen fogs unprocessed film."

// tab is one field of the bar that a thumb reaches.
type tab struct {
	label, text string
	symbol      func(drafting.Pt, float64, drafting.Ink)
	do          func()
	selected    bool
	off         bool
}

func (u *UI) tabList() []tab {
	b := &u.bench
	back := func(mirrored bool) func(drafting.Pt, float64, drafting.Ink) {
		return func(c drafting.Pt, side float64, ink drafting.Ink) { b.Back(c, side, mirrored, ink) }
	}
	list := []tab{
		{label: "Look", text: "Look", symbol: u.lamp, do: u.toggle(desk.Panel{Kind: desk.LookPanel}), selected: u.s.Panel.Kind == desk.LookPanel},
		{label: "Undo", text: "Undo", symbol: back(false), do: u.do(desk.Undo{}), off: u.s.UndoName == ""},
		{label: "Redo", text: "Redo", symbol: back(true), do: u.do(desk.Redo{}), off: u.s.RedoName == ""},
	}
	for _, s := range desk.Sheets() {
		list = append(list, tab{label: string(s), text: string(s), symbol: u.sheetSymbol(s), do: u.do(desk.GoTo{Sheet: s}), selected: u.s.Sheet == s && u.s.Panel.Kind != desk.LookPanel})
	}
	return list
}

// toggle opens a panel, or closes it if it is open.
func (u *UI) toggle(p desk.Panel) func() {
	if u.s.Panel == p {
		return u.do(desk.Close{})
	}
	return u.do(desk.Show{Panel: p})
}

// tabs draws the bar: at the right in landscape, below in portrait, where the
// thumb is. It returns what is left.
func (u *UI) tabs(area drafting.Rect) drafting.Rect {
	b := &u.bench
	list := u.tabList()
	side := max(u.look.Target+8, u.look.Small()*2.4+40)
	var bar, rest drafting.Rect
	var cells []drafting.Rect
	if wide(area) {
		bar, rest = area.CutRight(max(side+8, u.look.Small()*3.6))
		_, bar = bar.CutLeft(touch.Unit)
		cells = stackUp(bar, len(list), min(side, (bar.H()-4*float64(len(list)-1))/float64(len(list))))
	} else {
		bar, rest = area.CutBottom(side + touch.Unit)
		_, bar = bar.CutTop(touch.Unit)
		cells = bar.Columns(len(list), 4)
	}
	for i, t := range list {
		b.Button(touch.Button{Box: cells[i], Label: t.label, Text: t.text, Symbol: t.symbol, Do: t.do, Selected: t.selected, Off: t.off})
	}
	return rest
}

// stackUp puts the first cell at the top and the others at the foot of a bar.
func stackUp(bar drafting.Rect, n int, side float64) []drafting.Rect {
	out := make([]drafting.Rect, n)
	out[0] = drafting.Rect{X0: bar.X0, Y0: bar.Y0, X1: bar.X1, Y1: bar.Y0 + side}
	for i := 1; i < n; i++ {
		y := bar.Y1 - float64(n-i)*(side+4) + 4
		out[i] = drafting.Rect{X0: bar.X0, Y0: y, X1: bar.X1, Y1: y + side}
	}
	return out
}

func (u *UI) lamp(c drafting.Pt, side float64, ink drafting.Ink) {
	b, h := &u.bench, side/2
	b.Stroke(drafting.Circle(c, h*0.5), drafting.Medium, ink)
	b.Fill(drafting.Poly(true, drafting.Pt{X: c.X, Y: c.Y - h*0.5}, drafting.Pt{X: c.X + h*0.36, Y: c.Y - h*0.36}, drafting.Pt{X: c.X + h*0.5, Y: c.Y}, drafting.Pt{X: c.X + h*0.36, Y: c.Y + h*0.36}, drafting.Pt{X: c.X, Y: c.Y + h*0.5}), ink)
	for i := range 8 {
		a := float64(i) * 0.7853981634
		b.Line(c.Polar(h*0.72, a), c.Polar(h*0.98, a), drafting.Medium, ink)
	}
}

func (u *UI) sheetSymbol(s desk.Sheet) func(drafting.Pt, float64, drafting.Ink) {
	b := &u.bench
	if s == desk.BookSheet {
		return func(c drafting.Pt, side float64, ink drafting.Ink) {
			h := side / 2
			b.Frame(drafting.Rect{X0: c.X - h*0.8, Y0: c.Y - h, X1: c.X + h*0.8, Y1: c.Y + h}, drafting.Medium, ink)
			for _, y := range []float64{-0.4, 0, 0.4} {
				b.Line(drafting.Pt{X: c.X - h*0.45, Y: c.Y + y*h}, drafting.Pt{X: c.X + h*0.45, Y: c.Y + y*h}, drafting.Medium, ink)
			}
		}
	}
	return func(c drafting.Pt, side float64, ink drafting.Ink) {
		h := side / 2
		b.Fill(drafting.Circle(drafting.Pt{X: c.X, Y: c.Y - h*0.8}, h*0.22), ink)
		b.Stroke(drafting.Poly(false, drafting.Pt{X: c.X - h*0.7, Y: c.Y + h*0.5}, drafting.Pt{X: c.X, Y: c.Y - h*0.8}, drafting.Pt{X: c.X + h*0.7, Y: c.Y + h*0.5}), drafting.Medium, ink)
		b.Line(drafting.Pt{X: c.X - h, Y: c.Y + h*0.9}, drafting.Pt{X: c.X + h, Y: c.Y + h*0.9}, drafting.Bold, ink)
	}
}

// caution draws the caution along the foot of the sheet.
func (u *UI) caution(area drafting.Rect) drafting.Rect {
	b := &u.bench
	text := Caution
	if u.s.Light == desk.Safelight {
		text += " " + FogCaution
	}
	st := drafting.Style{Size: u.look.Small(), Bold: true, Ink: drafting.Line}
	icon := u.look.Small() * 1.6
	width := area.W() - icon - 2*touch.Unit
	h := b.Height(width, text, st)
	line, rest := area.CutBottom(h + touch.Unit)
	_, words := line.CutLeft(icon + touch.Unit)
	b.Warning(drafting.Pt{X: line.X0 + icon/2 + 2, Y: line.Y0 + touch.Unit + u.look.Small()*0.62}, icon, drafting.Line)
	b.Paragraph(drafting.Rect{X0: words.X0, Y0: words.Y0 + touch.Unit, X1: words.X0 + width, Y1: words.Y1}, text, st)
	b.Words(line, "Caution: "+text)
	return rest
}

// notices states what was refused or done, above the sheet, until it is
// dismissed or the next change is accepted.
func (u *UI) notices(area drafting.Rect) drafting.Rect {
	if r := u.s.Refusal; r != nil {
		return u.notice(area, "Not changed: "+r.Error(), true)
	}
	if u.s.SaveErr != "" {
		return u.notice(area, u.s.SaveErr, true)
	}
	if u.s.Notice != "" {
		return u.notice(area, u.s.Notice, false)
	}
	return area
}

func (u *UI) notice(area drafting.Rect, text string, fault bool) drafting.Rect {
	b := &u.bench
	st := u.look.Plain()
	if u.look.Text > 1.3 {
		st.Size = u.look.Small()
	}
	width := area.W() - u.look.Target - 3*touch.Unit
	icon := 0.0
	if fault {
		icon = u.look.Body() * 2
	}
	h := max(u.look.Target, b.Height(width-icon, text, st)+touch.Unit)
	box, rest := area.CutTop(h)
	_, rest = rest.CutTop(touch.Unit)
	if fault {
		b.Fill(drafting.Box(box), drafting.RopeWash)
		b.Frame(box, drafting.Bold, drafting.Rope)
		b.Warning(drafting.Pt{X: box.X0 + touch.Unit + icon/2, Y: box.Mid().Y}, u.look.Body()*1.4, drafting.Rope)
	} else {
		b.Fill(drafting.Box(box), drafting.Block)
		b.Frame(box, drafting.Thin, drafting.Line)
	}
	lines := b.Height(width-icon, text, st)
	b.Paragraph(drafting.Rect{X0: box.X0 + touch.Unit + icon, Y0: box.Mid().Y - lines/2, X1: box.X0 + touch.Unit + width, Y1: box.Y1}, text, st)
	b.Words(box, text)
	shut, _ := box.CutRight(u.look.Target)
	b.Button(touch.Button{Box: shut, Label: "Dismiss", Symbol: b.Cross, Bare: true, Do: u.do(desk.Dismiss{})})
	return rest
}
