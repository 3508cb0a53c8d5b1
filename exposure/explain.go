package exposure

import (
	"fmt"
	"slices"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/working"
)

// explain writes the working of every figure, in the order of the reckoning.
func (s *shot) explain(r *Reckoning, factor float64) error {
	var head []working.Step
	if t := s.plan.Source.Tube; t != nil {
		head = beam.TubeWorking(*t, s.spectrum)
	} else {
		var err error
		if head, err = beam.SealedWorking(*s.plan.Source.Sealed, s.plan.At, s.spectrum); err != nil {
			return err
		}
	}
	ref := s.ref
	steps := slices.Concat(head, s.beamSteps(r), s.partSteps(ref), s.timeSteps(r, ref, factor), s.imageSteps(r), lookSteps(r.Image))
	r.Workings = append(steps, r.Workings...)
	return nil
}

func plain(symbol, name string, value float64, unit string) working.Input {
	return working.Input{Symbol: symbol, Name: name, Value: value, Unit: unit, Source: "plan"}
}

func (s *shot) beamSteps(r *Reckoning) []working.Step {
	strength := plain("I", "tube current", s.strength, "mA")
	if s.plan.Source.Sealed != nil {
		strength = working.Input{Symbol: "A", Name: "activity at the shot", Value: s.strength, Unit: "GBq"}
	}
	return []working.Step{
		{ID: "beam.kermaRateMGyPerMinAt1m", Name: "air kerma rate at 1 m, behind 1 m of air", Symbol: "K1", Formula: "K1 = sum Phi(E) exp(-mu_air 1 m) E mu_en/rho(E) x strength x 60",
			Inputs: []working.Input{strength}, Value: r.Beam.KermaRateMGyPerMinAt1m, Unit: "mGy/min", Source: "mu of air: NIST XCOM; mu_en/rho: NIST"},
		{ID: "beam.meanKeV", Name: "mean energy of the beam at 1 m", Symbol: "E_mean", Formula: "E_mean = sum Phi(E) E / sum Phi(E)", Value: r.Beam.MeanKeV, Unit: "keV"},
		{ID: "geometry.ugMM", Name: "geometric unsharpness", Symbol: "Ug", Formula: "Ug = d b / f", Value: r.Geometry.UgMM, Unit: "mm",
			Inputs: []working.Input{plain("f", "source to part", r.Geometry.FMM, "mm"), plain("b", "part to film", r.Geometry.BMM, "mm")}, Source: "similar triangles"},
	}
}

func (s *shot) partSteps(ref field) []working.Step {
	var in []working.Input
	for i, l := range s.plan.Part.Layers {
		in = append(in, working.Input{Symbol: fmt.Sprintf("t%d", i+1), Name: l.Material, Value: l.MM, Unit: "mm", Source: "plan"})
	}
	in = append(in, plain("SFD", "source to film", s.plan.Setup.SFDMM, "mm"))
	if s.receptor.film == nil {
		return []working.Step{{ID: "detector.quantaPerS", Name: "quanta kept per second", Symbol: "q", Formula: "q = (sum a E Phi)^2 / sum a E^2 Phi", Inputs: in,
			Value: ref.total(), Unit: "1/(cm2 s)", Source: s.receptor.digital.Source}}
	}
	screens := s.plan.Detector.Film.ScreensMM
	in = append(in, plain("s1", "front lead screen", screens[0], "mm"), plain("s2", "back lead screen", screens[1], "mm"))
	return []working.Step{
		{ID: "film.primaryMGyPerS", Name: "dose rate that the film answers to, unscattered", Symbol: "X'p",
			Formula: "X'p = (1000/SFD)^2 sum Phi(E) exp(-sum mu_i t_i) R(E, s1, s2) / R_7004", Inputs: in, Value: ref.primary, Unit: "mGy/s",
			Source: "mu: NIST XCOM; R: Burlin's cavity theory; R_7004: the simulated beam of ISO 7004"},
		{ID: "film.scatterMGyPerS", Name: "the same from radiation scattered in the part", Symbol: "X's",
			Formula: "X's = (1000/SFD)^2 sum Phi_s(E) R(E, s1, s2) / R_7004", Value: ref.scatter, Unit: "mGy/s",
			Source: "photon Monte Carlo, open wide field", Note: fmt.Sprintf("%.2f scattered to 1 unscattered at the film; never counted for more than the part takes away", ref.scatter/ref.primary)},
	}
}

