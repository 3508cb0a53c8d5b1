package touch

import (
	"math"

	"halfvalue/app/drafting"
)

// Dial turns one quantity: a scale that runs under a fixed index mark like a
// drawing rule, big plus and minus, and a keypad. The zero Dial is ready; it
// keeps what has been typed and nothing of the quantity itself.
type Dial struct {
	Keypad bool // the keypad is out
	typed  string
	from   float64 // value when the finger went down
	field  string
}

// DialSpec is the quantity that a dial turns, as of this frame.
type DialSpec struct {
	Field    string // identity
	Label    string // symbol and name
	Value    float64
	Text     string // value with its unit
	Min, Max float64
	Log      bool
	Step     func(v float64) float64
	Usual    []float64
	Figure   func(v float64) string // figure on the scale, without its unit
	Units    []string               // unit keys of the keypad
	Unit     float64                // base units in one of those shown: graduations are whole in it
	Set      func(v float64, more bool)
	Typed    func(text string)
	Close    func()
}

// Scale of the ruler: dp for a doubling, and dp for a step.
const (
	dpPerDouble = 260.0
	dpPerStep   = 14.0
)

// Typing returns what has been typed and not yet set.
func (d *Dial) Typing() string { return d.typed }

// Layout draws the dial in a box: value with plus and minus, below it the
// scale or the keypad. The head leaves a notch free at its right end.
func (d *Dial) Layout(b *Bench, r drafting.Rect, notch float64, s DialSpec) {
	if d.field != s.Field {
		d.field, d.typed = s.Field, ""
	}
	d.hardwareKeys(b, s)
	head, rest := r.CutTop(d.headHeight(b))
	head.X1 -= notch
	d.head(b, head, b.Look.Target+Unit, s)
	_, rest = rest.CutTop(Unit)
	switch {
	case rest.H() < 40: // a low panel has its head alone
	case d.Keypad:
		d.keypad(b, rest, s)
	default:
		rest.Y1 = min(rest.Y1, rest.Y0+88)
		d.ruler(b, rest, s)
	}
}

// Height is what the dial needs.
func (d *Dial) Height(b *Bench) float64 {
	if d.Keypad {
		return d.headHeight(b) + Unit + 4*b.Look.Target + 3*4
	}
	return d.headHeight(b) + Unit + 88
}

func (d *Dial) headHeight(b *Bench) float64 {
	return max(b.Look.Target+Unit, b.Look.Large()*1.1+b.Look.Small()*1.3)
}

func (d *Dial) head(b *Bench, r drafting.Rect, side float64, s DialSpec) {
	minus, rest := r.CutLeft(side)
	plus, mid := rest.CutRight(side)
	step := func(sign float64) func(bool) {
		return func(repeat bool) { d.step(s, sign, repeat) }
	}
	b.Button(Button{Box: minus, Label: "Less " + s.Label, Symbol: b.Minus, Off: s.Value <= s.Min, Do: func() { d.step(s, -1, false) }, Hold: step(-1)})
	b.Button(Button{Box: plus, Label: "More " + s.Label, Symbol: b.Plus, Off: s.Value >= s.Max, Do: func() { d.step(s, 1, false) }, Hold: step(1)})
	mid = mid.Inset(4)
	b.TextIn(drafting.Rect{X0: mid.X0, Y0: mid.Y0, X1: mid.X1, Y1: mid.Y0 + b.Look.Small()}, b.fit(s.Label, mid.W(), b.Look.Small(), false), drafting.Style{Size: b.Look.Small(), Ink: drafting.Faint, Align: drafting.Middle})
	text, ink := s.Text, drafting.Line
	if d.typed != "" {
		text, ink = d.typed+"|", drafting.Beam
	}
	size := b.Look.Large()
	for size > b.Look.Body() && b.Fonts.Width(text, size, true) > mid.W() {
		size = b.Look.Body()
	}
	b.TextIn(drafting.Rect{X0: mid.X0, Y0: mid.Y0 + b.Look.Small()*1.2, X1: mid.X1, Y1: mid.Y1}, text, drafting.Style{Size: size, Bold: true, Ink: ink, Align: drafting.Middle})
	b.Words(mid, s.Label+", "+s.Text)
}

// fit shortens a text with an ellipsis until it is no wider than a width.
func (b *Bench) fit(text string, width, size float64, bold bool) string {
	if b.Fonts.Width(text, size, bold) <= width {
		return text
	}
	r := []rune(text)
	for len(r) > 1 && b.Fonts.Width(string(r)+"…", size, bold) > width {
		r = r[:len(r)-1]
	}
	return string(r) + "…"
}

// Fit shortens a text with an ellipsis until it fits a width.
func (b *Bench) Fit(text string, width float64, st drafting.Style) string {
	return b.fit(text, width, st.Size, st.Bold)
}

// step goes to the next multiple of the step.
func (d *Dial) step(s DialSpec, sign float64, more bool) {
	st := s.Step(s.Value)
	n := math.Round(s.Value/st*1e6) / 1e6
	if sign > 0 {
		n = math.Floor(n) + 1
	} else {
		n = math.Ceil(n) - 1
	}
	d.typed = ""
	s.Set(clamp(n*st, s.Min, s.Max), more)
}

func clamp(v, lo, hi float64) float64 { return math.Min(math.Max(v, lo), hi) }

// place is where a value stands on a ruler that shows the current one at x.
func (s DialSpec) place(x, v float64) float64 {
	if s.Log {
		return x + dpPerDouble*math.Log2(v/s.Value)
	}
	return x + dpPerStep*(v-s.Value)/s.Step(s.Value)
}

