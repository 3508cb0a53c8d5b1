package plan

import (
	"fmt"
	"math"
	"time"
)

// Beam places the source on the site: metres east and north of the site's own
// origin, height of the focus or source above the ground.
type Beam struct {
	XM           float64 `json:"xM,omitzero"`           // east, -1000 to 1000 m; default 0
	YM           float64 `json:"yM,omitzero"`           // north, -1000 to 1000 m; default 0
	HeightM      float64 `json:"heightM,omitzero"`      // above ground, 0.05 to 100 m; default 1
	BearingDeg   float64 `json:"bearingDeg,omitzero"`   // of the central ray, clockwise from north, 0 to 360; default 0
	ElevationDeg float64 `json:"elevationDeg,omitzero"` // of the central ray above the horizon, -90 to 90; default 0
}

// Point is a place on the site.
type Point struct {
	XM float64 `json:"xM"` // east, -1000 to 1000 m
	YM float64 `json:"yM"` // north, -1000 to 1000 m
}

// Wall is a wall or shield along a line of points. Where its material is left
// out or has no thickness it counts as none.
type Wall struct {
	Name     string  `json:"name"`
	Material string  `json:"material,omitzero"` // catalogue name or element symbol; default unknown, which shields nothing
	MM       float64 `json:"mm,omitzero"`       // 0.1 to 5000 mm; default unknown, which shields nothing
	HeightM  float64 `json:"heightM"`           // above ground, 0.1 to 100 m
	Points   []Point `json:"points"`            // 2 to 50, in order
}

// Person is somebody or some place that a dose is wanted for.
type Person struct {
	Name      string  `json:"name"`
	Role      string  `json:"role,omitzero"` // person (default), crew or place
	XM        float64 `json:"xM"`
	YM        float64 `json:"yM"`
	HeightM   float64 `json:"heightM,omitzero"`   // above ground, 0.05 to 100 m; default the level of the plan view
	Occupancy float64 `json:"occupancy,omitzero"` // share of the job spent there; default 1
}

// Reading is one meter reading on the site.
type Reading struct {
	XM           float64   `json:"xM"`
	YM           float64   `json:"yM"`
	USvPerH      float64   `json:"uSvPerH"`               // as shown by the meter, 0 to 1e7
	Meter        string    `json:"meter"`                 // serial or name
	Calibrated   time.Time `json:"calibrated,omitzero"`   // date of calibration; default not stated, then it confirms nothing
	Factor       float64   `json:"factor,omitzero"`       // multiplies the reading; default 1
	RangeUSvPerH float64   `json:"rangeUSvPerH,omitzero"` // full scale; default not stated, then it confirms nothing
	ResponseS    float64   `json:"responseS,omitzero"`    // response time; default not stated, then it confirms nothing
	HeldS        float64   `json:"heldS,omitzero"`        // how long the reading was held with the beam on; default not stated, then it confirms nothing
	State        string    `json:"state"`                 // exposed, transit or off
	Collimator   string    `json:"collimator,omitzero"`   // fitted or none; must be what the plan has; default as the plan
}

// Container is where a sealed source is kept and the way it travels.
type Container struct {
	XM                float64 `json:"xM"`
	YM                float64 `json:"yM"`
	TubeM             float64 `json:"tubeM,omitzero"`             // guide tube, as long as the straight way at least; default the straight way
	SpeedMPerS        float64 `json:"speedMPerS,omitzero"`        // of the source in the tube; default 0.3, slow cranking
	StoredUSvPerHAt1m float64 `json:"storedUSvPerHAt1m,omitzero"` // H*(10) rate at 1 m, source stored; default 20, the most of ISO 3999 class P
}

// Call is whom to call when a source does not return.
type Call struct {
	Name  string `json:"name"`
	Phone string `json:"phone"`
}

// Roles of people, states of a reading, collimator of a reading.
var (
	Roles       = []string{"person", "crew", "place"}
	States      = []string{"exposed", "transit", "off"}
	Collimators = []string{"fitted", "none"}
)

