package rules

import (
	"fmt"
	"maps"
	"math"
	"slices"
)

// Nuclides is the thickness that each sealed source is for.
type Nuclides struct {
	Ranges map[string]Reach `json:"ranges"`
}

// Reach is a range of penetrated thickness, mm; Agreed is a lower end that the
// parties may agree on.
type Reach struct {
	FromMM   float64 `json:"fromMM"`
	ToMM     float64 `json:"toMM"`
	AgreedMM float64 `json:"agreedMM,omitzero"`
}

func (n Nuclides) valid() error {
	if len(n.Ranges) == 0 {
		return fmt.Errorf("no ranges of nuclides")
	}
	for name, r := range n.Ranges {
		if !(r.FromMM >= 0 && r.ToMM > r.FromMM) || r.AgreedMM < 0 || r.AgreedMM > r.FromMM {
			return fmt.Errorf("range of %q: %+v: want ends that rise, an agreed end below the first", name, r)
		}
	}
	return nil
}

func (n Nuclides) applies(f Facts) bool { return f.Nuclide != "" }

func (n Nuclides) judge(f Facts) judgement {
	r, ok := n.Ranges[f.Nuclide]
	if !ok {
		return judgement{verdict: Short, unit: "mm", value: f.WMM, text: say("%s is not among %v", f.Nuclide, slices.Sorted(maps.Keys(n.Ranges)))}
	}
	text := say("%s through %s mm, for %g to %g mm", f.Nuclide, extent(f.ThinMM, f.ThickMM, "%.4g"), r.FromMM, r.ToMM)
	switch {
	case atMost(f.ThickMM, r.ToMM) == Short:
		return judgement{verdict: Short, value: f.ThickMM, limit: r.ToMM, unit: "mm", text: text}
	case atLeast(f.ThinMM, r.FromMM) == Short:
		j := judgement{verdict: Short, value: f.ThinMM, limit: r.FromMM, unit: "mm", text: text}
		if r.AgreedMM > 0 && atLeast(f.ThinMM, r.AgreedMM) == Holds {
			j.verdict = Undecided
			j.text += say("; from %g mm by agreement", r.AgreedMM)
		}
		return j
	}
	return judgement{verdict: Holds, value: f.WMM, limit: r.ToMM, unit: "mm", text: text}
}

func (n Nuclides) knobs(Facts) []knob { return nil }

// MaxKV is the most tube voltage by penetrated thickness: points of a curve
// that is straight on log axes between them.
type MaxKV struct {
	Points [][2]float64 `json:"points"` // mm, kV
	RiseKV float64      `json:"riseKV"` // allowed above where the thickness varies
}

func (m MaxKV) valid() error {
	last := [2]float64{}
	for _, p := range m.Points {
		if !(p[0] > last[0] && p[1] > last[1]) {
			return fmt.Errorf("point %v of the kV curve: want rising thickness and kV", p)
		}
		last = p
	}
	if len(m.Points) < 2 || m.RiseKV < 0 {
		return fmt.Errorf("kV curve: want two points or more, a rise of 0 or more")
	}
	return nil
}

func (m MaxKV) applies(f Facts) bool { return f.KV > 0 }

// At gives the most kV at a thickness; false outside the points.
func (m MaxKV) At(mm float64) (float64, bool) {
	p := m.Points
	if !(mm >= p[0][0] && mm <= p[len(p)-1][0]) {
		return 0, false
	}
	i := 1
	for mm > p[i][0] {
		i++
	}
	a, b := p[i-1], p[i]
	return a[1] * math.Pow(b[1]/a[1], math.Log(mm/a[0])/math.Log(b[0]/a[0])), true
}

func (m MaxKV) judge(f Facts) judgement {
	limit, ok := m.At(f.WMM)
	if !ok {
		return judgement{verdict: Undecided, value: f.KV, unit: "kV", text: say("%g mm is outside the curve, %g to %g mm", f.WMM, m.Points[0][0], m.Points[len(m.Points)-1][0])}
	}
	text := say("%g kV, at most about %.0f kV through %g mm", f.KV, limit, f.WMM)
	if f.ThickMM > f.ThinMM*(1+slack) && m.RiseKV > 0 {
		limit += m.RiseKV
		text += say(", %g kV more where the thickness varies", m.RiseKV)
	}
	return judgement{verdict: atMost(f.KV, limit), value: f.KV, limit: limit, unit: "kV", text: text}.
		with("straight on log axes between the points of the curve", in("w", "penetrated thickness", f.WMM, "mm"), in("U", "tube voltage", f.KV, "kV"))
}

func (m MaxKV) knobs(Facts) []knob { return []knob{falling("source.tube.kv")} }

// Travel is the most that a source may travel, of the exposure time.
type Travel struct {
	MostShare float64 `json:"mostShare"`
}

func (t Travel) valid() error {
	if !(t.MostShare > 0 && t.MostShare < 1) {
		return fmt.Errorf("travel share %v is out of range: want above 0, below 1", t.MostShare)
	}
	return nil
}

func (t Travel) applies(f Facts) bool { return f.Nuclide != "" }

func (t Travel) judge(f Facts) judgement {
	j := judgement{value: 100 * f.TravelShare, limit: 100 * t.MostShare, unit: "%", verdict: atMost(f.TravelShare, t.MostShare),
		text: say("the source travels %.3g %% of the exposure, at most %g %%", 100*f.TravelShare, 100*t.MostShare)}
	if f.TravelShare == 0 {
		j.verdict, j.text = Undecided, say("at most %g %% of the exposure for travel: guide tube and crank are not stated", 100*t.MostShare)
	}
	return j.with("share = 2 tube/(speed x exposure time), out and back")
}

func (t Travel) knobs(Facts) []knob {
	return []knob{rising("setup.sfdMM"), finer("detector.film.class")}
}

// Recorder is the detectors that a document is for.
type Recorder struct {
	Takes []string `json:"takes"`
}

func (r Recorder) valid() error {
	if len(r.Takes) == 0 {
		return fmt.Errorf("no detectors")
	}
	for _, d := range r.Takes {
		if !slices.Contains(recorders, d) {
			return fmt.Errorf("detector %q is unknown: want film, plate or panel", d)
		}
	}
	return nil
}

func (r Recorder) applies(f Facts) bool { return !slices.Contains(r.Takes, f.Detector) }

func (r Recorder) judge(f Facts) judgement {
	return judgement{verdict: Short, text: say("the plan has a %s, the document is for %v", f.Detector, r.Takes)}
}

func (r Recorder) knobs(Facts) []knob { return nil }
