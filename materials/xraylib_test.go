package materials

import (
	"math"
	"testing"
)

// xraylibRow is an element of testdata/xraylib-cs-total.json, which
// xraylib_check.py makes and the test command compares with xraylib itself.
type xraylibRow struct {
	Z                                 int
	Symbol                            string
	Weight, Density, KEdgeKeV, KYield float64
	KLinesKeV                         map[string]float64
	CM2PerG                           []float64
}

// xraylibFile is the whole of it.
type xraylibFile struct {
	KeV       []float64
	Elements  []xraylibRow
	Compounds []struct {
		Name    string
		Density float64
		Mass    map[int]float64 // by Z
	}
}

func xraylib(t *testing.T) (keV []float64, rows []xraylibRow) {
	t.Helper()
	var file xraylibFile
	published(t, "xraylib-cs-total.json", &file)
	if len(file.Elements) != MaxZ || len(file.KeV) < 50 {
		t.Fatalf("%d elements at %d energies, want %d at 50 or more", len(file.Elements), len(file.KeV), MaxZ)
	}
	return file.KeV, file.Elements
}

// outliers are the places where xraylib is further than 0.6 % away, and why.
// At molybdenum's edge, 19.9995 keV, xraylib gives the value below at 20 keV.
// For thulium and radon the node of the table next to the K edge does not fit
// the value at the edge; xraylib's spline swings there by up to 5 %, ours takes
// the short piece for itself. TestOutliersFollowNeighbours settles who is right.
var outliers = map[string][2]float64{ // symbol: from, to keV
	"Mo": {20, 20},
	"Tm": {64, 92},
	"Rn": {110, 165},
}

// TestMuRhoXraylib holds all elements against xraylib between the nodes.
func TestMuRhoXraylib(t *testing.T) {
	keV, rows := xraylib(t)
	var worst float64
	for _, r := range rows {
		m := lookup(t, r.Symbol)
		for i, e := range keV {
			d := off(m.MuRho(e), r.CM2PerG[i])
			if o, ok := outliers[r.Symbol]; ok && e >= o[0] && e <= o[1] {
				t.Logf("outlier %s at %g keV: %.4g, xraylib %.4g", r.Symbol, e, m.MuRho(e), r.CM2PerG[i])
				continue
			}
			worst = max(worst, d)
			if d > 0.006 {
				t.Errorf("%s at %g keV: %.5g, xraylib %.5g, off by %.2f %%", r.Symbol, e, m.MuRho(e), r.CM2PerG[i], 100*d)
			}
		}
	}
	t.Logf("worst %.2f %% but for the outliers", 100*worst)
}

// TestOutliersFollowNeighbours: the photoelectric effect per atom is smooth in
// Z, so a value that lies on the line between the neighbours is the better one.
func TestOutliersFollowNeighbours(t *testing.T) {
	keV, rows := xraylib(t)
	perAtom := func(z int, e float64) float64 {
		m := lookup(t, table()[z].Symbol)
		return math.Log(m.MuRho(e) * table()[z].AtomicWeight)
	}
	for _, symbol := range []string{"Tm", "Rn"} {
		z := zBySymbol()[symbol]
		var ours, theirs float64
		for i, e := range keV {
			if o := outliers[symbol]; e < o[0] || e > o[1] {
				continue
			}
			middle := (perAtom(z-1, e) + perAtom(z+1, e)) / 2
			ours = max(ours, math.Abs(perAtom(z, e)-middle))
			theirs = max(theirs, math.Abs(math.Log(rows[z-1].CM2PerG[i]*table()[z].AtomicWeight)-middle))
		}
		t.Logf("%s is off its neighbours' mean by up to %.4f, xraylib by %.4f", symbol, ours, theirs)
		if ours > 0.015 || ours > theirs {
			t.Errorf("%s is off its neighbours' mean by %.4f, xraylib by %.4f", symbol, ours, theirs)
		}
	}
}

// TestElementFactsXraylib holds weights, densities, edges, yields and lines,
// most of them from memory, against xraylib. xraylib rounds some weights, takes
// other isotopes of technetium and promethium, has 167.27 for thulium (168.93
// by IUPAC), graphite at 2.0 for carbon, and placeholders for astatine and
// francium, as NIST has others.
func TestElementFactsXraylib(t *testing.T) {
	_, rows := xraylib(t)
	otherDensity := map[string]bool{"C": true, "At": true, "Fr": true}
	otherWeight := map[string]bool{"Tc": true, "Pm": true, "Tm": true}
	for _, r := range rows {
		e, err := ElementBySymbol(r.Symbol)
		if err != nil || e.Z != r.Z {
			t.Fatalf("%s: %+v, %v", r.Symbol, e, err)
		}
		if off(e.AtomicWeight, r.Weight) > 0.0021 && !otherWeight[r.Symbol] {
			t.Errorf("%s: atomic weight %g, xraylib %g", r.Symbol, e.AtomicWeight, r.Weight)
		}
		if d := math.Abs(e.DensityGPerCM3 - r.Density); d > 0.0051*r.Density && d > 6e-6 && !otherDensity[r.Symbol] {
			t.Errorf("%s: density %g, xraylib %g", r.Symbol, e.DensityGPerCM3, r.Density)
		}
		if off(e.KEdgeKeV, r.KEdgeKeV) > 0.002 && math.Abs(e.KEdgeKeV-r.KEdgeKeV) > 0.003 {
			t.Errorf("%s: K edge %g keV, xraylib %g", r.Symbol, e.KEdgeKeV, r.KEdgeKeV)
		}
		if math.Abs(e.KYield-r.KYield) > 0.02 {
			t.Errorf("%s: K yield %g, xraylib %g", r.Symbol, e.KYield, r.KYield)
		}
		for _, line := range e.KLines {
			if want := r.KLinesKeV[line.Name]; want > 0 && off(line.KeV, want) > 0.001 && math.Abs(line.KeV-want) > 0.006 {
				t.Errorf("%s: line %s at %g keV, xraylib %g", r.Symbol, line.Name, line.KeV, want)
			}
		}
	}
}

// TestCatalogueNIST holds compositions against the list of materials that NIST
// publishes, as xraylib carries it, and densities against it within 10 %: the
// trade's grades differ (float glass, dense polyethylene), sand is loose.
func TestCatalogueNIST(t *testing.T) {
	var file xraylibFile
	published(t, "xraylib-cs-total.json", &file)
	if len(file.Compounds) < 16 {
		t.Fatalf("%d compounds, want 16 or more", len(file.Compounds))
	}
	for _, c := range file.Compounds {
		m := lookup(t, c.Name)
		if off(m.DensityGPerCM3(), c.Density) > 0.1 && c.Name != "sand" {
			t.Errorf("%s: density %g, NIST %g", c.Name, m.DensityGPerCM3(), c.Density)
		}
		if len(m.Fractions()) != len(c.Mass) {
			t.Errorf("%s: elements %v, NIST %v", c.Name, m.Fractions(), c.Mass)
		}
		for _, f := range m.Fractions() {
			if math.Abs(f.Mass-c.Mass[f.Z]) > 3e-4 {
				t.Errorf("%s: element %d is %.6f by mass, NIST %.6f", c.Name, f.Z, f.Mass, c.Mass[f.Z])
			}
		}
	}
}
