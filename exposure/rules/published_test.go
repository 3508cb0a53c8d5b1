package rules

import (
	"math"
	"os"
	"testing"

	"github.com/go-json-experiment/json"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
)

// published is testdata/standards-rules.json.
type published struct {
	Source     string `json:"source"`
	Confidence string `json:"confidence"`
	MinF       []struct {
		Class      string  `json:"class"`
		DMM        float64 `json:"dMM"`
		BMM        float64 `json:"bMM"`
		FMM        float64 `json:"fMM"`
		Confidence string  `json:"confidence"`
	} `json:"minF"`
	Wires       []wirePoint  `json:"wires"`
	BeyondWires []wirePoint  `json:"beyondWires"`
	WireMM      [][2]float64 `json:"wireMM"`
	ASMEUg      []struct {
		TIn  float64 `json:"tIn"`
		UgIn float64 `json:"ugIn"`
	} `json:"asmeUg"`
	ASMEPlaque []struct {
		TIn    float64 `json:"tIn"`
		Source float64 `json:"source"`
		Film   float64 `json:"film"`
	} `json:"asmePlaque"`
	FilmClass []beamPoint `json:"filmClass"`
	SNR       []beamPoint `json:"snr"`
	Ranges    []struct {
		Class   string  `json:"class"`
		Nuclide string  `json:"nuclide"`
		FromMM  float64 `json:"fromMM"`
		ToMM    float64 `json:"toMM"`
	} `json:"ranges"`
	MaxKV []struct {
		Family string  `json:"family"`
		MM     float64 `json:"mm"`
		KV     float64 `json:"kv"`
	} `json:"maxKV"`
}

type wirePoint struct {
	Set    string  `json:"set"`
	Column string  `json:"column"`
	MM     float64 `json:"mm"`
	Wire   int     `json:"wire"`
}

type beamPoint struct {
	Class   string  `json:"class"`
	KV      float64 `json:"kv"`
	Nuclide string  `json:"nuclide"`
	MM      float64 `json:"mm"`
	Film    string  `json:"film"`
	SNRn    float64 `json:"snrN"`
}

func publishedFile(t *testing.T) published {
	t.Helper()
	b, err := os.ReadFile("../../testdata/standards-rules.json")
	if err != nil {
		t.Fatal(err)
	}
	var p published
	if err := json.Unmarshal(b, &p, json.RejectUnknownMembers(true)); err != nil {
		t.Fatal(err)
	}
	return p
}

