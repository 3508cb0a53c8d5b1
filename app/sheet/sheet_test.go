package sheet

import (
	"fmt"
	"math"
	"testing"
	"time"

	"gioui.org/io/key"
	"gioui.org/io/pointer"

	"halfvalue/app/desk"
	"halfvalue/exposure/plan"
)

// sizes are the screens that every sheet must work on, dp.
var sizes = [][2]int{{1280, 800}, {800, 1280}, {393, 852}, {960, 600}}

func eachSize(t *testing.T, do func(t *testing.T, w, h int)) {
	for _, s := range sizes {
		t.Run(fmt.Sprintf("%dx%d", s[0], s[1]), func(t *testing.T) { do(t, s[0], s[1]) })
	}
}

// A dimension is touched, scrubbed on the scale, and undone.
func TestTouchDimensionAndScrub(t *testing.T) {
	eachSize(t, func(t *testing.T, w, h int) {
		x := newHand(t, w, h, plan.Demo())
		before, start := x.seconds(), string(x.desk.State().PlanBytes)
		x.tap("SFD source to film")
		if p := x.desk.State().Panel; p.Kind != desk.DialPanel || p.Field != "setup.sfdMM" {
			t.Fatalf("touching SFD opened %+v", p)
		}
		x.drag("Scale of SFD", -120, 0)
		got := x.value("setup.sfdMM")
		if got < 850 || got > 1100 {
			t.Fatalf("scrubbing 120 dp left went from 700 to %v mm", got)
		}
		if want := before * math.Pow(got/700, 2); math.Abs(x.seconds()/want-1) > 0.1 {
			t.Fatalf("time went from %v to %v s, inverse square gives %v", before, x.seconds(), want)
		}
		x.tap("Undo")
		if string(x.desk.State().PlanBytes) != start {
			t.Fatal("undo did not give the plan back byte for byte")
		}
		x.tap("Redo")
		if x.value("setup.sfdMM") != got {
			t.Fatal("redo did not give the scrubbed value back")
		}
	})
}

// The scale stops on usual values.
func TestScrubHasDetents(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("SFD source to film")
	x.drag("Scale of SFD", -260*float32(math.Log2(800.0/700))+4, 0)
	if got := x.value("setup.sfdMM"); got != 800 {
		t.Fatalf("close to 800 the scale stopped at %v", got)
	}
}

func TestPlusMinusAndHold(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("U tube voltage")
	x.tap("Less U tube voltage")
	if got := x.value("source.tube.kv"); got != 195 {
		t.Fatalf("minus went from 200 kV to %v", got)
	}
	p := x.must("Less U tube voltage")
	x.queue(pointer.Event{Kind: pointer.Press, Source: pointer.Touch, PointerID: 1, Position: p})
	x.frames(60) // about a second
	held := x.value("source.tube.kv")
	x.queue(pointer.Event{Kind: pointer.Release, Source: pointer.Touch, PointerID: 1, Position: p, Time: time.Second})
	if held > 170 || held < 120 {
		t.Fatalf("held for a second, minus went from 195 kV to %v", held)
	}
	if got := x.value("source.tube.kv"); got != held {
		t.Fatalf("letting go moved %v to %v", held, got)
	}
	x.tap("Undo")
	if got := x.value("source.tube.kv"); got != 195 {
		t.Fatalf("the hold is not one step of undo: %v", got)
	}
}

func TestKeypadAndTypedUnits(t *testing.T) {
	eachSize(t, func(t *testing.T, w, h int) {
		x := newHand(t, w, h, plan.Demo())
		x.tap("SFD source to film")
		x.tap("Keypad")
		for _, k := range []string{"Key 2", "Key 8", "Key 5", "Erase", "Unit in"} {
			x.tap(k)
		}
		if got := x.value("setup.sfdMM"); !near(got, 711.2) {
			t.Fatalf("28 in is %v mm, refusal %v", got, x.desk.State().Refusal)
		}
		for _, k := range []string{"Key 9", "Key 0", "Key 0", "Set"} {
			x.tap(k)
		}
		if got := x.value("setup.sfdMM"); got != 900 {
			t.Fatalf("900 typed, is %v", got)
		}
		x.tap("Close")
		if x.desk.State().Panel.Kind != desk.NoPanel {
			t.Fatal("close left the dial open")
		}
	})
}

