package desk

import "math"

// recompute reckons the open entry's plan with today's engine and compares
// the figures that the entry holds.
func (d *Desk) recompute() {
	e := d.state.Book.Open
	if e == nil {
		return
	}
	again := &Again{Number: e.Number}
	d.state.Book.Again = again
	p, err := d.decode(e.Plan)
	if err != nil {
		again.Fault = err.Error()
		return
	}
	a, err := d.reckon(p)
	if err != nil {
		again.Fault = err.Error()
		return
	}
	again.Working = a.Working
	then := e.Then
	add := func(name, unit string, was, now float64) {
		if was != 0 || now != 0 {
			again.Rows = append(again.Rows, AgainRow{name, unit, was, now, agree(was, now)})
		}
	}
	add("exposure time", "s", then.Seconds, a.Exposure.Seconds)
	add("low", "s", then.SecondsLow, a.Exposure.SecondsLow)
	add("high", "s", then.SecondsHigh, a.Exposure.SecondsHigh)
	add("charge", "mA min", then.MAMin, a.Exposure.MAMin)
	add("activity x time", "GBq min", then.GBqMin, a.Exposure.GBqMin)
}

// agree compares within 1e-9: processors differ in the last bits.
func agree(a, b float64) bool {
	return math.Abs(a-b) <= 1e-9*math.Max(math.Abs(a), math.Abs(b))
}
