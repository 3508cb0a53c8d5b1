package sheet

import (
	"fmt"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

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
