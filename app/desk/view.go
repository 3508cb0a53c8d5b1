package desk

import "encoding/json"

// settings is what is kept of how the app is shown and where the user was.
type settings struct {
	Units  Units    `json:"units"`
	Light  Light    `json:"light"`
	Text   int      `json:"text"`
	Gloves bool     `json:"gloves"`
	Sheet  Sheet    `json:"sheet"`
	People []string `json:"people,omitempty"`
}

func (d *Desk) openSettings() {
	data, err := d.platform.Settings()
	if err != nil || data == nil {
		return
	}
	var s settings
	if json.Unmarshal(data, &s) != nil {
		return
	}
	d.setUnits(s.Units)
	d.setLight(s.Light)
	d.setText(s.Text)
	d.goTo(s.Sheet)
	d.state.Gloves = s.Gloves
	if len(s.People) > 0 {
		d.state.People = s.People
	}
}

func (d *Desk) saveSettings() {
	s := &d.state
	data, err := json.Marshal(settings{s.Units, s.Light, s.Text, s.Gloves, s.Sheet, s.People})
	if err == nil {
		err = d.platform.SaveSettings(data)
	}
	if err != nil {
		s.SaveErr = "the settings are not kept on disk: " + err.Error()
	}
}

// applyView does what changes only what is shown, and the book.
func (d *Desk) applyView(in Intent) {
	switch in := in.(type) {
	case GoTo:
		d.goTo(in.Sheet)
	case Show:
		d.show(in.Panel)
		return
	case Close:
		d.close()
		return
	case SetUnits:
		d.setUnits(in.To)
	case SetLight:
		d.setLight(in.To)
	case SetText:
		d.setText(in.Percent)
	case SetGloves:
		d.state.Gloves = in.On
	case Trace:
		d.traceMore(in.Points)
		return
	case Dismiss:
		d.state.Refusal, d.state.Notice = nil, ""
		return
	default:
		d.applyBook(in)
		return
	}
	d.saveSettings()
}

func (d *Desk) goTo(s Sheet) {
	for _, known := range Sheets() {
		if s == known && s != d.state.Sheet {
			d.state.Sheet, d.state.Panel = s, Panel{}
		}
	}
	if d.state.Sheet == BookSheet {
		d.readPage()
	}
}

func (d *Desk) show(p Panel) {
	d.state.Panel = p
	d.state.Refusal = nil
	if p.Kind == LogPanel && d.event == "" {
		d.newEvent()
	}
	d.closeGone()
	d.retrace()
}

// close closes the innermost thing that is open.
func (d *Desk) close() {
	switch {
	case d.state.Refusal != nil:
		d.state.Refusal = nil
	case d.state.Panel.Kind != NoPanel:
		d.state.Panel = Panel{}
		d.retrace()
	case d.state.Book.Open != nil:
		d.state.Book.Open, d.state.Book.Again = nil, nil
	}
}

func (d *Desk) setUnits(u Units) {
	if u == SI || u == Customary {
		d.state.Units = u
	}
}

func (d *Desk) setLight(l Light) {
	for _, known := range Lights() {
		if l == known {
			d.state.Light = l
		}
	}
}

func (d *Desk) setText(percent int) {
	if percent >= 100 && percent <= 200 {
		d.state.Text = percent
	}
}
