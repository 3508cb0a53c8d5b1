package drafting

import (
	"math"
	"strconv"
)

// Axis maps a quantity to a stretch of the sheet, in differences or in ratios.
type Axis struct {
	Lo, Hi   float64 // quantity at From and To; with Log both above zero
	From, To float64 // dp
	Log      bool
}

// At is the place of a value; values outside fall outside.
func (a Axis) At(v float64) float64 {
	t := (v - a.Lo) / (a.Hi - a.Lo)
	if a.Log {
		t = math.Log(v/a.Lo) / math.Log(a.Hi/a.Lo)
	}
	return a.From + t*(a.To-a.From)
}

// Value is the inverse of At.
func (a Axis) Value(at float64) float64 {
	t := (at - a.From) / (a.To - a.From)
	if a.Log {
		return a.Lo * math.Pow(a.Hi/a.Lo, t)
	}
	return a.Lo + t*(a.Hi-a.Lo)
}

// Ticks returns rising figures on 1-2-5 that part the axis into at most n
// pieces or so, none outside it.
func (a Axis) Ticks(n int) []float64 {
	if !(a.Hi > a.Lo) || n < 1 {
		return nil
	}
	if a.Log && a.Lo > 0 && a.Hi/a.Lo > 3 {
		return logTicks(a.Lo, a.Hi, n)
	}
	step := tickStep((a.Hi - a.Lo) / float64(n))
	var out []float64
	for i := math.Ceil(a.Lo/step - 1e-9); i*step <= a.Hi*(1+1e-12)+1e-12; i++ {
		out = append(out, i*step)
	}
	return out
}

// tickStep is the 1-2-5 figure at or above v.
func tickStep(v float64) float64 {
	p := math.Pow(10, math.Floor(math.Log10(v)))
	for _, m := range []float64{1, 2, 5, 10} {
		if m*p >= v*(1-1e-9) {
			return m * p
		}
	}
	return 10 * p
}

// logTicks uses 1-2-5 of every decade, or fewer where that is too many.
func logTicks(lo, hi float64, n int) []float64 {
	for _, set := range [][]float64{{1, 2, 5}, {1, 3}, {1}} {
		var out []float64
		for e := math.Floor(math.Log10(lo)); e <= math.Ceil(math.Log10(hi)); e++ {
			for _, m := range set {
				if v := m * math.Pow(10, e); v >= lo*(1-1e-9) && v <= hi*(1+1e-9) {
					out = append(out, v)
				}
			}
		}
		if len(out) <= n+1 {
			return out
		}
	}
	return nil
}

// Plain writes a tick's figure without a power of ten.
func Plain(v float64) string {
	return strconv.FormatFloat(math.Round(v*1e9)/1e9, 'f', -1, 64)
}

// Scale is an axis drawn with its ticks, figures and quantity.
type Scale struct {
	Axis
	Across float64 // place of the axis line on the other coordinate
	Reach  float64 // other side of the plot, for the grid; equal to Across: no grid
	Title  string  // quantity and unit
	Size   float64 // of text
	Count  int     // about how many ticks
	Format func(float64) string
	Marks  []float64 // instead of figures on 1-2-5: hours and minutes have others
}

// Horizontal draws the axis below a plot, figures under the ticks, the title
// at the right end under them.
func (d *Drawing) Horizontal(s Scale) {
	d.Line(Pt{s.From, s.Across}, Pt{s.To, s.Across}, Thin, Line)
	last := math.Inf(-1)
	for _, v := range s.marks() {
		x := s.At(v)
		if s.Reach != s.Across {
			d.Line(Pt{x, s.Across}, Pt{x, s.Reach}, Hair, Ghost)
		}
		d.Line(Pt{x, s.Across}, Pt{x, s.Across + 5}, Thin, Line)
		text := s.figure(v)
		w := d.Fonts.Width(text, s.Size, false)
		left := math.Max(s.From-8, math.Min(x-w/2, s.To+8-w))
		if left < last+6 {
			continue
		}
		d.Text(Pt{left, s.Across + 6 + Ascent*s.Size}, text, Style{Size: s.Size, Ink: Faint})
		last = left + w
	}
	if s.Title != "" {
		d.Text(Pt{s.To, s.Across + 6 + (Ascent+Leading)*s.Size}, s.Title, Style{Size: s.Size, Ink: Faint, Align: End})
	}
}

// Vertical draws the axis at the left of a plot, figures left of the ticks,
// the title above its top end.
func (d *Drawing) Vertical(s Scale) {
	d.Line(Pt{s.Across, s.From}, Pt{s.Across, s.To}, Thin, Line)
	last := math.Inf(1)
	for _, v := range s.marks() {
		y := s.At(v)
		if s.Reach != s.Across {
			d.Line(Pt{s.Across, y}, Pt{s.Reach, y}, Hair, Ghost)
		}
		d.Line(Pt{s.Across - 5, y}, Pt{s.Across, y}, Thin, Line)
		if last-y < s.Size*1.1 {
			continue
		}
		d.Text(Pt{s.Across - 8, y + CapHeight*s.Size/2}, s.figure(v), Style{Size: s.Size, Ink: Faint, Align: End})
		last = y
	}
	if s.Title != "" {
		d.Text(Pt{s.Across, s.To - 0.7*s.Size}, s.Title, Style{Size: s.Size, Ink: Faint})
	}
}

func (s Scale) marks() []float64 {
	if s.Marks == nil {
		return s.Ticks(s.Count)
	}
	var out []float64
	for _, v := range s.Marks {
		if v >= s.Lo && v <= s.Hi {
			out = append(out, v)
		}
	}
	return out
}

func (s Scale) figure(v float64) string {
	if s.Format != nil {
		return s.Format(v)
	}
	return Plain(v)
}
