package sheet

import (
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
	"halfvalue/exposure/working"
)

// heading writes a panel's name and returns what is left below it.
func (u *UI) heading(r drafting.Rect, text string) drafting.Rect {
	h := u.bench.Paragraph(r, text, u.look.Strong())
	_, rest := r.CutTop(h + touch.Unit)
	return rest
}

// workingPanel lists the steps behind every number, or behind those whose
// names begin as the panel says.
func (u *UI) workingPanel(r drafting.Rect) {
	title, steps := "Working", u.s.Answer.Working
	if of := u.s.Panel.Field; of != "" {
		title, steps = "Working of the "+of, nil
		for _, s := range u.s.Answer.Working {
			if strings.HasPrefix(s.ID, of+".") {
				steps = append(steps, s)
			}
		}
	}
	r = u.heading(r, title)
	preface := ""
	if u.s.Panel.Field == "" {
		preface = u.spreadText()
	}
	u.steps("Working steps", r, preface, steps)
}

// spreadText names what the spread of the time comes from, largest first.
func (u *UI) spreadText() string {
	var parts []string
	for _, s := range u.s.Answer.Spread {
		parts = append(parts, s.Name+" "+desk.Significant(100*s.Relative, 2)+" %")
	}
	if len(parts) == 0 {
		return ""
	}
	return "Spread of the time, one standard deviation each: " + strings.Join(parts[:min(4, len(parts))], ", ")
}

// steps lists steps under a preface, scrolling.
func (u *UI) steps(key string, r drafting.Rect, preface string, steps []working.Step) {
	b := &u.bench
	if len(steps) == 0 {
		b.Paragraph(r, "there is no working without an answer", u.look.Plain())
		return
	}
	width := r.W() - u.look.Target - touch.Unit
	height := 0.0
	if preface != "" {
		height = b.Height(width, preface, u.look.Caption()) + touch.Unit
	}
	head := height
	for _, s := range steps {
		height += u.step1(drafting.Rect{X1: width}, s, false)
	}
	b.Scroll(key, r, height, func(in drafting.Rect) {
		y := in.Y0
		if preface != "" {
			b.Paragraph(drafting.Rect{X0: in.X0, Y0: y, X1: in.X0 + width, Y1: in.Y1}, preface, u.look.Caption())
			y += head
		}
		for _, s := range steps {
			y += u.step1(drafting.Rect{X0: in.X0, Y0: y, X1: in.X0 + width, Y1: in.Y1}, s, true)
		}
	})
}

// step1 writes one step of a working, or only measures it.
func (u *UI) step1(r drafting.Rect, s working.Step, draw bool) float64 {
	b := &u.bench
	y := r.Y0
	put := func(text string, st drafting.Style) {
		if text == "" {
			return
		}
		box := drafting.Rect{X0: r.X0, Y0: y, X1: r.X1, Y1: y}
		if draw {
			b.Paragraph(box, text, st)
		}
		y += b.Height(r.W(), text, st)
	}
	put(s.Name+":  "+s.Symbol+" = "+strings.TrimSpace(desk.Significant(s.Value, 5)+" "+unitText(s.Unit)), u.look.Strong())
	put(s.Formula, u.look.Plain())
	put(inputsText(s.Inputs), u.look.Caption())
	put(sourceText(s), u.look.Caption())
	if draw {
		b.Words(drafting.Rect{X0: r.X0, Y0: r.Y0, X1: r.X1, Y1: y}, s.Name)
		b.Line(drafting.Pt{X: r.X0, Y: y + 4}, drafting.Pt{X: r.X1, Y: y + 4}, drafting.Hair, drafting.Ghost)
	}
	return y - r.Y0 + touch.Unit
}

func inputsText(inputs []working.Input) string {
	parts := make([]string, 0, len(inputs))
	for _, i := range inputs {
		v := i.Text
		if v == "" {
			v = desk.Significant(i.Value, 5)
		}
		parts = append(parts, strings.TrimSpace(i.Symbol+" = "+v+" "+unitText(i.Unit)))
	}
	return strings.Join(parts, ",  ")
}

// unitText writes a unit as people read it.
func unitText(unit string) string {
	if unit == "1" {
		return ""
	}
	return strings.NewReplacer("uSv", "µSv", "uGy", "µGy", "um", "µm", "cm2", "cm²", "cm3", "cm³").Replace(unit)
}

func sourceText(s working.Step) string {
	out := ""
	if s.Source != "" {
		out = "Source: " + s.Source
	}
	if s.Note != "" {
		if out != "" {
			out += ". "
		}
		out += s.Note
	}
	return out
}
