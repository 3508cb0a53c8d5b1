package boundary

import (
	"math"

	"halfvalue/exposure/plan"
)

// Site is everything that a Site sheet draws and prints: metres, the plan
// view's axes, bearings clockwise from north.
type Site struct {
	Title        string       `json:"title,omitzero"`
	Beam         plan.Beam    `json:"beam"`
	ConeDeg      float64      `json:"coneDeg"` // 360 all round
	LevelM       float64      `json:"levelM"`
	PartAt       Vec          `json:"partAt"`
	PartCredited bool         `json:"partCredited"` // every ray is proved to pass the part
	Spread       float64      `json:"spread"`       // of the output, as a share, in every rope
	Factor       float64      `json:"factor"`       // what readings multiply the field by
	OnShare      float64      `json:"onShare"`      // of an hour with the beam on
	Contours     []Contour    `json:"contours"`     // on the plan view's level, one a limit
	Traced       []Contour    `json:"traced"`       // with the part's credit: shown, never the rope
	Levels       []Contour    `json:"levels"`       // of the outermost limit above and below
	Table        []TableRow   `json:"table"`
	Walls        []plan.Wall  `json:"walls"`
	Container    *Vec         `json:"container,omitzero"`
	People       []PersonDose `json:"people"`
	Readings     []Verdict    `json:"readings"`
	Card         *Card        `json:"card,omitzero"`
	Cautions     []string     `json:"cautions"`
}

// TableRow is the ropes' distances on one bearing, rounded outward, in the
// order of Contours.
type TableRow struct {
	BearingDeg float64   `json:"bearingDeg"`
	Metres     []float64 `json:"metres"`
	Feet       []float64 `json:"feet"`
	Paces      []float64 `json:"paces"`
}

// Lengths of a foot, exact, and of a pace, short so that counted paces reach
// far enough: common practice.
const (
	MetresPerFoot = 0.3048
	MetresPerPace = 0.75
)

const (
	siteBearings  = 720
	levelBearings = 72
	levelStepM    = 3 // a floor of a rack
	tableStepDeg  = 15
)

// NewSite computes the whole Site sheet.
func NewSite(in Input) (Site, error) {
	predicted, err := NewField(in)
	if err != nil {
		return Site{}, err
	}
	f := predicted.Measured()
	s := Site{Title: in.Plan.Title, Beam: f.site.Beam, ConeDeg: 2 * in.halfCone(), LevelM: f.site.LevelM, PartAt: f.part, PartCredited: f.credited,
		Spread: in.spread(), Factor: f.factor, OnShare: in.onShare(true), Walls: f.site.Walls, Cautions: siteCautions()}
	s.Readings, _ = predicted.Judge()
	if c := f.site.Container; c != nil {
		s.Container = &Vec{c.XM, c.YM, f.focus.Z}
	}
	traced := *f
	traced.traced = true
	outermost := -1
	for i, l := range f.Levels() {
		s.Contours = append(s.Contours, f.Contour(l, siteBearings))
		s.Traced = append(s.Traced, traced.Contour(l, siteBearings))
		if outermost < 0 || s.Contours[i].WorstM > s.Contours[outermost].WorstM {
			outermost = i
		}
	}
	if outermost >= 0 {
		s.Levels = f.above(f.Levels()[outermost])
	}
	s.Table = table(s.Contours)
	for _, p := range f.site.People {
		s.People = append(s.People, f.Dose(p))
	}
	s.Card, err = newCard(in, f.factor)
	return s, err
}

// above gives a limit's contours a floor up and a floor down: racks shoot
// upward.
func (f *Field) above(l Level) []Contour {
	list := []Contour{f.AtLevel(f.site.LevelM+levelStepM).Contour(l, levelBearings)}
	if down := f.site.LevelM - levelStepM; down > 0 {
		list = append(list, f.AtLevel(down).Contour(l, levelBearings))
	}
	return list
}

// table gives for each step of bearing the farthest rope in the sector that
// it stands for, half a step to either side.
func table(contours []Contour) []TableRow {
	var rows []TableRow
	if len(contours) == 0 {
		return nil
	}
	for deg := 0.0; deg < 360; deg += tableStepDeg {
		row := TableRow{BearingDeg: deg}
		for _, c := range contours {
			m := c.sector(deg, tableStepDeg/2.0)
			row.Metres = append(row.Metres, RoundOutM(m))
			row.Feet = append(row.Feet, math.Ceil(m/MetresPerFoot-1e-9))
			row.Paces = append(row.Paces, math.Ceil(m/MetresPerPace-1e-9))
		}
		rows = append(rows, row)
	}
	return rows
}

// sector gives the farthest rope within half of deg.
func (c Contour) sector(deg, half float64) float64 {
	most := 0.0
	for i, b := range c.BearingsDeg {
		if off := math.Abs(math.Mod(b-deg+540, 360) - 180); off <= half+1e-9 {
			most = max(most, c.RopeMetres[i])
		}
	}
	return most
}

func siteCautions() []string {
	return []string{
		"Site radiation rules, the licence and the radiation safety officer or licensed supervisor govern.",
		"A calibrated survey meter decides where the barricade is safe; never approach on the tablet's word.",
		"Boundaries are rounded up, allowed times down; unknown shielding counts as none.",
		"Not known here: heels and edges of the beam, what stands on the site undrawn, leakage in one direction above the figure stated.",
	}
}
