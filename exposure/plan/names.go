package plan

import (
	"encoding/json"
	"fmt"
	"maps"
	"slices"
	"strings"
	"sync"

	nuclides "halfvalue/exposure/beam/data"
	rulesets "halfvalue/exposure/rules/data"
	"halfvalue/materials"
)

// Names that a plan may use. Kinds, waveforms, targets and the rest are fixed
// by version 1 of the plan file; materials, nuclides and rule sets are those of
// the tables.
var (
	Kinds     = []string{SingleWall, DoubleWallSingleImage, DoubleWallDoubleImage, Panoramic}
	Images    = []string{Elliptical, Perpendicular}
	Sides     = []string{Outside, Inside}
	Targets   = []string{"W", "Mo", "Cu", "Rh", "Cr", "Au"}
	Waveforms = []string{"constant", "two-pulse", "self-rectified"}
	Bases     = []string{"output", "content"}
	Classes   = []string{"C1", "C2", "C3", "C4", "C5", "C6"}
	Periods   = []string{"hour", "week", "job", "year"}
)

// The setups of version 1.
const (
	SingleWall            = "single-wall"
	DoubleWallSingleImage = "double-wall-single-image"
	DoubleWallDoubleImage = "double-wall-double-image"
	Panoramic             = "panoramic"
)

// The two images of double wall double image.
const (
	Elliptical    = "elliptical"
	Perpendicular = "perpendicular"
)

// Where the source of a single-wall pipe stands.
const (
	Outside = "outside"
	Inside  = "inside"
)

// RuleSets gives the names of the rule sets that come with the program.
func RuleSets() []string { return rulesets.Names() }

// Nuclides gives the nuclides that a shot can be planned with.
func Nuclides() []string {
	var names []string
	for _, n := range nuclideRows() {
		if n.Shots {
			names = append(names, n.Name)
		}
	}
	return names
}

// nuclideRow is what a plan needs to know of a nuclide; the file is beam's.
type nuclideRow struct {
	Name         string  `json:"name"`
	HalfLifeDays float64 `json:"halfLifeDays"`
	Shots        bool    `json:"shots"`
}

var nuclideRows = sync.OnceValue(func() []nuclideRow {
	var file struct {
		Nuclides []nuclideRow `json:"nuclides"`
	}
	if err := json.Unmarshal(nuclides.Nuclides, &file); err != nil {
		panic(fmt.Sprintf("plan: the nuclide table does not decode: %v", err))
	}
	return file.Nuclides
})

func halfLifeDays(nuclide string) float64 {
	for _, n := range nuclideRows() {
		if n.Name == nuclide {
			return n.HalfLifeDays
		}
	}
	return 0
}

// materialNames is every name that materials.Lookup knows.
var materialNames = sync.OnceValue(func() []string {
	var names []string
	for _, m := range materials.Catalogue() {
		names = append(names, m.Name())
	}
	for z := 1; z <= materials.MaxZ; z++ {
		if e, err := materials.ElementByZ(z); err == nil {
			names = append(names, e.Symbol)
		}
	}
	return names
})

// nearest gives the name of the list that s most likely meant, or "" where none
// is near or two are alike near: a wrong guess is worse than none.
func nearest(s string, list []string) string {
	best, bestCost, tie := "", max(1, len(s)/4)+1, false
	if len(s) <= 2 {
		bestCost = 1
	}
	for _, name := range list {
		if plainName(s) == plainName(name) {
			return name
		}
		switch c := edits(strings.ToLower(s), strings.ToLower(name)); {
		case c < bestCost:
			best, bestCost, tie = name, c, false
		case c == bestCost:
			tie = true
		}
	}
	if tie {
		return ""
	}
	return best
}

// nearestMaterial also knows the names of the elements: beryllium is Be.
func nearestMaterial(s string) string {
	if near := nearest(s, materialNames()); near != "" {
		return near
	}
	return elementNames()[nearest(s, slices.Sorted(maps.Keys(elementNames())))]
}

var elementNames = sync.OnceValue(func() map[string]string {
	names := map[string]string{}
	for z := 1; z <= materials.MaxZ; z++ {
		if e, err := materials.ElementByZ(z); err == nil {
			names[e.Name] = e.Symbol
		}
	}
	return names
})

// plainName drops what people leave out or put in: case, blanks, dashes.
func plainName(s string) string {
	return strings.Map(func(r rune) rune {
		if strings.ContainsRune(" -_.:/", r) {
			return -1
		}
		return r
	}, strings.ToLower(s))
}

// edits is the least number of letters to put in, take out or replace that
// makes b of a.
func edits(a, b string) int {
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range len(a) {
		corner := row[0]
		row[0] = i + 1
		for j := range len(b) {
			cost := corner
			if a[i] != b[j] {
				cost++
			}
			corner = row[j+1]
			row[j+1] = min(cost, row[j]+1, corner+1)
		}
	}
	return row[len(b)]
}

// oneOf lists names for a message; long lists are cut.
func oneOf(list []string) string {
	const most = 12
	if len(list) > most {
		return fmt.Sprintf("one of %d names", len(list))
	}
	if len(list) == 1 {
		return list[0]
	}
	last := len(list) - 1
	return strings.Join(list[:last], ", ") + " or " + list[last]
}

func known(name string, list []string) bool { return slices.Contains(list, name) }
