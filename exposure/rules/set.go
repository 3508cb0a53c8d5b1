package rules

import (
	"fmt"
	"maps"
	"slices"
	"strings"
	"sync"

	"github.com/go-json-experiment/json"

	"halfvalue/exposure/rules/data"
	"halfvalue/exposure/working"
)

// Set is the rules of one document and class.
type Set struct {
	Name  string // "iso17636-1:2013/B"
	Title string
	Note  string
	Rows  []Row
}

// Row is one rule: where it stands, how far it is to be trusted, when it
// applies, and exactly one rule object with its figures.
type Row struct {
	ID         string `json:"id"`    // rows of one ID are alternatives by For
	Title      string `json:"title"` // "least f"
	Text       string `json:"text"`  // what it asks, in our own words
	Clause     string `json:"clause"`
	Confidence string `json:"confidence"`        // one of Confidences
	Guidance   bool   `json:"guidance,omitzero"` // a recommendation: never a fail
	For        Scope  `json:"for,omitzero"`

	MinF      *MinF      `json:"minF,omitempty"`
	MaxUg     *MaxUg     `json:"maxUg,omitempty"`
	Density   *Window    `json:"density,omitempty"`
	Spread    *Window    `json:"spread,omitempty"`
	Rise      *Rise      `json:"rise,omitempty"`
	Travel    *Travel    `json:"travel,omitempty"`
	Nuclides  *Nuclides  `json:"nuclides,omitempty"`
	MaxKV     *MaxKV     `json:"maxKV,omitempty"`
	FilmClass *FilmClass `json:"filmClass,omitempty"`
	Screens   *Screens   `json:"screens,omitempty"`
	Wires     *Wires     `json:"wires,omitempty"`
	Plaque    *Plaque    `json:"plaque,omitempty"`
	SmallPipe *SmallPipe `json:"smallPipe,omitempty"`
	TwoWalls  *TwoWalls  `json:"twoWalls,omitempty"`
	SNR       *SNR       `json:"snr,omitempty"`
	Recorder  *Recorder  `json:"recorder,omitempty"`
	Cone      *Cone      `json:"cone,omitempty"`

	Document string `json:"-"` // "ISO 17636-1:2013"
	From     string `json:"-"` // name of a company's file; "" for ours
}

// Confidences are the marks that a row can carry, and what they mean.
var Confidences = map[string]string{
	"seen":            "read in a retrieved text",
	"high":            "from memory, high confidence",
	"medium":          "from memory, medium confidence",
	"low":             "from memory, low confidence: guidance only",
	"derived":         "derived from another figure of the document",
	"exact":           "exact geometry",
	"common practice": "common practice of the trade",
	"company":         "a company's own figure",
}

// judgement is what a rule finds.
type judgement struct {
	verdict      Verdict
	value, limit float64
	unit         string
	text         string
	formula      string // what value is held against limit, for the working
	inputs       []working.Input
}

// with adds what an auditor needs to follow the figure.
func (j judgement) with(formula string, inputs ...working.Input) judgement {
	j.formula, j.inputs = formula, inputs
	return j
}

func in(symbol, name string, value float64, unit string) working.Input {
	return working.Input{Symbol: symbol, Name: name, Value: value, Unit: unit}
}

// rule is the figures of a row.
type rule interface {
	judge(Facts) judgement
	figures() string    // in a cell of a page
	valid() error       // figures in order: positive, rising, no gaps
	knobs(Facts) []knob // what may be changed to make it hold
	applies(Facts) bool // beyond the row's scope
}

// rule gives the one rule object of a row.
func (r Row) rule() (rule, error) {
	var found []rule
	for _, c := range []struct {
		is bool
		r  rule
	}{
		{r.MinF != nil, r.MinF}, {r.MaxUg != nil, r.MaxUg}, {r.Density != nil, densityRule{r.Density}}, {r.Spread != nil, spreadRule{r.Spread}},
		{r.Rise != nil, r.Rise}, {r.Travel != nil, r.Travel}, {r.Nuclides != nil, r.Nuclides}, {r.MaxKV != nil, r.MaxKV},
		{r.FilmClass != nil, r.FilmClass}, {r.Screens != nil, r.Screens}, {r.Wires != nil, r.Wires}, {r.Plaque != nil, r.Plaque},
		{r.SmallPipe != nil, r.SmallPipe}, {r.TwoWalls != nil, r.TwoWalls}, {r.SNR != nil, r.SNR}, {r.Recorder != nil, r.Recorder}, {r.Cone != nil, r.Cone},
	} {
		if c.is {
			found = append(found, c.r)
		}
	}
	if len(found) != 1 {
		return nil, fmt.Errorf("row %q has %d rule objects: want exactly one", r.ID, len(found))
	}
	return found[0], nil
}

// Scope is when a row applies; what is empty does not matter.
type Scope struct {
	Source   string   `json:"source,omitzero"`    // tube or sealed
	Kinds    []string `json:"kinds,omitempty"`    // setups
	Images   []string `json:"images,omitempty"`   // with double-wall-double-image
	Families []string `json:"families,omitempty"` // of material
	Detector []string `json:"detector,omitempty"` // film, plate, panel
}

// covers tells whether the scope takes the facts, materials aside.
func (s Scope) covers(f Facts) bool {
	source := "tube"
	if f.Nuclide != "" {
		source = "sealed"
	}
	return (s.Source == "" || s.Source == source) &&
		(len(s.Kinds) == 0 || slices.Contains(s.Kinds, f.Setup.Kind)) &&
		(len(s.Images) == 0 || slices.Contains(s.Images, f.Setup.Image)) &&
		(len(s.Detector) == 0 || slices.Contains(s.Detector, f.Detector))
}

