package boundary

import (
	"math"

	"halfvalue/exposure/beam"
	"halfvalue/exposure/plan"
	"halfvalue/exposure/transport"
	"halfvalue/materials"
)

// quality is one of the spectra that walls are held against.
type quality int

const (
	ofBeam    quality = iota // useful beam; scatter too, which is softer: errs outward
	ofLeakage                // through housing or collimator: harder
	qualities
)

// leg is one straight piece of a wall, upright from the ground.
type leg struct {
	ax, ay, dx, dy float64 // start, and to its end
	nx, ny         float64 // unit normal
	heightM, mm    float64
	material       int // index of the shields' materials; -1 shields nothing
}

// mostMaterials of walls are told apart on one site; the rest shield nothing.
const mostMaterials = 8

// shields is every wall of the site with its broad-beam transmission.
type shields struct {
	legs     []leg
	barriers [mostMaterials][qualities]*barrier
	names    []string
	air      [qualities]*barrier // nil: air takes nothing off
	airScale float64             // mm of the catalogue's air for a metre of the site's
}

func newShields(s plan.Site, spectra [qualities]beam.Spectrum) (*shields, error) {
	sh := &shields{}
	least, most := map[string]float64{}, map[string]float64{}
	for _, w := range s.Walls {
		i := sh.materialOf(w)
		for k := range len(w.Points) - 1 {
			a, b := w.Points[k], w.Points[k+1]
			l := leg{ax: a.XM, ay: a.YM, dx: b.XM - a.XM, dy: b.YM - a.YM, heightM: w.HeightM, mm: w.MM, material: i}
			n := math.Hypot(l.dx, l.dy)
			l.nx, l.ny = -l.dy/n, l.dx/n
			sh.legs = append(sh.legs, l)
		}
		if i >= 0 {
			if v, ok := least[w.Material]; !ok || w.MM < v {
				least[w.Material] = w.MM
			}
			most[w.Material] = max(most[w.Material], w.MM)
		}
	}
	for i, name := range sh.names {
		m, err := materials.Lookup(name)
		if err != nil {
			return nil, err
		}
		for q := range qualities {
			if sh.barriers[i][q], err = newBarrier(m, least[name], 20*most[name], spectra[q]); err != nil {
				return nil, err
			}
		}
	}
	return sh, sh.setAir(s.AirKgPerM3, spectra)
}

func (sh *shields) setAir(kgPerM3 float64, spectra [qualities]beam.Spectrum) error {
	if kgPerM3 == 0 {
		return nil
	}
	m, err := materials.Lookup("air")
	if err != nil {
		return err
	}
	sh.airScale = 1000 * kgPerM3 / (1000 * m.DensityGPerCM3())
	for q := range qualities {
		if sh.air[q], err = newBarrier(m, 1000, 1e5, spectra[q]); err != nil {
			return err
		}
	}
	return nil
}

// materialOf gives the index of the wall's material, or -1.
func (sh *shields) materialOf(w plan.Wall) int {
	if w.Material == "" || w.MM == 0 {
		return -1
	}
	for i, n := range sh.names {
		if n == w.Material {
			return i
		}
	}
	if len(sh.names) == mostMaterials {
		return -1
	}
	sh.names = append(sh.names, w.Material)
	return len(sh.names) - 1
}

// hit tells where the ray from p along d (to its end at 1) passes the leg, and
// by how much its path in the wall is longer than the wall is thick.
func (l *leg) hit(p, d Vec) (at, oblique float64, ok bool) {
	cross := d.X*l.dy - d.Y*l.dx
	if cross == 0 {
		return 0, 0, false
	}
	ex, ey := l.ax-p.X, l.ay-p.Y
	at = (ex*l.dy - ey*l.dx) / cross
	if at <= 0 || at >= 1 {
		return 0, 0, false
	}
	u := (ex*d.Y - ey*d.X) / cross
	if u < 0 || u >= 1 || p.Z+at*d.Z >= l.heightM {
		return 0, 0, false
	}
	return at, d.length() / math.Abs(d.X*l.nx+d.Y*l.ny), true
}

// pass gives the share that comes from p to q through the walls, 1 where none
// is in the way. Walls of one material add up. Of several materials one is
// taken as it is and the others at their last, least slope, and of these
// figures the largest: beam hardened by one wall passes the next more easily.
func (sh *shields) pass(p, q Vec, quality quality) float64 {
	var mm [mostMaterials]float64
	if !sh.path(p, q, &mm) && sh.air[quality] == nil {
		return 1
	}
	return sh.through(&mm, q.distance(p)*sh.airScale, quality)
}

