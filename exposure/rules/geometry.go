package rules

import (
	"fmt"
	"math"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
)

// MinF is the least distance from source to part: f/d >= Coefficient b^(2/3).
type MinF struct {
	Coefficient  float64 `json:"coefficient"`
	Power        float64 `json:"power"`        // of b, 2/3
	TouchFactor  float64 `json:"touchFactor"`  // b below so many t counts as t
	InsideShare  float64 `json:"insideShare"`  // of f that does when the source is in the pipe
	CentralShare float64 `json:"centralShare"` // on its axis
}

func (m MinF) valid() error {
	if !(m.Coefficient > 0 && m.Power > 0 && m.Power <= 1 && m.TouchFactor >= 1 && m.InsideShare > 0 && m.InsideShare <= 1 && m.CentralShare > 0 && m.CentralShare <= m.InsideShare) {
		return fmt.Errorf("least f %+v: want a coefficient above 0, a power in 0 to 1, a touch factor of 1 or more, shares in 0 to 1 with the central one no larger", m)
	}
	return nil
}

func (m MinF) applies(Facts) bool { return true }

// LeastMM is the least f for a source of d and the distance b, mm.
func (m MinF) LeastMM(dMM, bMM float64) float64 {
	return m.Coefficient * dMM * math.Pow(bMM, m.Power)
}

// bMM is the b that the rule reckons with.
func (m MinF) bMM(g setup.Geometry) float64 {
	switch {
	case g.Kind == plan.DoubleWallDoubleImage:
		return g.Pipe.ODMM
	case g.BMM < m.TouchFactor*g.TMM:
		return g.TMM
	}
	return g.BMM
}

// onAxis is how far off the axis, in inner radii, still counts as central.
const onAxis = 0.02

func (m MinF) judge(f Facts) judgement {
	g := f.Setup
	b := m.bMM(g)
	least := m.LeastMM(g.DMM, b)
	j := judgement{value: g.FMM, limit: least, unit: "mm", verdict: atLeast(g.FMM, least),
		text: say("f %.4g mm, at least %.4g mm for d %g mm and b %g mm", g.FMM, least, g.DMM, b)}.
		with(say("f >= %g d b^%.4g; b below %g t counts as t, De where both walls show", m.Coefficient, m.Power, m.TouchFactor),
			in("f", "source to part", g.FMM, "mm"), in("d", "source size", g.DMM, "mm"), in("b", "part to film as counted", b, "mm"), in("t", "nominal thickness", g.TMM, "mm"))
	share := 1.0
	if inside := g.Kind == plan.Panoramic || g.Side == plan.Inside; inside && g.Pipe.ODMM > 0 {
		share = m.InsideShare
		if g.FromAxisMM <= onAxis*g.Pipe.Inner() {
			share = m.CentralShare
		}
	}
	if j.verdict == Short && atLeast(g.FMM, share*least) == Holds {
		j.verdict = Undecided
		j.text += say("; with the source inside down to %.4g mm is allowed if the image quality is met", share*least)
	}
	return j
}

func (m MinF) knobs(Facts) []knob {
	return []knob{rising("setup.sfdMM"), falling("source.tube.focusMM"), falling("source.sealed.sizeMM")}
}

// MaxUg is the most geometric unsharpness by thickness.
type MaxUg struct {
	Steps []UgStep `json:"steps"`
}

// UgStep holds up to a thickness; the last one has none.
type UgStep struct {
	UpToMM float64 `json:"upToMM,omitzero"`
	UgMM   float64 `json:"ugMM"`
}

func (m MaxUg) valid() error {
	last := UgStep{}
	for i, s := range m.Steps {
		end := i == len(m.Steps)-1
		if !(s.UgMM > last.UgMM) || end != (s.UpToMM == 0) || !end && !(s.UpToMM > last.UpToMM) {
			return fmt.Errorf("unsharpness step %+v: want rising thickness and figure, the last without an end", s)
		}
		last = s
	}
	if len(m.Steps) == 0 {
		return fmt.Errorf("no unsharpness steps")
	}
	return nil
}

