package materials

import (
	"encoding/json"
	"math"
	"os"
	"testing"
)

// published decodes a file of ../testdata.
func published(t *testing.T, name string, into any) {
	t.Helper()
	data, err := os.ReadFile("../testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, into); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
}

func lookup(t testing.TB, name string) *Material {
	t.Helper()
	m, err := Lookup(name)
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// off gives the relative difference of got from want.
func off(got, want float64) float64 { return math.Abs(got/want - 1) }

// TestMuRhoNIST holds mu/rho against NIST's tables: 0.3 % at every node, the
// tables themselves being printed to four figures.
func TestMuRhoNIST(t *testing.T) {
	var file struct {
		Rows []struct {
			Material, Side, Confidence string
			KeV, CM2PerG               float64
		}
	}
	published(t, "nist-mu-rho.json", &file)
	if len(file.Rows) < 90 {
		t.Fatalf("%d rows, want 90 or more", len(file.Rows))
	}
	var worst float64
	for _, r := range file.Rows {
		m := lookup(t, r.Material)
		keV := r.KeV
		if r.Side != "" {
			keV = nearEdge(t, m, keV, r.Side)
		}
		got := m.MuRho(keV)
		worst = max(worst, off(got, r.CM2PerG))
		if off(got, r.CM2PerG) > 0.003 {
			t.Errorf("%s at %g keV %s: %.5g cm2/g, NIST (%s) %.5g", r.Material, r.KeV, r.Side, got, r.Confidence, r.CM2PerG)
		}
	}
	t.Logf("%d rows, worst %.3f %%", len(file.Rows), 100*worst)
}

// nearEdge gives the energy on the wanted side of the material's edge nearest
// to keV; NIST prints some edges with a figure more than XCOM's arrays.
func nearEdge(t *testing.T, m *Material, keV float64, side string) float64 {
	t.Helper()
	for _, b := range table()[m.fractions[0].Z].interpolants().breaks {
		if off(b, keV) < 1e-4 {
			if side == "below" {
				return math.Nextafter(b, 0)
			}
			return b
		}
	}
	t.Fatalf("%s has no edge at %g keV", m.Name(), keV)
	return 0
}

// TestNodesExact holds every node of the embedded table, edges with both
// sides, against the look-up.
func TestNodesExact(t *testing.T) {
	for _, r := range table()[1:] {
		m := lookup(t, r.Symbol)
		for i, n := range r.nodes {
			keV := n.keV
			if keV > LastKeV {
				continue
			}
			if i+1 < len(r.nodes) && r.nodes[i+1].keV == keV {
				keV = math.Nextafter(keV, 0)
			}
			want := n.coherent + n.incoherent + n.photo + n.pair
			if got := m.MuRho(keV); off(got, want) > 1e-4 {
				t.Errorf("%s at %g keV: %.6g, table %.6g", r.Symbol, keV, got, want)
			}
			if got := m.MuRhoOf(Photoelectric, keV); off(got, n.photo) > 5e-7 {
				t.Errorf("%s at %g keV: photoelectric %.8g, table %.8g", r.Symbol, keV, got, n.photo)
			}
		}
	}
}
