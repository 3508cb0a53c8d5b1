package rules

import (
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/setup"
)

// TestRows holds every row of every set to a citation, a confidence and our
// wording, and every set to the checks that a plan needs.
func TestRows(t *testing.T) {
	for _, name := range Ours().Names() {
		s := set(t, name)
		ids := map[string]bool{}
		for _, r := range s.Rows {
			if err := r.check(); err != nil {
				t.Errorf("%s: %v", name, err)
			}
			if r.Document == "" || len(r.Text) < 15 {
				t.Errorf("%s, row %q: document %q, text %q", name, r.ID, r.Document, r.Text)
			}
			ids[r.ID] = true
		}
		if !ids["iqi"] || !(ids["min-f"] || ids["ug"]) || !(ids["density"] || ids["snr"]) || s.Title == "" || s.Note == "" {
			t.Errorf("%s has only %v", name, ids)
		}
	}
	if got, want := fmt.Sprint(Ours().Names()), fmt.Sprint(plan.RuleSets()); got != want {
		t.Errorf("sets %s, a plan may name %s", got, want)
	}
}

var update = flag.Bool("update", false, "write RULES.md anew")

func TestPage(t *testing.T) {
	page := Ours().Page()
	if *update {
		if err := os.WriteFile("RULES.md", []byte(page), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	have, err := os.ReadFile("RULES.md")
	if err != nil {
		t.Fatal(err)
	}
	if string(have) != page {
		t.Error("RULES.md is not what the data says: run go test ./exposure/rules -update")
	}
	_, sample, _ := strings.Cut(page, "```json\n")
	sample, _, ok := strings.Cut(sample, "```")
	over, err := Ours().Over("works-7.json", []byte(sample))
	if !ok || err != nil {
		t.Fatalf("the file that the page shows is refused: %v", err)
	}
	if !strings.Contains(over.Page(), "company, works-7.json") {
		t.Error("the page does not name the company's file")
	}
}

// TestBeamsWithoutGaps walks kV and thickness: a table of the data gives each
// point one row.
func TestBeamsWithoutGaps(t *testing.T) {
	for _, name := range Ours().Names() {
		for _, r := range set(t, name).Rows {
			var ranges []BeamRange
			least := 0.0
			switch {
			case r.FilmClass != nil:
				for _, c := range r.FilmClass.Rows {
					ranges = append(ranges, c.BeamRange)
				}
			case r.Screens != nil:
				for _, c := range r.Screens.Rows {
					ranges = append(ranges, c.BeamRange)
				}
			case r.SNR != nil:
				least = 50
				for _, c := range r.SNR.Rows {
					ranges = append(ranges, c.BeamRange)
				}
			default:
				continue
			}
			for kV := 20.0; kV <= 450; kV += 5 {
				for mm := 0.5; mm < 400; mm *= 1.02 {
					n := 0
					for _, b := range ranges {
						if b.takes(Facts{KV: kV, ThickMM: mm}) {
							n++
						}
					}
					if want := kV > least; (n == 1) != want || n > 1 {
						t.Fatalf("%s, row %q: %d rows for %v kV, %v mm", name, r.ID, n, kV, mm)
					}
				}
			}
		}
	}
}

// TestLowConfidenceDecidesNothing throws random facts at every set.
func TestLowConfidenceDecidesNothing(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 22))
	seen := map[Verdict]int{}
	low := 0
	for range 3000 {
		f, err := FactsOf(randomPlan(rng))
		if err != nil {
			t.Fatal(err)
		}
		for _, name := range Ours().Names() {
			for _, c := range set(t, name).Apply(f) {
				seen[c.Verdict]++
				if c.Confidence == "low" {
					low++
					if c.Verdict != Undecided {
						t.Fatalf("%s: a low confidence decides: %+v", name, c)
					}
				}
				if math.IsNaN(c.Value) || math.IsInf(c.Value, 0) || math.IsNaN(c.Limit) || math.IsInf(c.Limit, 0) || c.Text == "" || c.Rule == "" || c.Source() == "" {
					t.Fatalf("%s: %+v", name, c)
				}
				step := c.Step()
				for _, i := range step.Inputs {
					if math.IsNaN(i.Value) || math.IsInf(i.Value, 0) || i.Symbol == "" || i.Name == "" {
						t.Fatalf("%s: %+v", name, step)
					}
				}
				if c.recalled() && !strings.Contains(c.Source(), edition) {
					t.Fatalf("%s: %+v does not send to the edition", name, c)
				}
			}
		}
	}
	if low == 0 || seen[Holds] == 0 || seen[Short] == 0 || seen[Undecided] == 0 {
		t.Errorf("verdicts %v, %d of low confidence", seen, low)
	}
}

