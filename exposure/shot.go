package exposure

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/detector"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// shot is a plan made ready: its spectrum, strength and receptor.
type shot struct {
	engine
	plan     plan.Plan // normalised
	spectrum beam.Spectrum
	strength float64 // mA, or GBq at the plan's time
	decay    float64 // activity against the certificate's; 1 with a tube
	perS     float64 // decay constant, 1/s; 0 with a tube
	receptor receptor
	ref      field        // behind the part's layers, once exposed
	bare     receptorRate // at the film with no part at all
}

// field is what arrives at the detector behind some layers, per second, before
// inverse square is asked about anything else.
type field struct {
	receptorRate // what the detector makes of it
	depthMM      float64
}

func newShot(p plan.Plan, e engine) (*shot, error) {
	s := &shot{engine: e, plan: p, decay: 1}
	var err error
	switch src := p.Source; {
	case src.Tube != nil:
		s.strength = src.Tube.MA
		s.spectrum, err = beam.Tube(*src.Tube)
	default:
		var n beam.Nuclide
		if n, err = beam.NuclideByName(src.Sealed.Nuclide); err != nil {
			break
		}
		s.decay = n.DecayFactor(src.Sealed.Assayed, p.At)
		s.strength = src.Sealed.ActivityGBq * s.decay
		s.perS = math.Ln2 / (n.HalfLifeDays * 86400)
		s.spectrum, err = beam.Sealed(*src.Sealed)
	}
	if err != nil {
		return nil, fmt.Errorf("source: %w", err)
	}
	if s.receptor, err = newReceptor(p.Detector); err != nil {
		return nil, err
	}
	s.bare = s.receptor.open(s.at(0)).times(s.square())
	return s, nil
}

// depthMM is the material along the ray.
func depthMM(layers []plan.Layer) float64 {
	var sum float64
	for _, l := range layers {
		sum += l.MM
	}
	return sum
}

// at gives the spectrum on the part: inverse square to the film, and the air
// that is not taken up by the part.
func (s *shot) at(depth float64) beam.Spectrum {
	sp := s.spectrum
	if air := s.plan.Setup.SFDMM - depth; !s.noAir && air > 0 {
		sp = sp.InAir(air)
	}
	return sp
}

// behind reckons what the detector sees behind the layers. More of a part never
// counts as less time: a light or thin layer in a wide field can send the
// detector more, as soft scatter, than it takes away. Where the detector would
// see less without some of the layers, what it would see then stands.
func (s *shot) behind(layers []plan.Layer) (field, error) {
	stack, err := stackOf(layers)
	if err != nil {
		return field{}, err
	}
	f := field{depthMM: depthMM(layers)}
	if f.receptorRate, err = s.rateOf(stack); err != nil {
		return field{}, err
	}
	for _, fewer := range without(stack) {
		r, err := s.rateOf(fewer)
		if err != nil {
			return field{}, err
		}
		if r.total() < f.total() {
			f.receptorRate = r
		}
	}
	if s.bare.total() < f.total() {
		f.receptorRate = s.bare
	}
	return f, nil
}

// rateOf is what the detector gathers in a second behind the stack.
func (s *shot) rateOf(stack []transport.Layer) (receptorRate, error) {
	var depth float64
	for _, l := range stack {
		depth += l.MM
	}
	sp := s.at(depth)
	exit, err := transport.Slab(stack, sp.KeV, sp.PerCM2)
	if err != nil {
		return receptorRate{}, fmt.Errorf("part: %w", err)
	}
	return s.receptor.rate(exit, sp.KeV).times(s.square()), nil
}

// mostSubsets is up to how many different layers every choice of them is tried;
// of more, each is left out alone.
const mostSubsets = 3

// without gives the stack with some but not all of its layers left out.
func without(stack []transport.Layer) [][]transport.Layer {
	n := len(stack)
	if n < 2 {
		return nil
	}
	var out [][]transport.Layer
	if n > mostSubsets {
		for i := range stack {
			out = append(out, slices.Delete(slices.Clone(stack), i, i+1))
		}
		return out
	}
	for mask := 1; mask < 1<<n-1; mask++ {
		var some []transport.Layer
		for i, l := range stack {
			if mask>>i&1 == 1 {
				some = append(some, l)
			}
		}
		out = append(out, some)
	}
	return out
}

// square is the source's strength at the film against that at 1 m.
func (s *shot) square() float64 {
	q := 1000 / s.plan.Setup.SFDMM
	return q * q * s.strength
}

// stackOf looks the layers up and joins neighbours of one material.
func stackOf(layers []plan.Layer) ([]transport.Layer, error) {
	var stack []transport.Layer
	for _, l := range layers {
		m, err := materials.Lookup(l.Material)
		if err != nil {
			return nil, err
		}
		if n := len(stack); n > 0 && stack[n-1].Material == m {
			stack[n-1].MM += l.MM
			continue
		}
		stack = append(stack, transport.Layer{Material: m, MM: l.MM})
	}
	return stack, nil
}

// seconds turns the time at the strength of the start into the time that a
// decaying source takes; false when it fades before.
func (s *shot) seconds(atStart float64) (float64, bool) {
	if s.perS == 0 {
		return atStart, true
	}
	x := s.perS * atStart
	if x >= 1 {
		return 0, false
	}
	return -math.Log1p(-x) / s.perS, true
}

// atStart is the inverse of seconds.
func (s *shot) atStart(seconds float64) float64 {
	if s.perS == 0 {
		return seconds
	}
	return -math.Expm1(-s.perS*seconds) / s.perS
}

