package transport

import (
	"fmt"
	"math"
	"strings"
	"sync"

	"halfvalue/exposure/transport/internal/cells"
	"halfvalue/materials"
)

// share is the weight of one base in a blend.
type share struct {
	base   int
	weight float64
}

// blend stands for a material as a mixture of two neighbouring bases, in the
// space of mean free paths, one pair for each energy of blendKeV.
type blend struct {
	pairs [blendCount][2]share
}

// The energies where the pairs are found are even in octaves.
const (
	blendCount = 48
	blendFirst = 10.0
	blendLast  = 3000.0
)

var (
	blendFrom  = octaves(blendFirst)
	blendScale = (blendCount - 1) / (octaves(blendLast) - blendFrom)
)

// blends remembers by material and by composition, so that a material at
// another density costs nothing new.
var blends = struct {
	sync.RWMutex
	of          map[*materials.Material]*blend
	composition map[string]*blend
}{of: map[*materials.Material]*blend{}, composition: map[string]*blend{}}

const mostBlends = 1000 // remembered before all are forgotten

func blendOf(m *materials.Material) *blend {
	blends.RLock()
	b := blends.of[m]
	blends.RUnlock()
	if b != nil {
		return b
	}
	key := composition(m)
	blends.Lock()
	defer blends.Unlock()
	b = blends.composition[key]
	if b == nil {
		b = newBlend(m, key)
	}
	if len(blends.of) >= mostBlends {
		clear(blends.of)
		clear(blends.composition)
	}
	blends.of[m], blends.composition[key] = b, b
	return b
}

// composition names the elements and their shares to six digits.
func composition(m *materials.Material) string {
	var s strings.Builder
	for _, f := range m.Fractions() {
		fmt.Fprintf(&s, "%d:%.6f ", f.Z, f.Mass)
	}
	return s.String()
}

func newBlend(m *materials.Material, key string) *blend {
	b := &blend{}
	for i := range b.pairs {
		b.pairs[i] = bracket(m, keVOf(blendFrom+float64(i)/blendScale))
	}
	for i := range table() {
		if key == composition(table()[i].material) {
			for j := range b.pairs {
				b.pairs[j] = [2]share{{i, 1}, {i, 0}}
			}
		}
	}
	return b
}

// keVOf is the inverse of octaves.
func keVOf(lg float64) float64 {
	return math.Float64frombits(uint64(eightKeV) + uint64(lg*(1<<52)))
}

// at gives the pair for an energy: the nearest of the blend.
func (b *blend) at(lg float64) *[2]share {
	i := int((lg-blendFrom)*blendScale + 0.5)
	return &b.pairs[max(0, min(blendCount-1, i))]
}

// absorbing is the logarithm of photoelectric over incoherent, which tells how
// far scattered photons get against unscattered ones; it rises with Z at an
// energy that lies on one side of all K edges concerned.
func absorbing(m *materials.Material, keV float64) float64 {
	return math.Log(m.MuRhoOf(materials.Photoelectric, keV) / m.MuRhoOf(materials.Incoherent, keV))
}

// comparedAt is the energy at which a material is compared with the bases for
// incident photons of keV. Scattered photons lose energy until absorption
// takes over, so for hard photons it is not their own energy, but one where
// the ratio of photoelectric to incoherent still tells; K edges are kept out
// of the way.
func comparedAt(m *materials.Material, keV float64) float64 {
	var heavy float64
	for _, f := range m.Fractions() {
		if f.Z > 50 {
			heavy += f.Mass
		}
	}
	if heavy > 0.01 {
		return min(200, max(120, keV))
	}
	return min(100, max(30, keV))
}

// bracket finds the two bases between whose ratios the material's ratio lies.
// Outside all of them the nearest stands.
func bracket(m *materials.Material, keV float64) [2]share {
	e := comparedAt(m, keV)
	own := absorbing(m, e)
	lo, hi := -1, -1
	var loR, hiR float64
	for i := range cells.Blended {
		r := absorbing(table()[i].material, e)
		if r <= own && (lo < 0 || r > loR) {
			lo, loR = i, r
		}
		if r >= own && (hi < 0 || r < hiR) {
			hi, hiR = i, r
		}
	}
	switch {
	case lo < 0:
		return [2]share{{hi, 1}, {hi, 0}}
	case hi < 0 || hiR == loR:
		return [2]share{{lo, 1}, {lo, 0}}
	}
	w := (own - loR) / (hiR - loR)
	return [2]share{{lo, 1 - w}, {hi, w}}
}
