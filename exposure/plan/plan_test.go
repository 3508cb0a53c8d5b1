package plan

import (
	"bytes"
	"errors"
	"flag"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"strings"
	"testing"
	"time"
)

var update = flag.Bool("update", false, "write generated pages and messages anew")

const plansDir = "../../testdata/plans"

// TestFieldsMatchTypes walks the types: each field of a plan file has one row
// in the table and each row a field.
func TestFieldsMatchTypes(t *testing.T) {
	found := map[string]bool{}
	var walk func(typ reflect.Type, path string)
	walk = func(typ reflect.Type, path string) {
		if path != "" {
			found[path] = true
		}
		switch {
		case typ == timeType:
		case typ.Kind() == reflect.Pointer:
			walk(typ.Elem(), path)
		case typ.Kind() == reflect.Struct:
			for i, name := range fieldNames(typ) {
				walk(typ.Field(i).Type, join(path, name))
			}
		case typ.Kind() == reflect.Slice || typ.Kind() == reflect.Array:
			walk(typ.Elem(), path+"[]")
		}
	}
	walk(reflect.TypeFor[Plan](), "")
	for path := range found {
		if _, ok := byPath[path]; !ok && !strings.HasSuffix(path, "[]") {
			t.Errorf("%s has no row in the table of fields", path)
		}
	}
	for _, f := range Fields() {
		if !found[f.Path] {
			t.Errorf("row %s has no field in the types", f.Path)
		}
	}
	if len(byPath) != len(table) {
		t.Errorf("%d rows, %d paths: a path stands twice", len(table), len(byPath))
	}
}

// TestFieldRows holds each row to what a dial and a page need.
func TestFieldRows(t *testing.T) {
	for _, f := range Fields() {
		if f.Meaning == "" || f.Required != (f.Default == "") && f.Path != "detector.film.screensMM[]" && f.Path != "detector.plate.screensMM[]" {
			t.Errorf("%s: wants a meaning, and a default exactly when optional", f.Path)
		}
		if f.Kind == Name && len(f.Names()) == 0 {
			t.Errorf("%s: no names", f.Path)
		}
		if f.Kind != Number {
			continue
		}
		if !(f.Min <= f.Max) || f.Step <= 0 || (f.Min < 0 && f.Min != -f.Max) { // places and angles run to both sides
			t.Errorf("%s: range %v to %v, step %v", f.Path, f.Min, f.Max, f.Step)
		}
		last := math.Inf(-1)
		for _, u := range f.Usual {
			if u < f.Min || u > f.Max || u <= last {
				t.Errorf("%s: usual value %v is outside %v to %v or out of order", f.Path, u, f.Min, f.Max)
			}
			last = u
		}
	}
}

func TestPage(t *testing.T) {
	if *update {
		if err := os.WriteFile("FIELDS.md", []byte(Page()), 0o644); err != nil {
			t.Fatal(err)
		}
	}
	have, err := os.ReadFile("FIELDS.md")
	if err != nil {
		t.Fatal(err)
	}
	if string(have) != Page() {
		t.Error("FIELDS.md is not what the table says: run go test ./exposure/plan -update")
	}
}

func TestDemos(t *testing.T) {
	files, err := filepath.Glob(filepath.Join(plansDir, "*.json"))
	if err != nil || len(files) == 0 {
		t.Fatalf("no plans in %s: %v", plansDir, err)
	}
	embedded, err := demoFiles.ReadDir("demo")
	if err != nil || len(embedded) != len(files) || len(Demos()) != len(files) {
		t.Errorf("%d plans in %s, %d embedded, %d in Demos", len(files), plansDir, len(embedded), len(Demos()))
	}
	for _, file := range files {
		data, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		twin, err := demoFiles.ReadFile("demo/" + filepath.Base(file))
		if err != nil || !bytes.Equal(twin, data) {
			t.Errorf("%s differs from the embedded one: %v", file, err)
		}
		p, err := Decode(data)
		if err != nil {
			t.Errorf("%s: %v", file, err)
			continue
		}
		roundTrip(t, p)
	}
	d := Demo()
	if d.Title != "KF-12 weld 3" || d.Source.Tube.KV != 200 || d.Setup.SFDMM != 700 || d.Detector.Film.ScreensMM[1] != 0.1 {
		t.Errorf("the demo job is not the one of the plan file's example: %+v", d)
	}
}

// roundTrip holds p, its normalised form and its two encodings to one another.
func roundTrip(t *testing.T, p Plan) {
	t.Helper()
	b, err := Encode(p)
	if err != nil {
		t.Fatal(err)
	}
	q, err := Decode(b)
	if err != nil {
		t.Fatalf("an accepted plan is refused when written anew: %v\n%s", err, b)
	}
	again, err := Encode(q)
	if err != nil || !bytes.Equal(b, again) {
		t.Errorf("not the same bytes:\n%s\n%s\n%v", b, again, err)
	}
	if !reflect.DeepEqual(p.Clone(), q) || !p.Equal(q) {
		t.Errorf("not the same plan:\n%+v\n%+v", p, q)
	}
	file, err := EncodeFile(p)
	if err != nil {
		t.Fatal(err)
	}
	if r, err := Decode(file); err != nil || !r.Equal(p) {
		t.Errorf("the indented file is another plan: %v\n%s", err, file)
	}
	n, _ := p.Normalised()
	if err := n.Validate(); err != nil {
		t.Errorf("normalised, %s is refused: %v", b, err)
	}
	twice, _ := n.Normalised()
	if !twice.Equal(n) {
		t.Errorf("normalised twice differs from once:\n%+v\n%+v", n, twice)
	}
}

