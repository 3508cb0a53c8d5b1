package sheet

import (
	"fmt"
	"strings"

	"halfvalue/app/desk"
	"halfvalue/exposure/plan"
)

// shotCells are the cells of the Shot sheet's title block, the answer first.
func (u *UI) shotCells(stamps bool) []cell {
	out := []cell{u.timeCell(), u.ropeCell()}
	if stamps {
		for i := range u.s.Answer.Checks {
			out = append(out, cell{check: &u.s.Answer.Checks[i], span: 2})
		}
	}
	out = append(out, u.chargeCell())
	out = append(out, u.dialCell("detector.film.density", "detector.plate.snrN", "detector.panel.snrN")...)
	out = append(out, u.sourceCells()...)
	out = append(out, u.partCells()...)
	out = append(out, u.densityCells()...)
	out = append(out, u.choiceCell(1, "detector.film.class", "detector.film.screensMM")...)
	out = append(out, u.setupCells()...)
	out = append(out, u.siteCells()...)
	out = append(out, u.beamCells()...)
	return append(out, u.choiceCell(1, "source", "source.tube.target", "source.tube.waveform", "source.sealed.basis")...)
}

func (u *UI) timeCell() cell {
	c := cell{caption: "Exposure time", big: true, span: 2, panel: desk.Panel{Kind: desk.WorkingPanel}}
	if u.s.Fault != "" {
		c.value, c.note, c.big, c.panel = "no answer", u.s.Fault, false, desk.Panel{}
		return c
	}
	e := u.s.Answer.Exposure
	c.value = desk.Clock(e.Seconds)
	if e.SecondsHigh > 0 {
		c.note = "spread " + desk.Clock(e.SecondsLow) + " to " + desk.Clock(e.SecondsHigh)
	}
	return c
}

// ropeCell is the outermost boundary of all limits, in both units, with the
// limit that decides.
func (u *UI) ropeCell() cell {
	c := cell{caption: "Barricade at least", rope: true, span: 2, panel: desk.Panel{Kind: desk.WorkingPanel, Field: "boundary"}}
	w, ok := u.s.Answer.Worst()
	if !ok {
		c.value, c.note, c.panel = "no limit set", "without a limit there is no boundary", desk.Panel{}
		return c
	}
	first, second := desk.SI, desk.Customary
	if u.s.Units == desk.Customary {
		first, second = second, first
	}
	c.value, c.big = first.Outward(w.Metres), true
	c.note = second.Outward(w.Metres) + "; " + directionWord(w.Direction) + ", " + u.limitText(w.Limit) + "; a calibrated survey meter decides"
	if w.Within {
		c.value = "within " + c.value
	}
	return c
}

func directionWord(d string) string {
	switch d {
	case "open":
		return "open beam"
	case "through":
		return "beam through the part"
	case "leakage":
		return "leakage of the housing"
	case "scatter":
		return "scattered radiation"
	case "transit":
		return "source in its guide tube"
	}
	return d
}

// limitText is a limit's name with its figure in both units.
func (u *UI) limitText(name string) string {
	for _, l := range u.s.Plan.Site.Limits {
		if l.Name == name {
			return name + " " + limitFigure(l)
		}
	}
	return name
}

func limitFigure(l plan.Limit) string {
	if l.RateUSvPerH > 0 {
		return both(desk.DoseRate, l.RateUSvPerH)
	}
	return both(desk.Dose, l.DoseUSv) + " per " + l.Per
}

// both writes a figure in SI and customary units.
func both(k desk.Kind, v float64) string {
	return desk.SI.Format(k, v, 3) + " (" + desk.Customary.Format(k, v, 3) + ")"
}

func (u *UI) chargeCell() cell {
	e := u.s.Answer.Exposure
	c := cell{caption: "Charge", value: "–", span: 1}
	if e.GBqMin > 0 {
		c.caption = "Activity x time"
		c.value = desk.Significant(e.GBqMin, 3) + " GBq min"
		c.note = desk.Significant(e.GBqMin/plan.GBqPerCi, 3) + " Ci min"
	} else if e.MAMin > 0 {
		c.value = desk.Significant(e.MAMin, 3) + " mA min"
	}
	return c
}

// dialCell makes cells for those of the fields that the plan has.
func (u *UI) dialCell(fields ...string) []cell {
	var out []cell
	for _, f := range fields {
		q, ok := u.known.quantities[f]
		if !ok {
			continue
		}
		caption := capital(q.Name)
		if q.Symbol != "" && len(q.Symbol) <= 4 && q.Symbol != q.Name {
			caption = q.Symbol + " " + q.Name
		}
		out = append(out, cell{caption: caption, value: q.Text(u.s.Units), span: 1, panel: desk.Panel{Kind: desk.DialPanel, Field: f},
			label: "Dial " + q.Label() + ", " + q.Text(u.s.Units)})
	}
	return out
}

