package exposure

import (
	"math"
	"slices"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// Standard deviations that hold where the plan states none (plan.Uncertainty):
// common practice for a site crew and its kit, except those that package beam
// states of itself.
const (
	sdKV        = 0.01  // of the set kV
	sdMA        = 0.02  // of the set mA
	sdFilter    = 0.03  // of the filters' thickness
	sdActivity  = 0.05  // of the certificate's activity
	sdThickness = 0.02  // of a measured wall
	sdMaterial  = 0.01  // of a catalogue density
	sdDistance  = 0.01  // of a taped SFD
	sdSpeed     = 0.12  // of the dose of a make against its class's
	sdProcess   = 0.07  // of the dose, developer's age and temperature
	sdScatter   = 0.10  // of the scattered part at the detector
	sdResponse  = 0.15  // of the response, for a factor e in energy from where it is known
	sdDigital   = 0.30  // of the dose of a kind of plate or panel
	responseKeV = 147   // mean energy of ISO 7004's beam, where film speed is known
	coverage    = 2     // deviations between the figure and either end: about 95 %
	step        = 0.005 // relative step of the differences
)

// spreading gathers the contributions of one shot.
type spreading struct {
	*shot
	ref     field
	seconds float64
	list    []Contribution
}

// contributions reckons what each input does to the time, the largest first:
// its own standard deviation times the power of it that the time goes by, from
// differences of the whole physics where that is no plain power. seconds is the
// time without calibration.
func (s *shot) contributions(ref field, seconds float64) ([]Contribution, error) {
	c := &spreading{shot: s, ref: ref, seconds: seconds}
	for _, part := range []func() error{c.ofSource, c.ofPart, c.ofDetector} {
		if err := part(); err != nil {
			return nil, err
		}
	}
	slices.SortStableFunc(c.list, func(a, b Contribution) int {
		switch {
		case a.Relative > b.Relative:
			return -1
		case a.Relative < b.Relative:
			return 1
		}
		return 0
	})
	return c.list, nil
}

// add counts an input: what the plan says of it in percent, else the default.
func (c *spreading) add(name string, pct, def, power float64) {
	sd, from := def, "default"
	if pct > 0 {
		sd, from = pct/100, "plan"
	}
	c.put(Contribution{Name: name, Input: sd * 100, Unit: "%", From: from, Power: power, Relative: math.Abs(sd * power)})
}

func (c *spreading) put(k Contribution) {
	if k.Relative > 0 {
		c.list = append(c.list, k)
	}
}

func (c *spreading) ofSource() error {
	u := c.plan.Uncertainty
	if c.shots.sourcePct > 0 {
		c.put(Contribution{Name: "source, by test shots", Input: c.shots.sourcePct, Unit: "%", From: "test shots", Power: 1, Relative: c.shots.sourcePct / 100})
	}
	tube := c.plan.Source.Tube
	if tube == nil {
		if c.shots.sourcePct > 0 {
			return nil
		}
		sealed := *c.plan.Source.Sealed
		whole := beam.SealedSpread(sealed) / coverage
		c.add("activity", u.ActivityPct, sdActivity, 1)
		c.add("rate constant", u.OutputPct, math.Sqrt(max(0, whole*whole-sdActivity*sdActivity)), 1)
		return nil
	}
	kv, err := c.powerOfKV(*tube)
	if err != nil {
		return err
	}
	filter, err := c.powerOfFilters(tube.Filters)
	if err != nil {
		return err
	}
	c.add("kV", u.KVPct, sdKV, kv)
	if c.shots.sourcePct > 0 {
		return nil
	}
	c.add("output of the head", u.OutputPct, beam.OutputSpread(*tube)/coverage, 1)
	c.add("mA", u.MAPct, sdMA, 1)
	c.add("filters", u.FilterPct, sdFilter, filter)
	return nil
}

func (c *spreading) ofPart() error {
	u := c.plan.Uncertainty
	power, err := c.powerOfThickness()
	if err != nil {
		return err
	}
	c.add("SFD", u.SFDPct, sdDistance, 2)
	c.add("thickness of the part", u.ThicknessPct, sdThickness, power)
	c.add("density of the material", u.MaterialPct, sdMaterial, power)
	return nil
}

func (c *spreading) ofDetector() error {
	u := c.plan.Uncertainty
	if c.receptor.film == nil {
		c.add("sensitivity of the detector", u.SpeedPct, sdDigital, 1)
		c.add("model", u.ModelPct, sdScatter, 1)
		return nil
	}
	if pct := c.shots.filmPct; pct > 0 {
		c.put(Contribution{Name: "film, by test shots", Input: pct, Unit: "%", From: "test shots", Power: 1, Relative: pct / 100})
	} else {
		c.add("film speed", u.SpeedPct, sdSpeed, 1)
		c.add("processing", u.ProcessingPct, sdProcess, 1)
	}
	mean, err := c.meanBehindKeV()
	if err != nil {
		return err
	}
	c.add("model", u.ModelPct, math.Hypot(sdScatter*c.ref.scatter/c.ref.total(), sdResponse*math.Abs(math.Log(mean/responseKeV))), 1)
	return nil
}

// meanBehindKeV is the mean energy of the unscattered photons at the film; where
// none are left, where the response is known.
func (s *shot) meanBehindKeV() (float64, error) {
	sp := s.at(depthMM(s.plan.Part.Layers))
	for _, l := range s.plan.Part.Layers {
		m, err := materials.Lookup(l.Material)
		if err != nil {
			return 0, err
		}
		sp = sp.Through(m, l.MM)
	}
	if mean := sp.MeanKeV(); mean > 0 {
		return mean, nil
	}
	return responseKeV, nil
}

// powerOfKV is d ln(time) / d ln(kV); at the tube's least kV, where no step
// downward is possible, it is taken upward.
func (c *spreading) powerOfKV(t plan.Tube) (float64, error) {
	by := -step
	if t.KV*(1+by) < beam.LeastKV {
		by = step
	}
	t.KV *= 1 + by
	sp, err := beam.Tube(t)
	if err != nil {
		return 0, err
	}
	return c.with(sp).power(c.plan.Part.Layers, c.seconds, by)
}

// powerOfFilters is d ln(time) / d ln(thickness of all filters).
func (c *spreading) powerOfFilters(filters []plan.Filter) (float64, error) {
	if len(filters) == 0 {
		return 0, nil
	}
	sp := c.spectrum
	for _, f := range filters {
		m, err := materials.Lookup(f.Material)
		if err != nil {
			return 0, err
		}
		sp = sp.Through(m, f.MM*step)
	}
	return c.with(sp).power(c.plan.Part.Layers, c.seconds, step)
}

// with is the shot with another spectrum.
func (s *shot) with(sp beam.Spectrum) *shot {
	other := *s
	other.spectrum = sp
	other.bare = other.receptor.open(other.at(0)).times(other.square())
	return &other
}

// powerOfThickness is d ln(time) / d ln(thickness), all layers together.
func (c *spreading) powerOfThickness() (float64, error) {
	layers := slices.Clone(c.plan.Part.Layers)
	for i := range layers {
		layers[i].MM *= 1 + step
	}
	return c.power(layers, c.seconds, step)
}

func (s *shot) power(layers []plan.Layer, seconds, by float64) (float64, error) {
	f, err := s.behind(layers)
	if err != nil {
		return 0, err
	}
	t, err := s.receptor.wants(f.receptorRate)
	if err != nil || math.IsInf(t, 0) {
		return 0, err
	}
	return math.Log(t/s.atStart(seconds)) / math.Log1p(by), nil
}

// total adds the contributions as squares.
func total(list []Contribution) float64 {
	var sum float64
	for _, c := range list {
		sum += c.Relative * c.Relative
	}
	return math.Sqrt(sum)
}