// moved is the value after a drag of dx from a value.
func (s DialSpec) moved(from, dx float64) float64 {
	if s.Log {
		return from * math.Exp2(-dx/dpPerDouble)
	}
	return from - dx/dpPerStep*s.Step(from)
}

// settle snaps to a usual value close by, else to a whole step.
func (s DialSpec) settle(v float64) float64 {
	v = clamp(v, s.Min, s.Max)
	for _, u := range s.Usual {
		if u >= s.Min && u <= s.Max && math.Abs(DialSpec{Log: s.Log, Value: math.Max(v, 1e-12), Step: s.Step}.place(0, math.Max(u, 1e-12))) < 7 {
			return u
		}
	}
	st := s.Step(v)
	return clamp(math.Round(v/st)*st, s.Min, s.Max)
}

func (d *Dial) ruler(b *Bench, r drafting.Rect, s DialSpec) {
	pad, scale := r.CutRight(b.Look.Target + Unit)
	_, pad = pad.CutLeft(Unit)
	d.padButton(b, pad)
	x := scale.Mid().X
	b.Fill(drafting.Box(scale), drafting.Block)
	b.Clip(drafting.Box(scale))
	d.ticks(b, scale, x, s)
	b.Unclip()
	b.Frame(scale, drafting.Thin, drafting.Line)
	b.Fill(drafting.Poly(true, drafting.Pt{X: x - 9, Y: scale.Y0}, drafting.Pt{X: x + 9, Y: scale.Y0}, drafting.Pt{X: x, Y: scale.Y0 + 13}), drafting.Beam)
	b.Line(drafting.Pt{X: x, Y: scale.Y0}, drafting.Pt{X: x, Y: scale.Y0 + 26}, drafting.Medium, drafting.Beam)
	b.DragTarget(scale, "Scale of "+s.Label, func(g Drag) { d.scrub(b, s, g) })
}

func (d *Dial) padButton(b *Bench, r drafting.Rect) {
	label, symbol := "Keypad", b.Drawing.Keypad
	if d.Keypad {
		label, symbol = "Scale", b.Ruler
	}
	b.Button(Button{Box: r, Label: label, Symbol: symbol, Do: func() { d.Keypad, d.typed = !d.Keypad, "" }})
}

func (d *Dial) scrub(_ *Bench, s DialSpec, g Drag) {
	if !g.Moved && !g.Done {
		d.from = s.Value
		d.typed = ""
		return
	}
	if !g.Moved {
		return
	}
	s.Set(s.settle(s.moved(d.from, g.At.X-g.From.X)), !g.Done)
}

// ticks draws the scale's 1-2-5 figures and, larger, the usual values.
func (d *Dial) ticks(b *Bench, r drafting.Rect, x float64, s DialSpec) {
	lo, hi := clamp(s.moved(s.Value, x-r.X0), s.Min, s.Max), clamp(s.moved(s.Value, x-r.X1), s.Min, s.Max)
	a := drafting.Axis{Lo: lo, Hi: hi, From: s.place(x, lo), To: s.place(x, hi), Log: s.Log}
	small := drafting.Style{Size: b.Look.Small(), Ink: drafting.Line, Align: drafting.Middle}
	unit := s.Unit
	if unit <= 0 {
		unit = 1
	}
	for _, v := range (drafting.Axis{Lo: lo / unit, Hi: hi / unit}).Ticks(40) {
		v *= unit
		b.Line(drafting.Pt{X: a.At(v), Y: r.Y0}, drafting.Pt{X: a.At(v), Y: r.Y0 + 8}, drafting.Hair, drafting.Faint)
	}
	last := math.Inf(-1)
	for _, v := range s.Usual {
		if v < lo || v > hi {
			continue
		}
		at := s.place(x, math.Max(v, 1e-12))
		b.Fill(drafting.Poly(true, drafting.Pt{X: at - 5, Y: r.Y0 + 24}, drafting.Pt{X: at + 5, Y: r.Y0 + 24}, drafting.Pt{X: at, Y: r.Y0 + 14}), drafting.Line)
		text := s.Figure(v)
		w := b.Fonts.Width(text, small.Size, false)
		if at-w/2 < last+8 || at-w/2 < r.X0+2 || at+w/2 > r.X1-2 {
			continue
		}
		b.Text(drafting.Pt{X: at, Y: r.Y0 + 30 + drafting.CapHeight*small.Size}, text, small)
		last = at + w/2
	}
	b.ends(r, s, lo, hi)
}

// ends marks where the quantity's range stops.
func (b *Bench) ends(r drafting.Rect, s DialSpec, lo, hi float64) {
	x := r.Mid().X
	if lo <= s.Min {
		at := s.place(x, math.Max(s.Min, 1e-12))
		b.Hatch(drafting.Box(drafting.Rect{X0: r.X0, Y0: r.Y0, X1: math.Max(r.X0+1, at), Y1: r.Y1}), "heavy", drafting.Faint)
	}
	if hi >= s.Max {
		at := s.place(x, s.Max)
		b.Hatch(drafting.Box(drafting.Rect{X0: math.Min(r.X1-1, at), Y0: r.Y0, X1: r.X1, Y1: r.Y1}), "heavy", drafting.Faint)
	}
}

// usual goes to the next usual value.
func (d *Dial) usual(s DialSpec, sign int) {
	best := s.Value
	for _, u := range s.Usual {
		ahead := (sign > 0 && u > s.Value*(1+1e-9)) || (sign < 0 && u < s.Value*(1-1e-9))
		if ahead && (best == s.Value || math.Abs(u-s.Value) < math.Abs(best-s.Value)) {
			best = u
		}
	}
	s.Set(clamp(best, s.Min, s.Max), false)
}
