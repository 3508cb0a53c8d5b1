package boundary

import (
	"math"
	"slices"
	"sync"
)

// Contour is where one limit is met all round the source.
type Contour struct {
	Limit       string    `json:"limit"`
	LevelM      float64   `json:"levelM"`      // height above ground
	BearingsDeg []float64 `json:"bearingsDeg"` // rising, clockwise from north, 0 to 360
	Metres      []float64 `json:"metres"`      // outermost crossing on each bearing from the source, unrounded, without spread; 1 m where it is nearer
	RopeMetres  []float64 `json:"ropeMetres"`  // the same with the output's uncertainty: where the rope stands
	Islands     []Island  `json:"islands,omitempty"`
	WorstM      float64   `json:"worstM"` // of RopeMetres
	WorstDeg    float64   `json:"worstDeg"`
	AreaM2      float64   `json:"areaM2"`      // inside the rope
	RopeLengthM float64   `json:"ropeLengthM"` // round the rope's corners
}

// Island is a bearing with further crossings inside the outermost: it goes in
// and out of a wall's shadow.
type Island struct {
	BearingDeg float64   `json:"bearingDeg"`
	Metres     []float64 `json:"metres"` // falling, the outermost among them
}

// LeastRopeM is the nearest that a boundary is given.
const LeastRopeM = 1

const farthestM = 1e5

// Contour finds where level is met on n bearings and on those where walls and
// beam begin and end. Roots are exact and none is skipped; see crossings.
func (f *Field) Contour(l Level, n int) Contour { return f.ContourAt(l, f.site.LevelM, n) }

// ContourAt is Contour at another height above ground.
func (f *Field) ContourAt(l Level, levelM float64, n int) Contour {
	c := Contour{Limit: l.Name, LevelM: levelM, BearingsDeg: f.bearings(n)}
	m := len(c.BearingsDeg)
	c.Metres, c.RopeMetres = make([]float64, m), make([]float64, m)
	crossings := make([][]float64, m)
	s := f.search(l, levelM)
	inParallel(m, func(i int) {
		deg := c.BearingsDeg[i]
		crossings[i] = s.crossings(deg, l.USvPerH, s.outsideM, LeastRopeM)
		c.Metres[i] = outermost(crossings[i])
		rope := s.crossings(deg, l.USvPerH/s.spread, s.ropeOutsideM, c.Metres[i])
		c.RopeMetres[i] = max(c.Metres[i], outermost(rope))
	})
	for i, x := range crossings {
		if len(x) > 1 {
			c.Islands = append(c.Islands, Island{c.BearingsDeg[i], x})
		}
	}
	c.measure()
	return c
}

// Distance gives the outermost crossing on one bearing, m.
func (f *Field) Distance(l Level, bearingDeg float64) float64 {
	s := f.search(l, f.site.LevelM)
	return outermost(s.crossings(bearingDeg, l.USvPerH, s.outsideM, LeastRopeM))
}

func outermost(crossings []float64) float64 {
	if len(crossings) == 0 {
		return LeastRopeM
	}
	return max(LeastRopeM, crossings[0])
}

func inParallel(n int, do func(i int)) {
	const workers = 4
	var wait sync.WaitGroup
	for w := range workers {
		wait.Go(func() {
			for i := w; i < n; i += workers {
				do(i)
			}
		})
	}
	wait.Wait()
}

// bearings gives n even bearings, counted from the beam's, and both sides of
// every direction where something begins or ends.
func (f *Field) bearings(n int) []float64 {
	var list []float64
	add := func(deg float64) { list = append(list, math.Mod(math.Mod(deg, 360)+360, 360)) }
	beam := f.site.Beam.BearingDeg
	for i := range n {
		add(beam + float64(i)*360/float64(n))
	}
	edge := func(deg float64) { add(deg - edgeDeg); add(deg + edgeDeg) }
	if half := acosDeg(f.cosHalf); half < 180 && f.axis.Z == 0 {
		edge(beam - half)
		edge(beam + half)
	}
	for i := range f.shields.legs {
		l := &f.shields.legs[i]
		for _, e := range [2]Vec{{X: l.ax, Y: l.ay}, {X: l.ax + l.dx, Y: l.ay + l.dy}} {
			edge(math.Atan2(e.X-f.focus.X, e.Y-f.focus.Y) * 180 / math.Pi)
		}
	}
	slices.Sort(list)
	return slices.Compact(list)
}

