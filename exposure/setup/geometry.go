package setup

import (
	"fmt"
	"math"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// Geometry is the setup of one plan in the standards' symbols.
type Geometry struct {
	Kind  string // as in the plan
	Image string
	Side  string

	DMM   float64 // d, source size
	SFDMM float64 // source to film
	FMM   float64 // f, source to the source-side surface of what is imaged
	BMM   float64 // b, that surface to the film
	TMM   float64 // t, nominal thickness: wall of a pipe, all layers of another part
	WMM   float64 // w, penetrated on the central ray: all layers

	DepthMM        float64 // room that the part takes on the central ray
	GapMM          float64 // part to film
	SourceToPartMM float64 // source to the first surface of the part; 0 inside a pipe
	Pipe           Pipe    // zero without one
	FromAxisMM     float64 // source to the axis of the pipe

	UgMM          float64 // geometric unsharpness of the source-side surface
	Magnification float64 // of that surface on the film
}

// Of derives the geometry of a valid plan. What is imaged is the film-side wall
// with double-wall-single-image (b = t + gap), the whole pipe with
// double-wall-double-image (b = De + gap), the wall with panoramic, and all
// layers with single-wall. The plan must be valid; what an invalid one gives is
// an error where f is not above 0 and otherwise undefined.
func Of(p plan.Plan) (Geometry, error) {
	n, _ := p.Normalised()
	g := Geometry{Kind: n.Setup.Kind, Image: n.Setup.Image, Side: n.Setup.Side, SFDMM: n.Setup.SFDMM, WMM: n.Part.TotalMM(), DepthMM: n.DepthMM(), GapMM: n.GapMM()}
	switch {
	case n.Source.Tube != nil:
		g.DMM = n.Source.Tube.FocusMM
	case n.Source.Sealed != nil:
		g.DMM = n.Source.Sealed.SizeMM
	}
	g.TMM = g.WMM
	if n.Part.ODMM > 0 {
		g.Pipe = Pipe{n.Part.ODMM, n.Part.WallMM}
		g.TMM = n.Part.WallMM
	}
	switch g.Kind {
	case plan.DoubleWallSingleImage:
		g.BMM = g.TMM + g.GapMM
	case plan.DoubleWallDoubleImage:
		g.BMM = n.SpanMM()
	default:
		g.BMM = n.Setup.BMM
	}
	g.FMM = g.SFDMM - g.BMM
	g.place(n)
	if !(g.FMM > 0) {
		return Geometry{}, fmt.Errorf("sfd %v mm leaves no distance to the part: want more than b, %v mm", g.SFDMM, g.BMM)
	}
	g.UgMM = UgMM(g.DMM, g.FMM, g.BMM)
	g.Magnification = Magnification(g.FMM, g.BMM)
	return g, nil
}

// place finds where the source stands to the pipe's axis and to the part.
func (g *Geometry) place(n plan.Plan) {
	g.SourceToPartMM = max(0, g.SFDMM-n.SpanMM())
	if g.Pipe == (Pipe{}) {
		return
	}
	outer := g.Pipe.Outer()
	switch {
	case g.Kind == plan.Panoramic, g.Side == plan.Inside:
		g.FromAxisMM = math.Abs(g.SFDMM - outer - g.GapMM)
		g.SourceToPartMM = 0
	case g.Kind == plan.SingleWall: // film inside, against the near wall
		g.FromAxisMM = g.SFDMM - n.Setup.BMM + outer
	default:
		g.FromAxisMM = g.SFDMM - g.GapMM - outer
	}
}

// Ring tells how the source looks at the pipe, for RunAround.
func (g Geometry) Ring() Ring {
	switch {
	case g.Kind == plan.SingleWall && g.Side != plan.Inside:
		return Near
	case g.Side == plan.Inside && g.SFDMM < g.Pipe.Outer()+g.GapMM:
		return NearInside
	}
	return Far
}

// Run gives the shots round the pipe within K, with the overlap on the weld's
// surface. It errs without a pipe, and with double-wall-double-image, whose
// number of shots is a rule of the code and no geometry.
func (g Geometry) Run(k, overlapMM float64) (Run, error) {
	switch {
	case g.Pipe == (Pipe{}):
		return Run{}, fmt.Errorf("number of shots: the part is no pipe: want odMM and wallMM")
	case g.Kind == plan.DoubleWallDoubleImage:
		return Run{}, fmt.Errorf("number of shots: double-wall-double-image shows both walls: the rules give the number")
	}
	return g.Pipe.RunAround(g.Ring(), g.FromAxisMM, k, g.GapMM, overlapMM)
}

// Working gives the steps behind the geometry.
func (g Geometry) Working() []working.Step {
	mm := func(symbol, name string, v float64) working.Input {
		return working.Input{Symbol: symbol, Name: name, Value: v, Unit: "mm"}
	}
	const exact = "geometry, exact"
	return []working.Step{
		{ID: "setup.f", Name: "source to part", Symbol: "f", Formula: "f = SFD - b", Inputs: []working.Input{mm("SFD", "source to film", g.SFDMM), mm("b", "source-side surface to film", g.BMM)},
			Value: g.FMM, Unit: "mm", Source: exact, Note: imaged[g.Kind]},
		{ID: "setup.ug", Name: "geometric unsharpness", Symbol: "Ug", Formula: "Ug = d b/f", Inputs: []working.Input{mm("d", "source size", g.DMM), mm("b", "source-side surface to film", g.BMM), mm("f", "source to part", g.FMM)},
			Value: g.UgMM, Unit: "mm", Source: exact, Note: "at the source-side surface of what is imaged; less nearer to the film"},
		{ID: "setup.magnification", Name: "magnification", Symbol: "M", Formula: "M = SFD/f", Inputs: []working.Input{mm("SFD", "source to film", g.SFDMM), mm("f", "source to part", g.FMM)},
			Value: g.Magnification, Source: exact},
	}
}

var imaged = map[string]string{
	plan.SingleWall:            "b runs from the source-side surface of the part",
	plan.DoubleWallSingleImage: "b runs from the source-side surface of the wall at the film",
	plan.DoubleWallDoubleImage: "b runs across the whole pipe",
	plan.Panoramic:             "b runs from the inner surface of the wall",
}
