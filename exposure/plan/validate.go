package plan

import (
	"fmt"
	"math"
	"reflect"
	"strconv"
	"time"
)

// slack lets sums of decimals meet a limit that they equal on paper.
const slack = 1e-9

// Validate refuses a plan that the physics could not answer: every value
// against its range, and what joins several fields. It needs no physics. The
// error is a *FieldError or Errors. The zero Plan is not valid.
func (p Plan) Validate() error { return p.ValidateFor(nil) }

// ValidateFor is Validate where the plan may also name one of ruleSets.
func (p Plan) ValidateFor(ruleSets []string) error {
	f := newFaults()
	p.validate(f, ruleSets)
	return f.err()
}

func (p Plan) validate(f *faults, ruleSets []string) {
	ranges(f, reflect.ValueOf(p), "", ruleSets)
	p.Source.validate(f)
	if p.Source.Sealed != nil {
		p.validateDecay(f, *p.Source.Sealed)
	}
	p.validatePart(f)
	p.validateSetup(f)
	p.Detector.validate(f)
	p.Site.validate(f)
	p.validateSitePlan(f)
}

func (s Source) validate(f *faults) {
	if f.covered("source") {
		return
	}
	switch {
	case s.Tube != nil && s.Sealed != nil:
		f.add(FieldError{Field: "source", Value: "tube and sealed", Problem: "has both", Allowed: "exactly one of tube and sealed", Mend: "take one out"})
	case s.Tube == nil && s.Sealed == nil && f.clean("source"):
		f.add(FieldError{Field: "source", Problem: "has neither tube nor sealed", Allowed: "exactly one of tube and sealed", Mend: `add "tube" or "sealed"`})
	}
	if s.Tube != nil {
		s.Tube.validate(f)
	}
	if s.Sealed != nil {
		s.Sealed.validate(f)
	}
}

func (t Tube) validate(f *faults) {
	const at = "source.tube."
	if t.MaxKV > 0 && t.KV > t.MaxKV*(1+slack) && f.clean(at+"kv", at+"maxKV") {
		f.add(FieldError{Field: at + "kv", Value: format(t.KV), Problem: "is above the head's limit maxKV", Allowed: "20 to " + quantity(t.MaxKV, "kV"), Mend: "set " + quantity(t.MaxKV, "kV") + " or less"})
	}
	if w := t.KV * t.MA; t.MaxW > 0 && w > t.MaxW*(1+slack) && f.clean(at+"kv", at+"ma", at+"maxW") {
		f.add(FieldError{Field: at + "ma", Value: format(t.MA), Problem: fmt.Sprintf("makes %s W, above the head's limit maxW", round(w)),
			Allowed: "kv x ma of at most " + quantity(t.MaxW, "W"), Mend: fmt.Sprintf("at %s set %s mA or less", quantity(t.KV, "kV"), down(t.MaxW/t.KV))})
	}
}

func (s Sealed) validate(f *faults) {
	const gbq, ci = "source.sealed.activityGBq", "source.sealed.activityCi"
	if !f.clean(gbq, ci) {
		return
	}
	switch {
	case s.ActivityGBq != 0 && s.ActivityCi != 0:
		f.add(FieldError{Field: ci, Value: format(s.ActivityCi), Problem: "stands beside activityGBq", Allowed: "exactly one of activityGBq and activityCi", Mend: "take one out"})
	case s.ActivityGBq == 0 && s.ActivityCi == 0:
		f.add(FieldError{Field: gbq, Problem: "missing", Allowed: "exactly one of activityGBq and activityCi", Mend: `add "activityGBq"`})
	}
}

// mostHalfLives is how long a certificate is believed.
const mostHalfLives = 10

func (p Plan) validateDecay(f *faults, s Sealed) {
	if p.At.IsZero() && f.clean("at") {
		f.add(FieldError{Field: "at", Problem: "missing", Allowed: "a time with zone, at or after assayed", Mend: "add the time of the shot: the source is decayed to it"})
		return
	}
	if !f.clean("at", "source.sealed.assayed", "source.sealed.nuclide") {
		return
	}
	value, assay := p.At.UTC().Format(time.RFC3339), s.Assayed.UTC().Format(time.RFC3339)
	if p.At.Before(s.Assayed) {
		f.add(FieldError{Field: "at", Value: value, Problem: "is before the assay", Allowed: assay + " or later", Mend: "check the date of the shot and of the certificate"})
		return
	}
	days := p.At.Sub(s.Assayed).Hours() / 24
	if half := halfLifeDays(s.Nuclide); days > mostHalfLives*half {
		last := s.Assayed.Add(time.Duration(mostHalfLives * half * 24 * float64(time.Hour)))
		f.add(FieldError{Field: "at", Value: value, Problem: fmt.Sprintf("is %.1f half-lives of %s after the assay", days/half, s.Nuclide),
			Allowed: fmt.Sprintf("%d half-lives at most, until %s", mostHalfLives, last.UTC().Format("2006-01-02")), Mend: "take a newer certificate"})
	}
}

