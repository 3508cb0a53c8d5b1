package beam

import (
	"fmt"
	"math"
	"slices"
	"sync"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// bins is the scratch of one spectrum: its bins and what is computed on the
// way. It is reused.
type bins struct {
	keV, width  []float64
	mu, photo   []float64 // of the target, cm2/g
	gen, out    []float64 // generated per keV, share that leaves the anode
	sum         []float64 // photons per bin, over the voltages of the cycle
	edges       []float64
	lines, wave []line
}

var scratch = sync.Pool{New: func() any { return new(bins) }}

// Tube gives the spectrum of t, which must be normalised and validated, behind
// its target and all of its filters in their order and nothing else; per mA s
// at 1 m, without the air. It errs on an unknown target, waveform or material
// and on values outside 20 to 450 kV, 5 to 45 deg and 0 to 100 mm.
//
// Bins are 1 keV wide or finer, from CutoffKeV to exactly the peak voltage;
// the absorption edges of target and filters are bin edges. The model and its
// error stand in the package's documentation.
func Tube(t plan.Tube) (Spectrum, error) { return TubeBy(ThickTarget, t) }

// TubeBy is Tube with another model of the continuum.
func TubeBy(c Continuum, t plan.Tube) (Spectrum, error) {
	tg, err := targetNamed(t.Target)
	if err != nil {
		return Spectrum{}, err
	}
	filters, err := checked(t)
	if err != nil {
		return Spectrum{}, err
	}
	cycle, err := waveform(t.Waveform)
	if err != nil {
		return Spectrum{}, err
	}
	b := scratch.Get().(*bins)
	defer scratch.Put(b)
	b.lay(tg, filters, t.KV)
	b.lines = b.lines[:0]
	for _, v := range cycle {
		if kV := t.KV * v.voltage; kV > lowTableKV {
			b.add(c, tg, kV, t.AnodeDeg, v.charge)
		}
	}
	s := b.spectrum()
	s.filter(filters)
	return s, nil
}

// layer is a filter with its material found.
type layer struct {
	material *materials.Material
	mm       float64
}

func checked(t plan.Tube) ([]layer, error) {
	switch {
	case !(t.KV >= LeastKV && t.KV <= MostKV):
		return nil, fmt.Errorf("tube voltage \"%g\" kV is outside %d to %d", t.KV, LeastKV, MostKV)
	case !(t.AnodeDeg >= 5 && t.AnodeDeg <= 45):
		return nil, fmt.Errorf("anode angle \"%g\" deg is outside 5 to 45", t.AnodeDeg)
	}
	return layers(t.Filters)
}

func layers(filters []plan.Filter) ([]layer, error) {
	var out []layer
	for i, f := range filters {
		m, err := materials.Lookup(f.Material)
		if err != nil {
			return nil, fmt.Errorf("filter %d: %w", i+1, err)
		}
		if !(f.MM >= 0 && f.MM <= 100) {
			return nil, fmt.Errorf("filter %d: thickness \"%g\" mm is outside 0 to 100", i+1, f.MM)
		}
		out = append(out, layer{m, f.MM})
	}
	return out, nil
}

// lay lays out the bins up to kV.
func (b *bins) lay(t *target, filters []layer, kV float64) {
	b.edges = append(b.edges[:0], edgesOf(t.metal)...)
	for _, f := range filters {
		b.edges = append(b.edges, edgesOf(f.material)...)
	}
	for e := CutoffKeV; float64(e) < kV; e++ {
		b.edges = append(b.edges, float64(e))
	}
	b.edges = append(b.edges, kV)
	slices.Sort(b.edges)
	b.keV, b.width = b.keV[:0], b.width[:0]
	from := float64(CutoffKeV)
	for _, to := range b.edges {
		if to > from && to <= kV {
			b.keV = append(b.keV, (from+to)/2)
			b.width = append(b.width, to-from)
			from = to
		}
	}
	n := len(b.keV)
	for _, p := range []*[]float64{&b.mu, &b.photo, &b.gen, &b.out, &b.sum} {
		*p = slices.Grow((*p)[:0], n)[:n]
	}
	t.metal.MuPerMMInto(b.mu, b.keV)
	perMM := 10 / t.metal.DensityGPerCM3()
	for i, e := range b.keV {
		b.mu[i] *= perMM
		b.photo[i] = t.metal.MuRhoOf(materials.Photoelectric, e)
		b.sum[i] = 0
	}
}

// add adds charge's share of a spectrum at kV.
func (b *bins) add(c Continuum, t *target, kV, anodeDeg, charge float64) {
	c.fill(t, kV, anodeDeg, b)
	for i := range b.sum {
		b.sum[i] += charge * b.gen[i] * b.out[i] * b.width[i]
	}
	b.wave = t.appendLines(b.wave[:0], kV, anodeDeg, b)
	for _, l := range b.wave {
		b.lines = append(b.lines, line{l.keV, l.perCM2 * charge})
	}
}

// spectrum merges bins and lines by energy.
func (b *bins) spectrum() Spectrum {
	slices.SortStableFunc(b.lines, func(x, y line) int {
		switch {
		case x.keV < y.keV:
			return -1
		case x.keV > y.keV:
			return 1
		}
		return 0
	})
	merged := b.lines[:0]
	for _, l := range b.lines {
		if n := len(merged); n > 0 && merged[n-1].keV == l.keV {
			merged[n-1].perCM2 += l.perCM2
		} else {
			merged = append(merged, l)
		}
	}
	b.lines = merged
	n := len(b.keV) + len(merged)
	all := make([]float64, 3*n)
	s := Spectrum{all[0:0:n], all[n : n : 2*n], all[2*n : 2*n]}
	j := 0
	for i, e := range b.keV {
		for ; j < len(merged) && merged[j].keV <= e; j++ {
			s.push(merged[j].keV, 0, merged[j].perCM2)
		}
		s.push(e, b.width[i], b.sum[i])
	}
	for ; j < len(merged); j++ {
		s.push(merged[j].keV, 0, merged[j].perCM2)
	}
	return s
}

func (s *Spectrum) push(keV, width, perCM2 float64) {
	s.KeV = append(s.KeV, keV)
	s.WidthKeV = append(s.WidthKeV, width)
	s.PerCM2 = append(s.PerCM2, perCM2)
}

// filter lets s pass the filters, in place.
func (s *Spectrum) filter(filters []layer) {
	if len(filters) == 0 {
		return
	}
	depth := make([]float64, 2*len(s.KeV))
	mu := depth[len(s.KeV):]
	depth = depth[:len(s.KeV)]
	for _, f := range filters {
		f.material.MuPerMMInto(mu, s.KeV)
		for i := range mu {
			depth[i] += mu[i] * f.mm
		}
	}
	for i, d := range depth {
		s.PerCM2[i] *= math.Exp(-d)
	}
}

// edgeCache holds the absorption edges of each material above the cut-off.
var edgeCache sync.Map // *materials.Material to []float64

func edgesOf(m *materials.Material) []float64 {
	if v, ok := edgeCache.Load(m); ok {
		return v.([]float64)
	}
	var out []float64
	for _, f := range m.Fractions() {
		e, err := materials.ElementByZ(f.Z)
		if err != nil {
			panic("beam: " + err.Error())
		}
		for _, edge := range append(e.LEdgesKeV[:], e.KEdgeKeV) {
			if edge > CutoffKeV {
				out = append(out, edge)
			}
		}
	}
	edgeCache.Store(m, out)
	return out
}
