package boundary

import (
	"fmt"
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
	"halfvalue/exposure/working"
	"halfvalue/materials"
)

// Directions of a line.
const (
	Open    = "open"    // the useful beam with nothing in it
	Through = "through" // the useful beam behind the part
	Leakage = "leakage" // through the housing, or through the collimator
	Scatter = "scatter" // off the part, outside the beam
	Transit = "transit" // a sealed source bare in its guide tube
)

// Input is a shot as the boundary needs it.
type Input struct {
	Plan                plan.Plan     // normalised and valid
	Spectrum            beam.Spectrum // per mA s or GBq s at 1 m, behind the filters
	Strength            float64       // mA, or GBq at the plan's time
	ExposureSecondsHigh float64       // longest that one exposure may take
}

// Line is where one limit is met in one direction, by inverse square.
type Line struct {
	Limit      string  `json:"limit"`
	Direction  string  `json:"direction"`
	Metres     float64 `json:"metres"`           // unrounded, without spread; 1 where the limit is met within 1 m
	Within     bool    `json:"within,omitempty"` // the limit is not exceeded at 1 m or beyond
	RopeMetres float64 `json:"ropeMetres"`       // with the output's uncertainty and what meter readings found above the prediction: where the rope stands
	RateAt1m   float64 `json:"rateUSvPerHAt1m"`  // H*(10) rate while the beam is on
	Allowed    float64 `json:"allowedUSvPerH"`   // what the limit comes to as a rate
}

// Hours that a period is taken to hold where the number of shots does not say
// how long the beam is on: long days, to err outward.
const (
	HoursPerJob  = 12
	HoursPerWeek = 60
	HoursPerYear = 3000
)

// Lines gives, for every limit of the plan, where it is met in each direction,
// and the working. There are none without limits. Errors name what of the
// plan the physics refused.
func Lines(in Input) ([]Line, []working.Step, error) {
	if len(in.Plan.Site.Limits) == 0 {
		return nil, nil, nil
	}
	rates, err := in.rates()
	if err != nil {
		return nil, nil, err
	}
	var lines []Line
	var steps []working.Step
	for _, r := range rates {
		steps = append(steps, r.step)
	}
	factor, err := in.ropeFactor()
	if err != nil {
		return nil, nil, err
	}
	spread := (1+in.spread())*factor - 1
	for _, limit := range in.Plan.Site.Limits {
		allowed, step := in.allowed(limit)
		steps = append(steps, step)
		for _, r := range rates {
			l := Line{Limit: limit.Name, Direction: r.direction, RateAt1m: r.step.Value, Allowed: allowed}
			l.Metres, l.Within = distance(r.step.Value, allowed)
			l.RopeMetres, _ = distance(r.step.Value*(1+spread), allowed)
			lines = append(lines, l)
			steps = append(steps, l.step(spread))
		}
	}
	return lines, steps, nil
}

// distance solves rate / r^2 = allowed; what is within 1 m is told as 1.
func distance(rateAt1m, allowed float64) (metres float64, within bool) {
	if !(rateAt1m > allowed) {
		return 1, true
	}
	return math.Sqrt(rateAt1m / allowed), false
}

// spread is how much more the source may give than reckoned, as a share.
func (in Input) spread() float64 {
	if t := in.Plan.Source.Tube; t != nil {
		return beam.OutputSpread(*t)
	}
	return beam.SealedSpread(*in.Plan.Source.Sealed)
}

// onShare is the share of an hour with the beam on: all of it where the number
// of shots is not stated. In any one hour there are whole shots, so that two in
// three hours may both fall into it.
func (in Input) onShare(anyHour bool) float64 {
	n := in.Plan.Site.ShotsPerHour
	if n == 0 {
		return 1
	}
	if anyHour {
		n = math.Ceil(n)
	}
	return min(1, n*in.ExposureSecondsHigh/3600)
}