const leastPlan = `{"plan":1,"source":{"tube":{"kv":200,"ma":5,"focusMM":3}},"part":{"layers":[{"material":"Fe","mm":20}]},"setup":{"kind":"single-wall","sfdMM":700},"detector":{"film":{"class":"C5","density":2}}}`

func TestDefaults(t *testing.T) {
	p, err := Decode([]byte(leastPlan))
	if err != nil {
		t.Fatal(err)
	}
	n, told := p.Normalised()
	want := map[string]string{
		"source.tube.target": "W", "source.tube.anodeDeg": "20 deg", "source.tube.waveform": "constant", "source.tube.coneDeg": "40 deg",
		"source.tube.maxKV": "not stated", "source.tube.maxW": "not stated", "source.tube.filters": "none", "source.tube.leakageMGyPerHAt1m": "2.5 mGy/h",
		"setup.bMM": "20 mm", "detector.film.screensMM": "none", "rules": "none", "site.limits": "none", "site.shotsPerHour": "not stated",
	}
	for _, d := range told {
		if want[d.Field] != d.Value || d.Why == "" {
			t.Errorf("default %+v, want %q and a reason", d, want[d.Field])
		}
		delete(want, d.Field)
	}
	if len(want) != 0 {
		t.Errorf("defaults not told: %v", want)
	}
	if n.Setup.BMM != 20 || n.Source.Tube.Target != "W" || n.Source.Tube.ConeDeg != 40 || p.Source.Tube.Target != "" {
		t.Errorf("normalised %+v, or the plan itself was changed", n)
	}
	if _, told := n.Normalised(); len(told) != 6 {
		t.Errorf("a normalised plan is told %d defaults, want the 6 that stay open: %v", len(told), told)
	}
}

func TestCurie(t *testing.T) {
	p := demo("flange-1")
	p.Source.Sealed.ActivityGBq, p.Source.Sealed.ActivityCi = 0, 50
	if err := p.Validate(); err != nil {
		t.Fatal(err)
	}
	n, _ := p.Normalised()
	if got := n.Source.Sealed; got.ActivityGBq != 1850 || got.ActivityCi != 0 {
		t.Errorf("50 Ci became %+v, want 1850 GBq", got)
	}
}

func TestTimesAreUTC(t *testing.T) {
	p := demo("flange-1")
	p.At = p.At.In(time.FixedZone("east", 3600))
	b, err := Encode(p)
	if err != nil || !bytes.Contains(b, []byte(`"at":"2026-12-01T08:00:00Z"`)) {
		t.Errorf("%s, %v", b, err)
	}
}

// TestPipeDepth holds the two ways to give bMM across a pipe to one meaning.
func TestPipeDepth(t *testing.T) {
	p := demo("kf-07-weld-2")
	for _, row := range []struct{ b, gap, span float64 }{{0, 0, 168.3}, {168.3, 0, 168.3}, {178.3, 10, 178.3}, {14.2, 0, 168.3}, {24.2, 10, 178.3}} {
		p.Setup.BMM = row.b
		if g, s := p.GapMM(), p.SpanMM(); math.Abs(g-row.gap) > 1e-9 || math.Abs(s-row.span) > 1e-9 {
			t.Errorf("bMM %v: gap %v, span %v, want %v and %v", row.b, g, s, row.gap, row.span)
		}
	}
}

func TestValidateCatchesNaN(t *testing.T) {
	set := map[string]func(*Plan, float64){
		"source.tube.kv":        func(p *Plan, x float64) { p.Source.Tube.KV = x },
		"source.tube.maxW":      func(p *Plan, x float64) { p.Source.Tube.MaxW = x },
		"part.layers[0].mm":     func(p *Plan, x float64) { p.Part.Layers[0].MM = x },
		"setup.sfdMM":           func(p *Plan, x float64) { p.Setup.SFDMM = x },
		"setup.bMM":             func(p *Plan, x float64) { p.Setup.BMM = x },
		"detector.film.density": func(p *Plan, x float64) { p.Detector.Film.Density = x },
		"site.shotsPerHour":     func(p *Plan, x float64) { p.Site.ShotsPerHour = x },
	}
	for field, put := range set {
		for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1), -1, math.Copysign(0, -1)} {
			p := Demo()
			put(&p, x)
			var e *FieldError
			if err := p.Validate(); !errors.As(err, &e) || e.Field != field {
				t.Errorf("%s %v: %v", field, x, err)
			}
		}
	}
	if (Plan{}).Validate() == nil {
		t.Error("the zero plan is valid")
	}
}

func TestCompanyRuleSet(t *testing.T) {
	p := Demo()
	p.Rules = "kestrel/1"
	if p.Validate() == nil || p.ValidateFor([]string{"kestrel/1"}) != nil {
		t.Error("a rule set loaded by a company is known only where it is loaded")
	}
}

func FuzzDecode(f *testing.F) {
	for _, p := range Demos() {
		b, err := Encode(p)
		if err != nil {
			f.Fatal(err)
		}
		f.Add(b)
	}
	f.Add([]byte(leastPlan))
	for _, s := range []string{"", "null", "[]", `{"plan":1,"plan":1}`, `{"plan":NaN}`, strings.Repeat("[", 9000), `{"plan":1e999}`, "\xff", `{"part":{"layers":[null]}}`} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		p, err := Decode(data)
		if err != nil {
			for _, line := range strings.Split(err.Error(), "\n") {
				if line == "" || strings.ContainsFunc(line, func(r rune) bool { return r < ' ' }) {
					t.Errorf("message %q of %q", line, data)
				}
			}
			return
		}
		roundTrip(t, p)
	})
}
