package desk

import (
	"fmt"
	"strings"

	"halfvalue/exposure/plan"
)

// Quantity is one number of the plan that a dial can turn: where it stands,
// what it is called, what it may be and which values are usual.
type Quantity struct {
	Field    string // path in the plan; "setup.fMM" is derived: SFD less b
	Symbol   string // the standards' symbol, "SFD"
	Name     string // in words, "source to film"
	Kind     Kind
	Value    float64
	Min, Max float64
	Log      bool      // the dial runs in ratios, not in differences
	Usual    []float64 // detents, rising
}

// UsualIn returns the detents for the shown units: customary lengths have
// their own.
func (q Quantity) UsualIn(u Units) []float64 {
	if u == Customary && q.Kind == Length && q.Max > 100 {
		return inches(q)
	}
	return q.Usual
}

// inches are the usual lengths in inches, in mm.
func inches(q Quantity) []float64 {
	var out []float64
	for _, in := range []float64{0.125, 0.25, 0.375, 0.5, 0.75, 1, 1.5, 2, 3, 4, 6, 8, 10, 12, 15, 18, 20, 24, 28, 30, 36, 40, 48, 60, 72, 96, 120} {
		if mm := in * mmPerInch; mm >= q.Min && mm <= q.Max {
			out = append(out, mm)
		}
	}
	return out
}

// Step is the finest sensible change near v: about half a percent, on 1-2-5.
func (q Quantity) Step(v float64) float64 {
	switch q.Kind {
	case Voltage, Angle:
		return 1
	case Plain:
		if q.Max <= 10 {
			return 0.05
		}
		return 1
	case PerHour:
		return 1
	}
	if v < 0 {
		v = -v
	}
	if v < q.Min {
		v = q.Min
	}
	return roundStep(v / 200)
}

