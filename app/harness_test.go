package main

import (
	"image"
	"path/filepath"
	"testing"

	"gioui.org/io/input"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/unit"

	"halfvalue/app/desk"
	"halfvalue/app/sheet"
	"halfvalue/exposure/plan"
)

// demoPlanBytes is the first plan of the demo job.
func demoPlanBytes(t testing.TB) []byte {
	t.Helper()
	data, err := plan.Encode(plan.Demo())
	if err != nil {
		t.Fatal(err)
	}
	return data
}

// testDesk is a desk on the demo job and a demo book of its own.
func testDesk(t testing.TB) *desk.Desk {
	t.Helper()
	d, done, err := drawingDesk(demoPlanBytes(t), "")
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(done)
	return d
}

// placeOf lays the demo job out through the input router and gives the middle
// of what carries the label.
func placeOf(t testing.TB, label string, size image.Point) (image.Point, bool) {
	t.Helper()
	d, ui := testDesk(t), sheet.New()
	var router input.Router
	var ops op.Ops
	for range 3 {
		ops.Reset()
		ui.Layout(layout.Context{Ops: &ops, Now: drawingTime, Source: router.Source(),
			Metric: unit.Metric{PxPerDp: 1, PxPerSp: 1}, Constraints: layout.Exact(size)}, d.State())
		router.Frame(&ops)
	}
	nodes := router.AppendSemantics(nil)
	if len(nodes) == 0 {
		t.Fatal("the sheet says nothing of itself")
	}
	return find(nodes[0], input.SemanticNode{}, label)
}

// find walks the semantic tree; the bounds are those of the nearest node that
// takes clicks, because a label's own span its constraints.
func find(n, target input.SemanticNode, label string) (image.Point, bool) {
	if n.Desc.Gestures&input.ClickGesture != 0 {
		target = n
	}
	if n.Desc.Label == label || n.Desc.Description == label {
		b := target.Desc.Bounds
		return image.Pt((b.Min.X+b.Max.X)/2, (b.Min.Y+b.Max.Y)/2), true
	}
	for _, c := range n.Children {
		if at, ok := find(c, target, label); ok {
			return at, true
		}
	}
	return image.Point{}, false
}

// plansDir holds the demo plans as files.
var plansDir = filepath.Join("..", "testdata", "plans")
