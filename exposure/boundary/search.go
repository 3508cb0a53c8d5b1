package boundary

import (
	"math"
	"slices"
)

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

func (f *Field) search(l Level) *search {
	s := &search{f: f, level: l, levelM: f.site.LevelM}
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
		total += slices.Max(f.scatterAt1m[:]) + math.Exp(slices.Max(f.bareGround.lnR2H)) + math.Exp(slices.Max(f.ground.lnR2H))
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

// ray is one bearing of a search; it is turned from one to the next.
type ray struct {
	s       *search
	u       Vec
	field   Field // with only the walls that matter on the bearing
	shields shields
	breaks  []float64 // falling
	wallsTo float64   // the nearest break that walls or the cone make
}

func (s *search) ray() *ray {
	r := &ray{s: s, field: *s.f, shields: *s.f.shields}
	r.field.shields = &r.shields
	r.shields.legs = nil
	return r
}

// turn points the ray along a bearing, with its breaks out to most.
func (r *ray) turn(bearingDeg, most float64) {
	r.u = direction(bearingDeg, 0)
	r.face()
	r.findBreaks(most)
}

// face keeps only the walls that a way to a place on the bearing can meet,
// from the focus or from what stands beside it.
func (r *ray) face() {
	f, u := r.s.f, r.u
	side := func(x, y float64) float64 { return (x-f.focus.X)*u.Y - (y-f.focus.Y)*u.X }
	least, most := 0.0, 0.0
	for _, o := range r.s.others {
		v := side(o.X, o.Y)
		least, most = min(least, v), max(most, v)
	}
	r.shields.legs = r.shields.legs[:0]
	for i := range f.shields.legs {
		l := &f.shields.legs[i]
		a, b := side(l.ax, l.ay), side(l.ax+l.dx, l.ay+l.dy)
		if l.material >= 0 && max(a, b) >= least-1e-9 && min(a, b) <= most+1e-9 {
			r.shields.legs = append(r.shields.legs, *l)
		}
	}
}

// at gives the level at a distance over what is allowed.
func (r *ray) at(m, allowed float64) float64 {
	return r.field.At(r.s.level, r.s.place(r.u, m)) / allowed
}

// crossings gives the distances above inner where the level passes allowed,
// from the outermost inward. A hint, such as the neighbour's distance, only
// saves time.
//
// Between two breaks the level falls with distance: every part of the field
// does, for walls, cone and shadows change at breaks only and the ground's
// table is made so. So one look at either end of each stretch is enough.
func (r *ray) crossings(allowed, outside, inner, hint float64) []float64 {
	var found []float64
	hi, vHi := outside, 0.5 // below 1 by how outside is found; roots need no more
	if outside >= farthestM {
		vHi = r.at(outside, allowed)
	}
	for i := 0; hi > inner; i++ {
		if vHi > deepInside && hi < r.wallsTo && hi < 2*r.s.offsetM+0.1 {
			break
		}
		b, last := inner, i >= len(r.breaks) || r.breaks[i] <= inner
		if !last {
			b = r.breaks[i]
		}
		lo := b
		if !last {
			lo *= 1 + breakSide
		}
		if lo < hi {
			vLo := r.at(lo, allowed)
			if (vLo > 1) != (vHi > 1) {
				found = append(found, r.root(allowed, lo, vLo, hi, vHi, hint))
			}
			hi, vHi = lo, vLo
		}
		if last || b >= outside {
			if last {
				break
			}
			continue
		}
		lo = b * (1 - breakSide)
		v := r.at(lo, allowed)
		if (v > 1) != (vHi > 1) {
			found = append(found, b)
		}
		hi, vHi = lo, v
	}
	return found
}

// deepInside is how far above what is allowed the level must be for the last
// steps to the source to be spared: nothing there but walls can take it off.
const deepInside = 50

// breakSide is how near to a break its two sides are looked at, as a share.
const breakSide = 1e-9

// root finds where the level is what is allowed between lo and hi, whose values stand on both
// sides, to 1e-9 of the distance: the secant of the logarithms, the end that
// stays halved (Illinois).
func (r *ray) root(allowed, lo, vLo, hi, vHi, hint float64) float64 {
	a, b := math.Log(lo), math.Log(hi)
	fa, fb := math.Log(vLo), math.Log(vHi)
	side := 0
	guess := math.NaN()
	if hint > lo && hint < hi {
		guess = math.Log(hint)
	}
	for i := range 60 {
		m := (a*fb - b*fa) / (fb - fa)
		if i < 2 && guess > a && guess < b {
			m = guess
		}
		if b-a < 1e-10 || !(m > a && m < b) {
			break
		}
		fm := math.Log(r.at(math.Exp(m), allowed))
		if math.Abs(fm) < 1e-9 {
			return math.Exp(m)
		}
		guess = m + fm/1.7*1.0001 // the level falls nearly as the square
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
