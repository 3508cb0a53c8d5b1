package transport

import "testing"

// Stacks of different materials against a direct run with a 220 kV spectrum,
// in both orders.
func TestStacksAgainstDirectMonteCarlo(t *testing.T) {
	e, n := kramers(t, 220)
	steel, lead, wool, water, al := lookup(t, "carbon-steel"), lookup(t, "lead"), lookup(t, "mineral-wool"), lookup(t, "water"), lookup(t, "Al")
	for _, row := range []struct {
		what    string
		layers  []Layer
		allowed float64
	}{
		{"steel 10 in two", []Layer{{steel, 4}, {steel, 6}}, 0.03},
		{"wool 80, steel 8", []Layer{{wool, 80}, {steel, 8}}, 0.05},
		{"steel 8, wool 80", []Layer{{steel, 8}, {wool, 80}}, 0.05},
		{"steel 8, water 60, steel 8", []Layer{{steel, 8}, {water, 60}, {steel, 8}}, 0.05},
		{"steel 12, lead 0.5", []Layer{{steel, 12}, {lead, 0.5}}, 0.1},
		{"lead 0.5, steel 12", []Layer{{lead, 0.5}, {steel, 12}}, 0.06},
		{"steel 12, lead 0.1", []Layer{{steel, 12}, {lead, 0.1}}, 0.05},
		{"al 20, steel 5", []Layer{{al, 20}, {steel, 5}}, 0.06},
		{"steel 5, al 20", []Layer{{steel, 5}, {al, 20}}, 0.05},
		{"lead 2, water 40", []Layer{{lead, 2}, {water, 40}}, 0.08},
		{"water 100, lead 2", []Layer{{water, 100}, {lead, 2}}, 0.12},
	} {
		against(t, row.what, row.layers, e, n, row.allowed, 0.06)
	}
}
