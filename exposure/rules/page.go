package rules

import (
	"fmt"
	"strings"
)

// Page is the rule sets of the table as a Markdown page, with how a company's
// file is written; RULES.md is the page of Ours.
func (t *Table) Page() string {
	var b strings.Builder
	b.WriteString(pageHead)
	for _, name := range t.Names() {
		s := t.sets[name]
		fmt.Fprintf(&b, "\n### `%s`: %s\n\n%s.\n\n| id | rule | figures | clause | confidence |\n|---|---|---|---|---|\n", s.Name, s.Title, s.Note)
		for _, r := range s.Rows {
			rule, err := r.rule()
			if err != nil {
				panic("rules: " + err.Error()) // read has checked every row
			}
			from := ""
			if r.From != "" {
				from = ", " + r.From
			}
			fmt.Fprintf(&b, "| %s | %s: %s%s | %s | %s | %s%s |\n", r.ID, r.Title, r.Text, r.For.said(), rule.figures(), r.Clause, r.Confidence, from)
		}
	}
	return b.String()
}

// said tells in words when a row applies.
func (s Scope) said() string {
	var parts []string
	if s.Source != "" {
		parts = append(parts, s.Source)
	}
	for _, group := range [][]string{s.Kinds, s.Images, s.Families, s.Detector} {
		if len(group) > 0 {
			parts = append(parts, strings.Join(group, ", "))
		}
	}
	if len(parts) == 0 {
		return ""
	}
	return " (for " + strings.Join(parts, "; ") + ")"
}

const pageHead = `# Rule sets

Written by ` + "`go test ./exposure/rules -update`" + ` from data/*.json; the test compares. No figure here was read in a licensed copy of a
standard: check against the edition in force. A row of low confidence is guidance and neither passes nor fails a plan; a
recommendation that is not met is undecided; where a set has no figure for a material, the check is undecided.

## A company's own table

A JSON file of the same form lies over ours and is named in every check and working that used a row of it:

` + "```json" + `
{"document": "Works standard 7", "note": "replaces the kV curve, asks for more density",
 "sets": [
  {"name": "iso17636-1:2013/B", "rows": [
   {"id": "max-kv", "title": "most kV", "text": "read in our copy", "clause": "figure 20", "confidence": "company",
    "for": {"families": ["steel"]}, "maxKV": {"points": [[1, 80], [10, 215], [50, 500]], "riseKV": 50}}]},
  {"name": "works/7", "title": "Works standard 7", "base": "house", "rows": [
   {"id": "density", "title": "density", "text": "darker than the house asks", "clause": "4", "confidence": "company",
    "density": {"floor": 2.5, "ceiling": 4}}]}]}
` + "```" + `

A set of a name of ours keeps our rows except those whose id the file names; a set of a new name starts from the rows of
` + "`base`" + `, if it has one. Rows of one id are alternatives by ` + "`for`" + ` (source ` + "`tube|sealed`" + `, ` + "`kinds`, `images`, `families`, `detector`" + `). Each row
has id, title, text, clause, confidence (` + "`seen`, `high`, `medium`, `low`, `derived`, `exact`, `common practice`, `company`" + `), may have
` + "`guidance`" + ` (a recommendation: never a fail), and has exactly one of:

| object | figures |
|---|---|
| ` + "`minF`" + ` | coefficient, power of b, touchFactor (b below so many t counts as t), insideShare and centralShare of f with the source in a pipe |
| ` + "`maxUg`" + ` | steps of upToMM and ugMM, the last without upToMM |
| ` + "`density`" + ` | floor, ceiling, tolerance below the floor; every section is held to it |
| ` + "`spread`" + ` | floor and ceiling in per cent of the density at the part itself |
| ` + "`rise`" + ` | k, the most path over the wall in the length that is read |
| ` + "`travel`" + ` | mostShare of the exposure time |
| ` + "`nuclides`" + ` | ranges by nuclide: fromMM, toMM, agreedMM |
| ` + "`maxKV`" + ` | points of mm and kV, straight on log axes between; riseKV where thickness varies |
| ` + "`filmClass`, `screens`, `snr`" + ` | rows by beam: fromKV (above), toKV (up to) or nuclides, fromMM (above), toMM (up to); class, or front and back, or snrN |
| ` + "`wires`" + ` | columns single, bothShown, atTheFilm of wire and upToMM; relaxation |
| ` + "`plaque`" + ` | steps of upToIn, source, sourceWireIn, film, filmWireIn |
| ` + "`smallPipe`" + ` | mostODMM, mostWallMM, mostWeldShare |
| ` + "`twoWalls`" + ` | thin and thick numbers of shots, ratio t/De between them, apart, apart2 |
| ` + "`recorder`" + ` | takes: film, plate, panel |
| ` + "`cone`" + ` | margin of the cone's opening that must be left, 0 to 0.5; pipes only |

Anything unknown, missing or out of order refuses the whole file.

## Our sets
`