// passBoth is pass for beam and leakage.
func (sh *shields) passBoth(p, q Vec) (ofTheBeam, ofTheLeakage float64) {
	var mm [mostMaterials]float64
	if !sh.path(p, q, &mm) && sh.air[ofBeam] == nil {
		return 1, 1
	}
	air := q.distance(p) * sh.airScale
	return sh.through(&mm, air, ofBeam), sh.through(&mm, air, ofLeakage)
}

// path adds up the walls between p and q by material, mm along the ray.
func (sh *shields) path(p, q Vec, mm *[mostMaterials]float64) (any bool) {
	d := q.minus(p)
	for i := range sh.legs {
		l := &sh.legs[i]
		if l.material < 0 {
			continue
		}
		if _, oblique, ok := l.hit(p, d); ok {
			mm[l.material] += l.mm * oblique
			any = true
		}
	}
	return any
}

func (sh *shields) through(mm *[mostMaterials]float64, airMM float64, q quality) float64 {
	best, slopes, met := math.Inf(-1), 0.0, false
	each := func(b *barrier, mm float64) {
		if b == nil || mm == 0 {
			return
		}
		slope := b.lastSlope * mm
		best, slopes, met = max(best, b.ln(mm)-slope), slopes+slope, true
	}
	for i := range sh.names {
		each(sh.barriers[i][q], mm[i])
	}
	each(sh.air[q], airMM)
	if !met {
		return 1
	}
	return math.Exp(best + slopes)
}

// barrier is the broad-beam transmission of wallCredit of a thickness of one
// material for one spectrum as H*(10), straight in its logarithm between nodes: the curve sags, so that the
// chord errs outward.
type barrier struct {
	firstMM, lnStep float64
	mm, lnT         []float64
	lastSlope       float64 // d lnT/dmm behind the last node, never steeper than the truth
}

const barrierStep = 1.15

// wallCredit is the share of a wall's thickness that is counted: what our
// Monte Carlo lacks against the largest published broad-beam layers at high
// attenuation (Co-60 in concrete, 0.86), so that dose behind walls is nowhere
// under-predicted against them by more than 5 %. It covers loose concrete too.
const wallCredit = 0.85

func newBarrier(m *materials.Material, leastMM, mostMM float64, s beam.Spectrum) (*barrier, error) {
	mostMM = min(mostMM, 1e5)
	b := &barrier{firstMM: leastMM, lnStep: math.Log(barrierStep)}
	for mm := leastMM; len(b.mm) < 3 || b.mm[len(b.mm)-1] < mostMM; mm *= barrierStep {
		t := transport.BroadTransmission(m, wallCredit*min(mm, 1e5), s.KeV, s.PerCM2, ambientPerFluence)
		if !(t >= 0) {
			_, err := transport.Slab([]transport.Layer{{Material: m, MM: mm}}, s.KeV, s.PerCM2)
			return nil, err
		}
		b.mm, b.lnT = append(b.mm, mm), append(b.lnT, math.Log(max(1e-200, min(t, 1))))
		if t < 1e-150 {
			break
		}
	}
	for i := 1; i < len(b.lnT); i++ { // sampling noise must not let more wall pass more
		b.lnT[i] = min(b.lnT[i], b.lnT[i-1])
	}
	if n := len(b.mm); n > 1 {
		b.lastSlope = (b.lnT[n-1] - b.lnT[n-2]) / (b.mm[n-1] - b.mm[n-2])
	}
	return b, nil
}

func (b *barrier) ln(mm float64) float64 {
	if mm <= b.firstMM {
		return b.lnT[0] * mm / b.firstMM
	}
	n := len(b.mm)
	if mm >= b.mm[n-1] {
		return b.lnT[n-1] + b.lastSlope*(mm-b.mm[n-1])
	}
	i := min(int(math.Log(mm/b.firstMM)/b.lnStep), n-2)
	for i > 0 && b.mm[i] > mm {
		i--
	}
	return b.lnT[i] + (b.lnT[i+1]-b.lnT[i])*(mm-b.mm[i])/(b.mm[i+1]-b.mm[i])
}