func (p Plan) validatePart(f *faults) {
	names := map[string]bool{}
	for i, s := range p.Part.Sections {
		at := fmt.Sprintf("part.sections[%d].name", i)
		if names[s.Name] && f.clean(at) {
			f.add(FieldError{Field: at, Value: s.Name, Problem: "stands a second time", Allowed: "names that differ", Mend: "call it something else"})
		}
		names[s.Name] = true
	}
	if f.clean("part.odMM", "part.wallMM") {
		p.validatePipe(f)
	}
}

// wallTolerance is how far below nominal a wall may be measured: 12.5 %, the
// mill tolerance of ASME B36.10 pipe (from memory).
const wallTolerance = 0.125

// capAllowance is what weld caps may add across a pipe, mm (common practice,
// generous: only gross mistakes are meant to be caught).
const capAllowance = 20

func (p Plan) validatePipe(f *faults) {
	od, wall := p.Part.ODMM, p.Part.WallMM
	double := p.Setup.DoubleWall() && f.clean("setup.kind")
	switch {
	case od == 0 && wall == 0 && !double:
		return
	case od == 0:
		f.add(FieldError{Field: "part.odMM", Problem: "missing", Allowed: wantedAt("part.odMM"), Mend: pipeMend("odMM", p.Setup.Kind, double)})
		fallthrough
	case wall == 0:
		if wall == 0 {
			f.add(FieldError{Field: "part.wallMM", Problem: "missing", Allowed: wantedAt("part.wallMM"), Mend: pipeMend("wallMM", p.Setup.Kind, double)})
		}
		return
	case wall >= od/2:
		f.add(FieldError{Field: "part.wallMM", Value: format(wall), Problem: "leaves no bore", Allowed: "less than half of odMM, " + quantity(od/2, "mm"), Mend: "check wall and diameter"})
		return
	}
	walls, called := 1.0, "wallMM"
	if double {
		walls, called = 2, "twice wallMM"
	}
	if !f.clean("part.layers", "setup.kind") {
		return
	}
	total := p.Part.TotalMM()
	least, most := walls*wall*(1-wallTolerance), od+capAllowance
	if total < least*(1-slack) || total > most*(1+slack) {
		f.add(FieldError{Field: "part.layers", Value: quantity(total, "mm"), Problem: fmt.Sprintf("does not fit a pipe %s x %s mm seen %s", format(od), format(wall), p.Setup.Kind),
			Allowed: fmt.Sprintf("%s to %s mm, %s less 12.5 %% to odMM plus caps", round(least), round(most), called), Mend: fmt.Sprintf("give %s mm in all", round(walls*wall))})
	}
}

func pipeMend(name, kind string, double bool) string {
	if double {
		return fmt.Sprintf("add %q, %s needs the pipe", name, kind)
	}
	return fmt.Sprintf("add %q, a pipe has both", name)
}

func wantedAt(path string) string {
	row, _ := FieldAt(path)
	return wanted(row)
}

func (p Plan) validateSetup(f *faults) {
	s := p.Setup
	if s.Image != "" && s.Kind != DoubleWallDoubleImage && f.clean("setup.kind", "setup.image") {
		f.add(FieldError{Field: "setup.image", Value: s.Image, Problem: "does not go with " + s.Kind, Allowed: "none but with double-wall-double-image", Mend: "take it out"})
	}
	pipe := p.Part.ODMM > 0
	if s.Side != "" && (s.Kind != SingleWall || !pipe) && f.clean("setup.kind", "setup.side", "part.odMM") {
		f.add(FieldError{Field: "setup.side", Value: s.Side, Problem: "goes with a single-wall pipe only", Allowed: "none without odMM or with " + s.Kind, Mend: "take it out"})
	}
	if s.Shots != 0 && !pipe && f.clean("setup.shots", "part.odMM") {
		f.add(FieldError{Field: "setup.shots", Value: fmt.Sprint(s.Shots), Problem: "goes with a pipe only", Allowed: "none without odMM", Mend: "take it out"})
	}
	if !f.clean("part.layers", "setup.bMM", "setup.sfdMM", "setup.kind", "part.odMM", "part.wallMM") {
		return
	}
	total := p.Part.TotalMM()
	if s.BMM > 0 && s.BMM < total*(1-slack) {
		f.add(FieldError{Field: "setup.bMM", Value: format(s.BMM), Problem: "is less than the part's total thickness", Allowed: quantity(total, "mm") + " or more", Mend: "leave it out where the film touches the part"})
		return
	}
	p.validateSFD(f)
}

