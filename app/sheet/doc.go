// Package sheet draws the screens: the Shot sheet, a side view to scale whose
// dimensions can be touched, with the answer in its title block; and the Book
// sheet, the log with each entry's working.
//
// A sheet reads a desk.State, draws it, and returns what a hand asked for as
// desk.Intents; it changes nothing itself and knows no clock but gtx.Now. What
// it keeps between frames is only where things are scrolled and what has been
// typed and not yet set.
//
//	ui := sheet.New()
//	for _, in := range ui.Layout(gtx, d.State()) {
//		d.Apply(in)
//	}
//
// It imports neither gioui.org/app nor gpu/headless, so it builds and is
// tested without a C compiler and without a display.
package sheet
