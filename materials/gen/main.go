// Command gen writes materials/data/xcom.txt.gz, the embedded table of cross
// sections, and beside it provenance.json: what it was made from.
//
//	go run ./materials/gen          writes both files (run at the top of the tree)
//	go run ./materials/gen -check   compares and exits 1 where they differ
//
// The input is Debian's package python-fisx-common: the arrays of NIST XCOM
// (Berger and Hubbell, NBSIR 87-3597) and the shell constants of EADL97
// (Cullen et al., UCRL-50400 vol. 30), Scofield's K emission rates (Phys. Rev.
// A 9, 1041) and the binding energies of Larkins (At. Data Nucl. Data Tables
// 20, 311). All of them are in the public domain.
package main

import (
	"flag"
	"fmt"
	"os"
)

func main() {
	in := flag.String("in", "/usr/share/fisx", "directory of the package's data files")
	out := flag.String("out", "materials/data", "directory of xcom.txt.gz and provenance.json")
	check := flag.Bool("check", false, "write nothing; exit 1 where the files differ from the input")
	flag.Parse()
	if err := run(*in, *out, *check); err != nil {
		fmt.Fprintln(os.Stderr, "gen:", err)
		os.Exit(1)
	}
}
