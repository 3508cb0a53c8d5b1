package rules

import (
	"fmt"
	"maps"
	"slices"
	"strings"
)

// figures is each rule in a cell of RULES.md.

func (m MinF) figures() string {
	return say("f/d >= %g b^%.3g; b = t below %g t; source inside %g, on the axis %g of it", m.Coefficient, m.Power, m.TouchFactor, m.InsideShare, m.CentralShare)
}

func (m MaxUg) figures() string {
	var parts []string
	for _, s := range m.Steps {
		if s.UpToMM > 0 {
			parts = append(parts, say("to %g mm %g mm", s.UpToMM, s.UgMM))
			continue
		}
		parts = append(parts, say("above %g mm", s.UgMM))
	}
	return strings.Join(parts, ", ")
}

func (d densityRule) figures() string { return d.said() }
func (s spreadRule) figures() string  { return s.said() + " (%)" }
func (r Rise) figures() string        { return say("K %g", r.K) }
func (t Travel) figures() string      { return say("at most %g %%", 100*t.MostShare) }
func (r Recorder) figures() string    { return strings.Join(r.Takes, ", ") }

func (n Nuclides) figures() string {
	var parts []string
	for _, name := range slices.Sorted(maps.Keys(n.Ranges)) {
		r := n.Ranges[name]
		part := say("%s %g to %g mm", name, r.FromMM, r.ToMM)
		if r.AgreedMM > 0 {
			part += say(" (agreed from %g)", r.AgreedMM)
		}
		parts = append(parts, part)
	}
	return strings.Join(parts, ", ")
}

func (m MaxKV) figures() string {
	var parts []string
	for _, p := range m.Points {
		parts = append(parts, say("%g mm %g kV", p[0], p[1]))
	}
	return strings.Join(parts, ", ") + say("; %g kV more where thickness varies", m.RiseKV)
}

func (b BeamRange) said() string {
	s := strings.Join(b.Nuclides, ", ")
	if s == "" {
		s = say("above %g to %g kV", b.FromKV, b.ToKV)
	}
	switch {
	case b.ToMM > 0 && b.Below:
		s += say(" below %g mm", b.ToMM)
	case b.ToMM > 0:
		s += say(" to %g mm", b.ToMM)
	case b.FromMM > 0 && b.From:
		s += say(" from %g mm", b.FromMM)
	case b.FromMM > 0:
		s += say(" above %g mm", b.FromMM)
	}
	return s
}

func (c FilmClass) figures() string {
	var parts []string
	for _, r := range c.Rows {
		parts = append(parts, r.said()+" "+r.Class)
	}
	return strings.Join(parts, "; ")
}

func (s Screens) figures() string {
	var parts []string
	for _, r := range s.Rows {
		if r.Other != "" {
			parts = append(parts, r.said()+" "+r.Other)
			continue
		}
		parts = append(parts, r.said()+say(" front %g to %g, back %g to %g mm", r.Front[0], r.Front[1], r.Back[0], r.Back[1]))
	}
	return strings.Join(parts, "; ")
}

func (s SNR) figures() string {
	var parts []string
	for _, r := range s.Rows {
		parts = append(parts, r.said()+say(" %g", r.SNRn))
	}
	return strings.Join(parts, "; ")
}

func (w Wires) figures() string {
	column := func(list []WireStep) string {
		var parts []string
		for _, s := range list {
			parts = append(parts, say("W%d %g", s.Wire, s.UpToMM))
		}
		return strings.Join(parts, ", ")
	}
	return say("to mm, one wall: %s; both walls shown: %s; both walls passed, at the film: %s", column(w.Single), column(w.BothShown), column(w.AtTheFilm))
}

func (p Plaque) figures() string {
	var parts []string
	for _, s := range p.Steps {
		parts = append(parts, say("to %g in: %d or %.3f in, film side %d or %.3f in", s.UpToIn, s.Source, s.SourceWire, s.Film, s.FilmWire))
	}
	return strings.Join(parts, "; ")
}

func (s SmallPipe) figures() string {
	text := say("De to %g mm", s.MostODMM)
	if s.MostWallMM > 0 {
		text += say(", t to %g mm", s.MostWallMM)
	}
	if s.MostWeldShare > 0 {
		text += say(", weld to %g De", s.MostWeldShare)
	}
	return text
}

func (w TwoWalls) figures() string {
	text := fmt.Sprintf("%d, %s apart", w.Thin, w.Apart)
	if w.Ratio > 0 {
		text += say("; from t/De %g %d, %s apart", w.Ratio, w.Thick, w.Apart2)
	}
	return text
}
