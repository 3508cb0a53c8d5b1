package plan

import (
	"fmt"
	"strings"
)

// FieldError is one fault of a plan: where it is, what stands there, what may
// stand there, and what would mend it. Texts are plain, lower case, one line.
type FieldError struct {
	Field   string // path, "source.tube.kv" or "part.layers[1].mm"; "line 3, column 7" where the text is no JSON
	Value   string // as written in the file; empty where nothing stands there
	Problem string // what is wrong: "is out of range", "missing"
	Allowed string // "20 to 450 kV"
	Mend    string // "set 450 kV or less"
}

// ExitCode is the exit code of a program that was given such a plan.
func (e *FieldError) ExitCode() int { return 2 }

// Error gives the fault in one line.
func (e *FieldError) Error() string {
	var b strings.Builder
	b.WriteString(e.Field)
	b.WriteString(": ")
	if e.Value != "" {
		fmt.Fprintf(&b, "%q ", e.Value)
	}
	b.WriteString(e.Problem)
	if e.Allowed != "" {
		b.WriteString(": want " + e.Allowed)
	}
	if e.Mend != "" {
		b.WriteString("; " + e.Mend)
	}
	return b.String()
}

// Errors is every fault of a plan, in the order of the file.
type Errors []*FieldError

// ExitCode is the exit code of a program that was given such a plan.
func (e Errors) ExitCode() int { return 2 }

// Error gives one fault a line.
func (e Errors) Error() string {
	lines := make([]string, len(e))
	for i, f := range e {
		lines[i] = f.Error()
	}
	return strings.Join(lines, "\n")
}

// Unwrap lets errors.As find the faults.
func (e Errors) Unwrap() []error {
	list := make([]error, len(e))
	for i, f := range e {
		list[i] = f
	}
	return list
}

// mostFaults bounds the list: a file with more is another kind of file.
const mostFaults = 40

// faults gathers what is wrong; a fault inside something that is already
// faulted is not told twice.
type faults struct {
	list  Errors
	seen  map[string]bool
	quiet map[string]bool // paths below which nothing more is said
}

func newFaults() *faults { return &faults{seen: map[string]bool{}, quiet: map[string]bool{}} }

func (f *faults) add(e FieldError) {
	if f.covered(e.Field) || len(f.list) >= mostFaults {
		return
	}
	f.seen[e.Field] = true
	e.Value = shorten(e.Value)
	f.list = append(f.list, &e)
}

// bar adds the fault and keeps the others silent on everything below it.
func (f *faults) bar(e FieldError) {
	f.add(e)
	f.quiet[e.Field] = true
}

// covered tells whether path or something above it has been faulted.
func (f *faults) covered(path string) bool {
	if f.seen[path] {
		return true
	}
	for path != "" {
		if f.quiet[path] {
			return true
		}
		cut := strings.LastIndexAny(path, ".[")
		if cut < 0 {
			return f.quiet[""]
		}
		path = path[:cut]
	}
	return f.quiet[""]
}

// clean tells that none of the fields is faulted, so that a rule which joins
// them can be judged.
func (f *faults) clean(paths ...string) bool {
	for _, p := range paths {
		if f.covered(p) {
			return false
		}
		for s := range f.seen {
			if strings.HasPrefix(s, p) && len(s) > len(p) && (s[len(p)] == '.' || s[len(p)] == '[') {
				return false
			}
		}
	}
	return true
}

func (f *faults) err() error {
	switch len(f.list) {
	case 0:
		return nil
	case 1:
		return f.list[0]
	}
	return f.list
}

// shorten keeps a message on one line of a terminal.
func shorten(s string) string {
	const most = 60
	r := []rune(s)
	if len(r) <= most {
		return s
	}
	return string(r[:most-3]) + "..."
}
