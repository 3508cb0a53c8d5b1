package photon

import (
	"math"
	"math/rand/v2"
)

// random draws the numbers of one batch.
type random struct{ rand.PCG }

func newRandom(seed, stream uint64) *random {
	r := &random{}
	r.Seed(seed, stream)
	return r
}

// unit draws from the open interval 0 to 1.
func (r *random) unit() float64 {
	return (float64(r.Uint64()>>11) + 0.5) * (1.0 / (1 << 53))
}

// cosAzimuth draws the cosine of an angle uniform on the circle.
func (r *random) cosAzimuth() float64 {
	for {
		x, y := 2*r.unit()-1, 2*r.unit()-1
		xx, yy := x*x, y*y
		if s := xx + yy; s <= 1 && s > 1e-12 {
			return (xx - yy) / s
		}
	}
}

// turn gives the cosine against the axis after a deflection by the angle
// whose cosine is c, at a random azimuth.
func (r *random) turn(u, c float64) float64 {
	s2 := (1 - u*u) * (1 - c*c)
	if s2 <= 0 {
		return u * c
	}
	v := u*c + math.Sqrt(s2)*r.cosAzimuth()
	return max(-1, min(1, v))
}

// compton draws energy and cosine after scattering from an electron at rest
// whose binding takes away small angles by v/(v+bound), see boundShape.
func (r *random) compton(e, bound float64) (after, c float64) {
	for {
		after, c = r.kleinNishina(e)
		if bound == 0 {
			return after, c
		}
		v := math.Sqrt(max(0, (1-c)/2))
		v *= math.Sqrt(v)
		if r.unit()*(v+bound) <= v {
			return after, c
		}
	}
}

// kleinNishina draws from the law of Klein and Nishina by Kahn's rejection.
func (r *random) kleinNishina(e float64) (after, c float64) {
	a := e / electronKeV
	b := 1 + 2*a
	for {
		x, y, z := r.unit(), r.unit(), r.unit()
		if x*(b+8) <= b {
			eta := 1 + 2*a*y
			if z <= 4*(1/eta-1/(eta*eta)) {
				return e / eta, 1 - (eta-1)/a
			}
			continue
		}
		eta := b / (1 + 2*a*y)
		c := 1 - (eta-1)/a
		if 2*z <= c*c+1/eta {
			return e / eta, c
		}
	}
}

// coherent draws the cosine of a coherent deflection of shape q.
func (r *random) coherent(q float64) float64 {
	for {
		u := math.Expm1(r.unit()*math.Log1p(q)) / q
		c := 1 - 2*u
		if 2*r.unit() <= 1+c*c {
			return c
		}
	}
}

// fluorescent draws the energy of a K photon made by absorption at e.
func (med *Medium) fluorescent(r *random, e float64) float64 {
	f := &med.lines[0]
	if len(med.lines) > 1 {
		f = med.emitter(r, e)
	}
	x := r.unit()
	for i, up := range f.upTo {
		if x <= up {
			return f.keV[i]
		}
	}
	return f.keV[len(f.keV)-1]
}

func (med *Medium) emitter(r *random, e float64) *fluorescer {
	var sum float64
	for i := range med.lines {
		sum += med.lines[i].perGram(e)
	}
	x := r.unit() * sum
	for i := range med.lines {
		if x -= med.lines[i].perGram(e); x <= 0 {
			return &med.lines[i]
		}
	}
	return &med.lines[0]
}

// collide draws what a photon of energy e and cosine u becomes; its weight has
// already been multiplied by the cell's live share.
func (med *Medium) collide(r *random, c *cell, t, e, u float64) (after, cos float64) {
	x := r.unit() - (c.inc + t*c.dinc)
	if x < 0 {
		after, d := r.compton(e, c.bound+t*c.dbound)
		return after, r.turn(u, d)
	}
	if x -= c.coh + t*c.dcoh; x < 0 {
		return e, r.turn(u, r.coherent(c.shape+t*c.dshape))
	}
	if x -= c.pair + t*c.dpair; x < 0 || len(med.lines) == 0 {
		if c.pair+t*c.dpair > 0 {
			return electronKeV, 2*r.unit() - 1
		}
		after, d := r.compton(e, c.bound+t*c.dbound) // rounding of the shares only
		return after, r.turn(u, d)
	}
	return med.fluorescent(r, e), 2*r.unit() - 1
}
