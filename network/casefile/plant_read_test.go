package casefile_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// wholePlant uses most forms that parts with laws of their own need. All data invented.
const wholePlant = `title = "A plant"
[given]
turns = "1450 rpm"
depth = "1.5 m"
[air]
altitude = "500 m"
[hydraulic]
density   = "870 kg/m³"
viscosity = { value = "46 cSt", source = "invented" }
[material.oil]
density      = { points = [["20 °C", "870 kg/m³"], ["60 °C", "= 870 kg/m³ * 0.97"]], source = "drawn" }
conductivity = [["20 °C", "0.13 W/(m·K)"]]
[hydraulic.node.basin]
tank  = { points = [["0 m", "4 m²"], ["= depth", "5 m²"]], overflow = { crest = "2 m", width = "0.5 m" } }
start = { level = "= depth" }
[hydraulic.node.well]
tank  = { area = "1 m²", overflow = "3 m" }
start = "0.2 bar"
[hydraulic.node.sump]
held = { level = { sine = { mean = "0.5 m", amplitude = "0.1 m", period = "10 s" } } }
[hydraulic.gate.sv1]
between        = ["basin", "sump"]
kv             = "16 m³/h"
characteristic = [["0 %", 0], ["50 %", "20 %"], [1, 1]]
opening        = { step = { from = 1, to = "20 %", at = "2 s" } }
[hydraulic.gate.sv2]
between        = ["well", "basin"]
cv             = 18
characteristic = "equal percentage"
[hydraulic.pump.p1]
from       = "sump"
to         = "well"
head       = { flow = ["0 m³/h", "10 m³/h"], head = ["20 m", "15 m"], efficiency = [["20 °C", 0.7]] }
speed      = "= turns"
non_return = true
span       = ["1 bar", "2 bar"]
slip       = { flow = "1 L/min", at = "20 bar" }
lumps      = { accuracy = "1 %", up_to = "20 Hz" }
on_off     = { of = "basin", on_below = "1.2 m" }
[hydraulic.line.main]
between    = ["basin", "well"]
resistance = "1 GPa·s/m³"
[hydraulic.source.rain]
into  = "basin"
drive = "1 L/s"
[run]
to = "60 s"
[print]
level    = "mm"
heat     = "kW"
speed    = "rpm"
velocity = "ft/s"
[[transfer]]
from  = "opening of sv1"
to    = "level of basin"
about = "start"
[[transfer]]
from  = "speed of p1"
to    = "flow of main at well"
about = "2 s"
[[table]]
show  = ["level of basin", "flow of p1", "flow of p1 at well", "velocity of sv1", "flow of sump", "basin - sump", "flow of rain"]
every = "10 s"
[limit.full]
of         = ["level of basin", "level of well"]
stay_below = "1.9 m"
margin     = "5 cm"
[limit.quiet]
of     = "velocity of sv2"
settle = "1 m/s"
within = "5 s"
`

func readPlant(t testing.TB, text string) *casefile.Case {
	t.Helper()
	c, diags := casefile.Read("case.toml", []byte(text), nil, plantVocabulary()...)
	if c == nil || diags != nil {
		t.Fatalf("the case is not good:\n%s", casefile.Listing(diags))
	}
	return c
}

func part(t *testing.T, c *casefile.Case, name string) *casefile.Element {
	t.Helper()
	e, ok := c.Part(name)
	if !ok {
		t.Fatalf("no part %q", name)
	}
	return e
}

