package materials

import (
	"bytes"
	_ "embed"
	"encoding/json"
	"fmt"
	"slices"
	"strings"
	"sync"
)

// catalogueJSON lists the materials of the trade; adding one is a row there.
//
//go:embed data/catalogue.json
var catalogueJSON []byte

// row is one material of the catalogue. Exactly one of Mass, Formula and Mix
// gives the composition.
type row struct {
	Name    string             `json:"name"`
	Title   string             `json:"title"`
	Family  string             `json:"family"`
	Density float64            `json:"density"`           // g/cm3
	Mass    map[string]float64 `json:"mass,omitempty"`    // mass fraction by element symbol
	Balance string             `json:"balance,omitempty"` // element that makes up the rest of Mass
	Formula string             `json:"formula,omitempty"`
	Mix     map[string]float64 `json:"mix,omitempty"` // mass by catalogue name of an earlier row
	Source  string             `json:"source"`
	Trust   string             `json:"confidence"`
}

// families are the values of Material.Family in the catalogue.
var families = []string{"steel", "cast-iron", "aluminium", "magnesium", "titanium", "copper", "nickel", "zirconium", "heavy", "concrete", "mineral", "liquid", "plastic", "gas"}

var catalogue = sync.OnceValue(func() map[string]*Material {
	list, err := parseCatalogue(catalogueJSON)
	if err != nil {
		panic(fmt.Sprintf("materials: data/catalogue.json: %v", err))
	}
	all := make(map[string]*Material, len(list)+MaxZ)
	for _, m := range list {
		all[m.name] = m
	}
	for _, r := range table()[1:] {
		all[r.Symbol] = element(r)
	}
	return all
})

func element(r *record) *Material {
	m, err := New(r.Symbol, r.DensityGPerCM3, []Fraction{{r.Z, 1}})
	if err != nil {
		panic("materials: data/elements.json: " + err.Error())
	}
	m.title, m.family = strings.ToUpper(r.Name[:1])+r.Name[1:], "element"
	m.source = "density: NIST, X-Ray Mass Attenuation Coefficients, table 1"
	m.confidence = "from memory, compared with xraylib"
	return m
}

func parseCatalogue(data []byte) ([]*Material, error) {
	var file struct {
		Note      string `json:"note"`
		Materials []row  `json:"materials"`
	}
	d := json.NewDecoder(bytes.NewReader(data))
	d.DisallowUnknownFields()
	if err := d.Decode(&file); err != nil {
		return nil, err
	}
	var list []*Material
	byName := map[string]*Material{}
	for _, r := range file.Materials {
		m, err := r.material(byName)
		if err != nil {
			return nil, err
		}
		if byName[r.Name] != nil {
			return nil, fmt.Errorf("%q stands twice", r.Name)
		}
		byName[r.Name] = m
		list = append(list, m)
	}
	slices.SortFunc(list, func(a, b *Material) int { return strings.Compare(a.name, b.name) })
	return list, nil
}

func (r row) material(earlier map[string]*Material) (*Material, error) {
	ways := 0
	for _, given := range []bool{len(r.Mass) > 0 || r.Balance != "", r.Formula != "", len(r.Mix) > 0} {
		if given {
			ways++
		}
	}
	switch {
	case ways != 1:
		return nil, fmt.Errorf("%q: want exactly one of mass, formula and mix", r.Name)
	case zBySymbol()[r.Name] != 0:
		return nil, fmt.Errorf("%q is an element's symbol, want another name", r.Name)
	case r.Title == "" || r.Source == "" || r.Trust == "":
		return nil, fmt.Errorf("%q: want a title, a source and a confidence", r.Name)
	case !slices.Contains(families, r.Family):
		return nil, fmt.Errorf("%q: unknown family %q, want one of %s", r.Name, r.Family, strings.Join(families, ", "))
	}
	m, err := r.composed(earlier)
	if err != nil {
		return nil, err
	}
	m.title, m.family, m.source, m.confidence = r.Title, r.Family, r.Source, r.Trust
	return m, nil
}

func (r row) composed(earlier map[string]*Material) (*Material, error) {
	if r.Formula != "" {
		return Compound(r.Name, r.Formula, r.Density)
	}
	if len(r.Mix) > 0 {
		var parts []Part
		for _, name := range sorted(r.Mix) {
			if earlier[name] == nil {
				return nil, fmt.Errorf("%q: part %q is no earlier row", r.Name, name)
			}
			parts = append(parts, Part{earlier[name], r.Mix[name]})
		}
		return Mixture(r.Name, r.Density, parts)
	}
	var f []Fraction
	rest := 1.0
	for _, symbol := range sorted(r.Mass) {
		e, err := ElementBySymbol(symbol)
		if err != nil {
			return nil, fmt.Errorf("%q: %w", r.Name, err)
		}
		f = append(f, Fraction{e.Z, r.Mass[symbol]})
		rest -= r.Mass[symbol]
	}
	if r.Balance != "" {
		e, err := ElementBySymbol(r.Balance)
		if err != nil {
			return nil, fmt.Errorf("%q: %w", r.Name, err)
		}
		f = append(f, Fraction{e.Z, rest})
	}
	return New(r.Name, r.Density, f)
}

func sorted(m map[string]float64) []string {
	keys := make([]string, 0, len(m))
	for k := range m {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	return keys
}

// Lookup gives a material by its catalogue name or element symbol, in exact
// letter case. The same name gives the same pointer each time.
func Lookup(name string) (*Material, error) {
	if m := catalogue()[name]; m != nil {
		return m, nil
	}
	return nil, fmt.Errorf("unknown material %q: want an element symbol such as \"Fe\" or a catalogue name%s", name, suggestion(name))
}

// Catalogue gives the materials of the catalogue sorted by name; the elements
// are not among them.
func Catalogue() []*Material {
	var list []*Material
	for _, m := range catalogue() {
		if m.family != "element" {
			list = append(list, m)
		}
	}
	slices.SortFunc(list, func(a, b *Material) int { return strings.Compare(a.name, b.name) })
	return list
}

// suggestion ends the message of a failed Lookup with the nearest name.
func suggestion(name string) string {
	best, least := "carbon-steel", len(name)/2+2
	for _, m := range Catalogue() {
		if d := distance(strings.ToLower(name), m.name); d < least {
			best, least = m.name, d
		}
	}
	return fmt.Sprintf(" such as %q", best)
}

// distance counts the letters to change, add or take away to get from a to b.
func distance(a, b string) int {
	if len(a) > 60 {
		return len(a)
	}
	d := make([]int, len(b)+1)
	for j := range d {
		d[j] = j
	}
	for i := range len(a) {
		diagonal := d[0]
		d[0] = i + 1
		for j := range len(b) {
			cost := diagonal
			if a[i] != b[j] {
				cost++
			}
			diagonal = d[j+1]
			d[j+1] = min(cost, d[j]+1, diagonal+1)
		}
	}
	return d[len(b)]
}
