package desk

import (
	"fmt"
	"math"
	"strings"

	"halfvalue/exposure/plan"
)

// Quantity is one number of the plan that a dial can turn: where it stands,
// what it is called, what it may be and which values are usual. Ranges and
// usual values come from the plan's own table of fields.
type Quantity struct {
	Field    string // path in the plan; "setup.fMM" is derived: SFD less b
	Symbol   string // the standards' symbol, "SFD"
	Name     string // in words, "source to film"
	Kind     Kind
	Value    float64
	Min, Max float64
	Log      bool // the dial runs in ratios, not in differences
	Fine     float64
	Usual    []float64 // detents, rising
}

// Label is the quantity's symbol and name in one line, for a screen reader
// and for the name of a step of undo.
func (q Quantity) Label() string { return strings.TrimSpace(q.Symbol + " " + q.Name) }

// Text is the value in the shown units.
func (q Quantity) Text(u Units) string {
	if q.Kind == PerHour && q.Value == 0 {
		return "beam on all hour"
	}
	return u.Format(q.Kind, q.Value, 4)
}

// UsualIn returns the detents for the shown units: customary lengths from
// about the size of a hand on have their own.
func (q Quantity) UsualIn(u Units) []float64 {
	switch {
	case u == Customary && q.Kind == Length && q.Max > 100 && q.Symbol != "De":
		return within(q, mmPerInch, 0.125, 0.25, 0.375, 0.5, 0.75, 1, 1.5, 2, 3, 4, 6, 8, 10, 12, 15, 18, 20, 24, 28, 30, 36, 40, 48, 60, 72, 96, 120)
	case u == Customary && q.Kind == Activity:
		return within(q, gbqPerCi, 1, 2, 5, 10, 15, 20, 25, 30, 40, 50, 60, 80, 100, 120)
	}
	return q.Usual
}

// within are figures times a factor, those that the quantity may be.
func within(q Quantity, factor float64, figures ...float64) []float64 {
	var out []float64
	for _, v := range figures {
		if v *= factor; v >= q.Min && v <= q.Max {
			out = append(out, v)
		}
	}
	return out
}

// Step is what one touch of plus or minus changes near v: the plan's own step,
// or about a hundredth where that would be too coarse or too fine to notice.
func (q Quantity) Step(v float64) float64 {
	if !q.Log {
		return q.Fine
	}
	return roundStep(math.Max(math.Abs(v), q.Min) / 100)
}

// roundStep is the 1-2-5 figure at or below v, at least 1e-6.
func roundStep(v float64) float64 {
	p := math.Pow(10, math.Floor(math.Log10(math.Max(v, 1e-6))+1e-9))
	for _, m := range []float64{5, 2} {
		if m*p <= v*(1+1e-9) {
			return m * p
		}
	}
	return p
}

// place is a quantity with the way to it.
type place struct {
	Quantity
	set func(*plan.Plan, float64)
}

// Quantities lists every number of the plan that can be turned, in the order
// in which the beam meets them.
func Quantities(p plan.Plan) []Quantity {
	all := places(p)
	out := make([]Quantity, len(all))
	for i, l := range all {
		out[i] = l.Quantity
	}
	return out
}

// QuantityOf finds the quantity of a field.
func QuantityOf(p plan.Plan, field string) (Quantity, bool) {
	l, ok := placeOf(p, field)
	return l.Quantity, ok
}

func placeOf(p plan.Plan, field string) (place, bool) {
	for _, l := range places(p) {
		if l.Field == field {
			return l, true
		}
	}
	return place{}, false
}

// at makes a quantity of a field with the ranges of the plan's table; a field
// that the table lacks is a fault of this package.
func at(field, symbol, name string, k Kind, value float64, set func(*plan.Plan, float64)) place {
	f, ok := plan.FieldAt(field)
	if !ok || f.Kind != plan.Number {
		panic("desk: the plan's table of fields has no number at " + field)
	}
	q := Quantity{Field: field, Symbol: symbol, Name: name, Kind: k, Value: value, Min: f.Min, Max: f.Max, Fine: f.Step, Usual: f.Usual}
	q.Log = k != Voltage && k != Angle && k != PerHour && f.Min > 0 && f.Max/f.Min > 20
	return place{q, set}
}