var sitePlanFields = []Field{
	{Path: "site.beam", Kind: Object, Default: "at the origin, 1 m high, level, to the north", Meaning: "where the focus or source is and where it points"},
	coordinate("site.beam.xM", "0", "metres east"), coordinate("site.beam.yM", "0", "metres north"),
	height("site.beam.heightM", "1 m", "focus or source above ground"),
	{Path: "site.beam.bearingDeg", Kind: Number, Unit: "deg", Min: 0, Max: 360, Step: 5, Usual: []float64{0, 45, 90, 135, 180, 225, 270, 315}, Default: "0 deg", Meaning: "central ray, clockwise from north"},
	{Path: "site.beam.elevationDeg", Kind: Number, Unit: "deg", Min: -90, Max: 90, Step: 5, Usual: []float64{-90, -45, 0, 45, 90}, Default: "0 deg", Meaning: "central ray above the horizon"},
	height("site.levelM", "the focus' own height", "height of the plan view above ground"),
	{Path: "site.partWidthMM", Kind: Number, Unit: "mm", Min: 1, Max: 50000, Step: 10, Usual: []float64{200, 500, 1000, 2000}, Default: "not stated: the part takes nothing off the rope", Meaning: "part across the beam, in the plan view; with partHeightMM"},
	{Path: "site.partHeightMM", Kind: Number, Unit: "mm", Min: 1, Max: 50000, Step: 10, Usual: []float64{200, 500, 1000, 2000}, Default: "not stated: the part takes nothing off the rope", Meaning: "part across the beam, upright; with partWidthMM"},
	{Path: "site.walls", Kind: List, Max: 50, Default: "none", Meaning: "walls and shields"},
	{Path: "site.walls[].name", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "what the wall is called"},
	{Path: "site.walls[].material", Kind: Name, Default: "unknown: shields nothing", Meaning: "catalogue name or element symbol"},
	{Path: "site.walls[].mm", Kind: Number, Unit: "mm", Min: 0.1, Max: 5000, Step: 5, Usual: []float64{2, 5, 10, 100, 150, 200, 300}, Default: "unknown: shields nothing", Meaning: "thickness"},
	{Path: "site.walls[].heightM", Kind: Number, Required: true, Unit: "m", Min: 0.1, Max: 100, Step: 0.5, Usual: []float64{1, 2, 2.5, 3, 5}, Meaning: "top of the wall above ground; above it rays pass"},
	{Path: "site.walls[].points", Kind: List, Required: true, Min: 2, Max: 50, Meaning: "its line, corner by corner; where the line is broken is a gap"},
	coordinate("site.walls[].points[].xM", "", "metres east"), coordinate("site.walls[].points[].yM", "", "metres north"),
	{Path: "site.people", Kind: List, Max: 100, Default: "none", Meaning: "people and places that a dose is wanted for"},
	{Path: "site.people[].name", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "who or what"},
	{Path: "site.people[].role", Kind: Name, Default: "person", Meaning: "crew are at the crank or console"},
	coordinate("site.people[].xM", "", "metres east"), coordinate("site.people[].yM", "", "metres north"),
	height("site.people[].heightM", "the level of the plan view", "above ground"),
	{Path: "site.people[].occupancy", Kind: Number, Min: 0.001, Max: 1, Step: 0.05, Usual: []float64{0.05, 0.1, 0.25, 0.5, 1}, Default: "1", Meaning: "share of the job spent there"},
	{Path: "site.readings", Kind: List, Max: 200, Default: "none", Meaning: "meter readings; one above the prediction widens every rope"},
	coordinate("site.readings[].xM", "", "metres east"), coordinate("site.readings[].yM", "", "metres north"),
	{Path: "site.readings[].uSvPerH", Kind: Number, Required: true, Unit: "uSv/h", Min: 0, Max: 1e7, Step: 1, Meaning: "as the meter shows it"},
	{Path: "site.readings[].meter", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "which meter"},
	{Path: "site.readings[].calibrated", Kind: Time, Min: 1950, Max: 2100, Default: "not stated: the reading confirms nothing", Meaning: "date of the meter's calibration"},
	{Path: "site.readings[].factor", Kind: Number, Min: 0.1, Max: 10, Step: 0.05, Usual: []float64{0.8, 1, 1.2}, Default: "1", Meaning: "calibration factor that multiplies the reading"},
	{Path: "site.readings[].rangeUSvPerH", Kind: Number, Unit: "uSv/h", Min: 0.1, Max: 1e8, Step: 10, Usual: []float64{100, 1000, 10000, 100000}, Default: "not stated: the reading confirms nothing", Meaning: "full scale"},
	{Path: "site.readings[].responseS", Kind: Number, Unit: "s", Min: 0.01, Max: 600, Step: 1, Usual: []float64{1, 2, 5, 8, 10}, Default: "not stated: the reading confirms nothing", Meaning: "response time of the meter"},
	{Path: "site.readings[].heldS", Kind: Number, Unit: "s", Min: 0.01, Max: 36000, Step: 1, Usual: []float64{5, 10, 20, 30, 60}, Default: "not stated: the reading confirms nothing", Meaning: "how long it was held with the beam on"},
	{Path: "site.readings[].state", Kind: Name, Required: true, Meaning: "what the source did meanwhile"},
	{Path: "site.readings[].collimator", Kind: Name, Default: "as the plan", Meaning: "whether a collimator was on"},
	{Path: "site.farOffFactor", Kind: Number, Min: 1.1, Max: 100, Step: 0.5, Usual: []float64{1.5, 2, 3, 5}, Default: "2", Meaning: "a reading that differs from the prediction by more, either way, means stop and look"},
	{Path: "site.container", Kind: Object, Default: "not stated: the source travels nowhere but its own place", Meaning: "where a sealed source is kept and its guide tube; only with a sealed source"},
	coordinate("site.container.xM", "", "metres east"), coordinate("site.container.yM", "", "metres north"),
	{Path: "site.container.tubeM", Kind: Number, Unit: "m", Min: 0.1, Max: 100, Step: 0.5, Usual: []float64{2, 4, 6, 8}, Default: "the straight way", Meaning: "guide tube from container to source's place"},
	{Path: "site.container.speedMPerS", Kind: Number, Unit: "m/s", Min: 0.01, Max: 10, Step: 0.1, Usual: []float64{0.2, 0.3, 0.5, 0.75, 1}, Default: "0.3 m/s, slow cranking", Meaning: "how fast the source travels"},
	{Path: "site.container.storedUSvPerHAt1m", Kind: Number, Unit: "uSv/h", Min: 0.01, Max: 1000, Step: 1, Usual: []float64{2, 5, 10, 20}, Default: "20 uSv/h, the most of ISO 3999 class P", Meaning: "rate at 1 m with the source stored"},
	{Path: "site.averagingAllowedBy", Kind: Text, Min: 1, Max: 60, Default: "nobody: beam-off time is never averaged in", Meaning: "the radiation safety officer who allows averaging a rate over the hour; both ropes are drawn then"},
	{Path: "site.airKgPerM3", Kind: Number, Unit: "kg/m3", Min: 0.5, Max: 1.6, Step: 0.05, Usual: []float64{0.9, 1, 1.1, 1.2}, Default: "not stated: air takes nothing off", Meaning: "density of the air, for its attenuation"},
	{Path: "site.calls", Kind: List, Max: 10, Default: "none", Meaning: "whom to call when a source does not return"},
	{Path: "site.calls[].name", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "who"},
	{Path: "site.calls[].phone", Kind: Text, Required: true, Min: 1, Max: 60, Meaning: "how to reach them"},
}

