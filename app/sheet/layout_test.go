package sheet

import (
	"fmt"
	"math"
	"testing"

	"gioui.org/io/input"
	"gioui.org/io/semantic"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/exposure/plan"
)

// views are what can be on a screen: sheets, panels, lights, text sizes.
type view struct {
	name  string
	plan  int // of plan.Demos
	light desk.Light
	text  int
	units desk.Units
	glove bool
	shots int
	do    []desk.Intent
}

func dialOn(field string) desk.Intent {
	return desk.Show{Panel: desk.Panel{Kind: desk.DialPanel, Field: field}}
}

func show(kind desk.PanelKind, field string) desk.Intent {
	return desk.Show{Panel: desk.Panel{Kind: kind, Field: field}}
}

func views() []view {
	out := []view{}
	for i := range plan.Demos() {
		out = append(out, view{name: fmt.Sprintf("demo %d", i), plan: i, text: 100, units: desk.SI},
			view{name: fmt.Sprintf("demo %d large", i), plan: i, text: 200, units: desk.SI},
			view{name: fmt.Sprintf("demo %d inches", i), plan: i, text: 100, units: desk.Customary})
	}
	for _, text := range []int{100, 200} {
		add := func(name string, p int, do ...desk.Intent) {
			out = append(out, view{name: fmt.Sprintf("%s %d", name, text), plan: p, text: text, units: desk.SI, shots: 12, do: do})
		}
		add("dial SFD", 0, dialOn("setup.sfdMM"))
		add("dial kV", 0, dialOn("source.tube.kv"))
		add("dial activity", 3, dialOn("source.sealed.activityGBq"))
		add("material", 0, show(desk.ChoicePanel, "part.layers[0].material"))
		add("film class", 0, show(desk.ChoicePanel, "detector.film.class"))
		add("working", 0, show(desk.WorkingPanel, ""))
		add("boundary", 3, show(desk.WorkingPanel, "boundary"))
		add("check short", 0, show(desk.CheckPanel, "film-class"))
		add("check undecided", 3, show(desk.CheckPanel, "max-kv"))
		add("log", 0, show(desk.LogPanel, ""))
		add("look", 0, show(desk.LookPanel, ""))
		add("book", 0, desk.GoTo{Sheet: desk.BookSheet})
		add("entry", 0, desk.GoTo{Sheet: desk.BookSheet}, desk.VerifyBook{}, desk.OpenEntry{Number: 3})
		add("refusal", 0, dialOn("source.tube.kv"), desk.Type{Field: "source.tube.kv", Text: "230"})
	}
	out = append(out, view{name: "gloves", text: 100, units: desk.SI, glove: true, do: []desk.Intent{dialOn("setup.sfdMM")}},
		view{name: "long break", text: 100, units: desk.SI, do: []desk.Intent{desk.Set{Field: "setup.sfdMM", To: 5000}}},
		view{name: "empty book", text: 100, units: desk.SI, do: []desk.Intent{desk.GoTo{Sheet: desk.BookSheet}}})
	return out
}

// showView puts a view on a hand's screen.
func showView(t *testing.T, v view, w, h int) *hand {
	t.Helper()
	x := newHand(t, w, h, plan.Demos()[v.plan])
	for range v.shots {
		x.desk.Apply(desk.Log{By: "R. Amsel", GivenSeconds: 95})
	}
	x.desk.Apply(desk.Dismiss{})
	x.desk.Apply(desk.SetText{Percent: v.text})
	x.desk.Apply(desk.SetUnits{To: v.units})
	x.desk.Apply(desk.SetGloves{On: v.glove})
	if v.light != "" {
		x.desk.Apply(desk.SetLight{To: v.light})
	}
	for _, in := range v.do {
		x.desk.Apply(in)
	}
	x.frames(6)
	return x
}

// Every sheet, panel and demo plan on every size of screen, with text at 100,
// 160 and 200 %, holds what the checks below say.
func TestEveryView(t *testing.T) {
	for _, v := range views() {
		for _, s := range sizes {
			t.Run(fmt.Sprintf("%s %dx%d", v.name, s[0], s[1]), func(t *testing.T) {
				x := showView(t, v, s[0], s[1])
				checkText(t, x)
				checkTypeSizes(t, x)
				checkGlyphs(t, x)
				checkTargets(t, x)
				if _, ok := x.find("Caution: " + Caution); !ok {
					t.Error("the caution is not on the sheet")
				}
			})
		}
	}
}

