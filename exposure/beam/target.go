package beam

import (
	"fmt"
	"math"
	"strings"
	"sync"

	"halfvalue/exposure/beam/internal/electron"
	"halfvalue/materials"
)

// Range of the tube model, and the energy below which no spectrum is given:
// a metre of air leaves nothing of it.
const (
	LeastKV    = 20
	MostKV     = 450
	CutoffKeV  = 3
	lowTableKV = 4 // pulsed heads pass through every voltage
)

// targetSymbols are the targets that there are data for.
var targetSymbols = [...]string{"W", "Mo", "Cu", "Rh", "Cr", "Au"}

// target holds what depends on the anode's metal alone.
type target struct {
	symbol  string
	matter  electron.Matter
	element materials.Element
	metal   *materials.Material
	rows    []slowing
	kShare  float64 // K shell's share of the photoelectric effect above the K edge
	lShares [3]float64
	lLines  *lSeries // nil where the L lines lie below the cut-off
	thick   *thickTables
}

// targets makes each target on first use; safe for concurrent use.
var targets = func() map[string]func() *target {
	m := map[string]func() *target{}
	for _, s := range targetSymbols {
		m[s] = sync.OnceValue(func() *target { return newTarget(s) })
	}
	return m
}()

func targetNamed(symbol string) (*target, error) {
	f, ok := targets[symbol]
	if !ok {
		return nil, fmt.Errorf("target %q is unknown: want one of %s", symbol, strings.Join(targetSymbols[:], ", "))
	}
	return f(), nil
}

func newTarget(symbol string) *target {
	e, err := materials.ElementBySymbol(symbol)
	if err != nil {
		panic("beam: " + err.Error())
	}
	t := &target{symbol: symbol, element: e, metal: must(materials.Lookup(symbol)), rows: slowings()[e.Z], lLines: lSeriesOf(e.Z)}
	for _, m := range electron.Targets() {
		if m.Z == e.Z {
			t.matter = m
		}
	}
	t.kShare = 1 - t.jump(e.KEdgeKeV)
	left := 1.0
	for i, edge := range e.LEdgesKeV {
		if edge > CutoffKeV {
			j := t.jump(edge)
			t.lShares[i] = left * (1 - j)
			left *= j
		}
	}
	t.thick = newThickTables(t)
	return t
}

// jump is the photoelectric cross section just below an edge against that
// just above it.
func (t *target) jump(edgeKeV float64) float64 {
	const aside = 2e-4 // edges are rounded differently from table to table
	below, above := edgeKeV*(1-aside), edgeKeV*(1+aside)
	return t.metal.MuRhoOf(materials.Photoelectric, below) / t.metal.MuRhoOf(materials.Photoelectric, above)
}

// takeOff is the sine of the angle between the central ray and the anode.
func takeOff(anodeDeg float64) float64 { return math.Sin(anodeDeg * math.Pi / 180) }
