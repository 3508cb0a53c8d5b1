// Package setup is the geometry of a shot: where source, part and film stand,
// how much metal each ray passes, how unsharp the image is, how much of a weld
// one film shows and how many shots go round a pipe. All of it is exact for
// straight rays and ideal shapes; there are no small-angle shortcuts.
//
// Lengths are mm, angles degrees where a name says Deg and radians elsewhere.
// A pipe lies along the Y axis with its centre at the origin; the beam comes
// from +Z. The package knows no code of practice: what is allowed comes in as
// an argument (the factor K of a thickness rise, an overlap) and the checks
// are in package rules.
//
// It leaves out: the thickness of film, cassette and screens; the sag of a
// guide tube; misalignment. What the crew must add for those it says nothing
// about.
package setup
