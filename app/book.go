package main

import (
	"crypto/rand"
	"encoding/hex"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
	"text/tabwriter"
	"time"

	"halfvalue/app/desk"
	"halfvalue/exposure"
	"halfvalue/exposure/plan"
	"halfvalue/logbook"
)

// bookCmd groups the verbs of the book.
type bookCmd struct {
	Add    bookAddCmd    `cmd:"" help:"Append a shot with its reckoning; prints its number once it is synced."`
	List   bookListCmd   `cmd:"" help:"List the entries, newest first."`
	Show   bookShowCmd   `cmd:"" help:"Show one entry whole."`
	Verify bookVerifyCmd `cmd:"" help:"Read the whole book anew; exit 0 only if all of it holds."`
}

// bookAddCmd is "book add FILE PLAN --by NAME [--given 95s]".
type bookAddCmd struct {
	File  string `arg:"" help:"The book; made on first use."`
	Plan  string `arg:"" help:"Plan file, or - for standard input."`
	By    string `required:"" help:"Who answers for the entry."`
	Given string `help:"Exposure time really given, such as 95s or 1m35s (default: as planned)."`
	Note  string `help:"Anything worth keeping with the shot."`
}

// Run logs the shot. Nothing is written unless plan, reckoning and time hold.
func (c *bookAddCmd) Run(e *env) error {
	p, err := readPlan(c.Plan, e.in)
	if err != nil {
		return err
	}
	r, err := exposure.Reckon(p, exposure.Calibration{})
	if err != nil {
		return err
	}
	given := r.Exposure.Seconds
	if c.Given != "" {
		if given, err = parseGiven(c.Given); err != nil {
			return err
		}
	}
	data, err := plan.Encode(p)
	if err != nil {
		return err
	}
	var id [16]byte
	if _, err := rand.Read(id[:]); err != nil {
		return err
	}
	b, err := logbook.Open(c.File, time.Now())
	if err != nil {
		return err
	}
	defer b.Close()
	n, err := b.Append(draftOf(desk.Shot{
		Event: hex.EncodeToString(id[:]), At: time.Now(), By: c.By, GivenSeconds: given, Note: c.Note, Plan: data, Answer: desk.AnswerOf(r),
	}))
	if err != nil {
		return err
	}
	_, err = fmt.Fprintln(e.out, n)
	return err
}

// mostGivenHours bounds a given time; beyond it is a slip of the finger.
const mostGivenHours = 48

func parseGiven(text string) (float64, error) {
	bad := func() error {
		return fmt.Errorf("--given: %q is no time from 0 to %d h, write it as 95s, 1m35s or 2h", text, mostGivenHours)
	}
	d, err := time.ParseDuration(strings.TrimSpace(text))
	if err != nil {
		v, err := strconv.ParseFloat(strings.TrimSpace(text), 64)
		if err != nil || math.IsNaN(v) {
			return 0, bad()
		}
		return 0, fmt.Errorf("--given: %q has no unit, write %ss for seconds", text, strings.TrimSpace(text))
	}
	if d < 0 || d > mostGivenHours*time.Hour {
		return 0, bad()
	}
	return d.Seconds(), nil
}

func titleOf(data []byte) string {
	var p struct{ Title string }
	if json.Unmarshal(data, &p) != nil {
		return ""
	}
	return p.Title
}

// bookListCmd is "book list FILE [--json] [--limit N]".
type bookListCmd struct {
	File  string `arg:"" help:"The book."`
	JSON  bool   `name:"json" help:"JSON Lines, one entry a line."`
	Limit int    `help:"Only the newest so many entries (default: all)."`
}

// listedEntry is an entry on one line of JSON.
type listedEntry struct {
	Entry   uint64          `json:"entry"`
	Hash    string          `json:"hash"`
	Record  json.RawMessage `json:"record"` // the exact bytes that are sealed
	Title   string          `json:"title,omitempty"`
	By      string          `json:"by"`
	Time    string          `json:"time"`
	Kind    string          `json:"kind"`
	GivenS  string          `json:"givenS,omitempty"`
	Planned string          `json:"planned,omitempty"`
}

func listed(r logbook.Record) listedEntry {
	return listedEntry{r.Seq, r.Hash, r.Raw, r.Title, r.By, r.Time, string(r.Kind), r.Given, deskEntry(r).Planned}
}