// What stands in the place of a value is found under its path, and told from the value.
func TestInsteadOfAValue(t *testing.T) {
	c := readPlant(t, wholePlant)
	v, _ := c.Eval(nil)
	basin, well, sump := part(t, c, "basin"), part(t, c, "well"), part(t, c, "sump")
	for _, x := range []struct {
		e     *casefile.Element
		path  string
		plain bool
	}{{basin, "start", false}, {well, "start", true}, {sump, "held", false}, {basin, "tank.overflow", false}, {well, "tank.overflow", true},
		{part(t, c, "p1"), "slip", false}, {part(t, c, "p1"), "lumps", false}, {part(t, c, "sv1"), "characteristic", false}, {part(t, c, "sv2"), "characteristic", true}} {
		if !x.e.Has(x.path) || x.e.Plain(x.path) != x.plain {
			t.Errorf("%s of %s: stated %v, plain %v", x.path, x.e.Name, x.e.Has(x.path), x.e.Plain(x.path))
		}
	}
	oil, _ := c.Element("material", "oil")
	for _, x := range []struct {
		e    *casefile.Element
		path string
		want float64
	}{{basin, "start.level", 1.5}, {basin, "tank.overflow.crest", 2}, {basin, "tank.points[1].first", 1.5}, {well, "tank.overflow", 3}, {well, "start", 2e4},
		{oil, "density.points[1].first", 333.15}, {oil, "density.points[1].second", 870 * 0.97}, {oil, "conductivity.points[0].second", 0.13},
		{part(t, c, "p1"), "head.flow[1]", 10. / 3600}, {part(t, c, "p1"), "head.head[0]", 20}, {part(t, c, "p1"), "head.efficiency.points[0].second", 0.7},
		{part(t, c, "p1"), "span[1]", 2e5}, {part(t, c, "p1"), "slip.at", 2e6}, {part(t, c, "p1"), "lumps.up_to", 20}, {part(t, c, "p1"), "on_off.on_below", 1.2},
		{part(t, c, "sv1"), "characteristic.points[1].second", 0.2}, {c.Head("air"), "altitude", 500}} {
		if got := v.Num[x.e.Num(x.path)]; got != x.want {
			t.Errorf("%s of %s is %v, want %v", x.path, x.e.Name, got, x.want)
		}
	}
	if w := v.Wave[sump.Wave("held.level")]; w.At(2.5) != 0.5 && w.At(0) == w.At(2.5) {
		t.Errorf("the level held is %v at 0 s and %v at 2.5 s", w.At(0), w.At(2.5))
	}
	if oil.SourceOf("density") != "drawn" || c.Head("hydraulic").SourceOf("viscosity") != "invented" {
		t.Error("a source beside points or in a head is lost")
	}
	if p1 := part(t, c, "p1"); !p1.Flag("non_return") || well.Flag("tank") || p1.Len("head.flow") != 2 || oil.Len("density.points") != 2 {
		t.Error("flags or lengths are wrong")
	}
	if part(t, c, "sv1").Word("characteristic") != "" || part(t, c, "sv2").Word("characteristic") != "equal percentage" {
		t.Error("a word is told from points")
	}
	if d := part(t, c, "p1").DimOf("on_off.on_below"); d != dimLength {
		t.Errorf("a level in metres has the dimension %v", d)
	}
	if kept := c.Kept(plantDensity); kept != "870 kg/m³" {
		t.Errorf("kept is %v", kept)
	}
}

// What is asked for by a word is handed on with the part's name in full, and what the
// part registered is found under it.
func TestReadings(t *testing.T) {
	c := readPlant(t, wholePlant)
	for _, s := range c.Questions.Tables[0].Show {
		if s.Node != "" {
			continue
		}
		out, ok := c.Showing(s.Part, s.Word)
		if !ok || out.Name != s.Text {
			t.Errorf("%q is %q of %q: found %v, %q", s.Text, s.Word, s.Part, ok, out.Name)
		}
	}
	level := c.Questions.Tables[0].Show[0]
	if level.Word != "level" || level.Part != "basin" || level.Dim != dimLength || level.Kind != quantity.Level {
		t.Errorf("%+v", level)
	}
	if f := c.Questions.Tables[0].Show[1]; f.Part != "p1" || f.Word != "flow" || f.Dim != dimFlow || f.Kind != quantity.Plain {
		t.Errorf("%+v", f)
	}
	flows := map[[2]string]network.FlowTerm{
		{"p1", "flow"}:            {Kind: network.PortFlow, Element: 4, Sign: -1},
		{"p1", "flow at well"}:    {Kind: network.PortFlow, Element: 4, Port: 1, Sign: 1},
		{"p1", "flow at sump"}:    {Kind: network.PortFlow, Element: 4, Sign: -1},
		{"sv2", "flow"}:           {Kind: network.PortFlow, Element: 3, Sign: -1},
		{"main", "flow"}:          {Sign: 1},
		{"main", "flow at basin"}: {Sign: 1},
		{"main", "flow at well"}:  {Resistance: 1, Sign: 1},
		{"sump", "flow"}:          {Kind: network.SupplyFlow, Node: 2, Sign: 1},
		{"rain", "flow"}:          {Kind: network.SourceFlow, Input: 1, Sign: 1},
	}
	for key, want := range flows {
		out, ok := c.Showing(key[0], key[1])
		if !ok || out.Flow == nil || *out.Flow != want {
			t.Errorf("%q of %q is %+v, want %+v", key[1], key[0], out.Flow, want)
		}
	}
	for _, key := range [][2]string{{"main", "level"}, {"main", "flow at sump"}, {"basin", "flow"}, {"nobody", "flow"}, {"sump", "level"}} {
		if _, ok := c.Showing(key[0], key[1]); ok {
			t.Errorf("%q of %q is shown", key[1], key[0])
		}
	}
}