func (p Plan) validateSFD(f *faults) {
	s := p.Setup
	if inside := p.Part.ODMM - p.Part.WallMM + p.GapMM(); (s.Side == Inside || s.Kind == Panoramic) && p.Part.ODMM > 0 && s.SFDMM >= inside*(1-slack) {
		f.add(FieldError{Field: "setup.sfdMM", Value: format(s.SFDMM), Problem: "puts the source outside the pipe", Allowed: fmt.Sprintf("less than %s mm, the far inner wall", round(inside)), Mend: fmt.Sprintf("set %s mm or less", down(inside*(1-1e-6)))})
		return
	}
	span, of := p.SpanMM(), "the film touching the part"
	if s.BMM > 0 {
		of = "the distance bMM given"
	}
	if s.SFDMM <= span*(1+slack) {
		f.add(FieldError{Field: "setup.sfdMM", Value: format(s.SFDMM), Problem: "puts the source inside the part", Allowed: fmt.Sprintf("more than %s mm, the part and %s", format(span), of), Mend: fmt.Sprintf("set %s mm or more", up(span))})
	}
}

func (d Detector) validate(f *faults) {
	if f.covered("detector") {
		return
	}
	var given []string
	for name, is := range map[string]bool{"film": d.Film != nil, "plate": d.Plate != nil, "panel": d.Panel != nil} {
		if is {
			given = append(given, name)
		}
	}
	switch {
	case len(given) > 1:
		f.add(FieldError{Field: "detector", Value: fmt.Sprintf("%d detectors", len(given)), Problem: "has several", Allowed: "exactly one of film, plate and panel", Mend: "keep one"})
	case len(given) == 0 && f.clean("detector"):
		f.add(FieldError{Field: "detector", Problem: "has none of film, plate and panel", Allowed: "exactly one of film, plate and panel", Mend: `add "film"`})
	}
}

func (s Site) validate(f *faults) {
	names := map[string]bool{}
	for i, l := range s.Limits {
		at := fmt.Sprintf("site.limits[%d]", i)
		if names[l.Name] && f.clean(at+".name") {
			f.add(FieldError{Field: at + ".name", Value: l.Name, Problem: "stands a second time", Allowed: "names that differ", Mend: "call it something else"})
		}
		names[l.Name] = true
		if f.clean(at) {
			l.validate(f, at)
		}
	}
}

func (l Limit) validate(f *faults, at string) {
	const either = "rateUSvPerH with averagingMin, or doseUSv with per"
	rate, dose := l.RateUSvPerH != 0, l.DoseUSv != 0
	switch {
	case rate && dose:
		f.add(FieldError{Field: at, Value: l.Name, Problem: "has a rate and a dose", Allowed: either, Mend: "make two limits of it"})
	case !rate && !dose:
		f.add(FieldError{Field: at, Value: l.Name, Problem: "has neither a rate nor a dose", Allowed: either, Mend: `add "rateUSvPerH" or "doseUSv"`})
	case rate && l.Per != "":
		f.add(FieldError{Field: at + ".per", Value: l.Per, Problem: "stands with a rate", Allowed: either, Mend: "take it out"})
	case rate && l.Occupancy != 0:
		f.add(FieldError{Field: at + ".occupancy", Value: format(l.Occupancy), Problem: "stands with a rate", Allowed: "occupancy with doseUSv only", Mend: "take it out"})
	case rate && l.AveragingMin == 0:
		f.add(FieldError{Field: at + ".averagingMin", Problem: "missing", Allowed: wantedAt(at + ".averagingMin"), Mend: `add "averagingMin", 1 is usual`})
	case dose && l.AveragingMin != 0:
		f.add(FieldError{Field: at + ".averagingMin", Value: format(l.AveragingMin), Problem: "stands with a dose", Allowed: either, Mend: "take it out"})
	case dose && l.Per == "":
		f.add(FieldError{Field: at + ".per", Problem: "missing", Allowed: wantedAt(at + ".per"), Mend: `add "per"`})
	}
}

// round writes a number for a message.
func round(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }

// down writes a limit rounded to three figures downward, up to a whole
// millimetre above: what a message tells people to set must be allowed.
func down(x float64) string {
	scale := math.Pow(10, math.Floor(math.Log10(x))-2)
	return round(math.Floor(x/scale*(1+slack)) * scale)
}

func up(x float64) string { return format(math.Floor(x*(1+slack)) + 1) }
