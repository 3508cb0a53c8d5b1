package rules

import (
	"fmt"
	"slices"
	"strings"
)

// Window is what a reading may be. For Density: optical density with base and
// fog, Tolerance taken off the floor. For Spread: per cent of the density at the
// part itself.
type Window struct {
	Floor     *float64 `json:"floor,omitempty"`
	Ceiling   *float64 `json:"ceiling,omitempty"`
	Tolerance float64  `json:"tolerance,omitzero"`
}

func (w Window) valid() error {
	if w.Floor == nil && w.Ceiling == nil || w.Tolerance < 0 || w.Floor != nil && w.Ceiling != nil && !(*w.Floor < *w.Ceiling) {
		return fmt.Errorf("window: want a floor or a ceiling, the floor below, a tolerance of 0 or more")
	}
	return nil
}

// worst gives the reading that is furthest out of the window, or nearest to its
// edge, and the edge.
func (w Window) worst(readings []Density) (at Density, limit float64, v Verdict) {
	room := 0.0
	v = Holds
	for i, d := range readings {
		for _, edge := range w.edges() {
			r := (d.Value - edge.limit) * edge.sign
			if i == 0 && edge == w.edges()[0] || r < room {
				at, limit, room = d, edge.limit, r
			}
			if r < -slack*max(1, edge.limit) {
				v = Short
			}
		}
	}
	return at, limit, v
}

type edge struct{ limit, sign float64 }

func (w Window) edges() []edge {
	var list []edge
	if w.Floor != nil {
		list = append(list, edge{tidy(*w.Floor - w.Tolerance), 1})
	}
	if w.Ceiling != nil {
		list = append(list, edge{*w.Ceiling, -1})
	}
	return list
}

type densityRule struct{ *Window }

func (d densityRule) applies(f Facts) bool { return f.Detector == "film" }

func (d densityRule) judge(f Facts) judgement {
	if len(f.Density) == 0 {
		return judgement{verdict: Undecided, text: "the density is not known"}
	}
	at, limit, v := d.worst(f.Density)
	j := judgement{verdict: v, value: at.Value, limit: limit, text: say("density %.2f at %q, %s", at.Value, at.At, d.said())}
	if v == Holds {
		j.text = say("density %s, %s", extent(least(f.Density), most(f.Density), "%.2f"), d.said())
	}
	return j
}

func (w Window) said() string {
	var parts []string
	if w.Floor != nil {
		s := say("at least %g", *w.Floor)
		if w.Tolerance > 0 {
			s += say(" less %g", w.Tolerance)
		}
		parts = append(parts, s)
	}
	if w.Ceiling != nil {
		parts = append(parts, say("at most %g", *w.Ceiling))
	}
	return strings.Join(parts, ", ")
}

func (d densityRule) knobs(Facts) []knob {
	return []knob{rising("detector.film.density"), falling("detector.film.density"), rising("source.tube.kv")}
}

type spreadRule struct{ *Window }

func (s spreadRule) applies(f Facts) bool { return f.Detector == "film" && len(f.Density) > 1 }

func (s spreadRule) judge(f Facts) judgement {
	ref := f.Density[0].Value
	var rel []Density
	for _, d := range f.Density[1:] {
		rel = append(rel, Density{d.At, 100 * (d.Value/ref - 1)})
	}
	at, limit, v := s.worst(rel)
	return judgement{verdict: v, value: at.Value, limit: limit, unit: "%", text: say("density at %q is %+.0f %% of that at the part, %s %%", at.At, at.Value, s.said())}.
		with("100 (D/D_part - 1)", in("D_part", "density at the part", ref, ""))
}

func (s spreadRule) knobs(Facts) []knob { return []knob{rising("source.tube.kv")} }

func least(d []Density) float64 {
	return slices.MinFunc(d, func(a, b Density) int { return cmp(a.Value, b.Value) }).Value
}

func most(d []Density) float64 {
	return slices.MaxFunc(d, func(a, b Density) int { return cmp(a.Value, b.Value) }).Value
}

func cmp(a, b float64) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

// BeamRange is a stretch of radiation and thickness: a tube's kV or nuclides.
// Bounds are above From, up to To; To 0 has no end.
type BeamRange struct {
	FromKV   float64  `json:"fromKV,omitzero"`
	ToKV     float64  `json:"toKV,omitzero"`
	Nuclides []string `json:"nuclides,omitempty"`
	FromMM   float64  `json:"fromMM,omitzero"` // penetrated thickness, most of all sections
	ToMM     float64  `json:"toMM,omitzero"`
	Below    bool     `json:"below,omitzero"` // ToMM itself does not belong to it
	From     bool     `json:"from,omitzero"`  // FromMM itself belongs to it
}

func (b BeamRange) takes(f Facts) bool {
	if f.Nuclide != "" {
		if !slices.Contains(b.Nuclides, f.Nuclide) {
			return false
		}
	} else if len(b.Nuclides) > 0 || f.KV <= b.FromKV || b.ToKV > 0 && f.KV > b.ToKV*(1+slack) {
		return false
	}
	w := f.ThickMM
	under := b.ToMM == 0 || w < b.ToMM || !b.Below && w <= b.ToMM*(1+slack)
	return under && (w > b.FromMM*(1+slack) || b.FromMM == 0 || b.From && w >= b.FromMM)
}

