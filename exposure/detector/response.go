package detector

import (
	"math"
	"sync"

	"gonum.org/v1/gonum/integrate/quad"

	"halfvalue/materials"
)

// The film that Response means: an industrial double-coated film. Each side is
// coated with NIST's photographic emulsion of 8 g/m2 silver, on a polyester
// base of 0.175 mm and under 1.3 um of bare gelatin (usual for the trade, from
// memory: 7 to 12 g/m2 a side, 0.175 mm, 1 to 1.5 um). Between those, 7 was chosen with the published effect of lead screens in
// sight (US T.O. 33B-1-1); the shape of the response with screens hardly
// depends on it, the speed not at all.
const (
	coatingGPerCM2 = 7e-4 / 0.474
	baseGPerCM2    = 0.0175 * 1.38
	coverGPerCM2   = 1.3e-4 * 1.3
	leadDensity    = 11.35 // g/cm3, NIST
)

// medium is a substance as electrons see it.
type medium struct {
	material   *materials.Material
	zOverA     float64
	excitation float64 // mean excitation energy, keV, ICRU 37
	elements   []shell
}

// shell is an element's share of a medium.
type shell struct {
	mass    float64
	element materials.Element
	alone   *materials.Material
}

func newMedium(name string, excitationKeV float64) *medium {
	m, err := materials.Lookup(name)
	if err != nil {
		panic("detector: " + err.Error())
	}
	d := &medium{material: m, excitation: excitationKeV}
	for _, f := range m.Fractions() {
		e, err := materials.ElementByZ(f.Z)
		if err != nil {
			panic("detector: " + err.Error())
		}
		alone, err := materials.Lookup(e.Symbol)
		if err != nil {
			panic("detector: " + err.Error())
		}
		d.zOverA += f.Mass * float64(f.Z) / e.AtomicWeight
		d.elements = append(d.elements, shell{f.Mass, e, alone})
	}
	return d
}

// media are the three that matter; mean excitation energies of ICRU 37.
var media = sync.OnceValue(func() (m struct{ emulsion, base, lead *medium }) {
	m.emulsion = newMedium("agbr-emulsion", 0.331)
	m.base = newMedium("polyester", 0.0787)
	m.lead = newMedium("Pb", 0.823)
	return m
})

// release is energy given to electrons of one kind in one interaction.
type release struct {
	electronKeV float64 // energy of such an electron
	cm2KeVPerG  float64 // energy given to them per photon/cm2
}

// releases lists the electrons that photons of keV set free in a gram of d.
// Fluorescence leaves: a coating and a screen's skin are thin for it. What is
// left of a shell's energy stays where it is (electron energy 0).
func (d *medium) releases(keV float64) []release {
	var out []release
	var local float64
	for _, s := range d.elements {
		photo := s.mass * s.alone.MuRhoOf(materials.Photoelectric, keV)
		e := s.element
		if keV > e.KEdgeKeV && e.KShare > 0 {
			k := photo * e.KShare
			out = append(out, release{keV - e.KEdgeKeV, k * (keV - e.KEdgeKeV)})
			var line float64
			for _, l := range e.KLines {
				line += l.Share * l.KeV
			}
			local += k * (e.KEdgeKeV - e.KYield*line)
			photo -= k
		}
		bound := min(e.LEdgesKeV[2], keV)
		out = append(out, release{keV - bound, photo * (keV - bound)})
		local += photo * bound
	}
	t := comptonKeV(keV)
	out = append(out, release{t, d.material.MuRhoOf(materials.Incoherent, keV) * t})
	if pair := d.material.MuRhoOf(materials.PairNuclear, keV) + d.material.MuRhoOf(materials.PairElectron, keV); pair > 0 {
		t := keV - 2*electronKeV
		out = append(out, release{t / 2, pair * t})
	}
	return append(out, release{0, local})
}

// own is the dose in the emulsion from its own electrons that stay in it.
func own(keV float64) float64 {
	g := 2 * coatingGPerCM2
	var sum float64
	for _, r := range media().emulsion.releases(keV) {
		if r.electronKeV <= 0 {
			sum += r.cm2KeVPerG
			continue
		}
		sum += r.cm2KeVPerG * (1 - cavityWeight(r.electronKeV, g))
	}
	return sum
}

// fromWall is the dose in the emulsion were it wrapped in a thick wall of d,
// from the wall's electrons; share is what of electrons of an energy gets there.
func fromWall(d *medium, keV float64, share func(electronKeV float64) float64) float64 {
	g, em := 2*coatingGPerCM2, media().emulsion
	var sum float64
	for _, r := range d.releases(keV) {
		if r.electronKeV <= 0 {
			continue
		}
		ratio := stopping(r.electronKeV, em.zOverA, em.excitation) / stopping(r.electronKeV, d.zOverA, d.excitation)
		sum += r.cm2KeVPerG * cavityWeight(r.electronKeV, g) * ratio * share(r.electronKeV)
	}
	return sum
}

