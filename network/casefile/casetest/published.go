package casetest

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A check is a case whose answers are published, or follow from a law and were
// worked out again in arithmetic of 30 digits or more. Its case is ID.toml.
type check struct {
	ID, Title, Source string
	Expect            []expectation
}

// An expectation is one answer. Want is the exact value for the inputs as the case
// has them. Published is the number in print, which Within (half a unit of its last
// digit, or what Why says) allows to differ from Want. Marched says how near, as a share
// of Want, the answer of a case that is not linear comes, "" for one that is. Mode counts time constants or
// swings from 1, slowest first. Quantity is the letter that the source gives it.
type expectation struct {
	What, Of, At, Until, Level, Quantity  string
	Mode                                  int
	Want, Published, Within, Marched, Why string
	Status                                string
}

// Published runs every check of a folder, DIR/checks.json, the whole way from the
// text of its case, each as a test of its own.
func Published(t *testing.T, dir string, words ...casefile.Vocabulary) {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(dir, "checks.json"))
	if err != nil {
		t.Fatal(err)
	}
	var checks []check
	if err := json.Unmarshal(text, &checks); err != nil {
		t.Fatal(err)
	}
	if len(checks) == 0 {
		t.Fatalf("%s: no checks", dir)
	}
	for _, c := range checks {
		t.Run(c.ID, func(t *testing.T) {
			name := c.ID + ".toml"
			text, err := os.ReadFile(filepath.Join(dir, name))
			if err != nil {
				t.Fatal(err)
			}
			m := Read(t, name, string(text), words...)
			for _, e := range c.Expect {
				c.compare(t, e, m.answer(e))
			}
		})
	}
}

// answer finds one answer, in SI.
func (m *Model) answer(e expectation) float64 {
	m.t.Helper()
	if e.Mode > 0 {
		return m.mode(e)
	}
	switch e.What {
	case "level", "flow", "shown":
		name := e.Of
		if e.What == "flow" {
			name = "flow of " + e.Of
		}
		at := si(m.t, e.At)
		return m.Run(at, name).At(0, at)
	case "steady":
		return m.At(m.Operate(si(m.t, e.At)), e.Of)[0]
	case "final":
		return Final(m.t, m.Run(1, e.Of), 0)
	case "derived":
		return m.Derived(e.Of).SI
	}
	return m.extent(e)
}

// mode answers what is read from one pole or pair.
func (m *Model) mode(e expectation) float64 {
	m.t.Helper()
	lags, swings := m.TimeConstants(), m.Swings()
	switch {
	case e.What == "time constant" && e.Mode <= len(lags):
		return lags[e.Mode-1]
	case e.What == "time constant" || e.Mode > len(swings):
		m.t.Fatalf("%s: %s %d of %d time constants and %d swings", m.Case.File, e.What, e.Mode, len(lags), len(swings))
	}
	p := swings[e.Mode-1]
	switch e.What {
	case "natural frequency":
		return NaturalFrequency(p)
	case "damping":
		return Damping(p)
	case "period":
		return period(p)
	}
	m.t.Fatalf("%s: cannot answer %q", m.Case.File, e.What)
	return 0
}

// extent answers when or how high.
func (m *Model) extent(e expectation) float64 {
	m.t.Helper()
	until := 10 * si(m.t, e.Want)
	if e.Until != "" {
		until = si(m.t, e.Until)
	}
	r := m.Run(until, e.Of)
	switch e.What {
	case "peak":
		return r.Max(0, 0, until).Y
	case "peak time":
		return r.Max(0, 0, until).T
	case "reach":
		if root, ok := r.First(0, si(m.t, e.Level), 0, until); ok {
			return root.T
		}
	case "settle":
		if root, ok := r.LastOutside(0, Final(m.t, r, 0), si(m.t, e.Level), 0, until); ok {
			return root.T
		}
	}
	m.t.Fatalf("%s: cannot answer %q of %s", m.Case.File, e.What, e.Of)
	return 0
}

// exactly is how near an answer must come to the exact value, levels in kelvin: wants
// are written with 15 digits or more, and some are small differences of levels.
const exactly = 1e-9

// compare holds an answer against the exact value and against the number in print.
func (c check) compare(t *testing.T, e expectation, got float64) {
	t.Helper()
	name := strings.Join(strings.Fields(e.What+" of "+e.Of+" "+e.Quantity), " ")
	near := exactly
	if e.Marched != "" {
		near = si(t, e.Marched)
	}
	if want := si(t, e.Want); !(math.Abs(got-want) <= near*math.Abs(want)) {
		t.Errorf("%s: %s is %.12g, want %.12g (%s)", c.ID, name, got, want, c.Source)
	}
	if e.Published == "" {
		return
	}
	const written = 1e-6 // of Within, which is written with 12 digits
	want, within := si(t, e.Published), si(t, e.Within)
	if !(math.Abs(got-want) <= within*(1+written)+1e-12*math.Abs(want)) {
		t.Errorf("%s: %s is %.6g, printed %s within %s (%s): %s", c.ID, name, got, e.Published, e.Within, e.Why, c.Source)
	}
}

func si(t testing.TB, text string) float64 {
	t.Helper()
	v, err := quantity.Parse(text)
	if err != nil {
		t.Fatalf("%q: %v", text, err)
	}
	return v.SI
}
