package touch

import (
	"gioui.org/io/event"
	"gioui.org/io/key"
)

// keyboard is what was typed since the last frame.
type keyboard struct {
	events []key.Event
}

// Keys reads the key presses that the sheet handles itself: those named, with
// or without the shortcut key. It is called once a frame, before drawing.
func (b *Bench) Keys(filters ...key.Filter) []key.Event {
	b.keys.events = b.keys.events[:0]
	all := make([]event.Filter, 0, len(filters))
	for _, f := range filters {
		all = append(all, f)
	}
	for {
		ev, ok := b.Gtx.Event(all...)
		if !ok {
			return b.keys.events
		}
		if e, ok := ev.(key.Event); ok && e.State == key.Press {
			b.keys.events = append(b.keys.events, e)
		}
	}
}