func (m MaxUg) applies(Facts) bool { return true }

func (m MaxUg) limit(t float64) float64 {
	for _, s := range m.Steps {
		if s.UpToMM == 0 || t <= s.UpToMM*(1+slack) {
			return s.UgMM
		}
	}
	return m.Steps[len(m.Steps)-1].UgMM
}

func (m MaxUg) judge(f Facts) judgement {
	limit := m.limit(f.Setup.TMM)
	return judgement{value: f.Setup.UgMM, limit: limit, unit: "mm", verdict: atMost(f.Setup.UgMM, limit),
		text: say("Ug %.3g mm, at most %.3g mm at %g mm", f.Setup.UgMM, limit, f.Setup.TMM)}.
		with("Ug = d b/f", in("d", "source size", f.Setup.DMM, "mm"), in("b", "part to film", f.Setup.BMM, "mm"), in("f", "source to part", f.Setup.FMM, "mm"))
}

func (m MaxUg) knobs(Facts) []knob {
	return []knob{rising("setup.sfdMM"), falling("source.tube.focusMM"), falling("source.sealed.sizeMM")}
}

// Rise is the thickness rise over the image, K: on a pipe it fixes the number
// of shots.
type Rise struct {
	K float64 `json:"k"`
}

func (r Rise) valid() error {
	if !(r.K > 1 && r.K <= 2) {
		return fmt.Errorf("K %v is out of range: want above 1, at most 2", r.K)
	}
	return nil
}

func (r Rise) applies(f Facts) bool { return f.Setup.Kind != plan.DoubleWallDoubleImage }

func (r Rise) judge(f Facts) judgement {
	g := f.Setup
	if g.Pipe == (setup.Pipe{}) {
		most := 2 * setup.PlateHalfMM(g.SFDMM, r.K)
		text := say("read at most %.4g mm of film", most)
		if beam := 2 * setup.ConeRadiusMM(f.ConeDeg, g.SFDMM); f.ConeDeg > 0 && beam < most {
			most, text = beam, say("read at most %.4g mm of film, the beam reaches no further", beam)
		}
		return judgement{verdict: Undecided, limit: most, unit: "mm", text: text + ": the length that is read is not in the plan"}.
			with("length = 2 SFD sqrt(K^2 - 1), within the cone", in("K", "thickness rise", r.K, ""), in("SFD", "source to film", g.SFDMM, "mm"), in("cone", "full opening", f.ConeDeg, "deg"))
	}
	s, err := g.Pipe.ShotsAround(g.Ring(), g.FromAxisMM, r.K)
	if err != nil {
		return judgement{verdict: Undecided, unit: "shots", text: err.Error()}
	}
	j := judgement{value: float64(f.Shots), limit: float64(s.N), unit: "shots", verdict: atLeast(float64(f.Shots), s.Exact)}
	j.text = say("%d shots planned, %d needed (%.2f)", f.Shots, s.N, s.Exact)
	if f.Shots == 0 {
		j.verdict, j.text = Undecided, say("%d shots needed round the pipe (%.2f): the number planned is not stated", s.N, s.Exact)
	}
	return j.with(ringFormula[g.Ring()], in("K", "thickness rise", r.K, ""), in("t", "wall", g.Pipe.WallMM, "mm"), in("De", "outside diameter", g.Pipe.ODMM, "mm"),
		in("e", "source off the axis", g.FromAxisMM, "mm"), in("theta", "angle at the outer surface", deg(s.Theta), "deg"), in("eta", "angle at the source", deg(s.Eta), "deg"), in("N", "not rounded", s.Exact, ""))
}

const thetaEta = "theta = arccos([1 + (K^2 - 1) t/De]/K), eta = arcsin(sin theta De/(2 e))"

// ringFormula is the number of shots by where the source stands.
var ringFormula = map[setup.Ring]string{
	setup.Far:        "N = 180/(theta + eta), 1 where eta has no value; " + thetaEta,
	setup.Near:       "N = 180/(theta - eta); " + thetaEta,
	setup.NearInside: "N = 180/(eta - theta), 1 where eta has no value; " + thetaEta,
}

