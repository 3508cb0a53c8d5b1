package rules

import (
	"fmt"

	"halfvalue/exposure/plan"
)

// Wires is the wire that must show, by thickness, in three columns: single wall
// by nominal thickness, both walls shown, and both walls passed with the
// indicator at the film.
type Wires struct {
	Single     []WireStep `json:"single"`
	BothShown  []WireStep `json:"bothShown"`
	AtTheFilm  []WireStep `json:"atTheFilm"`
	Relaxation string     `json:"relaxation,omitzero"` // what parties may agree on
}

// WireStep asks for a wire up to a thickness, mm.
type WireStep struct {
	Wire   int     `json:"wire"`
	UpToMM float64 `json:"upToMM"`
}

// wireMM are the diameters of ISO 19232-1, W1 to W19 (from memory, high).
var wireMM = [...]float64{3.2, 2.5, 2, 1.6, 1.25, 1, 0.8, 0.63, 0.5, 0.4, 0.32, 0.25, 0.2, 0.16, 0.125, 0.1, 0.08, 0.063, 0.05}

// WireMM is the diameter of wire W1 to W19 of ISO 19232-1, mm; 0 for another
// number.
func WireMM(number int) float64 {
	if number < 1 || number > len(wireMM) {
		return 0
	}
	return wireMM[number-1]
}

func (w Wires) valid() error {
	for _, column := range [][]WireStep{w.Single, w.BothShown, w.AtTheFilm} {
		last := WireStep{Wire: len(wireMM) + 1}
		for _, s := range column {
			if s.Wire < 1 || s.Wire >= last.Wire || !(s.UpToMM > last.UpToMM) || last.Wire <= len(wireMM) && s.Wire != last.Wire-1 {
				return fmt.Errorf("wire step %+v: want wires that fall one by one and thicknesses that rise", s)
			}
			last = s
		}
		if len(column) == 0 {
			return fmt.Errorf("a column of wires is empty")
		}
	}
	return nil
}

func (w Wires) applies(Facts) bool { return true }

// column picks the column and the thickness that it goes by.
func (w Wires) column(f Facts) ([]WireStep, float64, string) {
	switch f.Setup.Kind {
	case plan.DoubleWallDoubleImage:
		return w.BothShown, f.WMM, "source side, both walls shown"
	case plan.DoubleWallSingleImage:
		return w.AtTheFilm, f.WMM, "film side, marked F"
	}
	return w.Single, f.Setup.TMM, "source side"
}

// Needed gives the wire, or false beyond the last row.
func (w Wires) Needed(f Facts) (int, bool) {
	column, t, _ := w.column(f)
	for _, s := range column {
		if t <= s.UpToMM*(1+slack) {
			return s.Wire, true
		}
	}
	return 0, false
}

func (w Wires) judge(f Facts) judgement {
	_, t, side := w.column(f)
	need, ok := w.Needed(f)
	if !ok {
		return judgement{verdict: Undecided, unit: "W", text: say("%g mm is beyond the last row of wires", t)}
	}
	j := judgement{value: float64(f.Wire), limit: float64(need), unit: "W", verdict: atLeast(float64(f.Wire), float64(need)),
		text: say("W%d shows, W%d (%g mm) must, %s, at %g mm", f.Wire, need, WireMM(need), side, t)}
	if f.Wire == 0 {
		j.verdict, j.text = Undecided, say("W%d (%g mm) must show, %s, at %g mm: no film has been read", need, WireMM(need), side, t)
	}
	if single := f.Setup.Kind == plan.SingleWall || f.Setup.Kind == plan.Panoramic; w.Relaxation != "" && f.Nuclide == "Ir-192" && single {
		j.text += "; " + w.Relaxation
	}
	return j
}

func (w Wires) knobs(Facts) []knob { return nil }

// Plaque is the hole and wire indicators of ASME by the thickness of a single
// wall.
type Plaque struct {
	Steps []PlaqueStep `json:"steps"`
}

// PlaqueStep holds up to a thickness. Plaques are by number with the 2T hole,
// wires in inch.
type PlaqueStep struct {
	UpToIn     float64 `json:"upToIn"`
	Source     int     `json:"source"`
	SourceWire float64 `json:"sourceWireIn"`
	Film       int     `json:"film"`
	FilmWire   float64 `json:"filmWireIn"`
}

func (p Plaque) valid() error {
	last := PlaqueStep{}
	for _, s := range p.Steps {
		if !(s.UpToIn > last.UpToIn && s.Source > last.Source && s.Film > last.Film && s.SourceWire > last.SourceWire && s.FilmWire > last.FilmWire && s.Film < s.Source && s.FilmWire < s.SourceWire) {
			return fmt.Errorf("plaque step %+v: want figures that rise, the film side's below the source side's", s)
		}
		last = s
	}
	if len(p.Steps) == 0 {
		return fmt.Errorf("no plaque steps")
	}
	return nil
}

func (p Plaque) applies(Facts) bool { return true }

func (p Plaque) judge(f Facts) judgement {
	t := f.Setup.TMM
	for _, s := range p.Steps {
		if t <= s.UpToIn*25.4*(1+slack) {
			n, wire, side := s.Source, s.SourceWire, "source side"
			if f.Setup.Kind == plan.DoubleWallSingleImage {
				n, wire, side = s.Film, s.FilmWire, "film side, marked F"
			}
			return judgement{verdict: Undecided, limit: float64(n), unit: "plaque, 2T", text: say("plaque %d with its 2T hole or wire %.3f in (%.3g mm), %s, at %g mm: no film has been read", n, wire, wire*25.4, side, t)}
		}
	}
	return judgement{verdict: Undecided, unit: "plaque, 2T", text: say("%g mm is beyond the last row of plaques", t)}
}

func (p Plaque) knobs(Facts) []knob { return nil }

// SNR is the least normalised signal-to-noise ratio of a plate or panel.
type SNR struct {
	Rows []SNRRow `json:"rows"`
}

// SNRRow holds in its range.
type SNRRow struct {
	BeamRange
	SNRn float64 `json:"snrN"`
}

func (s SNR) valid() error {
	if len(s.Rows) == 0 {
		return fmt.Errorf("no rows of signal-to-noise ratios")
	}
	for _, r := range s.Rows {
		if err := r.BeamRange.valid(); err != nil {
			return err
		}
		if !(r.SNRn > 0) {
			return fmt.Errorf("signal-to-noise ratio %v is out of range: want above 0", r.SNRn)
		}
	}
	return nil
}

func (s SNR) applies(f Facts) bool { return f.Detector == "plate" || f.Detector == "panel" }

func (s SNR) judge(f Facts) judgement {
	for _, r := range s.Rows {
		if !r.takes(f) {
			continue
		}
		if len(f.SNRn) == 0 {
			break
		}
		v := least(f.SNRn)
		j := judgement{value: v, limit: r.SNRn, verdict: atLeast(v, r.SNRn), text: say("SNR_N %.4g, at least %g, 1.4 times that beside the weld", v, r.SNRn)}
		if f.SRbUM == 0 && j.verdict == Holds {
			j.verdict = Undecided
			j.text += "; the basic spatial resolution is not stated"
		}
		return j
	}
	return judgement{verdict: Undecided, text: "the rule has no signal-to-noise ratio for this beam and thickness"}
}

func (s SNR) knobs(f Facts) []knob { return []knob{rising("detector." + f.Detector + ".snrN")} }
