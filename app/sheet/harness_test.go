package sheet

import (
	"fmt"
	"image"
	"math"
	"strings"
	"testing"
	"time"

	"gioui.org/f32"
	"gioui.org/io/event"
	"gioui.org/io/input"
	"gioui.org/io/key"
	"gioui.org/io/pointer"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/unit"

	"halfvalue/app/desk"
	"halfvalue/exposure"
	"halfvalue/exposure/plan"
)

// hand drives the real sheets through Gio's input router, as a finger and a
// keyboard do, with the real desk and the real engine behind them.
type hand struct {
	t      *testing.T
	ui     *UI
	desk   *desk.Desk
	world  *world
	router input.Router
	ops    op.Ops
	size   image.Point
	px     float32 // px per dp
	now    time.Time
}

func newHand(t *testing.T, w, h int, first plan.Plan) *hand {
	t.Helper()
	data, err := plan.Encode(first)
	if err != nil {
		t.Fatal(err)
	}
	world := &world{}
	d := desk.Open(world, desk.Options{Reckon: desk.Engine(exposure.Calibration{}), Plan: data, People: []string{"R. Amsel", "J. Okoro", "L. Brandt"}})
	x := &hand{t: t, ui: New(), desk: d, world: world, size: image.Pt(w, h), px: 1, now: time.Date(2026, 12, 1, 20, 0, 0, 0, time.UTC)}
	x.frames(2)
	return x
}

// frame lays out once, applies what was asked for, and lets 16 ms pass.
func (x *hand) frame() {
	x.ops.Reset()
	gtx := layout.Context{Ops: &x.ops, Now: x.now, Source: x.router.Source(),
		Metric: unit.Metric{PxPerDp: x.px, PxPerSp: x.px}, Constraints: layout.Exact(image.Pt(int(float32(x.size.X)*x.px), int(float32(x.size.Y)*x.px)))}
	for _, in := range x.ui.Layout(gtx, x.desk.State()) {
		x.desk.Apply(in)
	}
	x.router.Frame(&x.ops)
	x.now = x.now.Add(16 * time.Millisecond)
}

func (x *hand) frames(n int) {
	for range n {
		x.frame()
	}
}

func (x *hand) queue(ev ...event.Event) {
	x.router.Queue(ev...)
	x.frames(2)
}

// find gives the bounds of what is labelled so, or whose label starts so.
func (x *hand) find(label string) (image.Rectangle, bool) {
	var exact, prefix *image.Rectangle
	var walk func(n input.SemanticNode)
	walk = func(n input.SemanticNode) {
		r := n.Desc.Bounds
		if n.Desc.Label == label {
			exact = &r
		}
		if strings.HasPrefix(n.Desc.Label, label) && prefix == nil {
			prefix = &r
		}
		for _, c := range n.Children {
			walk(c)
		}
	}
	for _, n := range x.router.AppendSemantics(nil) {
		walk(n)
		break
	}
	switch {
	case exact != nil:
		return *exact, true
	case prefix != nil:
		return *prefix, true
	}
	return image.Rectangle{}, false
}

func (x *hand) labels() string {
	var out []string
	var walk func(n input.SemanticNode)
	walk = func(n input.SemanticNode) {
		if n.Desc.Label != "" {
			out = append(out, fmt.Sprintf("%q", n.Desc.Label))
		}
		for _, c := range n.Children {
			walk(c)
		}
	}
	for _, n := range x.router.AppendSemantics(nil) {
		walk(n)
		break
	}
	return strings.Join(out, " ")
}

func (x *hand) must(label string) f32.Point {
	x.t.Helper()
	r, ok := x.find(label)
	if !ok {
		x.t.Fatalf("nothing is labelled %q; there are %s", label, x.labels())
	}
	return f32.Pt(float32(r.Min.X+r.Max.X)/2, float32(r.Min.Y+r.Max.Y)/2)
}

// tap presses and releases what carries a label.
func (x *hand) tap(label string) {
	x.t.Helper()
	x.tapAt(x.must(label))
}

