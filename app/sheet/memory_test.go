package sheet

import (
	"runtime"
	"testing"

	"halfvalue/app/desk"
	"halfvalue/exposure/plan"
)

// heapAfter scrubs for a number of frames and returns what stays on the heap.
func heapAfter(x *hand, frames int) float64 {
	for i := range frames {
		x.desk.Apply(desk.Set{Field: "setup.sfdMM", To: 600 + float64(i%400), More: true})
		x.frame()
		if i%200 == 199 {
			x.desk.Apply(desk.Dismiss{})
		}
	}
	var m runtime.MemStats
	runtime.GC()
	runtime.GC()
	runtime.ReadMemStats(&m)
	return float64(m.HeapAlloc)
}

// Scrubbing keeps no memory but its steps of undo: what stays after four times
// the frames is within a tenth.
func TestScrubbingKeepsNoMemory(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("SFD source to film")
	first := heapAfter(x, 600)
	if last := heapAfter(x, 1800); last > first*1.1 {
		t.Fatalf("heap went from %.1f to %.1f MB", first/1e6, last/1e6)
	}
}
