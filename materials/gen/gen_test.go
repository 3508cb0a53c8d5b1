package gen

import (
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

const (
	packageDir = "/usr/share/fisx" // of python-fisx-common, which the test command installs
	keptDir    = "../data"
)

// TestReproduces: the table kept in the tree is what the generator makes of
// the Debian package. On systems without the package (Windows, macOS) the kept
// table must still be the one that its record names.
func TestReproduces(t *testing.T) {
	_, err := os.Stat(packageDir)
	switch {
	case errors.Is(err, fs.ErrNotExist):
		p, text, err := kept(keptDir)
		if err != nil || len(text) < 200000 {
			t.Fatalf("kept table of %d bytes: %v", len(text), err)
		}
		t.Logf("no %s here: the table of %s was checked against its record only", packageDir, p.Package)
	case err != nil:
		t.Fatal(err)
	default:
		if err := Run(packageDir, keptDir, true); err != nil {
			t.Error(err)
		}
	}
}

// TestCheckCanFail: a changed table, a changed record and a changed input are
// each found.
func TestCheckCanFail(t *testing.T) {
	p, text, err := kept(keptDir)
	if err != nil {
		t.Fatal(err)
	}
	files := map[string][]byte{}
	for _, name := range inputs {
		files[name] = []byte(name)
		p.Inputs[name] = sum(files[name])
	}
	dir := t.TempDir()
	if err := write(dir, text, p); err != nil {
		t.Fatal(err)
	}
	if err := compare(dir, files, text); err != nil {
		t.Fatalf("an unchanged copy: %v", err)
	}
	if err := compare(dir, files, text+" "); err == nil || !strings.Contains(err.Error(), "differs") {
		t.Errorf("another table: %v", err)
	}
	files[inputs[2]] = []byte("changed")
	if err := compare(dir, files, text); err == nil || !strings.Contains(err.Error(), inputs[2]) {
		t.Errorf("another input: %v", err)
	}
	if err := write(dir, text+"1 1 1 1 1\n", p); err != nil {
		t.Fatal(err)
	}
	if _, _, err := kept(dir); err == nil || !strings.Contains(err.Error(), "SHA-256") {
		t.Errorf("a table that is not its record's: %v", err)
	}
	if err := Run(filepath.Join(dir, "nowhere"), dir, true); err == nil || !strings.Contains(err.Error(), "python-fisx-common") {
		t.Errorf("no input: %v", err)
	}
}

func TestRows(t *testing.T) {
	scans, err := rows([]byte("#F x\n\n#S 1 H\n#N 2\n1 2.5\n\n3 4E-1\n#S 12 Mg\n5 6\n"))
	if err != nil {
		t.Fatal(err)
	}
	if len(scans) != 2 || !slices.Equal(scans[1][1], []float64{3, 0.4}) || !slices.Equal(scans[12][0], []float64{5, 6}) {
		t.Errorf("got %v", scans)
	}
	for _, s := range []string{"#S x\n", "#S 1\n1 two\n"} {
		if _, err := rows([]byte(s)); err == nil {
			t.Errorf("%q is taken", s)
		}
	}
}

// TestClean: a node printed twice goes, an edge stays, the range is kept,
// molybdenum's edge moves, falling energies and short rows are refused.
func TestClean(t *testing.T) {
	row := func(keV, photo float64) []float64 { return []float64{keV, 1, 1, 2, photo, 0, 2 + photo} }
	got, err := clean(26, [][]float64{row(0.5, 9), row(1, 8), row(7, 1), row(7, 5), row(250, 2), row(250, 2), row(26000, 1), row(28000, 1)})
	if err != nil {
		t.Fatal(err)
	}
	var energies []float64
	for _, r := range got {
		energies = append(energies, r[colKeV])
	}
	if !slices.Equal(energies, []float64{1, 7, 7, 250, 26000}) {
		t.Errorf("energies %v", energies)
	}
	mo, err := clean(42, [][]float64{row(15, 8), row(20, 1), row(20, 5), row(20, 5), row(30, 2)})
	if err != nil || len(mo) != 4 || mo[1][colKeV] != 19.9995 || mo[2][colKeV] != 19.9995 {
		t.Errorf("molybdenum: %v, %v", mo, err)
	}
	if _, err := clean(26, [][]float64{row(5, 1), row(4, 1)}); err == nil {
		t.Error("falling energies are taken")
	}
	if _, err := clean(26, [][]float64{{1, 2}}); err == nil {
		t.Error("a short row is taken")
	}
}
