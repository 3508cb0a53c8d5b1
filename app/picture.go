package main

import (
	"fmt"
	"image"
	"image/png"
	"io"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"time"

	"gioui.org/gpu/headless"
	"gioui.org/io/input"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/unit"
)

// picture draws a widget without a display, on the processor if need be.
// One headless window of a size lives as long as the process: releasing one
// while another lives ends the shared display of both.
type picture struct {
	window *headless.Window
	size   image.Point
}

// newPicture opens the renderer. It sets EGL_PLATFORM itself, because without
// a display the default platform cannot start.
func newPicture(size image.Point) (*picture, error) {
	if os.Getenv("EGL_PLATFORM") == "" {
		os.Setenv("EGL_PLATFORM", "surfaceless")
	}
	w, err := headless.NewWindow(size.X, size.Y)
	if err != nil {
		return nil, fmt.Errorf("cannot draw without a display: %w; on Debian install libegl-dev and libgles2", err)
	}
	return &picture{w, size}, nil
}

// frames lays w out the given number of times at 1 px per dp and returns the
// last frame. Two frames let a sheet measure itself in the first.
func (p *picture) frames(n int, textScale float32, now time.Time, w layout.Widget) (*image.RGBA, error) {
	var router input.Router
	var ops op.Ops
	for range n {
		ops.Reset()
		w(layout.Context{
			Ops: &ops, Now: now, Source: router.Source(),
			Metric:      unit.Metric{PxPerDp: 1, PxPerSp: textScale},
			Constraints: layout.Exact(p.size),
		})
		router.Frame(&ops)
	}
	if err := p.window.Frame(&ops); err != nil {
		return nil, fmt.Errorf("cannot draw: %w", err)
	}
	img := image.NewRGBA(image.Rectangle{Max: p.size})
	return img, p.window.Screenshot(img)
}

// savePNG writes img whole or not at all.
func savePNG(path string, img image.Image) error {
	return writeWhole(path, func(w io.Writer) error { return png.Encode(w, img) })
}

// writeWhole writes a file beside its place, syncs it and renames it.
func writeWhole(path string, write func(io.Writer) error) error {
	f, err := os.CreateTemp(filepath.Dir(path), ".new-*")
	if err != nil {
		return err
	}
	defer os.Remove(f.Name())
	if err := write(f); err != nil {
		f.Close()
		return err
	}
	if err := f.Sync(); err != nil {
		f.Close()
		return err
	}
	if err := f.Close(); err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}

// parseSize reads "1280x800".
func parseSize(text string) (image.Point, error) {
	ws, hs, ok := strings.Cut(text, "x")
	w, err1 := strconv.Atoi(ws)
	h, err2 := strconv.Atoi(hs)
	if !ok || err1 != nil || err2 != nil || w < 320 || h < 320 || w > 4096 || h > 4096 {
		return image.Point{}, fmt.Errorf("--size: %q is not WIDTHxHEIGHT with both from 320 to 4096, for example 1280x800", text)
	}
	return image.Pt(w, h), nil
}
