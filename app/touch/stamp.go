package touch

import "halfvalue/app/drafting"

// Mark is the state of a stamp.
type Mark uint8

// The three marks differ by shape: a filled field with a tick, a bold frame
// struck through, a hatched field with a question mark.
const (
	Holds Mark = iota
	Struck
	Open
)

// Stamp is one check as it stands on the sheet.
type Stamp struct {
	Box   drafting.Rect
	Mark  Mark
	Name  string
	Text  string // figure against limit
	Key   string // identity of the check
	Label string
	Do    func()
}

// Stamp draws a stamp and names its target.
func (b *Bench) Stamp(s Stamp) {
	side := min(s.Box.H(), b.Look.Target)
	field, rest := s.Box.CutLeft(side)
	b.markField(field, s.Mark)
	switch s.Mark {
	case Holds:
		b.Frame(s.Box, drafting.Thin, drafting.Line)
	case Struck:
		b.Frame(s.Box, drafting.Bold, drafting.Rope)
	case Open:
		b.Stroke(drafting.Box(s.Box.Inset(0.5)), drafting.Thin, drafting.Line, 5, 4)
	}
	in := drafting.Rect{X0: rest.X0 + Unit, X1: rest.X1 - Unit, Y0: rest.Y0, Y1: rest.Y1}
	top, foot := in, in
	top.Y1, foot.Y0 = in.Mid().Y, in.Mid().Y
	b.TextIn(top.Moved(0, 2), s.Name, drafting.Style{Size: b.Look.Small(), Bold: true, Ink: drafting.Line})
	b.TextIn(foot.Moved(0, -4), s.Text, drafting.Style{Size: b.Look.Small(), Ink: drafting.Line})
	b.Target(s.Box, "stamp "+s.Key, s.Label, s.Do)
	b.Ring("stamp "+s.Key, s.Box)
}

func (b *Bench) markField(r drafting.Rect, m Mark) {
	switch m {
	case Holds:
		b.Fill(drafting.Box(r), drafting.Line)
		b.Check(r.Mid(), 24, drafting.Reverse)
	case Struck:
		b.Fill(drafting.Box(r), drafting.RopeWash)
		b.Line(drafting.Pt{X: r.X0, Y: r.Y1}, drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Bold, drafting.Rope)
		b.Line(drafting.Pt{X: r.X1, Y: r.Y0}, drafting.Pt{X: r.X1, Y: r.Y1}, drafting.Thin, drafting.Rope)
	case Open:
		b.Hatch(drafting.Box(r.Inset(1)), "", drafting.Faint)
		b.TextIn(r, "?", drafting.Style{Size: b.Look.Body(), Bold: true, Ink: drafting.Line, Align: drafting.Middle, Knock: true})
	}
}
