package drafting

import "math"

// Symbols that the Go fonts lack, and those of buttons, drawn as paths round a
// centre in a square of the given side.

// Warning draws a triangle with an exclamation mark, in the given ink.
func (d *Drawing) Warning(c Pt, side float64, ink Ink) {
	h := side / 2
	d.Stroke(Poly(true, Pt{c.X, c.Y - h*0.9}, Pt{c.X + h, c.Y + h*0.8}, Pt{c.X - h, c.Y + h*0.8}), Medium, ink)
	d.Fill(Poly(true, Pt{c.X - h*0.11, c.Y - h*0.3}, Pt{c.X + h*0.11, c.Y - h*0.3}, Pt{c.X + h*0.07, c.Y + h*0.3}, Pt{c.X - h*0.07, c.Y + h*0.3}), ink)
	d.Fill(Circle(Pt{c.X, c.Y + h*0.52}, h*0.11), ink)
}

// Check draws a tick mark.
func (d *Drawing) Check(c Pt, side float64, ink Ink) {
	h := side / 2
	d.Stroke(Poly(false, Pt{c.X - h*0.8, c.Y}, Pt{c.X - h*0.2, c.Y + h*0.6}, Pt{c.X + h*0.85, c.Y - h*0.7}), math.Max(Medium, side/9), ink)
}

// Cross draws a cross of two strokes.
func (d *Drawing) Cross(c Pt, side float64, ink Ink) {
	h := side / 2 * 0.75
	w := math.Max(Medium, side/10)
	d.Line(Pt{c.X - h, c.Y - h}, Pt{c.X + h, c.Y + h}, w, ink)
	d.Line(Pt{c.X - h, c.Y + h}, Pt{c.X + h, c.Y - h}, w, ink)
}

// Plus draws a plus sign.
func (d *Drawing) Plus(c Pt, side float64, ink Ink) {
	h := side / 2 * 0.8
	w := math.Max(Bold, side/9)
	d.Line(Pt{c.X - h, c.Y}, Pt{c.X + h, c.Y}, w, ink)
	d.Line(Pt{c.X, c.Y - h}, Pt{c.X, c.Y + h}, w, ink)
}

// Minus draws a minus sign.
func (d *Drawing) Minus(c Pt, side float64, ink Ink) {
	h := side / 2 * 0.8
	d.Line(Pt{c.X - h, c.Y}, Pt{c.X + h, c.Y}, math.Max(Bold, side/9), ink)
}

// Diameter draws a circle struck through.
func (d *Drawing) Diameter(c Pt, side float64, ink Ink) {
	r := side / 2 * 0.72
	w := math.Max(1.2, side/12)
	d.Stroke(Circle(c, r), w, ink)
	d.Line(Pt{c.X - r*1.15, c.Y + r*1.15}, Pt{c.X + r*1.15, c.Y - r*1.15}, w, ink)
}

// Chevron draws an angle that points along dir.
func (d *Drawing) Chevron(c Pt, side float64, dir Pt, ink Ink) {
	h := side / 2
	u := dir.unit()
	n := u.turned()
	tip := c.Add(u.Mul(h * 0.45))
	back := c.Sub(u.Mul(h * 0.45))
	d.Stroke(Poly(false, back.Add(n.Mul(h*0.8)), tip, back.Sub(n.Mul(h*0.8))), math.Max(Medium, side/10), ink)
}

// Back draws an arrow that turns back to the left, for undo; mirrored it is
// redo.
func (d *Drawing) Back(c Pt, side float64, mirrored bool, ink Ink) {
	h := side / 2
	m := 1.0
	if mirrored {
		m = -1
	}
	w := math.Max(Medium, side/11)
	at := func(x, y float64) Pt { return Pt{c.X + m*x*h, c.Y + y*h} }
	var p Path
	p.MoveTo(at(-0.8, -0.3)).LineTo(at(0.3, -0.3)).CubeTo(at(1, -0.3), at(1, 0.75), at(0.3, 0.75)).LineTo(at(-0.35, 0.75))
	d.Stroke(p, w, ink)
	d.Stroke(Poly(false, at(-0.35, -0.75), at(-0.85, -0.3), at(-0.35, 0.15)), w, ink)
}

// Erase draws the key that takes the last character away.
func (d *Drawing) Erase(c Pt, side float64, ink Ink) {
	h := side / 2
	d.Stroke(Poly(true, Pt{c.X - h, c.Y}, Pt{c.X - h*0.4, c.Y - h*0.62}, Pt{c.X + h, c.Y - h*0.62}, Pt{c.X + h, c.Y + h*0.62}, Pt{c.X - h*0.4, c.Y + h*0.62}), Medium, ink)
	d.Cross(Pt{c.X + h*0.28, c.Y}, side*0.42, ink)
}

// Spot draws a focus or a source: a filled disc in a ring.
func (d *Drawing) Spot(c Pt, r float64, ink Ink) {
	d.Fill(Circle(c, r), ink)
	d.Stroke(Circle(c, r+3), Medium, ink)
}

// Keypad draws a keypad: nine squares.
func (d *Drawing) Keypad(c Pt, side float64, ink Ink) {
	k := side * 0.11
	for i := range 9 {
		x, y := c.X+float64(i%3-1)*side*0.34, c.Y+float64(i/3-1)*side*0.34
		d.Fill(Box(Rect{x - k, y - k, x + k, y + k}), ink)
	}
}

// Ruler draws a rule with ticks.
func (d *Drawing) Ruler(c Pt, side float64, ink Ink) {
	h := side / 2
	d.Frame(Rect{c.X - h*1.2, c.Y - h*0.6, c.X + h*1.2, c.Y + h*0.6}, Medium, ink)
	for i := range 5 {
		x := c.X + float64(i-2)*h*0.4
		d.Line(Pt{x, c.Y - h*0.6}, Pt{x, c.Y - h*0.6 + h*(0.45+0.35*float64((i+1)%2))}, Medium, ink)
	}
}
