package main

import (
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"text/tabwriter"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// tableCmd groups the tables.
type tableCmd struct {
	Mu  muCmd  `cmd:"" help:"Mass and linear attenuation of a material."`
	HVL hvlCmd `cmd:"" name:"hvl" help:"Half-value layers and output of a tube beam or a nuclide."`
}

// muCmd is "table mu MATERIAL --kev 60,100".
type muCmd struct {
	Material string   `arg:"" help:"Catalogue name or element symbol."`
	KeV      []string `name:"kev" required:"" help:"Photon energies in keV, 1 to 20000, comma between."`
	JSON     bool     `name:"json" help:"Answer in JSON."`
}

// muRow is one energy of the table.
type muRow struct {
	KeV          float64 `json:"keV"`
	MuRhoCm2PerG float64 `json:"muRhoCm2PerG"`
	MuPerMM      float64 `json:"muPerMM"`
}

// Run prints keV, mu/rho in cm2/g and mu in 1/mm.
func (c *muCmd) Run(e *env) error {
	m, err := materials.Lookup(c.Material)
	if err != nil {
		return err
	}
	rows := make([]muRow, 0, len(c.KeV))
	for _, text := range c.KeV {
		keV, err := number("--kev", text, materials.FirstKeV, materials.LastKeV, "keV")
		if err != nil {
			return err
		}
		rows = append(rows, muRow{keV, m.MuRho(keV), m.MuPerMM(keV)})
	}
	if c.JSON {
		return printJSON(e.out, rows)
	}
	w := tabwriter.NewWriter(e.out, 0, 8, 2, ' ', tabwriter.AlignRight)
	fmt.Fprintf(w, "keV\tmu/rho cm2/g\tmu 1/mm\t\n")
	for _, r := range rows {
		fmt.Fprintf(w, "%g\t%.5g\t%.5g\t\n", r.KeV, r.MuRhoCm2PerG, r.MuPerMM)
	}
	return w.Flush()
}

// hvlCmd is "table hvl --kv 200 --filter Al=4,Cu=2 --in Cu" or
// "table hvl --nuclide Ir-192 --in Pb".
type hvlCmd struct {
	KV      float64  `name:"kv" help:"Peak tube voltage in kV, 20 to 450." xor:"source"`
	Nuclide string   `help:"Sealed source instead of a tube: Ir-192, Se-75, Co-60, Yb-169, Tm-170, Cs-137." xor:"source"`
	Filter  []string `help:"The whole filtration, ordered from the target outward, as MATERIAL=MM with a comma between; nothing is hidden, materials may repeat." placeholder:"Al=4,Cu=2"`
	In      string   `required:"" help:"Material whose half-value layers are wanted."`
	Anode   float64  `default:"20" help:"Anode angle in degrees, 5 to 45."`
	Target  string   `default:"W" help:"Tube target: W, Mo, Cu, Rh, Cr or Au."`
	Wave    string   `name:"waveform" default:"constant" help:"constant, two-pulse or self-rectified."`
	JSON    bool     `name:"json" help:"Answer in JSON."`
}

// hvlRow is the answer; one of the two outputs is given.
type hvlRow struct {
	MeanKeV              float64  `json:"meanKeV"`
	HVL1MM               float64  `json:"hvl1MM"`
	HVL2MM               float64  `json:"hvl2MM"`
	KermaMGyPerMAMinAt1m *float64 `json:"kermaMGyPerMAMinAt1m,omitempty"`
	KermaMGyPerGBqHAt1m  *float64 `json:"kermaMGyPerGBqHAt1m,omitempty"`
	OutputSpreadPercent  float64  `json:"outputSpreadPercent"`
}

// Run prints mean energy, narrow-beam air-kerma half-value layers and the air
// kerma at 1 m, behind 1 m of dry air.
func (c *hvlCmd) Run(e *env) error {
	in, err := materials.Lookup(c.In)
	if err != nil {
		return fmt.Errorf("--in: %w", err)
	}
	filters, err := parseFilters(c.Filter)
	if err != nil {
		return err
	}
	s, perStrength, err := c.spectrum(filters)
	if err != nil {
		return err
	}
	s = s.InAir(beam.AirPathMM)
	row := hvlRow{MeanKeV: s.MeanKeV()}
	row.HVL1MM, row.HVL2MM = s.HVL(in)
	output := s.KermaMGy() * perStrength
	unit := "mGy/(mA min)"
	if c.Nuclide != "" {
		row.KermaMGyPerGBqHAt1m, unit = &output, "mGy/(GBq h)"
		row.OutputSpreadPercent = 100 * beam.SealedSpread(plan.Sealed{Nuclide: c.Nuclide, Basis: beam.Output})
	} else {
		row.KermaMGyPerMAMinAt1m = &output
		row.OutputSpreadPercent = 100 * beam.OutputSpread(plan.Tube{KV: c.KV, Target: c.Target, Waveform: c.Wave})
	}
	if c.JSON {
		return printJSON(e.out, row)
	}
	fmt.Fprintf(e.out, "mean energy  %.1f keV\nHVL1         %.4g mm %s\nHVL2         %.4g mm %s\nair kerma    %.4g %s at 1 m, stated spread +-%.0f %%\n",
		row.MeanKeV, row.HVL1MM, c.In, row.HVL2MM, c.In, output, unit, row.OutputSpreadPercent)
	return nil
}

// spectrum builds the beam and says how many of its unit strengths make the
// unit of the answer: 60 mA s in a mA min, 3600 GBq s in a GBq h.
func (c *hvlCmd) spectrum(filters []plan.Filter) (beam.Spectrum, float64, error) {
	if c.Nuclide != "" {
		n, err := beam.NuclideByName(c.Nuclide)
		if err != nil {
			return beam.Spectrum{}, 0, fmt.Errorf("--nuclide: %w", err)
		}
		s := n.Output(0)
		for _, f := range filters {
			m, err := materials.Lookup(f.Material)
			if err != nil {
				return beam.Spectrum{}, 0, fmt.Errorf("--filter: %w", err)
			}
			s = s.Through(m, f.MM)
		}
		return s, 3600, nil
	}
	if c.KV == 0 {
		return beam.Spectrum{}, 0, fmt.Errorf("table hvl: needs --kv or --nuclide, for example --kv 200 --filter Al=4 --in Cu")
	}
	if !(c.KV >= 20 && c.KV <= 450) {
		return beam.Spectrum{}, 0, fmt.Errorf("--kv: %q is out of range, allowed 20 to 450 kV", fmt.Sprint(c.KV))
	}
	if !(c.Anode >= 5 && c.Anode <= 45) {
		return beam.Spectrum{}, 0, fmt.Errorf("--anode: %q is out of range, allowed 5 to 45 deg", fmt.Sprint(c.Anode))
	}
	s, err := beam.Tube(plan.Tube{KV: c.KV, MA: 1, FocusMM: 1, Target: c.Target, AnodeDeg: c.Anode, Waveform: c.Wave, Filters: filters})
	return s, 60, err
}

// parseFilters reads "Al=4" items in order.
func parseFilters(items []string) ([]plan.Filter, error) {
	var out []plan.Filter
	for _, item := range items {
		name, text, ok := strings.Cut(item, "=")
		if !ok {
			return nil, fmt.Errorf("--filter: %q is not MATERIAL=MM, for example Al=4", item)
		}
		if _, err := materials.Lookup(name); err != nil {
			return nil, fmt.Errorf("--filter: %w", err)
		}
		mm, err := number("--filter "+name, text, 0, 100, "mm")
		if err != nil {
			return nil, err
		}
		out = append(out, plan.Filter{Material: name, MM: mm})
	}
	return out, nil
}

// number reads a figure of the command line between two limits.
func number(what, text string, least, most float64, unit string) (float64, error) {
	v, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
	if err != nil || math.IsNaN(v) || v < least || v > most {
		return 0, fmt.Errorf("%s: %q is not a figure from %g to %g %s", what, text, least, most, unit)
	}
	return v, nil
}

// printJSON writes v, indented, with a line end.
func printJSON(w io.Writer, v any) error {
	enc := json.NewEncoder(w)
	enc.SetIndent("", "  ")
	enc.SetEscapeHTML(false)
	return enc.Encode(v)
}
