package logbook

import (
	"bytes"
	"fmt"
	"regexp"
	"time"
	"unicode/utf8"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

// Version is the entry version that Append writes.
const Version = 1

// Kind says what an entry records.
type Kind string

// The kinds of version 1.
const (
	Shot       Kind = "shot"       // one exposure, its plan and reckoning
	Correction Kind = "correction" // points at an earlier entry and says why
	Note       Kind = "note"       // anything worth keeping
)

var kinds = map[Kind]bool{Shot: true, Correction: true, Note: true}

// Figure is one named quantity as decimal text.
type Figure struct {
	Name  string `json:"name"`
	Unit  string `json:"unit"`
	Value string `json:"value"` // decimal, "110.6"
}

// Entry is one record of the book.
type Entry struct {
	V         int      `json:"v"`
	Seq       uint64   `json:"seq"` // number, from 1
	Kind      Kind     `json:"kind"`
	Time      string   `json:"time"`       // RFC 3339 in UTC, of the clock when the entry was made
	OffsetMin int      `json:"offset_min"` // of local time from UTC
	Event     string   `json:"event"`      // 32 hexadecimal digits: one press of the button
	By        string   `json:"by"`         // who answers for it
	Title     string   `json:"title,omitzero"`
	Given     string   `json:"given_s,omitzero"` // exposure really given, s
	Plan      string   `json:"plan,omitzero"`    // the plan's own bytes
	Figures   []Figure `json:"figures,omitzero"` // the reckoning as planned
	Engine    string   `json:"engine,omitzero"`  // what reckoned it
	Of        uint64   `json:"of,omitzero"`      // the entry that a correction is about
	Note      string   `json:"note,omitzero"`
}

// When gives the entry's time in its own offset.
func (e Entry) When() time.Time {
	t, err := time.Parse(time.RFC3339Nano, e.Time)
	if err != nil {
		return time.Time{}
	}
	return t.In(time.FixedZone("", e.OffsetMin*60))
}

// Limits of an entry.
const (
	mostText  = 4 << 10
	mostPlan  = 256 << 10
	mostLines = 1000
)

var (
	eventForm   = regexp.MustCompile(`^[0-9a-f]{32}$`)
	decimalForm = regexp.MustCompile(`^-?(0|[1-9][0-9]*)(\.[0-9]+)?$`)
)

// check refuses what no entry may hold.
func (e Entry) check() error {
	t, err := time.Parse(time.RFC3339Nano, e.Time)
	switch {
	case e.V != Version:
		return fmt.Errorf("entry version %d is unknown, this program knows %d", e.V, Version)
	case e.Seq == 0:
		return fmt.Errorf("entry without a number")
	case !kinds[e.Kind]:
		return fmt.Errorf("kind %q is unknown: shot, correction or note", e.Kind)
	case err != nil || t.UTC().Format(time.RFC3339Nano) != e.Time:
		return fmt.Errorf("time %q is not RFC 3339 in UTC", e.Time)
	case e.OffsetMin < -14*60 || e.OffsetMin > 14*60:
		return fmt.Errorf("offset of %d min is outside -840 to 840", e.OffsetMin)
	case !eventForm.MatchString(e.Event):
		return fmt.Errorf("event %q is not 32 hexadecimal digits", e.Event)
	case e.By == "":
		return fmt.Errorf("nobody answers for the entry: give a name")
	case e.Given != "" && (!decimalForm.MatchString(e.Given) || e.Given[0] == '-'):
		return fmt.Errorf("given time %q is no decimal number of seconds", e.Given)
	case e.Kind == Shot && e.Plan == "":
		return fmt.Errorf("a shot without its plan")
	case e.Kind == Correction && (e.Of == 0 || e.Of >= e.Seq || e.Note == ""):
		return fmt.Errorf("a correction names an earlier entry and says why")
	case e.Kind != Correction && e.Of != 0:
		return fmt.Errorf("only a correction points at another entry")
	}
	return e.checkTexts()
}

func (e Entry) checkTexts() error {
	for _, text := range []string{e.By, e.Title, e.Engine, e.Note} {
		if len(text) > mostText || !utf8.ValidString(text) {
			return fmt.Errorf("text of %d bytes is over %d or not UTF-8", len(text), mostText)
		}
	}
	if len(e.Plan) > mostPlan || !utf8.ValidString(e.Plan) {
		return fmt.Errorf("plan of %d bytes is over %d or not UTF-8", len(e.Plan), mostPlan)
	}
	if len(e.Figures) > mostLines {
		return fmt.Errorf("%d figures are over %d", len(e.Figures), mostLines)
	}
	for _, f := range e.Figures {
		if f.Name == "" || !decimalForm.MatchString(f.Value) || !utf8.ValidString(f.Name+f.Unit) {
			return fmt.Errorf("figure %q has the value %q, want decimal text", f.Name, f.Value)
		}
	}
	return nil
}

// encode gives the one form of an entry.
func (e Entry) encode() ([]byte, error) {
	if err := e.check(); err != nil {
		return nil, err
	}
	data, err := json.Marshal(e)
	if err != nil {
		return nil, err
	}
	v := jsontext.Value(data)
	if err := v.Canonicalize(); err != nil {
		return nil, err
	}
	return v, nil
}

// Decode reads the bytes of an entry. It accepts only the one form: what it
// accepts encodes to the same bytes.
func Decode(data []byte) (Entry, error) {
	var e Entry
	if err := json.Unmarshal(data, &e, json.RejectUnknownMembers(true)); err != nil {
		return Entry{}, fmt.Errorf("entry is no canonical JSON: %w", err)
	}
	again, err := e.encode()
	if err != nil {
		return Entry{}, err
	}
	if !bytes.Equal(again, data) {
		return Entry{}, fmt.Errorf("entry %d is not in canonical form", e.Seq)
	}
	return e, nil
}
