package desk

import "time"

// Intent is something a hand asked for. The types below are all there are.
type Intent interface{ intent() }

// Changes of the plan.
type (
	// Set changes one quantity. More says that a scrub goes on: what follows
	// with the same field belongs to the same step of undo.
	Set struct {
		Field string
		To    float64
		More  bool
	}
	// Type changes one quantity by typed text with or without a unit.
	Type struct{ Field, Text string }
	// Choose changes one choice: a film class, a material, a nuclide.
	Choose struct{ Field, To string }
	// Rename gives the plan another title.
	Rename struct{ Title string }
	// SetAt moves the plan's time.
	SetAt struct{ To time.Time }
	// AtNow moves the plan's time to the wall clock.
	AtNow struct{}
	// AddLayer puts a copy of the layer behind it.
	AddLayer struct{ After int }
	// DropLayer takes a layer out.
	DropLayer struct{ Index int }
	// TakeMend does what a check's mend says.
	TakeMend struct{ Check string }
	// Load replaces the whole plan by a plan file.
	Load struct {
		Name string
		Data []byte
	}
	// Undo takes the last step back; Redo does it again.
	Undo struct{}
	// Redo does again what Undo took back.
	Redo struct{}
)

// Changes of what is shown.
type (
	// GoTo turns to a sheet.
	GoTo struct{ Sheet Sheet }
	// Show opens a panel on the sheet; Panel{} closes it.
	Show struct{ Panel Panel }
	// Close closes what is open, the innermost first.
	Close struct{}
	// SetUnits, SetLight, SetText and SetGloves choose how everything is shown.
	SetUnits struct{ To Units }
	// SetLight chooses paper, slate or safelight.
	SetLight struct{ To Light }
	// SetText chooses the size of text in percent, 100 to 200.
	SetText struct{ Percent int }
	// SetGloves widens targets from 56 to 72 dp.
	SetGloves struct{ On bool }
	// Trace computes more of the trade-off curve; the sheet asks for it once a
	// frame while the curve is not whole.
	Trace struct{ Points int }
	// Dismiss takes the stated refusal or notice off the sheet.
	Dismiss struct{}
)

// The book.
type (
	// Log appends the shot to the book.
	Log struct {
		By           string
		GivenSeconds float64
		Note         string
	}
	// OpenEntry opens one entry; 0 closes it.
	OpenEntry struct{ Number uint64 }
	// Older and Newer turn the book's page.
	Older struct{}
	// Newer turns back towards the newest entry.
	Newer struct{}
	// VerifyBook reads the whole book and states what does not hold.
	VerifyBook struct{}
	// Recompute reckons the open entry's plan with today's engine.
	Recompute struct{}
	// PlanFromEntry takes the open entry's plan as the current plan.
	PlanFromEntry struct{}
)

func (Set) intent()           {}
func (Type) intent()          {}
func (Choose) intent()        {}
func (Rename) intent()        {}
func (SetAt) intent()         {}
func (AtNow) intent()         {}
func (AddLayer) intent()      {}
func (DropLayer) intent()     {}
func (TakeMend) intent()      {}
func (Load) intent()          {}
func (Undo) intent()          {}
func (Redo) intent()          {}
func (GoTo) intent()          {}
func (Show) intent()          {}
func (Close) intent()         {}
func (SetUnits) intent()      {}
func (SetLight) intent()      {}
func (SetText) intent()       {}
func (SetGloves) intent()     {}
func (Trace) intent()         {}
func (Dismiss) intent()       {}
func (Log) intent()           {}
func (OpenEntry) intent()     {}
func (Older) intent()         {}
func (Newer) intent()         {}
func (VerifyBook) intent()    {}
func (Recompute) intent()     {}
func (PlanFromEntry) intent() {}