func (r Rise) knobs(f Facts) []knob {
	return []knob{whole("setup.shots", 1), rising("setup.sfdMM"), falling("setup.sfdMM")}
}

// SmallPipe is when a pipe may be shown elliptically.
type SmallPipe struct {
	MostODMM      float64 `json:"mostODMM"`
	MostWallMM    float64 `json:"mostWallMM,omitzero"`    // 0: no limit
	MostWeldShare float64 `json:"mostWeldShare,omitzero"` // weld width over De
}

func (s SmallPipe) valid() error {
	if !(s.MostODMM > 0 && s.MostWallMM >= 0 && s.MostWeldShare >= 0 && s.MostWeldShare <= 1) {
		return fmt.Errorf("small pipe %+v: want a diameter above 0, a weld share in 0 to 1", s)
	}
	return nil
}

func (s SmallPipe) applies(f Facts) bool { return f.Setup.Kind == plan.DoubleWallDoubleImage }

func (s SmallPipe) judge(f Facts) judgement {
	p := f.Setup.Pipe
	j := judgement{value: p.ODMM, limit: s.MostODMM, unit: "mm", verdict: atMost(p.ODMM, s.MostODMM), text: say("De %g mm, at most %g mm", p.ODMM, s.MostODMM)}
	if s.MostWallMM > 0 && j.verdict == Holds && atMost(p.WallMM, s.MostWallMM) == Short {
		j = judgement{value: p.WallMM, limit: s.MostWallMM, unit: "mm", verdict: Short, text: say("t %g mm, at most %g mm", p.WallMM, s.MostWallMM)}
	}
	if s.MostWeldShare == 0 || j.verdict == Short {
		return j
	}
	most := s.MostWeldShare * p.ODMM
	switch {
	case f.WeldMM == 0:
		j.verdict = Undecided
		j.text += say("; weld at most %.4g mm wide: its width is not stated", most)
	case atMost(f.WeldMM, most) == Short:
		j = judgement{value: f.WeldMM, limit: most, unit: "mm", verdict: Short, text: say("weld %g mm wide, at most %.4g mm", f.WeldMM, most)}
	}
	return j
}

func (s SmallPipe) knobs(Facts) []knob { return nil }

// TwoWalls is the number of shots where both walls show.
type TwoWalls struct {
	Thin   int     `json:"thin"`            // shots below Ratio
	Thick  int     `json:"thick"`           // shots from Ratio up
	Ratio  float64 `json:"ratio,omitzero"`  // t/De
	Apart  string  `json:"apart"`           // "90 deg"
	Apart2 string  `json:"apart2,omitzero"` // from Ratio up
}

func (w TwoWalls) valid() error {
	if !(w.Thin > 0 && w.Thick >= w.Thin && w.Ratio >= 0 && w.Ratio < 0.5) || w.Apart == "" {
		return fmt.Errorf("two walls %+v: want shots above 0, not falling, a ratio below 0.5, how far apart", w)
	}
	return nil
}

func (w TwoWalls) applies(f Facts) bool { return f.Setup.Kind == plan.DoubleWallDoubleImage }

func (w TwoWalls) judge(f Facts) judgement {
	need, apart := w.Thin, w.Apart
	ratio := f.Setup.Pipe.WallMM / f.Setup.Pipe.ODMM
	if w.Ratio > 0 && ratio >= w.Ratio {
		need, apart = w.Thick, w.Apart2
	}
	j := judgement{value: float64(f.Shots), limit: float64(need), unit: "shots", verdict: atLeast(float64(f.Shots), float64(need)),
		text: say("%d shots planned, %d needed, %s apart, t/De %.3f", f.Shots, need, apart, ratio)}
	if f.Shots == 0 {
		j.verdict, j.text = Undecided, say("%d shots needed, %s apart, t/De %.3f: the number planned is not stated", need, apart, ratio)
	}
	return j
}

func (w TwoWalls) knobs(Facts) []knob { return []knob{whole("setup.shots", 1)} }
