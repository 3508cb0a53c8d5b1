package detector

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"sync"
)

//go:embed data/films.json
var filmsJSON []byte

// Film is a film system of an ISO 11699-1 class with its density curve,
//
//	D = B + Dm (1 - exp(-(X/k)^p)),
//
// X the dose that it answers to (mGy in the beam of ISO 7004), B base and fog.
// Dm and p follow from the class's gradients at densities 2 and 4 above B, k
// from Ks. The curve rises strictly and saturates at B + Dm.
type Film struct {
	Class       string  `json:"class"`
	KsMGy       float64 `json:"ksMGy"`       // dose for density 2 above base and fog, ISO 7004
	G2          float64 `json:"g2"`          // gradient dD/dlog10(X) at density 2 above base and fog
	G4          float64 `json:"g4"`          // the same at density 4
	Granularity float64 `json:"granularity"` // ceiling of the class at density 2
	BaseAndFog  float64 `json:"-"`
	Source      string  `json:"-"`
	Confidence  string  `json:"-"`

	dm, p, k float64
}

type filmFile struct {
	Source     string  `json:"source"`
	Confidence string  `json:"confidence"`
	BaseAndFog float64 `json:"baseAndFog"`
	Films      []Film  `json:"films"`
}

var films = sync.OnceValue(func() []Film {
	var f filmFile
	if err := json.Unmarshal(filmsJSON, &f); err != nil {
		panic("detector: data/films.json: " + err.Error())
	}
	for i := range f.Films {
		film := &f.Films[i]
		film.BaseAndFog, film.Source, film.Confidence = f.BaseAndFog, f.Source, f.Confidence
		film.shape()
	}
	return f.Films
})

// Films gives the classes from the finest to the fastest.
func Films() []Film { return append([]Film(nil), films()...) }

// FilmByClass gives the film of class C1 to C6.
func FilmByClass(class string) (Film, error) {
	var known []string
	for _, f := range films() {
		if f.Class == class {
			return f, nil
		}
		known = append(known, f.Class)
	}
	return Film{}, fmt.Errorf("film class %q is unknown: take one of %s", class, strings.Join(known, ", "))
}

// Range of G4/G2 that the curve can take: below, it would saturate short of
// density 4; at 2 it would never saturate.
const (
	LeastG4ByG2 = 0.5
	MostG4ByG2  = 1.98
)

// With gives the film with a make's own figures; 0 keeps what it has. false
// where no curve has such gradients.
func (f Film) With(ksMGy, g2, g4, baseAndFog float64) (Film, bool) {
	for _, v := range []struct {
		to    *float64
		value float64
	}{{&f.KsMGy, ksMGy}, {&f.G2, g2}, {&f.G4, g4}, {&f.BaseAndFog, baseAndFog}} {
		if v.value != 0 {
			*v.to = v.value
		}
	}
	if f.G4 < LeastG4ByG2*f.G2 || f.G4 > MostG4ByG2*f.G2 {
		return f, false
	}
	f.Source, f.Confidence = "the make's own data, from the plan; what it leaves out is the class's", "as good as the data sheet"
	f.shape()
	return f, true
}

// shape solves the curve from Ks and the two gradients: with x = -ln(1-D/Dm)
// the gradient is ln(10) p x (Dm-D), whose ratio at 4 and 2 fixes Dm.
func (f *Film) shape() {
	slope := func(dm, d float64) float64 { return -math.Log(1-d/dm) * (dm - d) }
	lo, hi := 4.2, 1000.0
	for range 200 {
		mid := (lo + hi) / 2
		if slope(mid, 4)/slope(mid, 2) < f.G4/f.G2 {
			lo = mid
		} else {
			hi = mid
		}
	}
	f.dm = (lo + hi) / 2
	f.p = f.G2 / (math.Ln10 * slope(f.dm, 2))
	f.k = f.KsMGy / math.Pow(-math.Log(1-2/f.dm), 1/f.p)
}

// Density gives the optical density, base and fog included, for a dose of
// xMGy >= 0.
func (f Film) Density(xMGy float64) float64 {
	return f.BaseAndFog + f.dm*-math.Expm1(-math.Pow(xMGy/f.k, f.p))
}

// DoseMGy gives the dose for an optical density, base and fog included: the
// inverse of Density. It errs on densities that the film cannot reach.
func (f Film) DoseMGy(density float64) (float64, error) {
	net := density - f.BaseAndFog
	if !(net > 0 && net < 0.98*f.dm) {
		return 0, fmt.Errorf("density \"%g\" is outside %.2f to %.2f of film class %s", density, f.BaseAndFog, f.MostDensity(), f.Class)
	}
	return f.k * math.Pow(-math.Log1p(-net/f.dm), 1/f.p), nil
}

// MostDensity is the density that 98 % of the silver gives; beyond it the curve
// is too flat to expose by.
func (f Film) MostDensity() float64 { return f.BaseAndFog + 0.98*f.dm }

// Gradient gives dD/dlog10(X) at an optical density, base and fog included.
func (f Film) Gradient(density float64) float64 {
	net := density - f.BaseAndFog
	if net <= 0 || net >= f.dm {
		return 0
	}
	return math.Ln10 * f.p * -math.Log1p(-net/f.dm) * (f.dm - net)
}

// SNRn gives the normalised signal to noise ratio at an optical density, base
// and fog included: log10(e) G/sigma over the 100 um circle of ISO 11699-1,
// whose area is that of the square of 88.6 um of ISO 17636-2. The class's
// granularity at density 2 above base and fog goes with the root of density.
func (f Film) SNRn(density float64) float64 {
	net := density - f.BaseAndFog
	if net <= 0 {
		return 0
	}
	return f.Gradient(density) / math.Ln10 / (f.Granularity * math.Sqrt(net/2))
}
