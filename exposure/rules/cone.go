package rules

import (
	"fmt"
	"math"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
)

// Cone asks that the beam covers what is read of a pipe. The width of the film
// along the pipe, and the length that is read of a plate, are not in the plan.
type Cone struct {
	Margin float64 `json:"margin"` // of the cone's opening that must be left, 0 to 0.5
}

func (c Cone) valid() error {
	if !(c.Margin >= 0 && c.Margin <= 0.5) {
		return fmt.Errorf("cone margin %v is out of range: want 0 to 0.5", c.Margin)
	}
	return nil
}

func (c Cone) applies(f Facts) bool { return f.Setup.Pipe != (setup.Pipe{}) && f.ConeDeg > 0 }

// neededDeg is the opening of the beam that the shot takes across the pipe, or
// false where the number of shots that it depends on is not stated.
func (c Cone) neededDeg(f Facts) (float64, bool) {
	g := f.Setup
	outer := g.Pipe.Outer()
	switch {
	case g.Kind == plan.Panoramic:
		return 360, true
	case g.Kind == plan.DoubleWallDoubleImage: // the whole pipe, to its tangents
		return 2 * deg(math.Asin(outer/g.FromAxisMM)), true
	case f.Shots == 0:
		return 0, false
	case f.Shots == 1:
		return 360, true
	}
	half := math.Pi / float64(f.Shots)
	across, along := outer*math.Sin(half), g.FromAxisMM+outer*math.Cos(half)
	switch g.Ring() {
	case setup.Near:
		along = g.FromAxisMM - outer*math.Cos(half)
	case setup.NearInside:
		along = outer*math.Cos(half) - g.FromAxisMM
	}
	return 2 * deg(math.Atan2(across, along)), true
}

func deg(rad float64) float64 { return rad * 180 / math.Pi }

func (c Cone) judge(f Facts) judgement {
	need, ok := c.neededDeg(f)
	limit := f.ConeDeg * (1 - c.Margin)
	if !ok {
		return judgement{verdict: Undecided, limit: limit, unit: "deg", text: say("cone %g deg: what a shot takes depends on the number planned, which is not stated", f.ConeDeg)}
	}
	j := judgement{verdict: atMost(need, limit), value: need, limit: limit, unit: "deg", text: say("a shot takes %.4g deg across the pipe, the cone has %g deg", need, f.ConeDeg)}
	return j.with("2 arctan(R sin p/(e + R cos p)), p = 180/N; e - R cos p for the near wall; 2 arcsin(R/e) where both walls show",
		in("R", "outside radius", f.Setup.Pipe.Outer(), "mm"), in("e", "source off the axis", f.Setup.FromAxisMM, "mm"), in("N", "shots planned", float64(f.Shots), ""))
}

func (c Cone) knobs(Facts) []knob {
	return []knob{rising("setup.sfdMM"), whole("setup.shots", 2)}
}

func (c Cone) figures() string {
	if c.Margin == 0 {
		return "within the cone"
	}
	return say("within the cone less %g %%", 100*c.Margin)
}
