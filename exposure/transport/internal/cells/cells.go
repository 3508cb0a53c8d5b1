// Package cells lays out the embedded scatter table: which materials, energies
// and thicknesses it holds, how one cell is made and how all are packed.
package cells

import (
	"fmt"
	"hash/fnv"
	"math"

	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// Version counts changes of the physics or of the packing.
const Version = 1

// Seed is the root of every cell's seed.
const Seed = 20261201

// Bases are the names, in package materials, of the materials of the table.
// The first Blended, in rising effective atomic number, also serve to stand
// for other materials; the rest serves itself only.
var Bases = []string{"polyethylene", "water", "Al", "concrete", "Ti", "Fe", "Cu", "Zr", "Sn", "W", "Pb", "U", "heavy-concrete"}

// Blended counts the bases that stand for other materials.
const Blended = 12

// PlanesMFP are the thicknesses in mean free paths of the incident photon.
var PlanesMFP = []float64{0.05, 0.1, 0.25, 0.5, 1, 1.5, 2, 3, 4, 5, 6, 7, 8, 10, 12, 15, 20}

// AnglePlanes are the indices in PlanesMFP that carry angular tallies.
var AnglePlanes = []int{1, 2, 3, 4, 6, 8, 11, 14}

// energies every base has, keV.
var energies = []float64{15, 18, 22, 27, 33, 40, 50, 60, 75, 90, 110, 135, 165, 200, 245, 300, 370, 460, 570, 700, 850, 1020, 1250, 1600, 2100, 2600, 3000}

// edgeGap sets the nodes beside a K edge, relative to it.
const edgeGap = 0.003

// Energies gives the nodes of a base in keV, rising: the common ones, and a
// pair around each K edge in the range in place of common ones within 4 % of it.
func Energies(base string) ([]float64, error) {
	m, err := materials.Lookup(base)
	if err != nil {
		return nil, err
	}
	list := energies
	for _, f := range m.Fractions() {
		el, err := materials.ElementByZ(f.Z)
		if err != nil {
			return nil, err
		}
		if k := el.KEdgeKeV; k > energies[0]*1.1 {
			var next []float64
			done := false
			for _, e := range list {
				if math.Abs(e/k-1) < 0.04 {
					continue
				}
				if e > k && !done {
					next = append(next, k*(1-edgeGap), k*(1+edgeGap))
					done = true
				}
				next = append(next, e)
			}
			list = next
		}
	}
	return list, nil
}

// Cell is one base at one energy, every thickness.
type Cell struct {
	Base       string
	KeV        float64
	Histories  int
	Seed       uint64
	Collisions int64
	Planes     []photon.Plane
	RelErr     []float64
}

// Effort bounds the work of a cell.
type Effort struct {
	First  int     // histories of the first run
	Most   int     // and of a second, which is made if the first misses the target
	Target float64 // relative error of the scattered air kerma at every thickness up to 12 mean free paths
}

// Full and Coarse are the efforts of the shipped table and of a trial.
var (
	Full   = Effort{First: 60_000, Most: 1_200_000, Target: 0.006}
	Coarse = Effort{First: 12_000, Most: 12_000, Target: 1}
)

// SeedOf gives the seed of a cell.
func SeedOf(base string, keV float64) uint64 {
	h := fnv.New64a()
	fmt.Fprintf(h, "%d %s %.6g", Seed, base, keV)
	return h.Sum64()
}

// Make computes a cell with the histories that the effort asks for.
func Make(base string, keV float64, effort Effort, workers int) (Cell, error) {
	c, err := Run(base, keV, effort.First, workers)
	if err != nil {
		return Cell{}, err
	}
	var worst float64
	for k, x := range PlanesMFP {
		if x >= 0.25 && x <= 12 {
			worst = max(worst, c.RelErr[k])
		}
	}
	n := float64(effort.First) * (worst / effort.Target) * (worst / effort.Target)
	if histories := int(min(n, float64(effort.Most))); histories > effort.First {
		return Run(base, keV, histories, workers)
	}
	return c, nil
}

// Run computes a cell with a given number of histories.
func Run(base string, keV float64, histories, workers int) (Cell, error) {
	m, err := materials.Lookup(base)
	if err != nil {
		return Cell{}, err
	}
	med, err := photon.NewMedium(m)
	if err != nil {
		return Cell{}, err
	}
	mu := med.MuRho(keV)
	planes := make([]float64, len(PlanesMFP))
	for k, x := range PlanesMFP {
		planes[k] = x / mu
	}
	seed := SeedOf(base, keV)
	r, err := photon.Slab{
		Layers: []photon.Layer{{Medium: med, GPerCM2: planes[len(planes)-1]}},
		Planes: planes, KeV: []float64{keV}, Histories: histories, Seed: seed, Workers: workers,
	}.Run()
	if err != nil {
		return Cell{}, fmt.Errorf("cell %s %g keV: %w", base, keV, err)
	}
	return Cell{base, keV, histories, seed, r.Collisions, r.Planes, r.RelErr}, nil
}