// roundStep returns the 1-2-5 figure at or above v.
func roundStep(v float64) float64 {
	if v <= 0 {
		return 0.001
	}
	p := 1e-6
	for {
		for _, m := range []float64{1, 2, 5} {
			if m*p >= v*0.999999 {
				return m * p
			}
		}
		p *= 10
	}
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

func places(p plan.Plan) []place {
	var out []place
	add := func(q Quantity, set func(*plan.Plan, float64)) { out = append(out, place{q, set}) }
	sourcePlaces(p, add)
	partPlaces(p, add)
	setupPlaces(p, add)
	detectorPlaces(p, add)
	sitePlaces(p, add)
	return out
}

func sourcePlaces(p plan.Plan, add func(Quantity, func(*plan.Plan, float64))) {
	if t := p.Source.Tube; t != nil {
		top := 450.0
		if t.MaxKV > 0 {
			top = t.MaxKV
		}
		add(Quantity{Field: "source.tube.kv", Symbol: "U", Name: "tube voltage", Kind: Voltage, Value: t.KV, Min: 20, Max: top, Usual: []float64{80, 100, 120, 140, 160, 180, 200, 220, 250, 300, 350, 400, 450}},
			func(p *plan.Plan, v float64) { p.Source.Tube.KV = v })
		add(Quantity{Field: "source.tube.ma", Symbol: "I", Name: "tube current", Kind: Current, Value: t.MA, Min: 0.01, Max: 100, Log: true, Usual: []float64{0.5, 1, 2, 3, 4, 5, 6, 8, 10, 15, 20}},
			func(p *plan.Plan, v float64) { p.Source.Tube.MA = v })
		add(Quantity{Field: "source.tube.focusMM", Symbol: "d", Name: "focus", Kind: Length, Value: t.FocusMM, Min: 0.005, Max: 10, Log: true, Usual: []float64{0.4, 1, 1.5, 2, 2.5, 3, 4, 5.5}},
			func(p *plan.Plan, v float64) { p.Source.Tube.FocusMM = v })
		add(Quantity{Field: "source.tube.coneDeg", Symbol: "cone", Name: "opening of the beam", Kind: Angle, Value: coneOf(t.ConeDeg, 40), Min: 5, Max: 360, Usual: []float64{20, 30, 35, 40, 60, 90, 360}},
			func(p *plan.Plan, v float64) { p.Source.Tube.ConeDeg = v })
		for i, f := range t.Filters {
			add(Quantity{Field: fmt.Sprintf("source.tube.filters[%d].mm", i), Symbol: f.Material, Name: "filter " + f.Material, Kind: Length, Value: f.MM, Min: 0, Max: 100, Usual: []float64{0, 0.5, 1, 2, 3, 4, 5}},
				func(p *plan.Plan, v float64) { p.Source.Tube.Filters[i].MM = v })
		}
	}
	if s := p.Source.Sealed; s != nil {
		add(Quantity{Field: "source.sealed.activityGBq", Symbol: "A", Name: "activity when assayed", Kind: Activity, Value: activityOf(*s), Min: 0.01, Max: 1e6, Log: true, Usual: []float64{37, 74, 185, 370, 555, 740, 925, 1110, 1480, 1850, 2220, 2960, 3700, 4440}},
			func(p *plan.Plan, v float64) { p.Source.Sealed.ActivityGBq, p.Source.Sealed.ActivityCi = v, 0 })
		add(Quantity{Field: "source.sealed.sizeMM", Symbol: "d", Name: "source size", Kind: Length, Value: s.SizeMM, Min: 0.1, Max: 15, Log: true, Usual: []float64{0.5, 1, 1.5, 2, 2.5, 3, 3.5, 4}},
			func(p *plan.Plan, v float64) { p.Source.Sealed.SizeMM = v })
		add(Quantity{Field: "source.sealed.coneDeg", Symbol: "cone", Name: "opening of the collimator", Kind: Angle, Value: coneOf(s.ConeDeg, 360), Min: 5, Max: 360, Usual: []float64{30, 60, 90, 120, 180, 360}},
			func(p *plan.Plan, v float64) { p.Source.Sealed.ConeDeg = v })
	}
}

func coneOf(v, otherwise float64) float64 {
	if v == 0 {
		return otherwise
	}
	return v
}

func activityOf(s plan.Sealed) float64 {
	if s.ActivityGBq > 0 {
		return s.ActivityGBq
	}
	return s.ActivityCi * gbqPerCi
}

func partPlaces(p plan.Plan, add func(Quantity, func(*plan.Plan, float64))) {
	usual := []float64{1, 2, 3, 3.9, 5, 6, 7.1, 8, 10, 12, 12.5, 15, 16, 20, 25, 30, 40, 50, 60, 80, 100}
	for i, l := range p.Part.Layers {
		symbol := "t"
		if len(p.Part.Layers) > 1 {
			symbol = fmt.Sprintf("t%d", i+1)
		}
		add(Quantity{Field: fmt.Sprintf("part.layers[%d].mm", i), Symbol: symbol, Name: "thickness of " + l.Material, Kind: Length, Value: l.MM, Min: 0.01, Max: 2000, Log: true, Usual: usual},
			func(p *plan.Plan, v float64) { setLayer(p, i, v) })
	}
	for s, section := range p.Part.Sections {
		for i, l := range section.Layers {
			add(Quantity{Field: fmt.Sprintf("part.sections[%d].layers[%d].mm", s, i), Symbol: "t", Name: section.Name + ", " + l.Material, Kind: Length, Value: l.MM, Min: 0.01, Max: 2000, Log: true, Usual: usual},
				func(p *plan.Plan, v float64) { p.Part.Sections[s].Layers[i].MM = v })
		}
	}
	if p.Part.ODMM > 0 {
		add(Quantity{Field: "part.odMM", Symbol: "De", Name: "outside diameter", Kind: Length, Value: p.Part.ODMM, Min: 5, Max: 20000, Log: true, Usual: []float64{21.3, 26.9, 33.7, 42.4, 48.3, 60.3, 76.1, 88.9, 114.3, 139.7, 168.3, 219.1, 273, 323.9, 355.6, 406.4, 508, 610}},
			func(p *plan.Plan, v float64) { p.Part.ODMM = v })
	}
	if p.Part.WallMM > 0 {
		add(Quantity{Field: "part.wallMM", Symbol: "t", Name: "wall", Kind: Length, Value: p.Part.WallMM, Min: 0.1, Max: 500, Log: true, Usual: []float64{2.6, 2.9, 3.2, 3.6, 3.9, 4.5, 5.6, 6.3, 7.1, 8, 8.8, 10, 11, 12.5, 14.2, 16, 20, 25}},
			setWall)
	}
}

// setLayer changes a thickness and lets b follow, so that the gap between the
// part and the film stays as it was.
func setLayer(p *plan.Plan, i int, v float64) {
	if p.Setup.BMM > 0 {
		p.Setup.BMM += v - p.Part.Layers[i].MM
	}
	p.Part.Layers[i].MM = v
}

// setWall changes the wall and every layer that was one or two walls thick.
func setWall(p *plan.Plan, v float64) {
	old := p.Part.WallMM
	for i := range p.Part.Layers {
		for n := 1.0; n <= 2; n++ {
			if near(p.Part.Layers[i].MM, n*old) {
				setLayer(p, i, n*v)
				break
			}
		}
	}
	p.Part.WallMM = v
}

func near(a, b float64) bool { return a-b < 1e-9*b && b-a < 1e-9*b }

func setupPlaces(p plan.Plan, add func(Quantity, func(*plan.Plan, float64))) {
	b, least := bOf(p), Through(p)
	usual := []float64{150, 200, 250, 300, 350, 400, 450, 500, 600, 700, 800, 900, 1000, 1200, 1500, 2000, 3000}
	add(Quantity{Field: "setup.sfdMM", Symbol: "SFD", Name: "source to film", Kind: Length, Value: p.Setup.SFDMM, Min: max(20, b+1), Max: 20000, Log: true, Usual: usual},
		func(p *plan.Plan, v float64) { p.Setup.SFDMM = v })
	add(Quantity{Field: "setup.fMM", Symbol: "f", Name: "source to part", Kind: Length, Value: p.Setup.SFDMM - b, Min: 1, Max: 20000 - b, Log: true, Usual: usual},
		func(p *plan.Plan, v float64) { p.Setup.SFDMM = v + bOf(*p) })
	add(Quantity{Field: "setup.bMM", Symbol: "b", Name: "source side of the part to film", Kind: Length, Value: b, Min: least, Max: max(least, p.Setup.SFDMM-1), Log: true, Usual: []float64{5, 10, 15, 20, 25, 30, 40, 50, 60, 80, 100, 150, 200}},
		func(p *plan.Plan, v float64) { p.Setup.BMM = v })
}

// bOf is b as the plan means it: by default the whole thickness of the part.
func bOf(p plan.Plan) float64 {
	if p.Setup.BMM > 0 {
		return p.Setup.BMM
	}
	return Through(p)
}

// Through is the part's whole thickness along the central ray, mm.
func Through(p plan.Plan) float64 {
	sum := 0.0
	for _, l := range p.Part.Layers {
		sum += l.MM
	}
	return sum
}

func detectorPlaces(p plan.Plan, add func(Quantity, func(*plan.Plan, float64))) {
	if f := p.Detector.Film; f != nil {
		add(Quantity{Field: "detector.film.density", Symbol: "D", Name: "wanted density", Kind: Plain, Value: f.Density, Min: 1, Max: 4.5, Usual: []float64{1.8, 2, 2.3, 2.5, 3, 3.5, 4}},
			func(p *plan.Plan, v float64) { p.Detector.Film.Density = v })
	}
	snr := []float64{70, 100, 120, 140, 170, 200, 300, 500, 1000}
	if f := p.Detector.Plate; f != nil {
		add(Quantity{Field: "detector.plate.snrN", Symbol: "SNR_N", Name: "wanted signal to noise", Kind: Plain, Value: f.SNRn, Min: 20, Max: 1000, Log: true, Usual: snr},
			func(p *plan.Plan, v float64) { p.Detector.Plate.SNRn = v })
	}
	if f := p.Detector.Panel; f != nil {
		add(Quantity{Field: "detector.panel.snrN", Symbol: "SNR_N", Name: "wanted signal to noise", Kind: Plain, Value: f.SNRn, Min: 20, Max: 5000, Log: true, Usual: snr},
			func(p *plan.Plan, v float64) { p.Detector.Panel.SNRn = v })
	}
}

func sitePlaces(p plan.Plan, add func(Quantity, func(*plan.Plan, float64))) {
	for i, l := range p.Site.Limits {
		if l.RateUSvPerH > 0 {
			add(Quantity{Field: fmt.Sprintf("site.limits[%d].rateUSvPerH", i), Symbol: "limit", Name: "limit " + l.Name, Kind: DoseRate, Value: l.RateUSvPerH, Min: 0.1, Max: 1e5, Log: true, Usual: []float64{1, 2.5, 5, 7.5, 10, 20, 25, 40, 50, 100}},
				func(p *plan.Plan, v float64) { p.Site.Limits[i].RateUSvPerH = v })
		} else {
			add(Quantity{Field: fmt.Sprintf("site.limits[%d].doseUSv", i), Symbol: "limit", Name: "limit " + l.Name + " per " + l.Per, Kind: Dose, Value: l.DoseUSv, Min: 0.1, Max: 1e6, Log: true, Usual: []float64{1, 2, 5, 10, 20, 50, 100, 1000}},
				func(p *plan.Plan, v float64) { p.Site.Limits[i].DoseUSv = v })
		}
	}
	add(Quantity{Field: "site.shotsPerHour", Symbol: "n", Name: "shots per hour", Kind: PerHour, Value: p.Site.ShotsPerHour, Min: 0, Max: 600, Usual: []float64{0, 1, 2, 4, 6, 8, 10, 12, 15, 20, 30}},
		func(p *plan.Plan, v float64) { p.Site.ShotsPerHour = v })
}

// Label is the quantity's symbol and name in one line, for a screen reader
// and for the name of a step of undo.
func (q Quantity) Label() string {
	return strings.TrimSpace(q.Symbol + " " + q.Name)
}

// Text is the value in the shown units.
func (q Quantity) Text(u Units) string {
	if q.Kind == PerHour && q.Value == 0 {
		return "beam on all hour"
	}
	return u.Format(q.Kind, q.Value, 4)
}
