package materials_test

import (
	"fmt"

	"halfvalue/materials"
)

// How much of a 300 keV beam passes 20 mm of carbon steel and a liner of
// 3 mm polyurethane rubber made up on the spot.
func Example() {
	steel, err := materials.Lookup("carbon-steel")
	if err != nil {
		fmt.Println(err)
		return
	}
	liner, err := materials.Compound("liner", "C6.3H7.1NO2.1", 1.1)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%s: %.4f cm2/g, %.4f per mm\n", steel.Title(), steel.MuRho(300), steel.MuPerMM(300))
	fmt.Printf("optical depth %.3f\n", 20*steel.MuPerMM(300)+3*liner.MuPerMM(300))
	// Output:
	// Carbon steel: 0.1098 cm2/g, 0.0862 per mm
	// optical depth 1.761
}

func ExampleMaterial_MuPerMMInto() {
	lead, err := materials.Lookup("lead")
	if err != nil {
		fmt.Println(err)
		return
	}
	keV := []float64{60, 88, 88.01, 300} // either side of the K edge
	mu := make([]float64, len(keV))
	lead.MuPerMMInto(mu, keV)
	fmt.Printf("%.3f\n", mu)
	// Output:
	// [5.692 2.166 8.712 0.457]
}

func ExampleElementBySymbol() {
	w, err := materials.ElementBySymbol("W")
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%s: K edge %.3f keV, K-alpha-1 at %.3f keV\n", w.Name, w.KEdgeKeV, w.KLines[0].KeV)
	// Output:
	// tungsten: K edge 69.525 keV, K-alpha-1 at 59.318 keV
}
