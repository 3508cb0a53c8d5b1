package rules

import (
	"fmt"

	"halfvalue/exposure/working"
)

// Verdict of a check.
type Verdict string

// The verdicts.
const (
	Holds     Verdict = "holds"
	Short     Verdict = "short"
	Undecided Verdict = "undecided"
)

// Check is one rule applied to a plan.
type Check struct {
	ID         string
	Title      string
	Verdict    Verdict
	Value      float64
	Limit      float64
	Unit       string
	Text       string // the finding in a sentence
	Rule       string // what the rule asks, in our own words, with what may be agreed on
	Clause     string // "ISO 17636-1:2013, 7.6"
	Confidence string // one of Confidences
	From       string // company file; "" for ours
	Formula    string // how Value and Limit came about; "" where a table was read
	Inputs     []working.Input
}

// Step is the working of the check.
func (c Check) Step() working.Step {
	formula := c.Formula
	if formula == "" {
		formula = "read in the table of the rule"
	}
	limit := in("limit", "limit", c.Limit, c.Unit)
	limit.Source = c.Source()
	return working.Step{ID: "check." + c.ID, Name: c.Title, Formula: formula, Inputs: append([]working.Input{limit}, c.Inputs...),
		Value: c.Value, Unit: c.Unit, Source: c.Source(), Note: string(c.Verdict) + ": " + c.Text + "; the rule: " + c.Rule}
}

// Source cites the check for a working: document, clause, confidence, that the
// edition in force is to be looked at, and the company's file where the row came
// from one.
func (c Check) Source() string {
	s := c.Clause + "; " + Confidences[c.Confidence]
	if c.recalled() {
		s += "; " + edition
	}
	if c.From != "" {
		s += "; company table " + c.From
	}
	return s
}

// recalled tells of a figure of a document that nobody here has read in it.
func (c Check) recalled() bool {
	switch c.Confidence {
	case "seen", "company", "exact", "common practice":
		return false
	}
	return true
}

// edition stands with every figure that nobody read in the document.
const edition = "check against the edition in force"

// Apply judges the facts by every row of the set that applies, in the order of
// the set. A row of low confidence, and a recommendation that is not met, come
// out undecided. Where the set has figures for other materials only, that is an
// undecided check too: a rule that is not there does not pass.
func (s Set) Apply(f Facts) []Check {
	list := []Check{}
	told := map[string]bool{}
	for _, row := range s.Rows {
		if told[row.ID] || !row.For.covers(f) {
			continue
		}
		rule, err := row.rule()
		if err != nil {
			panic("rules: " + err.Error()) // read has checked every row
		}
		if !rule.applies(f) {
			continue
		}
		if !row.For.coversFamily(f) {
			if s.another(row, f) {
				continue
			}
			told[row.ID] = true
			list = append(list, row.finish(judgement{verdict: Undecided, text: noFamily(f)}))
			continue
		}
		told[row.ID] = true
		list = append(list, row.finish(rule.judge(f)))
	}
	return list
}

// another tells whether a later or earlier row of the same ID covers the
// material.
func (s Set) another(row Row, f Facts) bool {
	for _, r := range s.Rows {
		if r.ID == row.ID && r.For.covers(f) && r.For.coversFamily(f) {
			return true
		}
	}
	return false
}

func noFamily(f Facts) string {
	if f.Family == "" {
		return "layers of different materials: the rule has no figure for them"
	}
	return "the rule has no figure for material of family " + f.Family
}

func (r Row) finish(j judgement) Check {
	c := Check{ID: r.ID, Title: r.Title, Verdict: j.verdict, Value: j.value, Limit: j.limit, Unit: j.unit, Text: j.text, Rule: r.Text, Clause: r.Document + ", " + r.Clause, Confidence: r.Confidence, From: r.From, Formula: j.formula, Inputs: j.inputs}
	switch {
	case r.Confidence == "low":
		c.Verdict = Undecided
		c.Text += "; guidance only, the figure is of low confidence"
	case r.Guidance && j.verdict == Short:
		c.Verdict = Undecided
		c.Text += "; a recommendation, not met"
	}
	return c
}

// at most and at least are the two ways to hold a figure against a limit, with
// room for decimals that are equal on paper.
const slack = 1e-9

func atMost(v, limit float64) Verdict {
	if v <= limit*(1+slack) {
		return Holds
	}
	return Short
}

func atLeast(v, limit float64) Verdict {
	if v >= limit*(1-slack) {
		return Holds
	}
	return Short
}

// extent writes a range, or one figure where both ends are the same.
func extent(a, b float64, format string) string {
	if say(format, a) == say(format, b) {
		return say(format, a)
	}
	return say(format, a) + " to " + say(format, b)
}

func say(format string, args ...any) string { return fmt.Sprintf(format, args...) }
