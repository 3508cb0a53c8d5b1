package main

import (
	"fmt"
	"image"
	"os"

	"gioui.org/app"
	"gioui.org/op"
	"gioui.org/unit"

	"halfvalue/app/desk"
	"halfvalue/app/sheet"
	"halfvalue/exposure"
)

// openCmd opens the app; it is what happens without a verb.
type openCmd struct {
	Book string `help:"Book to log into (default: the one in the data folder)." placeholder:"FILE"`
	Plan string `help:"Plan to open instead of the last one." placeholder:"PLAN"`
}

// noWindowError says that no window could be opened.
type noWindowError struct{ error }

// windowSize is the first size of the window on a desk, dp.
var windowSize = image.Pt(1280, 800)

// Run opens the window and ends the process with it.
func (c *openCmd) Run(e *env) error {
	p, err := newPlatform(e.data, c.Book)
	if err != nil {
		return err
	}
	o := desk.Options{Reckon: desk.Engine(exposure.Calibration{})}
	if c.Plan != "" {
		if o.Plan, err = planBytes(c.Plan, e.in); err != nil {
			return err
		}
	}
	w := new(app.Window)
	w.Option(app.Title("Halfvalue"), app.Size(unit.Dp(windowSize.X), unit.Dp(windowSize.Y)), app.MinSize(320, 480))
	go func() {
		d := desk.Open(p, o)
		err := loop(w, d)
		d.Settle()
		p.Close()
		if err != nil {
			os.Exit(exitCode(noWindowError{fmt.Errorf("no window could be opened: %w", err)}, e.err))
		}
		os.Exit(exitOK)
	}()
	app.Main()
	return nil
}

// loop is the window: it draws the state and applies what a hand asked for.
// What is accepted is stored at once, because a tablet may stop the program
// without a word.
func loop(w *app.Window, d *desk.Desk) error {
	ui := sheet.New()
	var ops op.Ops
	for {
		switch ev := w.Event().(type) {
		case app.DestroyEvent:
			return ev.Err
		case app.ConfigEvent:
			if !ev.Config.Focused {
				d.Settle()
			}
		case app.FrameEvent:
			gtx := app.NewContext(&ops, ev)
			for _, in := range ui.Layout(gtx, d.State()) {
				d.Apply(in)
			}
			ev.Frame(gtx.Ops)
		}
	}
}
