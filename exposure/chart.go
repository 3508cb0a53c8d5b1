package exposure

import (
	"fmt"
	"math"
	"slices"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
)

// Chart is an exposure chart: the exposure for the plan's density (or signal to
// noise ratio) against the thickness of one layer, everything else as planned,
// a line for each kV or one for the nuclide.
type Chart struct {
	Layer    int         `json:"layer"` // index in part.layers whose thickness runs
	Material string      `json:"material"`
	SFDMM    float64     `json:"sfdMM"`
	Unit     string      `json:"unit"` // of Exposure: "mA min" or "GBq min"
	Lines    []ChartLine `json:"lines"`
}

// ChartLine is one line of a chart; the slices have one length and run by
// rising thickness. Thicknesses that do not fit before the film or take more
// than 24 h are left out.
type ChartLine struct {
	KV       float64   `json:"kv,omitzero"` // 0 with a sealed source
	Nuclide  string    `json:"nuclide,omitzero"`
	MM       []float64 `json:"mm"`
	Exposure []float64 `json:"exposure"` // mA min, or GBq min at the plan's time
	Seconds  []float64 `json:"seconds"`  // at the plan's current or activity
}

// ChartOf computes the chart of a plan for thicknesses mm (rising, 0.01 to 2000
// mm) of its thickest layer. kV names the lines of a tube; empty means the
// plan's, and with a sealed source it is not asked for. The plan need not be
// possible at all of them; errors are those of Reckon.
func ChartOf(p plan.Plan, cal Calibration, kV, mm []float64, opts ...Option) (Chart, error) {
	full, e, factor, err := ready(p, cal, opts)
	if err != nil {
		return Chart{}, err
	}
	if len(mm) == 0 || !slices.IsSorted(mm) || !(mm[0] >= 0.01 && mm[len(mm)-1] <= 2000) {
		return Chart{}, fmt.Errorf("thicknesses of a chart: want at least one, rising, 0.01 to 2000 mm")
	}
	c := Chart{Layer: thickest(full.Part.Layers), SFDMM: full.Setup.SFDMM, Unit: "GBq min"}
	c.Material = full.Part.Layers[c.Layer].Material
	if full.Source.Tube == nil {
		line, err := chartLine(full, e, factor, c.Layer, mm)
		line.Nuclide = full.Source.Sealed.Nuclide
		c.Lines = []ChartLine{line}
		return c, err
	}
	c.Unit = "mA min"
	if len(kV) == 0 {
		kV = []float64{full.Source.Tube.KV}
	}
	for _, v := range kV {
		if row, _ := plan.FieldAt("source.tube.kv"); !(v >= row.Min && v <= row.Max) {
			return Chart{}, fmt.Errorf("line of a chart: \"%g\" kV is outside %g to %g", v, row.Min, row.Max)
		}
		at := full.Clone()
		at.Source.Tube.KV = v
		line, err := chartLine(at, e, factor, c.Layer, mm)
		if err != nil {
			return Chart{}, err
		}
		line.KV = v
		c.Lines = append(c.Lines, line)
	}
	return c, nil
}

// ready validates and normalises what the entry points take.
func ready(p plan.Plan, cal Calibration, opts []Option) (plan.Plan, engine, float64, error) {
	var e engine
	for _, o := range opts {
		o(&e)
	}
	if err := p.ValidateFor(e.table().Names()); err != nil {
		return plan.Plan{}, e, 0, err
	}
	factor, err := cal.factor()
	full, _ := p.Normalised()
	return full, e, factor, err
}

func thickest(layers []plan.Layer) int {
	best := 0
	for i, l := range layers {
		if l.MM > layers[best].MM {
			best = i
		}
	}
	return best
}

func chartLine(p plan.Plan, e engine, factor float64, layer int, mm []float64) (ChartLine, error) {
	s, err := newShot(p, e)
	if err != nil {
		return ChartLine{}, err
	}
	var line ChartLine
	layers := slices.Clone(p.Part.Layers)
	for _, t := range mm {
		layers[layer].MM = t
		if depthMM(layers) >= p.Setup.SFDMM {
			break
		}
		f, err := s.behind(layers)
		if err != nil {
			return ChartLine{}, err
		}
		constant, err := s.receptor.wants(f.receptorRate)
		if err != nil {
			return ChartLine{}, err
		}
		seconds, ok := s.seconds(constant * factor)
		if !ok || !(seconds <= mostHours*3600) {
			break
		}
		line.MM = append(line.MM, t)
		line.Seconds = append(line.Seconds, seconds)
		line.Exposure = append(line.Exposure, s.strength*seconds/60)
	}
	return line, nil
}

// Spectra is the photons before and behind the part, per cm2 and second in the
// plane of the detector, by energy.
type Spectra struct {
	KeV      []float64 `json:"keV"`
	WidthKeV []float64 `json:"widthKeV"` // of the bin; 0 marks a line
	Before   []float64 `json:"before"`   // without the part, through the air
	After    []float64 `json:"after"`    // unscattered, behind the part

	ScatterEdgesKeV []float64 `json:"scatterEdgesKeV"` // one more than Scatter
	ScatterKeV      []float64 `json:"scatterKeV"`      // mean energy in the bin
	Scatter         []float64 `json:"scatter"`         // scattered in the part
}

// SpectraOf gives the spectra of a plan for its sheets. Contents are per bin,
// not per keV. Errors are those of Reckon.
func SpectraOf(p plan.Plan, opts ...Option) (Spectra, error) {
	full, e, _, err := ready(p, Calibration{}, opts)
	if err != nil {
		return Spectra{}, err
	}
	s, err := newShot(full, e)
	if err != nil {
		return Spectra{}, err
	}
	stack, err := stackOf(full.Part.Layers)
	if err != nil {
		return Spectra{}, err
	}
	on := s.at(depthMM(full.Part.Layers))
	exit, err := transport.Slab(stack, on.KeV, on.PerCM2)
	if err != nil {
		return Spectra{}, fmt.Errorf("part: %w", err)
	}
	k := s.square()
	return Spectra{KeV: on.KeV, WidthKeV: on.WidthKeV, Before: scaled(s.at(0).PerCM2, k), After: scaled(exit.Primary, k),
		ScatterEdgesKeV: exit.EdgesKeV, ScatterKeV: exit.MeanKeV, Scatter: scaled(exit.Scatter, k)}, nil
}

func scaled(x []float64, k float64) []float64 {
	out := make([]float64, len(x))
	for i, v := range x {
		if out[i] = v * k; math.IsNaN(out[i]) || out[i] < 0 {
			out[i] = 0
		}
	}
	return out
}
