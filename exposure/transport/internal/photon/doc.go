// Package photon is the Monte Carlo of package transport: it follows photons
// of 10 keV to 4 MeV through a stack of layers that is infinite sideways, or
// through an infinite medium around a point, and scores what crosses planes or
// spheres by energy and angle.
//
// Depths are mass thicknesses in g/cm2, energies keV, coefficients cm2/g. The
// uncollided beam is never sampled: it is exp(-depth). Sampling starts at the
// first collision, whose depth is stratified; from there on a photon survives
// each collision with reduced weight, and a weight window along the depth
// (found by a short pilot run) splits the heavy and thins out the light ones,
// so that every depth is visited about equally often.
//
// A run is cut into batches with seeds of their own. Each batch is summed by
// one goroutine and the batches are added in order, so the result does not
// depend on the number of workers; the spread of the batches is the
// statistical error.
package photon
