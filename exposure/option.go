package exposure

import "halfvalue/exposure/rules"

// Option changes how the engine reckons; a plan never does.
type Option func(*engine)

// engine is what the options set.
type engine struct {
	noAir bool
	rules *rules.Table // nil: ours
	quick bool         // exposure alone: no spread, boundary or working
	shots testShots
}

// testShots is how well test shots settle the calibration, standard deviations
// in percent; 0 where there are none.
type testShots struct{ sourcePct, filmPct float64 }

// WithoutAir leaves the air between source and film out.
func WithoutAir() Option { return func(e *engine) { e.noAir = true } }

// exposureOnly skips what a chart does not need.
func exposureOnly() Option { return func(e *engine) { e.quick = true } }

// WithTestShots says how well test shots settle the two factors of the
// calibration, as standard deviations in percent (0: no test shots). They stand
// in the spread in place of what the shots have made known: output, current,
// filters and activity for the source; speed and processing for the film.
func WithTestShots(sourcePct, filmPct float64) Option {
	return func(e *engine) { e.shots = testShots{max(0, sourcePct), max(0, filmPct)} }
}