// page is how many entries are read at once.
const page = 1000

// Run lists the book in pages, so that a long one takes no memory.
func (c *bookListCmd) Run(e *env) error {
	if c.Limit < 0 {
		return fmt.Errorf("--limit: \"%d\" is below 0", c.Limit)
	}
	b, err := logbook.OpenToRead(c.File)
	if err != nil {
		return err
	}
	defer b.Close()
	w := tabwriter.NewWriter(e.out, 0, 8, 2, ' ', 0)
	if !c.JSON {
		fmt.Fprintln(w, "entry\ttime\tby\tgiven\tplanned\ttitle")
	}
	left := c.Limit
	for before := uint64(0); ; {
		n := page
		if c.Limit > 0 {
			n = min(n, left)
		}
		list, err := b.List(before, n)
		if err != nil {
			return faultError{err}
		}
		for _, r := range list {
			if err := c.print(e.out, w, r); err != nil {
				return err
			}
			before = r.Seq
		}
		left -= len(list)
		if len(list) < n || before == 1 || c.Limit > 0 && left == 0 {
			return w.Flush()
		}
	}
}

func (c *bookListCmd) print(out, table io.Writer, r logbook.Record) error {
	if c.JSON {
		return json.NewEncoder(out).Encode(listed(r))
	}
	given := r.Given
	if given != "" {
		given += " s"
	}
	_, err := fmt.Fprintf(table, "%d\t%s\t%s\t%s\t%s\t%s\n", r.Seq, r.When().Format("2006-01-02 15:04 -0700"), r.By, given, deskEntry(r).Planned, r.Title)
	return err
}

// bookShowCmd is "book show FILE N [--json]".
type bookShowCmd struct {
	File   string `arg:"" help:"The book."`
	Number uint64 `arg:"" help:"Number of the entry."`
	JSON   bool   `name:"json" help:"Answer in JSON."`
}

// Run shows one entry whole.
func (c *bookShowCmd) Run(e *env) error {
	b, err := logbook.OpenToRead(c.File)
	if err != nil {
		return err
	}
	defer b.Close()
	r, err := b.Get(c.Number)
	if err != nil {
		return err
	}
	if c.JSON {
		return printJSON(e.out, listed(r))
	}
	fmt.Fprintf(e.out, "entry   %d, %s\ntitle   %s\ntime    %s\nby      %s\n", r.Seq, r.Kind, r.Title, r.When().Format(time.RFC3339), r.By)
	if r.Given != "" {
		fmt.Fprintf(e.out, "given   %s s\n", r.Given)
	}
	for _, f := range r.Figures {
		fmt.Fprintf(e.out, "        %s %s %s\n", f.Name, f.Value, f.Unit)
	}
	if r.Note != "" {
		fmt.Fprintf(e.out, "note    %s\n", r.Note)
	}
	fmt.Fprintf(e.out, "engine  %s\nplan    %s\nhash    %s\n", r.Engine, r.Plan, r.Hash)
	for _, c := range exposure.Cautions() {
		fmt.Fprintf(e.out, "caution %s\n", c)
	}
	return nil
}

// bookVerifyCmd is "book verify FILE [--json] [--key VKEY]".
type bookVerifyCmd struct {
	File string `arg:"" help:"The book."`
	JSON bool   `name:"json" help:"Answer in JSON."`
	Key  string `help:"Public key that the checkpoint must be signed with (default: the one that the book names)."`
}

// Run verifies the book; a fault is exit code 1.
func (c *bookVerifyCmd) Run(e *env) error {
	b, err := logbook.OpenToRead(c.File)
	if errors.Is(err, logbook.ErrDamaged) {
		return faultError{err}
	}
	if err != nil {
		return err
	}
	defer b.Close()
	r, err := b.Verify(c.Key)
	if err != nil {
		return err
	}
	if c.JSON {
		if err := printJSON(e.out, r); err != nil {
			return err
		}
	} else {
		for _, f := range r.Faults {
			fmt.Fprintln(e.out, f)
		}
		if r.Holds {
			fmt.Fprintf(e.out, "%d entries, all of it holds\nkey %s\n", r.Entries, r.Key)
		}
	}
	if !r.Holds {
		return faultError{fmt.Errorf("%d faults in %d entries", len(r.Faults), r.Entries)}
	}
	return nil
}
