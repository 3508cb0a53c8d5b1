package drafting

import "math"

// Hatch fills a shape with the pattern of a family of materials
// (materials.Material.Family). Every pattern differs from the others by angle,
// spacing or dash, so none needs a colour. An unknown family gets the plain
// pattern. A shape is drawn with at most a few hundred lines.
func (d *Drawing) Hatch(shape Path, family string, ink Ink) {
	b := shape.Bounds()
	d.Clip(shape)
	for _, r := range hatchOf(family) {
		d.rule(b, r, ink)
	}
	d.Unclip()
}

// ruling is one set of parallel lines.
type ruling struct {
	deg, gap, shift float64
	dash            []float64
	weight          float64
}

func hatchOf(family string) []ruling {
	switch family {
	case "steel":
		return []ruling{{deg: 45, gap: 12}, {deg: 45, gap: 12, shift: 3}}
	case "cast-iron":
		return []ruling{{deg: 45, gap: 7}}
	case "aluminium":
		return []ruling{{deg: 45, gap: 14}, {deg: 45, gap: 14, shift: 7, dash: []float64{6, 4}}}
	case "magnesium":
		return []ruling{{deg: 45, gap: 9, dash: []float64{10, 4}}}
	case "titanium":
		return []ruling{{deg: -45, gap: 14}, {deg: -45, gap: 14, shift: 7, dash: []float64{6, 4}}}
	case "copper":
		return []ruling{{deg: -45, gap: 12}, {deg: -45, gap: 12, shift: 3}}
	case "nickel":
		return []ruling{{deg: 45, gap: 14}, {deg: 45, gap: 14, shift: 3}, {deg: 45, gap: 14, shift: 6}}
	case "zirconium":
		return []ruling{{deg: -45, gap: 9, dash: []float64{10, 4}}}
	case "heavy":
		return []ruling{{deg: 45, gap: 6}, {deg: -45, gap: 6}}
	case "concrete":
		return []ruling{{deg: 45, gap: 18, dash: []float64{2, 9}, weight: 2}, {deg: -20, gap: 14, dash: []float64{5, 13}}}
	case "mineral":
		return []ruling{{deg: 60, gap: 10, dash: []float64{4, 6}}, {deg: -60, gap: 10, dash: []float64{4, 6}}}
	case "liquid":
		return []ruling{{deg: 0, gap: 9, dash: []float64{14, 6}}}
	case "plastic":
		return []ruling{{deg: 45, gap: 14}, {deg: -45, gap: 14}}
	case "gas":
		return []ruling{{deg: 0, gap: 16, dash: []float64{1.5, 14}, weight: 1.5}}
	}
	return []ruling{{deg: 45, gap: 9}}
}

// rule draws the parallel lines of a ruling across a box.
func (d *Drawing) rule(b Rect, r ruling, ink Ink) {
	a := r.deg * math.Pi / 180
	along := Pt{math.Cos(a), -math.Sin(a)}
	across := along.turned()
	half := math.Hypot(b.W(), b.H())/2 + r.gap
	lo, hi := span(b, across)
	if gap := (hi - lo) / 300; gap > r.gap {
		r.gap = gap
	}
	var p Path
	for v := math.Floor(lo/r.gap)*r.gap + r.shift; v < hi; v += r.gap {
		m := across.Mul(v).Add(along.Mul(dot(b.Mid(), along)))
		p.MoveTo(m.Sub(along.Mul(half))).LineTo(m.Add(along.Mul(half)))
	}
	w := r.weight
	if w == 0 {
		w = Thin
	}
	if !p.Empty() {
		d.Stroke(p, w, ink, r.dash...)
	}
}

func dot(a, b Pt) float64 { return a.X*b.X + a.Y*b.Y }

// span is how far a box reaches along a direction.
func span(b Rect, dir Pt) (lo, hi float64) {
	lo, hi = math.Inf(1), math.Inf(-1)
	for _, q := range []Pt{{b.X0, b.Y0}, {b.X1, b.Y0}, {b.X0, b.Y1}, {b.X1, b.Y1}} {
		v := dot(q, dir)
		lo, hi = math.Min(lo, v), math.Max(hi, v)
	}
	return lo, hi
}

// Short fills a shape with the pattern of what falls short: wide, steep
// strokes in the boundary's ink.
func (d *Drawing) Short(shape Path) {
	d.Clip(shape)
	d.rule(shape.Bounds(), ruling{deg: 60, gap: 10}, Rope)
	d.Unclip()
}
