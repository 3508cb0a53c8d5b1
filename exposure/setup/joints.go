package setup

import (
	"fmt"
	"math"

	"halfvalue/exposure/plan"
)

// Nozzle is a branch along +Z set on a run of pipe along Y, bored through. It
// is a Solid without welds and fillets.
type Nozzle struct{ Run, Branch Pipe }

var alongZ = Vec{0, 0, 1}

// far is longer than any part, mm.
const far = 1e6

// Spans implements Solid.
func (n Nozzle) Spans(r Ray) []Span {
	above := Slab{alongZ, 0, far}
	bore := Both{Cylinder{Axis: alongZ, Radius: n.Branch.Inner()}, above}
	branch := Both{Cylinder{Axis: alongZ, Radius: n.Branch.Outer()}, above}
	run := Cylinder{Axis: alongY, Radius: n.Run.Outer()}
	return Union{
		Minus{Minus{run, Cylinder{Axis: alongY, Radius: n.Run.Inner()}}, bore},
		Minus{Minus{branch, bore}, run},
	}.Spans(r)
}

// ExtremesMM approximates the weld of the branch by its two extreme paths: the
// metal on the rays from the source through the weld at the crown (on the side
// along the run, where it is highest) and at the flank (lowest), each followed
// beyondMM behind the weld. It errs on a branch wider than the run.
func (n Nozzle) ExtremesMM(source Vec, beyondMM float64) (crownMM, flankMM float64, err error) {
	rr, rb := n.Run.Outer(), n.Branch.Outer()
	if rb > rr {
		return 0, 0, fmt.Errorf("branch %v mm is wider than the run %v mm: want it at most as wide", n.Branch.ODMM, n.Run.ODMM)
	}
	through := func(p Vec) float64 {
		d := p.Sub(source)
		return ThroughMM(n, Ray{source, p.Add(d.Times(beyondMM / d.Len()))})
	}
	return through(Vec{Y: rb, Z: rr}), through(Vec{X: rb, Z: math.Sqrt((rr - rb) * (rr + rb))}), nil
}

// Flange is a disc on the end of a pipe along Y, from Y = 0 (its face) to
// DiscMM, where the pipe goes on. It is a Solid without hub and fillet.
type Flange struct {
	Pipe     Pipe
	DiscODMM float64
	DiscMM   float64
}

// Spans implements Solid.
func (f Flange) Spans(r Ray) []Span {
	disc := Both{Cylinder{Axis: alongY, Radius: f.DiscODMM / 2}, Slab{alongY, 0, f.DiscMM}}
	neck := Both{Cylinder{Axis: alongY, Radius: f.Pipe.Outer()}, Slab{alongY, 0, far}}
	return Minus{Union{disc, neck}, Cylinder{Axis: alongY, Radius: f.Pipe.Inner()}}.Spans(r)
}

// SectionMM is a place of a part with its thickness on the ray.
type SectionMM struct {
	Name string // "" for the part's own layers
	MM   float64
}

// Sections lists the part's own layers and its named sections, in the order of
// the plan, and the thinnest and thickest of them.
func Sections(p plan.Part) (list []SectionMM, thin, thick SectionMM) {
	list = append(list, SectionMM{MM: p.TotalMM()})
	for _, s := range p.Sections {
		list = append(list, SectionMM{s.Name, s.TotalMM()})
	}
	thin, thick = list[0], list[0]
	for _, s := range list {
		if s.MM < thin.MM {
			thin = s
		}
		if s.MM > thick.MM {
			thick = s
		}
	}
	return list, thin, thick
}
