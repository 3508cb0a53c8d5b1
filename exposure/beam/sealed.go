package beam

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// Bases of a certificate's activity.
const (
	Output  = "output"  // equivalent activity: a bare point source of it would give the output that was measured
	Content = "content" // what the source holds, more than what comes out
)

// perDecay turns photons per decay into photons per GBq s and cm2 at 1 m.
const perDecay = 1e9 / (4 * math.Pi * 1e4)

// Sealed gives the spectrum of s, which must be normalised and validated, per
// GBq s of what s.Basis names, at 1 m without the air and outside any
// collimator.
//
// With basis output (also when empty) the activity is the equivalent activity:
// the working lines count in full, with the ratios that the nuclide has bare,
// and what lies under the cut-off is stopped by the capsule. The true beam is
// slightly harder, for the source keeps more of its soft lines: the error is
// in the soft lines alone, outward for a boundary.
//
// With basis content the lines are weakened by the source's own metal and by
// the nuclide's steel capsule, energy by energy: the source is a sphere of
// SizeMM/sqrt(2), which has the mean chord of a cylinder as high as wide with
// the diagonal SizeMM, and a ray starts anywhere in it.
//
// The bremsstrahlung of beta particles is added where it counts; see
// bremsstrahlung. It errs on an unknown nuclide or basis, on one that is for
// checks only, and on sizes outside 0.1 to 15 mm.
func Sealed(s plan.Sealed) (Spectrum, error) {
	n, err := NuclideByName(s.Nuclide)
	if err != nil {
		return Spectrum{}, err
	}
	switch {
	case !n.Shots:
		return Spectrum{}, fmt.Errorf("nuclide %q is kept for checks only: want Ir-192, Se-75, Co-60, Yb-169 or Tm-170", s.Nuclide)
	case !(s.SizeMM >= 0.1 && s.SizeMM <= 15):
		return Spectrum{}, fmt.Errorf("source size \"%g\" mm is outside 0.1 to 15", s.SizeMM)
	}
	switch s.Basis {
	case "", Output:
		return n.Output(s.SizeMM), nil
	case Content:
		return n.content(s.SizeMM), nil
	}
	return Spectrum{}, fmt.Errorf("basis %q is unknown: want %s or %s", s.Basis, Output, Content)
}

// Bare gives the lines of n above its cut-off per GBq s at 1 m, nothing
// weakened and no bremsstrahlung: what rate constants mean.
func (n Nuclide) Bare() Spectrum {
	var s Spectrum
	for _, l := range n.Lines {
		if l.KeV >= n.CutoffKeV {
			s.push(l.KeV, 0, l.Yield*perDecay)
		}
	}
	return s
}

// Output is the spectrum of a source of n for basis output, per GBq s at 1 m;
// sizeMM, 0 for a point, matters only where betas make bremsstrahlung. The bremsstrahlung leaves a metal
// that weakens its soft end more than the lines to which the activity refers.
func (n Nuclide) Output(sizeMM float64) Spectrum {
	s := n.Bare()
	if n.beta == nil {
		return s
	}
	b := n.escaped(n.beta(), sizeMM)
	reference := n.escaped(s, sizeMM).KermaMGy() / s.KermaMGy()
	for i := range b.PerCM2 {
		b.PerCM2[i] *= perDecay / reference
	}
	return merged(s, b)
}

// content is the spectrum for basis content.
func (n Nuclide) content(sizeMM float64) Spectrum {
	s := n.escaped(n.Bare(), sizeMM)
	if n.beta != nil {
		b := n.escaped(n.beta(), sizeMM)
		for i := range b.PerCM2 {
			b.PerCM2[i] *= perDecay
		}
		s = merged(s, b)
	}
	return s.Through(steel(), n.CapsuleSteelMM)
}

// escaped is s behind the source's own metal.
func (n Nuclide) escaped(s Spectrum, sizeMM float64) Spectrum {
	out := Spectrum{s.KeV, s.WidthKeV, make([]float64, len(s.KeV))}
	radius := sizeMM / math.Sqrt2 / 2
	for i, e := range s.KeV {
		out.PerCM2[i] = s.PerCM2[i] * escape(n.metal.MuPerMM(e)*radius)
	}
	return out
}

// escape is the share of the photons of an evenly active sphere that leaves
// it unhindered; x is its radius in mean free paths.
func escape(x float64) float64 {
	if x < 1e-2 {
		return 1 - 0.75*x + 0.4*x*x
	}
	return 3 / (8 * x * x * x) * (2*x*x - 1 + (1+2*x)*math.Exp(-2*x))
}

func merged(a, b Spectrum) Spectrum {
	order := make([]int, 0, a.Len()+b.Len())
	all := Spectrum{slices.Concat(a.KeV, b.KeV), slices.Concat(a.WidthKeV, b.WidthKeV), slices.Concat(a.PerCM2, b.PerCM2)}
	for i := range all.KeV {
		order = append(order, i)
	}
	slices.SortStableFunc(order, func(i, j int) int {
		switch {
		case all.KeV[i] < all.KeV[j]:
			return -1
		case all.KeV[i] > all.KeV[j]:
			return 1
		}
		return 0
	})
	var out Spectrum
	for _, i := range order {
		out.push(all.KeV[i], all.WidthKeV[i], all.PerCM2[i])
	}
	return out
}

func steel() *materials.Material { return must(materials.Lookup("Fe")) }
