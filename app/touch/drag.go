package touch

import (
	"image/color"

	"gioui.org/io/pointer"

	"halfvalue/app/drafting"
)

// Colour is a palette's colour for Gio.
func Colour(c drafting.RGB) color.NRGBA { return color.NRGBA{R: c.R, G: c.G, B: c.B, A: 255} }

// Drag is one event of a finger that was put down on a drag target.
type Drag struct {
	At, From drafting.Pt // dp on the sheet, now and where it was put down
	Moved    bool        // it has left the place where it was put down
	Done     bool        // it was lifted
}

// slop is how far a finger may wander and still be a tap, dp.
const slop = 6

type dragState struct {
	id     pointer.ID
	active bool
	frame  int // when it was last shown
	moved  bool
	from   drafting.Pt
	at     drafting.Pt
}

func (b *Bench) dragOf(key string) *dragState {
	s := b.drags[key]
	if s == nil {
		s = &dragState{}
		b.drags[key] = s
	}
	return s
}

// DragTarget names an area that follows a finger. It keeps the finger: nothing
// round it scrolls meanwhile.
func (b *Bench) DragTarget(box drafting.Rect, label string, do func(Drag)) {
	b.dragOf(label)
	b.add(target{kind: dragTarget, key: label, label: label, box: box, drag: do})
}

// Dragging returns where the finger on a drag target is.
func (b *Bench) Dragging(label string) (drafting.Pt, bool) {
	s := b.drags[label]
	if s == nil || !s.active {
		return drafting.Pt{}, false
	}
	return s.at, true
}

func (s *dragState) filter() pointer.Filter {
	return pointer.Filter{Target: s, Kinds: pointer.Press | pointer.Drag | pointer.Release | pointer.Cancel}
}

// wake asks for the events of a drag target in the frame that first shows it,
// and forgets a finger that was down when it was last shown. Without it the
// first press would be lost: a handler that has asked for nothing gets nothing.
func (b *Bench) wake(s *dragState) {
	if s.frame != b.frame-1 {
		s.active = false
		b.Gtx.Event(s.filter())
	}
	s.frame = b.frame
}

func (b *Bench) runDrag(t *target, s *dragState) {
	for {
		ev, ok := b.Gtx.Event(s.filter())
		if !ok {
			return
		}
		e, ok := ev.(pointer.Event)
		if !ok {
			continue
		}
		at := drafting.Pt{X: t.box.X0 + float64(e.Position.X)/b.scale(), Y: t.box.Y0 + float64(e.Position.Y)/b.scale()}
		b.follow(t, s, e, at)
	}
}

func (b *Bench) follow(t *target, s *dragState, e pointer.Event, at drafting.Pt) {
	switch {
	case e.Kind == pointer.Press && !s.active:
		*s = dragState{id: e.PointerID, active: true, frame: s.frame, from: at, at: at}
		b.Gtx.Execute(pointer.GrabCmd{Tag: s, ID: e.PointerID})
		t.drag(Drag{At: at, From: at})
	case !s.active || e.PointerID != s.id:
	case e.Kind == pointer.Drag:
		s.at = at
		s.moved = s.moved || at.Sub(s.from).Len() > slop
		t.drag(Drag{At: at, From: s.from, Moved: s.moved})
	case e.Kind == pointer.Release || e.Kind == pointer.Cancel:
		s.active = false
		t.drag(Drag{At: s.at, From: s.from, Moved: s.moved, Done: true})
	}
}