func (b BeamRange) valid() error {
	switch {
	case b.FromKV < 0 || b.ToKV < 0 || b.FromMM < 0 || b.ToMM < 0,
		b.ToKV > 0 && b.ToKV <= b.FromKV, b.ToMM > 0 && b.ToMM <= b.FromMM,
		len(b.Nuclides) > 0 && (b.FromKV > 0 || b.ToKV > 0), len(b.Nuclides) == 0 && b.ToKV == 0 && b.FromKV == 0:
		return fmt.Errorf("range %+v: want kV or nuclides, and ends that rise", b)
	}
	return nil
}

// FilmClass is the worst class of film system by beam.
type FilmClass struct {
	Rows []ClassRow `json:"rows"`
}

// ClassRow holds in its range.
type ClassRow struct {
	BeamRange
	Class string `json:"class"`
}

func (c FilmClass) valid() error {
	if len(c.Rows) == 0 {
		return fmt.Errorf("no rows of film classes")
	}
	for _, r := range c.Rows {
		if err := r.BeamRange.valid(); err != nil {
			return err
		}
		if classNumber(r.Class) == 0 {
			return fmt.Errorf("film class %q is unknown: want C1 to C6", r.Class)
		}
	}
	return nil
}

func classNumber(c string) int {
	if len(c) == 2 && c[0] == 'C' && c[1] >= '1' && c[1] <= '6' {
		return int(c[1] - '0')
	}
	return 0
}

func (c FilmClass) applies(f Facts) bool { return f.Detector == "film" }

func (c FilmClass) judge(f Facts) judgement {
	for _, r := range c.Rows {
		if r.takes(f) {
			have, want := float64(classNumber(f.Class)), float64(classNumber(r.Class))
			return judgement{verdict: atMost(have, want), value: have, limit: want, unit: "class C", text: say("film %s, %s or finer", f.Class, r.Class)}
		}
	}
	return judgement{verdict: Undecided, unit: "class C", text: "the rule has no film class for this beam and thickness"}
}

func (c FilmClass) knobs(Facts) []knob { return []knob{finer("detector.film.class")} }

// Screens is what lead screens may be, by beam.
type Screens struct {
	Rows []ScreenRow `json:"rows"`
}

// ScreenRow holds in its range. A side that has no most may be anything.
type ScreenRow struct {
	BeamRange
	Front [2]float64 `json:"front"`          // least and most, mm lead
	Back  [2]float64 `json:"back"`           // least and most, mm lead
	Other string     `json:"other,omitzero"` // screens of another metal that the rule wants
}

func (s Screens) valid() error {
	if len(s.Rows) == 0 {
		return fmt.Errorf("no rows of screens")
	}
	for _, r := range s.Rows {
		if err := r.BeamRange.valid(); err != nil {
			return err
		}
		for _, side := range [][2]float64{r.Front, r.Back} {
			if side[0] < 0 || side[1] < side[0] || side[1] == 0 && r.Other == "" {
				return fmt.Errorf("screen %v mm: want least and most, rising", side)
			}
		}
	}
	return nil
}

func (s Screens) applies(f Facts) bool { return f.ScreensMM != nil && f.Detector == "film" }

func (s Screens) judge(f Facts) judgement {
	for _, r := range s.Rows {
		if !r.takes(f) {
			continue
		}
		if r.Other != "" {
			return judgement{verdict: Undecided, value: f.ScreensMM[0], unit: "mm", text: "the rule wants screens of " + r.Other + ", the plan has lead"}
		}
		for i, side := range [][2]float64{r.Front, r.Back} {
			mm, name := f.ScreensMM[i], [2]string{"front", "back"}[i]
			text := say("%s screen %g mm lead, %g to %g mm", name, mm, side[0], side[1])
			switch {
			case atLeast(mm, side[0]) == Short:
				return judgement{verdict: Short, value: mm, limit: side[0], unit: "mm", text: text}
			case atMost(mm, side[1]) == Short:
				return judgement{verdict: Short, value: mm, limit: side[1], unit: "mm", text: text}
			}
		}
		return judgement{verdict: Holds, value: f.ScreensMM[0], limit: r.Front[1], unit: "mm", text: say("screens %g and %g mm lead, front %g to %g mm, back %g to %g mm", f.ScreensMM[0], f.ScreensMM[1], r.Front[0], r.Front[1], r.Back[0], r.Back[1])}
	}
	return judgement{verdict: Undecided, unit: "mm", text: "the rule has no screens for this beam and thickness"}
}

func (s Screens) knobs(f Facts) []knob {
	side := func(path string) []knob { return []knob{rising(path), falling(path)} }
	return slices.Concat(side("detector.film.screensMM[0]"), side("detector.film.screensMM[1]"))
}