func (s Scope) coversFamily(f Facts) bool {
	return len(s.Families) == 0 || slices.Contains(s.Families, f.Family)
}

// Table is rule sets by name: ours, or ours with a company's over them. It is
// not changed once made, and safe for concurrent use.
type Table struct{ sets map[string]Set }

// file is a document of rule sets.
type file struct {
	Document string `json:"document"` // "ISO 17636-1:2013"
	Note     string `json:"note"`
	Sets     []struct {
		Name  string `json:"name"`
		Title string `json:"title"`
		Base  string `json:"base,omitzero"` // set whose rows it starts from
		Rows  []Row  `json:"rows"`
	} `json:"sets"`
}

// Ours gives the sets that come with the program.
func Ours() *Table { return ours() }

var ours = sync.OnceValue(func() *Table {
	t := &Table{map[string]Set{}}
	files := data.Files()
	for _, name := range slices.Sorted(maps.Keys(files)) {
		var err error
		if t, err = t.read(files[name], ""); err != nil {
			panic(fmt.Sprintf("rules: data/%s: %v", name, err))
		}
	}
	return t
})

// Over gives a table in which a company's file lies over t. A set of the same
// name keeps the rows whose IDs the file does not name; a set of a new name
// starts from its base, if it has one. The file is refused as a whole when
// anything in it is unknown, missing or out of order. name is shown in every
// check that used a row of it.
func (t *Table) Over(name string, data []byte) (*Table, error) {
	if strings.TrimSpace(name) == "" {
		return nil, fmt.Errorf("rule file: name %q is blank: want the file's name, it is shown with every check", name)
	}
	over, err := t.read(data, name)
	if err != nil {
		return nil, fmt.Errorf("rule file %q: %w", name, err)
	}
	return over, nil
}

// Set gives the set of that name.
func (t *Table) Set(name string) (Set, error) {
	s, ok := t.sets[name]
	if !ok {
		return Set{}, fmt.Errorf("rule set %q is unknown: want one of %s", name, strings.Join(t.Names(), ", "))
	}
	return s, nil
}

// Names gives the names of all sets, sorted.
func (t *Table) Names() []string { return slices.Sorted(maps.Keys(t.sets)) }

// read lays a file over t.
func (t *Table) read(b []byte, from string) (*Table, error) {
	var f file
	if err := json.Unmarshal(b, &f, json.RejectUnknownMembers(true)); err != nil {
		return nil, fmt.Errorf("does not decode: %w", err)
	}
	if f.Document == "" || f.Note == "" || len(f.Sets) == 0 {
		return nil, fmt.Errorf("wants a document, a note and at least one set")
	}
	next := &Table{maps.Clone(t.sets)}
	for _, s := range f.Sets {
		set, old := next.sets[s.Name]
		if !old && s.Base != "" {
			base, err := next.Set(s.Base)
			if err != nil {
				return nil, fmt.Errorf("set %q: base: %w", s.Name, err)
			}
			set.Rows = base.Rows
		}
		if s.Name == "" || s.Title == "" && !old || len(s.Rows) == 0 && s.Base == "" {
			return nil, fmt.Errorf("set %q wants a name, a title and rows", s.Name)
		}
		if s.Title != "" {
			set.Title = s.Title
		}
		set.Name, set.Note = s.Name, f.Note
		rows, err := replaced(set.Rows, s.Rows, f.Document, from)
		if err != nil {
			return nil, fmt.Errorf("set %q: %w", s.Name, err)
		}
		set.Rows = rows
		next.sets[s.Name] = set
	}
	return next, nil
}

// replaced puts the new rows in the place of the old ones of their ID, the
// others behind.
func replaced(old, rows []Row, document, from string) ([]Row, error) {
	byID := map[string][]Row{}
	var order []string
	for _, r := range rows {
		if err := r.check(); err != nil {
			return nil, err
		}
		r.Document, r.From = document, from
		if byID[r.ID] == nil {
			order = append(order, r.ID)
		}
		byID[r.ID] = append(byID[r.ID], r)
	}
	var all []Row
	for _, r := range old {
		if byID[r.ID] == nil {
			all = append(all, r)
			continue
		}
		if i := slices.Index(order, r.ID); i >= 0 {
			all = append(all, byID[r.ID]...)
			order = slices.Delete(order, i, i+1)
		}
	}
	for _, id := range order {
		all = append(all, byID[id]...)
	}
	return all, nil
}

// check refuses a row that lacks something or whose figures are out of order.
func (r Row) check() error {
	switch {
	case r.ID == "" || r.Title == "" || r.Text == "" || r.Clause == "":
		return fmt.Errorf("row %q wants an id, a title, a text and a clause", r.ID)
	case Confidences[r.Confidence] == "":
		return fmt.Errorf("row %q: confidence %q is unknown: want one of %s", r.ID, r.Confidence, strings.Join(slices.Sorted(maps.Keys(Confidences)), ", "))
	case r.For.Source != "" && r.For.Source != "tube" && r.For.Source != "sealed":
		return fmt.Errorf("row %q: source %q is unknown: want tube or sealed", r.ID, r.For.Source)
	}
	for _, group := range []struct {
		given []string
		known []string
		what  string
	}{{r.For.Kinds, kinds, "setup"}, {r.For.Images, images, "image"}, {r.For.Families, families, "family"}, {r.For.Detector, recorders, "detector"}} {
		for _, name := range group.given {
			if !slices.Contains(group.known, name) {
				return fmt.Errorf("row %q: %s %q is unknown: want one of %s", r.ID, group.what, name, strings.Join(group.known, ", "))
			}
		}
	}
	rule, err := r.rule()
	if err != nil {
		return err
	}
	if err := rule.valid(); err != nil {
		return fmt.Errorf("row %q: %w", r.ID, err)
	}
	return nil
}
