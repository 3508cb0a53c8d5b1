package exposure

import (
	"fmt"

	"halfvalue/exposure/boundary"
)

// ropes fills in the boundary. It is given the source as it is, never the
// calibration: a test shot says nothing about the dose field.
func (s *shot) ropes(r *Reckoning) error {
	lines, steps, err := boundary.Lines(boundary.Input{
		Plan: s.plan, Spectrum: s.spectrum, Strength: s.strength,
		ExposureSecondsHigh: r.Exposure.SecondsHigh,
	})
	if err != nil {
		return fmt.Errorf("boundary: %w", err)
	}
	r.Boundary = append([]boundary.Line{}, lines...)
	r.Workings = append(r.Workings, steps...)
	return nil
}
