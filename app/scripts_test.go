//go:build linux

package main

import (
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
)

// shell runs a line of bash with lib.sh sourced in and the given environment.
func shell(t *testing.T, line string, env ...string) (string, error) {
	t.Helper()
	lib, err := filepath.Abs("lib.sh")
	if err != nil {
		t.Fatal(err)
	}
	bash, err := exec.LookPath("bash")
	if err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command(bash, "-c", ". '"+lib+"'; "+line)
	cmd.Env = env
	out, err := cmd.CombinedOutput()
	return string(out), err
}

// fakes puts commands of our own first on PATH.
func fakes(t *testing.T, scripts map[string]string) string {
	t.Helper()
	dir := t.TempDir()
	for name, body := range scripts {
		if err := os.WriteFile(filepath.Join(dir, name), []byte("#!/bin/sh\n"+body+"\n"), 0o755); err != nil {
			t.Fatal(err)
		}
	}
	return "PATH=" + dir + ":" + os.Getenv("PATH")
}

func TestScriptsRefuseOldGo(t *testing.T) {
	path := fakes(t, map[string]string{"go": "echo go1.21.5"})
	out, err := shell(t, "check_go", path, "HOME="+t.TempDir())
	if err == nil || !strings.Contains(out, "Go 1.21.5 is too old: Halfvalue needs Go 1.26 or newer") {
		t.Fatalf("got %v, %q", err, out)
	}
}

func TestScriptsTakeNewerGo(t *testing.T) {
	for _, version := range []string{"go1.26", "go1.26.8", "go1.27rc1", "go1.100.0"} {
		path := fakes(t, map[string]string{"go": "echo " + version})
		if out, err := shell(t, "check_go; echo fine", path, "HOME="+t.TempDir()); err != nil || out != "fine\n" {
			t.Errorf("%s: got %v, %q", version, err, out)
		}
	}
}

func TestScriptsWorkWithoutHome(t *testing.T) {
	out, err := shell(t, `[ -n "$HOME" ] && [ -w "$HOME" ] && echo fine`, "PATH="+os.Getenv("PATH"))
	if err != nil || out != "fine\n" {
		t.Fatalf("got %v, %q", err, out)
	}
}

// With neither root nor sudo the message names what is missing.
func TestScriptsNameWhatTheyCannotInstall(t *testing.T) {
	path := fakes(t, map[string]string{
		"id":         "echo 1000",
		"sudo":       "exit 1",
		"dpkg-query": "exit 1",
	})
	out, err := shell(t, "want first-package second-package </dev/null", path, "HOME="+t.TempDir())
	if err == nil || !strings.Contains(out, "apt-get install --no-install-recommends first-package second-package") {
		t.Fatalf("got %v, %q", err, out)
	}
}

// When everything is there, nothing is asked of the network.
func TestScriptsInstallNothingTwice(t *testing.T) {
	path := fakes(t, map[string]string{
		"dpkg-query": "echo installed",
		"apt-get":    "echo must not run; exit 1",
	})
	out, err := shell(t, "want first-package", path, "HOME="+t.TempDir())
	if err != nil || out != "" {
		t.Fatalf("got %v, %q", err, out)
	}
}

func TestScriptsInstallAsRoot(t *testing.T) {
	path := fakes(t, map[string]string{
		"id":         "echo 0",
		"dpkg-query": `case "$3" in second) echo installed;; *) exit 1;; esac`,
		"apt-get":    `echo "apt-get $*" >&2`,
	})
	out, err := shell(t, "want first second; cat $build/apt.log", path, "HOME="+t.TempDir())
	if err != nil || !strings.Contains(out, "install -y -qq --no-install-recommends first") || strings.Contains(out, "recommends first second") {
		t.Fatalf("got %v, %q", err, out)
	}
	if !strings.Contains(out, "update") {
		t.Fatalf("the lists were not updated first: %q", out)
	}
}
