package casefile_test

import (
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

var (
	dimPressure = quantity.Dim{1, -1, -2, 0, 0}
	dimFlow     = quantity.Dim{0, 3, -1, 0, 0}
	dimMassFlow = quantity.Dim{1, 0, -1, 0, 0}
)

// fluidVocabulary is a domain of pressures, invented for these tests: nodes that
// are all held, and a flow that may be one of volume or of mass.
func fluidVocabulary() []casefile.Vocabulary {
	node := casefile.Table{Name: "node", Fields: []casefile.Field{
		{Name: "held", Type: casefile.Wave, Dim: dimPressure, Kind: quantity.Level, Required: true},
		{Name: "flow", Type: casefile.Number, Dim: dimFlow, Also: []quantity.Dim{dimMassFlow}, HasMin: true, MinOpen: true},
		{Name: "limit", Type: casefile.Number, Dim: dimPressure, Kind: quantity.Absolute},
	}, Build: func(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
		id := b.Node(e.FullName(), e.Ref)
		c.BindNode(e.FullName(), id)
		in, wave := b.Hold(id, e.Ref), e.Wave("held")
		b.Resistance(e.FullName()+"/1", id, b.Node(e.FullName()+".1", e.Ref), e.Ref)
		return func(v casefile.Values, p *network.Params) error {
			p.Wave[in], p.G[len(p.G)-1] = v.Wave[wave], 1
			for i := range p.G {
				p.G[i] = 1
			}
			return nil
		}, nil
	}}
	return []casefile.Vocabulary{{
		Domain:   "fluid",
		Measures: casefile.Measures{Level: dimPressure, Flow: dimFlow, LevelWord: "pressure", FlowWord: "flow", StoreKey: "compliance", Sample: "2 bar"},
		Head: []casefile.Field{
			{Name: "pressures", Type: casefile.Word, Words: []string{"gauge", "absolute"}},
			{Name: "atmosphere", Type: casefile.Number, Dim: dimPressure, Kind: quantity.Absolute, HasMin: true, MinOpen: true},
		},
		Tables: []casefile.Table{node},
	}}
}

func readFluid(t *testing.T, text string, root *os.Root) (*casefile.Case, casefile.Values) {
	t.Helper()
	c, diags := casefile.Read("case.toml", []byte(text), root, fluidVocabulary()...)
	if casefile.Failed(diags) {
		t.Fatal(casefile.Listing(diags))
	}
	v, diags := c.Eval(nil)
	if casefile.Failed(diags) {
		t.Fatal(casefile.Listing(diags))
	}
	return c, v
}

// Levels of pressure are converted wherever they stand: in waveforms, in data
// files, in values that vary with a given one.
func TestPressuresEverywhere(t *testing.T) {
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, "day.csv"), []byte("t / s,p / bar(a)\n0,1.5\n10,2.5\n"), 0o644); err != nil {
		t.Fatal(err)
	}
	root, err := os.OpenRoot(dir)
	if err != nil {
		t.Fatal(err)
	}
	defer root.Close()
	c, v := readFluid(t, `
[given]
p = "3 bar(a)"
[fluid]
pressures  = "gauge"
atmosphere = "1 bar"
[fluid.node.a]
held  = { stairs = [["0 s", "1 bar"], ["1 s", "2 bar(a)"], ["2 s", "= p"]] }
limit = "3 bar(a)"
[fluid.node.b]
held = { file = "day.csv" }
[fluid.node.c]
held = { sine = { mean = "2 bar(a)", amplitude = "0.5 bar", period = "4 s" } }
`, root)
	wave := func(name string, t0 float64) float64 {
		e, _ := c.Element("node", name)
		return v.Wave[e.Wave("held")].At(t0)
	}
	for _, w := range []struct {
		name     string
		at, want float64
	}{{"a", 0, 1e5}, {"a", 1, 1e5}, {"a", 2, 2e5}, {"b", 0, 0.5e5}, {"b", 5, 1e5}, {"c", 0, 1e5}, {"c", 1, 1.5e5}} {
		if got := wave(w.name, w.at); math.Abs(got-w.want) > 1e-9*w.want {
			t.Errorf("%s at %v s is %v Pa, want %v", w.name, w.at, got, w.want)
		}
	}
	given := c.GivenValues()
	given[0].SI, given[0].Exact = 4e5, nil
	v, diags := c.Eval(given)
	if casefile.Failed(diags) {
		t.Fatal(casefile.Listing(diags))
	}
	if got := wave("a", 2); math.Abs(got-3e5) > 1e-4 {
		t.Errorf("with another given value %v Pa, want 3e5", got)
	}
	given[0].SI = -1e5
	if _, diags = c.Eval(given); !casefile.Failed(diags) {
		t.Error("a value varied below vacuum is accepted")
	}
	e, _ := c.Element("node", "a")
	if got := v.Num[e.Num("limit")]; got != 3e5 {
		t.Errorf("an absolute pressure is %v Pa, want 3e5 as it stands", got)
	}
	if p := c.Pressures; p.Absolute || p.Atmosphere != 1e5 || !p.Stated || c.Head("fluid") == nil || c.Head("thermal") != nil {
		t.Errorf("%+v", p)
	}
}

// A number may be of one of several dimensions, and keeps it.
func TestSeveralDimensions(t *testing.T) {
	text := "[given]\nq = \"2 L/min\"\n[fluid.node.a]\nheld = \"1 bar\"\nflow = \"%\"\n"
	for _, c := range []struct {
		flow string
		dim  quantity.Dim
		si   float64
	}{{"6 L/min", dimFlow, 1e-4}, {"2 kg/s", dimMassFlow, 2}, {"= q * 3", dimFlow, 1e-4}, {"= q * 1000 kg/m³", dimMassFlow, 1. / 30}} {
		cs, v := readFluid(t, strings.Replace(text, "%", c.flow, 1), nil)
		e, _ := cs.Element("node", "a")
		if got := v.Num[e.Num("flow")]; math.Abs(got-c.si) > 1e-12*c.si || e.DimOf("flow") != c.dim {
			t.Errorf("%s is %v of %v", c.flow, got, e.DimOf("flow"))
		}
	}
	for _, c := range []struct{ flow, want string }{
		{"5 W", "a volume flow (m³/s) or a mass flow (kg/s)"}, {"-2 kg/s", "must be positive"}, {"-2 L/s", "must be positive"},
	} {
		_, diags := casefile.Read("case.toml", []byte(strings.Replace(text, "%", c.flow, 1)), nil, fluidVocabulary()...)
		if got := casefile.Listing(diags); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.flow, c.want, got)
		}
	}
}
