package desk

import (
	"halfvalue/exposure"
	"halfvalue/exposure/plan"
)

// Engine is the Reckoner of the app: exposure.Reckon with a calibration, which
// moves times only and never the boundary.
func Engine(cal exposure.Calibration) Reckoner {
	return func(p plan.Plan) (Answer, error) {
		r, err := exposure.Reckon(p, cal)
		if err != nil {
			return Answer{}, err
		}
		return AnswerOf(r), nil
	}
}

// AnswerOf turns a reckoning into the form that the sheets show. Distances are
// those of the rope, with the uncertainty of the output.
func AnswerOf(r exposure.Reckoning) Answer {
	a := Answer{
		Exposure:    Exposure{Seconds: r.Exposure.Seconds, SecondsLow: r.Exposure.SecondsLow, SecondsHigh: r.Exposure.SecondsHigh},
		Beam:        Beam{MeanKeV: r.Beam.MeanKeV, KermaRateMGyPerMinAt1m: r.Beam.KermaRateMGyPerMinAt1m},
		Cautions:    r.Cautions,
		Working:     r.Workings,
		Unsharpness: r.Geometry.UgMM,
		ActivityGBq: r.Source.ActivityGBq,
		Engine:      r.Engine,
	}
	if v := r.Exposure.MAMin; v != nil {
		a.Exposure.MAMin = *v
	}
	if v := r.Exposure.GBqMin; v != nil {
		a.Exposure.GBqMin = *v
	}
	for _, d := range r.Density {
		a.Density = append(a.Density, Spot{At: d.At, ThicknessMM: d.ThicknessMM, Density: d.Density})
	}
	for _, d := range r.SNR {
		a.SNR = append(a.SNR, Signal{At: d.At, ThicknessMM: d.ThicknessMM, SNRn: d.SNRn})
	}
	for _, l := range r.Boundary {
		a.Boundary = append(a.Boundary, Rope{Limit: l.Limit, Direction: l.Direction, Metres: l.RopeMetres, Within: l.Within})
	}
	for _, c := range r.Spread {
		a.Spread = append(a.Spread, Share{Name: c.Name, Relative: c.Relative})
	}
	for _, c := range r.Checks {
		a.Checks = append(a.Checks, checkOf(c))
	}
	return a
}

func checkOf(c exposure.Check) Check {
	out := Check{ID: c.ID, Name: c.Title, Verdict: string(c.Verdict), Value: c.Value, Limit: c.Limit, Unit: c.Unit, Text: c.Text, Source: c.Source}
	if c.Mend == nil {
		return out
	}
	m := Mend{Field: c.Mend.Field, Text: c.Mend.Text}
	switch to := c.Mend.To.(type) {
	case float64:
		m.To = to
	case int:
		m.To = float64(to)
	case string:
		m.Choice = to
	default:
		return out
	}
	out.Mend = &m
	return out
}
