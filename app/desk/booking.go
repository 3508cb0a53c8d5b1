package desk

import (
	"fmt"
	"math"
	"slices"
	"strings"
)

// PageSize is how many entries a page of the book holds.
const PageSize = 40

func (d *Desk) openBook() {
	b, err := d.platform.OpenBook()
	if err != nil {
		d.state.Book.Fault = err.Error()
		return
	}
	d.book = b
	d.readPage()
}

// CloseBook closes the book; the window calls it at its end.
func (d *Desk) CloseBook() error {
	if d.book == nil {
		return nil
	}
	b := d.book
	d.book, d.state.Book.Fault = nil, "the book is closed"
	return b.Close()
}

func (d *Desk) applyBook(in Intent) {
	if d.book == nil {
		d.refuse(fmt.Errorf("there is no open book: %s", d.state.Book.Fault))
		return
	}
	switch in := in.(type) {
	case Log:
		d.log(in)
	case OpenEntry:
		d.openEntry(in.Number)
	case Older:
		d.older()
	case Newer:
		d.newer()
	case VerifyBook:
		d.verify()
	case Recompute:
		d.recompute()
	case PlanFromEntry:
		if e := d.state.Book.Open; e != nil {
			d.load(fmt.Sprintf("the plan of entry %d", e.Number), e.Plan)
		}
	}
}

func (d *Desk) newEvent() {
	e, err := d.platform.EventID()
	if err != nil {
		d.refuse(fmt.Errorf("no identity for the entry: %w", err))
		return
	}
	d.event = e
}

// log appends the shot. Its number is shown only when the book has synced it.
// A press that was not acknowledged keeps its event, so that pressing again
// never logs the shot twice.
func (d *Desk) log(in Log) {
	by := strings.TrimSpace(in.By)
	switch {
	case by == "":
		d.refuse(fmt.Errorf("the shot is not logged: say who logs it"))
		return
	case d.state.Fault != "":
		d.refuse(fmt.Errorf("the shot is not logged: the plan has no answer: %s", d.state.Fault))
		return
	case !(in.GivenSeconds >= 0) || math.IsInf(in.GivenSeconds, 0) || in.GivenSeconds > 86400:
		d.refuse(fmt.Errorf("the shot is not logged: %q s given is not from 0 to 86400 s", fmt.Sprint(in.GivenSeconds)))
		return
	}
	if d.event == "" {
		d.newEvent()
	}
	if d.event == "" {
		return
	}
	n, err := d.book.Append(Shot{Event: d.event, At: d.platform.Now(), By: by, GivenSeconds: in.GivenSeconds,
		Note: in.Note, Plan: d.state.PlanBytes, Answer: d.state.Answer})
	if err != nil {
		d.refuse(fmt.Errorf("the shot is not logged: %w; press again, it will not be logged twice", err))
		return
	}
	d.event = ""
	d.state.Refusal = nil
	d.state.Book.Logged = n
	d.state.Notice = fmt.Sprintf("logged as entry %d", n)
	d.remember(by)
	d.state.Panel = Panel{}
	d.state.Book.Before, d.state.Book.Verdict = 0, nil
	d.readPage()
}

// remember puts a person first in the list of who logged before.
func (d *Desk) remember(by string) {
	people := slices.DeleteFunc(slices.Clone(d.state.People), func(p string) bool { return p == by })
	people = append([]string{by}, people...)
	d.state.People = people[:min(len(people), 8)]
	d.saveSettings()
}

// readPage reads the page that is shown.
func (d *Desk) readPage() {
	if d.book == nil {
		return
	}
	v := &d.state.Book
	n, err := d.book.Count()
	if err == nil {
		v.Count = n
		v.Page, err = d.book.Page(v.Before, PageSize)
	}
	v.Fault = ""
	if err != nil {
		v.Fault = err.Error()
	}
}

func (d *Desk) older() {
	v := &d.state.Book
	if n := len(v.Page); n > 0 && v.Page[n-1].Number > 1 {
		v.Before = v.Page[n-1].Number
		d.readPage()
	}
}

func (d *Desk) newer() {
	v := &d.state.Book
	if v.Before == 0 {
		return
	}
	v.Before += PageSize
	if v.Before > v.Count {
		v.Before = 0
	}
	d.readPage()
}

func (d *Desk) openEntry(n uint64) {
	v := &d.state.Book
	v.Open, v.Again = nil, nil
	if n == 0 {
		return
	}
	e, err := d.book.Entry(n)
	if err != nil {
		d.refuse(fmt.Errorf("entry %d: %w", n, err))
		return
	}
	v.Open = &e
	d.state.Refusal = nil
	d.recompute()
}

func (d *Desk) verify() {
	verdict, err := d.book.Verify()
	if err != nil {
		d.refuse(fmt.Errorf("the book was not verified: %w", err))
		return
	}
	verdict.At = d.platform.Now()
	d.state.Book.Verdict = &verdict
}
