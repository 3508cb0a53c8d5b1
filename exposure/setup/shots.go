package setup

import (
	"fmt"
	"math"
)

// Ring tells how the source looks at the part of a round weld that a shot
// shows.
type Ring int

// The ways round a pipe.
const (
	// Far: through to the wall opposite, from outside (double wall single
	// image) or from inside off the axis (one wall only).
	Far Ring = iota
	// Near: the wall towards a source outside, film inside.
	Near
	// NearInside: the wall nearest to a source inside, film outside.
	NearInside
)

// Shots is a run round a pipe.
type Shots struct {
	Exact    float64 // 180 / HalfDeg, not rounded: 6.22
	N        int     // rounded up: 7
	HalfDeg  float64 // central angle either side of the middle of a shot within which the wall passed is at most K t
	PitchDeg float64 // 360 / N
	Theta    float64 // rad, between ray and normal at the outer surface where the path in the wall is K t
	Eta      float64 // rad, at the source, between the middle ray and the ray to that place
}

// Theta is the angle, rad, between a ray and the normal at the outer surface of
// a pipe at which its path in the wall is k times the wall:
// cos theta = [1 + (k^2-1) t/De]/k, exact (law of cosines). Beyond it the path is
// longer. k must be above 1. Where the wall is so thick that no ray into the
// bore passes k walls, t/De above 1/(1+k^2), it is the angle of the ray that
// touches the bore: beyond it there is no bore to speak of.
func (p Pipe) Theta(k float64) float64 {
	if (1+k*k)*p.WallMM >= p.ODMM {
		return math.Asin(p.Inner() / p.Outer())
	}
	return math.Acos((1 + (k*k-1)*p.WallMM/p.ODMM) / k)
}

// ShotsAround gives the number of shots round the pipe with the source
// fromAxisMM off its axis, so that no place of the weld is seen through more than
// k walls: ISO 17636-1 annex A, from memory, and derived anew. k is 1.1 or 1.2
// there. It errs on a k that is not above 1, on a source inside the wall, and on
// Near and NearInside from the wrong side of it.
//
// Far: half angle = theta + arcsin(sin theta / e), e the distance in outer radii;
// where the arcsine has no value every ray is within k and one shot does.
// Near: theta - arcsin(sin theta / e). NearInside: arcsin(sin theta / e) - theta.
func (p Pipe) ShotsAround(way Ring, fromAxisMM, k float64) (Shots, error) {
	if !(k > 1 && k < 10) {
		return Shots{}, fmt.Errorf("thickness rise K %v is out of range: want above 1, at most 10", k)
	}
	if !(p.WallMM > 0 && p.WallMM < p.ODMM/2) {
		return Shots{}, fmt.Errorf("pipe %v x %v mm has no bore: want a wall below half the diameter", p.ODMM, p.WallMM)
	}
	outside, inside := fromAxisMM >= p.Outer(), fromAxisMM >= 0 && fromAxisMM <= p.Inner()
	if way == Near && !outside || way == NearInside && !inside || way == Far && !outside && !inside {
		return Shots{}, fmt.Errorf("source %v mm off the axis of a pipe %v x %v mm is on the wrong side of the wall", fromAxisMM, p.ODMM, p.WallMM)
	}
	theta := p.Theta(k)
	s := Shots{Theta: theta, HalfDeg: 180}
	if sin := p.Outer() * math.Sin(theta) / fromAxisMM; sin < 1 {
		s.Eta = math.Asin(sin)
		switch way {
		case Far:
			s.HalfDeg = degrees(theta + s.Eta)
		case Near:
			s.HalfDeg = degrees(theta - s.Eta)
		case NearInside:
			s.HalfDeg = degrees(s.Eta - theta)
		}
	}
	s.Exact = 180 / s.HalfDeg
	if !(s.Exact <= mostShots) {
		return Shots{}, fmt.Errorf("source %v mm off the axis of a pipe %v x %v mm is so near the wall that a run takes more than %d shots", fromAxisMM, p.ODMM, p.WallMM, mostShots)
	}
	s.N = wholeUp(s.Exact)
	s.PitchDeg = 360 / float64(s.N)
	return s, nil
}

// mostShots bounds a run that anybody would shoot.
const mostShots = 10000

// wholeUp rounds up; a number that is whole on paper stays.
func wholeUp(x float64) int { return int(math.Ceil(x * (1 - 1e-12))) }