func (x *hand) tapAt(p f32.Point) {
	x.queue(pointer.Event{Kind: pointer.Press, Source: pointer.Touch, PointerID: 1, Position: p, Time: 10 * time.Millisecond})
	x.queue(pointer.Event{Kind: pointer.Release, Source: pointer.Touch, PointerID: 1, Position: p, Time: 40 * time.Millisecond})
}

// drag moves a finger from the middle of what carries a label.
func (x *hand) drag(label string, dx, dy float32) {
	x.t.Helper()
	p := x.must(label)
	at := func(k pointer.Kind, q f32.Point, ms int) {
		x.queue(pointer.Event{Kind: k, Source: pointer.Touch, PointerID: 2, Position: q, Time: time.Duration(ms) * time.Millisecond})
	}
	at(pointer.Press, p, 0)
	for i := 1; i <= 8; i++ {
		k := float32(i) / 8
		at(pointer.Move, p.Add(f32.Pt(dx*x.px*k, dy*x.px*k)), 16*i)
	}
	at(pointer.Release, p.Add(f32.Pt(dx*x.px, dy*x.px)), 150)
}

func (x *hand) press(name key.Name, mods key.Modifiers) {
	x.queue(key.Event{Name: name, Modifiers: mods, State: key.Press})
}

func (x *hand) typeText(text string) {
	for _, r := range text {
		name := key.Name(strings.ToUpper(string(r)))
		if r == ' ' {
			name = key.NameSpace
		}
		x.press(name, 0)
	}
}

func (x *hand) value(field string) float64 {
	x.t.Helper()
	q, ok := desk.QuantityOf(x.desk.State().Plan, field)
	if !ok {
		x.t.Fatalf("the plan has no %s", field)
	}
	return q.Value
}

func (x *hand) seconds() float64 { return x.desk.State().Answer.Exposure.Seconds }

func near(a, b float64) bool { return math.Abs(a-b) <= 1e-9*math.Max(1, math.Abs(b)) }

// world is a desk.Platform in memory.
type world struct {
	plan, settings []byte
	shots          []desk.Shot
	events         int
}

func (w *world) Now() time.Time               { return time.Date(2026, 12, 1, 20, 0, 0, 0, time.UTC) }
func (w *world) LastPlan() ([]byte, error)    { return w.plan, nil }
func (w *world) Settings() ([]byte, error)    { return w.settings, nil }
func (w *world) OpenBook() (desk.Book, error) { return w, nil }
func (w *world) SavePlan(b []byte) error      { w.plan = b; return nil }
func (w *world) SaveSettings(b []byte) error  { w.settings = b; return nil }
func (w *world) Close() error                 { return nil }

func (w *world) EventID() (string, error) {
	w.events++
	return fmt.Sprintf("%032x", w.events), nil
}

func (w *world) Append(s desk.Shot) (uint64, error) {
	w.shots = append(w.shots, s)
	return uint64(len(w.shots)), nil
}

func (w *world) Count() (uint64, error) { return uint64(len(w.shots)), nil }

func (w *world) Entry(n uint64) (desk.Entry, error) {
	if n == 0 || n > uint64(len(w.shots)) {
		return desk.Entry{}, fmt.Errorf("there is no entry %d", n)
	}
	s := w.shots[n-1]
	p, err := plan.Decode(s.Plan)
	return desk.Entry{Number: n, At: s.At, By: s.By, Title: p.Title, GivenSeconds: s.GivenSeconds, Planned: desk.Clock(s.Answer.Exposure.Seconds),
		Hash: strings.Repeat("0123456789abcdef", 4), Plan: s.Plan, Engine: s.Answer.Engine, Then: s.Answer.Exposure}, err
}

func (w *world) Page(before uint64, n int) ([]desk.Entry, error) {
	var out []desk.Entry
	for i := uint64(len(w.shots)); i > 0 && len(out) < n; i-- {
		if before > 0 && i >= before {
			continue
		}
		e, err := w.Entry(i)
		if err != nil {
			return nil, err
		}
		out = append(out, e)
	}
	return out, nil
}

func (w *world) Verify() (desk.Verdict, error) {
	return desk.Verdict{Entries: uint64(len(w.shots))}, nil
}