// choiceCell makes a cell for a choice of the plan.
func (u *UI) choiceCell(span int, fields ...string) []cell {
	var out []cell
	for _, f := range fields {
		c, ok := u.known.choices[f]
		if !ok {
			continue
		}
		out = append(out, cell{caption: capital(c.Name), value: c.Title(), span: span, panel: desk.Panel{Kind: desk.ChoicePanel, Field: f}, label: "Choose " + c.Name + ", " + c.Title()})
	}
	return out
}

func (u *UI) sourceCells() []cell {
	if s := u.s.Filled.Source.Sealed; s != nil {
		out := []cell{{caption: s.Nuclide + " at the time of the shot", value: bothActivity(u.s.Answer.ActivityGBq),
			note: "assayed " + s.Assayed.Format("2006-01-02") + ": " + bothActivity(s.ActivityGBq), span: 2,
			panel: desk.Panel{Kind: desk.DialPanel, Field: "source.sealed.activityGBq"}, label: "Dial A activity when assayed, " + bothActivity(s.ActivityGBq)}}
		out = append(out, u.timeOfShot())
		out = append(out, u.choiceCell(1, "source.sealed.nuclide")...)
		out = append(out, u.dialCell("source.sealed.sizeMM")...)
		for i := range s.Collimator {
			out = append(out, u.dialCell(fmt.Sprintf("source.sealed.collimator[%d].mm", i))...)
		}
		return out
	}
	out := u.dialCell("source.tube.kv", "source.tube.ma", "source.tube.focusMM")
	if t := u.s.Filled.Source.Tube; t != nil {
		for i := range t.Filters {
			out = append(out, u.dialCell(fmt.Sprintf("source.tube.filters[%d].mm", i))...)
		}
	}
	return out
}

func bothActivity(gbq float64) string {
	return desk.SI.Format(desk.Activity, gbq, 4) + " / " + desk.Customary.Format(desk.Activity, gbq, 3)
}

// partCells are the layers as the section shows them, for sheets that have no
// room for it.
func (u *UI) partCells() []cell {
	var out []cell
	for i := range u.s.Plan.Part.Layers {
		out = append(out, u.dialCell(fmt.Sprintf("part.layers[%d].mm", i))...)
		out = append(out, u.choiceCell(1, fmt.Sprintf("part.layers[%d].material", i))...)
	}
	return append(out, u.dialCell("part.odMM", "part.wallMM")...)
}

// timeOfShot is the plan's time, to which a sealed source is decayed; touched
// it becomes now.
func (u *UI) timeOfShot() cell {
	at := u.s.Plan.At.Format("2006-01-02 15:04") + " UTC"
	return cell{caption: "Time of the shot", value: at, note: "touch for now", span: 2, do: desk.AtNow{}, label: "Time of the shot, " + at + ", set to now"}
}

// densityCells are the densities at each section when there are several.
func (u *UI) densityCells() []cell {
	if len(u.s.Answer.Density) < 2 {
		return nil
	}
	var lines []string
	for _, d := range u.s.Answer.Density {
		lines = append(lines, fmt.Sprintf("%s, %s: %s", d.At, u.s.Units.Format(desk.Length, d.ThicknessMM, 3), desk.Significant(d.Density, 3)))
	}
	return []cell{{caption: "Density at each section", value: strings.Join(lines, "\n"), span: 2}}
}

func (u *UI) setupCells() []cell {
	out := u.choiceCell(2, "setup.kind", "setup.image", "rules")
	if u.s.Answer.Unsharpness > 0 {
		out = append(out, cell{caption: "Unsharpness Ug", value: u.s.Units.Format(desk.Length, u.s.Answer.Unsharpness, 3), span: 1})
	}
	return out
}

func (u *UI) siteCells() []cell {
	var out []cell
	for i, l := range u.s.Plan.Site.Limits {
		f := fmt.Sprintf("site.limits[%d].rateUSvPerH", i)
		if l.RateUSvPerH == 0 {
			f = fmt.Sprintf("site.limits[%d].doseUSv", i)
		}
		out = append(out, cell{caption: "Limit: " + l.Name, value: limitFigure(l), span: 2, panel: desk.Panel{Kind: desk.DialPanel, Field: f}, label: "Dial limit " + l.Name + ", " + limitFigure(l)})
	}
	return append(out, u.dialCell("site.shotsPerHour")...)
}

func (u *UI) beamCells() []cell {
	a := u.s.Answer.Beam
	out := []cell{}
	if a.MeanKeV > 0 {
		out = append(out, cell{caption: "Beam, mean energy", value: u.s.Units.Format(desk.Energy, a.MeanKeV, 3), span: 1},
			cell{caption: "Air kerma at 1 m", value: u.s.Units.Format(desk.KermaRate, a.KermaRateMGyPerMinAt1m, 3), span: 1})
	}
	title := u.s.Plan.Title
	if title == "" {
		title = "untitled"
	}
	note := "sheet Shot"
	if u.s.Demo {
		note += ", demo job"
	}
	return append(out, cell{caption: "Title", value: title, note: note, span: 2})
}

// capital writes a caption with a capital.
func capital(s string) string {
	if s == "" {
		return s
	}
	return strings.ToUpper(s[:1]) + s[1:]
}
