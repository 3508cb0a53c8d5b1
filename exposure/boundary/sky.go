package boundary

import (
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/materials"
)

// Air that scatters is dense and cold, air that absorbs thin and hot: both err
// outward.
const (
	skyScattersKgPerM3 = 1.3
	skyAbsorbsKgPerM3  = 0.9
	electronsPerKg     = 0.49919 * 6.02214076e26 // dry air, Z/A of NIST
	electronRadiusM    = 2.8179403e-15
)

// sky is the air scatter of a beam by the angle between its axis and the way
// to the point, and by distance: H = k / distance.
//
// Single Compton scattering, in closed form along each ray: a ray at phi to
// the way of length d brings n / (d sin phi) times the integral of dsigma/dOmega
// from phi to 180 deg. Of what the air takes on the way, only what it absorbs
// (mu_en) is taken off, over the straight way, which is shorter than the
// photon's: what it scatters again is counted as if it went on. Walls take
// nothing off. What of a cone points down is counted as if there were no
// ground; of a source bare all round one half is.
type sky struct {
	k    [len(skyNodesM)][skyAngles]float64 // uSv/h m
	fine [len(skyNodesM)][angles]float64
}

// Nodes; between them it is straight, above the true, sagging curve of the
// distance.
var skyNodesM = [...]float64{0, 8, 32, 64, 128, 256, 512, 1024, 1e5}

const (
	skyStepDeg = 3
	skyAngles  = 180/skyStepDeg + 1
	skyRings   = 8
	skySpokes  = 16
)

func newSky(s beam.Spectrum, halfDeg, scale float64) *sky {
	t := skyTails(s, scale)
	out := &sky{}
	for a := range skyAngles {
		if halfDeg < 90 {
			t.overCone(out, a, halfDeg)
			continue
		}
		for d := range skyNodesM {
			for i := range skyAngles - 1 { // 2 pi over the sphere, one half of it
				out.k[d][a] += math.Pi * (t[d][i] + t[d][i+1]) / 2 * skyStepDeg * math.Pi / 180
			}
		}
	}
	return out.refine()
}

// rate gives uSv/h at the cosine of an angle from the axis and a distance.
func (s *sky) rate(cos, m float64) float64 {
	d := 0
	for d < len(skyNodesM)-2 && m > skyNodesM[d+1] {
		d++
	}
	t := min(1, (m-skyNodesM[d])/(skyNodesM[d+1]-skyNodesM[d]))
	x := math.Sqrt(max(0, 1-cos)/2) * (angles - 1)
	i := min(int(x), angles-2)
	x -= float64(i)
	lo, hi := &s.fine[d], &s.fine[d+1]
	return ((lo[i]*(1-x)+lo[i+1]*x)*(1-t) + (hi[i]*(1-x)+hi[i+1]*x)*t) / m
}

// refine tables k by the nodes that rate reads.
func (s *sky) refine() *sky {
	for d := range s.k {
		for i := range angles {
			x := nodeDeg(i) / skyStepDeg
			a := min(int(x), skyAngles-2)
			s.fine[d][i] = s.k[d][a] + (s.k[d][a+1]-s.k[d][a])*(x-float64(a))
		}
	}
	return s
}

// skyTailTable is n times the integral of dsigma/dOmega H*(10)(E') from phi to
// 180 deg over the spectrum, by distance and angle.
type skyTailTable [len(skyNodesM)][skyAngles]float64

// overCone sums tail(phi)/sin(phi) over the cone's solid angle.
func (t *skyTailTable) overCone(out *sky, a int, halfDeg float64) {
	c, s := cosDeg(float64(a*skyStepDeg)), sinDeg(float64(a*skyStepDeg))
	for ring := range skyRings {
		lo, hi := float64(ring)/skyRings*halfDeg, float64(ring+1)/skyRings*halfDeg
		polar := (lo + hi) / 2
		omega := 2 * math.Pi * (cosDeg(lo) - cosDeg(hi)) / skySpokes
		for spoke := range skySpokes {
			az := (float64(spoke) + 0.5) * 360 / skySpokes
			cos := c*cosDeg(polar) + s*sinDeg(polar)*cosDeg(az)
			phi := acosDeg(cos)
			w := omega / max(math.Sqrt(max(0, 1-cos*cos)), sinDeg(0.5))
			x := phi / skyStepDeg
			i := min(int(x), skyAngles-2)
			x -= float64(i)
			for d := range t {
				out.k[d][a] += w * (t[d][i]*(1-x) + t[d][i+1]*x)
			}
		}
	}
}

func skyTails(s beam.Spectrum, scale float64) *skyTailTable {
	t := &skyTailTable{}
	keV, perCM2 := grouped(s)
	for g, e := range keV {
		var at, tail [skyAngles]float64
		for i := range at {
			sigma, out := kleinNishina(e, cosDeg(float64(i*skyStepDeg)))
			at[i] = skyScattersKgPerM3 * electronsPerKg * sigma * ambientPerFluence(out) * perCM2[g] * scale
		}
		for i := skyAngles - 2; i >= 0; i-- {
			tail[i] = tail[i+1] + (at[i]+at[i+1])/2*skyStepDeg*math.Pi/180
		}
		perM := materials.MuEnRhoAir(e) * skyAbsorbsKgPerM3 / 10 // cm2/g times kg/m3 is 0.1/m
		for d, m := range skyNodesM {
			left := math.Exp(-perM * m)
			for i := range tail {
				t[d][i] += tail[i] * left
			}
		}
	}
	return t
}

// kleinNishina gives the cross section of an electron in m2/sr and the energy
// of the scattered photon.
func kleinNishina(keV, cos float64) (m2PerSr, outKeV float64) {
	p := 1 / (1 + keV/510.99895*(1-cos))
	return electronRadiusM * electronRadiusM / 2 * p * p * (p + 1/p - (1 - cos*cos)), keV * p
}
