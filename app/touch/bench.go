package touch

import (
	"image"
	"maps"
	"time"

	"gioui.org/io/event"
	"gioui.org/io/semantic"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/op/clip"
	"gioui.org/op/paint"
	"gioui.org/widget"

	"halfvalue/app/drafting"
	"halfvalue/app/drafting/screen"
)

// Bench builds frames and keeps what outlives one: which target is pressed,
// how far an area is scrolled. The zero Bench is ready.
type Bench struct {
	*drafting.Drawing
	Look *Look
	Gtx  layout.Context

	paint   screen.Painter
	targets []target
	clicks  map[string]*clickState
	drags   map[string]*dragState
	scrolls map[string]*scrollState
	shade   drafting.Rect // targets that follow are cut to it; empty: none
	keys    keyboard
	frame   int
}

type targetKind uint8

const (
	clickTarget targetKind = iota
	dragTarget
	scrollTarget
	endScroll
	wordTarget
	coverTarget
)

type target struct {
	kind     targetKind
	key      string
	label    string
	box      drafting.Rect
	do       func()
	hold     func(repeat bool)
	drag     func(Drag)
	selected bool
	cut      bool // by the area that it scrolls in
}

type clickState struct {
	widget.Clickable
	since   time.Time // when it was first seen pressed; zero: not pressed
	repeats int
	frame   int // when it was last shown
}

// Begin starts a frame: it runs what was touched since the last one and clears
// the drawing. The area is the whole of the constraints.
func (b *Bench) Begin(gtx layout.Context, look *Look) {
	b.Gtx, b.Look = gtx, look
	if b.clicks == nil {
		b.clicks, b.drags, b.scrolls = map[string]*clickState{}, map[string]*dragState{}, map[string]*scrollState{}
	}
	b.runTouched()
	b.frame++
	if b.frame%512 == 0 {
		b.forget()
	}
	size := gtx.Constraints.Max
	area := drafting.Rect{X1: float64(size.X) / b.scale(), Y1: float64(size.Y) / b.scale()}
	if b.Drawing == nil {
		b.Drawing = drafting.New(look.Fonts, area)
	}
	b.Drawing.Reset(area)
	b.targets = b.targets[:0]
	b.shade = drafting.Rect{}
}

// forget drops the state of targets that have not been shown for a while, so
// that a day of work keeps no more memory than an hour.
func (b *Bench) forget() {
	maps.DeleteFunc(b.clicks, func(_ string, s *clickState) bool { return b.frame-s.frame > 256 })
	maps.DeleteFunc(b.drags, func(_ string, s *dragState) bool { return b.frame-s.frame > 256 })
}

func (b *Bench) scale() float64 {
	if s := float64(b.Gtx.Metric.PxPerDp); s > 0 {
		return s
	}
	return 1
}

// runTouched acts on the targets of the last frame.
func (b *Bench) runTouched() {
	for i := range b.targets {
		t := &b.targets[i]
		switch t.kind {
		case clickTarget:
			b.runClick(t, b.clicks[t.key])
		case dragTarget:
			b.runDrag(t, b.drags[t.key])
		case scrollTarget:
			b.runScroll(b.scrolls[t.key])
		}
	}
}

// How long a press lasts until it repeats, and how fast it then does.
const (
	holdAfter = 400 * time.Millisecond
	holdEvery = 80 * time.Millisecond
)

func (b *Bench) runClick(t *target, s *clickState) {
	clicked := false
	for s.Clicked(b.Gtx) {
		clicked = true
	}
	held := s.repeats > 0
	if t.hold != nil {
		b.runHold(t, s)
	}
	switch {
	case clicked && held && t.hold != nil:
		t.hold(false)
	case clicked && t.do != nil:
		t.do()
	}
}

// runHold repeats a press that lasts, faster after a while.
func (b *Bench) runHold(t *target, s *clickState) {
	now := b.Gtx.Now
	if !s.Pressed() {
		s.since, s.repeats = time.Time{}, 0
		return
	}
	if s.since.IsZero() {
		s.since = now
	}
	due := func() time.Time { return s.since.Add(holdAfter + time.Duration(s.repeats)*holdEvery) }
	for n := 0; !due().After(now) && n < 8; n++ {
		s.repeats++
		t.hold(true)
	}
	b.Gtx.Execute(op.InvalidateCmd{At: due()})
}

