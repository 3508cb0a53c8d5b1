package beam

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"math"
	"sync"

	"halfvalue/exposure/beam/internal/electron"
)

//go:embed data/slowing.json
var slowingJSON []byte

// slowing is how electrons of one energy slow down in a target: bins of equal
// width by the share of the first energy that is left.
type slowing struct {
	KeV     float64   `json:"keV"`
	Back    float64   `json:"back"`
	Track   []float64 `json:"track"`
	Depth   []float64 `json:"depth"`
	Doppler []float64 `json:"doppler"`
}

// slowings are the rows of data/slowing.json by atomic number, rising energy.
var slowings = sync.OnceValue(func() map[int][]slowing {
	var file struct {
		Targets []struct {
			Z    int       `json:"z"`
			Rows []slowing `json:"rows"`
		} `json:"targets"`
	}
	if err := json.Unmarshal(slowingJSON, &file); err != nil {
		panic(fmt.Sprintf("beam: data/slowing.json does not decode: %v", err))
	}
	out := map[int][]slowing{}
	for _, t := range file.Targets {
		out[t.Z] = t.Rows
	}
	return out
})

// slowed is what is known of the electrons that have the share u of their
// first energy left.
type slowed struct {
	track   float64 // share of them that is still in the target
	depth   float64 // mean depth, ranges of the first energy
	doppler float64 // factor of emission towards the beam
}

// slowedAt reads rows, which run by energy, at first energy keV and share u.
func slowedAt(rows []slowing, keV, u float64) slowed {
	i := 0
	for i < len(rows)-2 && keV > rows[i+1].KeV {
		i++
	}
	f := math.Log(keV/rows[i].KeV) / math.Log(rows[i+1].KeV/rows[i].KeV)
	f = min(max(f, 0), 1)
	a, b := rows[i].at(u), rows[i+1].at(u)
	out := slowed{a.track*(1-f) + b.track*f, a.depth*(1-f) + b.depth*f, a.doppler*(1-f) + b.doppler*f}
	out.track = min(out.track, 1)
	return out
}

// at is linear between the middles of the bins and, at u = 1, what holds for
// an electron that has just arrived: none lost, no depth, at right angles to
// the beam.
func (s *slowing) at(u float64) slowed {
	n := len(s.Track)
	p := u*float64(n) - 0.5
	if p <= 0 {
		return slowed{s.Track[0], s.Depth[0], s.Doppler[0]}
	}
	i := int(p)
	if i >= n-1 {
		b := electron.Beta(s.KeV)
		f := min(2*(p-float64(n-1)), 1)
		fresh := 2 * b / math.Log((1+b)/(1-b))
		return slowed{s.Track[n-1]*(1-f) + f, s.Depth[n-1] * (1 - f), s.Doppler[n-1]*(1-f) + fresh*f}
	}
	f := p - float64(i)
	return slowed{
		s.Track[i]*(1-f) + s.Track[i+1]*f,
		s.Depth[i]*(1-f) + s.Depth[i+1]*f,
		s.Doppler[i]*(1-f) + s.Doppler[i+1]*f,
	}
}
