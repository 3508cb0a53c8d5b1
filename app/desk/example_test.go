package desk

import (
	"fmt"

	"halfvalue/exposure"
)

// A desk opens on the demo job; a change goes in as an intent and comes out as
// state, and a change that is refused says what would mend it.
func Example() {
	d := Open(newWorld(), Options{Reckon: Engine(exposure.Calibration{})})
	d.Apply(Type{Field: "setup.sfdMM", Text: "30 in"})
	fmt.Println(d.State().Plan.Setup.SFDMM, "mm; undo:", d.State().UndoName)
	d.Apply(Set{Field: "source.tube.kv", To: 230})
	fmt.Println(d.State().Refusal)
	d.Apply(Undo{})
	fmt.Println(d.State().Plan.Setup.SFDMM, "mm")
	// Output:
	// 762 mm; undo: SFD source to film from 700 mm
	// source.tube.kv: "230 kV" is refused, allowed 20 kV to 200 kV; the nearest allowed is 200 kV
	// 700 mm
}