func places(p plan.Plan) []place {
	p, _ = p.Normalised()
	out := append(tubePlaces(p), sealedPlaces(p)...)
	out = append(out, partPlaces(p)...)
	out = append(out, setupPlaces(p)...)
	out = append(out, detectorPlaces(p)...)
	return append(out, sitePlaces(p)...)
}

func tubePlaces(p plan.Plan) []place {
	t := p.Source.Tube
	if t == nil {
		return nil
	}
	kv := at("source.tube.kv", "U", "tube voltage", Voltage, t.KV, func(p *plan.Plan, v float64) { p.Source.Tube.KV = v })
	if t.MaxKV > 0 {
		kv.Max = t.MaxKV
	}
	ma := at("source.tube.ma", "I", "tube current", Current, t.MA, func(p *plan.Plan, v float64) { p.Source.Tube.MA = v })
	ma.Log = false
	if t.MaxW > 0 {
		ma.Max = math.Min(ma.Max, t.MaxW/t.KV)
		kv.Max = math.Min(kv.Max, t.MaxW/t.MA)
	}
	out := []place{kv, ma,
		at("source.tube.focusMM", "d", "focus", Length, t.FocusMM, func(p *plan.Plan, v float64) { p.Source.Tube.FocusMM = v }),
		at("source.tube.coneDeg", "cone", "opening of the beam", Angle, t.ConeDeg, func(p *plan.Plan, v float64) { p.Source.Tube.ConeDeg = v }),
		at("source.tube.anodeDeg", "anode", "anode angle", Angle, t.AnodeDeg, func(p *plan.Plan, v float64) { p.Source.Tube.AnodeDeg = v }),
	}
	for i, f := range t.Filters {
		out = append(out, at(fmt.Sprintf("source.tube.filters[%d].mm", i), f.Material, "filter", Length, f.MM,
			func(p *plan.Plan, v float64) { p.Source.Tube.Filters[i].MM = v }))
	}
	return out
}

func sealedPlaces(p plan.Plan) []place {
	s := p.Source.Sealed
	if s == nil {
		return nil
	}
	out := []place{
		at("source.sealed.activityGBq", "A", "activity when assayed", Activity, s.ActivityGBq,
			func(p *plan.Plan, v float64) { p.Source.Sealed.ActivityGBq, p.Source.Sealed.ActivityCi = v, 0 }),
		at("source.sealed.sizeMM", "d", "source size", Length, s.SizeMM, func(p *plan.Plan, v float64) { p.Source.Sealed.SizeMM = v }),
		at("source.sealed.coneDeg", "cone", "opening of the collimator", Angle, s.ConeDeg, func(p *plan.Plan, v float64) { p.Source.Sealed.ConeDeg = v }),
	}
	for i, f := range s.Collimator {
		out = append(out, at(fmt.Sprintf("source.sealed.collimator[%d].mm", i), f.Material, "collimator wall", Length, f.MM,
			func(p *plan.Plan, v float64) { p.Source.Sealed.Collimator[i].MM = v }))
	}
	return out
}

func partPlaces(p plan.Plan) []place {
	var out []place
	for i, l := range p.Part.Layers {
		symbol := "t"
		if len(p.Part.Layers) > 1 {
			symbol = fmt.Sprintf("t%d", i+1)
		}
		out = append(out, at(fmt.Sprintf("part.layers[%d].mm", i), symbol, "thickness of "+l.Material, Length, l.MM,
			func(p *plan.Plan, v float64) { keepGap(p, func() { p.Part.Layers[i].MM = v }) }))
	}
	for s, section := range p.Part.Sections {
		for i, l := range section.Layers {
			out = append(out, at(fmt.Sprintf("part.sections[%d].layers[%d].mm", s, i), "t", section.Name+", "+l.Material, Length, l.MM,
				func(p *plan.Plan, v float64) { p.Part.Sections[s].Layers[i].MM = v }))
		}
	}
	if p.Part.ODMM > 0 {
		out = append(out, at("part.odMM", "De", "outside diameter", Length, p.Part.ODMM,
			func(p *plan.Plan, v float64) { keepGap(p, func() { p.Part.ODMM = v }) }))
	}
	if p.Part.WallMM > 0 {
		out = append(out, at("part.wallMM", "t", "wall", Length, p.Part.WallMM,
			func(p *plan.Plan, v float64) { keepGap(p, func() { setWall(p, v) }) }))
	}
	return out
}

