package desk

import (
	"math"
	"sort"

	"halfvalue/exposure/plan"
)

// tracer computes the trade-off curve of the open dial a few points at a
// time, coarse first, so that a frame is never held up.
type tracer struct {
	field string
	base  plan.Plan
	rest  []float64 // values still to reckon, in the order of doing
	key   string    // what the curve depends on besides its own quantity
}

// curvePoints is how finely a whole curve is drawn: one more than a power of
// two, so that halving the stride never meets a value twice.
const curvePoints = 33

// retrace starts a new curve if what it depends on has changed. Scrubbing the
// curve's own quantity changes nothing in it.
func (d *Desk) retrace() {
	if d.state.Panel.Kind != DialPanel {
		d.trace, d.state.Curve = tracer{}, Curve{}
		return
	}
	l, ok := placeOf(d.state.Plan, d.state.Panel.Field)
	if !ok {
		d.trace, d.state.Curve = tracer{}, Curve{}
		return
	}
	lo, hi := curveRange(l.Quantity)
	key := curveKey(l, d.state.Plan)
	if key == d.trace.key && d.trace.field == l.Field && d.inCurve(l.Value) {
		return
	}
	d.trace = tracer{field: l.Field, base: d.state.Plan, key: key, rest: spread(lo, hi, l.Log)}
	d.state.Curve = Curve{Field: l.Field, From: lo, To: hi}
}

// inCurve says whether the value is well inside the curve that is drawn.
func (d *Desk) inCurve(v float64) bool {
	c := d.state.Curve
	return v >= c.From && v <= c.To
}

// curveKey is the plan with the curve's own quantity put to a fixed value.
func curveKey(l place, p plan.Plan) string {
	p = p.Clone()
	l.set(&p, l.Max)
	data, err := plan.Encode(p)
	if err != nil {
		return ""
	}
	return string(data)
}

// curveRange is what the strip shows round a value: a factor of three either
// way for ratios, a third of the value for differences, inside what is allowed.
func curveRange(q Quantity) (lo, hi float64) {
	if q.Log {
		lo, hi = q.Value/3, q.Value*3
	} else {
		span := math.Max(math.Abs(q.Value)/2.5, q.Step(q.Value)*10)
		lo, hi = q.Value-span, q.Value+span
	}
	return math.Max(lo, q.Min), math.Min(hi, q.Max)
}

// spread returns the curve's values ordered coarse to fine.
func spread(lo, hi float64, ratio bool) []float64 {
	if !(hi > lo) || (ratio && lo <= 0) {
		return nil
	}
	at := func(i int) float64 {
		t := float64(i) / (curvePoints - 1)
		if ratio {
			return lo * math.Pow(hi/lo, t)
		}
		return lo + (hi-lo)*t
	}
	out := []float64{at(0), at(curvePoints - 1)}
	for stride := (curvePoints - 1) / 2; stride >= 1; stride /= 2 {
		for i := stride; i < curvePoints-1; i += 2 * stride {
			out = append(out, at(i))
		}
	}
	return out
}

// traceMore reckons at most n more points of the curve.
func (d *Desk) traceMore(n int) {
	l, ok := placeOf(d.trace.base, d.trace.field)
	if !ok {
		return
	}
	points := append([]CurvePoint(nil), d.state.Curve.Points...)
	for ; n > 0 && len(d.trace.rest) > 0; n-- {
		x := d.trace.rest[0]
		d.trace.rest = d.trace.rest[1:]
		points = append(points, d.pointAt(l, x))
	}
	sort.Slice(points, func(i, j int) bool { return points[i].X < points[j].X })
	d.state.Curve.Points = points
	d.state.Curve.Whole = len(d.trace.rest) == 0
}

func (d *Desk) pointAt(l place, x float64) CurvePoint {
	p := d.trace.base.Clone()
	l.set(&p, tidy(x))
	p, _, err := d.check(p)
	if err != nil {
		return CurvePoint{X: x, Refused: true}
	}
	a, err := d.reckon(p)
	if err != nil {
		return CurvePoint{X: x, Refused: true}
	}
	point := CurvePoint{X: x, Seconds: a.Exposure.Seconds, Density: a.Density}
	if w, ok := a.Worst(); ok {
		point.Metres = w.Metres
	}
	for _, c := range a.Checks {
		point.Short = point.Short || c.Verdict == Short
	}
	return point
}
