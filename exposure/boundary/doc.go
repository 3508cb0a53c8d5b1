// Package boundary sizes the area that people must stay out of: the dose field
// round a shot, and where each limit of the site is met.
//
// Every approximation errs outward. The rope's figure is the open beam's, with
// no part, no air and no wall taken off, because a cone wider than the part
// passes it by; what comes through the part is shown beside it. A rate is the
// rate while the beam is on: the averaging time of a limit is the meter's
// smoothing and averages no beam-off time in. A sealed source counts as it is
// at its worst moment, bare in its guide tube, in all directions. Calibration
// does not exist here: a test shot says nothing about the dose field.
//
// Results are an aid: a calibrated survey meter decides where the barricade is
// safe.
package boundary
