package sheet

import (
	"math"

	"gioui.org/io/key"
	"gioui.org/layout"
	"gioui.org/op"
	"gioui.org/widget"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// UI is the sheets of one window. Make one with New; use it from one
// goroutine.
type UI struct {
	bench   touch.Bench
	look    *touch.Look
	s       desk.State
	intents []desk.Intent

	dial   touch.Dial
	strip  touch.Strip
	name   widget.Editor // who logs, when typed
	search widget.Editor // narrows a list of materials
	given  float64       // time given as set in the log panel, s
	who    string
	fields []textField   // of this frame
	opened bool          // the newest entry has been opened beside the list once
	known  facts         // of the plan that is shown
	room   drafting.Rect // where targets of the drawing may stand
	place  string        // which view they belong to
	panel  desk.Panel    // of the last frame, to start a panel afresh
}

// New makes the sheets with the bundled fonts.
func New() *UI {
	u := &UI{look: touch.NewLook()}
	u.name.SingleLine, u.search.SingleLine = true, true
	u.name.MaxLen, u.search.MaxLen = 60, 40
	return u
}

// Layout draws the state over the whole of gtx and returns what was asked for
// since the last frame, in order. After applying intents another frame is due,
// which Layout has already asked for.
func (u *UI) Layout(gtx layout.Context, s desk.State) []desk.Intent {
	u.s, u.intents = s, nil
	u.know()
	u.dress(gtx)
	if s.Panel != u.panel {
		u.startPanel(s.Panel)
	}
	u.bench.Begin(gtx, u.look)
	u.shortcuts()
	u.draw()
	u.bench.End()
	u.editors(gtx)
	if !s.Curve.Whole && s.Curve.Field != "" {
		u.emit(desk.Trace{Points: 2})
	}
	if len(u.intents) > 0 {
		gtx.Execute(op.InvalidateCmd{})
	}
	return u.intents
}

// facts are the quantities and choices of a plan, found once for each plan and
// not in every frame.
type facts struct {
	plan       string
	quantities map[string]desk.Quantity
	choices    map[string]desk.Choice
}

func (u *UI) know() {
	if u.known.quantities != nil && u.known.plan == string(u.s.PlanBytes) {
		return
	}
	u.known = facts{string(u.s.PlanBytes), map[string]desk.Quantity{}, map[string]desk.Choice{}}
	for _, q := range desk.Quantities(u.s.Plan) {
		u.known.quantities[q.Field] = q
	}
	for _, c := range desk.ChoicesOf(u.s.Plan, u.s.Rules) {
		u.known.choices[c.Field] = c
	}
}

func (u *UI) emit(in desk.Intent) { u.intents = append(u.intents, in) }

// do makes the action of a target.
func (u *UI) do(in desk.Intent) func() { return func() { u.emit(in) } }

// dress puts the state's light, text size and gloves on.
func (u *UI) dress(gtx layout.Context) {
	switch u.s.Light {
	case desk.Slate:
		u.look.Palette = drafting.SlateLight()
	case desk.Safelight:
		u.look.Palette = drafting.SafeLight()
	default:
		u.look.Palette = drafting.PaperLight()
	}
	text := float64(u.s.Text) / 100
	if m := gtx.Metric; m.PxPerDp > 0 && m.PxPerSp > 0 {
		text *= float64(m.PxPerSp / m.PxPerDp)
	}
	u.look.Text = math.Min(math.Max(text, 0.8), 2)
	u.look.Target = 56
	if u.s.Gloves {
		u.look.Target = 72
	}
}

// shortcuts are the keys that work on every sheet. Back and Escape are taken
// the app otherwise.
func (u *UI) shortcuts() {
	filters := []key.Filter{
		{Name: "Z", Required: key.ModShortcut, Optional: key.ModShift},
		{Name: "Y", Required: key.ModShortcut},
	}
	if u.s.Panel.Kind != desk.NoPanel || u.s.Book.Open != nil || u.s.Refusal != nil {
		filters = append(filters, key.Filter{Name: key.NameEscape}, key.Filter{Name: key.NameBack})
	}
	for _, e := range u.bench.Keys(filters...) {
		switch {
		case e.Name == key.NameEscape, e.Name == key.NameBack:
			u.emit(desk.Close{})
		case e.Name == "Z" && !e.Modifiers.Contain(key.ModShift):
			u.emit(desk.Undo{})
		default:
			u.emit(desk.Redo{})
		}
	}
}

// startPanel forgets what was typed on the panel that was open before.
func (u *UI) startPanel(p desk.Panel) {
	u.panel = p
	u.search.SetText("")
	if p.Kind == desk.LogPanel {
		u.given, u.who = math.Round(u.s.Answer.Exposure.Seconds), ""
		if len(u.s.People) > 0 {
			u.who = u.s.People[0]
		}
		u.name.SetText("")
	}
}

// wide says whether the title block stands beside the drawing.
func wide(area drafting.Rect) bool { return area.W() > 1.15*area.H() && area.W() >= 720 }

// draw draws the sheet that is up.
func (u *UI) draw() {
	b := &u.bench
	area := b.Area.Inset(touch.Unit)
	body := u.tabs(area)
	body = u.caution(body)
	body = u.notices(body)
	if u.s.Panel.Kind == desk.LookPanel {
		panel, rest := body.CutBottom(math.Min(u.panelHeight(body.W(), body.H()), body.H()*0.8))
		u.bench.Frame(panel, drafting.Bold, drafting.Line)
		u.panelIn(panel.Inset(drafting.Bold))
		_, body = rest.CutBottom(touch.Unit)
		u.s.Panel = desk.Panel{}
		if body.H() < 240 {
			return
		}
	}
	switch u.s.Sheet {
	case desk.BookSheet:
		u.bookSheet(body)
	default:
		u.shotSheet(body)
	}
}

// editors lays out the real text fields of the open panel over the drawing.
func (u *UI) editors(gtx layout.Context) {
	for _, f := range u.fields {
		u.layoutField(gtx, f)
	}
	u.fields = u.fields[:0]
}
