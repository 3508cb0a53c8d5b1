package boundary

import (
	"fmt"
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// leastDistanceM is the nearest that a point is taken to be to any source.
const leastDistanceM = 0.05

// Parts is the H*(10) rate at a place by what brings it there, uSv/h.
type Parts struct {
	Beam    float64 `json:"beam"`    // useful beam, or the bare source
	Leakage float64 `json:"leakage"` // through the housing or the collimator
	Scatter float64 `json:"scatter"` // off the part
	Ground  float64 `json:"ground"`  // off ground and walls
	Sky     float64 `json:"sky"`     // off the air, over walls
}

// Total adds the parts.
func (p Parts) Total() float64 { return p.Beam + p.Leakage + p.Scatter + p.Ground + p.Sky }

// Option leaves something out of a field.
type Option func(*Field)

// WithoutScatter leaves out part, ground, walls and air: what is left has a
// closed form. For comparison only, never for a rope.
func WithoutScatter() Option { return func(f *Field) { f.noScatter = true } }

// WithoutLeakage leaves out the housing's leakage; for comparison only.
func WithoutLeakage() Option { return func(f *Field) { f.noLeakage = true } }

// Field is the dose field round a shot: the H*(10) rate at any place of the
// site. It is made once for a plan and never changed; safe for concurrent use.
type Field struct {
	in                   Input
	site                 plan.Site
	focus, axis          Vec
	cosHalf              float64
	openAt1m, leakAt1m   float64 // uSv/h
	throughAt1m          float64 // behind the part
	credited             bool    // every ray of the cone is proved to pass the part
	part                 Vec     // where the beam meets it
	scatterAt1m          [angles]float64
	skyBeam, skyAllRound *sky
	leakShare            float64 // leakage to open beam
	shields              *shields
	patches, barePatches []patch
	ground, bareGround   *around
	factor               float64 // what meter readings multiply the whole field by
	noScatter, noLeakage bool
	traced               bool // credit the part to each ray that passes it
	bareDiffers          bool // sealed source: bare on its way, else the same as exposed
}

// NewField makes the field of a shot. Errors name what of the plan the physics
// refused.
func NewField(in Input, opts ...Option) (*Field, error) {
	s := in.Plan.Site.WithDefaults()
	f := &Field{in: in, site: s, factor: 1}
	for _, o := range opts {
		o(f)
	}
	f.focus = Vec{s.Beam.XM, s.Beam.YM, s.Beam.HeightM}
	f.axis = direction(s.Beam.BearingDeg, s.Beam.ElevationDeg)
	half := f.in.halfCone()
	f.cosHalf = cosDeg(half)
	f.part = f.focus.plus(f.axis.times((in.Plan.Setup.SFDMM - in.Plan.Setup.BMM) / 1000))
	f.openAt1m = in.Spectrum.AmbientUSv() * in.Strength * 3600
	var err error
	if f.throughAt1m, err = in.through(); err != nil {
		return nil, err
	}
	f.credited = in.everyRayPasses()
	leaking, err := f.leak()
	if err != nil {
		return nil, err
	}
	if f.shields, err = newShields(s, [qualities]beam.Spectrum{in.Spectrum, leaking}); err != nil {
		return nil, err
	}
	f.bareDiffers = in.Plan.Source.Sealed != nil && (f.cosHalf > -1 || s.Container != nil)
	if f.noScatter {
		return f, nil
	}
	return f, f.scattered(half)
}

// AtLevel gives the field with its plan view at another height above ground.
func (f *Field) AtLevel(levelM float64) *Field {
	g := *f
	g.site.LevelM = levelM
	if !f.noScatter {
		g.tabulate()
	}
	return &g
}

// tabulate tables the scatter off ground and walls on the plan view's level.
func (f *Field) tabulate() {
	b := f.site.Beam.BearingDeg
	f.ground = newAround(f.focus, b, f.site.LevelM, f.patches, f.shields)
	f.bareGround = f.ground
	if f.bareDiffers && f.cosHalf > -1 {
		f.bareGround = newAround(f.focus, b, f.site.LevelM, f.barePatches, f.shields)
	}
}

// halfCone is half the opening of the useful beam; 180 where nothing shields
// the source outside it.
func (in Input) halfCone() float64 {
	if s := in.Plan.Source.Sealed; s != nil && len(s.Collimator) == 0 {
		return 180
	}
	return in.coneDeg() / 2
}

// everyRayPasses tells that the part is stated to be larger than the cone
// where the beam leaves it; a part without width and height is never credited.
func (in Input) everyRayPasses() bool {
	s, half := in.Plan.Site, in.halfCone()
	if s.PartWidthMM == 0 || half >= 85 || in.Plan.Source.Sealed != nil {
		return false // a sealed source is bare on its way whatever the part
	}
	reach := 2 * in.Plan.Setup.SFDMM * math.Tan(half*math.Pi/180)
	return min(s.PartWidthMM, s.PartHeightMM) >= reach && in.Plan.Part.ODMM == 0
}

// leak sets the leakage's rate and gives its spectrum: the beam behind as much
// lead as brings its air kerma down to the leakage, or behind the collimator.
func (f *Field) leak() (beam.Spectrum, error) {
	in := f.in
	if t := in.Plan.Source.Tube; t != nil {
		if !f.noLeakage {
			f.leakAt1m = t.LeakageMGyPerHAt1m * 1000 * mostAmbientPerKerma
		}
		lead, err := materials.Lookup("Pb")
		if err != nil {
			return beam.Spectrum{}, err
		}
		lo, hi := 0.0, 60.0
		for range 24 {
			mid := (lo + hi) / 2
			if in.Spectrum.Through(lead, mid).KermaMGy()*in.Strength*3600 > t.LeakageMGyPerHAt1m {
				lo = mid
			} else {
				hi = mid
			}
		}
		return in.Spectrum.Through(lead, lo), nil
	}
	walls := in.Plan.Source.Sealed.Collimator
	hard := in.Spectrum
	for _, w := range walls {
		m, err := materials.Lookup(w.Material)
		if err != nil {
			return hard, err
		}
		hard = hard.Through(m, w.MM)
	}
	if len(walls) > 0 && !f.noLeakage {
		v, err := in.behindCollimator(walls)
		if err != nil {
			return hard, err
		}
		f.leakAt1m = v
	}
	if !(hard.AmbientUSv() > in.Spectrum.AmbientUSv()*1e-60) {
		return in.Spectrum, nil // nothing comes through, and nothing to weaken
	}
	return hard, nil
}

// scattered makes ready part, ground, walls and air.
func (f *Field) scattered(half float64) error {
	in, scale := f.in, f.in.Strength*3600
	byDeg, err := in.scatterByDeg()
	if err != nil {
		return err
	}
	for i := range f.scatterAt1m {
		f.scatterAt1m[i] = inTable(byDeg, nodeDeg(i))
	}
	f.skyBeam = newSky(in.Spectrum, half, scale)
	f.skyAllRound = f.skyBeam
	if half < 90 {
		f.skyAllRound = newSky(in.Spectrum, 180, scale)
	}
	if f.openAt1m > 0 {
		f.leakShare = f.leakAt1m / f.openAt1m
	}
	ground, err := newReflection(groundMaterial, in.Spectrum, scale)
	if err != nil {
		return err
	}
	var walls [mostMaterials]*reflection
	for i, name := range f.shields.names {
		if walls[i], err = newReflection(name, in.Spectrum, scale); err != nil {
			return err
		}
	}
	b := f.site.Beam.BearingDeg
	f.patches = lit(f.focus, f.axis, b, half, f.shields, ground, walls)
	f.barePatches = f.patches
	if f.bareDiffers && half < 180 {
		f.barePatches = lit(f.focus, f.axis, b, 180, f.shields, ground, walls)
	}
	f.tabulate()
	return nil
}

// scatterByDeg gives the rate at 1 m off the part by angle from the beam,
// every degree; of several materials the one that scatters most there.
func (in Input) scatterByDeg() ([]float64, error) {
	keV, perCM2 := grouped(in.Spectrum)
	half := min(in.coneDeg()/2, mostHalfConeDeg)
	t := math.Tan(half * math.Pi / 180)
	scale := math.Pi * t * t * in.Strength * 3600
	out := make([]float64, 181)
	seen := map[string]bool{}
	for _, l := range in.Plan.Part.Layers {
		if seen[l.Material] {
			continue
		}
		seen[l.Material] = true
		m, err := materials.Lookup(l.Material)
		if err != nil {
			return nil, err
		}
		e, err := transport.Emitted(m, in.Plan.Part.TotalMM(), keV, perCM2)
		if err != nil {
			return nil, err
		}
		for deg := range out {
			out[deg] = max(out[deg], e.Weighted(float64(deg), ambientPerFluence)*scale)
		}
	}
	return out, nil
}

// Exposed gives the rate at q with the source in its place and the beam on, as
// the rope takes it: the part is credited only where every ray is proved to
// pass it.
func (f *Field) Exposed(q Vec) Parts {
	return f.exposed(q, f.traced)
}

// Traced is Exposed with the part's credit given to every ray that passes it:
// shown beside the rope, never in its place.
func (f *Field) Traced(q Vec) Parts {
	return f.exposed(q, true)
}

func (f *Field) exposed(q Vec, traced bool) Parts {
	way := q.minus(f.focus)
	r2 := max(way.dot(way), leastDistanceM*leastDistanceM)
	r := math.Sqrt(r2)
	cos := way.dot(f.axis) / r
	var p Parts
	pass, passLeak := f.shields.passBoth(f.focus, q)
	inBeam := cos >= f.cosHalf
	open := f.openAt1m
	if f.credited || (traced && inBeam && f.meetsPart(way, cos)) {
		open = f.throughAt1m
	}
	if inBeam {
		p.Beam = open / r2 * pass
	}
	if !inBeam || f.in.Plan.Source.Tube != nil { // a collimator leaks outside its opening only
		p.Leakage = f.leakAt1m / r2 * passLeak
	}
	if !f.noScatter {
		p.Scatter = f.offPart(q)
		p.Ground = f.offGround(q, f.ground, f.patches)
		p.Sky = f.offAir(r, cos, inBeam, pass, passLeak)
	}
	return p.times(f.factor)
}

// offAir is the air scatter at r from the focus. In the beam it fills what walls
// take off: in the open it is part of a beam of which the air takes nothing off.
func (f *Field) offAir(r, cos float64, inBeam bool, pass, passLeak float64) float64 {
	var h float64
	switch {
	case !inBeam:
		h = f.skyBeam.rate(cos, r)
	case pass < 1:
		h = min(f.skyBeam.rate(cos, r), f.openAt1m/(2*r*r)) * (1 - pass)
	}
	if passLeak < 1 {
		h += min(f.skyAllRound.rate(1, r)*f.leakShare, f.leakAt1m/(2*r*r)) * (1 - passLeak)
	}
	return h
}

func (p Parts) times(k float64) Parts {
	return Parts{p.Beam * k, p.Leakage * k, p.Scatter * k, p.Ground * k, p.Sky * k}
}

// meetsPart tells whether a ray falls inside the part's silhouette: a pipe
// across the beam and upright to the plan view, or the stated width and height.
func (f *Field) meetsPart(way Vec, cos float64) bool {
	if cos <= 0 {
		return false
	}
	right, up := frame(f.axis, f.site.Beam.BearingDeg)
	to := f.part.minus(f.focus).length() / (cos * way.length())
	x, y := math.Abs(way.dot(right))*to*1000, math.Abs(way.dot(up))*to*1000
	if od := f.in.Plan.Part.ODMM; od > 0 {
		return x < od/2
	}
	return x < f.site.PartWidthMM/2 && y < f.site.PartHeightMM/2
}

func (f *Field) offPart(q Vec) float64 {
	way := q.minus(f.part)
	r2 := max(way.dot(way), leastDistanceM*leastDistanceM)
	h := byCos(&f.scatterAt1m, way.dot(f.axis)/math.Sqrt(r2)) / r2
	return h * f.shields.pass(f.part, q, ofBeam)
}

func (f *Field) offGround(q Vec, a *around, patches []patch) float64 {
	if math.Abs(q.Z-f.site.LevelM) < 1e-9 {
		return a.rate(q)
	}
	return patchesRate(patches, q, f.shields)
}

// Place gives the point x east and y north on the level of the plan view.
func (f *Field) Place(x, y float64) Vec { return Vec{x, y, f.site.LevelM} }

// String tells what the field is of.
func (f *Field) String() string {
	return fmt.Sprintf("field of %.4g uSv/h at 1 m in the open beam, %d legs of wall", f.openAt1m, len(f.shields.legs))
}
