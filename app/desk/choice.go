package desk

import (
	"cmp"
	"fmt"
	"slices"

	"halfvalue/exposure/plan"
	"halfvalue/materials"
)

// Option is one way to answer a choice.
type Option struct {
	Value string // what the plan holds
	Title string // what people read
	Note  string // family, density, range
}

// Choice is one thing of the plan that is chosen from a list.
type Choice struct {
	Field   string
	Name    string
	Value   string
	Options []Option
	set     func(*plan.Plan, string)
}

// ChoicesOf lists every choice that a plan offers where it may name the given
// rule sets.
func ChoicesOf(p plan.Plan, rules []Option) []Choice { return choices(p, rules) }

// ChoiceOf finds the choice of a field.
func ChoiceOf(p plan.Plan, rules []Option, field string) (Choice, bool) {
	for _, c := range choices(p, rules) {
		if c.Field == field {
			return c, true
		}
	}
	return Choice{}, false
}

func choices(p plan.Plan, rules []Option) []Choice {
	out := sourceChoices(p)
	out = append(out, partChoices(p)...)
	out = append(out, setupChoices(p)...)
	out = append(out, detectorChoices(p)...)
	if len(rules) > 0 {
		all := append([]Option{{Value: "", Title: "No rules", Note: "no check is made"}}, rules...)
		out = append(out, Choice{"rules", "rules", p.Rules, all, func(p *plan.Plan, v string) { p.Rules = v }})
	}
	return out
}

func plainOptions(values ...string) []Option {
	out := make([]Option, len(values))
	for i, v := range values {
		out[i] = Option{Value: v, Title: v}
	}
	return out
}

func sourceChoices(p plan.Plan) []Choice {
	kind := Choice{"source", "source", "tube", []Option{{"tube", "X-ray tube", ""}, {"sealed", "Sealed source", ""}}, swapSource}
	if p.Source.Sealed != nil {
		kind.Value = "sealed"
	}
	out := []Choice{kind}
	if t := p.Source.Tube; t != nil {
		out = append(out,
			Choice{"source.tube.target", "target", or(t.Target, "W"), plainOptions(plan.Targets...), func(p *plan.Plan, v string) { p.Source.Tube.Target = v }},
			Choice{"source.tube.waveform", "waveform", or(t.Waveform, "constant"), plainOptions(plan.Waveforms...), func(p *plan.Plan, v string) { p.Source.Tube.Waveform = v }})
	}
	if s := p.Source.Sealed; s != nil {
		out = append(out,
			Choice{"source.sealed.nuclide", "nuclide", s.Nuclide, plainOptions(plan.Nuclides()...), func(p *plan.Plan, v string) { p.Source.Sealed.Nuclide = v }},
			Choice{"source.sealed.basis", "what the certificate gives", or(s.Basis, "output"), []Option{{"output", "Output activity", ""}, {"content", "Content activity", ""}}, func(p *plan.Plan, v string) { p.Source.Sealed.Basis = v }})
	}
	return out
}

func or(v, otherwise string) string {
	if v == "" {
		return otherwise
	}
	return v
}

// swapSource puts the other kind of source in with values that are valid for
// a start; each is on the sheet to be changed.
func swapSource(p *plan.Plan, v string) {
	switch {
	case v == "tube" && p.Source.Tube == nil:
		p.Source = plan.Source{Tube: &plan.Tube{KV: 200, MA: 5, FocusMM: 3, Filters: []plan.Filter{{Material: "Be", MM: 2.4}}}}
	case v == "sealed" && p.Source.Sealed == nil:
		p.Source = plan.Source{Sealed: &plan.Sealed{Nuclide: "Ir-192", ActivityGBq: 1110, Assayed: p.At, SizeMM: 3}}
	}
}

