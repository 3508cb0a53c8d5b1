package setup

import (
	"fmt"
	"math"
)

// Inside is one exposure of a whole round weld with the source in the pipe and
// the film all round it.
type Inside struct {
	OffMM       float64 // source off the axis
	NearFMM     float64 // source to the nearest inner surface, least f
	NearSFDMM   float64 // source to the film there
	FarSFDMM    float64 // source to the film opposite
	MostWallMM  float64 // longest path of a ray in the wall
	RateRatio   float64 // exposure rate at the near film over that at the far one, by inverse square alone
	UnsharpMost float64 // Ug at the near wall over the source size d: b/f
}

// Panorama gives the geometry with the source offMM off the axis and the film
// gapMM off the outer surface. It errs on a source outside the bore.
func (p Pipe) Panorama(offMM, gapMM float64) (Inside, error) {
	if !(offMM >= 0 && offMM < p.Inner()) {
		return Inside{}, fmt.Errorf("source %v mm off the axis is out of range: want 0 to less than %v mm, the bore", offMM, p.Inner())
	}
	if !(gapMM >= 0) {
		return Inside{}, fmt.Errorf("film gap %v mm is out of range: want 0 or more", gapMM)
	}
	film := p.Outer() + gapMM
	in := Inside{OffMM: offMM, NearFMM: p.Inner() - offMM, NearSFDMM: film - offMM, FarSFDMM: film + offMM}
	// The path is longest where the ray leaves at right angles to the offset:
	// there its distance from the axis is the offset.
	in.MostWallMM = math.Sqrt((p.Outer()-offMM)*(p.Outer()+offMM)) - math.Sqrt((p.Inner()-offMM)*(p.Inner()+offMM))
	in.RateRatio = (in.FarSFDMM / in.NearSFDMM) * (in.FarSFDMM / in.NearSFDMM)
	in.UnsharpMost = (p.WallMM + gapMM) / in.NearFMM
	return in, nil
}

// MostOffMM is how far off the axis the source may stand while every ray
// passes at most k walls; the whole bore where that always holds.
func (p Pipe) MostOffMM(k float64) float64 {
	return min(p.Outer()*math.Sin(p.Theta(k)), p.Inner())
}
