// Command halfvalue is the whole program: the app in its window and the verbs
// of the command line. It joins the physics (exposure, materials), the book
// (logbook) and the sheets (app/sheet, app/desk); it is the only package that
// imports gioui.org/app and the only one that touches disk, clock, window and
// random numbers on their behalf.
package main

import (
	"errors"
	"fmt"
	"io"
	"os"

	"github.com/alecthomas/kong"
)

// Exit codes of every verb.
const (
	exitOK       = 0
	exitFault    = 1  // what was asked was done, and the answer is no: a book that does not verify
	exitUsage    = 2  // bad use or bad input; nothing was written
	exitNoWindow = 69 // no window could be opened; app/run.sh then draws instead
)

// env is what a verb may touch of the world; tests give their own.
type env struct {
	in       io.Reader
	out, err io.Writer
	data     string // folder of all state; empty: the platform's
}

// commands is the command line. Help texts are what the user reads.
type commands struct {
	Data string `help:"Folder that holds all state (default: the platform's folder for programs)." placeholder:"DIR"`

	Open   openCmd   `cmd:"" default:"withargs" help:"Open the app (what happens without a verb)."`
	Reckon reckonCmd `cmd:"" help:"Compute exposure, boundary and checks of a plan."`
	Draw   drawCmd   `cmd:"" help:"Draw the sheets of a plan to PNG, without a display."`
	Table  tableCmd  `cmd:"" help:"Print attenuation or half-value layers."`
	Book   bookCmd   `cmd:"" help:"Append to, read and verify a book."`
}

const about = `Exposure, boundary and log for industrial radiographs on site.

Results are an aid. Site radiation rules, the licence and the radiation safety officer or licensed supervisor govern.
PLAN is a plan file, or - for standard input.`

func main() {
	os.Exit(run(os.Args[1:], env{in: os.Stdin, out: os.Stdout, err: os.Stderr}))
}

// faultError asks for exit code 1: the question was answered, with no.
type faultError struct{ error }

// run parses args, does the verb and returns the exit code.
func run(args []string, e env) int {
	var c commands
	stop := -1
	parser, err := kong.New(&c,
		kong.Name("halfvalue"), kong.Description(about),
		kong.Writers(e.out, e.err),
		kong.Exit(func(code int) { stop = code }),
		kong.ConfigureHelp(kong.HelpOptions{Compact: true}),
	)
	if err != nil {
		panic("halfvalue: command line: " + err.Error())
	}
	ctx, err := parser.Parse(args)
	if stop == 0 { // help was printed
		return exitOK
	}
	if err != nil {
		fmt.Fprintf(e.err, "halfvalue: %v\n", err)
		return exitUsage
	}
	e.data = c.Data
	return exitCode(ctx.Run(&e), e.err)
}

// exitCode prints err, if any, and picks the code.
func exitCode(err error, w io.Writer) int {
	var fault faultError
	var none noWindowError
	switch {
	case err == nil:
		return exitOK
	case errors.As(err, &none):
		fmt.Fprintf(w, "halfvalue: %v\n", err)
		return exitNoWindow
	case errors.As(err, &fault):
		fmt.Fprintf(w, "halfvalue: %v\n", err)
		return exitFault
	}
	fmt.Fprintf(w, "halfvalue: %v\n", err)
	return exitUsage
}
