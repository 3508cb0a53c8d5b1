package boundary

import "math"

// tubePieces is how many pieces the guide tube is cut into.
const tubePieces = 12

// Bare gives the largest rate at q while a sealed source is bare on its way
// between container and place, all directions: the worst moment. For a tube,
// and for a source that has no collimator and no container, it is Exposed.
func (f *Field) Bare(q Vec) float64 {
	if !f.bareDiffers {
		return f.Exposed(q).Total()
	}
	worst := 0.0
	f.alongTube(func(a, b Vec) {
		worst = max(worst, f.bareFrom(nearestOn(a, b, q), a, b, q))
	})
	if !f.noScatter {
		worst += f.offGround(q, f.bareGround, f.barePatches)
	}
	return worst * f.factor
}

// alongTube goes over the pieces of the guide tube, taken as straight; only
// the source's own place where no container is stated.
func (f *Field) alongTube(each func(a, b Vec)) {
	c := f.site.Container
	if c == nil {
		each(f.focus, f.focus)
		return
	}
	way := Vec{c.XM, c.YM, f.focus.Z}.minus(f.focus)
	for i := range tubePieces {
		a := f.focus.plus(way.times(float64(i) / tubePieces))
		each(a, f.focus.plus(way.times(float64(i+1)/tubePieces)))
	}
}

// bareFrom is the bare source at s, on the piece a to b of the tube: what of
// the piece's ends and s passes the walls best counts.
func (f *Field) bareFrom(s, a, b, q Vec) float64 {
	r := max(s.distance(q), leastDistanceM)
	pass := f.shields.pass(s, q, ofBeam)
	if a != b && pass < 1 {
		pass = max(pass, f.shields.pass(a, q, ofBeam), f.shields.pass(b, q, ofBeam))
	}
	h := f.openAt1m / (r * r)
	if f.noScatter {
		return h * pass
	}
	return h*pass + min(f.skyAllRound.rate(1, r), h/2)*(1-pass)
}

func nearestOn(a, b, q Vec) Vec {
	d := b.minus(a)
	n := d.dot(d)
	if n == 0 {
		return a
	}
	return a.plus(d.times(max(0, min(1, q.minus(a).dot(d)/n))))
}

// TransitDoseUSv gives the dose at q of one way between container and place,
// exact along each straight piece: the source goes at the stated speed, and a
// tube that is longer than the straight way keeps it as much longer.
// Nothing without a container.
func (f *Field) TransitDoseUSv(q Vec) float64 {
	c := f.site.Container
	if c == nil {
		return 0
	}
	end := Vec{c.XM, c.YM, f.focus.Z}
	straight := max(end.distance(f.focus), 1e-3)
	secondsPerM := c.TubeM / straight / c.SpeedMPerS
	var sum float64
	f.alongTube(func(a, b Vec) {
		length := a.distance(b)
		if length == 0 {
			return
		}
		d := b.minus(a).times(1 / length)
		from := q.minus(a).dot(d)
		off := max(q.minus(a.plus(d.times(from))).length(), leastDistanceM)
		line := (math.Atan((length-from)/off) + math.Atan(from/off)) / off // integral of ds / r2
		mean := line / length
		near := nearestOn(a, b, q)
		sum += f.bareFrom(near, a, b, q) * (mean * math.Pow(max(near.distance(q), leastDistanceM), 2)) * length * secondsPerM / 3600
	})
	if !f.noScatter {
		sum += f.offGround(q, f.bareGround, f.barePatches) * c.TubeM / c.SpeedMPerS / 3600
	}
	return sum * f.factor
}

// Stored gives the rate at q with the source in its container; 0 for a tube or
// where no container is stated. No wall is counted.
func (f *Field) Stored(q Vec) float64 {
	c := f.site.Container
	if c == nil {
		return 0
	}
	r := max(q.distance(Vec{c.XM, c.YM, f.focus.Z}), leastDistanceM)
	return c.StoredUSvPerHAt1m / (r * r)
}