func TestHardwareKeyboard(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("SFD source to film")
	x.typeText("30 in")
	x.press(key.NameReturn, 0)
	if got := x.value("setup.sfdMM"); !near(got, 762) {
		t.Fatalf("30 in is %v mm, refusal %v", got, x.desk.State().Refusal)
	}
	x.press(key.NameRightArrow, 0)
	if got := x.value("setup.sfdMM"); got <= 762 || got > 780 {
		t.Fatalf("right arrow went to %v", got)
	}
	x.press("Z", key.ModShortcut)
	x.press("Z", key.ModShortcut)
	if got := x.value("setup.sfdMM"); got != 700 {
		t.Fatalf("two undos went to %v", got)
	}
	x.press(key.NameEscape, 0)
	if x.desk.State().Panel.Kind != desk.NoPanel {
		t.Fatal("escape left the dial open")
	}
}

// Tab reaches a dimension and Return opens it.
func TestFocusAndReturnOpen(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	for range 40 {
		x.router.MoveFocus(key.FocusForward)
		x.frames(2)
		if !x.ui.bench.Focused("cell U tube voltagedial source.tube.kv") {
			continue
		}
		x.queue(key.Event{Name: key.NameReturn, State: key.Press})
		x.queue(key.Event{Name: key.NameReturn, State: key.Release})
		if p := x.desk.State().Panel; p.Field != "source.tube.kv" {
			t.Fatalf("Return on the tube voltage opened %+v", p)
		}
		return
	}
	t.Fatal("no dial could be reached with Tab and Return")
}

// The system's back closes the dial, and is left to the system when nothing
// is open.
func TestBackClosesOnlyWhatIsOpen(t *testing.T) {
	x := newHand(t, 393, 852, plan.Demo())
	x.tap("SFD source to film")
	x.router.WakeupTime()
	x.router.Queue(key.Event{Name: key.NameBack, State: key.Press})
	if _, handled := x.router.WakeupTime(); !handled {
		t.Fatal("back with an open dial was not taken")
	}
	x.frames(2)
	if x.desk.State().Panel.Kind != desk.NoPanel {
		t.Fatal("back left the dial open")
	}
	x.router.WakeupTime()
	x.router.Queue(key.Event{Name: key.NameBack, State: key.Press})
	if _, handled := x.router.WakeupTime(); handled {
		t.Fatal("back with nothing open was taken")
	}
}

func TestRefusalIsStatedWithItsMend(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("U tube voltage")
	x.typeText("230")
	x.press(key.NameReturn, 0)
	if x.value("source.tube.kv") != 200 {
		t.Fatal("230 kV on a 200 kV head was taken")
	}
	if _, ok := x.find("Not changed: "); !ok {
		t.Fatalf("the refusal is not on the sheet: %s", x.labels())
	}
	x.tap("Dismiss")
	if x.desk.State().Refusal != nil {
		t.Fatal("dismiss left the refusal")
	}
}

func TestChooseMaterialBySearch(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("Choose Carbon steel")
	if p := x.desk.State().Panel; p.Field != "part.layers[0].material" {
		t.Fatalf("opened %+v", p)
	}
	x.ui.search.SetText("titanium")
	x.frames(2)
	x.tap("Titanium")
	if got := x.desk.State().Plan.Part.Layers[0].Material; family(got) != "titanium" {
		t.Fatalf("chose %q, refusal %v", got, x.desk.State().Refusal)
	}
}

// A stamp opens its check, and its mend is taken with one touch.
func TestStampOpensAndMends(t *testing.T) {
	eachSize(t, func(t *testing.T, w, h int) {
		x := newHand(t, w, h, plan.Demo())
		down := "Checks: down"
		if w < 560 {
			down = "Title block: down"
		}
		x.reach("Film class: falls short", down)
		x.tap("Film class: falls short")
		if p := x.desk.State().Panel; p.Kind != desk.CheckPanel || p.Field != "film-class" {
			t.Fatalf("the stamp opened %+v", p)
		}
		x.tap("Take the mend")
		if got := x.desk.State().Plan.Detector.Film.Class; got != "C4" {
			t.Fatalf("the mend left film %s, refusal %v", got, x.desk.State().Refusal)
		}
		for _, c := range x.desk.State().Answer.Checks {
			if c.ID == "film-class" && c.Verdict != desk.Holds {
				t.Fatalf("after its mend the check %s", c.Verdict)
			}
		}
	})
}

