//go:build linux

package main

import (
	"bytes"
	"context"
	"fmt"
	"image"
	"image/png"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"
	"time"
)

// The real window, once, under a virtual X server with a real pointer: what
// no test through the input router can show. It needs Xvfb, xdotool and
// ImageMagick's import, which app/test.sh installs; without them it fails.

// display is a virtual X server of one test.
type display struct {
	t    *testing.T
	name string
}

// startDisplay starts Xvfb on a number that it picks itself.
func startDisplay(t *testing.T, size string) display {
	t.Helper()
	r, w, err := os.Pipe()
	if err != nil {
		t.Fatal(err)
	}
	cmd := exec.Command("Xvfb", "-displayfd", "3", "-screen", "0", size+"x24", "-nolisten", "tcp")
	cmd.ExtraFiles = []*os.File{w}
	if err := cmd.Start(); err != nil {
		t.Fatalf("Xvfb does not start: %v; app/test.sh installs it", err)
	}
	w.Close()
	t.Cleanup(func() { cmd.Process.Kill(); cmd.Wait() })
	buf := make([]byte, 16)
	n, err := r.Read(buf)
	if err != nil {
		t.Fatalf("Xvfb names no display: %v", err)
	}
	return display{t, ":" + strings.TrimSpace(string(buf[:n]))}
}

// run runs a command on the display and returns what it printed.
func (d display) run(name string, args ...string) (string, error) {
	ctx, cancel := context.WithTimeout(context.Background(), time.Minute)
	defer cancel()
	cmd := exec.CommandContext(ctx, name, args...)
	cmd.Env = append(os.Environ(), "DISPLAY="+d.name, "EGL_PLATFORM=")
	out, err := cmd.CombinedOutput()
	return string(out), err
}

// screenshot reads the whole screen.
func (d display) screenshot() image.Image {
	d.t.Helper()
	file := filepath.Join(d.t.TempDir(), "screen.png")
	if out, err := d.run("import", "-window", "root", file); err != nil {
		d.t.Fatalf("import: %v: %s", err, out)
	}
	data, err := os.ReadFile(file)
	if err != nil {
		d.t.Fatal(err)
	}
	img, err := png.Decode(bytes.NewReader(data))
	if err != nil {
		d.t.Fatal(err)
	}
	return img
}

// differing counts pixels of a that are off from b by more than 24 in a channel.
func differing(a, b image.Image) int {
	n := 0
	r := a.Bounds().Intersect(b.Bounds())
	for y := r.Min.Y; y < r.Max.Y; y++ {
		for x := r.Min.X; x < r.Max.X; x++ {
			if off(a, b, x, y) {
				n++
			}
		}
	}
	return n
}

func off(a, b image.Image, x, y int) bool {
	r1, g1, b1, _ := a.At(x, y).RGBA()
	r2, g2, b2, _ := b.At(x, y).RGBA()
	far := func(p, q uint32) bool { d := int(p>>8) - int(q>>8); return d > 24 || d < -24 }
	return far(r1, r2) || far(g1, g2) || far(b1, b2)
}

// buildProgram builds the command as the user gets it.
func buildProgram(t *testing.T) string {
	t.Helper()
	exe := filepath.Join(t.TempDir(), "halfvalue")
	out, err := exec.Command("go", "build", "-tags", "nowayland,novulkan", "-o", exe, ".").CombinedOutput()
	if err != nil {
		t.Fatalf("build: %v\n%s", err, out)
	}
	return exe
}

// wait polls until ok or the time is up.
func wait(t *testing.T, what string, ok func() bool) {
	t.Helper()
	for end := time.Now().Add(90 * time.Second); time.Now().Before(end); time.Sleep(200 * time.Millisecond) {
		if ok() {
			return
		}
	}
	t.Fatal("never happened: " + what)
}

// A dead display ends with the exit code that run.sh falls back on.
func TestNoWindowExitCode(t *testing.T) {
	exe := buildProgram(t)
	cmd := exec.Command(exe, "--data", t.TempDir())
	cmd.Env = append(os.Environ(), "DISPLAY=:9999")
	out, err := cmd.CombinedOutput()
	var exit *exec.ExitError
	if !asExit(err, &exit) || exit.ExitCode() != exitNoWindow {
		t.Fatalf("got %v with %q, want exit code %d", err, out, exitNoWindow)
	}
	if !strings.Contains(string(out), "window") {
		t.Fatalf("message %q does not speak of the window", out)
	}
}

func asExit(err error, to **exec.ExitError) bool {
	e, ok := err.(*exec.ExitError)
	*to = e
	return ok
}

// The window opens on the demo job, shows what the renderer draws without a
// display, and a real pointer moves it to the Book sheet and back.
func TestRealWindow(t *testing.T) {
	d := startDisplay(t, "1280x800")
	exe := buildProgram(t)
	dir := t.TempDir()
	cmd := exec.Command(exe, "--data", dir)
	cmd.Env = append(os.Environ(), "DISPLAY="+d.name, "EGL_PLATFORM=")
	var log bytes.Buffer
	cmd.Stdout, cmd.Stderr = &log, &log
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { cmd.Process.Kill(); cmd.Wait() })
	var id string
	wait(t, "a window named Halfvalue", func() bool {
		out, err := d.run("xdotool", "search", "--name", "^Halfvalue")
		id = strings.TrimSpace(strings.SplitN(out, "\n", 2)[0])
		return err == nil && id != ""
	})
	d.run("xdotool", "windowmove", id, "0", "0")
	d.run("xdotool", "windowsize", id, "1280", "800")
	var first image.Image
	wait(t, "a first frame with ink on it", func() bool { first = d.screenshot(); return inked(first) })
	time.Sleep(time.Second)
	first = d.screenshot()
	if keep := os.Getenv("HALFVALUE_KEEP"); keep != "" {
		saveTestPNG(t, filepath.Join(keep, "window-shot.png"), first)
	}
	d.click(t, "Book")
	var second image.Image
	wait(t, "the Book sheet", func() bool {
		second = d.screenshot()
		return differing(first, second) > 20000
	})
	d.click(t, "Shot")
	wait(t, "the Shot sheet again", func() bool { return differing(first, d.screenshot()) < 6000 })
	if cmd.ProcessState != nil {
		t.Fatalf("the program ended: %s", log.String())
	}
}

// click presses the real pointer on what carries the label; the place comes
// from the same sheet laid out through the input router.
func (d display) click(t *testing.T, label string) {
	t.Helper()
	at, ok := placeOf(t, label, image.Pt(1280, 800))
	if !ok {
		t.Fatalf("nothing on the sheet is labelled %q", label)
	}
	out, err := d.run("xdotool", "mousemove", fmt.Sprint(at.X), fmt.Sprint(at.Y), "click", "1")
	if err != nil {
		t.Fatalf("xdotool: %v: %s", err, out)
	}
}

// inked says whether a picture has both light and dark in it.
func inked(img image.Image) bool {
	b, dark, light := img.Bounds(), 0, 0
	for y := b.Min.Y; y < b.Max.Y; y += 2 {
		for x := b.Min.X; x < b.Max.X; x += 2 {
			r, g, bl, _ := img.At(x, y).RGBA()
			switch sum := (r + g + bl) >> 8; {
			case sum < 250:
				dark++
			case sum > 500:
				light++
			}
		}
	}
	return dark > 300 && light > 30000
}

func saveTestPNG(t *testing.T, path string, img image.Image) {
	t.Helper()
	if err := savePNG(path, img); err != nil {
		t.Fatal(err)
	}
}
