// Package plan holds what is chosen before a shot: source, part, setup,
// detector, rules and site. A Plan is a plain value: it can be copied,
// compared, encoded and shown. Nothing is computed here and nothing here
// knows the physics; the package decodes plan files, fills in the documented
// defaults, and refuses every plan that the physics could not answer.
//
// Units are in the name of each field: mm, keV, kV, mA, GBq, s.
package plan

import "time"

// Version is the plan file version that Encode writes. Version 1 files decode
// unchanged for ever; the version gains optional fields only.
const Version = 1

// Plan is one shot as chosen. The zero value is not valid; Decode and
// Validate are the ways to a plan that the engine accepts.
type Plan struct {
	Plan     int       `json:"plan"`           // file version, always 1
	Title    string    `json:"title,omitzero"` // what the crew calls it, at most 120 characters
	At       time.Time `json:"at,omitzero"`    // time of the shot; needed with a sealed source, whose activity is decayed to it
	Source   Source    `json:"source"`         // exactly one of tube and sealed
	Part     Part      `json:"part"`           // what the beam passes
	Setup    Setup     `json:"setup"`          // where source, part and detector stand
	Detector Detector  `json:"detector"`       // what records the image
	Rules    string    `json:"rules,omitzero"` // name of a rule set, "iso17636-1:2013/B"; empty: none
	Site     Site      `json:"site,omitzero"`  // boundary limits and use of the beam

	Uncertainty Uncertainty `json:"uncertainty,omitzero"` // how well the inputs are known; default by input
}

// Source is a tube head or a sealed source: exactly one pointer is set.
type Source struct {
	Tube   *Tube   `json:"tube,omitempty"`
	Sealed *Sealed `json:"sealed,omitempty"`
}

// Tube is an X-ray head as set for the shot.
type Tube struct {
	KV                 float64  `json:"kv"`                          // peak tube voltage, 20 to 450 kV
	MA                 float64  `json:"ma"`                          // mean tube current, 0.01 to 100 mA
	FocusMM            float64  `json:"focusMM"`                     // effective focus, 0.005 to 10 mm
	Target             string   `json:"target,omitzero"`             // W (default), Mo, Cu, Rh, Cr or Au
	AnodeDeg           float64  `json:"anodeDeg,omitzero"`           // angle between anode face and central ray, 5 to 45 deg; default 20
	Waveform           string   `json:"waveform,omitzero"`           // constant (default), two-pulse or self-rectified
	ConeDeg            float64  `json:"coneDeg,omitzero"`            // full opening of the useful beam, 5 to 360 deg; default 40
	MaxKV              float64  `json:"maxKV,omitzero"`              // limit of the head; default: not stated
	MaxW               float64  `json:"maxW,omitzero"`               // limit of the head on kV x mA, W; default: not stated
	Filters            []Filter `json:"filters,omitempty"`           // ordered from the target outward, the whole filtration: window, oil, added; default none, which is said in the answer
	LeakageMGyPerHAt1m float64  `json:"leakageMGyPerHAt1m,omitzero"` // housing leakage, air kerma rate from the certificate; default by kV class
}

// Filter is one sheet that the beam passes before the part.
type Filter struct {
	Material string  `json:"material"` // catalogue name or element symbol
	MM       float64 `json:"mm"`       // 0 to 100 mm
}

// Sealed is a sealed gamma source. Exactly one of ActivityGBq and ActivityCi
// is given in a file; after Normalised ActivityGBq always holds.
type Sealed struct {
	Nuclide     string    `json:"nuclide"`              // Ir-192, Se-75, Co-60, Yb-169, Tm-170
	ActivityGBq float64   `json:"activityGBq,omitzero"` // at Assayed, 0.01 to 1e6 GBq
	ActivityCi  float64   `json:"activityCi,omitzero"`  // the same in curie, 1 Ci = 37 GBq
	Assayed     time.Time `json:"assayed"`              // time of the certificate's activity
	SizeMM      float64   `json:"sizeMM"`               // largest effective dimension, 0.1 to 15 mm
	Basis       string    `json:"basis,omitzero"`       // output (default: certificate gives the equivalent activity of what comes out) or content
	ConeDeg     float64   `json:"coneDeg,omitzero"`     // opening of the collimator; default 360: no collimator, bare in all directions
	Collimator  []Filter  `json:"collimator,omitempty"` // walls of the collimator outside its opening; default none
}

