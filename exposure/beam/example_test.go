package beam_test

import (
	"fmt"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// The wide-spectrum quality W-200 of ISO 4037-1: PTB measured a half-value
// layer of 3.00 mm Cu and a mean energy of 137 keV.
func Example() {
	s, err := beam.Tube(plan.Tube{KV: 200, Target: "W", AnodeDeg: 20, Waveform: "constant",
		Filters: []plan.Filter{{Material: "Al", MM: 4}, {Material: "Sn", MM: 2}}})
	if err != nil {
		fmt.Println(err)
		return
	}
	cu, err := materials.Lookup("Cu")
	if err != nil {
		fmt.Println(err)
		return
	}
	s = s.InAir(beam.AirPathMM)
	hvl1, _ := s.HVL(cu)
	fmt.Printf("HVL1 %.1f mm Cu, mean %.0f keV\n", hvl1, s.MeanKeV())
	// Output: HVL1 3.1 mm Cu, mean 137 keV
}
