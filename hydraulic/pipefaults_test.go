package hydraulic

import (
	"strings"
	"testing"
)

const oil = `
[hydraulic]
density = "870 kg/m³"
viscosity = "46 mm²/s"
bulk_modulus = "1.4 GPa"
[hydraulic.node.main]
held = "2 bar"
[hydraulic.node.tank]
compliance = "1e-6 m³/Pa"
`

const pipeOf15 = oil + `[hydraulic.line.pipe]
between = ["main", "tank"]
`

// Every mistake that a user can make about a liquid, a pipe or a pump.
func TestFaultsOfLiquidPipeAndPump(t *testing.T) {
	pump := oil + "[hydraulic.pump.p]\nfrom = \"main\"\nto = \"tank\"\n"
	head := `head = { flow = ["0 L/s", "5 L/s", "10 L/s"], head = ["30 m", "25 m", "10 m"] }` + "\n"
	for _, c := range []struct{ name, text, want string }{
		{"a fluid at no temperature", "[hydraulic]\nfluid = \"water\"\n" + good, "fluid needs at beside it"},
		{"a temperature of no fluid", "[hydraulic]\nat = \"20 °C\"\n" + good, "at needs fluid beside it"},
		{"steam", "[hydraulic]\nfluid = \"water\"\nat = \"120 °C\"\n" + good, "water at 120 °C; expected 0 °C to 100 °C, the range of its data"},
		{"a fluid misspelt", "[hydraulic]\nfluid = \"oil VG 64\"\nat = \"20 °C\"\n" + good, "did you mean \"oil VG 46\"?"},
		{"boiling in the open", "[hydraulic]\ndensity = \"800 kg/m³\"\nvapour_pressure = \"1.1 bar(a)\"\n" + good, "warning: hydraulic: a vapour pressure of 1.1e+05 Pa"},
		{"too much gas", strings.Replace(oil, "[hydraulic]", "[hydraulic]\nfree_gas = \"50 %\"", 1), "must be 0.2 or below"},

		{"a pipe in no liquid", good + "[hydraulic.line.x]\nbetween = [\"main\", \"tank\"]\npipe = { length = \"1 m\", bore = \"1 cm\" }", "it needs the density of the liquid"},
		{"a pipe without bore", pipeOf15 + `pipe = { length = "1 m" }`, "one of bore, size is missing"},
		{"a pipe without length", pipeOf15 + `pipe = { bore = "1 cm" }`, "length is missing"},
		{"bore and size", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", size = "DN 15" }`, "stated-twice: "},
		{"a size misspelt", pipeOf15 + `pipe = { length = "1 m", size = "DN 55" }`, "did you mean"},
		{"lumps and rigid", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 3, rigid = true }`, "stated-twice: "},
		{"no lumps", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 0 }`, "must be 1 or above"},
		{"waves in no sections", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", wave_speed = "1200 m/s" }`, "not in how many sections to follow them"},
		{"not rigid", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", rigid = false }`, "not in how many sections to follow them"},
		{"shorter than it is high", strings.Replace(pipeOf15, "[hydraulic.node.tank]", "[hydraulic.node.tank]\nelevation = \"9 m\"", 1) + `pipe = { length = "8 m", bore = "1 cm" }`, "8 m of pipe between nodes 9 m apart in height"},
		{"steeper than upright", pipeOf15 + `pipe = { length = "8 m", bore = "1 cm", lumps = 4, elevations = [["0 m", "0 m"], ["2 m", "3 m"], ["8 m", "0 m"]] }`, "it rises or falls 3 m within 2 m of pipe"},
		{"beyond its end", pipeOf15 + `pipe = { length = "8 m", bore = "1 cm", lumps = 4, elevations = [["0 m", "0 m"], ["9 m", "0 m"]] }`, "a point 9 m along a pipe of 8 m"},
		{"a wall without modulus", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 3, wall = "1 mm" }`, "add wall_modulus"},
		{"a modulus without wall", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 3, wall_modulus = "200 GPa" }`, "whose thickness is not stated"},
		{"a restraint without wall", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 3, restraint = "upstream" }`, "whose wall is not stated"},
		{"wall and wave speed", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", lumps = 3, wall = "1 mm", wall_modulus = "200 GPa", wave_speed = "1200 m/s" }`, "stated-twice: "},
		{"rougher than the pipe", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", roughness = "1 mm" }`, "a roughness of 0.1 of the bore; expected at most 0.05"},
		{"accuracy up to nothing", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", accuracy = "1 %" }`, "accuracy needs up_to beside it"},
		{"up to a sea of sections", pipeOf15 + `pipe = { length = "1 km", bore = "1 cm", accuracy = "1 %", up_to = "1 kHz" }`, "more than 1000 sections"},
		{"an angular frequency", pipeOf15 + `pipe = { length = "1 km", bore = "1 cm", accuracy = "1 %", up_to = "5 rad/s" }`, "rad"},
		{"pipe and resistance", pipeOf15 + "resistance = \"1 Pa·s/m³\"\n" + `pipe = { length = "1 m", bore = "1 cm" }`, "stated-twice: "},
		{"pipe and scale", pipeOf15 + "scale = 1\n" + `pipe = { length = "1 m", bore = "1 cm" }`, "stated-twice: "},
		{"elevations downwards along the pipe", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", elevations = [["1 m", "0 m"], ["0 m", "1 m"]] }`, "1 m"},
		{"elevations of one column", pipeOf15 + `pipe = { length = "1 m", bore = "1 cm", elevations = [["0 m", "0 m"], ["1 m", "1 m"]] }`, "no nodes between its ends"},
		{"an inner node taken", strings.Replace(pipeOf15, "[hydraulic.node.tank]", "[hydraulic.node.\"pipe.1\"]\nheld = \"1 bar\"\n[hydraulic.node.tank]", 1) + `pipe = { length = "1 m", bore = "1 cm", lumps = 3 }`, "bears the name of another node"},

		{"no kind of pump", pump, "one of head, displacement is missing"},
		{"both kinds", pump + head + "displacement = \"16 cm³\"", "stated-twice: "},
		{"a pump in a circle", strings.Replace(pump, "\"tank\"", "\"main\"", 1) + head, "\"main\""},
		{"a pump in no liquid", good + "[hydraulic.pump.p]\nfrom = \"main\"\nto = \"tank\"\n" + head, "it needs the density of the liquid"},
		{"heads that do not match", pump + `head = { flow = ["0 L/s", "5 L/s"], head = ["30 m", "25 m", "10 m"] }`, "3 heads for 2 flows"},
		{"one point", pump + `head = { flow = ["5 L/s"], head = ["30 m"] }`, "one point of a head curve"},
		{"flows downwards", pump + `head = { flow = ["5 L/s", "0 L/s"], head = ["30 m", "25 m"] }`, "5 L/s"},
		{"a head that rises", pump + `head = { flow = ["0 L/s", "5 L/s"], head = ["25 m", "30 m"] }`, "does not fall"},
		{"efficiencies that do not match", pump + `head = { flow = ["0 L/s", "5 L/s", "6 L/s"], head = ["30 m", "25 m", "20 m"], efficiency = [0.5, 0.6] }`, "2 efficiencies for 3 flows"},
		{"no efficiency at all", pump + `head = { flow = ["0 L/s", "5 L/s"], head = ["30 m", "25 m"], efficiency = [0, 0] }`, "an efficiency of 0"},
		{"speed of an unknown rated one", pump + head + "speed = \"1450 rpm\"", "speed needs rated_speed"},
		{"radians", pump + head + "rated_speed = \"150 rad/s\"", "rad"},
		{"a trip without efficiency", pump + head + "rated_speed = \"1450 rpm\"\ntrip = { at = \"1 s\", inertia = \"0.5 kg·m²\" }", "a trip without an efficiency"},
		{"a trip without rated speed", pump + head + "trip = { at = \"1 s\", inertia = \"0.5 kg·m²\" }", "trip needs rated_speed"},
		{"a displacement at no speed", pump + "displacement = \"16 cm³\"", "a displacement without a speed"},
		{"slip of a centrifugal pump", pump + head + "slip = \"5 %\"", "slip needs displacement"},
		{"a slip at no pressure", pump + "displacement = \"16 cm³\"\nrated_speed = \"1450 rpm\"\nslip = { flow = \"1 L/min\" }", "at is missing"},
		{"on and off crossed", pump + head + "on_off = { of = \"tank\", on_below = \"5 bar\", off_above = \"4 bar\" }", "off_above the higher of the two"},
		{"on by nothing", pump + head + "on_off = { on_below = \"5 bar\", off_above = \"6 bar\" }", "of is missing"},
	} {
		if got := faults(c.text + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}
