package exposure

import (
	"halfvalue/exposure/boundary"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// EngineVersion names the physics that made a reckoning; it rises whenever a
// figure may come out differently.
const EngineVersion = "1"

// Reckoning is everything computed from a plan. Figures are unrounded and
// finite. Its JSON form is what `reckon --json` prints.
type Reckoning struct {
	Exposure Exposure        `json:"exposure"`
	Beam     Beam            `json:"beam"`
	Density  []Spot          `json:"density"` // film; empty with a plate or a panel
	SNR      []Signal        `json:"snr,omitempty"`
	Checks   []Check         `json:"checks"`
	Boundary []boundary.Line `json:"boundary"`
	Cautions []string        `json:"cautions"`

	Image    []Image        `json:"image"`    // what each place shows, in the order of Density or SNR
	Spread   []Contribution `json:"spread"`   // largest first
	Geometry Geometry       `json:"geometry"` // of the central ray
	Source   SourceState    `json:"source"`
	Defaults []plan.Default `json:"defaults"` // what the plan left out
	Engine   string         `json:"engine"`

	Workings []working.Step `json:"workings,omitempty"`
}

// Exposure is the time for the wanted density (or signal to noise ratio) and
// between which limits it is believed to lie.
type Exposure struct {
	Seconds     float64  `json:"seconds"`
	SecondsLow  float64  `json:"secondsLow"`
	SecondsHigh float64  `json:"secondsHigh"`
	MAMin       *float64 `json:"mAMin,omitempty"`  // tube: current x time
	GBqMin      *float64 `json:"GBqMin,omitempty"` // sealed source: activity at the plan's time x time
}

// Beam is the beam behind its filters and before the part, at the plan's
// current or activity, behind 1 m of air.
type Beam struct {
	MeanKeV                float64 `json:"meanKeV"`
	KermaRateMGyPerMinAt1m float64 `json:"kermaRateMGyPerMinAt1m"`
}

// Spot is one place of the part on the film.
type Spot struct {
	At          string  `json:"at"`
	ThicknessMM float64 `json:"thicknessMM"` // material along the ray
	Density     float64 `json:"density"`     // with base and fog
	DensityLow  float64 `json:"densityLow"`  // between which it is believed to lie
	DensityHigh float64 `json:"densityHigh"` // when the time is kept
}

// Signal is one place of the part on a plate or a panel.
type Signal struct {
	At          string  `json:"at"`
	ThicknessMM float64 `json:"thicknessMM"`
	SNRn        float64 `json:"snrN"`
}

// Verdict of a check.
type Verdict string

// The verdicts.
const (
	Holds     Verdict = "holds"
	Short     Verdict = "short"
	Undecided Verdict = "undecided"
)

// Check is one rule applied to the plan.
type Check struct {
	ID      string  `json:"id"`
	Verdict Verdict `json:"verdict"`
	Value   float64 `json:"value"`
	Limit   float64 `json:"limit"`
	Unit    string  `json:"unit"`
	Mend    *Mend   `json:"mend"`

	Title  string `json:"title"`
	Text   string `json:"text"`
	Source string `json:"source"`
}

// Mend is the change of one quantity that makes a check hold.
type Mend struct {
	Field string  `json:"field"`
	To    any     `json:"to"`    // what to set, rounded to the safe side
	Exact float64 `json:"exact"` // where the check just holds
	Text  string  `json:"text"`
}

// Contribution is the share of one input in the spread of the time, as one
// standard deviation relative to the time.
type Contribution struct {
	Name     string  `json:"name"`
	Input    float64 `json:"input"`    // the input's own standard deviation
	Unit     string  `json:"unit"`     // of Input: "%"
	From     string  `json:"from"`     // who says so: default, plan or test shots
	Power    float64 `json:"power"`    // of the input that the time goes by
	Relative float64 `json:"relative"` // what it does to the time
}

// Geometry of the central ray.
type Geometry struct {
	SFDMM float64 `json:"sfdMM"`
	FMM   float64 `json:"fMM"`  // source to the source-side surface of the part
	BMM   float64 `json:"bMM"`  // that surface to the film
	UgMM  float64 `json:"ugMM"` // geometric unsharpness d b / f
}

// SourceState is the source at the plan's time.
type SourceState struct {
	ActivityGBq float64 `json:"activityGBq,omitempty"`
	ActivityCi  float64 `json:"activityCi,omitempty"`
	Decay       float64 `json:"decay,omitempty"` // activity against the certificate's
}

// Calibration is what test shots teach: factors on the exposure time, one for
// the source and one for the film batch with its processing. Zero means 1.
// They never touch the dose field.
type Calibration struct {
	SourceFactor float64 // 0.1 to 10
	FilmFactor   float64 // 0.1 to 10
}
