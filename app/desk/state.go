package desk

import (
	"fmt"

	"halfvalue/exposure/plan"
	"halfvalue/exposure/working"
)

// Sheet is one of the screens.
type Sheet string

// The sheets that exist.
const (
	ShotSheet Sheet = "Shot"
	BookSheet Sheet = "Book"
)

// Sheets lists them in the order of their tabs.
func Sheets() []Sheet { return []Sheet{ShotSheet, BookSheet} }

// Light is how the sheet is lit.
type Light string

// The three lights.
const (
	Paper     Light = "paper"     // sun
	Slate     Light = "slate"     // night
	Safelight Light = "safelight" // dark room: long-wave red on black only
)

// Lights lists them.
func Lights() []Light { return []Light{Paper, Slate, Safelight} }

// Panel is what is open on a sheet. The zero Panel is nothing.
type Panel struct {
	Kind  PanelKind
	Field string // DialPanel: a quantity; ChoicePanel: a choice; CheckPanel: a check's id; WorkingPanel: a step's id or empty for all
}

// PanelKind says what a panel holds.
type PanelKind string

// The panels.
const (
	NoPanel      PanelKind = ""
	DialPanel    PanelKind = "dial"
	ChoicePanel  PanelKind = "choice"
	CheckPanel   PanelKind = "check"
	WorkingPanel PanelKind = "working"
	LogPanel     PanelKind = "log"
	LookPanel    PanelKind = "look"
)

// State is everything the sheets read. Its slices are shared and read only.
type State struct {
	Plan      plan.Plan // as the user has it, always valid
	Filled    plan.Plan // with the documented defaults filled in
	Defaults  []plan.Default
	PlanBytes []byte // the same as bytes
	Answer    Answer // reckoning of Plan
	Fault     string // why Plan has no answer; empty when it has
	Checked   bool   // rules were applied

	UndoName, RedoName string   // empty: nothing to undo or redo
	Refusal            *Refusal // the last change that was refused, until the next accepted one
	Notice             string   // the last thing done that has no other trace on the sheet

	Units   Units
	Light   Light
	Text    int // percent, 100 to 200
	Gloves  bool
	Sheet   Sheet
	Panel   Panel
	People  []string // who logged before, newest first
	Rules   []Option // rule sets that the plan may name
	Curve   Curve    // trade-off of the open dial
	Book    BookView
	Demo    bool // the plan is the demo job's
	SaveErr string
}

// BookView is the book as shown.
type BookView struct {
	Fault   string  // why there is no book; empty when it is open
	Count   uint64  // entries in all
	Before  uint64  // the page shows entries older than this; 0: the newest
	Page    []Entry // newest first
	Open    *Entry  // the opened entry
	Verdict *Verdict
	Again   *Again // recomputation of the opened entry
	Logged  uint64 // number of the shot logged last in this session
}

// Again is a recomputation of an entry with today's engine.
type Again struct {
	Number  uint64
	Fault   string
	Rows    []AgainRow
	Working []working.Step // of today's reckoning of the entry's plan
}

// Agrees says whether every figure agrees.
func (a Again) Agrees() bool {
	for _, r := range a.Rows {
		if !r.Agrees {
			return false
		}
	}
	return a.Fault == ""
}

// AgainRow compares one figure.
type AgainRow struct {
	Name, Unit  string
	Then, Today float64
	Agrees      bool // within 1e-9
}

// Refusal is a change that was not made: where, what, what is allowed and
// what would mend it.
type Refusal struct {
	Field, Value, Allowed, Mend string
	Text                        string // the whole in one line, where it is not made of the others
}

// Error states the refusal in one line.
func (r *Refusal) Error() string {
	if r.Text != "" {
		return r.Text
	}
	return fmt.Sprintf("%s: %q is refused, allowed %s; %s", r.Field, r.Value, r.Allowed, r.Mend)
}
