package plan

import (
	"fmt"
	"reflect"
	"slices"
	"strconv"
	"strings"
)

// Value gives the number or name at a path such as "source.tube.kv" or
// "part.layers[1].mm": a float64, int or string. It is false where the plan has
// nothing there: no such field, another source, an index beyond the list.
func (p Plan) Value(path string) (any, bool) {
	v, ok := reach(reflect.ValueOf(&p).Elem(), path, false)
	if !ok {
		return nil, false
	}
	switch v.Kind() {
	case reflect.Float64:
		return v.Float(), true
	case reflect.Int:
		return int(v.Int()), true
	case reflect.String:
		return v.String(), true
	}
	return nil, false
}

// With gives a copy of the plan with another value at the path: a float64 or
// int for numbers, a string for names. Screens that were left out are put in.
// The copy is not validated. It errs on a path that the plan has nothing at and
// on another kind of value.
func (p Plan) With(path string, value any) (Plan, error) {
	c := p.Clone()
	v, ok := reach(reflect.ValueOf(&c).Elem(), path, true)
	if !ok {
		return Plan{}, fmt.Errorf("the plan has nothing at %q: want a field of FIELDS.md that stands in it", path)
	}
	to := reflect.ValueOf(value)
	switch {
	case v.Kind() == reflect.Float64 && to.CanFloat():
		v.SetFloat(to.Float())
	case v.Kind() == reflect.Float64 && to.CanInt():
		v.SetFloat(float64(to.Int()))
	case v.Kind() == reflect.Int && to.CanInt():
		v.SetInt(to.Int())
	case v.Kind() == reflect.Int && to.CanFloat() && to.Float() == float64(int64(to.Float())):
		v.SetInt(int64(to.Float()))
	case v.Kind() == reflect.String && to.Kind() == reflect.String:
		v.SetString(to.String())
	default:
		return Plan{}, fmt.Errorf("%s does not take %T %v", path, value, value)
	}
	return c, nil
}

// reach follows a path through the plan; with make it puts in absent screens.
func reach(v reflect.Value, path string, create bool) (reflect.Value, bool) {
	for path != "" {
		var step string
		step, path = nextStep(path)
		if index, ok := strings.CutPrefix(step, "["); ok {
			i, err := strconv.Atoi(index)
			if v.Kind() == reflect.Pointer && v.IsNil() && create {
				v.Set(reflect.New(v.Type().Elem()))
			}
			v = reflect.Indirect(v)
			if err != nil || !v.IsValid() || (v.Kind() != reflect.Slice && v.Kind() != reflect.Array) || i < 0 || i >= v.Len() {
				return v, false
			}
			v = v.Index(i)
			continue
		}
		v = reflect.Indirect(v)
		if !v.IsValid() || v.Kind() != reflect.Struct || v.Type() == timeType {
			return v, false
		}
		i := slices.Index(fieldNames(v.Type()), step)
		if i < 0 {
			return v, false
		}
		v = v.Field(i)
	}
	return v, v.IsValid()
}

// nextStep cuts the first name, or the first index with its bracket, off.
func nextStep(path string) (step, rest string) {
	if strings.HasPrefix(path, "[") {
		step, rest, _ = strings.Cut(path, "]")
	} else if i := strings.IndexAny(path, ".["); i >= 0 {
		step, rest = path[:i], path[i:]
	} else {
		return path, ""
	}
	return step, strings.TrimPrefix(rest, ".")
}
