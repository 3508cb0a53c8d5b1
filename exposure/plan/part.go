package plan

import "math"

// TotalMM is the thickness of all layers on the central ray, mm.
func (p Part) TotalMM() float64 { return total(p.Layers) }

// TotalMM is the thickness of all layers of the section, mm.
func (s Section) TotalMM() float64 { return total(s.Layers) }

func total(layers []Layer) float64 {
	sum := 0.0
	for _, l := range layers {
		sum += l.MM
	}
	return sum
}

// DoubleWall tells that the beam crosses a whole pipe.
func (s Setup) DoubleWall() bool {
	return s.Kind == DoubleWallSingleImage || s.Kind == DoubleWallDoubleImage
}

// DepthMM is how much room the part takes along the central ray, mm: the sum
// of its layers, and with the double-wall setups at least the outside
// diameter, whose bore is no layer when it is empty.
func (p Plan) DepthMM() float64 {
	if p.Setup.DoubleWall() {
		return max(p.Part.TotalMM(), p.Part.ODMM)
	}
	return p.Part.TotalMM()
}

// GapMM is the room between part and film, mm. With the double-wall setups a
// bMM below the depth leaves the bore out.
func (p Plan) GapMM() float64 {
	depth, b := p.DepthMM(), p.Setup.BMM
	switch {
	case b == 0:
		return 0
	case b >= depth*(1-slack):
		return math.Max(0, b-depth)
	}
	return math.Max(0, b-p.Part.TotalMM())
}

// SpanMM is the distance from the source-side surface of the part to the film
// with the bore of a pipe counted, mm.
func (p Plan) SpanMM() float64 { return p.DepthMM() + p.GapMM() }