// edgeDeg is how near to an edge its two bearings are: 2 mm at 100 m.
const edgeDeg = 1e-3

// measure fills in worst distance, area and length of the rope.
func (c *Contour) measure() {
	n := len(c.BearingsDeg)
	for i, r := range c.RopeMetres {
		if r > c.WorstM {
			c.WorstM, c.WorstDeg = r, c.BearingsDeg[i]
		}
		j := (i + 1) % n
		turn := math.Mod(c.BearingsDeg[j]-c.BearingsDeg[i]+360, 360)
		s := c.RopeMetres[j]
		c.AreaM2 += r * s * sinDeg(turn) / 2
		c.RopeLengthM += math.Sqrt(max(0, r*r+s*s-2*r*s*cosDeg(turn)))
	}
}

// search finds crossings of one level on the bearings of one field.
type search struct {
	f                      *Field
	level                  Level
	levelM                 float64
	offsetM                float64 // of what scatters or travels beside the source
	others                 []Vec   // sources beside the focus
	spread                 float64
	outsideM, ropeOutsideM float64 // the level, and with the spread the rope, is met from here on
}

func (f *Field) search(l Level, levelM float64) *search {
	s := &search{f: f, level: l, levelM: levelM}
	if !f.noScatter {
		s.others = append(s.others, f.part)
	}
	if f.bareDiffers {
		f.alongTube(func(a, b Vec) { s.others = append(s.others, b) })
	}
	for _, o := range s.others {
		s.offsetM = max(s.offsetM, math.Hypot(o.X-f.focus.X, o.Y-f.focus.Y))
	}
	s.spread = 1 + f.in.spread()
	s.outsideM, s.ropeOutsideM = s.outside(l.USvPerH), s.outside(l.USvPerH/s.spread)
	return s
}

func (s *search) place(u Vec, r float64) Vec {
	return Vec{s.f.focus.X + r*u.X, s.f.focus.Y + r*u.Y, s.levelM}
}

// outside gives a distance beyond which the level is met in every direction.
func (s *search) outside(allowed float64) float64 {
	f := s.f
	total := f.openAt1m + f.leakAt1m
	perM := 0.0
	if !f.noScatter {
		total += slices.Max(f.scatterAt1m) + math.Exp(slices.Max(f.bareGround.lnR2H)) + math.Exp(slices.Max(f.ground.lnR2H))
		perM = slices.Max(f.skyBeam.k[0][:]) + f.skyAllRound.k[0][0]*(1+f.leakShare)
	}
	stored := 0.0
	if c := f.site.Container; c != nil {
		stored = c.StoredUSvPerHAt1m
	}
	bound := func(r float64) float64 {
		d := r - s.offsetM
		h := (total/(d*d) + min(perM/d, total/(d*d))) * f.factor
		if s.level.worst {
			return h
		}
		return h*(s.level.share+s.transitHours()) + stored/(d*d)
	}
	r := s.offsetM + LeastRopeM
	for bound(r) > allowed && r < farthestM {
		r *= 1.2
	}
	return r
}

func (s *search) transitHours() float64 {
	c := s.f.site.Container
	if c == nil {
		return 0
	}
	return max(1, s.level.shots) * 2 * c.TubeM / c.SpeedMPerS / 3600
}

// crossings gives the distances above inner where the level passes allowed on
// a bearing, from the outermost inward.
//
// Between two breaks the level falls with distance: every part of the field
// does, for walls, cone and shadows change at breaks only and the ground's
// table is made so. So one look at either end of each stretch is enough.
func (s *search) crossings(bearingDeg, allowed, outside, inner float64) []float64 {
	u := direction(bearingDeg, 0)
	at := func(r float64) float64 { return s.f.At(s.level, s.place(u, r)) / allowed }
	var found []float64
	hi := outside
	vHi := at(hi)
	for _, b := range append(s.breaks(u, outside, inner), inner) {
		lo := b
		if b != inner {
			lo = b * (1 + breakSide)
		}
		if lo < hi {
			vLo := at(lo)
			if (vLo > 1) != (vHi > 1) {
				found = append(found, root(at, lo, vLo, hi, vHi))
			}
			hi, vHi = lo, vLo
		}
		if b == inner {
			break
		}
		v := at(b * (1 - breakSide))
		if (v > 1) != (vHi > 1) {
			found = append(found, b)
		}
		hi, vHi = b*(1-breakSide), v
	}
	return found
}

