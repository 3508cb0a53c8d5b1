package desk

// Curve is the trade-off of one quantity against exposure time, everything
// else as the plan has it.
type Curve struct {
	Field    string
	From, To float64      // base unit
	Points   []CurvePoint // in order of X; those not yet computed are missing
	Whole    bool
}

// CurvePoint is one reckoning of the curve.
type CurvePoint struct {
	X       float64 // base unit
	Seconds float64
	Metres  float64 // outermost rope
	Short   bool    // a check falls short here
	Refused bool    // the plan is refused here; the rest is zero
	Density []Spot
}
