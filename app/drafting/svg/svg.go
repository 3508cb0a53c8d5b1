// Package svg writes a drafting.Drawing as an SVG file. One unit of the file
// is one dp. Text stays text, so that it can be searched and read out, and is
// held to the width that the drawing measured whatever font a reader has.
package svg

import (
	"bufio"
	"encoding/xml"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"

	"halfvalue/app/drafting"
)

// Write writes the drawing in the colours of a palette. The title is what a
// reader's program shows for the whole.
func Write(w io.Writer, d *drafting.Drawing, p drafting.Palette, title string) error {
	b := bufio.NewWriter(w)
	s := writer{Writer: b, drawing: d, palette: p}
	a := d.Area
	s.printf("<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"%s %s %s %s\" width=\"%s\" height=\"%s\" font-family=\"Go, 'Gill Sans', 'DejaVu Sans', sans-serif\">\n",
		num(a.X0), num(a.Y0), num(a.W()), num(a.H()), num(a.W()), num(a.H()))
	s.printf("<title>%s</title>\n", escape(title))
	s.printf("<rect x=\"%s\" y=\"%s\" width=\"%s\" height=\"%s\" fill=\"%s\"/>\n", num(a.X0), num(a.Y0), num(a.W()), num(a.H()), s.ink(drafting.Sheet))
	for i := range d.Items {
		s.item(&d.Items[i])
	}
	s.printf("</svg>\n")
	return b.Flush()
}

// writer writes items; the buffered writer beneath keeps the first error.
type writer struct {
	*bufio.Writer
	drawing *drafting.Drawing
	palette drafting.Palette
	clips   int
}

func (s *writer) printf(format string, args ...any) { fmt.Fprintf(s, format, args...) }

func (s *writer) ink(k drafting.Ink) string {
	c := s.palette[k]
	return fmt.Sprintf("#%02x%02x%02x", c.R, c.G, c.B)
}

func (s *writer) item(it *drafting.Item) {
	switch it.Kind {
	case drafting.StrokeItem:
		dash := ""
		if len(it.Dash) > 0 {
			dash = " stroke-dasharray=\"" + list(it.Dash) + "\""
		}
		s.printf("<path d=\"%s\" fill=\"none\" stroke=\"%s\" stroke-width=\"%s\" stroke-linejoin=\"round\"%s/>\n", pathData(&it.Path), s.ink(it.Ink), num(it.Width), dash)
	case drafting.FillItem:
		s.printf("<path d=\"%s\" fill=\"%s\"/>\n", pathData(&it.Path), s.ink(it.Ink))
	case drafting.TextItem:
		s.text(it)
	case drafting.ClipItem:
		s.clips++
		s.printf("<clipPath id=\"c%d\"><path d=\"%s\"/></clipPath><g clip-path=\"url(#c%d)\">\n", s.clips, pathData(&it.Path), s.clips)
	case drafting.UnclipItem:
		s.printf("</g>\n")
	}
}

func (s *writer) text(it *drafting.Item) {
	t := it.Text
	anchor := map[drafting.Align]string{drafting.Start: "start", drafting.Middle: "middle", drafting.End: "end"}[t.Align]
	weight, turn := "", ""
	if t.Bold {
		weight = " font-weight=\"bold\""
	}
	if t.Turn != 0 {
		turn = fmt.Sprintf(" transform=\"rotate(%s %s %s)\"", num(t.Turn*180/math.Pi), num(t.At.X), num(t.At.Y))
	}
	s.printf("<text x=\"%s\" y=\"%s\" font-size=\"%s\" text-anchor=\"%s\" fill=\"%s\" textLength=\"%s\" lengthAdjust=\"spacingAndGlyphs\"%s%s>%s</text>\n",
		num(t.At.X), num(t.At.Y), num(t.Size), anchor, s.ink(it.Ink), num(s.drawing.Fonts.Width(t.S, t.Size, t.Bold)), weight, turn, escape(t.S))
}

// num writes a coordinate to a hundredth of a dp.
func num(v float64) string { return strconv.FormatFloat(math.Round(v*100)/100, 'f', -1, 64) }

func list(v []float64) string {
	out := make([]string, len(v))
	for i := range v {
		out[i] = num(v[i])
	}
	return strings.Join(out, " ")
}

func escape(text string) string {
	var b strings.Builder
	_ = xml.EscapeText(&b, []byte(text)) // a strings.Builder does not fail
	return b.String()
}

func pathData(p *drafting.Path) string {
	var b strings.Builder
	at := func(q drafting.Pt) string { return num(q.X) + " " + num(q.Y) }
	p.Walk(
		func(q drafting.Pt) { b.WriteString("M" + at(q)) },
		func(q drafting.Pt) { b.WriteString("L" + at(q)) },
		func(c1, c2, q drafting.Pt) { b.WriteString("C" + at(c1) + " " + at(c2) + " " + at(q)) },
		func() { b.WriteByte('Z') })
	return b.String()
}
