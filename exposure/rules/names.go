package rules

import "halfvalue/exposure/plan"

// What scopes may name.
var (
	kinds     = plan.Kinds
	images    = plan.Images
	recorders = []string{"film", "plate", "panel"}
	families  = []string{"steel", "cast-iron", "aluminium", "magnesium", "titanium", "copper", "nickel", "zirconium", "heavy", "concrete", "mineral", "liquid", "plastic", "gas", "element"}
)
