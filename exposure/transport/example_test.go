package transport_test

import (
	"fmt"

	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// Scattered against primary air kerma behind 20 mm of steel, for photons of
// 316.5 keV, the strongest line of Ir-192.
func ExampleSlab() {
	steel, err := materials.Lookup("carbon-steel")
	if err != nil {
		fmt.Println(err)
		return
	}
	keV, perCM2 := []float64{316.5}, []float64{1}
	exit, err := transport.Slab([]transport.Layer{{Material: steel, MM: 20}}, keV, perCM2)
	if err != nil {
		fmt.Println(err)
		return
	}
	primary := exit.Primary[0] * transport.KermaPerFluence(keV[0])
	var scattered float64
	for i, n := range exit.Scatter {
		scattered += n * transport.KermaPerFluence(exit.MeanKeV[i])
	}
	fmt.Printf("primary %.2f of the photons, scattered to primary %.1f\n", exit.Primary[0], scattered/primary)
	// Output: primary 0.19 of the photons, scattered to primary 1.3
}
