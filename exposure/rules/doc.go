// Package rules holds codes of practice as data and applies them to a plan.
//
// A set is a list of rows, each with its clause, its confidence and our own
// wording; the figures stand in data/*.json, not in code. Nothing there was
// read in a licensed copy of a standard: what is not "seen" says "check against
// the edition in force", and a row of low confidence is guidance that neither
// passes nor fails a plan. A company loads its own rows over ours with Over, and
// every check that used one names the file.
//
// Apply judges Facts, a plain struct that FactsOf fills from the plan and the
// engine completes with what it computed. Mends solves for the smallest change
// of one quantity that makes a check hold. The package imports neither the
// engine nor the boundary; it has no physics.
//
// What it does not do: it never decides that a technique is acceptable; an
// agreement between parties that a code allows is named in a check's text, not
// assumed.
package rules
