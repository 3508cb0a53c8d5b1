package sheet

import (
	"fmt"
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// band is one horizontal piece of the detail: a layer, a gap, a screen, the
// film.
type band struct {
	name, value string
	family      string
	height      float64
	field       string // dial
	choice      string // chooser
	solid       bool   // filled: lead screens
	film        bool
	gap         bool
	shortened   bool // drawn thinner or thicker than to scale
}

// sectionBox is where the stack and its words may stand in a view.
func (u *UI) sectionBox(r drafting.Rect) drafting.Rect {
	small := u.look.Small()
	return drafting.Rect{X0: r.X0 + 20, Y0: r.Y0 + small*2.2 + 24, X1: r.X1 - touch.Unit, Y1: r.Y1 - small*3 - touch.Unit}
}

// stackWidth is the width of the stack in a box; its words stand at the right.
func stackWidth(box drafting.Rect) float64 { return math.Min(box.W()*0.42, 150) }

// sectionFits says whether the words beside the stack have room in a view of
// a height and a width.
func (u *UI) sectionFits(height, width float64) bool {
	box := u.sectionBox(drafting.Rect{X1: width, Y1: height})
	bands, _ := u.bands(box.H())
	need := 0.0
	for _, d := range bands {
		need += u.bandWords(box.W()-stackWidth(box)-26, d)
	}
	return len(bands) > 0 && need <= box.H()
}

// bandWords is the height of what is written beside a band.
func (u *UI) bandWords(width float64, d band) float64 {
	if d.value == "" {
		return 0
	}
	b := &u.bench
	return b.Height(width, d.value, drafting.Style{Size: u.look.Small(), Bold: true}) + b.Height(width, d.name, u.look.Caption()) + 4
}

// detailView draws the stack from the part's source side to the film enlarged:
// layers hatched by family, the IQI in its place, screens and film.
func (u *UI) detailView(r drafting.Rect) {
	b := &u.bench
	b.Line(drafting.Pt{X: r.X0, Y: r.Y0 + touch.Unit}, drafting.Pt{X: r.X0, Y: r.Y1 - touch.Unit}, drafting.Hair, drafting.Ghost)
	in := u.sectionBox(r)
	bands, scale := u.bands(in.H())
	total := 0.0
	for _, d := range bands {
		total += d.height
	}
	y := in.Y0 + math.Max(0, (in.H()-total)/2)
	stack := drafting.Rect{X0: in.X0, X1: in.X0 + stackWidth(in), Y0: y, Y1: y + total}
	b.Fill(drafting.Box(drafting.Rect{X0: stack.X0, Y0: stack.Y0 - 22, X1: stack.X1, Y1: stack.Y1}), drafting.BeamWash)
	tops := u.wordTops(stack, in, bands)
	foot := stack.Y1
	for i, d := range bands {
		foot = math.Max(foot, tops[i]+u.bandWords(in.X1-stack.X1-26, d))
	}
	u.iqi(stack, bands, foot)
	for i, d := range bands {
		u.band(drafting.Rect{X0: stack.X0, Y0: y, X1: stack.X1, Y1: y + d.height}, drafting.Rect{X0: stack.X1 + 26, Y0: tops[i], X1: in.X1, Y1: in.Y1}, d)
		y += d.height
	}
	text := "Section A"
	for _, d := range bands {
		if d.shortened {
			text, scale = "Section A, not to scale", 0
		}
	}
	u.title(r, text, scale)
}

// wordTops places the words of the bands beside their middles, none over
// another.
func (u *UI) wordTops(stack, in drafting.Rect, bands []band) []float64 {
	tops := make([]float64, len(bands))
	width := in.X1 - stack.X1 - 26
	y, free := stack.Y0, in.Y0-u.look.Small()
	for i, d := range bands {
		h := u.bandWords(width, d)
		tops[i] = math.Max(free, y+(d.height-h)/2)
		if h > 0 {
			free = tops[i] + h
		}
		y += d.height
	}
	foot := in.Y1
	for i := len(bands) - 1; i >= 0; i-- {
		if h := u.bandWords(width, bands[i]); h > 0 {
			tops[i] = math.Min(tops[i], foot-h)
			foot = tops[i]
		}
	}
	return tops
}

// bands builds the stack for a height and says at which scale.
func (u *UI) bands(height float64) ([]band, float64) {
	p := u.s.Filled
	least := math.Max(u.look.Small()*2.6, 30)
	list := append(u.partBands(p), u.filmBands(p)...)
	fixed, mm, n := 0.0, 0.0, 0
	for _, d := range list {
		if d.height < 0 {
			fixed -= d.height
		} else {
			mm += d.height
			n++
		}
	}
	if n == 0 || mm <= 0 {
		return nil, 0
	}
	scale := math.Max((height-fixed)/mm, 0.01)
	if scale > 10 {
		scale = 10
	}
	for i := range list {
		d := &list[i]
		if d.height < 0 {
			d.height = -d.height
			continue
		}
		want := d.height * scale
		d.height = math.Max(want, least)
		d.shortened = d.height > want*1.001
	}
	return shrink(list, height, least), scale
}

// shrink takes from the thickest bands what the thin ones took too much.
func shrink(list []band, height, least float64) []band {
	for range 8 {
		total, loose := 0.0, 0.0
		for _, d := range list {
			total += d.height
			if d.field != "" && d.height > least*1.01 {
				loose += d.height - least
			}
		}
		over := total - height
		if over <= 0.5 || loose <= 0 {
			break
		}
		k := math.Max(0, 1-over/loose)
		for i := range list {
			if d := &list[i]; d.field != "" && d.height > least*1.01 {
				d.height = least + (d.height-least)*k
				d.shortened = true
			}
		}
	}
	return list
}

// partBands are the layers, with a pipe's empty bore between its walls and the
// room between part and film.
func (u *UI) partBands(p plan.Plan) []band {
	var out []band
	units := u.s.Units
	n := len(p.Part.Layers)
	for i, l := range p.Part.Layers {
		out = append(out, band{name: materialTitle(l.Material), value: symbolOf(i, n) + " " + units.Format(desk.Length, l.MM, 4), family: family(l.Material), height: l.MM,
			field: fmt.Sprintf("part.layers[%d].mm", i), choice: fmt.Sprintf("part.layers[%d].material", i)})
		if bore := p.DepthMM() - p.Part.TotalMM(); p.Setup.DoubleWall() && n == 2 && i == 0 && bore > 0.5 {
			out = append(out, band{name: "empty bore", value: units.Format(desk.Length, bore, 4), height: -44, gap: true})
		}
	}
	if gap := p.GapMM(); gap > 0.01 {
		out = append(out, band{name: "room to the film", value: units.Format(desk.Length, gap, 4), height: -40, gap: true, field: "setup.bMM"})
	}
	return out
}

func symbolOf(i, n int) string {
	if n == 1 {
		return "t"
	}
	return fmt.Sprintf("t%d", i+1)
}

func materialTitle(name string) string {
	m, err := materials.Lookup(name)
	if err != nil {
		return name
	}
	return m.Title()
}

// filmBands are screens and film, drawn as symbols.
func (u *UI) filmBands(p plan.Plan) []band {
	units := u.s.Units
	switch d := p.Detector; {
	case d.Film != nil:
		return u.cassette("film "+d.Film.Class, "D "+desk.Significant(d.Film.Density, 3), d.Film.ScreensMM, "detector.film")
	case d.Plate != nil:
		return u.cassette("imaging plate, "+units.Format(desk.Micron, d.Plate.PixelUM, 3), "SNR "+desk.Significant(d.Plate.SNRn, 3), d.Plate.ScreensMM, "detector.plate")
	case d.Panel != nil:
		return u.cassette("flat panel, "+units.Format(desk.Micron, d.Panel.PixelUM, 3), "SNR "+desk.Significant(d.Panel.SNRn, 3), nil, "detector.panel")
	}
	return nil
}

func (u *UI) cassette(name, value string, screens *[2]float64, prefix string) []band {
	fields := map[string]string{"detector.film": "detector.film.density", "detector.plate": "detector.plate.snrN", "detector.panel": "detector.panel.snrN"}
	choice := ""
	if prefix == "detector.film" {
		choice = "detector.film.class"
	}
	film := band{name: name, value: value, height: -math.Max(u.look.Target, u.look.Small()*3.4), film: true, field: fields[prefix], choice: choice}
	if screens == nil || *screens == [2]float64{} {
		return []band{film}
	}
	front := band{height: -7, solid: true}
	film.name += fmt.Sprintf(", Pb %g + %g", screens[0], screens[1])
	out := []band{}
	if screens[0] > 0 {
		out = append(out, front)
	}
	out = append(out, film)
	if screens[1] > 0 {
		out = append(out, front)
	}
	return out
}

// band draws one piece of the stack, its words at the right, and its targets.
func (u *UI) band(r, words drafting.Rect, d band) {
	b := &u.bench
	switch {
	case d.solid:
		b.Fill(drafting.Box(r.Inset(1)), drafting.Line)
		return
	case d.film:
		b.Fill(drafting.Box(r), drafting.Sheet)
		for _, k := range []float64{0.38, 0.5, 0.62} {
			y := r.Y0 + r.H()*k
			b.Line(drafting.Pt{X: r.X0, Y: y}, drafting.Pt{X: r.X1, Y: y}, drafting.Medium, drafting.Line)
		}
	case d.gap:
		b.Fill(drafting.Box(r), drafting.BeamWash)
		b.BreakLine(drafting.Pt{X: r.X0 - 6, Y: r.Mid().Y}, drafting.Pt{X: r.X1 + 6, Y: r.Mid().Y}, drafting.Line)
	default:
		b.Fill(drafting.Box(r), drafting.Sheet)
		b.Hatch(drafting.Box(r), d.family, drafting.Line)
		u.bandDimension(r)
	}
	b.Line(drafting.Pt{X: r.X0, Y: r.Y0}, drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Medium, drafting.Line)
	b.Line(drafting.Pt{X: r.X0, Y: r.Y1}, drafting.Pt{X: r.X1, Y: r.Y1}, drafting.Medium, drafting.Line)
	u.bandText(r, words, d)
}

func (u *UI) bandDimension(r drafting.Rect) {
	b := &u.bench
	x := r.X1 + 14
	b.Dimension(drafting.Dimension{A: drafting.Pt{X: x, Y: r.Y0}, B: drafting.Pt{X: x, Y: r.Y1}, Size: u.look.Small(), Ink: drafting.Line})
	b.Line(drafting.Pt{X: r.X1 + 2, Y: r.Y0}, drafting.Pt{X: x + 4, Y: r.Y0}, drafting.Hair, drafting.Faint)
	b.Line(drafting.Pt{X: r.X1 + 2, Y: r.Y1}, drafting.Pt{X: x + 4, Y: r.Y1}, drafting.Hair, drafting.Faint)
}

// bandText writes value and name right of the stack; the stack and the words
// can both be touched.
func (u *UI) bandText(r, words drafting.Rect, d band) {
	b := &u.bench
	h := b.Paragraph(words, d.value, drafting.Style{Size: u.look.Small(), Bold: true, Ink: drafting.Line})
	b.Paragraph(drafting.Rect{X0: words.X0, Y0: words.Y0 + h, X1: words.X1, Y1: words.Y1}, d.name, u.look.Caption())
	half := u.look.Target / 2
	if d.field != "" {
		u.open(drafting.Rect{X0: r.X0, Y0: math.Min(r.Y0, r.Mid().Y-half), X1: r.X1 + 22, Y1: math.Max(r.Y1, r.Mid().Y+half)}, d.field, "")
	}
	if d.choice != "" {
		words.X0 -= 4
		words.Y1 = words.Y0 + u.bandWords(words.W()-4, d)
		u.openAs(words, "Choose "+d.name, desk.Panel{Kind: desk.ChoicePanel, Field: d.choice})
	}
}

// iqi draws the wires of the indicator in section where it lies: on the
// source side, at the film where only that side can be reached.
func (u *UI) iqi(stack drafting.Rect, bands []band, foot float64) {
	b, small := &u.bench, u.look.Small()
	p := u.s.Filled
	text, y := u.iqiName()+", source side", stack.Y0
	if p.Setup.Kind == plan.DoubleWallSingleImage || p.Setup.Kind == plan.Panoramic {
		text = u.iqiName() + ", film side, F"
		for _, d := range bands {
			if d.film || d.solid {
				break
			}
			y += d.height
		}
	}
	x := stack.X0 + 14
	for _, r := range []float64{3.6, 3, 2.4, 2, 1.6, 1.2} {
		b.Fill(drafting.Circle(drafting.Pt{X: x, Y: y - r}, r), drafting.Line)
		x += 11
	}
	at := drafting.Pt{X: stack.X0, Y: stack.Y0 - 26}
	if y != stack.Y0 {
		at.Y = foot + small*1.2
	}
	b.Text(at, text, drafting.Style{Size: small, Ink: drafting.Faint})
}

// iqiName is the indicator with the wire that the rules want to see.
func (u *UI) iqiName() string {
	for _, c := range u.s.Answer.Checks {
		if c.ID == "iqi" && c.Unit == "W" && c.Limit > 0 {
			return "IQI W" + desk.Significant(c.Limit, 2)
		}
	}
	return "IQI"
}
