package boundary

import "halfvalue/exposure/plan"

// Card is what a crew holds when a sealed source does not return: where the
// ropes go for a source bare without any shield, wherever on its way it is, and
// what it gives. It is made before the first shot and tells of no way to
// recover a source.
type Card struct {
	Nuclide     string      `json:"nuclide"`
	ActivityGBq float64     `json:"activityGBq"` // at the plan's time
	ActivityCi  float64     `json:"activityCi"`
	Ropes       []CardRope  `json:"ropes"`
	DistancesM  []float64   `json:"distancesM"`
	Minutes     []float64   `json:"minutes"`
	DoseUSv     [][]float64 `json:"doseUSv"` // by distance and minutes, output's uncertainty included
	RateUSvPerH []float64   `json:"uSvPerH"` // by distance, the same
	Calls       []plan.Call `json:"calls"`
	Text        []string    `json:"text"`
}

// CardRope is the unshielded distance of one limit.
type CardRope struct {
	Limit  string  `json:"limit"`
	Metres float64 `json:"metres"` // from the source, wherever it is; output's uncertainty included, rounded outward
}

// Distances and times of a card.
var (
	cardDistancesM = []float64{1, 2, 5, 10, 20}
	cardMinutes    = []float64{1, 5, 15, 30, 60}
)

// NewCard makes the card of a sealed source, nil for a tube: switching the
// power off ends its beam. Walls, collimator and part count as none; ground
// scatter is in.
func NewCard(in Input) (*Card, error) {
	factor, err := in.ropeFactor()
	if err != nil {
		return nil, err
	}
	return newCard(in, factor)
}

func newCard(in Input, factor float64) (*Card, error) {
	s := in.Plan.Source.Sealed
	if s == nil {
		return nil, nil
	}
	source := *s
	source.ConeDeg, source.Collimator = 360, nil
	site := in.Plan.Site
	site.Walls, site.Container, site.ShotsPerHour = nil, nil, 0
	bare := in
	bare.Plan.Source.Sealed, bare.Plan.Site = &source, site
	f, err := NewField(bare)
	if err != nil {
		return nil, err
	}
	f.factor = factor
	c := &Card{Nuclide: s.Nuclide, ActivityGBq: in.Strength, ActivityCi: in.Strength / plan.GBqPerCi,
		DistancesM: cardDistancesM, Minutes: cardMinutes, Calls: append([]plan.Call{}, site.Calls...), Text: cardText}
	spread := 1 + in.spread()
	worst := func(l Level) float64 {
		most := 0.0
		for deg := 0.0; deg < 360; deg += 5 {
			most = max(most, f.Distance(l, deg))
		}
		return most
	}
	for _, l := range f.Levels() {
		if l.averaged {
			continue
		}
		l.USvPerH /= spread
		c.Ropes = append(c.Ropes, CardRope{l.Name, RoundOutM(worst(l))})
	}
	for _, m := range cardDistancesM {
		rate := f.openAt1m / (m * m) * f.factor * spread
		row := make([]float64, len(cardMinutes))
		for i, minutes := range cardMinutes {
			row[i] = rate * minutes / 60
		}
		c.RateUSvPerH, c.DoseUSv = append(c.RateUSvPerH, rate), append(c.DoseUSv, row)
	}
	return c, nil
}

var cardText = []string{
	"Keep everybody behind these ropes, counted from the source wherever it is. Watch them without a break.",
	"Call the radiation safety officer. Recovery is for trained and licensed people under their own procedure.",
	"The figures are an aid: a calibrated survey meter decides where it is safe.",
}
