// Package transport answers what scattered radiation does: behind a part, at
// the film (Slab); behind a wall (BroadTransmission, Barrier); and beside and
// before a part, a wall or the ground (Emitted, Scattered).
//
// The answers are folded from an embedded table that a photon Monte Carlo of
// ours (internal/photon) computed for twelve base materials, 15 keV to 3 MeV,
// to 20 mean free paths, by the energy of what leaves and on both sides by
// angle. It is made again with
//
//	nice go run ./exposure/transport/gen
//
// The package knows no sources, detectors or doses; the caller brings a
// spectrum and a weight by energy.
package transport