func TestUnknownMaterialDoesNotPass(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	f := plate(20)
	f.Family = "zirconium"
	for _, id := range []string{"film-class", "screens", "max-kv"} {
		if c := find(t, s, f, id); c.Verdict != Undecided || !strings.Contains(c.Text, "zirconium") {
			t.Errorf("%+v", c)
		}
	}
	f.Family = ""
	if c := find(t, s, f, "film-class"); c.Verdict != Undecided {
		t.Errorf("%+v", c)
	}
	f = plate(20)
	f.Detector = "panel"
	if c := find(t, s, f, "detector"); c.Verdict != Short {
		t.Errorf("%+v", c)
	}
}

func TestSourceInside(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	f := plate(10)
	f.Setup.Kind, f.Setup.Pipe = plan.Panoramic, setup.Pipe{ODMM: 300, WallMM: 10}
	least := 45 * math.Pow(10, 2./3)
	for _, row := range []struct {
		share, axis float64
		want        Verdict
	}{{1, 0, Holds}, {0.99, 0, Undecided}, {0.51, 0, Undecided}, {0.49, 0, Short}, {0.81, 40, Undecided}, {0.79, 40, Short}} {
		f.Setup.FMM, f.Setup.FromAxisMM = row.share*least, row.axis
		if c := find(t, s, f, "min-f"); c.Verdict != row.want {
			t.Errorf("%+v: %+v", row, c)
		}
	}
}

func TestEllipse(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	f := plate(7.8)
	f.Setup.Kind, f.Setup.Image = plan.DoubleWallDoubleImage, plan.Elliptical
	for _, row := range []struct {
		od, wall, weld float64
		shots          int
		fit, run       Verdict
	}{
		{60.3, 3.9, 9, 2, Holds, Holds}, {60.3, 3.9, 16, 1, Short, Short}, {114.3, 6, 9, 2, Short, Holds}, {88.9, 8.1, 9, 3, Short, Holds},
		{60.3, 7.3, 9, 2, Holds, Short}, {60.3, 7.3, 0, 3, Undecided, Holds}, {60.3, 3.9, 9, 0, Holds, Undecided},
	} {
		f.Setup.Pipe, f.WeldMM, f.Shots = setup.Pipe{ODMM: row.od, WallMM: row.wall}, row.weld, row.shots
		if a, b := find(t, s, f, "ellipse"), find(t, s, f, "shots"); a.Verdict != row.fit || b.Verdict != row.run {
			t.Errorf("%+v: %+v, %+v", row, a, b)
		}
	}
	f.Setup.Image, f.Shots = plan.Perpendicular, 2
	if c := find(t, s, f, "shots"); c.Verdict != Short || c.Limit != 3 {
		t.Errorf("%+v", c)
	}
}