// breakSide is how near to a break its two sides are looked at, as a share.
const breakSide = 1e-9

// root finds where at is 1 between lo and hi, whose values stand on both
// sides, to 1e-10 of the distance: the secant of the logarithms, the end that
// stays halved (Illinois).
func root(at func(float64) float64, lo, vLo, hi, vHi float64) float64 {
	a, b := math.Log(lo), math.Log(hi)
	fa, fb := math.Log(vLo), math.Log(vHi)
	side := 0
	for range 60 {
		m := (a*fb - b*fa) / (fb - fa)
		if b-a < 1e-10 || !(m > a && m < b) {
			break
		}
		fm := math.Log(at(math.Exp(m)))
		if math.Abs(fm) < 1e-10 {
			return math.Exp(m)
		}
		if (fm > 0) == (fa > 0) {
			a, fa = m, fm
			if side == 1 {
				fb /= 2
			}
			side = 1
		} else {
			b, fb = m, fm
			if side == 2 {
				fa /= 2
			}
			side = 2
		}
	}
	return math.Exp(b)
}

// breaks gives the distances below r, falling, where the level may jump: at
// walls, at the edges of their shadows and of the beam.
func (s *search) breaks(u Vec, most, least float64) []float64 {
	var list []float64
	add := func(r float64) {
		if r > least && r < most {
			list = append(list, r)
		}
	}
	f := s.f
	for i := range f.shields.legs {
		l := &f.shields.legs[i]
		if l.material < 0 {
			continue
		}
		s.legBreaks(l, u, most, add)
	}
	if s.levelM != f.focus.Z || f.axis.Z != 0 {
		s.coneBreaks(u, add)
	}
	s.looks(least, most, add)
	slices.SortFunc(list, func(a, b float64) int {
		switch {
		case a > b:
			return -1
		case a < b:
			return 1
		}
		return 0
	})
	return list
}

func (s *search) legBreaks(l *leg, u Vec, most float64, add func(float64)) {
	f := s.f
	o := f.focus
	if at, _, ok := (&leg{ax: l.ax, ay: l.ay, dx: l.dx, dy: l.dy, nx: l.nx, ny: l.ny, heightM: math.Inf(1)}).hit(Vec{o.X, o.Y, 0}, u.times(most)); ok {
		d := at * most
		add(d)
		if s.levelM != o.Z && l.heightM != o.Z {
			add(d * (s.levelM - o.Z) / (l.heightM - o.Z)) // where the ray clears the top
		}
	}
	for _, src := range s.others {
		if src == o {
			continue
		}
		for _, e := range [2]Vec{{X: l.ax, Y: l.ay}, {X: l.ax + l.dx, Y: l.ay + l.dy}} {
			wx, wy := e.X-src.X, e.Y-src.Y
			cross := u.X*wy - u.Y*wx
			if cross == 0 {
				continue
			}
			sx, sy := src.X-o.X, src.Y-o.Y
			if (sx*u.Y-sy*u.X)/cross < 1-1e-12 { // behind the end, seen from the source
				continue
			}
			add((sx*wy - sy*wx) / cross)
		}
	}
}

// looks adds distances where the level may not fall with distance: beside what
// stands off the source, and where walls are passed over at a slant.
func (s *search) looks(least, most float64, add func(float64)) {
	to := min(most, 2*s.offsetM+0.1)
	if s.levelM != s.f.focus.Z {
		to = most
	}
	for r := least * lookRatio; r < to; r *= lookRatio {
		add(r)
	}
}

const lookRatio = 1.08

// coneBreaks adds where the bearing enters or leaves the cone.
func (s *search) coneBreaks(u Vec, add func(float64)) {
	f := s.f
	z := s.levelM - f.focus.Z
	a, c2 := u.dot(f.axis), f.cosHalf*f.cosHalf
	p := a*a - c2
	q := 2 * a * z * f.axis.Z
	k := z*z*f.axis.Z*f.axis.Z - c2*z*z
	if p == 0 {
		if q != 0 {
			add(-k / q)
		}
		return
	}
	if d := q*q - 4*p*k; d >= 0 {
		add((-q + math.Sqrt(d)) / (2 * p))
		add((-q - math.Sqrt(d)) / (2 * p))
	}
}
