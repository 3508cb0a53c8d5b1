package main

import (
	"fmt"
	"strconv"
	"time"

	"halfvalue/app/desk"
	"halfvalue/logbook"
)

// deskBook shows a logbook to the desk. It implements desk.Book.
type deskBook struct{ book *logbook.Book }

func openDeskBook(path string) (desk.Book, error) {
	b, err := logbook.Open(path, time.Now())
	if err != nil {
		return nil, err
	}
	return deskBook{b}, nil
}

// Append logs a shot; it returns once the entry is synced.
func (b deskBook) Append(s desk.Shot) (uint64, error) { return b.book.Append(draftOf(s)) }

// draftOf turns a shot of the desk into a draft of the book: quantities become
// decimal text that no processor rounds again.
func draftOf(s desk.Shot) logbook.Draft {
	return logbook.Draft{
		Kind: logbook.Shot, At: s.At, Event: s.Event, By: s.By, Title: titleOf(s.Plan), Given: decimal(s.GivenSeconds),
		Plan: s.Plan, Figures: figuresOf(s.Answer), Engine: s.Answer.Engine, Note: s.Note,
	}
}

func decimal(v float64) string { return strconv.FormatFloat(v, 'f', -1, 64) }

// Names of the figures of a shot's entry.
const (
	figureSeconds = "exposure"
	figureLow     = "exposure, low"
	figureHigh    = "exposure, high"
	figureMAMin   = "exposure, current x time"
	figureGBqMin  = "exposure, activity x time"
)

// figuresOf lists what was reckoned as planned.
func figuresOf(a desk.Answer) []logbook.Figure {
	var list []logbook.Figure
	add := func(name, unit string, v float64) {
		list = append(list, logbook.Figure{Name: name, Unit: unit, Value: decimal(v)})
	}
	x := a.Exposure
	add(figureSeconds, "s", x.Seconds)
	add(figureLow, "s", x.SecondsLow)
	add(figureHigh, "s", x.SecondsHigh)
	if x.MAMin > 0 {
		add(figureMAMin, "mA min", x.MAMin)
	}
	if x.GBqMin > 0 {
		add(figureGBqMin, "GBq min", x.GBqMin)
		add("activity at the plan's time", "GBq", a.ActivityGBq)
	}
	for _, d := range a.Density {
		add("density at "+d.At, "1", d.Density)
	}
	for _, d := range a.SNR {
		add("SNR_N at "+d.At, "1", d.SNRn)
	}
	for _, r := range a.Boundary {
		if !r.Within {
			add("rope for "+r.Limit+", "+r.Direction, "m", r.Metres)
		}
	}
	return list
}

// Count gives the number of entries.
func (b deskBook) Count() (uint64, error) { return b.book.Count() }

// Page gives a screenful, newest first.
func (b deskBook) Page(before uint64, n int) ([]desk.Entry, error) {
	list, err := b.book.List(before, n)
	out := make([]desk.Entry, len(list))
	for i, r := range list {
		out[i] = deskEntry(r)
	}
	return out, err
}

// Entry gives one entry by its number.
func (b deskBook) Entry(number uint64) (desk.Entry, error) {
	r, err := b.book.Get(number)
	if err != nil {
		return desk.Entry{}, err
	}
	return deskEntry(r), nil
}

// Verify reads the whole book.
func (b deskBook) Verify() (desk.Verdict, error) {
	r, err := b.book.Verify("")
	v := desk.Verdict{Entries: r.Entries, At: time.Now()}
	for _, f := range r.Faults {
		v.Faults = append(v.Faults, f.String())
	}
	return v, err
}

// Close closes the book.
func (b deskBook) Close() error { return b.book.Close() }

func deskEntry(r logbook.Record) desk.Entry {
	e := desk.Entry{
		Number: r.Seq, At: r.When(), By: r.By, Title: r.Title, Note: r.Note, Hash: r.Hash, Plan: []byte(r.Plan), Text: r.Raw, Engine: r.Engine,
	}
	e.GivenSeconds, _ = strconv.ParseFloat(r.Given, 64)
	into := map[string]*float64{figureSeconds: &e.Then.Seconds, figureLow: &e.Then.SecondsLow, figureHigh: &e.Then.SecondsHigh,
		figureMAMin: &e.Then.MAMin, figureGBqMin: &e.Then.GBqMin}
	for _, f := range r.Figures {
		e.Figures = append(e.Figures, desk.Figure{Name: f.Name, Value: f.Value, Unit: f.Unit})
		if to := into[f.Name]; to != nil {
			*to, _ = strconv.ParseFloat(f.Value, 64)
		}
	}
	e.Planned = plannedLine(e.Then)
	return e
}

// plannedLine is the exposure as planned in one line.
func plannedLine(x desk.Exposure) string {
	switch {
	case x.MAMin > 0:
		return fmt.Sprintf("%.0f s, %.3g mA min", x.Seconds, x.MAMin)
	case x.GBqMin > 0:
		return fmt.Sprintf("%.0f s, %.4g GBq min", x.Seconds, x.GBqMin)
	case x.Seconds > 0:
		return fmt.Sprintf("%.0f s", x.Seconds)
	}
	return ""
}
