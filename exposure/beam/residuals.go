package beam

import (
	"encoding/json"
	"fmt"
	"io/fs"
	"math"
	"slices"
	"strconv"
	"strings"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// Residual is one published value of a beam beside ours.
type Residual struct {
	File       string // "iso4037-narrow.json"
	Citation   string
	Confidence string
	Name       string  // "N-40"
	Quantity   string  // "HVL1 in Cu", "mean energy", "air kerma at 1 m", ...
	Unit       string  // "mm", "keV", "mGy/(mA min)", ...
	Published  float64 // as printed
	Ours       float64
	Tolerance  float64 // the row's own, in the unit of the quantity
	Gate       bool    // false: reported for comparison, no test fails for it
}

// Percent gives ours against the published value.
func (r Residual) Percent() float64 { return (r.Ours/r.Published - 1) * 100 }

// Holds tells whether ours is within the row's tolerance.
func (r Residual) Holds() bool { return math.Abs(r.Ours-r.Published) <= r.Tolerance }

// publishedFile is one testdata file of beam values.
type publishedFile struct {
	ID         string             `json:"id"`
	Kind       string             `json:"kind"`
	Gate       *bool              `json:"gate"`
	Citation   string             `json:"citation"`
	Confidence string             `json:"confidence"`
	Tolerance  map[string]float64 `json:"tolerance"`
	In         string             `json:"in"`
	AnodeDeg   float64            `json:"anodeDeg"`
	Rows       []publishedRow     `json:"rows"`
}

type publishedRow struct {
	Name        string  `json:"name"`
	KV          float64 `json:"kv"`
	Target      string  `json:"target"`
	Filter      string  `json:"filter"`
	MeanKeV     float64 `json:"meanKeV"`
	HVL1MM      float64 `json:"hvl1MM"`
	HVL2MM      float64 `json:"hvl2MM"`
	MGyPerMAMin float64 `json:"mGyPerMAMin"`
	KShare      float64 `json:"kShare"`
	Nuclide     string  `json:"nuclide"`
	Quantity    string  `json:"quantity"`
	AboveKeV    float64 `json:"aboveKeV"`
	Value       float64 `json:"value"`
	Pct         float64 `json:"pct"`
}

// publishedFiles are the files of testdata that Residuals reads.
var publishedFiles = []string{
	"iso4037-narrow.json", "iso4037-wide.json", "bipm-qualities.json", "iso4037-nominal.json", "iso4037-soft.json", "tube-soft-qualities.json",
	"tube-output-tasmics.json", "tube-output-icrp33.json", "tube-output-others.json", "tube-k-share.json",
	"nuclides-constants.json",
}

// Residuals compares every published beam value in testdata, which is the
// project's folder of that name, with model c, in the files' order.
func Residuals(testdata fs.FS, c Continuum) ([]Residual, error) {
	var out []Residual
	for _, name := range publishedFiles {
		data, err := fs.ReadFile(testdata, name)
		if err != nil {
			return nil, err
		}
		var f publishedFile
		if err := json.Unmarshal(data, &f); err != nil {
			return nil, fmt.Errorf("%s: %w", name, err)
		}
		for _, r := range f.Rows {
			rows, err := f.compare(r, c)
			if err != nil {
				return nil, fmt.Errorf("%s: %s: %w", name, r.Name, err)
			}
			for i := range rows {
				rows[i].File, rows[i].Citation, rows[i].Confidence = name, f.Citation, f.Confidence
				rows[i].Name, rows[i].Gate = r.Name, f.Gate == nil || *f.Gate
			}
			out = append(out, rows...)
		}
	}
	return out, nil
}

func (f publishedFile) compare(r publishedRow, c Continuum) ([]Residual, error) {
	switch f.Kind {
	case "quality":
		return f.quality(r, c)
	case "output":
		s, err := r.spectrum(f.AnodeDeg, c)
		return []Residual{{Quantity: "air kerma at 1 m", Unit: "mGy/(mA min)", Published: r.MGyPerMAMin,
			Ours: s.InAir(AirPathMM).KermaMGy() * 60, Tolerance: r.MGyPerMAMin * f.Tolerance["outputPct"] / 100}}, err
	case "k-share":
		s, err := r.spectrum(f.AnodeDeg, c)
		return []Residual{{Quantity: "K photons of all", Unit: "1", Published: r.KShare,
			Ours: s.InAir(AirPathMM).lineShare(), Tolerance: max(r.KShare*f.Tolerance["kSharePct"]/100, 0.002)}}, err
	}
	return f.constant(r)
}

func (f publishedFile) quality(r publishedRow, c Continuum) ([]Residual, error) {
	s, err := r.spectrum(f.AnodeDeg, c)
	if err != nil {
		return nil, err
	}
	m, err := materials.Lookup(f.In)
	if err != nil {
		return nil, err
	}
	s = s.InAir(AirPathMM)
	h1, h2 := s.HVL(m)
	var out []Residual
	add := func(q, unit string, published, ours, tolerance float64) {
		if published > 0 {
			out = append(out, Residual{Quantity: q, Unit: unit, Published: published, Ours: ours, Tolerance: tolerance})
		}
	}
	add("HVL1 in "+f.In, "mm", r.HVL1MM, h1, r.HVL1MM*f.Tolerance["hvl1Pct"]/100)
	add("HVL2 in "+f.In, "mm", r.HVL2MM, h2, r.HVL2MM*f.Tolerance["hvl2Pct"]/100)
	add("mean energy", "keV", r.MeanKeV, s.MeanKeV(), max(r.MeanKeV*f.Tolerance["meanPct"]/100, f.Tolerance["meanKeV"]))
	return out, nil
}

// spectrum is the row's tube; the anode is 20 deg tungsten where not said.
func (r publishedRow) spectrum(anodeDeg float64, c Continuum) (Spectrum, error) {
	t := plan.Tube{KV: r.KV, Target: "W", AnodeDeg: 20, Waveform: "constant"}
	if anodeDeg > 0 {
		t.AnodeDeg = anodeDeg
	}
	if r.Target != "" {
		t.Target = r.Target
	}
	for f := range strings.SplitSeq(r.Filter, ",") {
		name, mm, _ := strings.Cut(f, "=")
		v, err := strconv.ParseFloat(mm, 64)
		if err != nil {
			return Spectrum{}, fmt.Errorf("filter %q: want material=mm", f)
		}
		t.Filters = append(t.Filters, plan.Filter{Material: name, MM: v})
	}
	return TubeBy(c, t)
}

// lineShare is the share of the photons that is in lines above 50 keV.
func (s Spectrum) lineShare() float64 {
	var lines float64
	for i, n := range s.PerCM2 {
		if s.WidthKeV[i] == 0 && s.KeV[i] > 50 {
			lines += n
		}
	}
	return lines / s.PhotonsPerCM2()
}

// WorstFirst sorts residuals by how much of their tolerance they take.
func WorstFirst(r []Residual) {
	share := func(r Residual) float64 { return math.Abs(r.Ours-r.Published) / r.Tolerance }
	slices.SortStableFunc(r, func(a, b Residual) int {
		switch {
		case share(a) > share(b):
			return -1
		case share(a) < share(b):
			return 1
		}
		return 0
	})
}

// constant compares a rate constant of a nuclide.
func (f publishedFile) constant(r publishedRow) ([]Residual, error) {
	n, err := NuclideByName(r.Nuclide)
	if err != nil {
		return nil, err
	}
	s := n.Bare()
	if r.AboveKeV > 0 {
		s = s.above(r.AboveKeV)
	}
	out := Residual{Published: r.Value, Tolerance: r.Value * r.Pct / 100, Quantity: r.Quantity}
	switch r.Quantity {
	case "exposure", "exposure of the lines":
		out.Unit, out.Ours = "R m2/(Ci h)", s.KermaMGy()*3600*GBqPerCi/MGyPerR
	case "H*(10)":
		out.Unit, out.Ours = "uSv m2/(MBq h)", s.AmbientUSv()*3600/1000
	case "H*(10) of 1 Ci":
		out.Unit, out.Ours = "mSv/h", s.AmbientUSv()*3600*GBqPerCi/1000
	default:
		return nil, fmt.Errorf("quantity %q is unknown", r.Quantity)
	}
	return []Residual{out}, nil
}

// above keeps what lies at keV or above.
func (s Spectrum) above(keV float64) Spectrum {
	i, _ := slices.BinarySearch(s.KeV, keV)
	return Spectrum{s.KeV[i:], s.WidthKeV[i:], s.PerCM2[i:]}
}

// Units of the trade.
const (
	GBqPerCi = 37.0
	MGyPerR  = 8.764 // air kerma of 1 roentgen
)
