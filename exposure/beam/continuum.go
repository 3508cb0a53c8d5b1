package beam

import (
	"fmt"
	"math"

	"halfvalue/exposure/beam/internal/electron"
)

// Continuum is a published way to the bremsstrahlung of a tube.
type Continuum int

// The models. ThickTarget is the engine's; the others are kept to be compared.
const (
	ThickTarget         Continuum = iota // slowing down, cross section and self-absorption from first principles
	Ebel                                 // Ebel 1999, X-Ray Spectrometry 28, 255
	FinkelshteinPavlova                  // Finkelshtein and Pavlova 1999, X-Ray Spectrometry 28, 27
)

// String gives the model's name.
func (c Continuum) String() string {
	switch c {
	case ThickTarget:
		return "thick target"
	case Ebel:
		return "Ebel 1999"
	case FinkelshteinPavlova:
		return "Finkelshtein and Pavlova 1999"
	}
	return fmt.Sprintf("Continuum(%d)", int(c))
}

// Scale gives the one constant of the model that is fitted to published
// outputs; see Residuals for what is left.
func (c Continuum) Scale() float64 {
	return [...]float64{ThickTarget: thickScale, Ebel: ebelScale, FinkelshteinPavlova: finkelshteinScale}[c]
}

// perSteradian turns photons per electron in all directions into photons per
// mA s and cm2 at 1 m.
const perSteradian = electron.PerMAs / (4 * math.Pi) / 1e4

// roughnessCM is the mean extra depth of tungsten that a photon starts under
// because the surface is no mirror: electrons fall into valleys, photons leave
// through hills. 1 um is a fine ground, little used anode (common practice;
// used ones 2 to 10 um). The depth is taken as exponentially distributed.
const roughnessCM = 1e-4

// fill writes what t generates at kV into gen, photons per keV and unit of
// strength as if nothing were absorbed, and the share of it that leaves the
// anode into out, at the energies keV; both are 0 from kV on.
func (c Continuum) fill(t *target, kV, anodeDeg float64, b *bins) {
	for i, e := range b.keV {
		b.gen[i], b.out[i] = 0, 0
		if e >= kV {
			continue
		}
		switch c {
		case Ebel:
			b.gen[i], b.out[i] = t.ebel(kV, takeOff(anodeDeg), e, b.photo[i])
		case FinkelshteinPavlova:
			b.gen[i], b.out[i] = t.finkelshtein(kV, takeOff(anodeDeg), e, b.mu[i])
		}
	}
	if c == ThickTarget {
		t.fillThick(kV, anodeDeg, b)
	}
}

// fillThick is fill for ThickTarget.
func (t *target) fillThick(kV, anodeDeg float64, b *bins) {
	var yield, depth, form [shareNodes]float64
	x := math.Log(kV)
	t.thick.yield.row(x, yield[:])
	t.thick.depth.row(x, depth[:])
	t.thick.form.row(x, form[:])
	reach := math.Exp(t.thick.reach.at(x, 0))
	sine := takeOff(anodeDeg)
	rough := roughnessCM * t.metal.DensityGPerCM3()
	for i, e := range b.keV {
		if e >= kV {
			continue
		}
		j, w := lagrange((math.Sqrt(e/kV)-leastRoot)/t.thick.yield.dy, shareNodes)
		read := func(v *[shareNodes]float64) float64 {
			return w[0]*v[j] + w[1]*v[j+1] + w[2]*v[j+2] + w[3]*v[j+3]
		}
		q := b.mu[i] / sine
		m := read(&form)
		b.gen[i] = thickScale * perSteradian * math.Exp(read(&yield)) * (kV - e) / (e * e)
		b.out[i] = math.Exp(-m*math.Log1p(q*read(&depth)*reach/m)) / (1 + q*rough)
	}
}

// thickScale is the one fitted constant of ThickTarget; see the package.
const thickScale = 0.742