// allowed turns a limit into the rate that may stand while the beam is on.
func (in Input) allowed(l plan.Limit) (float64, working.Step) {
	step := working.Step{ID: "boundary.allowed." + l.Name, Name: "rate that limit " + l.Name + " allows while the beam is on", Symbol: "H'L", Unit: "uSv/h", Source: "plan"}
	if l.RateUSvPerH > 0 {
		step.Formula, step.Value = "H'L = limit", l.RateUSvPerH
		step.Note = "the averaging time is the meter's smoothing; beam-off time is not averaged in"
		return l.RateUSvPerH, step
	}
	hours, occupancy := period(l)
	share := in.onShare(l.Per == "hour")
	step.Formula = "H'L = H / (T s o)"
	step.Value = l.DoseUSv / (hours * share * occupancy)
	step.Inputs = []working.Input{
		{Symbol: "H", Name: "dose per " + l.Per, Value: l.DoseUSv, Unit: "uSv", Source: "plan"},
		{Symbol: "T", Name: "hours taken for a " + l.Per, Value: hours, Unit: "h", Source: "outward assumption but for the hour"},
		{Symbol: "s", Name: "share of them with the beam on", Value: share, Source: "shots per hour x longest exposure; 1 when not stated"},
		{Symbol: "o", Name: "occupancy", Value: occupancy, Source: "plan; 1 for a dose in an hour"},
	}
	return step.Value, step
}

func (l Line) step(spread float64) working.Step {
	return working.Step{
		ID: "boundary." + l.Limit + "." + l.Direction, Name: fmt.Sprintf("distance for %s, %s", l.Limit, l.Direction), Symbol: "r", Formula: "r = sqrt(H'1 / H'L) m",
		Inputs: []working.Input{{Symbol: "H'1", Value: l.RateAt1m, Unit: "uSv/h"}, {Symbol: "H'L", Value: l.Allowed, Unit: "uSv/h"}},
		Value:  l.Metres, Unit: "m", Source: "inverse square",
		Note: fmt.Sprintf("no air taken off; the rope stands at %.4g m, with the output, and meter readings, %.0f %% higher", l.RopeMetres, spread*100),
	}
}

// rate is an H*(10) rate at 1 m in one direction.
type rate struct {
	direction string
	step      working.Step
}

func (in Input) rates() ([]rate, error) {
	open := in.Spectrum.AmbientUSv() * in.Strength * 3600
	through, err := in.through()
	if err != nil {
		return nil, err
	}
	scatter, err := in.scatter()
	if err != nil {
		return nil, err
	}
	list := []rate{
		{Open, working.Step{Name: "H*(10) rate of the open beam at 1 m", Formula: "H'1 = sum Phi(E) k(E) h(E) x strength x 3600", Value: open, Source: "h: ICRP 74; mu_en/rho: NIST"}},
		{Through, working.Step{Name: "H*(10) rate behind the part at 1 m", Formula: "H'1 = sum [Phi(E) exp(-sum mu t) + Phi_s(E)] k(E) h(E) x strength x 3600", Value: through,
			Source: "mu: NIST XCOM; scatter: photon Monte Carlo", Note: "shown only: the rope stands at the open beam, which passes beside the part"}},
	}
	if t := in.Plan.Source.Tube; t != nil {
		list = append(list, rate{Leakage, working.Step{Name: "H*(10) rate of the housing's leakage at 1 m", Formula: "H'1 = K' h_max", Value: t.LeakageMGyPerHAt1m * 1000 * mostAmbientPerKerma,
			Inputs: []working.Input{{Symbol: "K'", Name: "leakage, air kerma", Value: t.LeakageMGyPerHAt1m, Unit: "mGy/h", Source: "certificate, or the most of its class"},
				{Symbol: "h_max", Name: "largest H*(10) per air kerma", Value: mostAmbientPerKerma, Unit: "Sv/Gy", Source: "ICRP 74, near 65 keV"}}}})
	} else if c := in.Plan.Source.Sealed; len(c.Collimator) > 0 {
		v, err := in.behindCollimator(c.Collimator)
		if err != nil {
			return nil, err
		}
		list = append(list, rate{Leakage, working.Step{Name: "H*(10) rate behind the collimator at 1 m", Formula: "H'1 = H'open B(collimator)", Value: v, Source: "broad beam, photon Monte Carlo"}})
	}
	list = append(list, rate{Scatter, working.Step{Name: "H*(10) rate scattered off the part at 1 m", Formula: "H'1 = max over angles of sum dN/dOmega(E) k(E) h(E) A x strength x 3600", Value: scatter,
		Source: "photon Monte Carlo", Note: "the whole cone falls on the part; worst angle outside the beam; walls and ground not counted here"}})
	if in.Plan.Source.Sealed != nil {
		list = append(list, rate{Transit, working.Step{Name: "H*(10) rate of the bare source at 1 m", Formula: "H'1 = as the open beam, all directions", Value: open, Source: "as the open beam"}})
	}
	for i := range list {
		s := &list[i].step
		s.ID, s.Symbol, s.Unit = "boundary.rateAt1m."+list[i].direction, "H'1", "uSv/h"
	}
	return list, nil
}