// End paints the drawing and registers the targets.
func (b *Bench) End() layout.Dimensions {
	gtx := b.Gtx
	b.paint.Shaper, b.paint.Palette, b.paint.PxPerDp = b.Look.Shaper, b.Look.Palette, float32(b.scale())
	c := b.Look.Palette[drafting.Sheet]
	paint.Fill(gtx.Ops, Colour(c))
	b.paint.Paint(gtx.Ops, b.Drawing)
	var stack []clip.Stack
	for i := range b.targets {
		t := &b.targets[i]
		switch t.kind {
		case scrollTarget:
			stack = append(stack, clip.Rect(b.px(t.box)).Push(gtx.Ops))
			b.scrolls[t.key].gesture.Add(gtx.Ops)
			b.runScroll(b.scrolls[t.key])
		case endScroll:
			stack[len(stack)-1].Pop()
			stack = stack[:len(stack)-1]
		default:
			b.register(t)
		}
	}
	return layout.Dimensions{Size: gtx.Constraints.Max}
}

func (b *Bench) register(t *target) {
	gtx := b.Gtx
	r := b.px(t.box)
	defer op.Offset(r.Min).Push(gtx.Ops).Pop()
	r = r.Sub(r.Min)
	switch t.kind {
	case clickTarget:
		gtx.Constraints = layout.Exact(r.Max)
		b.clicks[t.key].Layout(gtx, func(gtx layout.Context) layout.Dimensions {
			semantic.Button.Add(gtx.Ops)
			b.describe(t)
			return layout.Dimensions{Size: gtx.Constraints.Min}
		})
	case dragTarget:
		// The label needs an area of its own: Gio drops the description of an
		// area whose handler takes no clicks.
		defer clip.Rect(r).Push(gtx.Ops).Pop()
		b.describe(t)
		defer clip.Rect(r).Push(gtx.Ops).Pop()
		event.Op(gtx.Ops, b.drags[t.key])
		b.wake(b.drags[t.key])
	case wordTarget:
		defer clip.Rect(r).Push(gtx.Ops).Pop()
		b.describe(t)
	case coverTarget:
		defer clip.Rect(r).Push(gtx.Ops).Pop()
		event.Op(gtx.Ops, b.dragOf(t.key))
	}
}

func (b *Bench) describe(t *target) {
	semantic.LabelOp(t.label).Add(b.Gtx.Ops)
	semantic.SelectedOp(t.selected).Add(b.Gtx.Ops)
}

func (b *Bench) px(r drafting.Rect) image.Rectangle {
	s := b.scale()
	at := func(v float64) int { return int(v*s + 0.5) }
	return image.Rect(at(r.X0), at(r.Y0), at(r.X1), at(r.Y1))
}

// add names a target, cut to the area that is scrolled if there is one.
func (b *Bench) add(t target) {
	if !b.shade.Empty() && t.kind != scrollTarget && t.kind != endScroll {
		t.cut = !b.shade.Holds(t.box)
		t.box = t.box.And(b.shade)
	}
	if t.box.Empty() && t.kind != endScroll {
		return
	}
	b.targets = append(b.targets, t)
}

// Target names an area that does something when it is touched. The key is its
// identity from frame to frame, the label what a screen reader says and what
// tests press; a label may hold a value that changes under the finger, a key
// must not.
func (b *Bench) Target(box drafting.Rect, key, label string, do func()) {
	b.targetAs(target{kind: clickTarget, key: key, label: label, box: box, do: do})
}

func (b *Bench) targetAs(t target) {
	if b.clicks[t.key] == nil {
		b.clicks[t.key] = &clickState{}
	}
	b.clicks[t.key].frame = b.frame
	b.add(t)
}

// Words gives a screen reader what a part of the drawing says.
func (b *Bench) Words(box drafting.Rect, text string) {
	b.add(target{kind: wordTarget, label: text, box: box})
}

// Cover keeps touches on a panel from reaching what lies under it.
func (b *Bench) Cover(key string, box drafting.Rect) {
	b.add(target{kind: coverTarget, key: "cover " + key, box: box})
}

// Cut says whether a target of this frame is cut by the area that it scrolls
// in.
func (b *Bench) Cut(label string) bool {
	for _, t := range b.targets {
		if t.label == label && t.cut {
			return true
		}
	}
	return false
}

// Pressed says whether a target is pressed now.
func (b *Bench) Pressed(key string) bool {
	s := b.clicks[key]
	return s != nil && s.Pressed()
}

// Focused says whether the keyboard acts on a target.
func (b *Bench) Focused(key string) bool {
	s := b.clicks[key]
	return s != nil && b.Gtx.Focused(&s.Clickable)
}

// Ring draws the ring of the keyboard's focus round a target that has it.
func (b *Bench) Ring(key string, box drafting.Rect) {
	if b.Focused(key) {
		b.Stroke(drafting.Box(box.Inset(3)), drafting.Medium, drafting.Focus, 4, 3)
	}
}
