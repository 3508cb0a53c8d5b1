package sheet

import (
	"fmt"
	"math"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/app/drafting"
	"halfvalue/app/touch"
)

// searchFrom is the length of a list from which it can be narrowed by typing.
const searchFrom = 13

// choicePanel lists the options of a choice as buttons.
func (u *UI) choicePanel(r drafting.Rect) {
	c, ok := u.known.choices[u.s.Panel.Field]
	if !ok {
		return
	}
	options := c.Options
	if len(options) >= searchFrom {
		box, rest := r.CutTop(u.look.Target)
		u.fieldAt(box, "Search "+c.Name, &u.search)
		_, r = rest.CutTop(touch.Unit)
		options = narrow(options, u.search.Text())
	} else {
		r = u.heading(r, capital(c.Name))
	}
	u.optionGrid(u.layerButtons(r, c.Field), c, options)
}

// layerButtons add and take out layers where a layer's material is chosen.
func (u *UI) layerButtons(r drafting.Rect, field string) drafting.Rect {
	i := -1
	if n, err := fmt.Sscanf(field, "part.layers[%d].material", &i); n != 1 || err != nil {
		return r
	}
	row, rest := r.CutBottom(u.look.Target)
	cells := row.Columns(2, touch.Unit)
	u.bench.Button(touch.Button{Box: cells[0], Label: "Add a layer", Do: u.do(desk.AddLayer{After: i})})
	u.bench.Button(touch.Button{Box: cells[1], Label: "Take it out", Off: len(u.s.Plan.Part.Layers) < 2, Do: u.do(desk.DropLayer{Index: i})})
	rest.Y1 -= touch.Unit
	return rest
}

// narrow keeps the options whose title or note has every word.
func narrow(options []desk.Option, text string) []desk.Option {
	words := strings.Fields(strings.ToLower(text))
	var out []desk.Option
next:
	for _, o := range options {
		all := strings.ToLower(o.Title + " " + o.Note + " " + o.Value)
		for _, w := range words {
			if !strings.Contains(all, w) {
				continue next
			}
		}
		out = append(out, o)
	}
	return out
}

func (u *UI) optionGrid(r drafting.Rect, c desk.Choice, options []desk.Option) {
	b := &u.bench
	columns := max(1, int(r.W()/(230*u.look.Text)))
	width := (r.W() - u.look.Target - 4*float64(columns)) / float64(columns)
	height := u.look.Target
	for _, o := range options {
		height = math.Max(height, b.ButtonHeight(o.Title, width))
	}
	rows := (len(options) + columns - 1) / columns
	b.Scroll("Options", r, float64(rows)*(height+4), func(in drafting.Rect) {
		w := (in.W() - 4*float64(columns)) / float64(columns)
		for i, o := range options {
			x, y := in.X0+float64(i%columns)*(w+4), in.Y0+float64(i/columns)*(height+4)
			b.Button(touch.Button{Box: drafting.Rect{X0: x, Y0: y, X1: x + w, Y1: y + height}, Label: o.Title, Selected: o.Value == c.Value,
				Do: u.do(desk.Choose{Field: c.Field, To: o.Value})})
		}
		if len(options) == 0 {
			b.Paragraph(in, "nothing in the list has these words", u.look.Plain())
		}
	})
}
