package materials

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	goparser "go/parser"
	"go/token"
	"io"
	"os"
	"strconv"
	"strings"
	"testing"
)

// TestProvenance: the embedded table is the one that the record beside it
// describes. That the generator makes it from its inputs is materials/gen's test.
func TestProvenance(t *testing.T) {
	record, err := os.ReadFile("data/provenance.json")
	if err != nil {
		t.Fatal(err)
	}
	var p struct {
		Package, Source, Generator, Error string
		InputsSHA256                      map[string]string
		TableSHA256                       string
	}
	if err := json.Unmarshal(record, &p); err != nil {
		t.Fatal(err)
	}
	if !strings.HasPrefix(p.Package, "python-fisx-common ") || p.Source == "" || p.Generator == "" || p.Error == "" || len(p.InputsSHA256) != 4 {
		t.Errorf("the record is not whole: %+v", p)
	}
	r, err := gzip.NewReader(bytes.NewReader(xcomGZ))
	if err != nil {
		t.Fatal(err)
	}
	text, err := io.ReadAll(r)
	if err != nil {
		t.Fatal(err)
	}
	if sum := sha256.Sum256(text); hex.EncodeToString(sum[:]) != p.TableSHA256 {
		t.Errorf("the embedded table has SHA-256 %x, the record says %s", sum, p.TableSHA256)
	}
	if n := len(xcomGZ) + len(catalogueJSON) + len(elementsJSON) + len(muEnAirJSON); n > 1<<20 {
		t.Errorf("%d bytes are embedded, want under 1 MB", n)
	}
}

func pack(t *testing.T, text string) []byte {
	t.Helper()
	var b bytes.Buffer
	w := gzip.NewWriter(&b)
	if _, err := io.WriteString(w, text); err != nil {
		t.Fatal(err)
	}
	if err := w.Close(); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

func TestTableRefused(t *testing.T) {
	for text, want := range map[string]string{
		"another format\n":                                   "unknown format",
		"halfvalue cross sections 1\n":                       "element 1 is missing",
		"halfvalue cross sections 1\n1 2 3 4 5\n":            "unknown line",
		"halfvalue cross sections 1\nZ 93 0 0 0 0 0\n":       "unknown line",
		"halfvalue cross sections 1\nZ 1 0 0 0 0 0\n1 2 3\n": "unknown line",
		"halfvalue cross sections 1\nZ 1 0 0 x 0 0\n":        "is no number",
	} {
		if _, err := parseTable(pack(t, text)); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %v, want %q", text, err, want)
		}
	}
	if _, err := parseTable([]byte("plain")); err == nil {
		t.Error("text that is not compressed is taken")
	}
	if _, err := parseTable(xcomGZ[:len(xcomGZ)/2]); err == nil {
		t.Error("half a table is taken")
	}
}

// TestImports: the facts of matter stand alone; nothing of ours, no screen, no
// database and no network may come in.
func TestImports(t *testing.T) {
	files, err := os.ReadDir(".")
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range files {
		if !strings.HasSuffix(f.Name(), ".go") || strings.HasSuffix(f.Name(), "_test.go") {
			continue
		}
		parsed, err := goparser.ParseFile(token.NewFileSet(), f.Name(), nil, goparser.ImportsOnly)
		if err != nil {
			t.Fatal(err)
		}
		for _, i := range parsed.Imports {
			path, _ := strconv.Unquote(i.Path.Value)
			first, _, _ := strings.Cut(path, "/")
			if strings.Contains(first, ".") || first == "halfvalue" || first == "net" {
				t.Errorf("%s imports %q", f.Name(), path)
			}
		}
	}
}
