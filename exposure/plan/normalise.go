package plan

import "fmt"

// Default is a field that a plan left out and what holds in its place.
type Default struct {
	Field string `json:"field"` // path, "source.tube.target"
	Value string `json:"value"` // as shown, with its unit
	Why   string `json:"why"`   // why this, or to which side it errs
}

// GBqPerCi is exact by definition.
const GBqPerCi = 37

// Normalised fills in the documented defaults, turns curie to becquerel and
// times to UTC, and gives what it filled in, in the order of the file. What is
// left out without a value to stand for it (a limit of the head, the filters)
// is told too. The plan itself is not changed; a normalised plan is valid when
// p was, and normalises to itself.
func (p Plan) Normalised() (Plan, []Default) {
	n := normaliser{Plan: p.Clone()}
	if n.Source.Tube != nil {
		n.tube(n.Source.Tube)
	}
	if n.Source.Sealed != nil {
		n.sealed(n.Source.Sealed)
	}
	n.setup()
	n.detector()
	n.site()
	return n.Plan, n.told
}

type normaliser struct {
	Plan
	told []Default
}

func (n *normaliser) tell(field, value, why string) {
	n.told = append(n.told, Default{field, value, why})
}

func (n *normaliser) text(v *string, field, value, why string) {
	if *v == "" {
		*v = value
		n.tell(field, value, why)
	}
}

func (n *normaliser) number(v *float64, field string, value float64, why string) {
	if *v == 0 {
		*v = value
		row, _ := FieldAt(field)
		n.tell(field, quantity(value, row.Unit), why)
	}
}

func (n *normaliser) tube(t *Tube) {
	const at = "source.tube."
	n.text(&t.Target, at+"target", "W", "the target of nearly every head")
	n.number(&t.AnodeDeg, at+"anodeDeg", 20, "usual for a directional head")
	n.text(&t.Waveform, at+"waveform", "constant", "gives the most at a peak kV: boundaries err outward")
	n.number(&t.ConeDeg, at+"coneDeg", 40, "usual for a directional head")
	if t.MaxKV == 0 {
		n.tell(at+"maxKV", "not stated", "the head's limit is not checked")
	}
	if t.MaxW == 0 {
		n.tell(at+"maxW", "not stated", "the head's power is not checked")
	}
	if len(t.Filters) == 0 {
		n.tell(at+"filters", "none", "the bare target: unknown filters count as none")
	}
	n.number(&t.LeakageMGyPerHAt1m, at+"leakageMGyPerHAt1m", LeakageMGyPerH(t.KV), "most that German law allows a housing of this kV class; give the certificate's")
}

// LeakageMGyPerH is the leakage of a housing at 1 m that is taken where the
// certificate's is not given: the figures of the German StrlSchV 2018, 2.5
// mSv/h up to 200 kV and 10 mSv/h above (seen). The mSv are taken for mGy of
// air kerma, which errs outward.
func LeakageMGyPerH(kV float64) float64 {
	if kV > 200 {
		return 10
	}
	return 2.5
}

func (n *normaliser) sealed(s *Sealed) {
	const at = "source.sealed."
	if s.ActivityGBq == 0 && s.ActivityCi != 0 {
		s.ActivityGBq, s.ActivityCi = s.ActivityCi*GBqPerCi, 0
	}
	n.text(&s.Basis, at+"basis", "output", "certificates of the trade give the equivalent activity of what comes out")
	n.number(&s.ConeDeg, at+"coneDeg", 360, "no collimator: bare in all directions")
	if len(s.Collimator) == 0 {
		n.tell(at+"collimator", "none", "unknown shielding counts as none")
	}
}

func (n *normaliser) setup() {
	if n.Setup.Kind == DoubleWallDoubleImage {
		n.text(&n.Setup.Image, "setup.image", Elliptical, "shows the two walls beside each other")
	}
	if n.Setup.Kind == SingleWall && n.Part.ODMM > 0 {
		n.text(&n.Setup.Side, "setup.side", Outside, "a pipe is seldom open to a source")
	}
	why := "the part's total thickness: film touching the part"
	if n.Setup.DoubleWall() {
		why = "the pipe's outside diameter: film touching the pipe"
	}
	n.number(&n.Setup.BMM, "setup.bMM", n.DepthMM(), why)
}

func (n *normaliser) detector() {
	none := func(screens **[2]float64, field string) {
		if *screens == nil {
			*screens = &[2]float64{}
			n.tell(field, "none", "no lead screens, no intensification counted")
		}
	}
	switch d := n.Detector; {
	case d.Film != nil:
		none(&d.Film.ScreensMM, "detector.film.screensMM")
	case d.Plate != nil:
		none(&d.Plate.ScreensMM, "detector.plate.screensMM")
		if d.Plate.SRbUM == 0 {
			n.tell("detector.plate.srbUM", "not stated", "checks that need it stay undecided")
		}
	case d.Panel != nil && d.Panel.SRbUM == 0:
		n.tell("detector.panel.srbUM", "not stated", "the pitch is not taken for it: checks that need it stay undecided")
	}
	if n.Rules == "" {
		n.tell("rules", "none", "nothing is checked")
	}
}

func (n *normaliser) site() {
	if len(n.Site.Limits) == 0 {
		n.tell("site.limits", "none", "no boundary is computed")
	}
	for i := range n.Site.Limits {
		if l := &n.Site.Limits[i]; l.DoseUSv != 0 {
			n.number(&l.Occupancy, fmt.Sprintf("site.limits[%d].occupancy", i), 1, "somebody may be there all the time")
		}
	}
	if n.Site.ShotsPerHour == 0 {
		n.tell("site.shotsPerHour", "not stated", "the beam is taken to be on all hour")
	}
}
