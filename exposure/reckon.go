package exposure

import (
	"fmt"
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
)

// mostHours is the longest exposure that is answered: beyond, the setup is
// wrong, not the patience.
const mostHours = 24

// Reckon computes a plan. It normalises and validates it first, so an invalid
// plan cannot reach the physics; errors are *plan.FieldError or plan.Errors
// where a field can be named. Calibration moves times only.
func Reckon(p plan.Plan, cal Calibration, opts ...Option) (Reckoning, error) {
	var e engine
	for _, o := range opts {
		o(&e)
	}
	if err := p.ValidateFor(e.table().Names()); err != nil {
		return Reckoning{}, err
	}
	factor, err := cal.factor()
	if err != nil {
		return Reckoning{}, err
	}
	full, defaults := p.Normalised()
	s, err := newShot(full, e)
	if err != nil {
		return Reckoning{}, err
	}
	central, err := geometry(full)
	if err != nil {
		return Reckoning{}, err
	}
	r := Reckoning{Defaults: defaults, Engine: EngineVersion, Checks: []Check{}, Density: []Spot{}, Cautions: Cautions(), Geometry: central}
	if err := s.expose(&r, factor); err != nil || e.quick {
		return r, err
	}
	s.state(&r)
	if err := s.ropes(&r); err != nil {
		return Reckoning{}, err
	}
	if err := s.check(&r); err != nil {
		return Reckoning{}, err
	}
	return r, s.explain(&r, factor)
}

// factor is what calibration does to the time.
func (c Calibration) factor() (float64, error) {
	f := 1.0
	for _, v := range []float64{c.SourceFactor, c.FilmFactor} {
		if v == 0 {
			continue
		}
		if !(v >= 0.1 && v <= 10) {
			return 0, fmt.Errorf("calibration factor \"%g\" is outside 0.1 to 10: repeat the test shot", v)
		}
		f *= v
	}
	return f, nil
}

// expose fills in time, spread and what the image shows.
func (s *shot) expose(r *Reckoning, factor float64) error {
	ref, err := s.behind(s.plan.Part.Layers)
	if err != nil {
		return err
	}
	s.ref = ref
	constant, err := s.receptor.wants(ref.receptorRate)
	if err != nil {
		return err
	}
	constant *= factor
	seconds, ok := s.seconds(constant)
	if !ok || !(seconds <= mostHours*3600) {
		return s.tooLong(seconds)
	}
	r.Exposure.Seconds = seconds
	if s.quick {
		return nil
	}
	if err := s.fits(seconds); err != nil {
		return err
	}
	if r.Spread, err = s.contributions(ref, seconds/factor); err != nil {
		return err
	}
	wide := math.Exp(coverage * total(r.Spread))
	r.Exposure.SecondsLow, _ = s.seconds(constant / wide)
	if r.Exposure.SecondsHigh, ok = s.seconds(constant * wide); !ok {
		return s.tooLong(math.Inf(1))
	}
	return s.image(r, ref, constant/factor)
}

// image reads density or signal to noise ratio at every section.
func (s *shot) image(r *Reckoning, ref field, seconds float64) error {
	s.spot(r, "part", ref, seconds)
	if err := s.look(r, "part", s.plan.Part.Layers, ref, seconds); err != nil {
		return err
	}
	for _, section := range s.plan.Part.Sections {
		f, err := s.behind(section.Layers)
		if err != nil {
			return err
		}
		s.spot(r, section.Name, f, seconds)
		if err := s.look(r, section.Name, section.Layers, f, seconds); err != nil {
			return err
		}
	}
	return nil
}

func (s *shot) spot(r *Reckoning, at string, f field, seconds float64) {
	v := s.receptor.reading(f.receptorRate, seconds)
	if s.receptor.film != nil {
		wide := math.Exp(coverage * total(r.Spread))
		low, high := s.receptor.reading(f.receptorRate, seconds/wide), s.receptor.reading(f.receptorRate, seconds*wide)
		r.Density = append(r.Density, Spot{at, f.depthMM, v, low, high})
		return
	}
	r.SNR = append(r.SNR, Signal{at, f.depthMM, v})
}

func (s *shot) tooLong(seconds float64) error {
	value := "more than the source lasts"
	if !math.IsInf(seconds, 0) && seconds > 0 {
		value = fmt.Sprintf("%.3g h", seconds/3600)
	}
	return &plan.FieldError{Field: "part.layers", Value: value, Problem: "is the exposure time through this part",
		Allowed: fmt.Sprintf("at most %d h", mostHours), Mend: "take a higher kV or another source, a shorter SFD or a faster film"}
}

// fits refuses a run that does not go into its hour.
func (s *shot) fits(seconds float64) error {
	n := s.plan.Site.ShotsPerHour
	if n*seconds <= 3600 {
		return nil
	}
	return &plan.FieldError{Field: "site.shotsPerHour", Value: fmt.Sprint(n),
		Problem: fmt.Sprintf("times %.0f s is more than an hour", math.Ceil(seconds)),
		Allowed: fmt.Sprintf("at most %.4g shots an hour of this time", math.Floor(3600/seconds*100)/100), Mend: "plan fewer shots an hour or shorten the exposure"}
}

// state fills in beam and source.
func (s *shot) state(r *Reckoning) {
	b := s.spectrum
	if !s.noAir {
		b = b.InAir(beam.AirPathMM)
	}
	r.Beam = Beam{MeanKeV: b.MeanKeV(), KermaRateMGyPerMinAt1m: b.KermaMGy() * s.strength * 60}
	product := s.strength * r.Exposure.Seconds / 60
	if s.plan.Source.Tube != nil {
		r.Exposure.MAMin = &product
		return
	}
	r.Exposure.GBqMin = &product
	r.Source = SourceState{ActivityGBq: s.strength, ActivityCi: s.strength / beam.GBqPerCi, Decay: s.decay}
}

// geometry is that of the central ray, of what the setup images.
func geometry(p plan.Plan) (Geometry, error) {
	g, err := setup.Of(p)
	return Geometry{SFDMM: g.SFDMM, FMM: g.FMM, BMM: g.BMM, UgMM: g.UgMM}, err
}

// Cautions are the words that stand on every reckoning, sheet and print.
func Cautions() []string {
	return []string{
		"Results are an aid. Site radiation rules, the licence and the radiation safety officer or licensed supervisor govern.",
		"The edition of the code in force governs the technique.",
		"A calibrated survey meter decides where the barricade is safe. Never approach on the tablet's word.",
		"Boundaries round up, allowed times round down, unknown shielding counts as none.",
	}
}