func coordinate(path, byDefault, meaning string) Field {
	return Field{Path: path, Kind: Number, Required: byDefault == "", Unit: "m", Min: -1000, Max: 1000, Step: 0.5, Default: byDefault, Meaning: meaning}
}

func height(path, byDefault, meaning string) Field {
	return Field{Path: path, Kind: Number, Unit: "m", Min: 0.05, Max: 100, Step: 0.1, Usual: []float64{0.5, 1, 1.5, 2, 3}, Default: byDefault, Meaning: meaning}
}

func (s Site) clone() Site {
	s.Limits, s.People, s.Calls = copied(s.Limits), copied(s.People), copied(s.Calls)
	s.Walls = copied(s.Walls)
	for i := range s.Walls {
		s.Walls[i].Points = copied(s.Walls[i].Points)
	}
	s.Readings = copied(s.Readings)
	for i := range s.Readings {
		s.Readings[i].Calibrated = utc(s.Readings[i].Calibrated)
	}
	s.Container = pointed(s.Container)
	return s
}

// WithDefaults fills in the site's documented defaults: beam height 1 m, level
// at the focus, factors, the container's speed and rate.
func (s Site) WithDefaults() Site {
	s = s.clone()
	fill := func(v *float64, x float64) {
		if *v == 0 {
			*v = x
		}
	}
	fill(&s.Beam.HeightM, 1)
	fill(&s.LevelM, s.Beam.HeightM)
	fill(&s.FarOffFactor, 2)
	for i := range s.People {
		fill(&s.People[i].HeightM, s.LevelM)
		fill(&s.People[i].Occupancy, 1)
		if s.People[i].Role == "" {
			s.People[i].Role = Roles[0]
		}
	}
	for i := range s.Readings {
		fill(&s.Readings[i].Factor, 1)
	}
	if c := s.Container; c != nil {
		fill(&c.TubeM, max(0.1, math.Hypot(c.XM-s.Beam.XM, c.YM-s.Beam.YM)))
		fill(&c.SpeedMPerS, 0.3)
		fill(&c.StoredUSvPerHAt1m, 20)
	}
	return s
}

