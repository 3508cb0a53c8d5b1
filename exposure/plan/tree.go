package plan

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
	"unicode/utf8"

	"github.com/go-json-experiment/json/jsontext"
)

// node is a JSON value as it stands in the file.
type node struct {
	kind    jsontext.Kind // '{', '[', '"', '0', 'n', 't', 'f'
	text    string        // of a string unquoted, of others as written
	members []member
	items   []node
}

type member struct {
	name  string
	value node
}

// mostDepth is deeper than any plan.
const mostDepth = 12

// parse reads one JSON value and nothing behind it.
func parse(data []byte) (node, *FieldError) {
	if bytes.HasPrefix(data, []byte("\xef\xbb\xbf")) {
		return node{}, &FieldError{Field: "line 1, column 1", Problem: "a byte order mark stands before the plan", Allowed: "plain UTF-8", Mend: "save the file without it"}
	}
	d := jsontext.NewDecoder(bytes.NewReader(data), jsontext.AllowDuplicateNames(true))
	n, err := readNode(d, 0)
	if err != nil {
		return node{}, syntaxFault(data, d, err)
	}
	if _, err := d.ReadToken(); err != io.EOF {
		rest := bytes.TrimLeft(data[d.InputOffset():], " \t\r\n")
		if err == nil {
			rest = bytes.TrimLeft(data[min(len(data), endOf(data)):], " \t\r\n")
		}
		at := int64(len(data) - len(rest))
		return node{}, &FieldError{Field: place(data, at), Value: firstWord(rest), Problem: "stands behind the plan", Allowed: "one plan a file and nothing else", Mend: "take out what follows its last brace"}
	}
	return n, nil
}

// endOf is the offset behind the first value of data.
func endOf(data []byte) int {
	d := jsontext.NewDecoder(bytes.NewReader(data), jsontext.AllowDuplicateNames(true))
	if d.SkipValue() != nil {
		return len(data)
	}
	return int(d.InputOffset())
}

var errDeep = errors.New("too deep")

func readNode(d *jsontext.Decoder, depth int) (node, error) {
	if depth > mostDepth {
		return node{}, errDeep
	}
	t, err := d.ReadToken()
	if err != nil {
		return node{}, err
	}
	n := node{kind: t.Kind(), text: t.String()}
	switch n.kind {
	case '{':
		for d.PeekKind() != '}' {
			name, err := d.ReadToken()
			if err != nil {
				return node{}, err
			}
			key := name.String()
			value, err := readNode(d, depth+1)
			if err != nil {
				return node{}, err
			}
			n.members = append(n.members, member{key, value})
		}
		_, err = d.ReadToken()
	case '[':
		for d.PeekKind() != ']' {
			item, err := readNode(d, depth+1)
			if err != nil {
				return node{}, err
			}
			n.items = append(n.items, item)
		}
		_, err = d.ReadToken()
	}
	return n, err
}

// shown is the node as a message shows it.
func (n node) shown() string {
	switch n.kind {
	case '{':
		return "{...}"
	case '[':
		return "[...]"
	}
	return n.text
}

// called names the kind of the node in a message.
func (n node) called() string {
	switch n.kind {
	case '{':
		return "an object"
	case '[':
		return "a list"
	case '"':
		return "text"
	case '0':
		return "a number"
	case 'n':
		return "null"
	}
	return "a truth value"
}

// syntaxFault tells where the text stops being JSON, in our own words.
func syntaxFault(data []byte, d *jsontext.Decoder, err error) *FieldError {
	var syntax *jsontext.SyntacticError
	var path string
	offset := d.InputOffset()
	if errors.As(err, &syntax) {
		offset, path = syntax.ByteOffset, pathOf(syntax.JSONPointer)
	}
	offset = min(max(offset, 0), int64(len(data)))
	rest := bytes.TrimLeft(data[offset:], " \t\r\n")
	at := int64(len(data) - len(rest))
	f := &FieldError{Field: place(data, at), Value: firstWord(rest), Problem: "is no JSON", Allowed: "a plan file, one JSON object", Mend: "check commas, quotes and brackets before this place"}
	word := wordAround(data, at)
	if word != f.Value && word != "-"+f.Value { // the word began as a number, which was read
		path = pathOf(d.StackPointer())
	}
	row, known := FieldAt(path)
	switch {
	case errors.Is(err, errDeep):
		f.Value, f.Problem, f.Mend = "", "brackets nest too deep", "a plan nests 8 deep at most"
	case len(bytes.TrimSpace(data)) == 0:
		f.Field, f.Problem, f.Mend = "line 1, column 1", "the file is empty", "start from a plan that works"
	case len(rest) == 0:
		f.Problem, f.Mend = "the file ends in the middle of the plan", "the copy is not whole: fetch it again"
	case known && row.Kind == Number && word != "" && !jsontext.Value(word).IsValid():
		f.Field, f.Value, f.Problem, f.Allowed, f.Mend = path, word, "is no number", wanted(row), "write it in digits, as 12.5"
	case !utf8.Valid(data):
		f.Problem, f.Mend = "is no UTF-8 text", "save the file as UTF-8"
	}
	return f
}

// pathOf turns a JSON pointer into a path of ours.
func pathOf(p jsontext.Pointer) string {
	path := ""
	for token := range p.Tokens() {
		if _, err := strconv.Atoi(token); err == nil {
			path += "[" + token + "]"
			continue
		}
		path = join(path, token)
	}
	return path
}

// wordAround is the bare word that the offset stands in: NaN, -Infinity, 0x10.
func wordAround(data []byte, at int64) string {
	ends := func(c byte) bool { return bytes.IndexByte([]byte(" \t\r\n,:{}[]\""), c) >= 0 }
	from, to := at, at
	for from > 0 && !ends(data[from-1]) {
		from--
	}
	for to < int64(len(data)) && !ends(data[to]) {
		to++
	}
	return strings.ToValidUTF8(string(data[from:min(to, from+40)]), "?")
}

// firstWord is what stands at the start of rest, short enough to show.
func firstWord(rest []byte) string {
	if len(rest) == 0 {
		return ""
	}
	end := bytes.IndexAny(rest[1:], " \t\r\n,:{}[]\"") + 1
	if end <= 0 {
		end = len(rest)
	}
	return strings.ToValidUTF8(string(rest[:min(end, 40)]), "?")
}

// place gives an offset as people count.
func place(data []byte, offset int64) string {
	offset = min(max(offset, 0), int64(len(data)))
	before := data[:offset]
	line := bytes.Count(before, []byte("\n")) + 1
	column := utf8.RuneCount(before[bytes.LastIndexByte(before, '\n')+1:]) + 1
	return fmt.Sprintf("line %d, column %d", line, column)
}
