package transport

import (
	"fmt"
	"strings"

	"halfvalue/exposure/working"
)

// Step is the working of the scatter behind layers: the ratio of scattered to
// primary, each weighted by weight, whose name goes into the text ("air kerma",
// "film density per fluence").
func (x Exit) Step(layers []Layer, keV []float64, weight func(keV float64) float64, name string) working.Step {
	var primary, scattered, mean float64
	for i, e := range keV {
		primary += x.Primary[i] * weight(e)
	}
	for i, n := range x.Scatter {
		if n > 0 {
			v := n * weight(x.MeanKeV[i])
			scattered += v
			mean += v * x.MeanKeV[i]
		}
	}
	step := working.Step{
		ID: "transport.scatterToPrimary", Name: "scattered to primary, " + name, Symbol: "S/P",
		Formula: "S/P = sum over exit energies of scatter x weight / sum over input energies of primary x weight",
		Inputs: []working.Input{
			{Symbol: "x", Name: "layers", Text: layersText(layers)},
			{Symbol: "P", Name: "primary, weighted by " + name, Value: primary, Source: "narrow beam, NIST XCOM"},
			{Symbol: "S", Name: "scattered, weighted by " + name, Value: scattered, Source: TableID()},
			{Symbol: "dS", Name: "one sigma of the sampling", Value: 100 * x.RelErr, Unit: "%"},
		},
		Source: "photon Monte Carlo of package transport, compared with ANSI/ANS-6.4.3 build-up factors",
		Note:   "wide open field in contact: a narrower field or a gap to the detector gives less scatter, so the time errs short and the density high; electrons' bremsstrahlung is left out",
	}
	if primary > 0 {
		step.Value = scattered / primary
	}
	if scattered > 0 {
		step.Inputs = append(step.Inputs, working.Input{Symbol: "E", Name: "mean energy of the scattered photons, weighted", Value: mean / scattered, Unit: "keV"})
	}
	return step
}

// WallStep is the working of a wall: what share of name, such as "H*(10)", comes through.
func WallStep(l Layer, transmission float64, name string) working.Step {
	return working.Step{
		ID: "transport.broad", Name: "broad-beam transmission, " + name, Symbol: "T",
		Formula: "T = (primary + scattered behind the wall) / incident, each summed over energy with its weight",
		Inputs:  []working.Input{{Symbol: "x", Name: "wall along the ray", Text: layersText([]Layer{l})}},
		Value:   transmission,
		Source:  TableID(),
		Note:    "wide field, so the dose behind a narrow beam is less; past the table's last thickness the last slope stands, which is never too steep",
	}
}

func layersText(layers []Layer) string {
	var parts []string
	for _, l := range layers {
		parts = append(parts, fmt.Sprintf("%s %g mm", l.Material.Name(), l.MM))
	}
	return strings.Join(parts, " + ")
}
