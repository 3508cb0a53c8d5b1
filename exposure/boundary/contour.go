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
func (f *Field) Contour(l Level, n int) Contour {
	levelM := f.site.LevelM
	c := Contour{Limit: l.Name, LevelM: levelM, BearingsDeg: f.bearings(n)}
	m := len(c.BearingsDeg)
	c.Metres, c.RopeMetres = make([]float64, m), make([]float64, m)
	crossings := make([][]float64, m)
	s := f.search(l)
	inParallel(m, func(from, to int) {
		r, near := s.ray(), 0.0
		for i := from; i < to; i++ {
			r.turn(c.BearingsDeg[i], s.ropeOutsideM)
			crossings[i] = r.crossings(l.USvPerH, s.outsideM, LeastRopeM, near)
			near = outermost(crossings[i])
			c.Metres[i] = near
			rope := r.crossings(l.USvPerH/s.spread, s.ropeOutsideM, near, near*math.Sqrt(s.spread))
			c.RopeMetres[i] = max(near, outermost(rope))
		}
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
	s := f.search(l)
	r := s.ray()
	r.turn(bearingDeg, s.outsideM)
	return outermost(r.crossings(l.USvPerH, s.outsideM, LeastRopeM, 0))
}

func outermost(crossings []float64) float64 {
	if len(crossings) == 0 {
		return LeastRopeM
	}
	return max(LeastRopeM, crossings[0])
}

// inParallel shares 0 to n among workers, always in the same way.
func inParallel(n int, do func(from, to int)) {
	const workers = 4
	var wait sync.WaitGroup
	for w := range workers {
		wait.Go(func() { do(w*n/workers, (w+1)*n/workers) })
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
