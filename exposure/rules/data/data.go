// Package data holds the rule sets as files, one a document, and hands them
// out as they stand, so that packages which must not import rules (plan, whose
// types rules takes) know the same names.
package data

import (
	"embed"
	"encoding/json"
	"fmt"
	"slices"
	"sync"
)

//go:embed *.json
var files embed.FS

// Files gives every file of rule sets by its name.
func Files() map[string][]byte {
	all := map[string][]byte{}
	list, err := files.ReadDir(".")
	if err != nil {
		panic(fmt.Sprintf("rules: %v", err))
	}
	for _, f := range list {
		b, err := files.ReadFile(f.Name())
		if err != nil {
			panic(fmt.Sprintf("rules: %v", err))
		}
		all[f.Name()] = b
	}
	return all
}

// Names gives the names of all rule sets, sorted: "iso17636-1:2013/B".
func Names() []string { return slices.Clone(names()) }

var names = sync.OnceValue(func() []string {
	var list []string
	for name, data := range Files() {
		var file struct {
			Sets []struct {
				Name string `json:"name"`
			} `json:"sets"`
		}
		if err := json.Unmarshal(data, &file); err != nil {
			panic(fmt.Sprintf("rules: data/%s: %v", name, err))
		}
		for _, s := range file.Sets {
			list = append(list, s.Name)
		}
	}
	slices.Sort(list)
	return list
})
