// Command gen computes the scatter table of package transport:
//
//	nice go run ./exposure/transport/gen
//
// from the root of the module. It computes cell by cell, keeps each finished
// cell in a work directory and takes up there when started again; then it
// packs all cells into data/scatter.bin and writes data/provenance.json. The
// seeds are fixed: on one kind of processor the same table comes out whatever
// the number of workers and interruptions.
package main

import (
	"crypto/sha256"
	"encoding/gob"
	"encoding/hex"
	"encoding/json"
	"flag"
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"sync"
	"time"

	"halfvalue/exposure/transport"
	"halfvalue/exposure/transport/internal/cells"
)

func main() {
	out := flag.String("out", "exposure/transport/data", "directory of the table")
	work := flag.String("work", "", "directory of finished cells (default: in the user's cache)")
	coarse := flag.Bool("coarse", false, "a trial table with few histories")
	workers := flag.Int("workers", runtime.NumCPU(), "cells at a time")
	flag.Parse()
	if err := run(*out, *work, *coarse, *workers); err != nil {
		fmt.Fprintln(os.Stderr, "gen:", err)
		os.Exit(1)
	}
}

func run(out, work string, coarse bool, workers int) error {
	effort, name := cells.Full, "full"
	if coarse {
		effort, name = cells.Coarse, "coarse"
	}
	if work == "" {
		cache, err := os.UserCacheDir()
		if err != nil {
			return fmt.Errorf("no cache directory (%w): name one with -work", err)
		}
		work = filepath.Join(cache, "halfvalue-scatter")
	}
	work = filepath.Join(work, fmt.Sprintf("v%d-%s", cells.Version, name))
	if err := os.MkdirAll(work, 0o755); err != nil {
		return err
	}
	start := time.Now()
	all, err := compute(work, effort, workers)
	if err != nil {
		return err
	}
	fmt.Printf("%d cells in %s\n", len(all), time.Since(start).Round(time.Second))
	return write(out, name, all)
}

// task is a cell to compute.
type task struct {
	index int
	base  string
	keV   float64
}

func compute(work string, effort cells.Effort, workers int) ([]cells.Cell, error) {
	var tasks []task
	for _, b := range cells.Bases {
		list, err := cells.Energies(b)
		if err != nil {
			return nil, err
		}
		for _, e := range list {
			tasks = append(tasks, task{len(tasks), b, e})
		}
	}
	all, errs := make([]cells.Cell, len(tasks)), make([]error, len(tasks))
	next := make(chan task)
	var wg sync.WaitGroup
	for range max(1, workers) {
		wg.Go(func() {
			for t := range next {
				all[t.index], errs[t.index] = cell(work, t, effort)
			}
		})
	}
	for _, t := range tasks {
		next <- t
	}
	close(next)
	wg.Wait()
	for _, err := range errs {
		if err != nil {
			return nil, err
		}
	}
	return all, nil
}

// cell reads a finished cell or computes it and keeps it.
func cell(work string, t task, effort cells.Effort) (cells.Cell, error) {
	path := filepath.Join(work, fmt.Sprintf("%s-%.6g.gob", t.base, t.keV))
	var c cells.Cell
	if f, err := os.Open(path); err == nil {
		err = gob.NewDecoder(f).Decode(&c)
		f.Close()
		if err == nil && len(c.Planes) == len(cells.PlanesMFP) {
			return c, nil
		}
	}
	start := time.Now()
	c, err := cells.Make(t.base, t.keV, effort, 1)
	if err != nil {
		return c, err
	}
	fmt.Printf("%-13s %7.6g keV %8d histories %6.1f s\n", t.base, t.keV, c.Histories, time.Since(start).Seconds())
	f, err := os.Create(path + ".part")
	if err != nil {
		return c, err
	}
	if err := gob.NewEncoder(f).Encode(c); err != nil {
		f.Close()
		return c, err
	}
	if err := f.Close(); err != nil {
		return c, err
	}
	return c, os.Rename(path+".part", path)
}

func write(out, effort string, all []cells.Cell) error {
	data, err := cells.Pack(all)
	if err != nil {
		return err
	}
	sum := sha256.Sum256(data)
	p := transport.Provenance{
		Generator: "go run ./exposure/transport/gen", Version: cells.Version, Effort: effort, Arch: runtime.GOARCH, Go: runtime.Version(),
		Seed: cells.Seed, SHA256: hex.EncodeToString(sum[:]), Histories: map[string][]int{},
	}
	for _, c := range all {
		p.Histories[c.Base] = append(p.Histories[c.Base], c.Histories)
		p.Collisions += c.Collisions
	}
	text, err := json.Marshal(p)
	if err != nil {
		return err
	}
	if err := os.WriteFile(filepath.Join(out, "scatter.bin"), data, 0o644); err != nil {
		return err
	}
	fmt.Printf("%d bytes, %d collisions\n", len(data), p.Collisions)
	return os.WriteFile(filepath.Join(out, "provenance.json"), append(text, '\n'), 0o644)
}
