package transport

import (
	_ "embed"
	"fmt"
	"math"
	"sync"

	"halfvalue/exposure/transport/internal/cells"
	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

//go:embed data/scatter.bin
var packed []byte

const (
	exitBins   = photon.ExitBins
	planeCount = 18 // thickness nodes with that of no thickness
)

// base is one material of the table.
type base struct {
	material *materials.Material
	octaves  []float64         // of the nodes' energies, see octaves
	start    [startCount]uint8 // node at or before each 16th of an octave
	nodes    []node
}

// node is a base at one energy of the incident photons. The scattered fluence
// is kept as r exp(-decay x), x in mean free paths, because r varies slowly.
type node struct {
	keV     float64
	inverse float64 // 1/keV
	decay   float64 // per mean free path
	beyond  float64 // never more than the true slope past the last thickness
	flux    [planeCount][exitBins]float64
	energy  [planeCount][exitBins]float64 // flux times keV
	bins    int                           // exit bins that hold anything
	kerma   [planeCount]float64           // scattered air kerma r, pGy cm2
	relErr  [planeCount]float64
	angle   [2][]sideTable // transmitted and reflected, by angular plane
}

type sideTable = [photon.AngleBins][photon.AngleExitBins]float64

// thickness nodes, mean free paths, from 0.
var planes = append([]float64{0}, cells.PlanesMFP...)

var table = sync.OnceValue(func() []base {
	all, count := make([]base, len(cells.Bases)), 0
	for i, name := range cells.Bases {
		m, err := materials.Lookup(name)
		if err != nil {
			panic(fmt.Sprintf("transport: base material: %v", err))
		}
		list, err := cells.Energies(name)
		if err != nil {
			panic(fmt.Sprintf("transport: energies of %q: %v", name, err))
		}
		all[i] = base{material: m, nodes: make([]node, len(list))}
		for j, e := range list {
			all[i].octaves = append(all[i].octaves, octaves(e))
			all[i].nodes[j].keV, all[i].nodes[j].inverse = e, 1/e
		}
		all[i].index()
		count += len(list)
	}
	data, err := cells.Unpack(packed, count)
	if err != nil {
		panic(fmt.Sprintf("transport: embedded table: %v", err))
	}
	for i := range all {
		for j := range all[i].nodes {
			all[i].nodes[j].fill(all[i].material, &data[0])
			data = data[1:]
		}
	}
	return all
})

// index fills start.
func (b *base) index() {
	j := 0
	for i := range b.start {
		for j < len(b.octaves)-2 && b.octaves[j+1] <= float64(i)/startsPerOctave {
			j++
		}
		b.start[i] = uint8(j)
	}
}

// fill takes a cell of the table.
func (n *node) fill(m *materials.Material, c *cells.Packed) {
	last := len(planes) - 1
	for k := 1; k <= last; k++ {
		for i, f := range c.Flux[k-1] {
			n.flux[k][i], n.energy[k][i] = f, f*c.Mean[k-1][i]
			if f > 0 {
				n.bins = max(n.bins, i+1)
				n.kerma[k] += f * photon.KermaPerFluence(c.Mean[k-1][i])
			}
		}
		n.relErr[k] = c.RelErr[k-1]
	}
	n.relErr[0] = n.relErr[1]
	n.slopes(m)
	for k := 1; k <= last; k++ {
		up := math.Exp(n.decay * planes[k])
		for i := range n.flux[k] {
			n.flux[k][i] *= up
			n.energy[k][i] *= up
		}
		n.kerma[k] *= up
	}
	n.angle = [2][]sideTable{c.Forward, c.Backward}
	for side := range n.angle {
		edges(n.angle[side])
	}
}

// edges lets the angles within 30 deg of the slab's plane keep the most that
// any thinner slab sends there: parts have edges and curved faces, where what
// goes sideways is not held back by the rest of the slab.
func edges(byPlane []sideTable) {
	for k := 1; k < len(byPlane); k++ {
		for a := range byPlane[k] {
			if photon.AngleEdgesDeg[a] < 60 {
				continue
			}
			for i, v := range byPlane[k-1][a] {
				byPlane[k][a][i] = max(byPlane[k][a][i], v)
			}
		}
	}
}

// slopes finds the decay that makes the table flat, and the slope with which
// it is continued. The slope of ln S grows with depth, as the soft photons die
// out, so the last one of the table, less its error, is never too steep. Not so
// above a K edge, where photons under the edge take over that reach further:
// there the slope falls towards that of the most penetrating photon of lower
// energy, and 0.95 of it is taken (few of those photons scatter on, c < 0.3).
func (n *node) slopes(m *materials.Material) {
	last := len(planes) - 1
	from := 7 // 2 mean free paths
	if !(n.kerma[last] > 0 && n.kerma[from] > 0) {
		panic(fmt.Sprintf("transport: %s has no scatter at %g keV: the table is damaged", m.Name(), n.keV))
	}
	n.decay = min(1, math.Log(n.kerma[from]/n.kerma[last])/(planes[last]-planes[from]))
	dx := planes[last] - planes[last-2]
	noise := 2 * math.Hypot(n.relErr[last], n.relErr[last-2])
	n.beyond = min(1, (math.Log(n.kerma[last-2]/n.kerma[last])-noise)/dx)
	if r := furthest(m, n.keV); r < 1 {
		n.beyond = min(n.beyond, 0.95*r)
	}
	n.beyond = max(0, n.beyond)
}

// furthest is the least coefficient of photons of lower energy over that at
// keV: below 1 above a K edge only.
func furthest(m *materials.Material, keV float64) float64 {
	least := m.MuRho(keV)
	all := least
	for e := float64(CutKeV); e < keV; e *= 1.002 {
		least = min(least, m.MuRho(e))
	}
	return least / all
}
