package gen

import (
	"bufio"
	"bytes"
	"fmt"
	"os"
	"path/filepath"
	"strconv"
	"strings"
)

// inputs are the files read, in the order of the provenance record.
var inputs = []string{"XCOM_CrossSections.dat", "EADL97_KShellConstants.dat", "KShellRates.dat", "BindingEnergies.dat"}

// Columns of XCOM_CrossSections.dat: keV, then cm2/g.
const (
	colKeV = iota
	colCoherent
	colIncoherent
	colSum
	colPhoto
	colPair
	colTotal
	columns
)

// rows gives the numbers of every scan ("#S n name") of a file, keyed by n.
func rows(data []byte) (map[int][][]float64, error) {
	scans := map[int][][]float64{}
	scan := 0
	lines := bufio.NewScanner(bytes.NewReader(data))
	lines.Buffer(nil, 1<<20)
	for n := 1; lines.Scan(); n++ {
		line := strings.TrimSpace(lines.Text())
		switch {
		case strings.HasPrefix(line, "#S"):
			var err error
			if scan, err = strconv.Atoi(strings.Fields(line)[1]); err != nil {
				return nil, fmt.Errorf("line %d: scan %q is no number", n, line)
			}
		case line == "" || line[0] == '#':
		default:
			var row []float64
			for _, f := range strings.Fields(line) {
				v, err := strconv.ParseFloat(f, 64)
				if err != nil {
					return nil, fmt.Errorf("line %d: %q is no number", n, f)
				}
				row = append(row, v)
			}
			scans[scan] = append(scans[scan], row)
		}
	}
	return scans, lines.Err()
}

// byZ gives the rows of a file's first scan keyed by their first column, Z.
func byZ(data []byte) (map[int][]float64, error) {
	scans, err := rows(data)
	if err != nil {
		return nil, err
	}
	m := map[int][]float64{}
	for _, r := range scans[1] {
		m[int(r[0])] = r
	}
	return m, nil
}

// readInputs gives the files by name.
func readInputs(dir string) (map[string][]byte, error) {
	m := map[string][]byte{}
	for _, name := range inputs {
		data, err := os.ReadFile(filepath.Join(dir, name))
		if err != nil {
			return nil, fmt.Errorf("%w (apt-get install python-fisx-common)", err)
		}
		m[name] = data
	}
	return m, nil
}
