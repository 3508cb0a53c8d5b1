// Package exposure is the physics of a shot: a plan goes in, a reckoning comes
// out. Reckon is a pure function of its inputs; it knows no clock, no disk and
// no screen, and two calls with one plan give one answer.
//
// The way of the reckoning: the spectrum of the tube or the nuclide (package
// beam), the air and the layers of the part energy by energy, with the
// scattered radiation of a photon Monte Carlo (package transport), the response
// of film, plate or panel to every energy that arrives (package detector), and
// inverse square. The time follows from the dose that the wanted density takes.
// Every number carries its working.
//
// Results are an aid: site radiation rules, the licence and licensed
// supervision govern.
package exposure