func (s *shot) timeSteps(r *Reckoning, ref field, factor float64) []working.Step {
	want := working.Step{ID: "exposure.seconds", Name: "exposure time", Symbol: "t", Value: r.Exposure.Seconds, Unit: "s",
		Note: "reciprocity holds for direct X-ray exposure"}
	if f := s.receptor.film; f != nil {
		dose, _ := f.DoseMGy(s.receptor.density)
		want.Formula = "t = X(D) c / (X'p + X's)"
		want.Inputs = []working.Input{
			{Symbol: "X(D)", Name: "dose for density " + fmt.Sprint(s.receptor.density) + " on class " + f.Class, Value: dose, Unit: "mGy", Source: f.Source},
			{Symbol: "c", Name: "calibration", Value: factor, Source: "test shots; 1 without"},
		}
	} else {
		want.Formula = "t = q(SNR_N) c / q"
		want.Inputs = []working.Input{{Symbol: "SNR_N", Name: "wanted", Value: s.receptor.snrN, Source: "plan"}, {Symbol: "c", Name: "calibration", Value: factor}}
	}
	if s.perS > 0 {
		want.Note += "; decay during the exposure is counted: t = -ln(1 - lambda t0)/lambda"
	}
	spread := working.Step{ID: "exposure.secondsHigh", Name: "longest that the time may be", Symbol: "t+", Formula: "t+ = t exp(2 sqrt(sum u_i^2)), t- likewise", Value: r.Exposure.SecondsHigh, Unit: "s",
		Source: "common practice for the inputs; two standard deviations, about 95 %"}
	for _, c := range r.Spread {
		spread.Inputs = append(spread.Inputs, working.Input{Symbol: "u", Name: c.Name, Value: c.Relative * 100, Unit: "%"})
	}
	product := working.Step{Symbol: "M", Unit: "mA min", ID: "exposure.mAMin", Name: "exposure", Formula: "M = I t / 60"}
	if r.Exposure.GBqMin != nil {
		product = working.Step{Symbol: "M", Unit: "GBq min", ID: "exposure.GBqMin", Name: "exposure", Formula: "M = A t / 60, A at the plan's time", Value: *r.Exposure.GBqMin}
	} else {
		product.Value = *r.Exposure.MAMin
	}
	return []working.Step{want, product, spread}
}

func (s *shot) imageSteps(r *Reckoning) []working.Step {
	var out []working.Step
	for _, d := range r.Density {
		out = append(out, working.Step{ID: "density." + d.At, Name: "density at " + d.At, Symbol: "D", Formula: "D = B + Dm (1 - exp(-(X/k)^p))", Value: d.Density, Unit: "1",
			Inputs: []working.Input{plain("t", "material along the ray", d.ThicknessMM, "mm"), {Symbol: "B", Name: "base and fog", Value: s.receptor.film.BaseAndFog, Source: "usual"}},
			Source: s.receptor.film.Source, Note: s.receptor.film.Confidence})
	}
	for _, d := range r.SNR {
		out = append(out, working.Step{ID: "snr." + d.At, Name: "normalised signal to noise ratio at " + d.At, Symbol: "SNR_N", Formula: "1/SNR_N^2 = 1/(q t A) + 1/SNR_max^2", Value: d.SNRn, Unit: "1",
			Inputs: []working.Input{plain("t", "material along the ray", d.ThicknessMM, "mm")}, Source: s.receptor.digital.Source})
	}
	return out
}