// checkText: no text is cut by the sheet or by what it stands in, except where
// it scrolls, and none lies over another.
func checkText(t *testing.T, x *hand) {
	d := x.ui.bench.Drawing
	var seen []drafting.Text
	for i := range d.Items {
		if d.Items[i].Kind != drafting.TextItem {
			continue
		}
		c := d.Items[i].Text
		if !c.Loose && !c.Clip.Grow(1).Holds(c.Rect) {
			t.Errorf("%q at %.0f is cut by %.0f", c.S, c.Rect, c.Clip)
		}
		if !d.Area.Grow(1).Holds(c.Rect.And(c.Clip)) && !c.Rect.And(c.Clip).Empty() {
			t.Errorf("%q at %.0f leaves the sheet", c.S, c.Rect)
		}
		if c.Loose && (c.Rect.X1 > c.Clip.X1+1 || c.Rect.X0 < c.Clip.X0-1) {
			t.Errorf("%q at %.0f is wider than what it scrolls in, %.0f", c.S, c.Rect, c.Clip)
		}
		for _, o := range seen {
			if both := c.Rect.And(c.Clip).And(o.Rect.And(o.Clip)); both.W() > 1.5 && both.H() > 1.5 {
				t.Errorf("%q at %.0f lies over %q at %.0f", c.S, c.Rect, o.S, o.Rect)
			}
		}
		seen = append(seen, c)
	}
	if len(seen) < 6 {
		t.Errorf("only %d texts on the sheet", len(seen))
	}
}

// checkTypeSizes: at most three sizes of type stand on a sheet.
func checkTypeSizes(t *testing.T, x *hand) {
	sizes := map[float64]bool{}
	for _, it := range x.ui.bench.Drawing.Items {
		if it.Kind == drafting.TextItem {
			sizes[math.Round(it.Text.Size*10)] = true
		}
	}
	if len(sizes) > 3 {
		t.Errorf("type sizes: %v", sizes)
	}
}

// checkGlyphs: the bundled fonts have every character that is drawn.
func checkGlyphs(t *testing.T, x *hand) {
	d := x.ui.bench.Drawing
	for _, it := range d.Items {
		if it.Kind != drafting.TextItem {
			continue
		}
		for _, r := range it.Text.S {
			if !d.Fonts.Has(r, it.Text.Bold) {
				t.Errorf("%q has %q, which the fonts lack", it.Text.S, r)
			}
		}
	}
}

// checkTargets: every target has a name and is as large as a finger needs,
// unless it is cut by the edge of what it scrolls in.
func checkTargets(t *testing.T, x *hand) {
	least := 56
	if x.desk.State().Gloves {
		least = 72
	}
	n := 0
	var walk func(s input.SemanticNode)
	walk = func(s input.SemanticNode) {
		if s.Desc.Class == semantic.Button {
			n++
			r := s.Desc.Bounds
			if s.Desc.Label == "" {
				t.Errorf("a target at %v has no label", r)
			}
			if small(r.Dx(), r.Dy(), least) && !x.ui.bench.Cut(s.Desc.Label) {
				t.Errorf("%q is %d x %d dp, want %d", s.Desc.Label, r.Dx(), r.Dy(), least)
			}
		}
		for _, c := range s.Children {
			walk(c)
		}
	}
	walk(x.router.AppendSemantics(nil)[0])
	if n < 4 {
		t.Errorf("only %d targets", n)
	}
}

func small(w, h, least int) bool { return w < least-1 || h < least-1 }

// What is drawn needs no colour: in safelight every ink that carries a meaning
// is the same red, and figures keep their contrast.
func TestContrast(t *testing.T) {
	for _, c := range []struct {
		name    string
		p       drafting.Palette
		figures float64
		words   float64
	}{
		{"paper", drafting.PaperLight(), 10, 7},
		{"slate", drafting.SlateLight(), 7, 7},
		{"safelight", drafting.SafeLight(), 4, 3}, // pure red on black cannot exceed 5.25
	} {
		for _, ground := range []drafting.Ink{drafting.Sheet, drafting.Block, drafting.BeamWash, drafting.RopeWash} {
			if got := drafting.Contrast(c.p[drafting.Line], c.p[ground]); got < c.figures {
				t.Errorf("%s: figures on ground %d have %.1f:1, want %v", c.name, ground, got, c.figures)
			}
			if got := drafting.Contrast(c.p[drafting.Faint], c.p[ground]); got < c.words {
				t.Errorf("%s: captions on ground %d have %.1f:1, want %v", c.name, ground, got, c.words)
			}
		}
		if got := drafting.Contrast(c.p[drafting.Reverse], c.p[drafting.Line]); got < c.figures {
			t.Errorf("%s: filled buttons have %.1f:1", c.name, got)
		}
		for _, ink := range []drafting.Ink{drafting.Beam, drafting.Rope} {
			if got := drafting.Contrast(c.p[ink], c.p[drafting.Sheet]); got < 4.5 {
				t.Errorf("%s: ink %d has %.1f:1", c.name, ink, got)
			}
		}
	}
	for i, c := range drafting.SafeLight() {
		if c.G != 0 || c.B != 0 {
			t.Errorf("safelight ink %d is not pure red: %v", i, c)
		}
	}
}
