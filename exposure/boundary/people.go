package boundary

import (
	"math"
	"time"

	"halfvalue/exposure/plan"
)

// PersonDose is what somebody or some place gets, without the output's
// uncertainty but where told.
type PersonDose struct {
	plan.Person
	Exposed    Parts       `json:"exposedUSvPerH"` // with the beam on
	WorstRate  float64     `json:"worstUSvPerH"`   // at the worst moment
	PerShotUSv float64     `json:"perShotUSv"`     // longest exposure, both ways of the source
	PerHourUSv float64     `json:"perHourUSv"`     // shots per hour, or the beam on all hour
	PerJobUSv  float64     `json:"perJobUSv"`      // HoursPerJob hours times occupancy
	Allowed    []Allowance `json:"allowed,omitempty"`
}

// Allowance is how long somebody may stay until a dose limit is reached.
type Allowance struct {
	Limit   string  `json:"limit"`
	Seconds float64 `json:"seconds"` // beam on, rounded down, output's uncertainty against the person
	Shots   int     `json:"shots"`   // rounded down likewise
}

// Dose gives what a person gets; see PersonDose.
func (f *Field) Dose(p plan.Person) PersonDose {
	if p.HeightM == 0 {
		p.HeightM = f.site.LevelM
	}
	if p.Occupancy == 0 {
		p.Occupancy = 1
	}
	q := Vec{p.XM, p.YM, p.HeightM}
	d := PersonDose{Person: p, Exposed: f.Exposed(q)}
	transit := 2 * f.TransitDoseUSv(q)
	d.WorstRate = max(d.Exposed.Total(), f.Bare(q))
	d.PerShotUSv = d.Exposed.Total()*f.in.ExposureSecondsHigh/3600 + transit
	d.PerHourUSv = f.At(Level{share: f.in.onShare(true), shots: math.Ceil(f.site.ShotsPerHour)}, q)
	d.PerJobUSv = f.At(Level{share: f.in.onShare(false), shots: f.site.ShotsPerHour}, q) * HoursPerJob * p.Occupancy
	against := 1 + f.in.spread()
	for _, l := range f.in.Plan.Site.Limits {
		if l.DoseUSv > 0 {
			d.Allowed = append(d.Allowed, Allowance{l.Name, TimeAllowed(l.DoseUSv, d.WorstRate*against).Seconds(), wholeShots(l.DoseUSv, d.PerShotUSv*against)})
		}
	}
	return d
}

// mostAllowed is the longest time that is allowed anywhere.
const mostAllowed = 24 * time.Hour

// TimeAllowed gives how long somebody may stay at a rate until a dose, rounded
// down: to a minute from ten minutes up, to a second below; a day at most. For
// going in with a meter after a shot the rate is what the meter shows. A rate
// that is no number allows nothing.
func TimeAllowed(doseUSv, uSvPerH float64) time.Duration {
	if !(doseUSv > 0) || !(uSvPerH >= 0) {
		return 0
	}
	hours := min(doseUSv/uSvPerH, mostAllowed.Hours())
	t := time.Duration(hours * float64(time.Hour))
	if t >= 10*time.Minute {
		return t.Truncate(time.Minute)
	}
	return t.Truncate(time.Second)
}

const mostShots = 10000

func wholeShots(doseUSv, perShotUSv float64) int {
	return int(math.Floor(min(doseUSv/max(perShotUSv, 1e-300), mostShots)))
}