// mostAmbientPerKerma is no less than the largest H*(10) per air kerma at any
// energy, Sv/Gy: ICRP 74 has 1.74 at 60 keV, its interpolation a little more.
const mostAmbientPerKerma = 1.75

// ambientPerFluence gives H*(10) in uSv per photon per cm2.
func ambientPerFluence(keV float64) float64 {
	return beam.KermaPerFluence(keV) * 1000 * beam.AmbientPerKerma(keV)
}

// through is the rate at 1 m behind the part, scatter of a wide field with it.
func (in Input) through() (float64, error) {
	stack, err := stackOf(in.Plan.Part.Layers)
	if err != nil {
		return 0, err
	}
	return in.behind(stack)
}

func (in Input) behind(stack []transport.Layer) (float64, error) {
	x, err := transport.Slab(stack, in.Spectrum.KeV, in.Spectrum.PerCM2)
	if err != nil {
		return 0, err
	}
	var sum float64
	for i, n := range x.Primary {
		if n > 0 {
			sum += n * ambientPerFluence(in.Spectrum.KeV[i])
		}
	}
	for i, n := range x.Scatter {
		if n > 0 {
			sum += n * ambientPerFluence(x.MeanKeV[i])
		}
	}
	return sum * in.Strength * 3600, nil
}

// behindCollimator is the rate at 1 m through the collimator's wall.
func (in Input) behindCollimator(walls []plan.Filter) (float64, error) {
	layers := make([]plan.Layer, len(walls))
	for i, w := range walls {
		layers[i] = plan.Layer{Material: w.Material, MM: w.MM}
	}
	stack, err := stackOf(layers)
	if err != nil {
		return 0, err
	}
	return in.behind(stack)
}

func stackOf(layers []plan.Layer) ([]transport.Layer, error) {
	stack := make([]transport.Layer, len(layers))
	for i, l := range layers {
		m, err := materials.Lookup(l.Material)
		if err != nil {
			return nil, err
		}
		stack[i] = transport.Layer{Material: m, MM: l.MM}
	}
	return stack, nil
}

// mostHalfConeDeg bounds the cone that is taken to fall on the part: beyond, a
// flat part sees the rest of a wide beam ever more slantwise and farther off.
const mostHalfConeDeg = 60

// scatter is the largest rate at 1 m off the part, outside the useful beam.
// The lit area and the fluence on it go as f^2 and 1/f^2, so that the distance
// of the part falls out. A part of several materials counts as the one that
// scatters most.
func (in Input) scatter() (float64, error) {
	byDeg, err := in.scatterByDeg()
	if err != nil {
		return 0, err
	}
	half := min(in.coneDeg()/2, mostHalfConeDeg)
	var worst float64
	for _, h := range byDeg[int(half):] {
		worst = max(worst, h)
	}
	return worst, nil
}

// grouped gathers a fine spectrum into groups 5 % wide at their mean energies:
// the scattered field changes slowly with the energy that falls in.
func grouped(s beam.Spectrum) (keV, perCM2 []float64) {
	var from, sum, weighted float64
	flush := func() {
		if sum > 0 {
			keV, perCM2 = append(keV, weighted/sum), append(perCM2, sum)
		}
		sum, weighted = 0, 0
	}
	for i, e := range s.KeV {
		if e > from*1.05 {
			flush()
			from = e
		}
		sum += s.PerCM2[i]
		weighted += s.PerCM2[i] * e
	}
	flush()
	return keV, perCM2
}

func (in Input) coneDeg() float64 {
	if t := in.Plan.Source.Tube; t != nil {
		return t.ConeDeg
	}
	return in.Plan.Source.Sealed.ConeDeg
}

// RoundOutM rounds a distance outward to what a crew can pace: half metres to
// 20 m, metres beyond.
func RoundOutM(m float64) float64 {
	if m <= 20 {
		return math.Ceil(m*2-1e-9) / 2
	}
	return math.Ceil(m - 1e-9)
}
