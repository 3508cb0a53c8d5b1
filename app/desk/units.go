package desk

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Units chooses what everything is shown in; what is typed with a unit is
// understood in either.
type Units string

// The two systems.
const (
	SI        Units = "SI"
	Customary Units = "customary"
)

// Kind is a kind of quantity; each is kept in one base unit.
type Kind int

// The kinds and their base units.
const (
	Plain     Kind = iota // a number
	Length                // mm, near the part
	Distance              // m, on the site
	Voltage               // kV
	Current               // mA
	Activity              // GBq
	Angle                 // deg
	Time                  // s
	DoseRate              // uSv/h
	Dose                  // uSv
	KermaRate             // mGy/min
	Energy                // keV
	PerHour               // 1/h
	Micron                // um
)

// unit is one way to write a kind: a figure in it times factor is the base.
type unit struct {
	name   string
	factor float64
}

// Exact by definition: 1 in = 25.4 mm, 1 ft = 0.3048 m, 1 Ci = 37 GBq,
// 1 rem = 10 mSv. 1 R is 2.58e-4 C/kg; with W/e = 33.97 J/C (common
// practice) that is 8.764 mGy of air kerma in dry air.
const (
	mmPerInch  = 25.4
	mPerFoot   = 0.3048
	gbqPerCi   = 37.0
	uSvPerMrem = 10.0
	mGyPerR    = 8.764
)

// shown lists the unit of each kind, SI then customary.
func shown(k Kind, u Units) unit {
	c := u == Customary
	pick := func(si, cu unit) unit {
		if c {
			return cu
		}
		return si
	}
	switch k {
	case Length:
		return pick(unit{"mm", 1}, unit{"in", mmPerInch})
	case Distance:
		return pick(unit{"m", 1}, unit{"ft", mPerFoot})
	case Activity:
		return pick(unit{"GBq", 1}, unit{"Ci", gbqPerCi})
	case DoseRate:
		return pick(unit{"µSv/h", 1}, unit{"mrem/h", uSvPerMrem})
	case Dose:
		return pick(unit{"µSv", 1}, unit{"mrem", uSvPerMrem})
	case KermaRate:
		return pick(unit{"mGy/min", 1}, unit{"R/min", mGyPerR})
	case Voltage:
		return unit{"kV", 1}
	case Current:
		return unit{"mA", 1}
	case Angle:
		return unit{"°", 1}
	case Time:
		return unit{"s", 1}
	case Energy:
		return unit{"keV", 1}
	case PerHour:
		return unit{"/h", 1}
	case Micron:
		return unit{"µm", 1}
	}
	return unit{"", 1}
}

// typed lists what may be typed after a figure of a kind, in lower case.
func typed(k Kind) map[string]float64 {
	switch k {
	case Length:
		return map[string]float64{"mm": 1, "cm": 10, "m": 1000, "in": mmPerInch, "\"": mmPerInch, "″": mmPerInch, "ft": 12 * mmPerInch, "'": 12 * mmPerInch, "mil": mmPerInch / 1000, "um": 0.001, "µm": 0.001}
	case Distance:
		return map[string]float64{"m": 1, "mm": 0.001, "cm": 0.01, "ft": mPerFoot, "'": mPerFoot, "in": mPerFoot / 12, "yd": 3 * mPerFoot}
	case Activity:
		return map[string]float64{"gbq": 1, "tbq": 1000, "mbq": 0.001, "ci": gbqPerCi, "mci": gbqPerCi / 1000, "kci": 1000 * gbqPerCi}
	case DoseRate:
		return map[string]float64{"usv/h": 1, "µsv/h": 1, "msv/h": 1000, "mrem/h": uSvPerMrem}
	case Dose:
		return map[string]float64{"usv": 1, "µsv": 1, "msv": 1000, "mrem": uSvPerMrem, "rem": 1000 * uSvPerMrem}
	case Voltage:
		return map[string]float64{"kv": 1}
	case Current:
		return map[string]float64{"ma": 1, "a": 1000}
	case Angle:
		return map[string]float64{"deg": 1, "°": 1}
	case Time:
		return map[string]float64{"s": 1, "sec": 1, "min": 60, "h": 3600}
	case PerHour:
		return map[string]float64{"/h": 1}
	case Micron:
		return map[string]float64{"um": 1, "µm": 1, "mm": 1000}
	}
	return map[string]float64{}
}

// TypedUnits lists the unit keys that a keypad offers for a kind, the shown
// system's first.
func TypedUnits(k Kind, u Units) []string {
	all := map[Kind][2][]string{
		Length:   {{"mm", "cm", "m", "in"}, {"in", "ft", "mm", "m"}},
		Distance: {{"m", "ft"}, {"ft", "m"}},
		Activity: {{"GBq", "TBq", "Ci"}, {"Ci", "mCi", "GBq"}},
		DoseRate: {{"µSv/h", "mrem/h"}, {"mrem/h", "µSv/h"}},
		Dose:     {{"µSv", "mrem"}, {"mrem", "µSv"}},
		Time:     {{"s", "min"}, {"s", "min"}},
	}
	pair, ok := all[k]
	if !ok {
		if n := shown(k, u).name; n != "" && k != PerHour {
			return []string{n}
		}
		return nil
	}
	if u == Customary {
		return pair[1]
	}
	return pair[0]
}

// In converts a base figure to the shown unit and names that unit.
func (u Units) In(k Kind, base float64) (float64, string) {
	s := shown(k, u)
	return base / s.factor, s.name
}