func (p Plan) validateSitePlan(f *faults) {
	s := p.Site
	if (s.PartWidthMM == 0) != (s.PartHeightMM == 0) && f.clean("site.partWidthMM", "site.partHeightMM") {
		f.add(FieldError{Field: "site.partWidthMM", Value: format(s.PartWidthMM), Problem: "goes with partHeightMM", Allowed: "both or neither", Mend: "give both"})
	}
	for i, w := range s.Walls {
		if at := fmt.Sprintf("site.walls[%d]", i); f.clean(at, "site.beam") {
			w.validate(f, at, s.Beam)
		}
	}
	if c := s.Container; c != nil && f.clean("site.container", "site.beam", "source") {
		way := math.Hypot(c.XM-s.Beam.XM, c.YM-s.Beam.YM)
		switch {
		case p.Source.Sealed == nil:
			f.add(FieldError{Field: "site.container", Value: "stated", Problem: "goes with a sealed source", Allowed: "none with a tube", Mend: "take it out"})
		case c.TubeM != 0 && c.TubeM < way*(1-slack):
			f.add(FieldError{Field: "site.container.tubeM", Value: format(c.TubeM), Problem: "is shorter than the straight way", Allowed: round(way) + " m or more", Mend: "leave it out or move the container"})
		}
	}
}

func (w Wall) validate(f *faults, at string, b Beam) {
	for i := range len(w.Points) - 1 {
		p, q := w.Points[i], w.Points[i+1]
		where := fmt.Sprintf("%s.points[%d]", at, i+1)
		if math.Hypot(q.XM-p.XM, q.YM-p.YM) < 0.001 {
			f.add(FieldError{Field: where, Value: format(q.XM) + ", " + format(q.YM), Problem: "is the point before it again", Allowed: "1 mm apart or more", Mend: "take one out"})
			return
		}
		if d := pointToSegment(b.XM, b.YM, p, q); d <= max(w.MM/2000, 0.001) && w.MM > 0 {
			f.add(FieldError{Field: where, Value: w.Name, Problem: "has the source inside the wall", Allowed: "source and wall apart", Mend: "move the beam or the wall"})
			return
		}
		for j := range i - 1 {
			if crosses(p, q, w.Points[j], w.Points[j+1]) {
				f.add(FieldError{Field: where, Value: w.Name, Problem: fmt.Sprintf("makes the wall cross itself at its leg %d", j+1), Allowed: "a line that does not cross itself", Mend: "make two walls of it"})
				return
			}
		}
	}
}

func pointToSegment(x, y float64, p, q Point) float64 {
	dx, dy := q.XM-p.XM, q.YM-p.YM
	t := max(0, min(1, ((x-p.XM)*dx+(y-p.YM)*dy)/(dx*dx+dy*dy)))
	return math.Hypot(x-p.XM-t*dx, y-p.YM-t*dy)
}

// crosses tells that two legs cross between their ends; legs that only touch,
// as in a closed line, do not.
func crosses(a, b, c, d Point) bool {
	side := func(p, q, r Point) float64 { return (q.XM-p.XM)*(r.YM-p.YM) - (q.YM-p.YM)*(r.XM-p.XM) }
	return side(a, b, c)*side(a, b, d) < 0 && side(c, d, a)*side(c, d, b) < 0
}
