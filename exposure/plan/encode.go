package plan

import (
	"bytes"
	"fmt"
	"time"

	"github.com/go-json-experiment/json"
	"github.com/go-json-experiment/json/jsontext"
)

// Encode writes the plan in its canonical form: one line, fields in the order
// of the types, nothing that equals a field left out, numbers in the shortest
// decimals that read back to the same value, times in UTC. Equal plans give
// equal bytes, and for every valid plan Encode(Decode(b)) is b again. It errs
// only on a number that JSON has no form for.
func Encode(p Plan) ([]byte, error) {
	b, err := json.Marshal(p.Clone())
	if err != nil {
		return nil, fmt.Errorf("plan %q does not encode: %w", p.Title, err)
	}
	return b, nil
}

// EncodeFile is Encode for people: indented by two blanks, a new line at the
// end.
func EncodeFile(p Plan) ([]byte, error) {
	b, err := Encode(p)
	if err != nil {
		return nil, err
	}
	v := jsontext.Value(b)
	if err := v.Indent(jsontext.WithIndent("  ")); err != nil {
		return nil, fmt.Errorf("plan %q does not encode: %w", p.Title, err)
	}
	return append(v, '\n'), nil
}

// Equal tells that two plans say the same: equal times in different zones, and
// a list left out and an empty one, are the same.
func (p Plan) Equal(q Plan) bool {
	a, errA := Encode(p)
	b, errB := Encode(q)
	return errA == nil && errB == nil && bytes.Equal(a, b)
}

// Clone copies the plan and everything it points to, with times in UTC and
// empty lists left out.
func (p Plan) Clone() Plan {
	p.At = utc(p.At)
	if t := p.Source.Tube; t != nil {
		c := *t
		c.Filters = copied(c.Filters)
		p.Source.Tube = &c
	}
	if s := p.Source.Sealed; s != nil {
		c := *s
		c.Assayed, c.Collimator = utc(c.Assayed), copied(c.Collimator)
		p.Source.Sealed = &c
	}
	p.Part.Layers = copied(p.Part.Layers)
	p.Part.Sections = copied(p.Part.Sections)
	for i := range p.Part.Sections {
		p.Part.Sections[i].Layers = copied(p.Part.Sections[i].Layers)
	}
	p.Detector = p.Detector.clone()
	p.Site = p.Site.clone()
	return p
}

func (d Detector) clone() Detector {
	if d.Film != nil {
		c := *d.Film
		c.ScreensMM = pointed(c.ScreensMM)
		d.Film = &c
	}
	if d.Plate != nil {
		c := *d.Plate
		c.ScreensMM = pointed(c.ScreensMM)
		d.Plate = &c
	}
	d.Panel = pointed(d.Panel)
	return d
}

func pointed[T any](p *T) *T {
	if p == nil {
		return nil
	}
	c := *p
	return &c
}

func copied[T any](s []T) []T { return append([]T(nil), s...) }

func utc(t time.Time) time.Time {
	if t.IsZero() {
		return time.Time{}
	}
	return t.UTC().Round(0)
}
