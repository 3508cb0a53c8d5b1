package sheet

import (
	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// openCheck is the check whose panel is open.
func (u *UI) openCheck() (desk.Check, bool) {
	for _, c := range u.s.Answer.Checks {
		if c.ID == u.s.Panel.Field {
			return c, true
		}
	}
	return desk.Check{}, false
}

func (u *UI) checkHeight(width float64) float64 {
	b := &u.bench
	c, _ := u.openCheck()
	h := u.bench.Height(width, checkTitle(c), u.look.Strong()) + b.Height(width-u.look.Target, u.checkBody(c), u.look.Plain()) + 2*touch.Unit
	if c.Mend != nil {
		h += b.ButtonHeight(mendText(c), width) + touch.Unit
	}
	return h
}

func checkTitle(c desk.Check) string { return capital(c.Name) + ": " + verdictWord(c.Verdict) }

func mendText(c desk.Check) string { return capital(c.Mend.Text) + ": take it" }

func (u *UI) checkBody(c desk.Check) string {
	if c.Source == "" {
		return u.checkText(c)
	}
	return u.checkText(c) + "\nSource: " + c.Source
}

// checkPanel shows one check: verdict, figures, source and the mend.
func (u *UI) checkPanel(r drafting.Rect) {
	b := &u.bench
	c, ok := u.openCheck()
	if !ok {
		return
	}
	r = u.heading(r, checkTitle(c))
	if c.Mend != nil {
		row, rest := r.CutBottom(b.ButtonHeight(mendText(c), r.W()))
		b.Button(touch.Button{Box: row, Label: "Take the mend", Text: mendText(c), Strong: true, Do: u.do(desk.TakeMend{Check: c.ID})})
		r = rest
		r.Y1 -= touch.Unit
	}
	text := u.checkBody(c)
	b.Scroll("Check", r, b.Height(r.W()-u.look.Target, text, u.look.Plain()), func(in drafting.Rect) {
		in.X1 = r.X1 - u.look.Target
		b.Paragraph(in, text, u.look.Plain())
		b.Words(in, text)
	})
}
