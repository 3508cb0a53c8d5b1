package sheet

import (
	"image"

	"gioui.org/font"
	"gioui.org/io/semantic"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/op/clip"
	"gioui.org/op/paint"
	"gioui.org/unit"
	"gioui.org/widget"

	"halfvalue/app/drafting"
	"halfvalue/app/touch"
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
