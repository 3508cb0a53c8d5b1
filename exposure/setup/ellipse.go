package setup

import (
	"fmt"
	"math"
)

// Ellipse is a shot on a small pipe that shows both walls beside each other.
type Ellipse struct {
	OffsetMM float64 // of the source along the pipe from the plane of the weld
	TiltDeg  float64 // of the ray through the middle of the pipe
	OpenMM   float64 // between the two images of the weld, on the film
	Upper    float64 // magnification of the source-side outer surface
	Lower    float64 // magnification of the film-side outer surface
}

// EllipseFor finds the offset of the source at which the two images of a weld
// of the given width lie openMM apart (edge to edge, on the film). The film is
// flat, gapMM below the pipe; sfdMM is along the normal of the film. Exact: a
// point h above the film shows SFD/(SFD-h) times as large and h/(SFD-h) times
// the offset to the far side.
func (p Pipe) EllipseFor(sfdMM, gapMM, weldMM, openMM float64) (Ellipse, error) {
	top := gapMM + p.ODMM
	if !(sfdMM > top) {
		return Ellipse{}, fmt.Errorf("sfd %v mm is out of range: want more than %v mm, the pipe and its gap", sfdMM, top)
	}
	if !(weldMM >= 0 && openMM >= 0 && gapMM >= 0) {
		return Ellipse{}, fmt.Errorf("weld %v mm, opening %v mm, gap %v mm: want 0 or more", weldMM, openMM, gapMM)
	}
	upper, lower := sfdMM/(sfdMM-top), sfdMM/(sfdMM-gapMM)
	offset := (openMM + weldMM*(upper+lower)/2) / (upper - lower)
	return Ellipse{OffsetMM: offset, OpenMM: openMM, Upper: upper, Lower: lower,
		TiltDeg: degrees(math.Atan(offset / (sfdMM - gapMM - p.ODMM/2)))}, nil
}

// OpenAt is the inverse: how far apart the images lie with the source offsetMM
// along the pipe; negative where they overlap.
func (p Pipe) OpenAt(offsetMM, sfdMM, gapMM, weldMM float64) float64 {
	upper, lower := sfdMM/(sfdMM-gapMM-p.ODMM), sfdMM/(sfdMM-gapMM)
	return offsetMM*(upper-lower) - weldMM*(upper+lower)/2
}

// EllipseThroughMM is the metal that the ray through the middle of the pipe
// passes with the source offsetMM along the pipe, both walls, mm: longer than
// 2 t by the tilt.
func (p Pipe) EllipseThroughMM(offsetMM, sfdMM, gapMM float64) float64 {
	height := sfdMM - gapMM - p.ODMM/2
	source := Vec{Y: offsetMM, Z: height}
	return ThroughMM(p, Ray{source, source.Times(-1)})
}
