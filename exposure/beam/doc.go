// Package beam gives the radiation that a source sends out before it meets
// anything but its own filters: the spectrum of an X-ray tube, the lines of a
// sealed source, its decay, and the sums that a beam is known by: air kerma,
// ambient dose equivalent H*(10), mean energy, half-value layers.
//
// It never knows of scatter, of a part or a detector, nor of distance: every
// spectrum is at 1 m in vacuum per unit of strength, mA s or GBq s.
package beam
