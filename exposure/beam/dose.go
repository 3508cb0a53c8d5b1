package beam

import (
	"math"
	"sync"

	"halfvalue/materials"
)

// mGyPerKeVPerG turns an energy per mass from keV/g to mGy.
const mGyPerKeVPerG = 1.602176634e-10

// KermaPerFluence gives the air kerma in mGy per photon per cm2 at keV: energy
// times the mass energy-absorption coefficient of dry air. The energy that the
// secondary electrons radiate again, 0.3 % at 1 MeV, is left out.
func KermaPerFluence(keV float64) float64 {
	return keV * materials.MuEnRhoAir(keV) * mGyPerKeVPerG
}

// ambient is H*(10) per air kerma, Sv/Gy, of ICRP 74 / ICRU 57 by keV.
var ambient = [...][2]float64{
	{10, 0.008}, {15, 0.26}, {20, 0.61}, {30, 1.10}, {40, 1.47}, {50, 1.67}, {60, 1.74}, {80, 1.72}, {100, 1.65},
	{150, 1.49}, {200, 1.40}, {300, 1.31}, {400, 1.26}, {500, 1.23}, {600, 1.21}, {800, 1.19}, {1000, 1.17},
	{1500, 1.15}, {2000, 1.13}, {3000, 1.12},
}

// AmbientPerKerma gives the ambient dose equivalent H*(10) per air kerma in
// Sv/Gy. Between the nodes of ICRP 74 (10 keV to 3 MeV) it is a monotone cubic
// (Fritsch and Butland) of the logarithm in the logarithm of energy, within
// 2 % of ICRU's fitted formula from 20 keV. Outside it keeps the value of
// the last node, which errs outward below 10 keV and by under 2 % to 10 MeV.
func AmbientPerKerma(keV float64) float64 { return ambientCurve().at(keV) }

// curve is a monotone cubic in the logarithms of both coordinates.
type curve struct{ x, y, slope []float64 }

var ambientCurve = sync.OnceValue(func() *curve {
	var x, y []float64
	for _, p := range ambient {
		x, y = append(x, p[0]), append(y, p[1])
	}
	return newCurve(x, y)
})

// newCurve takes rising positive x and positive y.
func newCurve(x, y []float64) *curve {
	n := len(x)
	c := &curve{make([]float64, n), make([]float64, n), make([]float64, n)}
	for i := range n {
		c.x[i], c.y[i] = math.Log(x[i]), math.Log(y[i])
	}
	secant := func(i int) float64 { return (c.y[i+1] - c.y[i]) / (c.x[i+1] - c.x[i]) }
	for i := 1; i < n-1; i++ {
		a, b := secant(i-1), secant(i)
		if a*b > 0 {
			h, k := c.x[i]-c.x[i-1], c.x[i+1]-c.x[i]
			w1, w2 := 2*k+h, k+2*h
			c.slope[i] = (w1 + w2) / (w1/a + w2/b)
		}
	}
	c.slope[0], c.slope[n-1] = secant(0), secant(n-2)
	return c
}

// at gives the value at x, that of the nearest end outside the nodes.
func (c *curve) at(x float64) float64 {
	l := math.Log(x)
	n := len(c.x)
	switch {
	case !(l > c.x[0]):
		return math.Exp(c.y[0])
	case l >= c.x[n-1]:
		return math.Exp(c.y[n-1])
	}
	i := 0
	for l >= c.x[i+1] {
		i++
	}
	h := c.x[i+1] - c.x[i]
	t := (l - c.x[i]) / h
	u := 1 - t
	return math.Exp(u*u*((1+2*t)*c.y[i]+t*h*c.slope[i]) + t*t*((3-2*t)*c.y[i+1]-u*h*c.slope[i+1]))
}

// dryAir is the catalogue's dry air.
var dryAir = sync.OnceValue(func() *materials.Material { return must(materials.Lookup("air")) })

func must(m *materials.Material, err error) *materials.Material {
	if err != nil {
		panic("beam: " + err.Error())
	}
	return m
}