// TestCone traces the edge of what a shot shows: the angle at the source by the
// law of cosines, which the rule does not use.
func TestCone(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	rng := rand.New(rand.NewPCG(23, 24))
	short := 0
	for range 500 {
		f := plate(10)
		f.ConeDeg, f.Shots = 40, 2+rng.IntN(8)
		f.Setup.Kind, f.Setup.Pipe = plan.DoubleWallSingleImage, setup.Pipe{ODMM: 60 + 400*rng.Float64(), WallMM: 5}
		r := f.Setup.Pipe.Outer()
		e := r * (1.02 + 3*rng.Float64())
		f.Setup.FromAxisMM = e
		phi := math.Pi / float64(f.Shots) // at the axis, from the far side
		side := math.Sqrt(e*e + r*r + 2*e*r*math.Cos(phi))
		want := 2 * math.Acos((e*e+side*side-r*r)/(2*e*side)) * 180 / math.Pi
		c := find(t, s, f, "cone")
		if math.Abs(c.Value-want) > 1e-6 || (c.Verdict == Holds) != (want <= 40) {
			t.Fatalf("%+v: %+v, want %v deg", f.Setup, c, want)
		}
		if c.Verdict == Short {
			short++
		}
	}
	if short == 0 || short == 500 {
		t.Errorf("%d of 500 fall short", short)
	}
	f := plate(10)
	f.ConeDeg, f.Setup.Kind, f.Setup.Pipe = 40, plan.Panoramic, setup.Pipe{ODMM: 300, WallMM: 10}
	if c := find(t, s, f, "cone"); c.Verdict != Short {
		t.Errorf("a directional head lights a whole pipe: %+v", c)
	}
	f.Setup.Kind, f.Setup.FromAxisMM = plan.DoubleWallSingleImage, 300
	if c := find(t, s, f, "cone"); c.Verdict != Undecided {
		t.Errorf("without the number of shots: %+v", c)
	}
}

func TestTravel(t *testing.T) {
	s := set(t, "iso17636-1:2013/B")
	f := plate(30)
	f.KV, f.Nuclide = 0, "Ir-192"
	for share, want := range map[float64]Verdict{0: Undecided, 0.05: Holds, 0.1: Holds, 0.11: Short} {
		f.TravelShare = share
		if c := find(t, s, f, "travel"); c.Verdict != want {
			t.Errorf("share %v: %+v", share, c)
		}
	}
}

const companyFile = `{"document": "Kestrel Ford 7", "note": "ours", "sets": [
	{"name": "iso17636-1:2013/B", "rows": [
		{"id": "max-kv", "title": "most kV", "text": "read in our copy of the curve", "clause": "table 2", "confidence": "company", "maxKV": {"points": [[1, 100], [100, 450]], "riseKV": 0}}]},
	{"name": "kestrel/1", "title": "Kestrel Ford", "base": "house", "rows": [
		{"id": "density", "title": "density", "text": "darker than the house asks", "clause": "4", "confidence": "company", "density": {"floor": 2.6, "ceiling": 4}}]}]}`

func TestCompanyTable(t *testing.T) {
	over, err := Ours().Over("kestrel-7.json", []byte(companyFile))
	if err != nil {
		t.Fatal(err)
	}
	b, err := over.Set("iso17636-1:2013/B")
	if err != nil {
		t.Fatal(err)
	}
	if c := find(t, b, plate(20), "max-kv"); c.Verdict != Holds || !strings.Contains(c.Source(), "kestrel-7.json") || c.From != "kestrel-7.json" {
		t.Errorf("%+v, %s", c, c.Source())
	}
	if c := find(t, b, plate(20), "min-f"); c.From != "" {
		t.Errorf("our row is said to be the company's: %+v", c)
	}
	if c := find(t, set(t, "iso17636-1:2013/B"), plate(20), "max-kv"); c.Verdict != Undecided {
		t.Errorf("our own table was changed: %+v", c)
	}
	k, err := over.Set("kestrel/1")
	if err != nil || len(k.Rows) < 5 {
		t.Fatalf("%+v, %v", k, err)
	}
	if c := find(t, k, plate(20), "density"); c.Verdict != Short || c.Limit != 2.6 {
		t.Errorf("%+v", c)
	}
	if _, err := Ours().Set("kestrel/1"); err == nil {
		t.Error("a company's set is in our table")
	}
}

