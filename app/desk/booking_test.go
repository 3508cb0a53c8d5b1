package desk

import (
	"errors"
	"strings"
	"testing"
)

func TestLoggedNumberIsShownOnlyWhenSynced(t *testing.T) {
	w := newWorld()
	w.book.lose = true
	d := open(w)
	d.Apply(Show{Panel{Kind: LogPanel}})
	d.Apply(Log{By: "J. Okoro", GivenSeconds: 95})
	s := d.State()
	if s.Book.Logged != 0 || s.Refusal == nil || !strings.Contains(s.Refusal.Error(), "not logged") {
		t.Fatalf("shown as %d with refusal %v", s.Book.Logged, s.Refusal)
	}
	d.Apply(Log{By: "J. Okoro", GivenSeconds: 95})
	s = d.State()
	if s.Book.Logged != 1 || len(w.book.shots) != 1 || s.Book.Count != 1 {
		t.Fatalf("pressed again: number %d, %d shots in the book", s.Book.Logged, len(w.book.shots))
	}
	if s.People[0] != "J. Okoro" || s.Panel.Kind != NoPanel {
		t.Fatalf("people %v, panel %v", s.People, s.Panel)
	}
	d.Apply(Log{By: "J. Okoro", GivenSeconds: 96})
	if got := d.State().Book.Logged; got != 2 || w.book.shots[1].Event == w.book.shots[0].Event {
		t.Fatalf("the next press has number %d", got)
	}
}

func TestLogRefusals(t *testing.T) {
	w := newWorld()
	w.noBook = errors.New("another program has the book open")
	d := open(w)
	d.Apply(Log{By: "x", GivenSeconds: 1})
	if r := d.State().Refusal; r == nil || !strings.Contains(r.Error(), "another program") {
		t.Fatalf("got %v", r)
	}
	w.noBook = nil
	for _, in := range []Log{{By: "  ", GivenSeconds: 1}, {By: "x", GivenSeconds: -1}, {By: "x", GivenSeconds: 1e9}} {
		d = open(w)
		d.Apply(in)
		if d.State().Refusal == nil || len(w.book.shots) != 0 {
			t.Errorf("%+v was logged", in)
		}
	}
}

func TestPagesAndEntry(t *testing.T) {
	w := newWorld()
	d := open(w)
	for range PageSize + 5 {
		d.Apply(Log{By: "R. Amsel", GivenSeconds: 60})
	}
	s := d.State()
	if s.Book.Page[0].Number != PageSize+5 || len(s.Book.Page) != PageSize {
		t.Fatalf("first page starts at %d with %d entries", s.Book.Page[0].Number, len(s.Book.Page))
	}
	d.Apply(Older{})
	if s = d.State(); s.Book.Page[0].Number != 5 || len(s.Book.Page) != 5 {
		t.Fatalf("second page starts at %d", s.Book.Page[0].Number)
	}
	d.Apply(Older{})
	d.Apply(Newer{})
	if s = d.State(); s.Book.Page[0].Number != PageSize+5 {
		t.Fatalf("back on the first page: %d", s.Book.Page[0].Number)
	}
	d.Apply(OpenEntry{Number: 3})
	s = d.State()
	if s.Book.Open == nil || s.Book.Again == nil || !s.Book.Again.Agrees() || len(s.Book.Again.Rows) < 3 || len(s.Book.Again.Working) == 0 {
		t.Fatalf("entry %v, recomputed %+v", s.Book.Open, s.Book.Again)
	}
	d.Apply(Close{})
	if d.State().Book.Open != nil {
		t.Fatal("close left the entry open")
	}
	d.Apply(OpenEntry{Number: 999})
	if d.State().Refusal == nil {
		t.Fatal("an entry that is not there was not refused")
	}
}

// A figure that was changed after the fact is found by recomputing.
func TestRecomputeFindsAnotherFigure(t *testing.T) {
	w := newWorld()
	d := open(w)
	d.Apply(Log{By: "R. Amsel", GivenSeconds: 60})
	w.book.shots[0].Answer.Exposure.Seconds *= 1 + 1e-8
	d.Apply(OpenEntry{Number: 1})
	if d.State().Book.Again.Agrees() {
		t.Fatal("a figure that is off by 1e-8 agrees")
	}
}

func TestVerifyAndUsePlan(t *testing.T) {
	d := open(newWorld())
	d.Apply(Log{By: "R. Amsel", GivenSeconds: 60})
	logged := string(d.State().PlanBytes)
	d.Apply(Set{Field: "setup.sfdMM", To: 900})
	d.Apply(VerifyBook{})
	if v := d.State().Book.Verdict; v == nil || !v.Holds() || v.Entries != 1 {
		t.Fatalf("verdict %+v", v)
	}
	d.Apply(OpenEntry{Number: 1})
	d.Apply(PlanFromEntry{})
	if string(d.State().PlanBytes) != logged {
		t.Fatal("the entry's plan did not come back byte for byte")
	}
}
