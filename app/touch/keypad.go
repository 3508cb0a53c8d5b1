package touch

import (
	"gioui.org/io/key"

	"halfvalue/app/drafting"
)

// keypad draws the keys: figures, point and stroke, then units, then erase,
// back to the scale, and set.
func (d *Dial) keypad(b *Bench, r drafting.Rect, s DialSpec) {
	keys := [][]string{{"7", "8", "9"}, {"4", "5", "6"}, {"1", "2", "3"}, {"0", ".", "/"}}
	for i, row := range r.Rows(4, 4) {
		cells := row.Columns(5, 4)
		for j, k := range keys[i] {
			b.Button(Button{Box: cells[j], Label: "Key " + k, Text: k, Do: func() { d.typeRune(k) }})
		}
		if i < len(s.Units) {
			unit := s.Units[i]
			b.Button(Button{Box: cells[3], Label: "Unit " + unit, Text: unit, Off: d.typed == "", Do: func() { d.commit(s, d.typed+" "+unit) }})
		}
		d.actionKey(b, i, cells[4], s)
	}
}

// actionKey is a key of the right-hand column; the last two rows are one key.
func (d *Dial) actionKey(b *Bench, row int, cell drafting.Rect, s DialSpec) {
	switch row {
	case 0:
		b.Button(Button{Box: cell, Label: "Erase", Symbol: b.Erase, Off: d.typed == "", Do: d.erase})
	case 1:
		d.padButton(b, cell)
	case 2:
		cell.Y1 += cell.H() + 4
		b.Button(Button{Box: cell, Label: "Set", Symbol: b.Check, Strong: d.typed != "", Off: d.typed == "", Do: func() { d.commit(s, d.typed) }})
	}
}

const maxTyped = 16

func (d *Dial) typeRune(s string) {
	if len(d.typed) < maxTyped {
		d.typed += s
	}
}

func (d *Dial) erase() {
	if r := []rune(d.typed); len(r) > 0 {
		d.typed = string(r[:len(r)-1])
	}
}

func (d *Dial) commit(s DialSpec, text string) {
	d.typed = ""
	s.Typed(text)
}

// dialKeys are the keys that an open dial takes.
func dialKeys() []key.Filter {
	names := []key.Name{key.NameLeftArrow, key.NameRightArrow, key.NameUpArrow, key.NameDownArrow, key.NamePageUp, key.NamePageDown,
		key.NameReturn, key.NameEnter, key.NameDeleteBackward, key.NameSpace, ".", ",", "/"}
	for c := '0'; c <= '9'; c++ {
		names = append(names, key.Name(c))
	}
	for c := 'A'; c <= 'Z'; c++ {
		names = append(names, key.Name(c))
	}
	out := make([]key.Filter, len(names))
	for i, n := range names {
		out[i] = key.Filter{Name: n, Optional: key.ModShift}
	}
	return out
}

// hardwareKeys lets arrows scrub, digits type, Return set what is typed or
// close.
func (d *Dial) hardwareKeys(b *Bench, s DialSpec) {
	for _, e := range b.Keys(dialKeys()...) {
		switch e.Name {
		case key.NameLeftArrow, key.NameDownArrow:
			d.step(s, -1, false)
		case key.NameRightArrow, key.NameUpArrow:
			d.step(s, 1, false)
		case key.NamePageUp:
			d.usual(s, 1)
		case key.NamePageDown:
			d.usual(s, -1)
		case key.NameReturn, key.NameEnter:
			if d.typed == "" {
				s.Close()
			} else {
				d.commit(s, d.typed)
			}
		case key.NameDeleteBackward:
			d.erase()
		case key.NameSpace:
			d.typeRune(" ")
		default:
			d.typeRune(string(e.Name))
		}
	}
}