// Base converts a figure in the shown unit to the base unit.
func (u Units) Base(k Kind, figure float64) float64 { return figure * shown(k, u).factor }

// Format writes a base figure in the shown unit with the given number of
// significant digits, 1 to 6; trailing zeros behind the point are dropped.
func (u Units) Format(k Kind, base float64, digits int) string {
	v, name := u.In(k, base)
	return join(Significant(v, digits), name)
}

func join(figure, name string) string {
	if name == "" || name == "°" || name == "/h" {
		return figure + name
	}
	return figure + " " + name
}

// Significant writes v with the given significant digits, never in powers of
// ten; groups of three from five digits on.
func Significant(v float64, digits int) string {
	if v == 0 || math.IsNaN(v) || math.IsInf(v, 0) {
		return strconv.FormatFloat(v, 'f', -1, 64)
	}
	places := digits - 1 - int(math.Floor(math.Log10(math.Abs(v))))
	p := math.Pow10(places)
	r := math.Round(v*p) / p
	s := strconv.FormatFloat(r, 'f', max(0, places), 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return group(s)
}

// group sets a thin gap between groups of three digits where five or more
// stand before the point.
func group(s string) string {
	whole, rest, _ := strings.Cut(s, ".")
	sign := ""
	if strings.HasPrefix(whole, "-") {
		sign, whole = "-", whole[1:]
	}
	if len(whole) >= 5 {
		var b strings.Builder
		for i, r := range whole {
			if i > 0 && (len(whole)-i)%3 == 0 {
				b.WriteByte(' ')
			}
			b.WriteRune(r)
		}
		whole = b.String()
	}
	if rest != "" {
		whole += "." + rest
	}
	return sign + whole
}

// Outward writes a boundary distance in m or ft rounded up: to 0.1 below 10,
// to 1 below 1000, else to 10.
func (u Units) Outward(metres float64) string {
	v, name := u.In(Distance, metres)
	step := 0.1
	switch {
	case v >= 1000:
		step = 10
	case v >= 10:
		step = 1
	}
	n := math.Ceil(v/step - 1e-9)
	if step < 1 {
		return fmt.Sprintf("%.1f %s", n*step, name)
	}
	return group(strconv.FormatFloat(n*step, 'f', 0, 64)) + " " + name
}

// Clock writes a time in words of the trade: seconds with one decimal under
// ten, minutes and seconds, hours and minutes.
func Clock(seconds float64) string {
	switch {
	case math.IsNaN(seconds) || math.IsInf(seconds, 0) || seconds < 0:
		return "–"
	case seconds < 10:
		return strconv.FormatFloat(seconds, 'f', 1, 64) + " s"
	case seconds < 59.5:
		return strconv.FormatFloat(seconds, 'f', 0, 64) + " s"
	case seconds < 3599.5:
		s := int(math.Round(seconds))
		return fmt.Sprintf("%d min %02d s", s/60, s%60)
	}
	m := int(math.Round(seconds / 60))
	return fmt.Sprintf("%d h %02d min", m/60, m%60)
}

// Parse reads typed text as a figure of a kind: "820", "2 in", "0.5 Ci",
// "27,5 mm", "1 1/2 in". Without a unit the shown one is meant. The result is
// in the base unit.
func (u Units) Parse(k Kind, text string) (float64, error) {
	t := strings.TrimSpace(strings.ReplaceAll(text, ",", "."))
	cut := 0
	for cut < len(t) && strings.IndexByte("0123456789.+-/ eE", t[cut]) >= 0 {
		if t[cut] == '/' && (cut+1 >= len(t) || t[cut+1] < '0' || t[cut+1] > '9') {
			break
		}
		if (t[cut] == 'e' || t[cut] == 'E') && (cut == 0 || t[cut-1] < '0' || t[cut-1] > '9') {
			break
		}
		cut++
	}
	v, err := figure(strings.TrimSpace(t[:cut]))
	if err != nil {
		return 0, fmt.Errorf("%q is not a figure with a unit, for example %s", text, example(k, u))
	}
	name := strings.TrimSpace(t[cut:])
	if name == "" {
		return u.Base(k, v), nil
	}
	f, ok := typed(k)[strings.ToLower(name)]
	if !ok {
		return 0, fmt.Errorf("%q: the unit %q is not understood here; write for example %s", text, name, example(k, u))
	}
	return v * f, nil
}

func example(k Kind, u Units) string {
	if k == Activity {
		return "620 GBq or 16.8 Ci"
	}
	if k == Length {
		return "51 mm or 2 in"
	}
	return strings.TrimSpace("20 " + shown(k, u).name)
}

// figure reads "12.5", "1/2" and "1 1/2".
func figure(t string) (float64, error) {
	total := 0.0
	parts := strings.Fields(t)
	if len(parts) == 0 || len(parts) > 2 {
		return 0, fmt.Errorf("no figure")
	}
	for i, p := range parts {
		top, bottom, ratio := strings.Cut(p, "/")
		if len(parts) == 2 && i == 1 && !ratio {
			return 0, fmt.Errorf("two figures")
		}
		v, err := strconv.ParseFloat(top, 64)
		if err != nil {
			return 0, err
		}
		if ratio {
			d, err := strconv.ParseFloat(bottom, 64)
			if err != nil || d == 0 {
				return 0, fmt.Errorf("bad fraction")
			}
			v /= d
		}
		total += v
	}
	if math.IsNaN(total) || math.IsInf(total, 0) {
		return 0, fmt.Errorf("no figure")
	}
	return total, nil
}
