package cells

import (
	"bytes"
	"compress/flate"
	"encoding/binary"
	"fmt"
	"io"
	"math"

	"halfvalue/exposure/transport/internal/photon"
)

// The packed form is a deflated sequence of cells in the order of Bases and
// Energies. A cell holds, for each plane: the relative error (a byte, 1/1000),
// and for each exit bin the fluence (two bytes, logarithmic, 0 for none) and
// the mean energy (a byte, the place in the bin). For each angular plane
// follow the photons forward and backward by angle and energy (a byte each,
// logarithmic below the largest of the side, which stands first in two bytes).

const (
	lnFloor = -75.0 // of a packed fluence
	lnRoof  = 7.0
	lnSteps = 65534
	sideLn  = 9.0 // range below the largest of a side
)

func packLn(v float64) uint16 {
	if !(v > 0) {
		return 0
	}
	q := (math.Log(v) - lnFloor) / (lnRoof - lnFloor)
	if q < 0 {
		return 0
	}
	return uint16(1 + math.Round(min(q, 1)*lnSteps))
}

func unpackLn(q uint16) float64 {
	if q == 0 {
		return 0
	}
	return math.Exp(lnFloor + float64(q-1)/lnSteps*(lnRoof-lnFloor))
}

// Pack writes the cells, which must be all, in order.
func Pack(all []Cell) ([]byte, error) {
	var raw bytes.Buffer
	for i := range all {
		packCell(&raw, &all[i])
	}
	var out bytes.Buffer
	w, err := flate.NewWriter(&out, flate.BestCompression)
	if err != nil {
		return nil, err
	}
	if _, err := w.Write(raw.Bytes()); err != nil {
		return nil, err
	}
	if err := w.Close(); err != nil {
		return nil, err
	}
	return out.Bytes(), nil
}

func packCell(b *bytes.Buffer, c *Cell) {
	put := func(q uint16) { b.Write(binary.BigEndian.AppendUint16(nil, q)) }
	for k := range c.Planes {
		b.WriteByte(byte(math.Ceil(min(0.255, c.RelErr[k]) * 1000)))
	}
	for k := range c.Planes {
		p := &c.Planes[k]
		for i, v := range p.Flux {
			put(packLn(v))
			b.WriteByte(placeInBin(i, v, p.FluxKeV[i]))
		}
	}
	for _, k := range AnglePlanes {
		packSide(b, put, &c.Planes[k].Forward)
		packSide(b, put, &c.Planes[k].Backward)
	}
}

func placeInBin(i int, v, e float64) byte {
	if !(v > 0) {
		return 0
	}
	lo, hi := photon.ExitEdgesKeV[i], photon.ExitEdgesKeV[i+1]
	return byte(math.Round(255 * max(0, min(1, (e/v-lo)/(hi-lo)))))
}

type side = [photon.AngleBins][photon.AngleExitBins]float64

func packSide(b *bytes.Buffer, put func(uint16), s *side) {
	var top float64
	for a := range s {
		for _, v := range s[a] {
			top = max(top, v)
		}
	}
	q := packLn(top)
	put(q)
	top = unpackLn(q)
	for a := range s {
		for _, v := range s[a] {
			b.WriteByte(packSmall(v, top))
		}
	}
}

func packSmall(v, top float64) byte {
	if !(v > 0) {
		return 0
	}
	f := math.Round(255 + math.Log(v/top)/sideLn*254)
	return byte(max(0, min(255, f)))
}

// Packed is a cell as the table gives it.
type Packed struct {
	RelErr []float64
	Flux   [][photon.ExitBins]float64 // by plane
	Mean   [][photon.ExitBins]float64 // keV
	// by angular plane
	Forward, Backward []side
}

// Unpack reads n cells.
func Unpack(data []byte, n int) ([]Packed, error) {
	raw, err := io.ReadAll(flate.NewReader(bytes.NewReader(data)))
	if err != nil {
		return nil, fmt.Errorf("scatter table: %w", err)
	}
	if len(raw) != n*cellBytes {
		return nil, fmt.Errorf("scatter table holds \"%d\" bytes, want %d for %d cells", len(raw), n*cellBytes, n)
	}
	all := make([]Packed, n)
	for i := range all {
		all[i] = unpackCell(raw[i*cellBytes:])
	}
	return all, nil
}

var cellBytes = len(PlanesMFP)*(1+3*photon.ExitBins) + len(AnglePlanes)*2*(2+photon.AngleBins*photon.AngleExitBins)

func unpackCell(b []byte) Packed {
	n := len(PlanesMFP)
	p := Packed{RelErr: make([]float64, n), Flux: make([][photon.ExitBins]float64, n), Mean: make([][photon.ExitBins]float64, n)}
	for k := range n {
		p.RelErr[k] = float64(b[k]) / 1000
	}
	b = b[n:]
	for k := range n {
		for i := range photon.ExitBins {
			lo, hi := photon.ExitEdgesKeV[i], photon.ExitEdgesKeV[i+1]
			p.Flux[k][i] = unpackLn(binary.BigEndian.Uint16(b))
			p.Mean[k][i] = lo + (hi-lo)*float64(b[2])/255
			b = b[3:]
		}
	}
	for range AnglePlanes {
		var s side
		b = unpackSide(b, &s)
		p.Forward = append(p.Forward, s)
		b = unpackSide(b, &s)
		p.Backward = append(p.Backward, s)
	}
	return p
}

func unpackSide(b []byte, s *side) []byte {
	top := unpackLn(binary.BigEndian.Uint16(b))
	b = b[2:]
	for a := range s {
		for i := range s[a] {
			s[a][i] = smallValues[b[0]] * top
			b = b[1:]
		}
	}
	return b
}

var smallValues = func() (v [256]float64) {
	for q := 1; q < 256; q++ {
		v[q] = math.Exp((float64(q) - 255) / 254 * sideLn)
	}
	return v
}()
