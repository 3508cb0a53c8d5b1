package beam

import (
	"fmt"
	"math"
	"time"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// OutputSpread gives how far the output of a tube may lie from Tube's, as a
// share to either side: 15 % to 150 kV and 25 % above, which holds every
// published output that the model is gated on; 30 % for targets other than
// tungsten, whose outputs were not held against any; with a pulsed head a
// further 15 % for its waveform. The parts add as squares.
func OutputSpread(t plan.Tube) float64 {
	s := 0.15
	if t.KV > 150 {
		s = 0.25
	}
	if t.Target != "W" {
		s = 0.30
	}
	if t.Waveform != "constant" {
		s = math.Hypot(s, 0.15)
	}
	return s
}

// SealedSpread is the same for a sealed source: 5 % on the rate constant and
// 10 % on a certificate's activity; for Tm-170 30 % on the bremsstrahlung; with
// basis content 15 % on what the source keeps.
func SealedSpread(s plan.Sealed) float64 {
	spread := math.Hypot(0.05, 0.10)
	if s.Nuclide == "Tm-170" {
		spread = math.Hypot(spread, 0.30)
	}
	if s.Basis == Content {
		spread = math.Hypot(spread, 0.15)
	}
	return spread
}

// TubeWorking gives the steps behind s, the spectrum that Tube gave for t:
// target, continuum, lines, filters, output, mean energy.
func TubeWorking(t plan.Tube, s Spectrum) []working.Step {
	lines, rest := s.split()
	return []working.Step{
		{
			ID: "beam.endpoint", Name: "highest photon energy", Symbol: "E_max", Formula: "E_max = e U", Unit: "keV", Value: t.KV,
			Inputs: []working.Input{{Symbol: "U", Name: "peak tube voltage", Value: t.KV, Unit: "kV", Source: "plan"}},
			Source: "Duane and Hunt; common practice",
			Note:   fmt.Sprintf("shortest wavelength %.4g angstrom", DuaneHuntAngstrom(t.KV)),
		},
		{
			ID: "beam.fluence", Name: "photons behind the filters at 1 m", Symbol: "Phi",
			Formula: "Phi = sum over E of [c N(E, U, target) f(E, anode) + lines] exp(-sum mu_i(E) x_i)", Unit: "1/(cm2 mA s)", Value: lines + rest,
			Inputs: append([]working.Input{
				{Symbol: "target", Text: t.Target, Source: "plan"},
				{Symbol: "alpha", Name: "anode angle", Value: t.AnodeDeg, Unit: "deg", Source: "plan"},
				{Symbol: "c", Name: "fitted scale of the continuum", Value: thickScale, Source: "fitted once to TASMICS (50 to 150 kV) and ICRP 33 (200 to 300 kV)"},
				{Symbol: "waveform", Text: t.Waveform, Source: "plan"},
				{Symbol: "lines", Name: "share of characteristic lines", Value: lines / (lines + rest)},
			}, filterInputs(t.Filters)...),
			Source: "thick target: Bethe-Heitler with Elwert, Sommerfeld and screening corrections over the slowing down of electrons",
			Note:   "half-value layers within 4 % of published ones; " + waveformNote(t.Waveform),
		},
		meanStep(s),
		{
			ID: "beam.output", Name: "air kerma at 1 m, without air", Symbol: "Y", Formula: "Y = sum Phi(E) E mu_en/rho(E) x 60 s/min",
			Unit: "mGy/(mA min)", Value: s.KermaMGy() * 60, Source: "mu_en/rho of dry air: NIST",
			Note: fmt.Sprintf("within %.0f %% of published outputs", OutputSpread(t)*100),
		},
	}
}

// SealedWorking gives the steps behind s, the spectrum that Sealed gave for d,
// at the time of the shot.
func SealedWorking(d plan.Sealed, at time.Time, s Spectrum) ([]working.Step, error) {
	n, err := NuclideByName(d.Nuclide)
	if err != nil {
		return nil, err
	}
	days := at.Sub(d.Assayed).Hours() / 24
	factor := n.DecayFactor(d.Assayed, at)
	return []working.Step{
		{
			ID: "source.decay", Name: "decay since the certificate", Symbol: "d", Formula: "d = 2^(-t/T)", Value: factor, Unit: "1",
			Inputs: []working.Input{
				{Symbol: "t", Name: "time since the certificate", Value: days, Unit: "d", Source: "plan"},
				{Symbol: "T", Name: "half-life of " + n.Name, Value: n.HalfLifeDays, Unit: "d", Source: n.Source},
			},
			Source: "law of decay; half-life ICRP 107",
		},
		{
			ID: "source.activity", Name: "activity at the shot", Symbol: "A", Formula: "A = A0 d", Value: d.ActivityGBq * factor, Unit: "GBq",
			Inputs: []working.Input{
				{Symbol: "A0", Name: "activity on the certificate", Value: d.ActivityGBq, Unit: "GBq", Source: "plan"},
				{Symbol: "d", Value: factor},
			},
			Note: fmt.Sprintf("%.4g Ci; basis %s: %s", d.ActivityGBq*factor/GBqPerCi, basisOf(d), basisNote(d)),
		},
		meanStep(s),
		{
			ID: "beam.output", Name: "air kerma at 1 m, without air", Symbol: "Gamma", Formula: "Gamma = sum Phi(E) E mu_en/rho(E) x 3600 s/h",
			Unit: "mGy/(GBq h)", Value: s.KermaMGy() * 3600,
			Inputs: []working.Input{{Symbol: "E_cut", Name: "cut-off", Value: n.CutoffKeV, Unit: "keV", Source: "stopped by the capsule"}},
			Source: "lines: ICRP 107; mu_en/rho of dry air: NIST",
			Note:   fmt.Sprintf("rate constant within 3 %% of published ones; with the certificate %.0f %%. %s", SealedSpread(d)*100, n.Note),
		},
	}, nil
}

func meanStep(s Spectrum) working.Step {
	return working.Step{
		ID: "beam.meanKeV", Name: "mean photon energy", Symbol: "E_mean", Formula: "E_mean = sum Phi(E) E / sum Phi(E)",
		Unit: "keV", Value: s.MeanKeV(), Source: "ISO 4037-1, weighted by fluence",
	}
}

// filterInputs names the sheets that a beam passes.
func filterInputs(filters []plan.Filter) []working.Input {
	if len(filters) == 0 {
		return []working.Input{{Symbol: "x", Name: "no filter stated", Text: "none", Unit: "mm", Source: "plan"}}
	}
	var out []working.Input
	for i, f := range filters {
		out = append(out, working.Input{Symbol: fmt.Sprintf("x%d", i+1), Name: f.Material, Text: f.Material, Value: f.MM, Unit: "mm", Source: "plan"})
	}
	return out
}

func waveformNote(name string) string {
	if name == "constant" {
		return "constant potential"
	}
	return name + ": half waves of a sine, current limited by space charge to half the peak and constant above; 15 % on the output"
}

func basisOf(d plan.Sealed) string {
	if d.Basis == "" {
		return Output
	}
	return d.Basis
}

func basisNote(d plan.Sealed) string {
	if basisOf(d) == Content {
		return "weakened by the source's own metal and a steel capsule"
	}
	return "equivalent activity, nothing more is kept by the source"
}

// split sums the photons in lines and in bins.
func (s Spectrum) split() (lines, rest float64) {
	for i, n := range s.PerCM2 {
		if s.WidthKeV[i] == 0 {
			lines += n
		} else {
			rest += n
		}
	}
	return lines, rest
}