// Part is what stands between source and detector.
type Part struct {
	Layers []Layer `json:"layers"` // ordered from source to detector, 1 to 20
	// Sections are other thicknesses of the same part on the same image:
	// thin and thick places of a casting, the weld with its cap.
	Sections []Section `json:"sections,omitempty"`
	ODMM     float64   `json:"odMM,omitzero"`   // outside diameter, pipes only
	WallMM   float64   `json:"wallMM,omitzero"` // nominal wall, pipes only
	WeldMM   float64   `json:"weldMM,omitzero"` // width of the weld's cap; default: not stated
}

// Layer is one penetrated thickness along the central ray.
type Layer struct {
	Material string  `json:"material"` // catalogue name or element symbol
	MM       float64 `json:"mm"`       // 0.01 to 2000 mm
}

// Section is a named place of the part with its own layers.
type Section struct {
	Name   string  `json:"name"`
	Layers []Layer `json:"layers"`
}

// Setup places source, part and detector. SFDMM = f + BMM.
type Setup struct {
	Kind  string  `json:"kind"`           // single-wall, double-wall-single-image, double-wall-double-image, panoramic
	Image string  `json:"image,omitzero"` // with double-wall-double-image: elliptical (default) or perpendicular
	Side  string  `json:"side,omitzero"`  // single-wall pipes: source outside (default) or inside
	Shots int     `json:"shots,omitzero"` // shots planned round the weld; default: not stated
	SFDMM float64 `json:"sfdMM"`          // source to film, 20 to 20000 mm
	BMM   float64 `json:"bMM,omitzero"`   // source-side surface to film; default and least: the part's total thickness
}

// Detector is what records the image: exactly one pointer is set.
type Detector struct {
	Film  *Film  `json:"film,omitempty"`
	Plate *Plate `json:"plate,omitempty"` // imaging plate
	Panel *Panel `json:"panel,omitempty"` // flat panel
}

// Film is a film system of an ISO 11699-1 class.
type Film struct {
	Class     string      `json:"class"`               // C1 to C6
	Density   float64     `json:"density"`             // wanted optical density, base and fog included, 1.0 to 4.5
	ScreensMM *[2]float64 `json:"screensMM,omitempty"` // lead screens front and back, mm; 0 none; default none
	Data      FilmData    `json:"data,omitzero"`       // the make's own figures in place of its class's
}

// Site is the boundary's part of the plan.
type Site struct {
	Limits       []Limit `json:"limits,omitempty"`
	ShotsPerHour float64 `json:"shotsPerHour,omitzero"` // default: not stated, the beam is on all hour

	// What follows draws the site; see site.go.
	Beam               Beam       `json:"beam,omitzero"`
	LevelM             float64    `json:"levelM,omitzero"` // height of the plan view, 0.05 to 100 m; default the focus' own
	PartWidthMM        float64    `json:"partWidthMM,omitzero"`
	PartHeightMM       float64    `json:"partHeightMM,omitzero"`
	Walls              []Wall     `json:"walls,omitempty"`
	People             []Person   `json:"people,omitempty"`
	Readings           []Reading  `json:"readings,omitempty"`
	FarOffFactor       float64    `json:"farOffFactor,omitzero"`
	Container          *Container `json:"container,omitempty"`
	AveragingAllowedBy string     `json:"averagingAllowedBy,omitzero"`
	AirKgPerM3         float64    `json:"airKgPerM3,omitzero"`
	Calls              []Call     `json:"calls,omitempty"`
}

// Limit is one criterion for the rope: either a rate with the meter's
// averaging time, or a dose with its period.
type Limit struct {
	Name         string  `json:"name"`
	RateUSvPerH  float64 `json:"rateUSvPerH,omitzero"`  // H*(10) rate
	AveragingMin float64 `json:"averagingMin,omitzero"` // the meter's smoothing; beam-off time is never averaged in
	DoseUSv      float64 `json:"doseUSv,omitzero"`      // H*(10) dose per period
	Per          string  `json:"per,omitzero"`          // hour, week, job or year
	Occupancy    float64 `json:"occupancy,omitzero"`    // share of the period that somebody is there, 0 to 1; default 1
}