func partChoices(p plan.Plan) []Choice {
	options := materialOptions()
	var out []Choice
	for i, l := range p.Part.Layers {
		name := "material"
		if len(p.Part.Layers) > 1 {
			name = fmt.Sprintf("material of layer %d", i+1)
		}
		out = append(out, Choice{fmt.Sprintf("part.layers[%d].material", i), name, l.Material, options, func(p *plan.Plan, v string) { p.Part.Layers[i].Material = v }})
	}
	return out
}

// families is the order in which materials are offered: what is radiographed
// most stands first.
func families() []string {
	return []string{"steel", "cast-iron", "aluminium", "nickel", "copper", "titanium", "magnesium", "zirconium", "heavy", "plastic", "concrete", "mineral", "liquid", "gas"}
}

func materialOptions() []Option {
	all := materials.Catalogue()
	order := families()
	rank := func(m *materials.Material) int {
		if i := slices.Index(order, m.Family()); i >= 0 {
			return i
		}
		return len(order)
	}
	slices.SortStableFunc(all, func(a, b *materials.Material) int { return cmp.Compare(rank(a), rank(b)) })
	out := make([]Option, len(all))
	for i, m := range all {
		out[i] = Option{Value: m.Name(), Title: m.Title(), Note: m.Family()}
	}
	return out
}

func setupChoices(p plan.Plan) []Choice {
	out := []Choice{{"setup.kind", "setup", p.Setup.Kind, []Option{
		{"single-wall", "Single wall", ""}, {"double-wall-single-image", "Double wall, single image", ""},
		{"double-wall-double-image", "Double wall, double image", ""}, {"panoramic", "Panoramic", ""},
	}, func(p *plan.Plan, v string) {
		p.Setup.Kind = v
		if v != "double-wall-double-image" {
			p.Setup.Image = ""
		}
	}}}
	if p.Setup.Kind == "double-wall-double-image" {
		out = append(out, Choice{"setup.image", "image", or(p.Setup.Image, "elliptical"), plainOptions(plan.Images...), func(p *plan.Plan, v string) { p.Setup.Image = v }})
	}
	return out
}

func detectorChoices(p plan.Plan) []Choice {
	f := p.Detector.Film
	if f == nil {
		return nil
	}
	return []Choice{
		{"detector.film.class", "film class", f.Class, plainOptions(plan.Classes...), func(p *plan.Plan, v string) { p.Detector.Film.Class = v }},
		{"detector.film.screensMM", "lead screens", screensName(f.ScreensMM), screenOptions(f.ScreensMM), setScreens},
	}
}

// screenPairs are the usual lead screens, front and back, mm.
var screenPairs = [...][2]float64{{0.02, 0.02}, {0.027, 0.027}, {0.05, 0.05}, {0.1, 0.1}, {0.1, 0.15}, {0.15, 0.15}, {0.2, 0.2}}

// screenOptions are none, the usual pairs, and the plan's own pair.
func screenOptions(own *[2]float64) []Option {
	out := []Option{{Value: "none", Title: "No screens"}}
	pairs := screenPairs[:]
	if name := screensName(own); name != "none" && screensOf(name) == nil {
		pairs = append([][2]float64{*own}, pairs...)
	}
	for _, s := range pairs {
		out = append(out, Option{Value: screensName(&s), Title: fmt.Sprintf("Lead %g front, %g mm back", s[0], s[1])})
	}
	return out
}

func screensName(s *[2]float64) string {
	if s == nil || *s == [2]float64{} {
		return "none"
	}
	return fmt.Sprintf("%g+%g", s[0], s[1])
}

// setScreens leaves the plan's own pair where it is chosen again.
func setScreens(p *plan.Plan, v string) {
	if v != screensName(p.Detector.Film.ScreensMM) {
		p.Detector.Film.ScreensMM = screensOf(v)
	}
}

func screensOf(name string) *[2]float64 {
	for _, s := range screenPairs {
		if screensName(&s) == name {
			return &s
		}
	}
	return nil
}

// Title is what people read of the value that is chosen now.
func (c Choice) Title() string {
	for _, o := range c.Options {
		if o.Value == c.Value {
			return o.Title
		}
	}
	return c.Value
}
