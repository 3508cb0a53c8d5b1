package electron

import (
	"math"
	"math/rand/v2"
)

// Slowing is what a walk finds, by the electron's energy as a share u of the
// energy with which it came: bin i holds u from i/n to (i+1)/n.
type Slowing struct {
	Track   []float64 // path inside the target against that of an electron that never leaves, 0 to 1
	Depth   []float64 // mean depth of that path below the surface, in ranges of the first energy
	Doppler []float64 // mean of the Doppler factor towards the beam against its mean over all directions
	Back    float64   // share of the electrons that leave through the surface
}

// Walk shoots n electrons of keV into a half space at tiltDeg from the normal
// and follows each collision with a nucleus: Rutherford scattering with
// Moliere's screening angle, corrected for spin as by McKinley and Feshbach
// (1948), Z(Z+1) for the electrons' part; between collisions the electron
// slows down continuously by Stopping. The beam that counts for Doppler leaves
// at right angles to the electrons, tiltDeg above the surface. The seed fixes
// the answer.
func (m Matter) Walk(keV, tiltDeg float64, n, bins int, seed uint64) Slowing {
	w := walk{Matter: m, keV: keV, rangeGPerCM2: m.Range(keV), rnd: rand.New(rand.NewPCG(seed, uint64(m.Z))),
		track: make([]float64, bins), depth: make([]float64, bins), doppler: make([]float64, bins)}
	s, c := math.Sincos(tiltDeg * math.Pi / 180)
	back := 0
	for range n {
		if w.one(vector{s, 0, c}, vector{c, 0, -s}) {
			back++
		}
	}
	out := Slowing{Back: float64(back) / float64(n)}
	for i := range bins {
		width := keV / float64(bins)
		if i == 0 {
			width *= 1 - restShare
		}
		out.Track = append(out.Track, w.track[i]/width/float64(n))
		out.Depth = append(out.Depth, w.depth[i]/w.track[i])
		out.Doppler = append(out.Doppler, w.doppler[i]/w.track[i])
	}
	return out
}

type vector struct{ x, y, z float64 }

type walk struct {
	Matter
	keV, rangeGPerCM2     float64
	rnd                   *rand.Rand
	track, depth, doppler []float64
}

// restShare is the share of the lowest bin at which a walk ends.
const restShare = 0.4

// one follows an electron until it leaves, which it reports, or comes to rest.
func (w *walk) one(dir, beam vector) (left bool) {
	rest := w.keV * restShare / float64(len(w.track))
	keV, z := w.keV, 0.0
	for keV > rest {
		p := Momentum(keV)
		b := Beta(keV)
		eta := w.screening(p, b)
		spin := math.Pi * float64(w.Z) * FineStructure * b
		most := 1 + spin/4
		path := w.meanPath(p, b, eta) / most * -math.Log(1-w.rnd.Float64())
		stop := w.Stopping(keV)
		longest := 0.02 * keV / stop // a free path has no memory, so it may be cut
		collides := path < longest
		path = min(path, longest)
		loss := stop * path
		if loss > keV-rest {
			loss = keV - rest
			path = loss / stop
		}
		next := z + dir.z*path
		if next < 0 {
			return true
		}
		w.score(keV-loss/2, loss, (z+next)/2, b, dir.x*beam.x+dir.z*beam.z)
		z, keV = next, keV-loss
		if collides {
			x := w.rnd.Float64()
			half := eta * x / (1 + eta - x) // sin^2 of half the angle
			s := math.Sqrt(half)
			if w.rnd.Float64()*most < 1-b*b*half+spin*s*(1-s) {
				dir = dir.turned(1-2*half, 2*math.Pi*w.rnd.Float64())
			}
		}
	}
	return false
}

// screening is Moliere's screening parameter.
func (w *walk) screening(p, b float64) float64 {
	chi := math.Cbrt(float64(w.Z)) * FineStructure / 0.885 / p
	zb := float64(w.Z) * FineStructure / b
	return chi * chi / 4 * (1.13 + 3.76*zb*zb)
}

// meanPath is the mean free path between collisions, g/cm2.
func (w *walk) meanPath(p, b, eta float64) float64 {
	z := float64(w.Z)
	sigma := math.Pi * RadiusCM * RadiusCM * z * (z + 1) / (p * p * b * b) / (eta * (1 + eta))
	return w.A / Avogadro / sigma
}

func (w *walk) score(keV, loss, depth, b, cosine float64) {
	i := min(int(keV/w.keV*float64(len(w.track))), len(w.track)-1)
	w.track[i] += loss
	w.depth[i] += loss * depth / w.rangeGPerCM2
	mean := math.Log((1+b)/(1-b)) / (2 * b)
	w.doppler[i] += loss / (1 - b*cosine) / mean
}

// turned gives v turned by an angle of the given cosine, at azimuth phi.
func (v vector) turned(cosine, phi float64) vector {
	s := math.Sqrt(max(0, 1-cosine*cosine))
	sp, cp := math.Sincos(phi)
	if q := math.Sqrt(v.x*v.x + v.y*v.y); q > 1e-6 {
		v = vector{
			v.x*cosine + s*(v.x*v.z*cp-v.y*sp)/q,
			v.y*cosine + s*(v.y*v.z*cp+v.x*sp)/q,
			v.z*cosine - s*q*cp,
		}
	} else {
		v = vector{s * cp, s * sp, math.Copysign(cosine, cosine*v.z)}
	}
	n := 1 / math.Sqrt(v.x*v.x+v.y*v.y+v.z*v.z)
	return vector{v.x * n, v.y * n, v.z * n}
}
