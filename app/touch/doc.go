// Package touch is what a gloved hand acts on: buttons, the dial with its
// scale, keypad and plus and minus, stamps, the trade-off strip, scrolling
// areas. Everything is drawn through app/drafting; Gio only takes the
// pointer, the keys and the labels for a screen reader.
//
// A Bench builds one frame. Begin runs what was touched since the last frame,
// then the sheet draws and names its targets, then End paints the drawing and
// registers the targets:
//
//	b.Begin(gtx, look)
//	b.Button(touch.Button{Box: r, Label: "Log shot", Do: func() { ... }})
//	b.End()
//
// Targets are at least Look.Target dp wide and high. Time is gtx.Now and
// nothing else; there is no state in package variables.
package touch
