package exposure

import (
	"fmt"
	"reflect"
	"slices"

	"halfvalue/exposure/boundary"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/rules"
	"halfvalue/exposure/setup"
)

// WithRules checks plans by another table of rule sets: ours with a company's
// over it. A plan may then name the sets of that table.
func WithRules(t *rules.Table) Option { return func(e *engine) { e.rules = t } }

// table is the rule sets in use.
func (e engine) table() *rules.Table {
	if e.rules != nil {
		return e.rules
	}
	return rules.Ours()
}

// check applies the plan's rule set to what has been reckoned, with a mend for
// each check that falls short and can be mended.
func (s *shot) check(r *Reckoning) error {
	if s.plan.Rules == "" {
		return nil
	}
	set, err := s.table().Set(s.plan.Rules)
	if err != nil {
		return err
	}
	facts, err := rules.FactsOf(s.plan)
	if err != nil {
		return err
	}
	read(&facts, r)
	facts.TravelShare = travelShare(s.plan, r.Exposure.Seconds)
	see := seer{engine: s.engine}
	for _, c := range set.Apply(facts) {
		check := Check{ID: c.ID, Verdict: Verdict(c.Verdict), Value: c.Value, Limit: c.Limit, Unit: c.Unit, Title: c.Title, Text: c.Text, Source: c.Source()}
		if c.Verdict == rules.Short {
			if m, ok := set.Mend(s.plan, c.ID, see.by(set, c.ID)); ok {
				check.Mend = &Mend{Field: m.Field, To: m.To, Exact: m.Exact, Text: m.Text}
			}
		}
		r.Checks = append(r.Checks, check)
		r.Workings = append(r.Workings, c.Step())
	}
	return nil
}

// read takes the readings of a reckoning into the facts.
func read(f *rules.Facts, r *Reckoning) {
	f.Density, f.SNRn = nil, nil
	for _, d := range r.Density {
		f.Density = append(f.Density, rules.Density{At: d.At, Value: d.Density})
	}
	for _, d := range r.SNR {
		f.SNRn = append(f.SNRn, rules.Density{At: d.At, Value: d.SNRn})
	}
}

// travelShare is the time that a sealed source spends in its guide tube over the
// exposure time; 0, unknown, without a container in the site plan.
func travelShare(p plan.Plan, seconds float64) float64 {
	c := p.Site.WithDefaults().Container
	if c == nil || p.Source.Sealed == nil {
		return 0
	}
	share, err := setup.TravelShare(c.TubeM*1000, c.SpeedMPerS*1000, seconds)
	if err != nil {
		return 0
	}
	return share
}

// seer gives the facts of changed plans. It keeps what arrives at the detector
// while only what the detector is to read changes.
type seer struct {
	engine
	seen   plan.Plan // what was looked at, with the reading of no account
	shot   *shot
	fields []field // the part, then its sections
}

// by gives the facts that a check goes by: with readings and times only where it
// asks for them, since those take the physics.
func (v *seer) by(set rules.Set, id string) rules.FactsFunc {
	if set.NeedsEngine(id) {
		return v.facts
	}
	return rules.FactsOf
}

func (v *seer) facts(p plan.Plan) (rules.Facts, error) {
	f, err := rules.FactsOf(p)
	if err != nil {
		return f, err
	}
	full, _ := p.Normalised()
	if err := v.look(full); err != nil {
		return f, err
	}
	s := *v.shot
	s.plan = full
	if s.receptor, err = s.receptor.reads(full.Detector); err != nil {
		return f, err
	}
	seconds, err := s.receptor.wants(v.fields[0].receptorRate)
	if err != nil {
		return f, err
	}
	var r Reckoning
	s.spot(&r, "part", v.fields[0], seconds)
	for i, section := range full.Part.Sections {
		s.spot(&r, section.Name, v.fields[i+1], seconds)
	}
	read(&f, &r)
	if given, ok := s.seconds(seconds); ok {
		f.TravelShare = travelShare(full, given)
	}
	return f, nil
}

// look reckons what arrives at the detector, unless it has just done so.
func (v *seer) look(full plan.Plan) error {
	same := full
	same.Detector = sameReading(same.Detector)
	if v.shot != nil && reflect.DeepEqual(same, v.seen) {
		return nil
	}
	s, err := newShot(full, v.engine)
	if err != nil {
		return err
	}
	fields := make([]field, 0, 1+len(full.Part.Sections))
	for _, layers := range slices.Concat([][]plan.Layer{full.Part.Layers}, sectionLayers(full.Part)) {
		f, err := s.behind(layers)
		if err != nil {
			return err
		}
		fields = append(fields, f)
	}
	v.seen, v.shot, v.fields = same, s, fields
	return nil
}

// sameReading gives the detector with what it is to read set to the same.
func sameReading(d plan.Detector) plan.Detector {
	switch {
	case d.Film != nil:
		f := *d.Film
		f.Density = 2
		d.Film = &f
	case d.Plate != nil:
		f := *d.Plate
		f.SNRn = 100
		d.Plate = &f
	case d.Panel != nil:
		f := *d.Panel
		f.SNRn = 100
		d.Panel = &f
	}
	return d
}

func sectionLayers(p plan.Part) [][]plan.Layer {
	var list [][]plan.Layer
	for _, s := range p.Sections {
		list = append(list, s.Layers)
	}
	return list
}

// Cost is what a mend takes.
type Cost struct {
	Plan     plan.Plan       // the plan as mended
	Seconds  float64         // its exposure time
	Boundary []boundary.Line // its boundary
	Breaks   []string        // IDs of checks that fall short after and did not before
}

// MendCost applies a mend to the plan it was told for: the exposure time and
// the boundary that it takes, and every check that it would newly break.
func MendCost(p plan.Plan, m Mend, cal Calibration, opts ...Option) (Cost, error) {
	mended, err := p.With(m.Field, m.To)
	if err != nil {
		return Cost{}, fmt.Errorf("mend %q: %w", m.Text, err)
	}
	before, err := Reckon(p, cal, opts...)
	if err != nil {
		return Cost{}, err
	}
	after, err := Reckon(mended, cal, opts...)
	if err != nil {
		return Cost{}, fmt.Errorf("mend %q: %w", m.Text, err)
	}
	was := map[string]Verdict{}
	for _, c := range before.Checks {
		was[c.ID] = c.Verdict
	}
	cost := Cost{Plan: mended, Seconds: after.Exposure.Seconds, Boundary: after.Boundary}
	for _, c := range after.Checks {
		if c.Verdict == Short && was[c.ID] != Short {
			cost.Breaks = append(cost.Breaks, c.ID)
		}
	}
	return cost, nil
}
