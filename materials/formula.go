package materials

import (
	"fmt"
	"math"
	"strconv"
)

// ParseFormula turns a chemical formula into mass fractions in rising Z.
// A formula is a sequence of element symbols in exact letter case and groups
// in parentheses, each followed by an optional count, which may be a decimal:
// "H2O", "Ca3(PO4)2", "Fe0.95O". Counts are above 0 and at most 1000000;
// groups nest to a depth of 20; the formula is at most 200 bytes long.
func ParseFormula(formula string) ([]Fraction, error) {
	if len(formula) > 200 {
		return nil, fmt.Errorf("formula of %d bytes, want at most 200", len(formula))
	}
	p := parser{text: formula}
	var atoms [MaxZ + 1]float64
	if err := p.group(&atoms, 0); err != nil {
		return nil, fmt.Errorf("formula %q: %w", formula, err)
	}
	var sum float64
	for z := 1; z <= MaxZ; z++ {
		atoms[z] *= table()[z].AtomicWeight
		sum += atoms[z]
	}
	if !(sum > 0) || math.IsInf(sum, 0) {
		return nil, fmt.Errorf("formula %q: no elements or counts out of range, want such as \"H2O\"", formula)
	}
	var f []Fraction
	for z, m := range atoms {
		if m > 0 {
			f = append(f, Fraction{z, m / sum})
		}
	}
	return f, nil
}

type parser struct {
	text string
	pos  int
}

// group adds the atoms up to the end, or with depth > 0 up to the closing
// parenthesis, which it consumes.
func (p *parser) group(atoms *[MaxZ + 1]float64, depth int) error {
	if depth > 20 {
		return fmt.Errorf("parentheses nest deeper than 20")
	}
	for start := p.pos; p.pos < len(p.text); {
		switch c := p.text[p.pos]; {
		case c == ')':
			if depth == 0 {
				return fmt.Errorf("\")\" at byte %d closes nothing", p.pos+1)
			}
			if p.pos == start {
				return fmt.Errorf("empty parentheses at byte %d", p.pos+1)
			}
			p.pos++
			return nil
		case c == '(':
			p.pos++
			var inner [MaxZ + 1]float64
			if err := p.group(&inner, depth+1); err != nil {
				return err
			}
			n, err := p.count()
			if err != nil {
				return err
			}
			for z, a := range inner {
				atoms[z] += a * n
			}
		default:
			z, err := p.symbol()
			if err != nil {
				return err
			}
			n, err := p.count()
			if err != nil {
				return err
			}
			atoms[z] += n
		}
	}
	if depth > 0 {
		return fmt.Errorf("\"(\" is not closed")
	}
	return nil
}

// symbol takes an upper case letter and the lower case letter after it.
func (p *parser) symbol() (z int, err error) {
	n := 1
	if p.pos+1 < len(p.text) && p.text[p.pos+1] >= 'a' && p.text[p.pos+1] <= 'z' {
		n = 2
	}
	s := p.text[p.pos : p.pos+n]
	z, ok := zBySymbol()[s]
	if !ok {
		return 0, fmt.Errorf("unknown element %q at byte %d, want H to U in exact letter case", s, p.pos+1)
	}
	p.pos += n
	return z, nil
}

// count takes digits with an optional decimal part; none counts as 1.
func (p *parser) count() (float64, error) {
	start := p.pos
	for p.pos < len(p.text) && (p.text[p.pos] >= '0' && p.text[p.pos] <= '9' || p.text[p.pos] == '.') {
		p.pos++
	}
	s := p.text[start:p.pos]
	if s == "" {
		return 1, nil
	}
	n, err := strconv.ParseFloat(s, 64)
	if err != nil || !(n > 0 && n <= 1e6) {
		return 0, fmt.Errorf("count %q at byte %d is outside 0 to 1000000", s, start+1)
	}
	return n, nil
}
