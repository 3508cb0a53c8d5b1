package gen

import (
	"bytes"
	"compress/gzip"
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
)

// provenance is the record beside the table.
type provenance struct {
	Package   string            `json:"package"` // Debian package and version
	Source    string            `json:"source"`
	Inputs    map[string]string `json:"inputsSHA256"`
	Generator string            `json:"generator"`
	Table     string            `json:"tableSHA256"` // of the text inside xcom.txt.gz
	Error     string            `json:"error"`
}

// Run reads the package's files in the directory in and writes table and record
// into out; with check it writes nothing and fails where they differ.
func Run(in, out string, check bool) error {
	files, err := readInputs(in)
	if err != nil {
		return err
	}
	text, err := table(files)
	if err != nil {
		return err
	}
	if check {
		return compare(out, files, text)
	}
	version, err := exec.Command("dpkg-query", "-W", "-f", "${Package} ${Version}", "python-fisx-common").Output()
	if err != nil {
		return fmt.Errorf("dpkg-query does not know the package of %s: %w", in, err)
	}
	p := provenance{
		Package:   strings.TrimSpace(string(version)),
		Source:    "NIST XCOM (Berger and Hubbell, NBSIR 87-3597), EADL97 (UCRL-50400 vol. 30), K rates of Scofield (Phys. Rev. A 9, 1041), binding energies of Larkins (At. Data Nucl. Data Tables 20, 311); public domain",
		Inputs:    map[string]string{},
		Generator: "go run materials/gen/main.go",
		Table:     sum([]byte(text)),
		Error:     "none added: figures are the input's decimals",
	}
	for name, data := range files {
		p.Inputs[name] = sum(data)
	}
	return write(out, text, p)
}

func write(out, text string, p provenance) error {
	var packed bytes.Buffer
	w, err := gzip.NewWriterLevel(&packed, gzip.BestCompression)
	if err != nil {
		return err
	}
	if _, err := io.WriteString(w, text); err != nil {
		return err
	}
	if err := w.Close(); err != nil {
		return err
	}
	if err := os.WriteFile(filepath.Join(out, "xcom.txt.gz"), packed.Bytes(), 0o644); err != nil {
		return err
	}
	record, err := json.MarshalIndent(p, "", " ")
	if err != nil {
		return err
	}
	return os.WriteFile(filepath.Join(out, "provenance.json"), append(record, '\n'), 0o644)
}

// compare holds the input and a table made from it against the files kept in
// dir. The compressed bytes may differ between Go releases, so it is the text
// that counts.
func compare(dir string, files map[string][]byte, text string) error {
	p, have, err := kept(dir)
	if err != nil {
		return err
	}
	for _, name := range inputs {
		if got := sum(files[name]); got != p.Inputs[name] {
			return fmt.Errorf("%s has SHA-256 %s, the table was made from %s", name, got, p.Inputs[name])
		}
	}
	if have != text {
		return fmt.Errorf("xcom.txt.gz differs from what the generator makes of %s", p.Package)
	}
	return nil
}

// kept reads the table in dir and its record, which must agree.
func kept(dir string) (p provenance, text string, err error) {
	record, err := os.ReadFile(filepath.Join(dir, "provenance.json"))
	if err != nil {
		return p, "", err
	}
	if err := json.Unmarshal(record, &p); err != nil {
		return p, "", fmt.Errorf("provenance.json: %w", err)
	}
	data, err := unpack(filepath.Join(dir, "xcom.txt.gz"))
	if err != nil {
		return p, "", err
	}
	if got := sum(data); got != p.Table {
		return p, "", fmt.Errorf("xcom.txt.gz holds text with SHA-256 %s, provenance.json says %s", got, p.Table)
	}
	return p, string(data), nil
}

func unpack(path string) ([]byte, error) {
	f, err := os.Open(path)
	if err != nil {
		return nil, err
	}
	defer f.Close()
	r, err := gzip.NewReader(f)
	if err != nil {
		return nil, err
	}
	return io.ReadAll(r)
}

func sum(data []byte) string {
	h := sha256.Sum256(data)
	return hex.EncodeToString(h[:])
}
