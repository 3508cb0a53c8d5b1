// Command slowing makes exposure/beam/data/slowing.json: how electrons slow
// down in the targets, from the single-scattering walk of the electron
// package. Run it from the top of the tree:
//
//	go run ./exposure/beam/slowing > exposure/beam/data/slowing.json
//
// It takes about a minute on one core. The seed is fixed and written down.
package main

import (
	"encoding/json"
	"fmt"
	"log"
	"math"
	"os"

	"halfvalue/exposure/beam/internal/electron"
)

const (
	seed    = 20260
	bins    = 20
	tiltDeg = 20 // of the electrons from the surface's normal, that of a 20 deg anode
)

type row struct {
	KeV     float64   `json:"keV"`
	Back    float64   `json:"back"`
	Track   []float64 `json:"track"`
	Depth   []float64 `json:"depth"`
	Doppler []float64 `json:"doppler"`
}

type target struct {
	Z    int   `json:"z"`
	Rows []row `json:"rows"`
}

type file struct {
	Source  string   `json:"source"`
	Made    string   `json:"made"`
	Seed    uint64   `json:"seed"`
	TiltDeg float64  `json:"tiltDeg"`
	Targets []target `json:"targets"`
}

func main() {
	f := file{
		Source: "computed: single-scattering walk of package electron (screened Rutherford with spin correction, continuous slowing down)",
		Made:   "go run ./exposure/beam/slowing",
		Seed:   seed, TiltDeg: tiltDeg,
	}
	for _, m := range electron.Targets() {
		t := target{Z: m.Z}
		for _, keV := range []float64{10, 25, 60, 150, 450} {
			n := int(30000 * math.Sqrt(10/keV))
			s := m.Walk(keV, tiltDeg, n, bins, seed)
			t.Rows = append(t.Rows, row{keV, round(s.Back), rounded(s.Track), rounded(s.Depth), rounded(s.Doppler)})
		}
		f.Targets = append(f.Targets, t)
	}
	out, err := json.Marshal(f)
	if err != nil {
		log.Fatal(err)
	}
	fmt.Fprintf(os.Stdout, "%s\n", out)
}

func round(x float64) float64 { return math.Round(x*1e4) / 1e4 }

func rounded(x []float64) []float64 {
	out := make([]float64, len(x))
	for i, v := range x {
		out[i] = round(v)
	}
	return out
}
