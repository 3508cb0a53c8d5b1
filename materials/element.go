package materials

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"sync"
)

// MaxZ is the heaviest element of the tables, uranium.
const MaxZ = 92

// KLine is one characteristic line of the K series.
type KLine struct {
	Name  string  // shells of the jump: "KL3" (K-alpha-1), "KL2" (K-alpha-2), "KM3", "KM2" (K-beta-1 and -3), "KN" (K-beta-2), "KO" (K-beta-4)
	KeV   float64 // energy
	Share float64 // share of the K photons, the shares of an element sum to 1
}

// Element holds the facts of one element.
type Element struct {
	Z              int
	Symbol         string // "Fe"
	Name           string // "iron"
	AtomicWeight   float64
	DensityGPerCM3 float64    // at room temperature; gases at 20 degC and 101.325 kPa
	KEdgeKeV       float64    // K absorption edge
	LEdgesKeV      [3]float64 // L1, L2, L3 absorption edges; 0 where the element has none
	KShare         float64    // share of the photoelectric events just above the K edge that empty the K shell, from the jump; 0 below sodium, whose edge lies below the tables
	KYield         float64    // K photons per K vacancy, 0 to 1
	KLines         []KLine    // strongest first; empty below carbon
}

// ElementByZ gives the element of atomic number z, 1 to 92.
func ElementByZ(z int) (Element, error) {
	if z < 1 || z > MaxZ {
		return Element{}, fmt.Errorf("atomic number \"%d\" is outside 1 to %d", z, MaxZ)
	}
	e := table()[z].Element
	e.KLines = append([]KLine(nil), e.KLines...)
	return e, nil
}

// ElementBySymbol gives the element by its symbol in exact letter case, "Fe".
func ElementBySymbol(symbol string) (Element, error) {
	z, ok := zBySymbol()[symbol]
	if !ok {
		return Element{}, fmt.Errorf("unknown element symbol %q: want H to U in exact letter case, such as \"Fe\"", symbol)
	}
	return ElementByZ(z)
}

//go:embed data/elements.json
var elementsJSON []byte

// elementFact is a row of data/elements.json, the facts that no input of the
// generator holds.
type elementFact struct {
	Z       int                `json:"z"`
	Symbol  string             `json:"symbol"`
	Name    string             `json:"name"`
	Weight  float64            `json:"weight"`
	Density float64            `json:"density"`
	Lines   map[string]float64 `json:"kLinesKeV"` // measured, where we hold them
}

var elementFacts = sync.OnceValue(func() []elementFact {
	var file struct {
		Elements []elementFact `json:"elements"`
	}
	if err := json.Unmarshal(elementsJSON, &file); err != nil {
		panic(fmt.Sprintf("materials: data/elements.json does not decode: %v", err))
	}
	if len(file.Elements) != MaxZ {
		panic(fmt.Sprintf("materials: data/elements.json has %d elements, want %d", len(file.Elements), MaxZ))
	}
	return file.Elements
})

var zBySymbol = sync.OnceValue(func() map[string]int {
	m := make(map[string]int, MaxZ)
	for _, f := range elementFacts() {
		m[f.Symbol] = f.Z
	}
	return m
})
