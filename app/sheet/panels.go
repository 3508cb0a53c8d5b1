package sheet

import (
	"fmt"
	"image"
	"math"
	"strings"

	"gioui.org/font"
	"gioui.org/io/semantic"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/op/clip"
	"gioui.org/op/paint"
	"gioui.org/unit"
	"gioui.org/widget"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
	"halfvalue/exposure/working"
)

// textField is a real text field laid out over the drawing.
type textField struct {
	box    drafting.Rect
	label  string
	editor *widget.Editor
}

// fieldAt draws a text field's frame and remembers to lay it out.
func (u *UI) fieldAt(box drafting.Rect, label string, e *widget.Editor) {
	b := &u.bench
	b.Fill(drafting.Box(box), drafting.Sheet)
	b.Frame(box, drafting.Medium, drafting.Line)
	if e.Len() == 0 && !b.Gtx.Focused(e) {
		b.TextIn(box.Inset(touch.Unit), label, drafting.Style{Size: u.look.Body(), Ink: drafting.Faint})
	}
	u.fields = append(u.fields, textField{box, label, e})
}

func (u *UI) layoutField(gtx layout.Context, f textField) {
	s := float64(gtx.Metric.PxPerDp)
	in := f.box.Inset(touch.Unit)
	r := image.Rect(int(in.X0*s), int(in.Y0*s), int(in.X1*s), int(in.Y1*s))
	defer op.Offset(r.Min).Push(gtx.Ops).Pop()
	size := r.Size()
	defer clip.Rect{Max: size}.Push(gtx.Ops).Pop()
	semantic.DescriptionOp(f.label).Add(gtx.Ops)
	gtx.Constraints = layout.Exact(size)
	drop := max(0, (size.Y-int(u.look.Body()*1.35*s))/2)
	defer op.Offset(image.Pt(0, drop)).Push(gtx.Ops).Pop()
	f.editor.Layout(gtx, u.look.Shaper, font.Font{Typeface: "Go"}, unit.Sp(float32(u.look.Body())*gtx.Metric.PxPerDp/gtx.Metric.PxPerSp), u.material(gtx, drafting.Line), u.material(gtx, drafting.BeamWash))
}

func (u *UI) material(gtx layout.Context, ink drafting.Ink) op.CallOp {
	m := op.Record(gtx.Ops)
	paint.ColorOp{Color: touch.Colour(u.look.Palette[ink])}.Add(gtx.Ops)
	return m.Stop()
}

// heading writes a panel's name and returns what is left below it.
func (u *UI) heading(r drafting.Rect, text string) drafting.Rect {
	h := u.bench.Paragraph(r, text, u.look.Strong())
	_, rest := r.CutTop(h + touch.Unit)
	return rest
}

// searchFrom is the length of a list from which it can be narrowed by typing.
const searchFrom = 13

// choicePanel lists the options of a choice as buttons.
func (u *UI) choicePanel(r drafting.Rect) {
	c, ok := u.known.choices[u.s.Panel.Field]
	if !ok {
		return
	}
	options := c.Options
	if len(options) >= searchFrom {
		box, rest := r.CutTop(u.look.Target)
		u.fieldAt(box, "Search "+c.Name, &u.search)
		_, r = rest.CutTop(touch.Unit)
		options = narrow(options, u.search.Text())
	} else {
		r = u.heading(r, capital(c.Name))
	}
	u.optionGrid(u.layerButtons(r, c.Field), c, options)
}

// layerButtons add and take out layers where a layer's material is chosen.
func (u *UI) layerButtons(r drafting.Rect, field string) drafting.Rect {
	i := -1
	if n, err := fmt.Sscanf(field, "part.layers[%d].material", &i); n != 1 || err != nil {
		return r
	}
	row, rest := r.CutBottom(u.look.Target)
	cells := row.Columns(2, touch.Unit)
	u.bench.Button(touch.Button{Box: cells[0], Label: "Add a layer", Do: u.do(desk.AddLayer{After: i})})
	u.bench.Button(touch.Button{Box: cells[1], Label: "Take it out", Off: len(u.s.Plan.Part.Layers) < 2, Do: u.do(desk.DropLayer{Index: i})})
	rest.Y1 -= touch.Unit
	return rest
}