// receptor is the detector of a plan.
type receptor struct {
	film    *detector.Film
	density float64
	screens detector.Screens
	digital *detector.Layer
	snrN    float64
	front   func(keV float64) float64 // transmission of a front screen before a plate
}

func newReceptor(d plan.Detector) (receptor, error) {
	var r receptor
	switch {
	case d.Film != nil:
		f, err := filmOf(*d.Film)
		if err != nil {
			return r, err
		}
		r.film = &f
		r.screens = detector.NewScreens(*d.Film.ScreensMM)
	case d.Plate != nil:
		l := detector.Plate()
		r.digital = &l
		if d.Plate.ScreensMM != nil && d.Plate.ScreensMM[0] > 0 {
			lead, err := materials.Lookup("Pb")
			if err != nil {
				return r, err
			}
			mm := d.Plate.ScreensMM[0]
			r.front = func(keV float64) float64 { return math.Exp(-lead.MuPerMM(keV) * mm) }
		}
	case d.Panel != nil:
		l := detector.Panel()
		r.digital = &l
	}
	return r.reads(d)
}

// reads gives the same receptor that is to read what d asks of it.
func (r receptor) reads(d plan.Detector) (receptor, error) {
	field := "detector.plate.snrN"
	switch {
	case d.Film != nil:
		r.density = d.Film.Density
		if most := r.film.MostDensity(); r.density >= most {
			return r, &plan.FieldError{Field: "detector.film.density", Value: fmt.Sprint(r.density), Problem: "is beyond what the film reaches",
				Allowed: fmt.Sprintf("%.2f to %.2f", r.film.BaseAndFog, most), Mend: "take a lower density"}
		}
		return r, nil
	case d.Plate != nil:
		r.snrN = d.Plate.SNRn
	case d.Panel != nil:
		r.snrN, field = d.Panel.SNRn, "detector.panel.snrN"
	}
	if r.snrN >= r.digital.MostSNRn() {
		return r, &plan.FieldError{Field: field, Value: fmt.Sprint(r.snrN), Problem: "is beyond what the detector reaches at any dose",
			Allowed: fmt.Sprintf("less than %g", r.digital.MostSNRn()), Mend: "take a lower signal to noise ratio"}
	}
	return r, nil
}

// filmOf is the film of its class, with what the plan knows of the make.
func filmOf(p plan.Film) (detector.Film, error) {
	f, err := detector.FilmByClass(p.Class)
	if err != nil || p.Data == (plan.FilmData{}) {
		return f, err
	}
	f, ok := f.With(p.Data.KsMGy, p.Data.G2, p.Data.G4, p.Data.BaseAndFog)
	if !ok {
		return f, &plan.FieldError{Field: "detector.film.data.g4", Value: fmt.Sprint(f.G4), Problem: fmt.Sprintf("fits no curve with a gradient of %g at density 2", f.G2),
			Allowed: fmt.Sprintf("%.3g to %.3g", detector.LeastG4ByG2*f.G2, detector.MostG4ByG2*f.G2), Mend: "check both gradients on the data sheet"}
	}
	return f, nil
}

// receptorRate is what a detector gathers in a second: for film the dose it
// answers to, for a digital one the statistics of what it absorbs.
type receptorRate struct {
	primary, scatter float64 // mGy/s, film
	quanta           detector.Quanta
	strength         float64 // factor on quanta
}

func (r receptorRate) total() float64 {
	if r.primary+r.scatter > 0 {
		return r.primary + r.scatter
	}
	return r.quanta.PerUnit() * r.strength
}

func (r receptorRate) times(f float64) receptorRate {
	r.primary, r.scatter, r.strength = r.primary*f, r.scatter*f, r.strength*f
	return r
}

// rate reads an exit at the energies keV of its primaries.
func (r receptor) rate(x transport.Exit, keV []float64) receptorRate {
	out := receptorRate{strength: 1}
	for i, n := range x.Primary {
		out.primary += r.take(&out.quanta, keV[i], n)
	}
	for i, n := range x.Scatter {
		out.scatter += r.take(&out.quanta, x.MeanKeV[i], n)
	}
	return out
}

// open reads a beam that met nothing.
func (r receptor) open(sp beam.Spectrum) receptorRate {
	out := receptorRate{strength: 1}
	for i, n := range sp.PerCM2 {
		out.primary += r.take(&out.quanta, sp.KeV[i], n)
	}
	return out
}

// take counts perCM2 photons of keV: film gives the dose it answers to, a
// digital layer adds to q.
func (r receptor) take(q *detector.Quanta, keV, perCM2 float64) float64 {
	if perCM2 <= 0 {
		return 0
	}
	if r.film != nil {
		return detector.EquivalentMGy(r.screens.Response(keV) * perCM2)
	}
	if r.front != nil {
		perCM2 *= r.front(keV)
	}
	r.digital.Add(q, keV, perCM2)
	return 0
}

// wants gives the seconds, at constant strength, that the wanted density or
// signal to noise ratio takes.
func (r receptor) wants(at receptorRate) (float64, error) {
	if r.film != nil {
		x, err := r.film.DoseMGy(r.density)
		if err != nil {
			return 0, err
		}
		return x / at.total(), nil
	}
	unit, ok := r.digital.Exposure(at.quanta, r.snrN)
	if !ok {
		return math.Inf(1), nil
	}
	return unit / at.strength, nil
}

// reading gives density or signal to noise ratio after so many seconds.
func (r receptor) reading(at receptorRate, seconds float64) float64 {
	if r.film != nil {
		return r.film.Density(at.total() * seconds)
	}
	return r.digital.SNRn(at.quanta, at.strength*seconds)
}
