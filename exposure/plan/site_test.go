package plan

import (
	"math"
	"strings"
	"testing"
)

const sitePlan = `"site": {"limits": [{"name": "barrier", "rateUSvPerH": 7.5, "averagingMin": 1}], "shotsPerHour": 6,
 "beam": {"xM": -3.5, "bearingDeg": 90}, "walls": [{"name": "shed", "material": "concrete", "mm": 200, "heightM": 3, "points": [{"xM": 4, "yM": -5}, {"xM": 4, "yM": 5}, {"xM": 9, "yM": 5}]}],
 "people": [{"name": "gate", "role": "place", "xM": 30, "yM": 0}],
 "readings": [{"xM": 20, "yM": -1.5, "uSvPerH": 12, "meter": "M-04", "calibrated": "2026-06-01T00:00:00Z", "rangeUSvPerH": 1000, "responseS": 3, "heldS": 20, "state": "exposed"}]}}`

// withSite puts another site into the file of the demo's plan.
func withSite(t *testing.T, site string) []byte {
	t.Helper()
	p := Demo()
	p.Site = Site{}
	b, err := Encode(p)
	if err != nil {
		t.Fatal(err)
	}
	return []byte(strings.TrimSuffix(string(b), "}") + "," + site)
}

func TestSiteDecodes(t *testing.T) {
	p, err := Decode(withSite(t, sitePlan))
	if err != nil {
		t.Fatal(err)
	}
	roundTrip(t, p)
	if p.Site.Beam.XM != -3.5 || p.Site.Readings[0].YM != -1.5 {
		t.Errorf("places west and south: %+v", p.Site)
	}
	s := p.Site.WithDefaults()
	if s.Beam.HeightM != 1 || s.LevelM != 1 || s.People[0].Occupancy != 1 || s.Readings[0].Factor != 1 || p.Site.People[0].Occupancy != 0 {
		t.Errorf("defaults: %+v", s)
	}
}

func TestBadSites(t *testing.T) {
	for _, row := range []struct{ old, new, field string }{
		{`"mm": 200`, `"mm": -2`, "site.walls[0].mm"},
		{`"material": "concrete"`, `"material": "concrit"`, "site.walls[0].material"},
		{`{"xM": 4, "yM": 5}`, `{"xM": 4, "yM": -5}`, "site.walls[0].points[1]"},
		{`{"xM": 9, "yM": 5}]`, `{"xM": 9, "yM": 0}, {"xM": 0, "yM": 0}]`, "site.walls[0].points[3]"},
		{`"xM": -3.5`, `"xM": 3.95`, "site.walls[0].points[1]"},
		{`"rateUSvPerH": 7.5`, `"rateUSvPerH": 0`, "site.limits[0].rateUSvPerH"},
		{`"xM": 30`, `"xM": 3000`, "site.people[0].xM"},
		{`"state": "exposed"`, `"state": "open"`, "site.readings[0].state"},
		{`"shotsPerHour": 6`, `"partWidthMM": 600`, "site.partWidthMM"},
		{`"shotsPerHour": 6`, `"container": {"xM": 1, "yM": 1}`, "site.container"},
	} {
		file := withSite(t, strings.Replace(sitePlan, row.old, row.new, 1))
		_, err := Decode(file)
		if err == nil || !strings.HasPrefix(err.Error(), row.field) {
			t.Errorf("%s: %v, want a fault of %s", row.new, err, row.field)
		}
	}
}

func TestSiteCatchesNaN(t *testing.T) {
	p := Demo()
	p.Site.People = []Person{{Name: "gate", XM: math.NaN()}}
	if err := p.Validate(); err == nil {
		t.Error("NaN is no place")
	}
}
