package thermal

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/quantity"
)

// A published case is one whose answers are published, or follow from a law and were
// worked out again in 30-digit arithmetic.
type published struct {
	ID, Title, Source string
	Expect            []expectation
}

// An expectation is one answer. Want is the exact value for the inputs as the
// case has them. Published is the number in print, which Within (half a unit of
// its last digit, or what Why says) allows to differ from Want.
type expectation struct {
	What, Of, At, Level, Quantity string
	Mode                          int
	Want, Published, Within, Why  string
	Status                        string
}

const dir = "../testdata/thermal"

// Every published case, through the whole way from its text.
func TestPublished(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(dir, "checks.json"))
	if err != nil {
		t.Fatal(err)
	}
	var checks []published
	if err := json.Unmarshal(text, &checks); err != nil {
		t.Fatal(err)
	}
	for _, c := range checks {
		t.Run(c.ID, func(t *testing.T) {
			text, err := os.ReadFile(filepath.Join(dir, c.ID+".toml"))
			if err != nil {
				t.Fatal(err)
			}
			m := read(t, c.ID+".toml", string(text))
			for _, e := range c.Expect {
				got := m.answer(e)
				compare(t, c, e, got)
			}
		})
	}
}

// answer finds one answer, in SI.
func (m *model) answer(e expectation) float64 {
	m.t.Helper()
	switch e.What {
	case "level", "flow":
		name := e.Of
		if e.What == "flow" {
			name = "flow of " + e.Of
		}
		at := si(m.t, e.At)
		return m.respond(at, name).At(0, at)
	case "final":
		v, ok := m.respond(1, e.Of).Final(0)
		if !ok {
			m.t.Fatalf("%s: %s has no final value", m.c.File, e.Of)
		}
		return v
	case "reach":
		until := 10 * si(m.t, e.Want)
		root, ok := m.respond(until, e.Of).First(0, si(m.t, e.Level), 0, until)
		if !ok {
			m.t.Fatalf("%s: %s never reaches %s", m.c.File, e.Of, e.Level)
		}
		return root.T
	case "time constant":
		return -1 / m.poles()[e.Mode-1]
	case "derived":
		return m.derived(e.Of).SI
	}
	m.t.Fatalf("%s: cannot answer %q", m.c.File, e.What)
	return 0
}

// compare holds an answer against the exact value to 1e-9, levels in kelvin, and
// against the number in print.
func compare(t *testing.T, c published, e expectation, got float64) {
	t.Helper()
	name := strings.Join(strings.Fields(e.What+" of "+e.Of+" "+e.Quantity), " ")
	if want := si(t, e.Want); !(math.Abs(got-want) <= 1e-9*math.Abs(want)) {
		t.Errorf("%s: %s is %.12g, want %.12g (%s)", c.ID, name, got, want, c.Source)
	}
	if e.Published == "" {
		return
	}
	if want, within := si(t, e.Published), si(t, e.Within); !(math.Abs(got-want) <= within*(1+1e-6)+1e-12*math.Abs(want)) {
		t.Errorf("%s: %s is %.6g, printed %s within %s (%s): %s", c.ID, name, got, e.Published, e.Within, e.Why, c.Source)
	}
}

func si(t *testing.T, text string) float64 {
	t.Helper()
	v, err := quantity.Parse(text)
	if err != nil {
		t.Fatalf("%q: %v", text, err)
	}
	return v.SI
}
