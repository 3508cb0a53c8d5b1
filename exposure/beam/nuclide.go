package beam

import (
	"encoding/json"
	"fmt"
	"math"
	"strings"
	"sync"
	"time"

	"halfvalue/exposure/beam/data"
	"halfvalue/materials"
)

// Line is a photon line of a nuclide.
type Line struct {
	KeV   float64
	Yield float64 // photons per decay
}

// UnmarshalJSON reads [keV, yield].
func (l *Line) UnmarshalJSON(text []byte) error {
	var pair [2]float64
	if err := json.Unmarshal(text, &pair); err != nil {
		return err
	}
	l.KeV, l.Yield = pair[0], pair[1]
	return nil
}

// Beta is a branch of beta decay.
type Beta struct {
	EndKeV    float64 `json:"endKeV"` // largest energy of the electron
	Yield     float64 `json:"yield"`  // electrons per decay
	DaughterZ int     `json:"daughterZ"`
}

// Nuclide is a radionuclide of the trade, a row of data/nuclides.json.
type Nuclide struct {
	Name           string  `json:"name"` // "Ir-192"
	HalfLifeDays   float64 `json:"halfLifeDays"`
	CutoffKeV      float64 `json:"cutoffKeV"`    // the capsule stops what lies below
	Shots          bool    `json:"shots"`        // false: for checks only, Sealed refuses it
	LeastSteelMM   float64 `json:"leastSteelMM"` // usual working range in steel, ISO 17636-1 class A
	MostSteelMM    float64 `json:"mostSteelMM"`
	CapsuleSteelMM float64 `json:"capsuleSteelMM"` // taken with basis content
	Note           string  `json:"note"`
	Lines          []Line  `json:"lines"`
	Betas          []Beta  `json:"betas"` // those whose bremsstrahlung counts
	Metal          struct {
		Formula string  `json:"formula"`
		Density float64 `json:"density"` // g/cm3
	} `json:"metal"`
	Source     string `json:"-"`
	Confidence string `json:"-"`

	metal *materials.Material
	beta  func() Spectrum // bremsstrahlung per decay and cm2 at 1 m, as made
}

var nuclides = sync.OnceValue(func() []Nuclide {
	var file struct {
		Source     string    `json:"source"`
		Confidence string    `json:"confidence"`
		Nuclides   []Nuclide `json:"nuclides"`
	}
	if err := json.Unmarshal(data.Nuclides, &file); err != nil {
		panic(fmt.Sprintf("beam: data/nuclides.json does not decode: %v", err))
	}
	for i := range file.Nuclides {
		n := &file.Nuclides[i]
		n.Source, n.Confidence = file.Source, file.Confidence
		n.metal = must(materials.Compound(n.Name+" source", n.Metal.Formula, n.Metal.Density))
		if len(n.Betas) > 0 {
			n.beta = sync.OnceValue(n.bremsstrahlung)
		}
	}
	return file.Nuclides
})

// Nuclides gives all nuclides, those for checks only among them.
func Nuclides() []Nuclide { return append([]Nuclide(nil), nuclides()...) }

// NuclideByName gives the nuclide of that name, in exact letter case.
func NuclideByName(name string) (Nuclide, error) {
	var known []string
	for _, n := range nuclides() {
		if n.Name == name {
			return n, nil
		}
		known = append(known, n.Name)
	}
	return Nuclide{}, fmt.Errorf("nuclide %q is unknown: want one of %s", name, strings.Join(known, ", "))
}

// DecayFactor gives the activity at to against that at from, 2^-(t/T); above 1
// where to lies before from, which a plan must not ask for.
func (n Nuclide) DecayFactor(from, to time.Time) float64 {
	return math.Exp2(-to.Sub(from).Hours() / 24 / n.HalfLifeDays)
}
