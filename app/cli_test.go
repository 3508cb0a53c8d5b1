package main

import (
	"bytes"
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// halfvalue runs a command line and gives what it printed and its exit code.
func halfvalue(t testing.TB, stdin string, args ...string) (out, errs string, code int) {
	t.Helper()
	var o, e bytes.Buffer
	code = run(args, env{in: strings.NewReader(stdin), out: &o, err: &e})
	return o.String(), e.String(), code
}

func mustRun(t testing.TB, args ...string) string {
	t.Helper()
	out, errs, code := halfvalue(t, "", args...)
	if code != exitOK {
		t.Fatalf("halfvalue %s: exit %d: %s", strings.Join(args, " "), code, errs)
	}
	return out
}

func demoFile(name string) string { return filepath.Join(plansDir, name+".json") }

func decodeJSON[T any](t testing.TB, text string) T {
	t.Helper()
	var v T
	if err := json.Unmarshal([]byte(text), &v); err != nil {
		t.Fatalf("%v in %s", err, text)
	}
	return v
}

func TestTableMu(t *testing.T) {
	rows := decodeJSON[[]muRow](t, mustRun(t, "table", "mu", "Fe", "--kev", "60,100,300", "--json"))
	want := []float64{1.205, 0.3717, 0.1099} // NIST, seen
	for i, r := range rows {
		if math.Abs(r.MuRhoCm2PerG/want[i]-1) > 0.003 || math.Abs(r.MuPerMM-r.MuRhoCm2PerG*7.874/10) > 1e-9 {
			t.Errorf("row %d: %+v, want mu/rho %g", i, r, want[i])
		}
	}
	if text := mustRun(t, "table", "mu", "carbon-steel", "--kev", "100"); !strings.Contains(text, "mu/rho cm2/g") {
		t.Errorf("no heading in %q", text)
	}
}

func TestTableHVL(t *testing.T) {
	row := decodeJSON[hvlRow](t, mustRun(t, "table", "hvl", "--kv", "200", "--filter", "Al=4,Cu=2,Sn=3,Pb=1", "--in", "Cu", "--json"))
	if math.Abs(row.HVL1MM/3.92-1) > 0.04 || math.Abs(row.MeanKeV-164) > 2.5 { // N-200, PTB, seen
		t.Errorf("N-200: %+v", row)
	}
	if row.KermaMGyPerMAMinAt1m == nil || row.KermaMGyPerGBqHAt1m != nil {
		t.Errorf("tube output: %+v", row)
	}
	row = decodeJSON[hvlRow](t, mustRun(t, "table", "hvl", "--nuclide", "Ir-192", "--in", "Pb", "--json"))
	if row.KermaMGyPerGBqHAt1m == nil || math.Abs(*row.KermaMGyPerGBqHAt1m/(0.460*8.764/37)-1) > 0.03 { // 0.460 R m2/(Ci h) above 20 keV, derived
		t.Errorf("Ir-192 output: %+v", row)
	}
	twice := mustRun(t, "table", "hvl", "--kv", "100", "--filter", "Al=1,Al=1", "--in", "Al", "--json")
	if once := mustRun(t, "table", "hvl", "--kv", "100", "--filter", "Al=2", "--in", "Al", "--json"); math.Abs(decodeJSON[hvlRow](t, once).HVL1MM/decodeJSON[hvlRow](t, twice).HVL1MM-1) > 1e-9 {
		t.Error("Al twice 1 mm is not 2 mm of Al")
	}
}

// The members that scripts read are there, unrounded and finite.
func TestReckonJSON(t *testing.T) {
	type answer struct {
		Exposure map[string]float64
		Beam     map[string]float64
		Density  []struct {
			At                   string
			ThicknessMM, Density float64
		}
		Checks []struct {
			ID, Verdict, Unit string
			Value, Limit      float64
			Mend              *struct {
				Field, Text string
				To          any
				Exact       float64
			}
		}
		Boundary []struct {
			Limit, Direction string
			Metres           float64
		}
		Cautions []string
	}
	for name, product := range map[string]string{"kf-12-weld-3": "mAMin", "kf-09-weld-5": "GBqMin"} {
		out := mustRun(t, "reckon", demoFile(name), "--json")
		a := decodeJSON[answer](t, out)
		if a.Exposure["secondsLow"] >= a.Exposure["seconds"] || a.Exposure["seconds"] >= a.Exposure["secondsHigh"] || a.Exposure[product] <= 0 {
			t.Errorf("%s: exposure %v", name, a.Exposure)
		}
		if a.Beam["meanKeV"] <= 0 || a.Beam["kermaRateMGyPerMinAt1m"] <= 0 || len(a.Density) == 0 || len(a.Cautions) == 0 || len(a.Checks) == 0 {
			t.Errorf("%s: %s", name, out)
		}
		for _, b := range a.Boundary {
			if !(b.Metres > 0) || b.Limit == "" || b.Direction == "" {
				t.Errorf("%s: boundary %+v", name, b)
			}
		}
		for _, c := range a.Checks {
			if c.ID == "" || c.Verdict != "holds" && c.Verdict != "short" && c.Verdict != "undecided" {
				t.Errorf("%s: check %+v", name, c)
			}
		}
	}
}

// A plan on standard input, with its working, says every step.
func TestReckonWorking(t *testing.T) {
	data, err := os.ReadFile(demoFile("kf-12-weld-3"))
	if err != nil {
		t.Fatal(err)
	}
	out, errs, code := halfvalue(t, string(data), "reckon", "-", "--working")
	if code != exitOK {
		t.Fatal(errs)
	}
	for _, want := range []string{"exposure time", "E_max = e U", "inverse square", "ICRP 74", "Burlin", "caution", "SFD"} {
		if !strings.Contains(out, want) {
			t.Errorf("no %q in the working", want)
		}
	}
}

func TestBookVerbs(t *testing.T) {
	book := filepath.Join(t.TempDir(), "kf.book")
	add := func(name string, more ...string) string {
		return mustRun(t, append([]string{"book", "add", book, demoFile(name), "--by", "R. Amsel"}, more...)...)
	}
	if out := add("kf-12-weld-3", "--given", "95s"); out != "1\n" {
		t.Fatalf("first number %q", out)
	}
	if out := add("kf-09-weld-5"); out != "2\n" {
		t.Fatalf("second number %q", out)
	}
	lines := strings.Split(strings.TrimSpace(mustRun(t, "book", "list", book, "--json")), "\n")
	if len(lines) != 2 || decodeJSON[listedEntry](t, lines[0]).Entry != 2 {
		t.Fatalf("list: %v", lines)
	}
	if lines := strings.Split(strings.TrimSpace(mustRun(t, "book", "list", book, "--json", "--limit", "1")), "\n"); len(lines) != 1 {
		t.Fatalf("limited list: %v", lines)
	}
	show := mustRun(t, "book", "show", book, "1")
	for _, want := range []string{"KF-12 weld 3", "given   95 s", "R. Amsel", "caution"} {
		if !strings.Contains(show, want) {
			t.Errorf("no %q in %s", want, show)
		}
	}
	if out := mustRun(t, "book", "verify", book); !strings.Contains(out, "2 entries, all of it holds") {
		t.Errorf("verify: %s", out)
	}
	before, err := os.ReadFile(book)
	if err != nil {
		t.Fatal(err)
	}
	for _, args := range [][]string{
		{"book", "add", book, demoFile("none"), "--by", "R. Amsel"}, {"book", "add", book, demoFile("kf-12-weld-3")},
		{"book", "add", book, demoFile("kf-12-weld-3"), "--by", "R. Amsel", "--given", "95"}, {"book", "add", book, demoFile("kf-12-weld-3"), "--by", "", "--given", "95s"},
		{"book", "add", book, demoFile("kf-12-weld-3"), "--by", "R. Amsel", "--given", "-5s"}, {"book", "show", book, "3"}, {"book", "show", book, "0"},
	} {
		if _, errs, code := halfvalue(t, "", args...); code != exitUsage || errs == "" {
			t.Errorf("%v: exit %d, %q", args, code, errs)
		}
	}
	after, err := os.ReadFile(book)
	if err != nil || !bytes.Equal(before, after) {
		t.Error("refused input changed the book")
	}
}

// A damaged book is exit code 1, no book is 2.
func TestVerifyExitCodes(t *testing.T) {
	dir := t.TempDir()
	book := filepath.Join(dir, "kf.book")
	mustRun(t, "book", "add", book, demoFile("kf-12-weld-3"), "--by", "J. Okoro", "--given", "95s")
	data, err := os.ReadFile(book)
	if err != nil {
		t.Fatal(err)
	}
	at := bytes.LastIndex(data, []byte(`"given_s":"95"`))
	if at < 0 {
		t.Fatal("the entry is not readable in the file")
	}
	for i := 0; i >= 0; { // every copy of the page
		data[at+len(`"given_s":"`)] = '1'
		if i = bytes.LastIndex(data[:at], []byte(`"given_s":"95"`)); i >= 0 {
			at = i
		}
	}
	if err := os.WriteFile(book, data, 0o600); err != nil {
		t.Fatal(err)
	}
	out, _, code := halfvalue(t, "", "book", "verify", book)
	if code != exitFault || !strings.Contains(out, "entry of entry 1") {
		t.Errorf("tampered: exit %d, %s", code, out)
	}
	if _, _, code := halfvalue(t, "", "book", "verify", filepath.Join(dir, "none.book")); code != exitUsage {
		t.Errorf("no book: exit %d", code)
	}
}

// Usage errors say what is wrong and exit 2.
func TestUsageErrors(t *testing.T) {
	for _, args := range [][]string{
		{"nonsense"}, {"reckon"}, {"reckon", "no-such-file.json"}, {"table", "mu", "unobtainium", "--kev", "60"}, {"table", "mu", "Fe"},
		{"table", "mu", "Fe", "--kev", "0.5"}, {"table", "mu", "Fe", "--kev", "NaN"}, {"table", "mu", "fe", "--kev", "60"}, {"table", "hvl", "--in", "Cu"},
		{"table", "hvl", "--kv", "500", "--in", "Cu"}, {"table", "hvl", "--kv", "200", "--nuclide", "Ir-192", "--in", "Cu"}, {"table", "hvl", "--kv", "200", "--in", "Cu", "--filter", "Al"},
		{"table", "hvl", "--kv", "200", "--in", "Cu", "--filter", "Al=-1"}, {"table", "hvl", "--kv", "200", "--in", "Cu", "--target", "Fe"}, {"table", "hvl", "--nuclide", "Ir-193", "--in", "Cu"},
		{"draw", demoFile("kf-12-weld-3")}, {"draw", demoFile("kf-12-weld-3"), "--out", t.TempDir(), "--size", "10x10"},
		{"draw", demoFile("kf-12-weld-3"), "--out", t.TempDir(), "--light", "pink"}, {"book", "verify"}, {"--bogus"},
	} {
		out, errs, code := halfvalue(t, "", args...)
		if code != exitUsage || !strings.HasPrefix(errs, "halfvalue: ") || out != "" {
			t.Errorf("%v: exit %d, out %q, err %q", args, code, out, errs)
		}
	}
}

func TestHelp(t *testing.T) {
	out, _, code := halfvalue(t, "", "--help")
	if code != exitOK || !strings.Contains(out, "licensed supervisor govern") {
		t.Errorf("exit %d, %s", code, out)
	}
}

// The plan file that the README shows is the one that the tests use.
func TestReadmeShowsTheDemoPlan(t *testing.T) {
	readme, err := os.ReadFile(filepath.Join("..", "README.md"))
	if err != nil {
		t.Fatal(err)
	}
	_, rest, ok := strings.Cut(string(readme), "```json\n")
	text, _, ok2 := strings.Cut(rest, "```")
	if !ok || !ok2 {
		t.Fatal("the README shows no plan")
	}
	shown, errs, code := halfvalue(t, text, "reckon", "-", "--json")
	if code != exitOK {
		t.Fatal(errs)
	}
	if want := mustRun(t, "reckon", demoFile("kf-12-weld-3"), "--json"); shown != want {
		t.Error("it reckons to something else than the demo plan")
	}
}