func TestCompanyTableRefused(t *testing.T) {
	for old, bad := range map[string]string{
		`"document"`:                              `"documents"`,
		`"note": "ours"`:                          `"note": ""`,
		`"clause": "4", `:                         ``,
		`"confidence": "company", "density"`:      `"confidence": "sure", "density"`,
		`"floor": 2.6`:                            `"floor": 5`,
		`[100, 450]`:                              `[0.5, 450]`,
		`"base": "house"`:                         `"base": "home"`,
		`"density": {"floor": 2.6, "ceiling": 4}`: `"density": {"floor": 2.6}, "travel": {"mostShare": 0.1}`,
		`"riseKV": 0`:                             `"riseKV": -1`,
		`"id": "density"`:                         `"id": ""`,
		`"text": "darker`:                         `"for": {"families": ["iron"]}, "text": "darker`,
		`"title": "density", `:                    `"title": "density", "title": "twice", `,
		`}}]}]}`:                                  `}}]}]} {}`,
	} {
		if !strings.Contains(companyFile, old) {
			t.Fatalf("%s is not in the file", old)
		}
		if _, err := Ours().Over("x.json", []byte(strings.Replace(companyFile, old, bad, 1))); err == nil || !strings.Contains(err.Error(), `"x.json"`) {
			t.Errorf("%s in the place of %s: %v", bad, old, err)
		}
	}
	if _, err := Ours().Over(" ", []byte(companyFile)); err == nil {
		t.Error("a file without a name is accepted")
	}
}

var demo = plan.Demo()

// night is a time that a source of the demo job is assayed before.
var night = plan.Demos()[5].At

// randomPlan is a valid plan over all setups, sources and detectors.
func randomPlan(rng *rand.Rand) plan.Plan {
	between := func(a, b float64) float64 { return math.Round((a+(b-a)*rng.Float64())*100) / 100 }
	pick := func(list []string) string { return list[rng.IntN(len(list))] }
	for {
		p := demo.Clone()
		p.Rules, p.Site = "house", plan.Site{}
		if rng.IntN(2) == 0 {
			p.Source.Tube = &plan.Tube{KV: between(60, 450), MA: 5, FocusMM: between(0.4, 6)}
		} else {
			p.Source = plan.Source{Sealed: &plan.Sealed{Nuclide: pick(plan.Nuclides()), ActivityGBq: 1000, Assayed: night, SizeMM: between(0.5, 6)}}
			p.At = night
		}
		wall := between(1, 60)
		p.Part = plan.Part{Layers: []plan.Layer{{Material: pick([]string{"carbon-steel", "carbon-steel", "al-6082", "Ti", "copper", "zr-702"}), MM: wall}}}
		p.Setup = plan.Setup{Kind: pick(plan.Kinds), SFDMM: between(60, 2000)}
		if p.Setup.Kind != plan.SingleWall || rng.IntN(3) == 0 {
			p.Part.WallMM, p.Part.ODMM, p.Setup.Shots = wall, between(30, 500), rng.IntN(8)
		}
		if p.Setup.DoubleWall() {
			p.Part.Layers[0].MM = 2 * wall
			p.Part.WeldMM = between(3, 30)
		}
		switch film := (plan.Film{Class: pick(plan.Classes), Density: between(1.2, 4.4), ScreensMM: &[2]float64{between(0, 0.4), between(0, 0.4)}}); rng.IntN(4) {
		case 0:
			p.Detector = plan.Detector{Panel: &plan.Panel{SNRn: between(30, 200), PixelUM: 100, SRbUM: 100}}
		case 1:
			p.Detector = plan.Detector{Plate: &plan.Plate{SNRn: between(30, 200), PixelUM: 50}}
		default:
			p.Detector = plan.Detector{Film: &film}
		}
		if p.Validate() == nil {
			return p
		}
	}
}
