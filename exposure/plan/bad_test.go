package plan

import (
	"bytes"
	"encoding/json"
	"errors"
	"os"
	"slices"
	"strings"
	"testing"
)

const badPlansFile = "../../testdata/badplans.json"

// badPlans is the table of broken plans: a text, or a good base in which Old
// is replaced by New, and what a crew is told.
type badPlans struct {
	Source     string            `json:"source"`
	Confidence string            `json:"confidence"`
	Bases      map[string]string `json:"bases"`
	Rows       []badPlan         `json:"rows"`
}

type badPlan struct {
	Name    string   `json:"name"`
	Base    string   `json:"base,omitempty"`
	Old     string   `json:"old,omitempty"`
	New     string   `json:"new,omitempty"`
	Text    *string  `json:"text,omitempty"`
	Field   string   `json:"field"`
	Message []string `json:"message"` // a line for each fault
	Exit    int      `json:"exit"`
}

func (b badPlan) plan(t *testing.T, bases map[string]string) []byte {
	if b.Text != nil {
		return []byte(*b.Text)
	}
	base := bases[b.Base]
	if !strings.Contains(base, b.Old) || b.Old == "" {
		t.Fatalf("%s: %q is not in base %q", b.Name, b.Old, b.Base)
	}
	return []byte(strings.Replace(base, b.Old, b.New, 1))
}

func TestBadPlans(t *testing.T) {
	data, err := os.ReadFile(badPlansFile)
	if err != nil {
		t.Fatal(err)
	}
	var file badPlans
	d := json.NewDecoder(bytes.NewReader(data))
	d.DisallowUnknownFields()
	if err := d.Decode(&file); err != nil {
		t.Fatal(err)
	}
	for name, base := range file.Bases {
		if _, err := Decode([]byte(base)); err != nil {
			t.Fatalf("base %s: %v", name, err)
		}
	}
	if len(file.Rows) < 80 {
		t.Errorf("%d broken plans, want 80 or more", len(file.Rows))
	}
	for i := range file.Rows {
		row := &file.Rows[i]
		p, err := Decode(row.plan(t, file.Bases))
		if err == nil {
			t.Errorf("%s: accepted as %+v", row.Name, p)
			continue
		}
		if (p.Plan != 0) || len(p.Part.Layers) != 0 {
			t.Errorf("%s: something of a refused plan comes back", row.Name)
		}
		var first *FieldError
		var exit interface{ ExitCode() int }
		if !errors.As(err, &first) || !errors.As(err, &exit) {
			t.Fatalf("%s: %T is no fault of a field", row.Name, err)
		}
		lines := strings.Split(err.Error(), "\n")
		if *update {
			row.Field, row.Message, row.Exit = first.Field, lines, exit.ExitCode()
			continue
		}
		if first.Field != row.Field || !slices.Equal(lines, row.Message) || exit.ExitCode() != row.Exit {
			t.Errorf("%s: field %q, exit %d\n%s\nwant field %q, exit %d\n%s", row.Name, first.Field, exit.ExitCode(), err, row.Field, row.Exit, strings.Join(row.Message, "\n"))
		}
		if first.Problem == "" || first.Mend == "" {
			t.Errorf("%s: %q says no problem or no mend", row.Name, err)
		}
	}
	if *update {
		writeBadPlans(t, file)
	}
}

func writeBadPlans(t *testing.T, file badPlans) {
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", " ")
	if err := e.Encode(file); err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(badPlansFile, b.Bytes(), 0o644); err != nil {
		t.Fatal(err)
	}
}
