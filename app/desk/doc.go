// Package desk holds the state of the app and is the only thing that changes
// it: the current plan with undo, the last reckoning, the open book, units,
// light and text size, which sheet is up and what is open on it.
//
// There is one way in: Apply takes an Intent, which is what a sheet returns
// when a hand did something. A change that the plan or the physics refuses
// leaves the old plan standing and is stated in State.Refusal with its mend.
// There is one way out: State, which sheets read and never write.
//
// The package imports no Gio and touches neither disk nor clock itself; what
// it needs of the world comes through Platform. It will never compute physics:
// that is the Reckoner's, and it will never draw.
//
//	d := desk.Open(platform, desk.Options{Reckon: desk.Engine(exposure.Calibration{})})
//	d.Apply(desk.Set{Field: "setup.sfdMM", To: 820})
//	d.Apply(desk.Undo{})
//	s := d.State()
package desk
