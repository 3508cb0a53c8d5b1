package materials

import (
	"bytes"
	"compress/gzip"
	_ "embed"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"sync"
)

// xcomGZ is the table that materials/gen writes, text under gzip:
//
//	halfvalue cross sections 1
//	Z <z> <K yield> <K edge> <L1 edge> <L2 edge> <L3 edge>     keV
//	K <shares of KL3 KL2 KM3 KM2 KN KO>
//	B <binding energies of L3 L2 M3 M2 N3 O3>                 keV
//	<keV> <coherent> <incoherent> <photoelectric> <pair>      cm2/g, rising; an edge is two rows of one energy
//
//go:embed data/xcom.txt.gz
var xcomGZ []byte

// node is one energy of the table; the processes are in cm2/g.
type node struct{ keV, coherent, incoherent, photo, pair float64 }

// record is one element of the table.
type record struct {
	Element
	nodes  []node
	once   sync.Once
	curves *curves
	tables lazyGrids
}

// table gives the elements indexed by Z; index 0 is unused.
var table = sync.OnceValue(func() *[MaxZ + 1]*record {
	t, err := parseTable(xcomGZ)
	if err != nil {
		panic(fmt.Sprintf("materials: data/xcom.txt.gz does not decode: %v", err))
	}
	return t
})

func parseTable(packed []byte) (*[MaxZ + 1]*record, error) {
	r, err := gzip.NewReader(bytes.NewReader(packed))
	if err != nil {
		return nil, err
	}
	text, err := io.ReadAll(r)
	if err != nil {
		return nil, err
	}
	head, rest, _ := strings.Cut(string(text), "\n")
	if head != "halfvalue cross sections 1" {
		return nil, fmt.Errorf("unknown format %q", head)
	}
	t := new([MaxZ + 1]*record)
	var at *record
	for line := range strings.Lines(rest) {
		if at, err = parseLine(t, at, strings.TrimSuffix(line, "\n")); err != nil {
			return nil, err
		}
	}
	for z := 1; z <= MaxZ; z++ {
		if t[z] == nil || len(t[z].nodes) == 0 {
			return nil, fmt.Errorf("element %d is missing", z)
		}
		t[z].kShare()
	}
	return t, nil
}

// parseLine takes one line into the record at hand and gives the record that
// the next line belongs to.
func parseLine(t *[MaxZ + 1]*record, at *record, line string) (*record, error) {
	var tag string
	if line != "" && line[0] > '9' {
		tag, line, _ = strings.Cut(line, " ")
	}
	var v [6]float64
	n := 0
	for rest := line; rest != "" && n < len(v); n++ {
		var f string
		var err error
		f, rest, _ = strings.Cut(rest, " ")
		if v[n], err = strconv.ParseFloat(f, 64); err != nil {
			return nil, fmt.Errorf("%q is no number", f)
		}
	}
	switch {
	case tag == "Z" && n == 6 && v[0] >= 1 && v[0] <= MaxZ:
		f := elementFacts()[int(v[0])-1]
		at = &record{Element: Element{
			Z: f.Z, Symbol: f.Symbol, Name: f.Name, AtomicWeight: f.Weight, DensityGPerCM3: f.Density,
			KYield: v[1], KEdgeKeV: v[2], LEdgesKeV: [3]float64{v[3], v[4], v[5]},
		}}
		t[f.Z] = at
	case tag == "K" && n == 6 && at != nil:
		at.KLines = kLines(v)
	case tag == "B" && n == 6 && at != nil:
		at.lineEnergies(v)
	case tag == "" && n == 5 && at != nil:
		at.nodes = append(at.nodes, node{v[0], v[1], v[2], v[3], v[4]})
	default:
		return nil, fmt.Errorf("unknown line %q %q", tag, line)
	}
	return at, nil
}

// lineNames stand in the order of the K and B rows.
var lineNames = [6]string{"KL3", "KL2", "KM3", "KM2", "KN", "KO"}

// kLines gives the lines that have a share, their energies still open.
func kLines(shares [6]float64) []KLine {
	var sum float64
	for _, s := range shares {
		sum += s
	}
	var lines []KLine
	for i, s := range shares {
		if s > 0 {
			lines = append(lines, KLine{Name: lineNames[i], Share: s / sum})
		}
	}
	return lines
}

// lineEnergies takes the measured energy of a line where elements.json holds
// one, else the difference of the binding energies.
func (r *record) lineEnergies(binding [6]float64) {
	measured := elementFacts()[r.Z-1].Lines
	for i := range r.KLines {
		line := &r.KLines[i]
		for j, name := range lineNames {
			if name == line.Name {
				line.KeV = r.KEdgeKeV - binding[j]
			}
		}
		if keV, ok := measured[line.Name]; ok {
			line.KeV = keV
		}
	}
}

// kShare takes the K shell's share from the jump of the photoelectric effect.
func (r *record) kShare() {
	for i := range len(r.nodes) - 1 {
		below, above := r.nodes[i], r.nodes[i+1]
		if below.keV == above.keV && math.Abs(below.keV-r.KEdgeKeV) < 1e-3*r.KEdgeKeV {
			r.KShare = 1 - below.photo/above.photo
		}
	}
}

// edges gives the energies where the photoelectric effect jumps.
func (r *record) edges() []float64 {
	var e []float64
	for i := range len(r.nodes) - 1 {
		if r.nodes[i].keV == r.nodes[i+1].keV {
			e = append(e, r.nodes[i].keV)
		}
	}
	return e
}
