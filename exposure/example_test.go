package exposure_test

import (
	"fmt"

	"halfvalue/exposure"
	"halfvalue/exposure/plan"
)

// A plan file goes in, the time for the wanted density and its spread come out.
func ExampleReckon() {
	p, err := plan.Decode([]byte(`{"plan": 1,
		"source": {"tube": {"kv": 200, "ma": 5, "focusMM": 3, "filters": [{"material": "Be", "mm": 2.4}]}},
		"part": {"layers": [{"material": "carbon-steel", "mm": 20}]},
		"setup": {"kind": "single-wall", "sfdMM": 700},
		"detector": {"film": {"class": "C5", "density": 2.0, "screensMM": [0.1, 0.1]}}}`))
	if err != nil {
		fmt.Println(err)
		return
	}
	r, err := exposure.Reckon(p, exposure.Calibration{})
	if err != nil {
		fmt.Println(err)
		return
	}
	inside := *r.Exposure.MAMin > 6 && *r.Exposure.MAMin < 15 // what charts of the trade come to
	fmt.Println("6 to 15 mA min:", inside)
	fmt.Printf("density %.1f behind %g mm\n", r.Density[0].Density, r.Density[0].ThicknessMM)
	fmt.Println(r.Cautions[0])
	// Output:
	// 6 to 15 mA min: true
	// density 2.0 behind 20 mm
	// Results are an aid. Site radiation rules, the licence and the radiation safety officer or licensed supervisor govern.
}