// keepGap edits the part and lets b follow, so that the room between the part
// and the film stays as it was.
func keepGap(p *plan.Plan, edit func()) {
	gap := p.GapMM()
	edit()
	if p.Setup.BMM > 0 {
		p.Setup.BMM = tidy(p.DepthMM() + gap)
	}
}

// setWall changes the wall and every layer that was one or two walls thick.
func setWall(p *plan.Plan, v float64) {
	old := p.Part.WallMM
	for i := range p.Part.Layers {
		for n := 1.0; n <= 2; n++ {
			if math.Abs(p.Part.Layers[i].MM-n*old) < 1e-9*old {
				p.Part.Layers[i].MM = n * v
				break
			}
		}
	}
	p.Part.WallMM = v
}

func setupPlaces(p plan.Plan) []place {
	span := p.SpanMM()
	sfd := at("setup.sfdMM", "SFD", "source to film", Length, p.Setup.SFDMM, func(p *plan.Plan, v float64) { p.Setup.SFDMM = v })
	sfd.Min = math.Max(sfd.Min, math.Ceil(span+1))
	f := sfd
	f.Field, f.Symbol, f.Name, f.Value = "setup.fMM", "f", "source to part", p.Setup.SFDMM-span
	f.Min, f.Max = 1, sfd.Max-span
	f.set = func(p *plan.Plan, v float64) { p.Setup.SFDMM = tidy(v + p.SpanMM()) }
	b := at("setup.bMM", "b", "source side of the part to film", Length, span, func(p *plan.Plan, v float64) { p.Setup.BMM = v })
	b.Min, b.Max = p.DepthMM(), math.Max(p.DepthMM(), p.Setup.SFDMM-1)
	return []place{sfd, f, b}
}

func detectorPlaces(p plan.Plan) []place {
	switch d := p.Detector; {
	case d.Film != nil:
		return []place{at("detector.film.density", "D", "wanted density", Plain, d.Film.Density, func(p *plan.Plan, v float64) { p.Detector.Film.Density = v })}
	case d.Plate != nil:
		return []place{at("detector.plate.snrN", "SNR", "wanted signal to noise", Plain, d.Plate.SNRn, func(p *plan.Plan, v float64) { p.Detector.Plate.SNRn = v })}
	case d.Panel != nil:
		return []place{at("detector.panel.snrN", "SNR", "wanted signal to noise", Plain, d.Panel.SNRn, func(p *plan.Plan, v float64) { p.Detector.Panel.SNRn = v })}
	}
	return nil
}

func sitePlaces(p plan.Plan) []place {
	var out []place
	for i, l := range p.Site.Limits {
		if l.RateUSvPerH > 0 {
			out = append(out, at(fmt.Sprintf("site.limits[%d].rateUSvPerH", i), "limit", l.Name, DoseRate, l.RateUSvPerH,
				func(p *plan.Plan, v float64) { p.Site.Limits[i].RateUSvPerH = v }))
			continue
		}
		out = append(out, at(fmt.Sprintf("site.limits[%d].doseUSv", i), "limit", l.Name+" per "+l.Per, Dose, l.DoseUSv,
			func(p *plan.Plan, v float64) { p.Site.Limits[i].DoseUSv = v }))
	}
	n := at("site.shotsPerHour", "n", "shots per hour", PerHour, p.Site.ShotsPerHour, func(p *plan.Plan, v float64) { p.Site.ShotsPerHour = v })
	n.Min = 0 // nothing stated: the beam is on all hour
	return append(out, n)
}

// RoundStep is the 1-2-5 figure of the shown unit at or below a step that is
// given in the base unit; the result is in the base unit.
func (u Units) RoundStep(k Kind, step float64) float64 {
	f, _ := u.In(k, step)
	return u.Base(k, roundStep(f))
}
