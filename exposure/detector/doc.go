// Package detector turns radiation at the film into an image: optical density
// of a film, signal to noise of an imaging plate or a flat panel.
//
// A film is blackened by the energy that electrons leave in its emulsion. Where
// those electrons come from decides how a film answers to photons of different
// energy: from the silver bromide itself, or from what touches it, base, paper
// or lead screens. Response reckons both by Burlin's general cavity theory
// (Brit. J. Radiol. 39, 727, 1966), energy by energy, with no factor fitted to
// a screen or a beam. How much dose a film needs is its class's Ks of ISO 7004,
// in that standard's own beam, which is simulated.
//
// It never knows of sources, parts or distances, and holds no state.
package detector
