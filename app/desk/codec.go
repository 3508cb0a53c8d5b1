package desk

import (
	"errors"
	"strings"

	"halfvalue/exposure/plan"
)

// decode reads a plan that may name the rule sets that the desk was opened
// with besides ours.
func (d *Desk) decode(data []byte) (plan.Plan, error) {
	names := make([]string, len(d.rules))
	for i, r := range d.rules {
		names[i] = r.Value
	}
	return plan.DecodeFor(data, names)
}

// check encodes an edited plan and refuses what the decoder would refuse.
func (d *Desk) check(p plan.Plan) (plan.Plan, []byte, error) {
	data, err := plan.Encode(p)
	if err != nil {
		return p, nil, err
	}
	p, err = d.decode(data)
	return p, data, err
}

// refusalOf states an error as a sheet shows it. The first fault of several
// gives the field; the text names them all.
func refusalOf(err error) *Refusal {
	var r *Refusal
	if errors.As(err, &r) {
		return r
	}
	r = &Refusal{Text: err.Error()}
	var f *plan.FieldError
	if errors.As(err, &f) {
		r.Field, r.Value, r.Allowed, r.Mend = f.Field, f.Value, f.Allowed, f.Mend
	}
	var all plan.Errors
	if errors.As(err, &all) && len(all) > 1 {
		r.Text = strings.ReplaceAll(err.Error(), "\n", "; ")
	}
	return r
}
