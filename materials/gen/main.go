//go:build ignore

// Writes or checks the embedded table of cross sections; see package gen.
package main

import (
	"flag"
	"fmt"
	"os"

	"halfvalue/materials/gen"
)

func main() {
	in := flag.String("in", "/usr/share/fisx", "directory of the package's data files")
	out := flag.String("out", "materials/data", "directory of xcom.txt.gz and provenance.json")
	check := flag.Bool("check", false, "write nothing; exit 1 where the files differ from the input")
	flag.Parse()
	if err := gen.Run(*in, *out, *check); err != nil {
		fmt.Fprintln(os.Stderr, "gen:", err)
		os.Exit(1)
	}
}
