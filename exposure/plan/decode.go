package plan

import (
	"fmt"
	"math"
	"reflect"
	"regexp"
	"slices"
	"strconv"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"
)

// mostBytes bounds a plan file; a real one has about 1 KB.
const mostBytes = 1 << 20

// Decode reads a plan file strictly and validates it. Fields of another name or
// letter case, fields that stand twice, null, text behind the plan, missing
// fields and every value outside its range are refused. The error is a
// *FieldError, or Errors with one fault a row when there are several. It never
// panics, whatever the data.
//
// Times are turned to UTC; an empty list is the same as one left out. Defaults
// are not filled in: see Normalised.
func Decode(data []byte) (Plan, error) { return DecodeFor(data, nil) }

// DecodeFor is Decode where the plan may also name one of ruleSets, which a
// company has loaded over ours.
func DecodeFor(data []byte, ruleSets []string) (Plan, error) {
	if len(data) > mostBytes {
		return Plan{}, &FieldError{Field: "line 1, column 1", Problem: fmt.Sprintf("the file has %d bytes", len(data)), Allowed: "a plan of 1 MiB or less", Mend: "this is another kind of file"}
	}
	root, fault := parse(data)
	if fault != nil {
		return Plan{}, fault
	}
	var p Plan
	f := newFaults()
	if root.kind != '{' {
		return Plan{}, &FieldError{Field: "line 1, column 1", Value: root.shown(), Problem: "is " + root.called(), Allowed: "a plan file, one JSON object", Mend: `start with {"plan": 1`}
	}
	fill(f, reflect.ValueOf(&p).Elem(), root, "")
	p.validate(f, ruleSets)
	if err := f.err(); err != nil {
		return Plan{}, err
	}
	return p, nil
}

// fill puts the node into v and notes every fault of form.
func fill(f *faults, v reflect.Value, n node, path string) {
	row, _ := FieldAt(path)
	if n.kind == 'n' {
		f.bar(FieldError{Field: path, Value: "null", Problem: "is no value", Allowed: wanted(row), Mend: "write a value or leave the field out"})
		return
	}
	if v.Type() == timeType {
		fillTime(f, v, n, path, row)
		return
	}
	switch v.Kind() {
	case reflect.Pointer:
		v.Set(reflect.New(v.Type().Elem()))
		fill(f, v.Elem(), n, path)
	case reflect.Struct:
		fillObject(f, v, n, path)
	case reflect.Slice, reflect.Array:
		fillList(f, v, n, path, row)
	case reflect.String:
		if n.kind != '"' {
			f.bar(wrongKind(path, n, row))
			return
		}
		if n.text == "" {
			f.bar(FieldError{Field: path, Problem: "is empty", Allowed: wanted(row), Mend: "write a value or leave the field out"})
			return
		}
		v.SetString(n.text)
	case reflect.Float64, reflect.Int:
		fillNumber(f, v, n, path, row)
	default:
		panic(fmt.Sprintf("plan: no way to decode %s at %s", v.Type(), path))
	}
}

var timeType = reflect.TypeFor[time.Time]()

func fillObject(f *faults, v reflect.Value, n node, path string) {
	if n.kind != '{' {
		f.bar(wrongKind(path, n, Field{Kind: Object}))
		return
	}
	names := fieldNames(v.Type())
	given := map[string]bool{}
	for _, m := range n.members {
		at := join(path, m.name)
		i := slices.Index(names, m.name)
		switch {
		case i < 0:
			f.bar(unknownField(path, m.name, names))
		case given[m.name]:
			f.bar(FieldError{Field: at, Value: m.value.shown(), Problem: "stands a second time", Allowed: "each field once", Mend: "keep one of the two"})
		default:
			given[m.name] = true
			fill(f, v.Field(i), m.value, at)
		}
	}
	for _, name := range names {
		row, _ := FieldAt(join(path, name))
		if row.Required && !given[name] {
			f.bar(FieldError{Field: join(path, name), Problem: "missing", Allowed: wanted(row), Mend: fmt.Sprintf("add %q", name)})
		}
	}
}

func fillList(f *faults, v reflect.Value, n node, path string, row Field) {
	if n.kind != '[' {
		f.bar(wrongKind(path, n, row))
		return
	}
	count := len(n.items)
	if float64(count) < row.Min || float64(count) > row.Max {
		f.bar(FieldError{Field: path, Value: fmt.Sprintf("%d rows", count), Problem: "is out of range", Allowed: wanted(row), Mend: "put in or take out rows"})
		return
	}
	if v.Kind() == reflect.Slice {
		if count == 0 {
			return
		}
		v.Set(reflect.MakeSlice(v.Type(), count, count))
	}
	for i, item := range n.items {
		fill(f, v.Index(i), item, fmt.Sprintf("%s[%d]", path, i))
	}
}

var timeForm = regexp.MustCompile(`^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d{1,9})?(Z|[+-]\d\d:\d\d)$`)

func fillTime(f *faults, v reflect.Value, n node, path string, row Field) {
	if n.kind != '"' {
		f.bar(wrongKind(path, n, row))
		return
	}
	t, err := time.Parse(time.RFC3339Nano, n.text)
	if err != nil || !timeForm.MatchString(n.text) {
		f.bar(FieldError{Field: path, Value: n.text, Problem: "is no time", Allowed: wanted(row), Mend: `write it as "2026-12-01T08:00:00Z", the zone as Z or +01:00`})
		return
	}
	if t.IsZero() {
		f.bar(timeRange(path, n.text, row))
		return
	}
	v.Set(reflect.ValueOf(t.UTC()))
}

