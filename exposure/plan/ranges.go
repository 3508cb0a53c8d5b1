package plan

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"strconv"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"
)

// ranges holds every value of v, at any depth, against its row of the table.
func ranges(f *faults, v reflect.Value, path string, ruleSets []string) {
	row, known := FieldAt(path)
	if path != "" && !known {
		panic(fmt.Sprintf("plan: %s has no row in the table of fields", path))
	}
	if v.Type() == timeType {
		checkTime(f, v.Interface().(time.Time), path, row)
		return
	}
	switch v.Kind() {
	case reflect.Pointer:
		if !v.IsNil() {
			ranges(f, v.Elem(), path, ruleSets)
		}
	case reflect.Struct:
		for i, name := range fieldNames(v.Type()) {
			if field := v.Field(i); !(absent(field) && optional(path, name)) {
				ranges(f, field, join(path, name), ruleSets)
			}
		}
	case reflect.Slice, reflect.Array:
		n := v.Len()
		if float64(n) > row.Max || (float64(n) < row.Min && (row.Required || n > 0)) {
			f.bar(FieldError{Field: path, Value: fmt.Sprintf("%d rows", n), Problem: "is out of range", Allowed: wanted(row), Mend: "put in or take out rows"})
			return
		}
		for i := range n {
			ranges(f, v.Index(i), fmt.Sprintf("%s[%d]", path, i), ruleSets)
		}
	case reflect.String:
		checkText(f, v.String(), path, row, ruleSets)
	case reflect.Int:
		checkNumber(f, float64(v.Int()), path, row)
	case reflect.Float64:
		checkNumber(f, v.Float(), path, row)
	}
}

// checkNumber refuses NaN with everything else outside the range. A zero in an
// optional field is a field left out.
func checkNumber(f *faults, x float64, path string, row Field) {
	if x == 0 && !row.Required && !math.Signbit(x) {
		return
	}
	if !(x >= row.Min && x <= row.Max) || (x == 0 && math.Signbit(x)) {
		f.add(outOfRange(row, path, format(x), x))
	}
}

func checkText(f *faults, s, path string, row Field, ruleSets []string) {
	if s == "" {
		if row.Required {
			f.add(FieldError{Field: path, Problem: "missing", Allowed: wanted(row), Mend: "write " + kindWords[row.Kind]})
		}
		return
	}
	if row.Kind == Name {
		checkName(f, s, path, row, ruleSets)
		return
	}
	n := utf8.RuneCountInString(s)
	switch {
	case !utf8.ValidString(s):
		f.add(FieldError{Field: path, Value: strings.ToValidUTF8(s, "?"), Problem: "is no UTF-8 text", Allowed: wanted(row), Mend: "type it again"})
	case strings.IndexFunc(s, unseen) >= 0:
		f.add(FieldError{Field: path, Value: s, Problem: "holds a character that does not show", Allowed: "letters, figures, signs and blanks", Mend: "type it again on one line"})
	case strings.TrimSpace(s) == "":
		f.add(FieldError{Field: path, Value: s, Problem: "is blank", Allowed: wanted(row), Mend: "write something or leave it out"})
	case float64(n) > row.Max:
		f.add(FieldError{Field: path, Value: s, Problem: fmt.Sprintf("has %d characters", n), Allowed: wanted(row), Mend: "shorten it"})
	}
}

// unseen tells of characters that break a line or hide what a line says.
func unseen(r rune) bool {
	return unicode.IsControl(r) || r == '\u2028' || r == '\u2029' || unicode.Is(unicode.Bidi_Control, r)
}

func checkName(f *faults, s, path string, row Field, ruleSets []string) {
	list := row.names()
	if known(s, list) || row.Path == "rules" && known(s, ruleSets) {
		return
	}
	if row.Path == "rules" {
		list = slices.Concat(list, ruleSets)
	}
	e := FieldError{Field: path, Value: s, Problem: "is unknown", Allowed: oneOf(list)}
	near := ""
	if strings.HasSuffix(path, "material") {
		near = nearestMaterial(s)
	} else {
		near = nearest(s, list)
	}
	switch {
	case near != "":
		e.Mend = fmt.Sprintf("did you mean %q", near)
	case strings.HasSuffix(path, "material"):
		e.Mend = "write a catalogue name such as carbon-steel or an element symbol such as Fe"
	default:
		e.Mend = "take one of these"
	}
	f.add(e)
}

func checkTime(f *faults, t time.Time, path string, row Field) {
	if t.IsZero() {
		if row.Required {
			f.add(FieldError{Field: path, Problem: "missing", Allowed: wanted(row), Mend: "write a time"})
		}
		return
	}
	if y := t.UTC().Year(); float64(y) < row.Min || float64(y) >= row.Max {
		f.add(timeRange(path, t.UTC().Format(time.RFC3339), row))
	}
}

func timeRange(path, text string, row Field) FieldError {
	return FieldError{Field: path, Value: text, Problem: "is out of range", Allowed: wanted(row), Mend: "check the year"}
}

// outOfRange is the fault of a number, with the end of the range that is near.
func outOfRange(row Field, path, text string, x float64) FieldError {
	e := FieldError{Field: path, Value: text, Problem: "is out of range", Allowed: wanted(row)}
	switch {
	case math.IsNaN(x):
		e.Problem = "is no number"
		e.Mend = "write digits"
	case row.Min == row.Max:
		e.Mend = "write " + format(row.Min)
	case x == 0 && !row.Required && row.Min > 0:
		e.Mend = "leave the field out instead"
	case math.Signbit(x) || x < row.Min:
		e.Mend = "set " + quantity(row.Min, row.Unit) + " or more"
	default:
		e.Mend = "set " + quantity(row.Max, row.Unit) + " or less"
	}
	return e
}

// wanted says in words what a field takes.
func wanted(row Field) string {
	switch row.Kind {
	case Number:
		if row.Min == row.Max {
			return format(row.Min)
		}
		return format(row.Min) + " to " + quantity(row.Max, row.Unit)
	case Text:
		return fmt.Sprintf("1 to %g characters", row.Max)
	case Name:
		return oneOf(row.Names())
	case Time:
		return fmt.Sprintf("a time with zone in %g to %g", row.Min, row.Max-1)
	case List:
		if row.Min == row.Max {
			return fmt.Sprintf("a list of %g", row.Min)
		}
		return fmt.Sprintf("a list of %g to %g", row.Min, row.Max)
	}
	return "an object in braces"
}

// format writes a number as a plan file does.
func format(x float64) string { return strconv.FormatFloat(x, 'f', -1, 64) }

func quantity(x float64, unit string) string {
	if unit == "" {
		return format(x)
	}
	return format(x) + " " + unit
}

// absent tells whether nothing stands in a field; a negative zero is something.
func absent(v reflect.Value) bool {
	switch v.Kind() {
	case reflect.Float64:
		return v.Float() == 0 && !math.Signbit(v.Float())
	case reflect.Struct, reflect.Array:
		return false
	}
	return v.IsZero()
}

// optional tells whether a field may be left out, so that nothing in it is no
// fault.
func optional(path, name string) bool {
	row, ok := FieldAt(join(path, name))
	return ok && !row.Required
}
