package exposure

import (
	"fmt"
	"strings"
	"testing"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/rules"
)

func checkOf(t *testing.T, r Reckoning, id string) Check {
	t.Helper()
	for _, c := range r.Checks {
		if c.ID == id {
			return c
		}
	}
	t.Fatalf("no check %q among %+v", id, r.Checks)
	return Check{}
}

// TestChecks reckons every demo plan under every rule set: each check carries
// its source and a working, and each mend, applied and reckoned anew, makes its
// check hold.
func TestChecks(t *testing.T) {
	mends := 0
	for _, p := range plan.Demos() {
		for _, name := range plan.RuleSets() {
			p.Rules = name
			r, err := Reckon(p, Calibration{})
			if err != nil {
				t.Fatalf("%s, %s: %v", p.Title, name, err)
			}
			steps := map[string]bool{}
			for _, w := range r.Workings {
				steps[w.ID] = true
			}
			for _, c := range r.Checks {
				if c.Title == "" || c.Text == "" || c.Source == "" || !steps["check."+c.ID] {
					t.Errorf("%s, %s: %+v, or it has no working", p.Title, name, c)
				}
				if c.Mend == nil {
					continue
				}
				mends++
				cost, err := MendCost(p, *c.Mend, Calibration{})
				if err != nil {
					t.Errorf("%s, %s: %v", p.Title, name, err)
					continue
				}
				after, err := Reckon(cost.Plan, Calibration{})
				if err != nil || len(cost.Boundary) != len(after.Boundary) || checkOf(t, after, c.ID).Verdict != Holds || after.Exposure.Seconds != cost.Seconds {
					t.Errorf("%s, %s: mended by %+v: %v, %v", p.Title, name, *c.Mend, checkOf(t, after, c.ID), err)
				}
			}
		}
	}
	if mends < 8 {
		t.Errorf("only %d mends", mends)
	}
}

// TestDensityMend asks the physics: a thick place that is too pale.
func TestDensityMend(t *testing.T) {
	p := plan.Demo()
	p.Detector.Film.Class = "C4"
	p.Part.Sections = []plan.Section{{Name: "cap", Layers: []plan.Layer{{Material: "carbon-steel", MM: 24}}}}
	r, err := Reckon(p, Calibration{})
	if err != nil {
		t.Fatal(err)
	}
	c := checkOf(t, r, "density")
	if c.Verdict != Short || c.Mend == nil || c.Mend.Field != "detector.film.density" || !strings.Contains(c.Text, `"cap"`) {
		t.Fatalf("%+v, mend %+v", c, c.Mend)
	}
	for to, want := range map[float64]Verdict{c.Mend.To.(float64): Holds, c.Mend.Exact * 0.999: Short} {
		q, err := p.With("detector.film.density", to)
		if err != nil {
			t.Fatal(err)
		}
		after, err := Reckon(q, Calibration{})
		if err != nil || checkOf(t, after, "density").Verdict != want {
			t.Errorf("density %v: %+v, %v", to, checkOf(t, after, "density"), err)
		}
	}
}

// TestTravelMend: a long guide tube before a short exposure.
func TestTravelMend(t *testing.T) {
	p := plan.Demos()[3]
	if p.Source.Sealed == nil {
		t.Fatal("the plan has no sealed source")
	}
	r, err := Reckon(p, Calibration{})
	if err != nil {
		t.Fatal(err)
	}
	if c := checkOf(t, r, "travel"); c.Verdict != Undecided {
		t.Errorf("without a container: %+v", c)
	}
	p.Site.Container = &plan.Container{XM: 1, TubeM: 7, SpeedMPerS: 0.5}
	if r, err = Reckon(p, Calibration{}); err != nil {
		t.Fatal(err)
	}
	c := checkOf(t, r, "travel")
	if want := 100 * 2 * 7 / 0.5 / r.Exposure.Seconds; c.Verdict != Short || c.Value < want*0.999 || c.Value > want*1.001 || c.Mend == nil || c.Mend.Field != "setup.sfdMM" {
		t.Fatalf("%+v, want %v %%, mend %+v", c, want, c.Mend)
	}
	cost, err := MendCost(p, *c.Mend, Calibration{})
	if err != nil || !(cost.Seconds > r.Exposure.Seconds) {
		t.Fatalf("%+v, %v", cost, err)
	}
	if after, err := Reckon(cost.Plan, Calibration{}); err != nil || checkOf(t, after, "travel").Verdict != Holds {
		t.Errorf("mended: %+v, %v", checkOf(t, after, "travel"), err)
	}
}

func TestCompanyRules(t *testing.T) {
	over, err := rules.Ours().Over("kestrel.json", []byte(`{"document": "Kestrel Ford 7", "note": "ours", "sets": [{"name": "kestrel/1", "title": "Kestrel Ford", "base": "house", "rows": [
		{"id": "density", "title": "density", "text": "darker than the house asks", "clause": "4", "confidence": "company", "density": {"floor": 2.6, "ceiling": 4}}]}]}`))
	if err != nil {
		t.Fatal(err)
	}
	p := plan.Demo()
	p.Rules = "kestrel/1"
	if _, err := Reckon(p, Calibration{}); err == nil {
		t.Error("a company's set is known without its table")
	}
	r, err := Reckon(p, Calibration{}, WithRules(over))
	if err != nil {
		t.Fatal(err)
	}
	if c := checkOf(t, r, "density"); c.Verdict != Short || c.Limit != 2.6 || !strings.Contains(c.Source, "kestrel.json") || c.Mend == nil {
		t.Errorf("%+v", c)
	}
	for _, w := range r.Workings {
		if w.ID == "check.density" && !strings.Contains(w.Source, "kestrel.json") {
			t.Errorf("the working does not name the company's table: %+v", w)
		}
	}
}

// TestGeometryIsOfWhatIsImaged: through both walls the film shows the far one.
func TestGeometryIsOfWhatIsImaged(t *testing.T) {
	for _, p := range plan.Demos() {
		r, err := Reckon(p, Calibration{})
		if err != nil {
			t.Fatal(err)
		}
		if p.Setup.Kind == plan.DoubleWallSingleImage && r.Geometry.BMM != p.Part.WallMM {
			t.Errorf("%s: b %v mm, want the wall %v mm", p.Title, r.Geometry.BMM, p.Part.WallMM)
		}
	}
}

func ExampleReckon_checks() {
	r, err := Reckon(plan.Demo(), Calibration{})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, c := range r.Checks {
		if c.Mend != nil {
			fmt.Println(c.ID, c.Verdict, c.Mend.Text)
		}
	}
	// Output: film-class short film class C4 would hold
}
