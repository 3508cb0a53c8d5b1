package setup

import (
	"fmt"
	"math"
)

// ConeHalfDeg is the half angle of the beam that a flat film of the given size,
// centred on the central ray and square to it, asks for: to its corners.
func ConeHalfDeg(sfdMM, lengthMM, widthMM float64) float64 {
	return degrees(math.Atan(math.Hypot(lengthMM, widthMM) / 2 / sfdMM))
}

// ConeHalfDeg is the half angle at the source that what the run shows asks for,
// across the pipe; the width of the film along the pipe is not in it.
func (r Run) ConeHalfDeg(p Pipe, fromAxisMM float64) float64 {
	if r.N == 1 {
		return 180
	}
	place := p.Place(math.Pi/float64(r.N) + r.OverlapMM/p.Outer())
	return degrees(math.Atan2(math.Abs(place.X), fromAxisMM-place.Z))
}

// ConeRadiusMM is how far from the central ray the beam reaches on a film
// square to it; infinite from a half angle of 90 deg.
func ConeRadiusMM(coneDeg, sfdMM float64) float64 {
	if coneDeg >= 180 {
		return math.Inf(1)
	}
	return sfdMM * math.Tan(radians(coneDeg)/2)
}

// TravelShare is the time that a source spends in its guide tube, out and back,
// over the exposure time. It errs on figures that are not above 0.
func TravelShare(tubeMM, speedMMPerS, exposureS float64) (float64, error) {
	if !(tubeMM > 0 && speedMMPerS > 0 && exposureS > 0) {
		return 0, fmt.Errorf("guide tube %v mm, speed %v mm/s, exposure %v s: want all above 0", tubeMM, speedMMPerS, exposureS)
	}
	return 2 * tubeMM / speedMMPerS / exposureS, nil
}

// BendRoomMM is the width that a guide tube takes while it turns by turnDeg at
// its least bending radius (of its middle line): r (1 - cos turn) + tube.
func BendRoomMM(tubeODMM, leastRadiusMM, turnDeg float64) float64 {
	return leastRadiusMM*(1-math.Cos(radians(turnDeg))) + tubeODMM
}

// Room is what stands free round the part.
type Room struct {
	BeforeMM float64 // from the source-side surface of the part to the next thing behind the source
	BehindMM float64 // from the far surface of the part to the next thing
}

// Needs is what the equipment takes up.
type Needs struct {
	BehindFocusMM float64 // of head, container or guide tube, behind the focus
	CassetteMM    float64 // thickness of the loaded cassette with its back lead
	HandMM        float64 // to reach in and tape the film
}

// Fits tells whether source and film have room: the first reason why not, or
// "".
func (r Room) Fits(g Geometry, n Needs) string {
	if need := g.SourceToPartMM + n.BehindFocusMM; r.BeforeMM < need {
		return fmt.Sprintf("source does not fit before the part: %.4g mm needed, %.4g mm free", need, r.BeforeMM)
	}
	if need := g.GapMM + n.CassetteMM + n.HandMM; r.BehindMM < need {
		return fmt.Sprintf("film cannot be reached behind the part: %.4g mm needed, %.4g mm free", need, r.BehindMM)
	}
	return ""
}
