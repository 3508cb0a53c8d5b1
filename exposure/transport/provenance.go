package transport

import (
	_ "embed"
	"encoding/json"
	"fmt"
	"sync"
)

//go:embed data/provenance.json
var provenanceJSON []byte

// Provenance tells where the embedded table is from.
type Provenance struct {
	Generator  string           `json:"generator"` // the command that makes it
	Version    int              `json:"version"`
	Effort     string           `json:"effort"` // full or coarse
	Arch       string           `json:"arch"`   // processor it was made on
	Go         string           `json:"go"`
	Seed       uint64           `json:"seed"`   // root of the cells' seeds
	SHA256     string           `json:"sha256"` // of data/scatter.bin
	Collisions int64            `json:"collisions"`
	Histories  map[string][]int `json:"histories"` // by base, rising energy
}

// TableProvenance gives the record of the embedded table.
var TableProvenance = sync.OnceValue(func() Provenance {
	var p Provenance
	if err := json.Unmarshal(provenanceJSON, &p); err != nil {
		panic(fmt.Sprintf("transport: data/provenance.json does not decode: %v", err))
	}
	return p
})

// TableID names the embedded table in a working.
func TableID() string {
	p := TableProvenance()
	return fmt.Sprintf("scatter table version %d (%s), seed %d, sha256 %.12s", p.Version, p.Effort, p.Seed, p.SHA256)
}
