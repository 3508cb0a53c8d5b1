package drafting

import (
	"strings"
	"unicode/utf8"

	"golang.org/x/image/font"
	"golang.org/x/image/font/gofont/gobold"
	"golang.org/x/image/font/gofont/goregular"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// Fonts measures text in the bundled Go fonts, regular and bold. It caches
// and is used from one goroutine.
type Fonts struct {
	regular, bold face
}

type face struct {
	font    *sfnt.Font
	buf     sfnt.Buffer
	advance map[rune]float64 // per unit of size; negative: the font lacks it
}

// measureEm is the size at which advances are read, large so that rounding to
// 1/64 does not show.
const measureEm = 2048

// NewFonts parses the bundled fonts; it panics if they are damaged, which is a
// fault of the build.
func NewFonts() *Fonts {
	return &Fonts{regular: newFace(goregular.TTF), bold: newFace(gobold.TTF)}
}

func newFace(ttf []byte) face {
	f, err := sfnt.Parse(ttf)
	if err != nil {
		panic("drafting: bundled font: " + err.Error())
	}
	return face{font: f, advance: map[rune]float64{}}
}

func (f *face) of(r rune) float64 {
	if a, ok := f.advance[r]; ok {
		return a
	}
	a := -1.0
	if i, err := f.font.GlyphIndex(&f.buf, r); err == nil && i != 0 {
		if w, err := f.font.GlyphAdvance(&f.buf, i, fixed.I(measureEm), font.HintingNone); err == nil {
			a = float64(w) / 64 / measureEm
		}
	}
	f.advance[r] = a
	return a
}

func (f *Fonts) face(bold bool) *face {
	if bold {
		return &f.bold
	}
	return &f.regular
}

// Has says whether the bundled fonts have a rune.
func (f *Fonts) Has(r rune, bold bool) bool { return f.face(bold).of(r) >= 0 }

// Width is the width of a line of text in dp at a size in dp.
func (f *Fonts) Width(s string, size float64, bold bool) float64 {
	c := f.face(bold)
	w := 0.0
	for _, r := range s {
		if a := c.of(r); a > 0 {
			w += a
		} else {
			w += 0.6
		}
	}
	return w * size
}

// What the Go fonts measure, per unit of size: how far letters rise above the
// baseline and hang below it, the height of capitals and digits, and the
// distance of two lines.
const (
	Ascent    = 0.945
	Descent   = 0.212
	CapHeight = 0.723
	Leading   = 1.3
)

// Wrap breaks text into lines no wider than a width, between words, and inside
// a word only where it alone is wider: behind a stroke, hyphen or colon if it
// has one, else behind the last letter that fits. Line feeds break always.
func (f *Fonts) Wrap(s string, size float64, bold bool, width float64) []string {
	var out []string
	for _, line := range strings.Split(s, "\n") {
		cur := ""
		for _, word := range strings.Fields(line) {
			if cur != "" {
				if try := cur + " " + word; f.Width(try, size, bold) <= width {
					cur = try
					continue
				}
				out = append(out, cur)
			}
			for f.Width(word, size, bold) > width {
				n := f.breakAt(word, size, bold, width)
				if n >= len(word) {
					break
				}
				out = append(out, word[:n])
				word = word[n:]
			}
			cur = word
		}
		out = append(out, cur)
	}
	return out
}

// breakAt is how many bytes of a word that is too wide stand on its line.
func (f *Fonts) breakAt(word string, size float64, bold bool, width float64) int {
	w, fits, soft := 0.0, 0, 0
	c := f.face(bold)
	for i, r := range word {
		w += max(c.of(r), 0) * size
		end := i + utf8.RuneLen(r)
		if w > width && i > 0 {
			break
		}
		fits = end
		if strings.ContainsRune("-/:_", r) {
			soft = end
		}
	}
	if soft > 0 && fits < len(word) {
		return soft
	}
	return fits
}