// narrow keeps the options whose title or note has every word.
func narrow(options []desk.Option, text string) []desk.Option {
	words := strings.Fields(strings.ToLower(text))
	var out []desk.Option
next:
	for _, o := range options {
		all := strings.ToLower(o.Title + " " + o.Note + " " + o.Value)
		for _, w := range words {
			if !strings.Contains(all, w) {
				continue next
			}
		}
		out = append(out, o)
	}
	return out
}

func (u *UI) optionGrid(r drafting.Rect, c desk.Choice, options []desk.Option) {
	b := &u.bench
	columns := max(1, int(r.W()/(230*u.look.Text)))
	width := (r.W() - u.look.Target - 4*float64(columns)) / float64(columns)
	height := u.look.Target
	for _, o := range options {
		height = math.Max(height, b.ButtonHeight(o.Title, width))
	}
	rows := (len(options) + columns - 1) / columns
	b.Scroll("Options", r, float64(rows)*(height+4), func(in drafting.Rect) {
		w := (in.W() - 4*float64(columns)) / float64(columns)
		for i, o := range options {
			x, y := in.X0+float64(i%columns)*(w+4), in.Y0+float64(i/columns)*(height+4)
			b.Button(touch.Button{Box: drafting.Rect{X0: x, Y0: y, X1: x + w, Y1: y + height}, Label: o.Title, Selected: o.Value == c.Value,
				Do: u.do(desk.Choose{Field: c.Field, To: o.Value})})
		}
		if len(options) == 0 {
			b.Paragraph(in, "nothing in the list has these words", u.look.Plain())
		}
	})
}

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

// lookRow is one thing of the look with the buttons to choose it.
type lookRow struct {
	name    string
	options []touch.Button
}

func (u *UI) lookRows() []lookRow {
	pick := func(label string, on bool, in desk.Intent) touch.Button {
		return touch.Button{Label: label, Selected: on, Do: u.do(in)}
	}
	rows := []lookRow{
		{"Light", []touch.Button{
			pick("Paper", u.s.Light == desk.Paper, desk.SetLight{To: desk.Paper}),
			pick("Slate", u.s.Light == desk.Slate, desk.SetLight{To: desk.Slate}),
			pick("Safelight", u.s.Light == desk.Safelight, desk.SetLight{To: desk.Safelight}),
		}},
		{"Units", []touch.Button{
			pick("mm, GBq", u.s.Units == desk.SI, desk.SetUnits{To: desk.SI}),
			pick("in, Ci", u.s.Units == desk.Customary, desk.SetUnits{To: desk.Customary}),
		}},
		{"Text", nil},
		{"Targets", []touch.Button{
			pick("Bare hands", !u.s.Gloves, desk.SetGloves{On: false}),
			pick("Gloves", u.s.Gloves, desk.SetGloves{On: true}),
		}},
	}
	for _, p := range []int{100, 130, 160, 200} {
		rows[2].options = append(rows[2].options, pick(fmt.Sprintf("%d %%", p), u.s.Text == p, desk.SetText{Percent: p}))
	}
	return rows
}

// lookEach is the height of one row of the look panel.
func (u *UI) lookEach() float64 { return u.look.Target + u.look.Small()*1.5 + touch.Unit }

func lookColumns(width float64) int {
	if width >= 680 {
		return 2
	}
	return 1
}

func (u *UI) lookHeight(width float64) float64 {
	return u.lookEach()*float64(4/lookColumns(width)) + 2*drafting.Bold + 1
}

// lookPanel chooses units, light, text size and gloves.
func (u *UI) lookPanel(r drafting.Rect) {
	rows := u.lookRows()
	n := lookColumns(r.W() + u.look.Target + 3*touch.Unit)
	each := u.lookEach()
	u.bench.Scroll("Look panel", r, each*float64(len(rows)/n), func(in drafting.Rect) {
		columns := in.Columns(n, 2*touch.Unit)
		for i, row := range rows {
			c := columns[i%n]
			u.lookRow(drafting.Rect{X0: c.X0, X1: c.X1, Y0: c.Y0 + float64(i/n)*each}, row)
		}
	})
}

