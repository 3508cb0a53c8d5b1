// Package data hands out the nuclide table as it stands in the file, so that
// packages which must not import beam (plan, whose types beam takes) read the
// same rows: there is one half-life of Ir-192 in the program.
package data

import _ "embed"

// Nuclides is nuclides.json; beam documents its fields.
//
//go:embed nuclides.json
var Nuclides []byte
