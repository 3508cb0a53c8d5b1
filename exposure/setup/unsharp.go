package setup

import (
	"embed"
	"encoding/json"
	"fmt"
	"math"
	"sync"
)

//go:embed data/*.json
var dataFiles embed.FS

func load[T any](name string) T {
	var v T
	b, err := dataFiles.ReadFile("data/" + name)
	if err == nil {
		err = json.Unmarshal(b, &v)
	}
	if err != nil {
		panic(fmt.Sprintf("setup: data/%s: %v", name, err))
	}
	return v
}

// UgMM is the geometric unsharpness d b/f, mm, exact for a source parallel to
// the film: the penumbra on the film of a sharp edge b above it.
func UgMM(dMM, fMM, bMM float64) float64 { return dMM * bMM / fMM }

// Magnification of what lies b above the film.
func Magnification(fMM, bMM float64) float64 { return (fMM + bMM) / fMM }

// TotalMM joins unsharpnesses by the root of their squares (common practice,
// as in ISO 17636-2).
func TotalMM(parts ...float64) float64 {
	sum := 0.0
	for _, u := range parts {
		sum += u * u
	}
	return math.Sqrt(sum)
}

// Inherent is the film's own unsharpness with a beam, mm.
type Inherent struct {
	MM                 float64
	Source, Confidence string
}

type inherentTable struct {
	Source     string             `json:"source"`
	Confidence string             `json:"confidence"`
	ByKV       [][2]float64       `json:"byKV"` // kV, mm
	ByNuclide  map[string]float64 `json:"byNuclide"`
}

var inherents = sync.OnceValue(func() inherentTable { return load[inherentTable]("inherent.json") })

// InherentOfTube gives the film's own unsharpness at a tube voltage, straight
// between the rows; it errs outside them.
func InherentOfTube(kV float64) (Inherent, error) {
	t := inherents()
	rows := t.ByKV
	if !(kV >= rows[0][0] && kV <= rows[len(rows)-1][0]) {
		return Inherent{}, fmt.Errorf("tube voltage %v kV is out of range: want %v to %v kV", kV, rows[0][0], rows[len(rows)-1][0])
	}
	i := 1
	for kV > rows[i][0] {
		i++
	}
	a, b := rows[i-1], rows[i]
	return Inherent{a[1] + (b[1]-a[1])*(kV-a[0])/(b[0]-a[0]), t.Source, t.Confidence}, nil
}

// InherentOfNuclide gives the film's own unsharpness with a sealed source.
func InherentOfNuclide(name string) (Inherent, error) {
	t := inherents()
	mm, ok := t.ByNuclide[name]
	if !ok {
		return Inherent{}, fmt.Errorf("nuclide %q has no row in the table of film unsharpness", name)
	}
	return Inherent{mm, t.Source, t.Confidence}, nil
}
