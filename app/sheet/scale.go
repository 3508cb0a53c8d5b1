package sheet

import (
	"math"

	"halfvalue/app/drafting"
	"halfvalue/exposure/plan"
)

// sight is the geometry of the side view: how millimetres of the setup stand
// in dp of the sheet. A long distance is cut short between two break lines;
// everything else keeps one scale.
type sight struct {
	view     drafting.Rect // where the drawing may stand
	cx       float64       // x of the central ray, dp
	scale    float64       // dp per mm
	source   float64       // y of focus or source, dp
	surface  float64       // y of the part's source side
	back     float64       // y of the part's far side
	film     float64       // y of the film
	cut      bool          // the distance from source to part is broken
	cutA     float64       // y of the upper break line
	cutB     float64       // y of the lower break line
	halfCone float64       // radians; 0 where the beam goes all round
}

// leastPart is how thick the part stands at least before a distance is broken.
const leastPart = 7.0

// newSight fits the setup of a normalised plan into a view.
func newSight(p plan.Plan, view drafting.Rect) sight {
	g := sight{view: view, cx: view.Mid().X}
	sfd, span, depth := p.Setup.SFDMM, p.SpanMM(), p.DepthMM()
	g.halfCone = halfCone(p)
	h := view.H()
	g.scale = math.Min(h/sfd, view.W()/math.Max(p.Part.ODMM*1.08, 1))
	if least := math.Min(leastPart, 0.2*h); depth*g.scale < least {
		g.scale = math.Min(least/depth, 0.45*h/span)
	}
	g.scale = math.Min(g.scale, view.W()/math.Max(p.Part.ODMM*1.08, 1))
	g.film = view.Y0 + math.Min(h, sfd*g.scale)
	g.source = view.Y0
	if drawn := sfd * g.scale; drawn < h {
		g.source = view.Y0 + (h-drawn)/2
		g.film = g.source + drawn
	} else if drawn > h*1.0001 {
		g.cut = true
	}
	g.surface = g.film - span*g.scale
	g.back = g.surface + depth*g.scale
	if g.cut {
		room := g.surface - g.source
		g.cutA, g.cutB = g.source+room*0.5, g.source+room*0.5+14
	}
	return g
}

// halfCone is half the opening of the beam in radians, 0 all round.
func halfCone(p plan.Plan) float64 {
	deg := 360.0
	switch {
	case p.Source.Tube != nil:
		deg = p.Source.Tube.ConeDeg
	case p.Source.Sealed != nil:
		deg = p.Source.Sealed.ConeDeg
	}
	if deg >= 175 {
		return 0
	}
	return deg / 2 * math.Pi / 180
}

// reach is half the width of the beam at a distance below the source that is
// true in mm, dp.
func (g sight) reach(mm float64) float64 {
	if g.halfCone == 0 {
		return math.Inf(1)
	}
	return mm * g.scale * math.Tan(g.halfCone)
}

// depthAt is the true distance from the source of a level of the sheet, mm.
func (g sight) depthAt(y float64, p plan.Plan) float64 {
	if g.cut && y >= g.cutB {
		return p.Setup.SFDMM - (g.film-y)/g.scale
	}
	return (y - g.source) / g.scale
}
