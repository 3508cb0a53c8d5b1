// Package gen makes materials/data/xcom.txt.gz, the embedded table of cross
// sections, and beside it provenance.json: what it was made from. Nothing
// imports it but its command, which is run at the top of the tree:
//
//	go run materials/gen/main.go          writes both files
//	go run materials/gen/main.go -check   compares and exits 1 where they differ
//
// The command is a file that builds leave out, so that the tree holds one
// program only; iOS could not link a second without C.
//
// The input is Debian's package python-fisx-common: the arrays of NIST XCOM
// (Berger and Hubbell, NBSIR 87-3597) and the shell constants of EADL97
// (Cullen et al., UCRL-50400 vol. 30), Scofield's K emission rates (Phys. Rev.
// A 9, 1041) and the binding energies of Larkins (At. Data Nucl. Data Tables
// 20, 311). All of them are in the public domain.
package gen
