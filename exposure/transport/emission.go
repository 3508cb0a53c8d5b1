package transport

import (
	"fmt"
	"math"

	"halfvalue/exposure/transport/internal/cells"
	"halfvalue/exposure/transport/internal/photon"
	"halfvalue/materials"
)

// Emission is scattered radiation that leaves a slab by angle and energy, on
// both sides: photons per steradian for the spectrum that was asked, per cm2 of
// irradiated face (for one incident photon: per photon). At a distance r, large
// against the irradiated spot of area A cm2, the fluence is PerSr x A / r^2.
type Emission struct {
	AngleEdgesDeg []float64   // n+1 edges, 0 along the beam, 180 straight back
	EdgesKeV      []float64   // m+1 edges of the exit bins
	MeanKeV       []float64   // m energies that stand for the bins
	PerSr         [][]float64 // n by m photons/sr
}

const sideBins = photon.AngleExitBins

// Emitted gives what a slab of material mm thick scatters to all sides from a
// fluence perCM2 of photons at the energies keV that falls on it normally. For
// the ground or a massive wall take 1e5 mm.
func Emitted(m *materials.Material, mm float64, keV, perCM2 []float64) (Emission, error) {
	if err := checkLayers([]Layer{{m, mm}}); err != nil {
		return Emission{}, err
	}
	if err := checkSpectrum(keV, perCM2); err != nil {
		return Emission{}, err
	}
	var photons [2]sideTable
	b := blendOf(m)
	for i, e := range keV {
		if e >= CutKeV && perCM2[i] > 0 && mm > 0 {
			addSides(&photons, b, e, m.MuPerMM(e)*mm, perCM2[i])
		}
	}
	return newEmission(&photons), nil
}

// Scattered is Emitted for one photon of one energy at one angle: photons per
// steradian by exit bin. It allocates; for many angles take Emitted once and its At.
func Scattered(m *materials.Material, mm, keV, angleDeg float64) (edgesKeV, meanKeV, perSr []float64, err error) {
	if !(angleDeg >= 0 && angleDeg <= 180) {
		return nil, nil, nil, fmt.Errorf("angle \"%g\" deg is outside 0 to 180", angleDeg)
	}
	e, err := Emitted(m, mm, []float64{keV}, []float64{1})
	if err != nil {
		return nil, nil, nil, err
	}
	perSr = make([]float64, sideBins)
	for i := range perSr {
		perSr[i] = e.At(angleDeg, i)
	}
	return e.EdgesKeV, e.MeanKeV, perSr, nil
}

// addSides adds what n photons of an energy send out of a slab x mean free paths thick.
func addSides(sum *[2]sideTable, b *blend, keV, x, n float64) {
	lg := octaves(keV)
	for _, s := range b.at(lg) {
		if s.weight == 0 {
			continue
		}
		t := &table()[s.base]
		p := t.find(lg)
		t.nodes[p.node].addSides(sum, x, n*s.weight*(1-p.part))
		t.nodes[p.node+1].addSides(sum, x, n*s.weight*p.part)
	}
}

// addSides interpolates over thickness: straight from nothing to the first
// node, in the logarithm of the thickness between nodes; past the last node
// the reflected side stays, the transmitted side keeps its value, which is too much.
func (n *node) addSides(sum *[2]sideTable, x, photons float64) {
	if photons == 0 {
		return
	}
	at := func(k int) float64 { return cells.PlanesMFP[cells.AnglePlanes[k]] }
	last := len(cells.AnglePlanes) - 1
	switch {
	case x <= at(0):
		n.addPlane(sum, 0, photons*x/at(0))
	case x >= at(last):
		n.addPlane(sum, last, photons)
	default:
		k := 0
		for x > at(k+1) {
			k++
		}
		t := math.Log(x/at(k)) / math.Log(at(k+1)/at(k))
		n.addPlane(sum, k, photons*(1-t))
		n.addPlane(sum, k+1, photons*t)
	}
}

func (n *node) addPlane(sum *[2]sideTable, k int, photons float64) {
	for side := range sum {
		from, to := &n.angle[side][k], &sum[side]
		for a := range from {
			for i, v := range from[a] {
				to[a][i] += photons * v
			}
		}
	}
}

// newEmission divides by solid angles and puts the two sides into one row of angles.
func newEmission(photons *[2]sideTable) Emission {
	e := Emission{}
	for i := 0; i <= exitBins; i += 2 {
		e.EdgesKeV = append(e.EdgesKeV, photon.ExitEdgesKeV[i])
	}
	for i := range sideBins {
		e.MeanKeV = append(e.MeanKeV, (e.EdgesKeV[i]+e.EdgesKeV[i+1])/2)
	}
	n := photon.AngleBins
	for a := range n {
		e.AngleEdgesDeg = append(e.AngleEdgesDeg, photon.AngleEdgesDeg[a])
		e.PerSr = append(e.PerSr, perSr(&photons[0][a], a))
	}
	for a := n - 1; a >= 0; a-- {
		e.AngleEdgesDeg = append(e.AngleEdgesDeg, 180-photon.AngleEdgesDeg[a+1])
		e.PerSr = append(e.PerSr, perSr(&photons[1][a], a))
	}
	e.AngleEdgesDeg = append(e.AngleEdgesDeg, 180)
	return e
}

func perSr(row *[sideBins]float64, a int) []float64 {
	cos := func(deg float64) float64 { return math.Cos(deg * math.Pi / 180) }
	omega := 2 * math.Pi * (cos(photon.AngleEdgesDeg[a]) - cos(photon.AngleEdgesDeg[a+1]))
	out := make([]float64, sideBins)
	for i, v := range row {
		out[i] = v / omega
	}
	return out
}

// At gives photons/sr of one exit bin at an angle of 0 to 180 deg, straight
// between the middles of the angular bins. From 67.5 to 112.5 deg, along the
// slab, the largest of the four bins there stands: an endless slab sends
// nothing out at 90 deg, but a real one has edges.
func (e Emission) At(angleDeg float64, bin int) float64 {
	n := len(e.PerSr)
	mid := func(a int) float64 { return (e.AngleEdgesDeg[a] + e.AngleEdgesDeg[a+1]) / 2 }
	if angleDeg > mid(n/2-2) && angleDeg < mid(n/2+1) {
		var most float64
		for a := n/2 - 2; a < n/2+2; a++ {
			most = max(most, e.PerSr[a][bin])
		}
		return most
	}
	a := 0
	for a < n-2 && angleDeg > mid(a+1) {
		a++
	}
	t := max(0, min(1, (angleDeg-mid(a))/(mid(a+1)-mid(a))))
	return e.PerSr[a][bin]*(1-t) + e.PerSr[a+1][bin]*t
}

// Weighted gives the sum over the exit bins at an angle with a weight by
// energy, such as air kerma or H*(10) per fluence.
func (e Emission) Weighted(angleDeg float64, weight func(keV float64) float64) float64 {
	var sum float64
	for i, keV := range e.MeanKeV {
		if v := e.At(angleDeg, i); v > 0 {
			sum += v * weight(keV)
		}
	}
	return sum
}