// A drive is found under its word and the part's name.
func TestDrives(t *testing.T) {
	c := readPlant(t, wholePlant)
	q := c.Questions.Transfers
	if q[0].From != "opening of sv1" || q[0].HasAbout || q[1].From != "speed of p1" || !q[1].HasAbout || q[1].To.Word != "flow at well" {
		t.Errorf("%+v", q)
	}
	for name, want := range map[string]network.ElementID{"opening of sv1": 2, "speed of p1": 4} {
		if id, k, ok := c.Drive(name); !ok || id != want || k != 0 {
			t.Errorf("%s is drive %d of element %d, %v", name, k, id, ok)
		}
	}
	if dim, kind, ok := c.DriveDim("speed of p1"); !ok || dim != dimRate || kind != quantity.Plain {
		t.Errorf("the speed of a pump has the dimension %v", dim)
	}
	if _, _, ok := c.Drive("opening of sv2"); ok {
		t.Error("a gate that states no opening has one")
	}
}

// Numbers that go up as written are checked again where given values move them.
func TestRisingAgain(t *testing.T) {
	c := readPlant(t, wholePlant)
	given := c.GivenValues()
	i, _ := c.GivenIndex("depth")
	given[i], _ = quantity.Parse("-1 m")
	_, diags := c.Eval(given)
	if len(diags) != 1 || diags[0].Code != "order" || !strings.Contains(diags[0].Text, "these numbers go up") {
		t.Errorf("a table of areas that turns back: %v", diags)
	}
}

// A warning that only values show is given once, and again where given values change it.
func TestWarnedOnce(t *testing.T) {
	words := plantVocabulary()
	words[1].Check = func(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
		well, _ := c.Element("hydraulic.node", "well")
		p1, _ := c.Element("hydraulic.pump", "p1")
		d := well.Fault("", "turns "+quantity.Number(v.Wave[p1.Wave("speed")].At(0), 4), "", "")
		d.Severity = casefile.Warning
		return []casefile.Diagnostic{d}
	}
	c, diags := casefile.Read("case.toml", []byte(wholePlant), nil, words...)
	if len(diags) != 1 || diags[0].Text != "turns 24.17" {
		t.Fatalf("%v", diags)
	}
	if _, diags := c.Eval(nil); diags != nil {
		t.Errorf("said again: %v", diags)
	}
	given := c.GivenValues()
	i, _ := c.GivenIndex("turns")
	given[i], _ = quantity.Parse("60 rpm")
	if _, diags := c.Eval(given); len(diags) != 1 || diags[0].Text != "turns 1" {
		t.Errorf("of another speed: %v", diags)
	}
}

// Points are the same in either form, whatever their numbers and units, and a curve that
// does not go up is refused at the first point that turns back.
func TestPointsInEitherForm(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(1, 8).Draw(rt, "points")
		var pairs []string
		var want [][2]float64
		turned := -1
		for i := range n {
			at := rapid.IntRange(-50, 300).Draw(rt, "temperature")
			rho := rapid.Float64Range(1e-3, 1e5).Draw(rt, "density")
			pair := fmt.Sprintf("[\"%d °C\", \"%.17g kg/m³\"]", at, rho)
			if rapid.Bool().Draw(rt, "kelvin") {
				pair = fmt.Sprintf("[\"%d.15 K\", \"%.17g g/L\"]", at+273, rho)
			}
			pairs, want = append(pairs, pair), append(want, [2]float64{float64(at) + 273.15, rho})
			if i > 0 && turned < 0 && want[i][0] <= want[i-1][0] {
				turned = i
			}
		}
		list := "[" + strings.Join(pairs, ", ") + "]"
		for _, value := range []string{list, "{ points = " + list + " }"} {
			c, diags := casefile.Read("case.toml", []byte(pond+"[material.m]\ndensity = "+value+"\n"), nil, plantVocabulary()...)
			if turned >= 0 {
				if len(diags) != 1 || diags[0].Code != "order" {
					rt.Fatalf("%s turns back at point %d: %v", value, turned, diags)
				}
				continue
			}
			if c == nil {
				rt.Fatalf("%s is refused: %v", value, diags)
			}
			v, _ := c.Eval(nil)
			m, _ := c.Element("material", "m")
			for i, p := range want {
				path := fmt.Sprintf("density.points[%d].", i)
				x, y := v.Num[m.Num(path+"first")], v.Num[m.Num(path+"second")]
				if math.Abs(x-p[0]) > 1e-12*p[0] || math.Abs(y-p[1]) > 1e-15*p[1] {
					rt.Fatalf("point %d of %s is %v, %v", i, value, x, y)
				}
			}
		}
	})
}
