package exposure

import (
	"math"
	"slices"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
)

// Standard deviations that hold where the user states none: common practice
// for a site crew and its kit, except those that other packages state.
const (
	sdKV        = 0.01  // of the set kV
	sdMA        = 0.02  // of the set mA
	sdThickness = 0.02  // of a measured wall
	sdMaterial  = 0.01  // of a catalogue density
	sdDistance  = 0.01  // of a taped SFD
	sdSpeed     = 0.12  // of the dose of a make against its class's
	sdProcess   = 0.07  // of the dose, developer's age and temperature
	sdScatter   = 0.10  // of the scattered part at the film
	sdDigital   = 0.30  // of the dose of a kind of plate or panel
	coverage    = 2     // deviations between the figure and either end: about 95 %
	step        = 0.005 // relative step of the differences
)

// contributions reckons what each input does to the time, by differences of
// the whole physics where the time is no plain power of the input.
func (s *shot) contributions(ref field, seconds float64) ([]Contribution, error) {
	var list []Contribution
	add := func(name string, sd, power float64) {
		list = append(list, Contribution{Name: name, Input: sd * 100, Unit: "%", Relative: math.Abs(sd * power)})
	}
	add("SFD", sdDistance, 2)
	if t := s.plan.Source.Tube; t != nil {
		add("output of the head", beam.OutputSpread(*t)/coverage, 1)
		add("mA", sdMA, 1)
		power, err := s.powerOfKV(*t, seconds)
		if err != nil {
			return nil, err
		}
		add("kV", sdKV, power)
	} else {
		add("activity and rate constant", beam.SealedSpread(*s.plan.Source.Sealed)/coverage, 1)
	}
	power, err := s.powerOfThickness(seconds)
	if err != nil {
		return nil, err
	}
	add("thickness of the part", sdThickness, power)
	add("density of the material", sdMaterial, power)
	if s.receptor.film != nil {
		add("film speed", sdSpeed, 1)
		add("processing", sdProcess, 1)
		add("scattered radiation", sdScatter, ref.scatter/ref.total())
	} else {
		add("sensitivity of the detector", sdDigital, 1)
	}
	slices.SortStableFunc(list, func(a, b Contribution) int {
		switch {
		case a.Relative > b.Relative:
			return -1
		case a.Relative < b.Relative:
			return 1
		}
		return 0
	})
	return list, nil
}

// powerOfKV is d ln(time) / d ln(kV).
func (s *shot) powerOfKV(t plan.Tube, seconds float64) (float64, error) {
	t.KV *= 1 - step // downward: stays inside the tube's range but at its foot
	if t.KV < beam.LeastKV {
		t.KV = beam.LeastKV
		return 0, nil
	}
	other := *s
	var err error
	if other.spectrum, err = beam.Tube(t); err != nil {
		return 0, err
	}
	other.bare = other.receptor.open(other.at(0)).times(other.square())
	return other.power(s.plan.Part.Layers, seconds, -step)
}

// powerOfThickness is d ln(time) / d ln(thickness), all layers together.
func (s *shot) powerOfThickness(seconds float64) (float64, error) {
	layers := slices.Clone(s.plan.Part.Layers)
	for i := range layers {
		layers[i].MM *= 1 + step
	}
	return s.power(layers, seconds, step)
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