func set(t *testing.T, name string) Set {
	t.Helper()
	s, err := Ours().Set(name)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// find gives the check of that ID.
func find(t *testing.T, s Set, f Facts, id string) Check {
	t.Helper()
	for _, c := range s.Apply(f) {
		if c.ID == id {
			return c
		}
	}
	t.Fatalf("%s makes no check %q of %+v", s.Name, id, f)
	return Check{}
}

// plate is steel of mm, film of class C3, seen through one wall.
func plate(mm float64) Facts {
	return Facts{KV: 200, Family: "steel", WMM: mm, ThinMM: mm, ThickMM: mm, Detector: "film", Class: "C3", ScreensMM: &[2]float64{0.1, 0.1},
		Density: []Density{{"part", 2.5}}, Setup: setup.Geometry{Kind: plan.SingleWall, DMM: 3, FMM: 680, BMM: mm, SFDMM: 680 + mm, TMM: mm, WMM: mm, UgMM: 3 * mm / 680}}
}

func TestPublishedMinF(t *testing.T) {
	for _, row := range publishedFile(t).MinF {
		f := plate(row.BMM)
		f.Setup.DMM = row.DMM
		c := find(t, set(t, "iso17636-1:2013/"+row.Class), f, "min-f")
		if math.Abs(c.Limit-row.FMM) > 0.6 {
			t.Errorf("%+v: least f %v mm", row, c.Limit)
		}
	}
	// b below 1.2 t counts as t; a pipe shown twice counts De
	f := plate(20)
	f.Setup.BMM = 23.9
	if c := find(t, set(t, "iso17636-1:2013/B"), f, "min-f"); math.Abs(c.Limit-331.56) > 0.01 {
		t.Errorf("b 23.9 mm of t 20 mm: least f %v mm", c.Limit)
	}
	f.Setup.BMM = 24
	if c := find(t, set(t, "iso17636-1:2013/B"), f, "min-f"); math.Abs(c.Limit-45*math.Pow(24, 2./3)) > 1e-9 {
		t.Errorf("b 24 mm of t 20 mm: least f %v mm", c.Limit)
	}
}

func TestPublishedWires(t *testing.T) {
	file := publishedFile(t)
	kind := map[string]string{"single": plan.SingleWall, "bothShown": plan.DoubleWallDoubleImage, "atTheFilm": plan.DoubleWallSingleImage}
	facts := func(w wirePoint) Facts {
		f := plate(w.MM)
		f.Setup.Kind = kind[w.Column]
		f.Setup.Pipe = setup.Pipe{ODMM: 2000, WallMM: w.MM / 2}
		f.Setup.FromAxisMM = 3000
		return f
	}
	for _, w := range file.Wires {
		if c := find(t, set(t, w.Set), facts(w), "iqi"); c.Limit != float64(w.Wire) || c.Verdict != Undecided {
			t.Errorf("%+v: %+v", w, c)
		}
		f := facts(w)
		f.Wire = w.Wire
		if c := find(t, set(t, w.Set), f, "iqi"); c.Verdict != Holds {
			t.Errorf("%+v shows and does not hold: %+v", w, c)
		}
		if f.Wire--; w.Wire > 1 && find(t, set(t, w.Set), f, "iqi").Verdict != Short {
			t.Errorf("%+v: a thicker wire holds", w)
		}
	}
	for _, w := range file.BeyondWires {
		f := facts(w)
		f.Wire = 19
		if c := find(t, set(t, w.Set), f, "iqi"); c.Verdict != Undecided {
			t.Errorf("%+v is beyond the table: %+v", w, c)
		}
	}
	for _, w := range file.WireMM {
		if got := WireMM(int(w[0])); got != w[1] {
			t.Errorf("W%v is %v mm, want %v", w[0], got, w[1])
		}
	}
}

func TestPublishedASME(t *testing.T) {
	file, s := publishedFile(t), set(t, "asme-v-2:2021")
	for _, row := range file.ASMEUg {
		f := plate(row.TIn * 25.4)
		if c := find(t, s, f, "ug"); math.Abs(c.Limit-row.UgIn*25.4) > 0.005 {
			t.Errorf("%+v: %v mm", row, c.Limit)
		}
		f.Setup.UgMM = 5
		if c := find(t, s, f, "ug"); c.Verdict != Undecided {
			t.Errorf("a recommendation fails a plan: %+v", c)
		}
	}
	for _, row := range file.ASMEPlaque {
		f := plate(row.TIn * 25.4)
		if c := find(t, s, f, "iqi"); c.Limit != row.Source {
			t.Errorf("%+v: %+v", row, c)
		}
		f.Setup.Kind = plan.DoubleWallSingleImage
		if c := find(t, s, f, "iqi"); c.Limit != row.Film {
			t.Errorf("%+v: film side %+v", row, c)
		}
	}
	f := plate(20)
	f.Density = []Density{{"part", 2}, {"thick", 1.75}}
	if c := find(t, s, f, "density"); c.Verdict != Short || c.Limit != 1.8 {
		t.Errorf("%+v", c)
	}
	f.Density[1].Value = 2.7
	if c := find(t, s, f, "density-spread"); c.Verdict != Short || c.Limit != 30 || math.Abs(c.Value-35) > 1e-9 {
		t.Errorf("%+v", c)
	}
	f.Density[1].Value = 1.8
	if c := find(t, s, f, "density-spread"); c.Verdict != Holds {
		t.Errorf("%+v", c)
	}
	f.KV, f.Nuclide = 0, "Ir-192"
	if c := find(t, s, f, "density"); c.Verdict != Short || c.Limit != 2 {
		t.Errorf("%+v", c)
	}
}

func (b beamPoint) facts() Facts {
	f := plate(b.MM)
	f.KV, f.Nuclide = b.KV, b.Nuclide
	return f
}

func TestPublishedBeams(t *testing.T) {
	file := publishedFile(t)
	for _, row := range file.FilmClass {
		if c := find(t, set(t, "iso17636-1:2013/"+row.Class), row.facts(), "film-class"); c.Limit != float64(classNumber(row.Film)) {
			t.Errorf("%+v: %+v", row, c)
		}
	}
	for _, row := range file.SNR {
		f := row.facts()
		f.Detector, f.SNRn, f.SRbUM = "panel", []Density{{"part", row.SNRn}}, 100
		s := set(t, "iso17636-2:2013/"+row.Class)
		if c := find(t, s, f, "snr"); c.Limit != row.SNRn || c.Verdict != Holds {
			t.Errorf("%+v: %+v", row, c)
		}
		f.SRbUM = 0
		if c := find(t, s, f, "snr"); c.Verdict != Undecided {
			t.Errorf("without basic spatial resolution: %+v", c)
		}
		f.SNRn[0].Value *= 0.99
		if c := find(t, s, f, "snr"); c.Verdict != Short {
			t.Errorf("a hundredth below: %+v", c)
		}
	}
	for _, row := range file.Ranges {
		s := set(t, "iso17636-1:2013/"+row.Class)
		for mm, want := range map[float64]Verdict{row.FromMM: Holds, row.ToMM: Holds, row.ToMM * 1.01: Short} {
			f := plate(mm)
			f.KV, f.Nuclide = 0, row.Nuclide
			if c := find(t, s, f, "source"); c.Verdict != want {
				t.Errorf("%+v at %v mm: %+v", row, mm, c)
			}
		}
		f := plate(row.FromMM * 0.99)
		f.KV, f.Nuclide = 0, row.Nuclide
		if c := find(t, s, f, "source"); c.Verdict == Holds {
			t.Errorf("%+v below its range: %+v", row, c)
		}
	}
	for _, row := range file.MaxKV {
		f := plate(row.MM)
		f.Family = row.Family
		if c := find(t, set(t, "iso17636-1:2013/B"), f, "max-kv"); math.Abs(c.Limit-row.KV) > 1e-9 || c.Verdict != Undecided {
			t.Errorf("%+v: %+v", row, c)
		}
	}
}
