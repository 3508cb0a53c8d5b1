package boundary

import (
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// patch is a spot of ground or wall that the beam lights, taken as a point.
type patch struct {
	at, normal Vec // normal towards where the beam came from
	in         Vec // unit vector of the beam
	cosIn      float64
	weight     float64 // solid angle of the beam on it, sr, times what the walls before it pass
	surface    *reflection
}

// reflection is what a thick slab sends back, uSv/h at 1 m per steradian of
// beam that falls on it, by degree from its normal.
type reflection struct {
	byDeg   []float64
	meanKeV float64
}

// groundMaterial stands for the ground: of soil, sand, brick and concrete none
// scatters much more.
const groundMaterial = "concrete"

const thickMM = 1e5

func newReflection(material string, s beam.Spectrum, scale float64) (*reflection, error) {
	m, err := materials.Lookup(material)
	if err != nil {
		return nil, err
	}
	keV, perCM2 := grouped(s)
	e, err := transport.Emitted(m, thickMM, keV, perCM2)
	if err != nil {
		return nil, err
	}
	r := &reflection{byDeg: make([]float64, 91), meanKeV: s.MeanKeV()}
	for deg := range r.byDeg {
		r.byDeg[deg] = e.Weighted(180-float64(deg), ambientPerFluence) * scale
	}
	return r, nil
}

// leastCos keeps grazing directions finite.
const leastCos = 0.02

// at gives the H*(10) rate that the patch brings to q, walls aside: what a slab
// sends back for normal incidence, turned to the incidence at hand as in
// Chilton and Huddleston's albedo: (1 + 1/c) / (1 + c0/c), and never less than
// the Klein-Nishina dose at the true angle of scattering asks for.
func (p *patch) rate(q Vec) float64 {
	way := q.minus(p.at)
	r2 := max(way.dot(way), leastDistanceM*leastDistanceM)
	r := math.Sqrt(r2)
	c := way.dot(p.normal) / r
	if c <= 0 {
		return 0
	}
	c = max(c, leastCos)
	normal := inTable(p.surface.byDeg, acosDeg(c))
	turned := (c + 1) / (c + max(p.cosIn, leastCos))
	cosTrue, cosNormal := p.in.dot(way)/r, -c
	if cosTrue > cosNormal {
		a, ea := kleinNishina(p.surface.meanKeV, cosTrue)
		b, eb := kleinNishina(p.surface.meanKeV, cosNormal)
		turned *= max(1, a*ea/(b*eb))
	}
	return normal * turned * p.weight / r2
}

// Rays that stand for the beam where it lights ground and walls.
const (
	coneRings, coneSpokes = 5, 12
	wideRings, wideSpokes = 12, 12
	farthestPatchM        = 300
)

// lit gives the patches of a beam from focus.
func lit(focus, axis Vec, bearingDeg, halfDeg float64, sh *shields, ground *reflection, walls [mostMaterials]*reflection) []patch {
	rings, spokes := coneRings, coneSpokes
	if halfDeg > 60 {
		rings, spokes = wideRings, wideSpokes
	}
	right, up := frame(axis, bearingDeg)
	var list []patch
	for ring := range rings {
		// equal solid angles
		cosAt := func(i float64) float64 { return 1 - (1-cosDeg(halfDeg))*i/float64(rings) }
		c := cosAt(float64(ring) + 0.5)
		s := math.Sqrt(1 - c*c)
		omega := 2 * math.Pi * (cosAt(float64(ring)) - cosAt(float64(ring+1))) / float64(spokes)
		for spoke := range spokes {
			az := (float64(spoke) + 0.5) * 360 / float64(spokes)
			d := axis.times(c).plus(right.times(s * sinDeg(az))).plus(up.times(s * cosDeg(az)))
			list = sh.follow(list, focus, d, omega, ground, walls)
		}
	}
	return list
}

// follow adds the patches that one ray lights: the first wall it meets and the
// ground where it comes down.
func (sh *shields) follow(list []patch, from, d Vec, omega float64, ground *reflection, walls [mostMaterials]*reflection) []patch {
	reach := float64(farthestPatchM)
	falls := d.Z < 0 && -from.Z/d.Z <= reach
	if falls {
		reach = -from.Z / d.Z
	}
	first, index := 1.0, -1
	for i := range sh.legs {
		if sh.legs[i].material < 0 {
			continue
		}
		if at, _, ok := sh.legs[i].hit(from, d.times(reach)); ok && at < first {
			first, index = at, i
		}
	}
	if index >= 0 {
		l := &sh.legs[index]
		n := Vec{l.nx, l.ny, 0}
		if n.dot(d) > 0 {
			n = n.times(-1)
		}
		at := from.plus(d.times(first*reach - 0.01))
		list = append(list, patch{at: at, normal: n, in: d, cosIn: -d.dot(n), weight: omega, surface: walls[l.material]})
	}
	if falls {
		at := from.plus(d.times(reach))
		at.Z = 0
		list = append(list, patch{at: at, normal: Vec{Z: 1}, in: d, cosIn: -d.Z, weight: omega * sh.pass(from, at, ofBeam), surface: ground})
	}
	return list
}

// around is the field of the patches on one level, tabled round the source.
// Each node holds the largest of the nodes round it, so that between nodes it
// errs outward, and it falls with distance on every bearing.
type around struct {
	centre     Vec
	bearingDeg float64
	lnR2H      []float64 // aroundBearings by aroundRadii
}

const (
	aroundBearings = 48
	aroundRadii    = 18
	aroundFirstM   = 0.5
	aroundRatio    = 1.5
)

var lnAroundRatio = math.Log(aroundRatio)

func newAround(centre Vec, bearingDeg, levelM float64, patches []patch, sh *shields) *around {
	raw := make([]float64, aroundBearings*aroundRadii)
	for b := range aroundBearings {
		dir := direction(bearingDeg+float64(b)*360/aroundBearings, 0)
		r := aroundFirstM
		for k := range aroundRadii {
			q := centre.plus(dir.times(r))
			q.Z = levelM
			raw[b*aroundRadii+k] = math.Log(max(1e-30, patchesRate(patches, q, sh)*r*r))
			r *= aroundRatio
		}
	}
	a := &around{centre: centre, bearingDeg: bearingDeg, lnR2H: make([]float64, len(raw))}
	for b := range aroundBearings {
		for k := aroundRadii - 1; k >= 0; k-- {
			m := math.Inf(-1)
			for _, db := range []int{aroundBearings - 1, 0, 1} {
				for dk := max(0, k-1); dk <= min(aroundRadii-1, k+1); dk++ {
					m = max(m, raw[(b+db)%aroundBearings*aroundRadii+dk])
				}
			}
			if k < aroundRadii-1 { // never less than farther out
				m = max(m, a.lnR2H[b*aroundRadii+k+1]-2*lnAroundRatio)
			}
			a.lnR2H[b*aroundRadii+k] = m
		}
	}
	return a
}

func patchesRate(patches []patch, q Vec, sh *shields) float64 {
	var sum float64
	for i := range patches {
		p := &patches[i]
		if h := p.rate(q); h > 0 {
			if len(sh.legs) > 0 {
				h *= sh.pass(p.at, q, ofBeam)
			}
			sum += h
		}
	}
	return sum
}

func (a *around) rate(q Vec) float64 {
	dx, dy := q.X-a.centre.X, q.Y-a.centre.Y
	r2 := max(dx*dx+dy*dy, aroundFirstM*aroundFirstM)
	k := min(math.Log(r2/(aroundFirstM*aroundFirstM))/(2*lnAroundRatio), aroundRadii-1)
	b := (math.Atan2(dx, dy)*180/math.Pi - a.bearingDeg) / 360
	b = (b - math.Floor(b)) * aroundBearings
	k0, b0 := min(int(k), aroundRadii-2), int(b)%aroundBearings
	b1 := (b0 + 1) % aroundBearings
	fk, fb := k-float64(k0), b-math.Floor(b)
	row0, row1 := a.lnR2H[b0*aroundRadii+k0:], a.lnR2H[b1*aroundRadii+k0:]
	ln := (row0[0]*(1-fk)+row0[1]*fk)*(1-fb) + (row1[0]*(1-fk)+row1[1]*fk)*fb
	return math.Exp(ln) / r2
}
