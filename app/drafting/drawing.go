package drafting

import "math"

// Line weights in dp: thin for dimensions and hatches, bold for outlines.
const (
	Hair   = 1.0
	Thin   = 1.0
	Medium = 1.75
	Bold   = 2.5
)

// Dash patterns, on and off in dp. Chain is the centre line of ISO 128; Edge
// is the edge of the beam; Cord is the boundary.
func Chain() []float64 { return []float64{16, 4, 2, 4} }

// Edge is the pattern of a beam's edge.
func Edge() []float64 { return []float64{10, 4} }

// Cord is the pattern of the boundary.
func Cord() []float64 { return []float64{14, 4, 3, 4, 3, 4} }

// Kind tells items of a Drawing apart.
type Kind uint8

// The kinds of item.
const (
	StrokeItem Kind = iota
	FillItem
	TextItem
	ClipItem   // what follows is drawn inside Path only
	UnclipItem // ends the innermost ClipItem
)

// Align says which end of a text stands at its point.
type Align uint8

// Alignments.
const (
	Start Align = iota
	Middle
	End
)

// Item is one entry of the display list.
type Item struct {
	Kind  Kind
	Ink   Ink
	Path  Path
	Width float64   // stroke, dp
	Dash  []float64 // stroke; nil: continuous
	Text  Text
}

// Text is a run of text on one line.
type Text struct {
	At    Pt // on the baseline
	S     string
	Size  float64 // dp
	Bold  bool
	Align Align
	Turn  float64 // radians, clockwise as seen, about At
	Rect  Rect    // what it covers, bounds if turned
	Clip  Rect    // innermost clip when it was drawn
	Loose bool    // may be cut by its clip: it scrolls
}

// Drawing is a display list. Make one with New.
type Drawing struct {
	Fonts *Fonts
	Area  Rect
	Items []Item
	clips []Rect
	loose int
}

// New starts a drawing on an area.
func New(f *Fonts, area Rect) *Drawing { return &Drawing{Fonts: f, Area: area, clips: []Rect{area}} }

// Reset empties the drawing for another frame and keeps its memory.
func (d *Drawing) Reset(area Rect) {
	d.Items, d.Area, d.clips, d.loose = d.Items[:0], area, append(d.clips[:0], area), 0
}

// Stroke draws along a path.
func (d *Drawing) Stroke(p Path, width float64, ink Ink, dash ...float64) {
	d.Items = append(d.Items, Item{Kind: StrokeItem, Path: p, Width: width, Ink: ink, Dash: dash})
}

// Fill fills a path (non-zero winding).
func (d *Drawing) Fill(p Path, ink Ink) {
	d.Items = append(d.Items, Item{Kind: FillItem, Path: p, Ink: ink})
}

// Line draws from a to b.
func (d *Drawing) Line(a, b Pt, width float64, ink Ink, dash ...float64) {
	d.Stroke(Poly(false, a, b), width, ink, dash...)
}

// Frame draws a rectangle's outline inside it.
func (d *Drawing) Frame(r Rect, width float64, ink Ink) {
	h := width / 2
	d.Line(Pt{r.X0, r.Y0 + h}, Pt{r.X1, r.Y0 + h}, width, ink)
	d.Line(Pt{r.X0, r.Y1 - h}, Pt{r.X1, r.Y1 - h}, width, ink)
	d.Line(Pt{r.X0 + h, r.Y0}, Pt{r.X0 + h, r.Y1}, width, ink)
	d.Line(Pt{r.X1 - h, r.Y0}, Pt{r.X1 - h, r.Y1}, width, ink)
}

// Clip draws what follows inside a path only, until Unclip.
func (d *Drawing) Clip(p Path) {
	d.Items = append(d.Items, Item{Kind: ClipItem, Path: p})
	d.clips = append(d.clips, d.clips[len(d.clips)-1].And(p.Bounds()))
}

// Unclip ends the innermost Clip.
func (d *Drawing) Unclip() {
	d.Items = append(d.Items, Item{Kind: UnclipItem})
	d.clips = d.clips[:len(d.clips)-1]
}

// ClipBox is the bounds of the innermost clip.
func (d *Drawing) ClipBox() Rect { return d.clips[len(d.clips)-1] }

// Scrolling marks what follows as content that moves under its clip, so that
// being cut there is no fault; Still ends it.
func (d *Drawing) Scrolling() { d.loose++ }

// Still ends Scrolling.
func (d *Drawing) Still() { d.loose-- }

// Style is how a text looks.
type Style struct {
	Size  float64
	Bold  bool
	Ink   Ink
	Align Align
	Turn  float64
	Knock bool // clear the sheet behind the text
}

// Text writes one line with its baseline at a point and returns what it
// covers.
func (d *Drawing) Text(at Pt, s string, st Style) Rect {
	t := Text{At: at, S: s, Size: st.Size, Bold: st.Bold, Align: st.Align, Turn: st.Turn, Clip: d.ClipBox(), Loose: d.loose > 0}
	t.Rect = d.cover(t)
	if st.Knock {
		d.Fill(d.outline(t, 2), Sheet)
	}
	if s != "" {
		d.Items = append(d.Items, Item{Kind: TextItem, Ink: st.Ink, Text: t})
	}
	return t.Rect
}

// corners of the box of a text before its turn, relative to At.
func (d *Drawing) run(t Text) Rect {
	w := d.Fonts.Width(t.S, t.Size, t.Bold)
	x := 0.0
	switch t.Align {
	case Middle:
		x = -w / 2
	case End:
		x = -w
	}
	return Rect{x, -CapHeight * t.Size, x + w, 0}
}

func (d *Drawing) outline(t Text, margin float64) Path {
	r := d.run(t)
	r.Y1 += Descent * t.Size * 0.6
	r = r.Grow(margin)
	s, c := math.Sin(t.Turn), math.Cos(t.Turn)
	at := func(x, y float64) Pt { return Pt{t.At.X + x*c - y*s, t.At.Y + x*s + y*c} }
	return Poly(true, at(r.X0, r.Y0), at(r.X1, r.Y0), at(r.X1, r.Y1), at(r.X0, r.Y1))
}

func (d *Drawing) cover(t Text) Rect {
	o := d.outline(t, 0)
	return o.Bounds()
}

// TextIn writes one line centred in height in a box, at its left, middle or
// right by the style's alignment.
func (d *Drawing) TextIn(r Rect, s string, st Style) Rect {
	at := Pt{r.X0, r.Mid().Y + CapHeight*st.Size/2}
	switch st.Align {
	case Middle:
		at.X = r.Mid().X
	case End:
		at.X = r.X1
	}
	return d.Text(at, s, st)
}

// Paragraph writes wrapped text from the top of a box and returns the height
// that it takes.
func (d *Drawing) Paragraph(r Rect, s string, st Style) float64 {
	lines := d.Fonts.Wrap(s, st.Size, st.Bold, r.W())
	step := Leading * st.Size
	x := r.X0
	switch st.Align {
	case Middle:
		x = r.Mid().X
	case End:
		x = r.X1
	}
	for i, l := range lines {
		d.Text(Pt{x, r.Y0 + float64(i)*step + Ascent*st.Size}, l, st)
	}
	return float64(len(lines)) * step
}

// Height is what Paragraph would take.
func (d *Drawing) Height(width float64, s string, st Style) float64 {
	return float64(len(d.Fonts.Wrap(s, st.Size, st.Bold, width))) * Leading * st.Size
}

// DpPerMM is how many dp a millimetre of a screen has by definition of the dp:
// 160 to the inch.
const DpPerMM = 160 / 25.4
