package plan_test

import (
	"fmt"

	"halfvalue/exposure/plan"
)

func ExampleDecode() {
	_, err := plan.Decode([]byte(`{"plan": 1,
		"source": {"tube": {"kv": 500, "ma": 5, "focusMM": 3}},
		"part": {"layers": [{"material": "carbon-steel", "mm": 20}]},
		"setup": {"kind": "single-wall", "sfd": 700},
		"detector": {"film": {"class": "C5", "density": 2.3}}}`))
	fmt.Println(err)
	// Output:
	// source.tube.kv: "500" is out of range: want 20 to 450 kV; set 450 kV or less
	// setup.sfd: unknown field: want kind, image, side, shots, sfdMM or bMM; write "sfdMM"
	// setup.sfdMM: missing: want 20 to 20000 mm; add "sfdMM"
}