func TestLayersAreAddedAndTakenOut(t *testing.T) {
	x := newHand(t, 800, 1280, plan.Demo())
	x.desk.Apply(desk.Set{Field: "part.layers[0].mm", To: 8})
	x.frames(2)
	x.tap("Choose Carbon steel")
	x.tap("Add a layer")
	if n := len(x.desk.State().Plan.Part.Layers); n != 2 {
		t.Fatalf("%d layers, refusal %v", n, x.desk.State().Refusal)
	}
	x.tap("Take it out")
	if p := x.desk.State().Plan; len(p.Part.Layers) != 1 || p.Setup.BMM != 8 {
		t.Fatalf("%d layers, b %v", len(p.Part.Layers), p.Setup.BMM)
	}
}

func TestLookChangesLightUnitsTextAndTargets(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.tap("Look")
	x.tap("Safelight")
	x.tap("in, Ci")
	x.tap("Gloves")
	s := x.desk.State()
	if s.Light != desk.Safelight || s.Units != desk.Customary || !s.Gloves {
		t.Fatalf("look is %v %v %v", s.Light, s.Units, s.Gloves)
	}
	x.tap("Close")
	if _, ok := x.find("SFD source to film, 27.56 in"); !ok {
		t.Fatalf("SFD is not shown in inches: %s", x.labels())
	}
	if _, ok := x.find("Caution: " + Caution + " " + FogCaution); !ok {
		t.Fatal("safelight does not warn that a lit screen fogs film")
	}
}

func TestLogShotAndOpenItsEntry(t *testing.T) {
	eachSize(t, func(t *testing.T, w, h int) {
		x := newHand(t, w, h, plan.Demo())
		planned := x.seconds()
		x.tap("Log shot")
		if w >= 600 {
			x.tap("By J. Okoro")
		}
		x.reach("Append to the book", "Log panel: down")
		x.tap("Append to the book")
		if len(x.world.shots) != 1 || math.Abs(x.world.shots[0].GivenSeconds-planned) > 0.51 {
			t.Fatalf("the book has %d shots; planned %v s", len(x.world.shots), planned)
		}
		if _, ok := x.find("logged as entry 1"); !ok {
			t.Fatalf("the number is not on the sheet: %s", x.labels())
		}
		x.tap("Book")
		x.tap("Verify")
		if _, ok := x.find("1 entry, all 1 hold"); !ok {
			t.Fatalf("the verdict is not on the sheet: %s", x.labels())
		}
		x.tap("Entry 1, KF-12 weld 3")
		if _, ok := x.find("Recomputed today: every figure agrees within 1e-9."); !ok {
			t.Fatalf("no recomputation on the sheet: %s", x.labels())
		}
		x.reach("exposure time", "Entry: down")
		x.tap("Close entry")
		if x.desk.State().Book.Open != nil {
			t.Fatal("the entry did not close")
		}
	})
}

// reach scrolls until a label is in view.
func (x *hand) reach(label, down string) {
	x.t.Helper()
	for range 12 {
		if _, ok := x.find(label); ok {
			return
		}
		x.tap(down)
	}
	x.t.Fatalf("%q is not reached by %q; there are %s", label, down, x.labels())
}

// A title block that does not fit scrolls by finger and by button alike.
func TestTitleBlockScrolls(t *testing.T) {
	x := newHand(t, 960, 600, plan.Demo())
	if _, ok := x.find("Choose rules"); ok {
		t.Fatal("the rules are in view without scrolling; choose a smaller sheet for this test")
	}
	x.reach("Choose rules", "Title block: down")
	x.tap("Choose rules")
	if x.desk.State().Panel.Kind != desk.ChoicePanel {
		t.Fatal("the cell did not open")
	}
}

// Rendering asks for frames only while something is going on.
func TestStillSheetAsksForNoFrame(t *testing.T) {
	x := newHand(t, 1280, 800, plan.Demo())
	x.frames(4)
	x.router.WakeupTime()
	x.frame()
	if at, ok := x.router.WakeupTime(); ok {
		t.Fatalf("a still sheet wants a frame at %v", at)
	}
}

func BenchmarkShotFrameWithLiveCurve(b *testing.B) {
	x := newHand(&testing.T{}, 1280, 800, plan.Demo())
	x.desk.Apply(desk.Show{Panel: desk.Panel{Kind: desk.DialPanel, Field: "setup.sfdMM"}})
	x.frames(40)
	b.ReportAllocs()
	for b.Loop() {
		x.frame()
	}
}
