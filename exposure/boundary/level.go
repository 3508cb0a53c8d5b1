package boundary

import (
	"math"

	"halfvalue/exposure/plan"
)

// Level is a limit as a rate that the field is held against.
type Level struct {
	Limit    plan.Limit
	Name     string  // the limit's, with the officer's where averaging is allowed
	USvPerH  float64 // what At may reach
	share    float64 // of the time with the beam on
	shots    float64 // ways out and back in an hour
	worst    bool    // a rate: the worst moment counts
	averaged bool
}

// Levels gives the plan's limits, and beside each rate the same averaged over
// the hour where an officer allows it by name in the plan.
func (f *Field) Levels() []Level {
	var list []Level
	for _, l := range f.in.Plan.Site.Limits {
		if l.RateUSvPerH > 0 {
			list = append(list, Level{Limit: l, Name: l.Name, USvPerH: l.RateUSvPerH, worst: true})
			if by := f.site.AveragingAllowedBy; by != "" {
				list = append(list, Level{Limit: l, Name: l.Name + ", averaged, allowed by " + by, USvPerH: l.RateUSvPerH,
					share: f.in.onShare(true), shots: math.Ceil(f.site.ShotsPerHour), averaged: true})
			}
			continue
		}
		hours, occupancy := period(l)
		n := f.site.ShotsPerHour
		if l.Per == "hour" {
			n = math.Ceil(n)
		}
		list = append(list, Level{Limit: l, Name: l.Name, USvPerH: l.DoseUSv / (hours * occupancy), share: f.in.onShare(l.Per == "hour"), shots: n})
	}
	return list
}

// period gives the hours that a limit's period is taken for and the share of
// them that somebody is there. In any one hour somebody may be there all of it.
func period(l plan.Limit) (hours, occupancy float64) {
	hours = map[string]float64{"hour": 1, "job": HoursPerJob, "week": HoursPerWeek, "year": HoursPerYear}[l.Per]
	if l.Per == "hour" || l.Occupancy == 0 {
		return hours, 1
	}
	return hours, l.Occupancy
}

// At gives at q what the level limits, uSv/h: the rate at the worst moment, or
// the mean over the run for a dose or an average that an officer allows.
func (f *Field) At(l Level, q Vec) float64 {
	exposed := f.Exposed(q).Total()
	if l.worst {
		if f.bareDiffers {
			return max(exposed, f.Bare(q))
		}
		return exposed
	}
	mean := l.share * exposed
	if f.bareDiffers {
		mean += max(1, l.shots)*2*f.TransitDoseUSv(q) + (1-l.share)*f.Stored(q)
	}
	return mean
}
