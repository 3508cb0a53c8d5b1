package svg

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"strings"
	"testing"

	"halfvalue/app/drafting"
)

func sample() *drafting.Drawing {
	d := drafting.New(drafting.NewFonts(), drafting.Rect{X1: 200, Y1: 100})
	d.Hatch(drafting.Circle(drafting.Pt{X: 50, Y: 50}, 30), "steel", drafting.Line)
	d.Dimension(drafting.Dimension{A: drafting.Pt{X: 20, Y: 20}, B: drafting.Pt{X: 20, Y: 90}, Text: "De < 5 & more", Size: 12})
	d.Line(drafting.Pt{X: 100, Y: 5}, drafting.Pt{X: 190, Y: 5}, drafting.Bold, drafting.Rope, drafting.Cord()...)
	return d
}

// The file is well-formed XML with its groups closed, and its text escaped.
func TestWellFormed(t *testing.T) {
	var b bytes.Buffer
	if err := Write(&b, sample(), drafting.PaperLight(), "a <b> & c"); err != nil {
		t.Fatal(err)
	}
	seen := map[string]int{}
	text := ""
	dec := xml.NewDecoder(bytes.NewReader(b.Bytes()))
	for {
		tok, err := dec.Token()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			t.Fatalf("not well-formed: %v\n%s", err, b.String())
		}
		switch tok := tok.(type) {
		case xml.StartElement:
			seen[tok.Name.Local]++
		case xml.CharData:
			text += string(tok)
		}
	}
	if seen["clipPath"] != 1 || seen["text"] != 1 || seen["path"] < 6 {
		t.Fatalf("elements: %v", seen)
	}
	if !strings.Contains(text, "De < 5 & more") || !strings.Contains(text, "a <b> & c") {
		t.Fatalf("text: %q", text)
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("no space left") }

func TestWriteErrorComesBack(t *testing.T) {
	if err := Write(full{}, sample(), drafting.SlateLight(), ""); err == nil {
		t.Fatal("a full disk was not told")
	}
}
