package exposure

import "halfvalue/exposure/rules"

// Option changes how the engine reckons; a plan never does.
type Option func(*engine)

// engine is what the options set.
type engine struct {
	noAir bool
	rules *rules.Table // nil: ours
	quick bool         // exposure alone: no spread, boundary or working
}

// WithoutAir leaves the air between source and film out.
func WithoutAir() Option { return func(e *engine) { e.noAir = true } }

// exposureOnly skips what a chart does not need.
func exposureOnly() Option { return func(e *engine) { e.quick = true } }
