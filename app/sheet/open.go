package sheet

import (
	"math"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
)

// open makes a target at least as large as a target must be that opens a dial
// on a field, with the quantity's name and value as its label.
func (u *UI) open(r drafting.Rect, field, _ string) {
	q, ok := u.known.quantities[field]
	if !ok {
		return
	}
	label := q.Label() + ", " + q.Text(u.s.Units)
	u.openAs(r, label, desk.Panel{Kind: desk.DialPanel, Field: field})
}

func (u *UI) openAs(r drafting.Rect, label string, p desk.Panel) {
	least := u.look.Target
	if w := least - r.W(); w > 0 {
		r.X0, r.X1 = r.X0-w/2, r.X1+w/2
	}
	if h := least - r.H(); h > 0 {
		r.Y0, r.Y1 = r.Y0-h/2, r.Y1+h/2
	}
	r = inside(r, u.room)
	key := u.place + string(p.Kind) + " " + p.Field
	u.bench.Target(r, key, label, u.toggle(p))
	u.bench.Ring(key, r)
	if u.s.Panel == p {
		u.bench.Stroke(drafting.Box(r.Inset(1)), drafting.Medium, drafting.Beam)
	}
}

// inside moves a rectangle into another, and cuts what is too large.
func inside(r, room drafting.Rect) drafting.Rect {
	dx := math.Max(0, room.X0-r.X0) - math.Max(0, r.X1-room.X1)
	dy := math.Max(0, room.Y0-r.Y0) - math.Max(0, r.Y1-room.Y1)
	return r.Moved(dx, dy).And(room)
}
