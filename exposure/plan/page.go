package plan

import (
	"fmt"
	"strings"
)

// Page is the table of fields as a Markdown page; FIELDS.md is this text.
func Page() string {
	var b strings.Builder
	b.WriteString(pageHead)
	for _, f := range table {
		fmt.Fprintf(&b, "| `%s` | %s | %s | %s | %s |\n", f.Path, f.Kind, pageRange(f), pageDefault(f), f.Meaning)
	}
	b.WriteString(pageFoot)
	return b.String()
}

const pageHead = `# Fields of a plan file, version 1

Written by ` + "`go test ./exposure/plan -update`" + ` from the table that validation uses; the test compares. A plan is one JSON object in
UTF-8. Refused, with the field, the value, what is allowed and the mend: unknown fields, another letter case, a field that stands
twice, null, text behind the plan, missing fields, NaN, numbers of more than 17 digits or powers of ten beyond 30, everything
outside its range. Version 1 may gain optional fields; old files decode unchanged.

| field | what | range | left out | meaning |
|---|---|---|---|---|
`

const pageFoot = `
## What joins several fields

- Exactly one of ` + "`source.tube` and `source.sealed`; exactly one of `detector.film`, `detector.plate` and `detector.panel`" + `.
- kv at most maxKV; kv x ma at most maxW, where the head's limits are stated.
- A sealed source needs ` + "`at`" + `, not before ` + "`assayed`" + ` and at most ten half-lives after it, and exactly one of activityGBq and activityCi.
- ` + "`bMM`" + ` is at least the sum of ` + "`part.layers`" + `; ` + "`sfdMM`" + ` is more than the part and its distance from the film take.
- The double-wall setups need ` + "`odMM` and `wallMM`" + `; everywhere a pipe has both, the wall is less than half the diameter, and the layers
  (both walls with the double-wall setups) add up to the wall less 12.5 % or more and to the diameter plus 20 mm or less.
- ` + "`setup.image`" + ` only with double-wall-double-image; ` + "`setup.side`" + ` only with a single-wall pipe; ` + "`setup.shots`" + ` only with a pipe.
- A limit is rateUSvPerH with averagingMin, or doseUSv with per (and occupancy). Names of limits and of sections differ.
- Screens are lead. An empty list is the same as one left out. Times are kept in UTC.
`

func pageRange(f Field) string {
	if f.Kind == Name {
		if names := f.Names(); len(names) <= 12 {
			return strings.Join(names, ", ")
		}
		return "catalogue name or element symbol"
	}
	if f.Kind == Object {
		return ""
	}
	return wanted(f)
}

func pageDefault(f Field) string {
	if f.Required {
		return "**required**"
	}
	return f.Default
}
