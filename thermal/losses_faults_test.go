package thermal

import (
	"strings"
	"testing"
)

// What is wrong with a part that is not linear, in the words a user reads.
func TestFaultsOfRealParts(t *testing.T) {
	base := `
[thermal.node.air]
held = "20 °C"
[thermal.node.body]
capacitance = "10 J/K"
[thermal.node.hot_out]
capacitance = "10 J/K"
[thermal.node.cold_in]
held = "10 °C"
[thermal.node.cold_out]
[thermal.resistance.r]
between = ["body", "air"]
value   = "1 K/W"
[thermal.stream.hot]
path          = ["air", "hot_out"]
capacity_rate = "5 W/K"
[thermal.stream.cold]
path          = ["cold_in", "cold_out"]
capacity_rate = "9 W/K"
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`
	part := func(text string) string { return "[thermal.resistance.x]\nbetween = [\"body\", \"air\"]\n" + text }
	radiation := func(text string) string { return part("radiation = { " + text + " }") }
	source := func(text string) string { return "[thermal.source.x]\ninto = \"body\"\n" + text }
	heater := func(text string) string { return "[thermal.heater.x]\ninto = \"body\"\nwatch = \"body\"\n" + text }
	exchanger := func(text string) string {
		return "[thermal.exchanger.x]\nstreams = [\"hot\", \"cold\"]\nconductance = \"3 W/K\"\n" + text
	}
	melts := func(text string) string {
		return "[material.wax]\nspecific_heat = \"2 kJ/(kg·K)\"\n[thermal.node.x]\nlump = { material = \"wax\", mass = \"1 kg\", melts = { " + text + " } }\n[thermal.resistance.y]\nbetween = [\"x\", \"air\"]\nvalue = \"1 K/W\""
	}
	for _, c := range []struct{ name, text, want string }{
		{"emissivity above 1", radiation(`emissivity = 1.1, area = "1 m²"`), "range: "},
		{"emissivity 0", radiation(`emissivity = 0, area = "1 m²"`), "range: "},
		{"no emissivity", radiation(`area = "1 m²"`), "one of emissivity, material, emissivities is missing"},
		{"no area", radiation(`emissivity = 0.9`), "area"},
		{"one area for two surfaces", radiation(`emissivities = [0.8, 0.9], area = "1 m²"`), "emissivities needs areas beside it"},
		{"three emissivities", radiation(`emissivities = [0.8, 0.9, 0.7], areas = ["1 m²", "2 m²"]`), "list-length: "},
		{"second surface too small", radiation(`emissivities = [0.8, 0.9], areas = ["2 m²", "1 m²"], view_factor = 0.6`), "the first surface of 2 m² would see with F = 0.6 more than the second has, 1 m²"},
		{"view factor unsaid", radiation(`emissivities = [0.8, 0.9], areas = ["2 m²", "1 m²"]`), "name the smaller surface first"},
		{"emissivity of a range", radiation(`material = "copper", area = "1 m²"`), "state emissivity in place of material"},
		{"own material without emissivity", "[material.m]\nconductivity = \"1 W/(m·K)\"\n" + radiation(`material = "m", area = "1 m²"`), `material "m" states no emissivity`},
		{"at_rise alone", part("value = \"1 K/W\"\nat_rise = \"10 K\""), "at_rise needs exponent beside it"},
		{"exponent alone", part("value = \"1 K/W\"\nexponent = 0.25"), "exponent needs at_rise beside it"},
		{"exponent of a conductance", part("conductance = \"1 W/K\"\nat_rise = \"10 K\"\nexponent = 0.25"), "exponent needs value beside it"},
		{"negative exponent", part("value = \"1 K/W\"\nat_rise = \"10 K\"\nexponent = -0.2"), "range: "},
		{"rises that fall", part(`points = [["20 K", "1 K/W"], ["10 K", "2 K/W"]]`), "order: "},
		{"a flow that falls", part(`points = [["10 K", "1 K/W"], ["20 K", "3 K/W"]]`), "a rise of 20 K would drive less heat than one of 10 K"},
		{"a level for a rise", part(`points = [["10 °C", "1 K/W"], ["20 °C", "0.9 K/W"]]`), "points"},
		{"points and value", part("value = \"1 K/W\"\npoints = [[\"10 K\", \"1 K/W\"]]"), "stated-twice: "},
		{"conductivity that falls back", part(`layer = { conductivity = [["90 °C", "1 W/(m·K)"], ["20 °C", "2 W/(m·K)"]], thickness = "1 cm", area = "1 m²" }`), "order: "},
		{"specific heat of a stream against temperature", "[material.m]\nspecific_heat = [[\"0 °C\", \"4 kJ/(kg·K)\"], [\"90 °C\", \"4.2 kJ/(kg·K)\"]]\n" +
			"[thermal.node.end]\ncapacitance = \"1 J/K\"\n[thermal.stream.x]\npath = [\"air\", \"end\"]\nfluid = \"m\"\nflow = \"1 kg/s\"", `specific_heat of material "m" is stated against temperature; expected one value`},
		{"drive and points", source("drive = \"1 W\"\npoints = [[\"20 °C\", \"1 W\"]]"), "stated-twice: "},
		{"neither", source(""), "one of drive, points is missing"},
		{"doubles and per_kelvin", source("drive = \"1 W\"\nat = \"20 °C\"\nper_kelvin = \"1 %/K\"\ndoubles_every = \"10 K\""), "stated-twice: "},
		{"doubles without at", source("drive = \"1 W\"\ndoubles_every = \"10 K\""), "doubles_every needs at beside it"},
		{"doubles every negative", source("drive = \"1 W\"\nat = \"20 °C\"\ndoubles_every = \"-10 K\""), "range: "},
		{"at alone", source("drive = \"1 W\"\nat = \"20 °C\""), "at needs per_kelvin or doubles_every beside it"},
		{"scale of a drive", source("drive = \"1 W\"\nscale = 2"), "scale needs points beside it"},
		{"points that fall back", source(`points = [["50 °C", "1 W"], ["20 °C", "2 W"]]`), "order: "},
		{"melting of a held node", strings.Replace(melts(`at = "60 °C", over = "2 K", latent = "180 kJ/kg"`), "lump =", "held = \"20 °C\"\nlump =", 1), "the node is held: whatever it stores changes nothing"},
		{"melting over nothing", melts(`at = "60 °C", over = "0 K", latent = "180 kJ/kg"`), "range: "},
		{"melting over too little", melts(`at = "60 °C", over = "0.01 mK", latent = "180 kJ/kg"`), "range: "},
		{"melting without latent heat", melts(`at = "60 °C", over = "2 K"`), "latent is missing"},
		{"latent heat of a volume", melts(`at = "60 °C", over = "2 K", latent = "180 MJ/m³"`), "dimension: "},
		{"thermostat upside down", heater("on_off = { on_below = \"60 °C\", off_above = \"50 °C\" }\noutput = [\"0 W\", \"9 W\"]"), "off_above is 50 °C; expected more than on_below, 60 °C"},
		{"no output", heater("on_off = { on_below = \"50 °C\", off_above = \"60 °C\" }"), "output is missing"},
		{"output upside down", heater("on_off = { on_below = \"50 °C\", off_above = \"60 °C\" }\noutput = [\"9 W\", \"0 W\"]"), "order: "},
		{"one output", heater("on_off = { on_below = \"50 °C\", off_above = \"60 °C\" }\noutput = [\"9 W\"]"), "list-length: "},
		{"pi without target", heater("pi = { gain = \"2 W/K\", integral_time = \"5 min\" }\noutput = [\"0 W\", \"9 W\"]"), "pi needs target beside it"},
		{"target without pi", heater("target = \"50 °C\"\noutput = [\"0 W\", \"9 W\"]"), "one of on_off, pi is missing"},
		{"target of a thermostat", heater("target = \"50 °C\"\non_off = { on_below = \"50 °C\", off_above = \"60 °C\" }\noutput = [\"0 W\", \"9 W\"]"), "target of a thermostat; expected pi beside it"},
		{"both controls", heater("target = \"50 °C\"\npi = { gain = \"2 W/K\", integral_time = \"5 min\" }\non_off = { on_below = \"50 °C\", off_above = \"60 °C\" }\noutput = [\"0 W\", \"9 W\"]"), "stated-twice: "},
		{"no integral time", heater("target = \"50 °C\"\npi = { gain = \"2 W/K\" }\noutput = [\"0 W\", \"9 W\"]"), "integral_time is missing"},
		{"negative gain", heater("target = \"50 °C\"\npi = { gain = \"-2 W/K\", integral_time = \"5 min\" }\noutput = [\"0 W\", \"9 W\"]"), "range: "},
		{"a start that is none", heater("on_off = { on_below = \"50 °C\", off_above = \"60 °C\", start = \"yes\" }\noutput = [\"0 W\", \"9 W\"]"), "yes"},
		{"heater of a held node", "[thermal.heater.x]\ninto = \"air\"\nwatch = \"body\"\non_off = { on_below = \"50 °C\", off_above = \"60 °C\" }\noutput = [\"0 W\", \"9 W\"]", "is held: this heater changes nothing"},
		{"an arrangement unheard of", exchanger("arrangement = \"counter\""), "counterflow"},
		{"no arrangement", exchanger(""), "arrangement is missing"},
		{"shells of a counterflow", exchanger("arrangement = \"counterflow\"\nshell_passes = 2"), "shell_passes of counterflow"},
		{"one stream", "[thermal.exchanger.x]\nstreams = [\"hot\"]\nconductance = \"3 W/K\"\narrangement = \"counterflow\"", "list-length: "},
		{"the same stream twice", "[thermal.exchanger.x]\nstreams = [\"hot\", \"hot\"]\nconductance = \"3 W/K\"\narrangement = \"counterflow\"", "same-name: "},
		{"no such stream", "[thermal.exchanger.x]\nstreams = [\"hot\", \"cool\"]\nconductance = \"3 W/K\"\narrangement = \"counterflow\"", "did you mean \"cold\"?"},
		{"not neighbours", exchanger("arrangement = \"counterflow\"\nfirst_between = [\"air\", \"body\"]"), "are not neighbours in the path of stream \"hot\""},
		{"two on one stretch", exchanger("arrangement = \"counterflow\"") + "\n[thermal.exchanger.y]\nstreams = [\"hot\", \"cold\"]\nconductance = \"3 W/K\"\narrangement = \"counterflow\"",
			`exchanger "x" lies on the same stretch of stream "hot"`},
		{"a passage on its stretch", exchanger("arrangement = \"counterflow\"") + "\n[thermal.passage.y]\nstream = \"hot\"\nalong = \"body\"\nconductance = \"3 W/K\"",
			`exchanger "x" lies on the same stretch of stream "hot"`},
	} {
		if got := faults(base + c.text + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}

// A stream that passes more than two nodes must say where its exchanger lies.
func TestExchangerOnALongStream(t *testing.T) {
	got := faults(`
[thermal.node.a]
held = "20 °C"
[thermal.node.b]
[thermal.node.c]
[thermal.node.d]
held = "10 °C"
[thermal.node.e]
[thermal.stream.hot]
path          = ["a", "b", "c"]
capacity_rate = "5 W/K"
[thermal.stream.cold]
path          = ["d", "e"]
capacity_rate = "9 W/K"
[thermal.exchanger.x]
streams     = ["hot", "cold"]
conductance = "3 W/K"
arrangement = "counterflow"
`)
	for _, want := range []string{`stream "hot" passes 3 nodes: first_between is missing`, `first_between = ["a", "b"]`} {
		if !strings.Contains(got, want) {
			t.Errorf("%q is not among\n%s", want, got)
		}
	}
}
