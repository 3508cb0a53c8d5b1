package main

import (
	"fmt"
	"image"
	"io"
	"os"
	"path/filepath"
	"strings"
	"time"

	"gioui.org/layout"

	"halfvalue/app/desk"
	"halfvalue/app/sheet"
	"halfvalue/exposure"
	"halfvalue/exposure/plan"
	"halfvalue/logbook"
)

// drawCmd is "draw PLAN --out DIR [--size 1280x800] [--light paper]".
type drawCmd struct {
	Plan  string `arg:"" help:"Plan file, or - for standard input."`
	Out   string `required:"" help:"Folder for the pictures; made if need be."`
	Size  string `default:"1280x800" help:"WIDTHxHEIGHT in pixels, 320 to 4096."`
	Light string `default:"paper" help:"paper, slate or safelight."`
	Text  int    `default:"100" help:"Size of text in percent, 100 to 200."`
	Book  string `help:"Book to show (default: a demo book of its own)." placeholder:"FILE"`
}

// Run draws every sheet and prints the names of the pictures.
func (c *drawCmd) Run(e *env) error {
	size, err := parseSize(c.Size)
	if err != nil {
		return err
	}
	light, err := parseLight(c.Light)
	if err != nil {
		return err
	}
	if c.Text < 100 || c.Text > 200 {
		return fmt.Errorf("--text: \"%d\" is outside 100 to 200", c.Text)
	}
	data, err := planBytes(c.Plan, e.in)
	if err != nil {
		return err
	}
	if err := os.MkdirAll(c.Out, 0o755); err != nil {
		return err
	}
	d, done, err := drawingDesk(data, c.Book)
	if err != nil {
		return err
	}
	defer done()
	d.Apply(desk.SetLight{To: light})
	d.Apply(desk.SetText{Percent: c.Text})
	pic, err := newPicture(size)
	if err != nil {
		return faultError{err}
	}
	for _, s := range desk.Sheets() {
		d.Apply(desk.GoTo{Sheet: s})
		img, err := drawState(pic, d)
		if err != nil {
			return faultError{err}
		}
		name := filepath.Join(c.Out, strings.ToLower(string(s))+".png")
		if err := savePNG(name, img); err != nil {
			return err
		}
		fmt.Fprintln(e.out, name)
	}
	return nil
}

func parseLight(text string) (desk.Light, error) {
	for _, l := range desk.Lights() {
		if string(l) == text {
			return l, nil
		}
	}
	return "", fmt.Errorf("--light: %q is none of paper, slate, safelight", text)
}

func planBytes(name string, in io.Reader) ([]byte, error) {
	p, err := readPlan(name, in)
	if err != nil {
		return nil, err
	}
	if _, err := exposure.Reckon(p, exposure.Calibration{}); err != nil {
		return nil, err
	}
	return plan.Encode(p)
}

// drawState draws what the desk shows; the first frames let a sheet measure
// itself and a curve be traced.
func drawState(pic *picture, d *desk.Desk) (*image.RGBA, error) {
	ui := sheet.New()
	return pic.frames(8, 1, drawingTime, func(gtx layout.Context) layout.Dimensions {
		for _, in := range ui.Layout(gtx, d.State()) {
			d.Apply(in)
		}
		return layout.Dimensions{Size: gtx.Constraints.Max}
	})
}

// drawingTime is the clock of pictures, so that they come out the same.
var drawingTime = time.Date(2026, 12, 1, 22, 40, 0, 0, time.UTC)

// still is the world of a picture: a fixed clock, nothing kept. It implements
// desk.Platform.
type still struct {
	book   desk.Book
	events int
}

func (s *still) Now() time.Time { return drawingTime }
func (s *still) EventID() (string, error) {
	s.events++
	return fmt.Sprintf("%032x", s.events), nil
}
func (s *still) LastPlan() ([]byte, error)    { return nil, nil }
func (s *still) SavePlan([]byte) error        { return nil }
func (s *still) Settings() ([]byte, error)    { return nil, nil }
func (s *still) SaveSettings([]byte) error    { return nil }
func (s *still) OpenBook() (desk.Book, error) { return s.book, nil }

// drawingDesk is a desk to be drawn: on the named book, opened to read, or on a
// demo book in a folder of its own that done removes.
func drawingDesk(planData []byte, book string) (d *desk.Desk, done func(), err error) {
	s := &still{}
	done = func() { s.book.Close() }
	if book != "" {
		b, err := logbook.OpenToRead(book)
		if err != nil {
			return nil, nil, err
		}
		s.book = deskBook{b}
	} else {
		dir, err := os.MkdirTemp("", "halfvalue-")
		if err != nil {
			return nil, nil, err
		}
		if s.book, err = demoBook(filepath.Join(dir, bookFile)); err != nil {
			os.RemoveAll(dir)
			return nil, nil, err
		}
		done = func() { s.book.Close(); os.RemoveAll(dir) }
	}
	return desk.Open(s, desk.Options{Reckon: desk.Engine(exposure.Calibration{}), Plan: planData}), done, nil
}

// demoCrew is the invented crew of the demo job.
var demoCrew = []string{"R. Amsel", "J. Okoro", "L. Brandt"}

// demoBook logs every plan of the demo job once.
func demoBook(path string) (desk.Book, error) {
	b, err := logbook.Open(path, drawingTime)
	if err != nil {
		return nil, err
	}
	for i, p := range plan.Demos() {
		r, err := exposure.Reckon(p, exposure.Calibration{})
		if err != nil {
			b.Close()
			return nil, fmt.Errorf("demo plan %q: %w", p.Title, err)
		}
		data, err := plan.Encode(p)
		if err != nil {
			b.Close()
			return nil, err
		}
		shot := desk.Shot{
			Event: fmt.Sprintf("%032x", 0xd0+i), At: drawingTime.Add(time.Duration(i-len(plan.Demos())) * 25 * time.Minute).In(time.FixedZone("", 3600)),
			By: demoCrew[i%len(demoCrew)], GivenSeconds: float64(int(r.Exposure.Seconds + 0.5)), Plan: data, Answer: desk.AnswerOf(r),
		}
		if _, err := b.Append(draftOf(shot)); err != nil {
			b.Close()
			return nil, err
		}
	}
	return deskBook{b}, nil
}
