// Package screen paints a drafting.Drawing with Gio. Upright and level lines
// and boxes are set to whole pixels, so they are crisp at any density; only
// slants and curves are smoothed.
package screen

import (
	"image"
	"image/color"
	"math"

	"gioui.org/f32"
	"gioui.org/font"
	"gioui.org/font/gofont"
	"gioui.org/op"
	"gioui.org/op/clip"
	"gioui.org/op/paint"
	"gioui.org/text"
	"golang.org/x/image/math/fixed"

	"halfvalue/app/drafting"
)

// NewShaper makes the shaper of the bundled Go fonts and no others, so that a
// picture is the same on every machine. One shaper serves one goroutine.
func NewShaper() *text.Shaper {
	return text.NewShaper(text.NoSystemFonts(), text.WithCollection(gofont.Collection()))
}

// Painter puts drawings on a Gio screen.
type Painter struct {
	Shaper  *text.Shaper
	Palette drafting.Palette
	PxPerDp float32
	glyphs  []text.Glyph
}

// Paint adds the drawing to ops.
func (p *Painter) Paint(ops *op.Ops, d *drafting.Drawing) {
	var clips []clip.Stack
	for i := range d.Items {
		switch it := &d.Items[i]; it.Kind {
		case drafting.StrokeItem:
			p.stroke(ops, it)
		case drafting.FillItem:
			p.fill(ops, it)
		case drafting.TextItem:
			p.text(ops, it)
		case drafting.ClipItem:
			clips = append(clips, p.shape(ops, &it.Path).Push(ops))
		case drafting.UnclipItem:
			clips[len(clips)-1].Pop()
			clips = clips[:len(clips)-1]
		}
	}
}

func (p *Painter) ink(k drafting.Ink) color.NRGBA {
	c := p.Palette[k]
	return color.NRGBA{R: c.R, G: c.G, B: c.B, A: 255}
}

func (p *Painter) px(v float64) int { return int(math.Round(v * float64(p.PxPerDp))) }

func (p *Painter) pt(q drafting.Pt) f32.Point {
	return f32.Pt(float32(q.X)*p.PxPerDp, float32(q.Y)*p.PxPerDp)
}

// box sets a rectangle to whole pixels.
func (p *Painter) box(r drafting.Rect) image.Rectangle {
	return image.Rect(p.px(r.X0), p.px(r.Y0), p.px(r.X1), p.px(r.Y1))
}

func (p *Painter) shape(ops *op.Ops, path *drafting.Path) clip.Op {
	if r, ok := path.AsBox(); ok {
		return clip.Rect(p.box(r)).Op()
	}
	return clip.Outline{Path: p.path(ops, path)}.Op()
}

func (p *Painter) path(ops *op.Ops, path *drafting.Path) clip.PathSpec {
	var out clip.Path
	out.Begin(ops)
	path.Walk(
		func(q drafting.Pt) { out.MoveTo(p.pt(q)) },
		func(q drafting.Pt) { out.LineTo(p.pt(q)) },
		func(a, b, q drafting.Pt) { out.CubeTo(p.pt(a), p.pt(b), p.pt(q)) },
		out.Close)
	return out.End()
}

func (p *Painter) fill(ops *op.Ops, it *drafting.Item) {
	paint.FillShape(ops, p.ink(it.Ink), p.shape(ops, &it.Path))
}

func (p *Painter) stroke(ops *op.Ops, it *drafting.Item) {
	width := max(1, float32(it.Width)*p.PxPerDp)
	path := it.Path
	if len(it.Dash) > 0 {
		path = path.Dashed(it.Dash)
	}
	if a, b, ok := it.Path.Straight(); ok && (a.X == b.X || a.Y == b.Y) {
		p.level(ops, &path, int(math.Round(float64(width))), it.Ink)
		return
	}
	if path.Empty() {
		return
	}
	paint.FillShape(ops, p.ink(it.Ink), clip.Stroke{Path: p.path(ops, &path), Width: width}.Op())
}

// level paints upright or level pieces as boxes of whole pixels.
func (p *Painter) level(ops *op.Ops, path *drafting.Path, width int, ink drafting.Ink) {
	col := p.ink(ink)
	var from drafting.Pt
	path.Walk(func(q drafting.Pt) { from = q }, func(q drafting.Pt) {
		r := image.Rect(p.px(from.X), p.px(from.Y), p.px(q.X), p.px(q.Y))
		if from.Y == q.Y {
			r.Min.Y -= width / 2
			r.Max.Y = r.Min.Y + width
		} else {
			r.Min.X -= width / 2
			r.Max.X = r.Min.X + width
		}
		if !r.Empty() {
			paint.FillShape(ops, col, clip.Rect(r).Op())
		}
		from = q
	}, func(_, _, q drafting.Pt) { from = q }, func() {})
}

// text paints one line. Level text stands on whole pixels.
func (p *Painter) text(ops *op.Ops, it *drafting.Item) {
	t := &it.Text
	f := font.Font{Typeface: "Go"}
	if t.Bold {
		f.Weight = font.Bold
	}
	em := fixed.Int26_6(math.Round(t.Size * float64(p.PxPerDp) * 64))
	p.Shaper.LayoutString(text.Parameters{Font: f, PxPerEm: em, MaxWidth: 1 << 20, MaxLines: 1}, t.S)
	p.glyphs = p.glyphs[:0]
	var end fixed.Int26_6
	for {
		g, ok := p.Shaper.NextGlyph()
		if !ok {
			break
		}
		p.glyphs = append(p.glyphs, g)
		end = max(end, g.X+g.Advance)
	}
	if len(p.glyphs) == 0 {
		return
	}
	width := float32(end) / 64
	off := float32(0)
	switch t.Align {
	case drafting.Middle:
		off = -width / 2
	case drafting.End:
		off = -width
	}
	at := p.pt(t.At)
	tr := f32.AffineId()
	if t.Turn == 0 {
		tr = tr.Offset(f32.Pt(float32(math.Round(float64(at.X+off))), float32(math.Round(float64(at.Y)))))
	} else {
		tr = tr.Offset(f32.Pt(off, 0)).Rotate(f32.Point{}, float32(t.Turn)).Offset(at)
	}
	defer op.Affine(tr).Push(ops).Pop()
	paint.FillShape(ops, p.ink(it.Ink), clip.Outline{Path: p.Shaper.Shape(p.glyphs)}.Op())
}