func degrees(rad float64) float64 { return rad * 180 / math.Pi }
func radians(deg float64) float64 { return deg * math.Pi / 180 }

// Place is the point of the outer surface at a central angle, rad, from the
// direction of -Z, where a film lies opposite to a source on +Z.
func (p Pipe) Place(angle float64) Vec {
	return Vec{X: p.Outer() * math.Sin(angle), Z: -p.Outer() * math.Cos(angle)}
}

// Run is the films of a run: how long each must be and where its marks stand.
type Run struct {
	Shots
	OverlapMM float64 // on the surface of the weld, at either end of a film
	ArcMM     float64 // of weld that one shot answers for, on the outer surface
	FilmMM    float64 // length of film that a shot needs, overlap at both ends included, along the film
	ShownMM   float64 // of film within K t, the most that may be read
}

// RunAround lays films against the pipe, gapMM off its outer surface (its inner
// with Near), bent round it. The overlap is measured on the outer surface, and
// must fit in what is within k, else there are more shots.
func (p Pipe) RunAround(way Ring, fromAxisMM, k, gapMM, overlapMM float64) (Run, error) {
	s, err := p.ShotsAround(way, fromAxisMM, k)
	if err != nil {
		return Run{}, err
	}
	if !(overlapMM >= 0 && gapMM >= 0) {
		return Run{}, fmt.Errorf("overlap %v mm, film gap %v mm: want 0 or more", overlapMM, gapMM)
	}
	lap := overlapMM / p.Outer() // rad
	half := radians(s.HalfDeg)
	if s.HalfDeg < 180 {
		if lap >= half {
			return Run{}, fmt.Errorf("overlap %v mm is out of range: want less than %.4g mm, half of what a shot shows", overlapMM, half*p.Outer())
		}
		s.N = max(s.N, wholeUp(math.Pi/(half-lap)))
		s.PitchDeg = 360 / float64(s.N)
	}
	r := Run{Shots: s, OverlapMM: overlapMM, ArcMM: 2 * math.Pi * p.Outer() / float64(s.N)}
	film := func(angle float64) float64 { return 2 * p.filmArc(way, fromAxisMM, gapMM, min(angle, math.Pi)) }
	r.FilmMM, r.ShownMM = film(math.Pi/float64(s.N)+lap), film(half)
	if s.N == 1 {
		r.FilmMM = 2*math.Pi*(p.Outer()+gapMM) + 2*overlapMM
	}
	return r, nil
}

// filmArc is the length along the bent film from its middle to where the ray
// through the place at the central angle meets it.
func (p Pipe) filmArc(way Ring, fromAxisMM, gapMM, angle float64) float64 {
	source := Vec{Z: fromAxisMM}
	radius := p.Outer() + gapMM
	place := p.Place(angle)
	middle := -1.0 // direction of the film's middle on Z
	if way != Far {
		place = Vec{X: p.Outer() * math.Sin(angle), Z: p.Outer() * math.Cos(angle)}
		middle = 1
	}
	if way == Near {
		radius = p.Inner() - gapMM
	}
	u := place.Sub(source)
	u = u.Times(1 / u.Len())
	b := source.Dot(u)
	under := b*b - source.Dot(source) + radius*radius
	if under < 0 {
		return radius * angle
	}
	hit := -b + math.Sqrt(under)
	if way == Near {
		hit = -b - math.Sqrt(under)
	}
	q := source.Add(u.Times(hit))
	return radius * math.Abs(math.Atan2(q.X, middle*q.Z))
}

// PlateHalfMM is half the length of a flat film, mm, within which a plate is
// seen through at most k times its thickness: SFD sqrt(k^2-1).
func PlateHalfMM(sfdMM, k float64) float64 { return sfdMM * math.Sqrt((k-1)*(k+1)) }

// ShotsAlong is the number of shots along a straight weld of a plate, each
// showing 2 PlateHalfMM of film; the weld's share is less by the magnification
// SFD/(SFD-b) and by the overlap on the weld at either end.
func ShotsAlong(weldMM, sfdMM, bMM, overlapMM, k float64) (int, error) {
	shown := 2*PlateHalfMM(sfdMM, k)*(sfdMM-bMM)/sfdMM - 2*overlapMM
	if !(shown > 0) {
		return 0, fmt.Errorf("a shot at SFD %v mm shows nothing beyond an overlap of %v mm: want a longer SFD or less overlap", sfdMM, overlapMM)
	}
	return max(1, wholeUp(weldMM/shown)), nil
}