// Digits and powers of ten that a number of a plan may be written with.
const (
	mostDigits = 17
	mostPower  = 30
)

func fillNumber(f *faults, v reflect.Value, n node, path string, row Field) {
	if n.kind != '0' {
		e := wrongKind(path, n, row)
		if _, err := strconv.ParseFloat(n.text, 64); err == nil && n.kind == '"' {
			e.Mend = "take the quotes off"
		}
		f.bar(e)
		return
	}
	if e, bad := absurd(n.text); bad {
		e.Field, e.Value, e.Allowed = path, n.text, wanted(row)
		f.bar(e)
		return
	}
	x, err := strconv.ParseFloat(n.text, 64)
	if err != nil || (math.Signbit(x) && row.Min >= 0) || (x == 0 && row.Min > 0) {
		f.bar(outOfRange(row, path, n.text, x))
		return
	}
	if x < row.Min || x > row.Max {
		f.bar(outOfRange(row, path, n.text, x))
		return
	}
	if v.Kind() == reflect.Int {
		if x != math.Trunc(x) {
			f.bar(FieldError{Field: path, Value: n.text, Problem: "is no whole number", Allowed: wanted(row), Mend: "write " + format(math.Round(x))})
			return
		}
		v.SetInt(int64(x))
		return
	}
	v.SetFloat(x + 0) // no negative zero
}

// absurd tells of a number that nobody measured.
func absurd(text string) (FieldError, bool) {
	mantissa, power, _ := strings.Cut(strings.ToLower(text), "e")
	if power != "" {
		p, err := strconv.Atoi(power)
		if err != nil || p > mostPower || p < -mostPower {
			return FieldError{Problem: "has an absurd power of ten", Mend: "write it out in digits"}, true
		}
	}
	digits := strings.TrimLeft(strings.Map(func(r rune) rune {
		if unicode.IsDigit(r) {
			return r
		}
		return -1
	}, mantissa), "0")
	if strings.Contains(mantissa, ".") {
		digits = strings.TrimRight(digits, "0")
	}
	if len(digits) > mostDigits {
		return FieldError{Problem: fmt.Sprintf("has %d digits", len(digits)), Mend: fmt.Sprintf("round it: %d digits at most", mostDigits)}, true
	}
	return FieldError{}, false
}

func unknownField(path, name string, names []string) FieldError {
	e := FieldError{Field: join(path, printable(name)), Problem: "unknown field", Allowed: oneOf(names)}
	var longer []string // what the file's name is the start of: a unit left out
	for _, near := range names {
		if strings.EqualFold(near, name) {
			longer = []string{strconv.Quote(near)}
			break
		}
		if name != "" && strings.HasPrefix(strings.ToLower(near), strings.ToLower(name)) {
			longer = append(longer, strconv.Quote(near))
		}
	}
	if len(longer) > 0 {
		e.Mend = "write " + oneOf(longer)
		return e
	}
	if near := nearest(name, names); near != "" {
		e.Mend = fmt.Sprintf("write %q", near)
		return e
	}
	for _, row := range table {
		if strings.HasSuffix(row.Path, "."+name) {
			e.Mend = "it belongs at " + row.Path
			return e
		}
	}
	e.Mend = "take it out"
	return e
}

func wrongKind(path string, n node, row Field) FieldError {
	return FieldError{Field: path, Value: n.shown(), Problem: "is " + n.called(), Allowed: wanted(row), Mend: "write " + kindWords[row.Kind]}
}

var kindWords = map[Kind]string{Number: "a number", Text: "text in quotes", Name: "a name in quotes", Time: "a time in quotes", List: "a list in square brackets", Object: "an object in braces"}

// fieldNames gives the JSON names of a type by field index.
func fieldNames(t reflect.Type) []string {
	if names, ok := namesByType[t]; ok {
		return names
	}
	return tagNames(t)
}

func tagNames(t reflect.Type) []string {
	names := make([]string, t.NumField())
	for i := range names {
		names[i], _, _ = strings.Cut(t.Field(i).Tag.Get("json"), ",")
	}
	return names
}

// namesByType holds fieldNames of every type of a plan.
var namesByType = func() map[reflect.Type][]string {
	all := map[reflect.Type][]string{}
	var walk func(t reflect.Type)
	walk = func(t reflect.Type) {
		switch t.Kind() {
		case reflect.Pointer, reflect.Slice, reflect.Array:
			walk(t.Elem())
		case reflect.Struct:
			if t == reflect.TypeFor[time.Time]() {
				return
			}
			all[t] = tagNames(t)
			for i := range t.NumField() {
				walk(t.Field(i).Type)
			}
		}
	}
	walk(reflect.TypeFor[Plan]())
	return all
}()

func join(path, name string) string {
	if path == "" {
		return name
	}
	return path + "." + name
}

// printable keeps what a file calls a field from breaking the message.
func printable(name string) string {
	if name == "" {
		return `""`
	}
	q := strconv.Quote(shorten(name))
	if q[1:len(q)-1] == name && utf8.ValidString(name) && !strings.ContainsAny(name, " .[]") {
		return name
	}
	return q
}