// curve is a function of energy made ready on a fine logarithmic grid between
// the edges of what it is made of.
type curve struct{ value []float64 }

// Range of the response and its grid: steps of 0.5 % in energy.
const (
	FirstKeV = 3
	LastKeV  = 3000
	gridStep = 0.005
)

func newCurve(f func(keV float64) float64) curve {
	n := int(math.Ceil(math.Log(LastKeV/FirstKeV)/gridStep)) + 2
	c := curve{make([]float64, n)}
	for i := range c.value {
		c.value[i] = f(min(FirstKeV*math.Exp(float64(i)*gridStep), materials.LastKeV))
	}
	return c
}

func (c curve) at(keV float64) float64 {
	x := math.Log(keV/FirstKeV) / gridStep
	x = min(max(x, 0), float64(len(c.value)-2))
	i := int(x)
	return c.value[i] + (x-float64(i))*(c.value[i+1]-c.value[i])
}

// across gives the share of the electrons of a wall that cross a layer to the
// coating: Burlin's exponential along every slant way of an isotropic stream,
// 2 E3(beta x).
func across(gPerCM2 float64) func(electronKeV float64) float64 {
	return func(electronKeV float64) float64 {
		x := gPerCM2 * math.Log(100) / rangeGPerCM2(electronKeV)
		return quad.Fixed(func(mu float64) float64 { return 2 * mu * math.Exp(-x/mu) }, 0, 1, 40, quad.Legendre{}, 0)
	}
}

// A screen's electrons cross the gelatin over the coating; the other screen's
// cross that, the other coating and the base.
var (
	fromNear = across(coverGPerCM2)
	fromFar  = across(coverGPerCM2 + coatingGPerCM2 + baseGPerCM2)
)

// The parts of the response, made on first use: the coating's own electrons,
// and those of a wall of base or lead beside it or across the base.
var (
	ownCurve  = sync.OnceValue(func() curve { return newCurve(own) })
	baseCurve = sync.OnceValue(func() curve {
		return newCurve(func(e float64) float64 { return fromWall(media().base, e, func(float64) float64 { return 1 }) })
	})
	leadCurve    = sync.OnceValue(func() curve { return newCurve(func(e float64) float64 { return fromWall(media().lead, e, fromNear) }) })
	farBaseCurve = sync.OnceValue(func() curve {
		return newCurve(func(e float64) float64 { return fromWall(media().base, e, fromFar) })
	})
	farLeadCurve = sync.OnceValue(func() curve {
		return newCurve(func(e float64) float64 { return fromWall(media().lead, e, fromFar) })
	})
)

// Response gives how a film answers to one photon per cm2 of keV that falls on
// the cassette, in nGy of dose in the emulsion. Screens are lead, mm, front and
// back; 0 is none, then paper touches the coating. Each coating sees electrons
// of its screen on one side, and on the other those of the base and those of the
// other screen that cross it.
//
// The front screen weakens the photons, exponentially along the normal; lead's
// own fluorescence and the photons that the back screen sends back are left
// out. Range 3 to 3000 keV; outside the value of the end stands.
func Response(keV float64, screensMM [2]float64) float64 {
	return NewScreens(screensMM).Response(keV)
}

// Screens are a pair of lead screens ready for many energies.
type Screens struct {
	frontMM float64
	dose    curve // keV/g in the coating per photon/cm2 that reaches it
}

// electronKeVOfScreens is where a thin screen's growth is taken: electrons of
// 200 keV, whose range in lead is 0.04 mm by Katz and Penfold; foils from
// 0.02 mm on give more than nine tenths of what a thick one does.
const electronKeVOfScreens = 200

// NewScreens takes thicknesses in mm, front and back, 0 for none.
func NewScreens(mm [2]float64) Screens {
	var grown float64
	for _, t := range mm {
		grown -= math.Expm1(-t / 10 * leadDensity * math.Log(100) / rangeGPerCM2(electronKeVOfScreens))
	}
	own, base, far, lead, farLead := ownCurve().value, baseCurve().value, farBaseCurve().value, leadCurve().value, farLeadCurve().value
	dose := make([]float64, len(own))
	for i := range dose {
		dose[i] = own[i] + (base[i]-far[i])/2
		dose[i] += (grown*lead[i] + (2-grown)*base[i]) / 4
		dose[i] += (grown*farLead[i] + (2-grown)*far[i]) / 4
	}
	return Screens{mm[0], curve{dose}}
}

// Response is the package's Response with these screens.
func (s Screens) Response(keV float64) float64 {
	const nGyPerKeVPerG = 1.602176634e-4 // 1 keV/g in nGy
	dose := s.dose.at(keV) * nGyPerKeVPerG
	if s.frontMM > 0 {
		dose *= math.Exp(-media().lead.material.MuPerMM(min(max(keV, FirstKeV), LastKeV)) * s.frontMM)
	}
	return dose
}
