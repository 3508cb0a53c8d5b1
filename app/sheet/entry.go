package sheet

import (
	"fmt"
	"strconv"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// entry draws the opened entry: what it holds, whether today's engine agrees,
// and the working behind its numbers.
func (u *UI) entry(r drafting.Rect, e desk.Entry) {
	b := &u.bench
	in := r.Inset(touch.Unit)
	shut, head := in.CutRight(u.look.Target)
	shut.Y1 = shut.Y0 + u.look.Target
	b.Button(touch.Button{Box: shut, Label: "Close entry", Symbol: b.Cross, Do: u.do(desk.OpenEntry{})})
	title := fmt.Sprintf("Entry %d: %s", e.Number, e.Title)
	head.X1 -= touch.Unit
	h := max(u.look.Target, b.Height(head.W(), title, u.look.Strong())+touch.Unit)
	b.Paragraph(drafting.Rect{X0: head.X0, Y0: head.Y0 + touch.Unit, X1: head.X1, Y1: head.Y1}, title, u.look.Strong())
	_, rest := in.CutTop(h)
	foot, body := rest.CutBottom(u.look.Target)
	cells := foot.Columns(2, touch.Unit)
	b.Button(touch.Button{Box: cells[0], Label: "Recompute", Do: u.do(desk.Recompute{})})
	b.Button(touch.Button{Box: cells[1], Label: "Use this plan", Do: u.do(desk.PlanFromEntry{})})
	body.Y1 -= touch.Unit
	u.entryBody(body, e)
}

// piece is a run of text in the entry's body.
type piece struct {
	text  string
	style drafting.Style
	gap   float64
}

func (u *UI) entryBody(r drafting.Rect, e desk.Entry) {
	b := &u.bench
	width := r.W() - u.look.Target - touch.Unit
	pieces := u.entryPieces(e)
	height := 0.0
	for _, p := range pieces {
		height += b.Height(width, p.text, p.style) + p.gap
	}
	again := u.s.Book.Again
	if again != nil {
		for _, s := range again.Working {
			height += u.step1(drafting.Rect{X1: width}, s, false)
		}
	}
	b.Scroll("Entry", r, height, func(in drafting.Rect) {
		y := in.Y0
		for _, p := range pieces {
			box := drafting.Rect{X0: in.X0, Y0: y, X1: in.X0 + width, Y1: in.Y1}
			hh := b.Paragraph(box, p.text, p.style)
			b.Words(drafting.Rect{X0: box.X0, Y0: y, X1: box.X1, Y1: y + hh}, p.text)
			y += hh + p.gap
		}
		if again != nil {
			for _, s := range again.Working {
				y += u.step1(drafting.Rect{X0: in.X0, Y0: y, X1: in.X0 + width, Y1: in.Y1}, s, true)
			}
		}
	})
}

func (u *UI) entryPieces(e desk.Entry) []piece {
	plain, strong, small := u.look.Plain(), u.look.Strong(), u.look.Caption()
	local := e.At.Format("2006-01-02 15:04:05 -07:00")
	out := []piece{
		{"Logged " + local + " by " + e.By, plain, 0},
		{"Given " + desk.Clock(e.GivenSeconds) + "; planned " + plannedText(e), plain, 0},
	}
	if e.Note != "" {
		out = append(out, piece{"Note: " + e.Note, plain, 0})
	}
	var figures []string
	for _, f := range e.Figures {
		figures = append(figures, figureText(f))
	}
	if len(figures) > 0 {
		out = append(out, piece{strings.Join(figures, "\n"), plain, touch.Unit})
	}
	if e.Engine != "" {
		out = append(out, piece{"Reckoned by engine " + e.Engine, small, 0})
	}
	out = append(out, piece{"Hash " + spaced(e.Hash), small, touch.Unit})
	if a := u.s.Book.Again; a != nil && a.Number == e.Number {
		out = append(out, u.againPieces(*a, plain, strong)...)
	}
	return out
}

// figureText is a figure of an entry rounded for reading; the exact text is in
// the record.
func figureText(f desk.Figure) string {
	value := f.Value
	if v, err := strconv.ParseFloat(value, 64); err == nil {
		if f.Unit == "m" { // a rope: rounded outward
			return capital(f.Name) + ": " + desk.SI.Outward(v) + " / " + desk.Customary.Outward(v)
		}
		value = desk.Significant(v, 4)
	}
	return strings.TrimSpace(capital(f.Name) + ": " + value + " " + unitText(f.Unit))
}

// againPieces say whether today's engine agrees with the entry.
func (u *UI) againPieces(a desk.Again, plain, strong drafting.Style) []piece {
	if a.Fault != "" {
		return []piece{{"Today's engine refuses the entry's plan: " + a.Fault, strong, touch.Unit}}
	}
	if a.Agrees() {
		return []piece{{"Recomputed today: every figure agrees within 1e-9.", strong, touch.Unit}, {"Working", strong, 0}}
	}
	out := []piece{{"Recomputed today: figures differ.", strong, 0}}
	for _, r := range a.Rows {
		if !r.Agrees {
			out = append(out, piece{fmt.Sprintf("%s: then %s, today %s %s", r.Name, desk.Significant(r.Then, 6), desk.Significant(r.Today, 6), r.Unit), plain, 0})
		}
	}
	return append(out, piece{"Working, as reckoned today", strong, 0})
}

// spaced parts a hash into groups of eight so that it wraps and can be read out.
func spaced(hash string) string {
	var b strings.Builder
	for i, r := range hash {
		if i > 0 && i%8 == 0 {
			b.WriteByte(' ')
		}
		b.WriteRune(r)
	}
	return b.String()
}
