package materials

import (
	"cmp"
	"slices"
	"sync"
)

// lazyGrids holds the table of each process and of the total, each made once
// on first use.
type lazyGrids struct {
	once  [processes + 1]sync.Once
	grids [processes + 1]*grid
}

func (l *lazyGrids) get(p Process, tabulate func(Process) *grid) *grid {
	l.once[p].Do(func() { l.grids[p] = tabulate(p) })
	return l.grids[p]
}

// grid gives an element's table of a process or of the total.
func (r *record) grid(p Process) *grid {
	return r.tables.get(p, func(p Process) *grid {
		c := r.interpolants()
		return newGrid(allBreaks(c), func(keV, probe float64) (float64, float64) { return c.sum(p, keV, probe) })
	})
}

// tabulate makes a material's table from those of its elements.
func (c *coefficients) tabulate(p Process) *grid {
	if len(c.fractions) == 1 {
		return table()[c.fractions[0].Z].grid(p)
	}
	n := len(c.fractions)
	parts, grids, mass := make([]*curves, n), make([]*grid, n), make([]float64, n)
	for i, f := range c.fractions {
		r := table()[f.Z]
		parts[i], grids[i], mass[i] = r.interpolants(), r.grid(p), f.Mass
	}
	return mixGrids(grids, mass, allBreaks(parts...), func(keV, probe float64) (v, dv float64) {
		for i, part := range parts {
			a, da := part.sum(p, keV, probe)
			v, dv = v+mass[i]*a, dv+mass[i]*da
		}
		return v, dv
	})
}

// sum gives one process, or all of them for total, as at does.
func (c *curves) sum(p Process, keV, probe float64) (v, dv float64) {
	if p != total {
		return c.at(p, keV, probe)
	}
	for q := range processes {
		a, da := c.at(q, keV, probe)
		v, dv = v+a, dv+da
	}
	return v, dv
}

// allBreaks merges the breaks of elements with the thresholds of pair
// production, rising, each once.
func allBreaks(parts ...*curves) []float64 {
	breaks := []float64{pairKeV, tripletKeV}
	for _, c := range parts {
		breaks = append(breaks, c.breaks...)
	}
	slices.SortFunc(breaks, cmp.Compare[float64])
	return slices.Compact(breaks)
}
