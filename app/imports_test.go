package main

import (
	"go/build"
	"io/fs"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// forbidden lists what a package and those below it must not import, and why.
var forbidden = []struct{ under, imported, why string }{
	{"materials", "gioui.org", "facts of matter know no screen"},
	{"materials", "go.etcd.io/bbolt", "facts of matter know no disk"},
	{"materials", "halfvalue/", "facts of matter import nothing of ours"},
	{"exposure", "gioui.org", "the physics knows no screen"},
	{"exposure", "go.etcd.io/bbolt", "the physics knows no disk"},
	{"exposure", "halfvalue/logbook", "the physics knows no book"},
	{"exposure", "os", "the physics is pure"},
	{"logbook", "gioui.org", "the book knows no screen"},
	{"logbook", "halfvalue/exposure", "the book knows entries, not physics"},
	{"app/desk", "gioui.org", "the state builds and tests without a screen"},
	{"app/desk", "gioui.org/app", "only package main opens a window"},
	{"app/drafting", "gioui.org/app", "only package main opens a window"},
	{"app/touch", "gioui.org/app", "only package main opens a window"},
	{"app/sheet", "gioui.org/app", "only package main opens a window"},
	{"app/sheet", "gioui.org/gpu/headless", "headless drawing needs C"},
}

// mayCross are folders whose packages are generators or proofs, not the program.
func mayCross(dir string) bool {
	return strings.Contains(dir, "/internal/") || strings.Contains(dir, "/gen")
}

func TestImportsPointOneWay(t *testing.T) {
	for _, f := range forbidden {
		seen := 0
		for _, dir := range folders(t, filepath.Join("..", f.under)) {
			p, err := build.ImportDir(dir, 0)
			if err != nil || mayCross(filepath.ToSlash(dir)) || p.Name == "main" {
				continue
			}
			seen++
			for _, imp := range p.Imports {
				if matches(imp, f.imported) && !(f.under == "materials" && strings.HasPrefix(imp, "halfvalue/materials")) {
					t.Errorf("%s imports %s: %s", dir, imp, f.why)
				}
			}
		}
		if seen == 0 {
			t.Errorf("no package under %s was looked at", f.under)
		}
	}
}

// matches says whether an import is the named package or one below it.
func matches(imp, name string) bool {
	return imp == name || strings.HasPrefix(imp, strings.TrimSuffix(name, "/")+"/")
}

func folders(t *testing.T, root string) []string {
	t.Helper()
	var out []string
	err := filepath.WalkDir(root, func(p string, d fs.DirEntry, err error) error {
		if err == nil && d.IsDir() && d.Name() != "testdata" {
			out = append(out, p)
		}
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// Nothing may bring in net: on Android it adds the INTERNET permission to an
// app that promises to work without a network and to ask for none.
func TestNoNetOnAndroid(t *testing.T) {
	cmd := exec.Command("go", "list", "-deps", "-f", "{{.ImportPath}}", ".")
	cmd.Env = append(cmd.Environ(), "GOOS=android", "GOARCH=arm64", "CGO_ENABLED=1")
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("go list: %v", err)
	}
	deps := strings.Fields(string(out))
	if len(deps) < 50 {
		t.Fatalf("only %d packages listed", len(deps))
	}
	for _, d := range deps {
		if d == "net" {
			t.Fatal("package net is linked into the Android app")
		}
	}
}