func (u *UI) lookRow(r drafting.Rect, row lookRow) {
	b := &u.bench
	b.Text(drafting.Pt{X: r.X0, Y: r.Y0 + drafting.Ascent*u.look.Small()}, row.name, u.look.Caption())
	y := r.Y0 + u.look.Small()*1.5
	for k, box := range (drafting.Rect{X0: r.X0, Y0: y, X1: r.X1, Y1: y + u.look.Target}).Columns(len(row.options), touch.Unit) {
		o := row.options[k]
		o.Box = box
		b.Button(o)
	}
}

// logHeight is what the log panel needs.
func (u *UI) logHeight() float64 {
	return u.look.Body()*1.5 + 4*(u.look.Target+touch.Unit) + u.look.Small()*3 + touch.Unit
}

// logPanel asks who logs the shot and what was given.
func (u *UI) logPanel(r drafting.Rect) {
	r = u.heading(r, "Log this shot")
	row, small := u.look.Target+touch.Unit, u.look.Small()
	u.bench.Scroll("Log panel", r, 4*row+small*1.5, func(in drafting.Rect) {
		at := func(y float64) drafting.Rect {
			return drafting.Rect{X0: in.X0, Y0: in.Y0 + y, X1: in.X1, Y1: in.Y0 + y + u.look.Target}
		}
		u.peopleRow(at(0))
		u.fieldAt(at(row), "Another name", &u.name)
		u.bench.Text(drafting.Pt{X: in.X0, Y: in.Y0 + 2*row + drafting.Ascent*small}, "Time really given", u.look.Caption())
		u.givenStepper(at(2*row + small*1.5))
		by := u.logger()
		u.bench.Button(touch.Button{Box: at(3*row + small*1.5), Label: "Append to the book", Strong: true, Off: by == "", Do: func() {
			u.emit(desk.Log{By: by, GivenSeconds: u.given})
		}})
	})
}

// peopleRow offers who logged before.
func (u *UI) peopleRow(r drafting.Rect) {
	b := &u.bench
	people := u.s.People[:min(len(u.s.People), max(1, int(r.W()/(120*u.look.Text))))]
	if len(people) == 0 {
		b.TextIn(r, "Nobody has logged here yet", u.look.Caption())
		return
	}
	for i, box := range r.Columns(len(people), touch.Unit) {
		p := people[i]
		b.Button(touch.Button{Box: box, Label: "By " + p, Text: b.Fit(p, box.W()-2*touch.Unit, u.look.Strong()), Selected: u.who == p && u.name.Len() == 0,
			Do: func() { u.who = p; u.name.SetText("") }})
	}
}

// logger is who logs: what was typed, else who was chosen.
func (u *UI) logger() string {
	if t := strings.TrimSpace(u.name.Text()); t != "" {
		return t
	}
	return u.who
}

func (u *UI) givenStepper(r drafting.Rect) {
	b := &u.bench
	minus, rest := r.CutLeft(u.look.Target)
	plus, mid := rest.CutRight(u.look.Target)
	step := func(sign float64) {
		st := 1.0
		if u.given >= 600 {
			st = 10
		}
		u.given = math.Max(0, math.Min(86400, u.given+sign*st))
	}
	hold := func(sign float64) func(bool) {
		return func(repeat bool) {
			if repeat {
				step(sign)
			}
		}
	}
	b.Button(touch.Button{Box: minus, Label: "Less time given", Symbol: b.Minus, Do: func() { step(-1) }, Hold: hold(-1)})
	b.Button(touch.Button{Box: plus, Label: "More time given", Symbol: b.Plus, Do: func() { step(1) }, Hold: hold(1)})
	b.Frame(mid, drafting.Thin, drafting.Line)
	st := u.look.Strong()
	st.Align = drafting.Middle
	b.TextIn(mid, desk.Clock(u.given), st)
	b.Words(mid, "Time given, "+desk.Clock(u.given))
}
