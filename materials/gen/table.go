package gen

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
)

// The table keeps 1 keV to 20 MeV; the nodes up to this energy stay so that
// the last interval bends as it should.
const (
	firstKeV = 1
	lastKeV  = 26000
	maxZ     = 92
)

// table writes the text that is embedded; its format is described in
// materials/xcom.go. Every figure is the decimal of the input, so nothing is
// lost to rounding.
func table(files map[string][]byte) (string, error) {
	xcom, err := rows(files["XCOM_CrossSections.dat"])
	if err != nil {
		return "", fmt.Errorf("XCOM_CrossSections.dat: %w", err)
	}
	facts := map[string]map[int][]float64{}
	for _, name := range inputs[1:] {
		if facts[name], err = byZ(files[name]); err != nil {
			return "", fmt.Errorf("%s: %w", name, err)
		}
	}
	var b strings.Builder
	b.WriteString("halfvalue cross sections 1\n")
	for z := 1; z <= maxZ; z++ {
		nodes, err := clean(z, xcom[z])
		if err != nil {
			return "", err
		}
		bind := facts["BindingEnergies.dat"][z]
		writeRow(&b, "Z", float64(z), facts["EADL97_KShellConstants.dat"][z][1], bind[1], bind[2], bind[3], bind[4])
		rate := facts["KShellRates.dat"][z] // Z TOTAL KL2 KL3 KM2 KM3 KN2 KN3 KO KP
		writeRow(&b, "K", rate[3], rate[2], rate[5], rate[4], rate[6]+rate[7], rate[8]+rate[9])
		// Binding energies of the shells that the lines start from: L3 L2 M3 M2 N3 O3.
		writeRow(&b, "B", bind[4], bind[3], bind[7], bind[6], bind[12], bind[19])
		for _, r := range nodes {
			writeRow(&b, "", r[colKeV], r[colCoherent], r[colIncoherent], r[colPhoto], r[colPair])
		}
	}
	return b.String(), nil
}

// clean keeps the range of the table, drops nodes that stand twice without an
// edge between them, and puts the K edge of molybdenum, which the file rounds
// to 20 keV and prints twice, back to 19.9995 keV.
func clean(z int, rows [][]float64) ([][]float64, error) {
	var kept [][]float64
	for _, r := range rows {
		if len(r) != columns {
			return nil, fmt.Errorf("element %d has a row of %d columns, want %d", z, len(r), columns)
		}
		if r[colKeV] < firstKeV || r[colKeV] > lastKeV {
			continue
		}
		if n := len(kept); n > 0 {
			last := kept[n-1]
			if r[colKeV] < last[colKeV] {
				return nil, fmt.Errorf("element %d: energies fall from %g to %g keV", z, last[colKeV], r[colKeV])
			}
			if slices.Equal(r, last) {
				continue
			}
		}
		kept = append(kept, slices.Clone(r))
	}
	if z == 42 {
		for _, r := range kept {
			if r[colKeV] == 20 {
				r[colKeV] = 19.9995
			}
		}
	}
	return kept, nil
}

// writeRow writes a tag and numbers in their shortest decimal form.
func writeRow(b *strings.Builder, tag string, v ...float64) {
	b.WriteString(tag)
	for i, x := range v {
		if i > 0 || tag != "" {
			b.WriteByte(' ')
		}
		b.WriteString(strconv.FormatFloat(x, 'g', -1, 64))
	}
	b.WriteByte('\n')
}
