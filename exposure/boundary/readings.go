package boundary

import (
	"fmt"
	"math"
	"time"

	"halfvalue/exposure/plan"
)

// Verdicts on a meter reading.
const (
	ReadsAbove     = "above"            // the field is multiplied until it is measured again
	ReadsConfirms  = "confirms"         // at or below the prediction, and to be relied on
	ReadsNothing   = "confirms nothing" // see the reasons
	ReadsFarBelow  = "far below"        // narrows nothing; stop and look
	ReadsBeamIsOff = "beam off"
)

// Verdict is a meter reading held against the prediction.
type Verdict struct {
	plan.Reading
	PredictedUSvPerH float64  `json:"predictedUSvPerH"`
	MeasuredUSvPerH  float64  `json:"measuredUSvPerH"` // times the meter's factor
	Ratio            float64  `json:"ratio"`           // measured to predicted
	Verdict          string   `json:"verdict"`
	Reasons          []string `json:"reasons,omitempty"`
	StopAndLook      bool     `json:"stopAndLook,omitempty"`
}

// calibrationDays is how long a meter's calibration is relied on; many codes
// ask for a year.
const calibrationDays = 366

// backgroundUSvPerH is what a meter may show with nothing on.
const backgroundUSvPerH = 0.5

// Judge holds the plan's readings against the field as it was predicted, and
// gives the factor that they multiply it by: the largest ratio above 1. A
// reading below never makes it less, and none that is in doubt confirms
// anything; but one above counts however short it was held.
func (f *Field) Judge() (list []Verdict, factor float64) {
	factor = 1
	for _, r := range f.site.Readings {
		v := f.judge(r)
		if v.Verdict == ReadsAbove {
			factor = max(factor, v.Ratio)
		}
		list = append(list, v)
	}
	return list, factor
}

// Measured gives the field that the readings leave: multiplied, in all
// directions, by the factor of Judge.
func (f *Field) Measured() *Field {
	_, factor := f.Judge()
	g := *f
	g.factor = factor
	return &g
}

func (f *Field) judge(r plan.Reading) Verdict {
	q := f.Place(r.XM, r.YM)
	v := Verdict{Reading: r, MeasuredUSvPerH: r.USvPerH * r.Factor, PredictedUSvPerH: f.predicted(r, q) / f.factor}
	v.Ratio = v.MeasuredUSvPerH / max(v.PredictedUSvPerH, 1e-9)
	v.Reasons = f.doubts(r)
	far := f.site.FarOffFactor
	if r.State == plan.States[2] {
		v.Verdict = ReadsBeamIsOff
		if v.MeasuredUSvPerH > max(backgroundUSvPerH, v.PredictedUSvPerH*far) {
			v.StopAndLook = true
			v.Reasons = append(v.Reasons, "beam or source may still be on")
		}
		return v
	}
	switch {
	case v.Ratio > 1:
		v.Verdict = ReadsAbove
	case len(v.Reasons) > 0:
		v.Verdict = ReadsNothing
	case v.Ratio < 1/far:
		v.Verdict = ReadsFarBelow
	default:
		v.Verdict = ReadsConfirms
	}
	if v.Ratio > far || v.Ratio < 1/far {
		v.StopAndLook = true
		v.Reasons = append(v.Reasons, fmt.Sprintf("reading and prediction differ by more than %g times: stop and look", far))
	}
	return v
}

// predicted is what the meter should show at q.
func (f *Field) predicted(r plan.Reading, q Vec) float64 {
	switch {
	case r.State == plan.States[2]:
		return f.Stored(q)
	case r.State == plan.States[1], r.Collimator == "none" && f.in.Plan.Source.Sealed != nil:
		return f.Bare(q)
	}
	return f.Exposed(q).Total()
}

// doubts tells why a reading cannot confirm anything.
func (f *Field) doubts(r plan.Reading) []string {
	var list []string
	doubt := func(is bool, text string) {
		if is {
			list = append(list, text)
		}
	}
	at := f.in.Plan.At
	doubt(r.USvPerH == 0, "it reads zero")
	doubt(r.RangeUSvPerH == 0, "the meter's range is not stated")
	doubt(r.RangeUSvPerH > 0 && r.USvPerH >= r.RangeUSvPerH, "it is off the scale: at least as much")
	doubt(r.ResponseS == 0, "the meter's response time is not stated")
	doubt(r.HeldS == 0, "how long it was held is not stated")
	doubt(r.HeldS > 0 && r.HeldS < r.ResponseS, "it was held for less than the meter's response time")
	doubt(r.Calibrated.IsZero(), "the meter's calibration is not stated")
	doubt(!r.Calibrated.IsZero() && !at.IsZero() && at.Before(r.Calibrated), "the meter's calibration lies after the shot")
	doubt(!r.Calibrated.IsZero() && !at.IsZero() && at.Sub(r.Calibrated) > calibrationDays*24*time.Hour, "the meter's calibration is more than a year old")
	s := f.in.Plan.Source.Sealed
	fitted := s != nil && len(s.Collimator) > 0
	doubt(r.Collimator != "" && (r.Collimator == "fitted") != fitted, "the collimator was not as planned")
	return list
}

// ropeFactor is what readings multiply the field by in a plan without one.
func (in Input) ropeFactor() (float64, error) {
	if len(in.Plan.Site.Readings) == 0 {
		return 1, nil
	}
	f, err := NewField(in)
	if err != nil {
		return math.NaN(), err
	}
	_, factor := f.Judge()
	return factor, nil
}
