package transport

import (
	"math"
	"strings"
	"testing"
)

func TestStepsTellTheirFigures(t *testing.T) {
	e, n := kramers(t, 200)
	l := []Layer{{lookup(t, "carbon-steel"), 12}, {lookup(t, "water"), 30}}
	x, err := Slab(l, e, n)
	if err != nil {
		t.Fatal(err)
	}
	p, s := behind(t, l, e, n)
	step := x.Step(l, e, KermaPerFluence, "air kerma")
	if math.Abs(step.Value-s/p) > 1e-12*step.Value {
		t.Errorf("the step says %g, the sums %g", step.Value, s/p)
	}
	if step.ID == "" || step.Formula == "" || step.Source == "" || step.Note == "" {
		t.Errorf("the step has an empty part: %+v", step)
	}
	if got := step.Inputs[0].Text; got != "carbon-steel 12 mm + water 30 mm" {
		t.Errorf("layers read %q", got)
	}
	if w := WallStep(l[0], 0.25, "H*(10)"); w.Value != 0.25 || !strings.Contains(w.Name, "H*(10)") || w.Inputs[0].Text != "carbon-steel 12 mm" {
		t.Errorf("wall step: %+v", w)
	}
	if id := TableID(); !strings.Contains(id, TableProvenance().SHA256[:12]) {
		t.Errorf("table named %q", id)
	}
}
