package hydraulic

import (
	"strings"
	"testing"
)

const watery = `
[hydraulic]
density         = "1000 kg/m³"
viscosity       = "1 mPa·s"
bulk_modulus    = "2 GPa"
vapour_pressure = "2.3 kPa"
[hydraulic.node.main]
held = "2 bar"
[hydraulic.line.pipe]
between    = ["main", "t"]
resistance = "1 MPa·s/m³"
[hydraulic.node.t]
`

// Each impossibility of a vessel has its own message, at its own place.
func TestVesselFaults(t *testing.T) {
	for _, c := range []struct{ name, node, want string }{
		{"floor above top", `tank = { area = "1 m²", floor = "3 m", top = "2 m" }`, "element: case.toml:13:46: node \"t\": the top lies at 2 m and the floor at 3 m; expected a floor below the top"},
		{"crest above top", `tank = { area = "1 m²", overflow = "2.5 m", top = "2 m" }`, "the crest lies 2.5 m above the floor and the top at 2 m"},
		{"crest below the floor", `tank = { area = "1 m²", floor = "1 m", overflow = "0.5 m" }`, "the crest lies at 0.5 m and the floor at 1 m"},
		{"start above the top", "tank = { area = \"1 m²\", top = \"2 m\" }\nstart = { level = \"2.2 m\" }", "it starts at a level of 2.2 m, and the top of its tank lies 2 m above the floor"},
		{"start above a sphere", "tank = { shape = \"sphere\", diameter = \"2 m\" }\nstart = { level = \"2.2 m\" }", "it starts at a level of 2.2 m, and the top of its tank lies 2 m above the floor"},
		{"start below the floor", "tank = { area = \"1 m²\", top = \"2 m\" }\nstart = \"-0.1 bar\"", "below the floor of its tank"},
		{"floor and elevation", "elevation = \"1 m\"\ntank = { area = \"1 m²\", floor = \"2 m\" }", "the elevation is 1 m and the floor of its tank 2 m"},
		{"top above a sphere", `tank = { shape = "sphere", diameter = "2 m", top = "3 m" }`, "its shape ends at 2 m"},
		{"two ways to state it", `tank = { area = "1 m²", shape = "sphere", diameter = "1 m" }`, "stated-twice: "},
		{"a sphere without diameter", `tank = { shape = "sphere" }`, "a sphere without its diameter"},
		{"a cone without height", `tank = { shape = "cone", diameter = "1 m" }`, "a cone without its height"},
		{"a sphere with a length", `tank = { shape = "sphere", diameter = "1 m", length = "2 m" }`, "a length beside a sphere, which has none"},
		{"an area with a diameter", `tank = { area = "1 m²", diameter = "1 m" }`, "a diameter beside an area or points, which has none"},
		{"a shape nobody knows", `tank = { shape = "spere", diameter = "1 m" }`, "did you mean \"sphere\"?"},
		{"one point", `tank = { points = [["0 m", "1 m²"]] }`, "a tank by one height"},
		{"points from above", `tank = { points = [["1 m", "1 m²"], ["2 m", "1 m²"]] }`, "the first height is not 0 m"},
		{"points that fall", `tank = { points = [["0 m", "1 m²"], ["2 m", "1 m²"], ["1 m", "1 m²"]] }`, "order: "},
		{"volumes that shrink", `tank = { points = [["0 m", "0 L"], ["1 m", "2 L"], ["2 m", "1 L"]] }`, "a volume not above the one before it"},
		{"liquid below the floor", `tank = { points = [["0 m", "1 L"], ["1 m", "2 L"]] }`, "liquid below the floor"},
		{"areas and volumes", `tank = { points = [["0 m", "0 L"], ["1 m", "2 m²"]] }`, "kind"},
		{"no area", `tank = { points = [["0 m", "0 m²"], ["1 m", "2 m²"]] }`, "a surface without area"},
		{"an area of nothing", `tank = { area = "0 m²" }`, "must be positive"},
		{"half an overflow", `tank = { area = "1 m²", overflow = { width = "1 m" } }`, "crest is missing"},
		{"precharge above start", "gas = { volume = \"10 L\", precharge = \"90 bar\", exponent = 1.4 }\nstart = \"80 bar\"", "it starts at 80 bar(g), below the precharge, 90 bar(g): the vessel holds no liquid then"},
		{"precharge of vacuum", `gas = { volume = "10 L", precharge = "0 bar(a)", exponent = 1.4 }`, "a precharge of vacuum"},
		{"precharge below vacuum", `gas = { volume = "10 L", precharge = "-2 bar", exponent = 1.4 }`, "vacuum"},
		{"no law of gas", `gas = { volume = "10 L", precharge = "2 bar" }`, "one of exponent, thermal_time_constant is missing"},
		{"two laws of gas", `gas = { volume = "10 L", precharge = "2 bar", exponent = 1.4, thermal_time_constant = "20 s" }`, "stated-twice: "},
		{"exponent below 1", `gas = { volume = "10 L", precharge = "2 bar", exponent = 0.9 }`, "range: "},
		{"temperature of charge alone", `gas = { volume = "10 L", precharge = "2 bar", exponent = 1.4, precharge_at = "20 °C" }`, "precharge_at needs at beside it"},
		{"more left than there is", `gas = { volume = "10 L", precharge = "2 bar", exponent = 1.4, least_liquid = "10 L" }`, "the least liquid, 10 L, is not below the volume of the vessel, 10 L"},
		{"gas on a held node", "gas = { volume = \"10 L\", precharge = \"2 bar\", exponent = 1.4 }\nheld = \"3 bar\"", "a gas on a held node"},
		{"a tank on a held node", "tank = { area = \"1 m²\" }\nheld = { level = \"3 m\" }", "a tank on a held node"},
		{"a piston without spring", `piston = { area = "1 cm²" }`, "spring is missing"},
		{"a piston without area", `piston = { area = "0 cm²", spring = "1 N/mm" }`, "must be positive"},
		{"half a tube", `trapped = { volume = "1 L", wall = { bore = "1 cm" } }`, "thickness is missing"},
		{"a level and a pressure", "start = \"2 m\"", "{ level = "},
		{"held below vacuum", "compliance = \"1e-9 m³/Pa\"\nstart = \"-2 bar\"", "vacuum"},
	} {
		if got := faults(watery + c.node + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
	for _, good := range []string{`tank = { area = "1 m²" }`, `tank = { shape = "vertical cylinder", diameter = "1 m", height = "2 m", overflow = "1.5 m" }`,
		`tank = { shape = "horizontal cylinder", diameter = "1 m", length = "3 m" }`, `tank = { points = [["0 m", "0 L"], ["1 m", "2 L"]] }`,
		"gas = { volume = \"10 L\", precharge = \"90 bar\", precharge_at = \"20 °C\", at = \"40 °C\", thermal_time_constant = \"30 s\", least_liquid = \"0.5 L\" }\nstart = \"100 bar\"",
		`trapped = { volume = "1 L", wall = "1e-12 m³/Pa" }`, `piston = { area = "1 cm²", spring = "1 N/mm", damper = "1 N·s/m" }`} {
		if got := faults(watery + good + "\n"); got != "" {
			t.Errorf("%s: %s", good, got)
		}
	}
	for _, c := range []struct{ key, want string }{{`tank = { area = "1 m²" }`, "density"}, {`trapped = { volume = "1 L" }`, "bulk modulus"}, {"elevation = \"1 m\"\ncompliance = \"1e-9 m³/Pa\"", "density"}} {
		dry := watery[strings.Index(watery, "[hydraulic.node"):]
		if got := faults(dry + c.key + "\n"); !strings.Contains(got, "it needs the "+c.want+" of the liquid") {
			t.Errorf("%s without a liquid: %s", c.key, got)
		}
	}
}

const throttled = watery + `compliance = "1e-9 m³/Pa"
[hydraulic.node.out]
held = "0 bar"
`

// Each impossibility of a part between nodes has its own message.
func TestThrottleFaults(t *testing.T) {
	restriction := "[hydraulic.restriction.r]\nbetween = [\"t\", \"out\"]\n"
	from := "from = \"t\"\nto = \"out\"\n"
	for _, c := range []struct{ name, part, want string }{
		{"nothing", restriction, "one of resistance, rated, orifice, fitting, valve is missing"},
		{"two of them", restriction + "resistance = \"1 Pa·s/m³\"\nvalve = { kv = 1 }", "stated-twice: "},
		{"Kv 0", restriction + `valve = { kv = 0 }`, "must be positive"},
		{"Kv and Cv", restriction + `valve = { kv = 1, cv = 2 }`, "stated-twice: "},
		{"bore larger than the pipe", restriction + `orifice = { bore = "80 mm", pipe_bore = "50 mm" }`, "the bore of 80 mm is not smaller than that of the pipe, 50 mm"},
		{"taps unknown", restriction + `orifice = { bore = "30 mm", pipe_bore = "50 mm", taps = "flanges" }`, "did you mean \"flange\"?"},
		{"taps without a pipe", restriction + `orifice = { bore = "30 mm", coefficient = 0.6, taps = "flange" }`, "taps needs pipe_bore beside it"},
		{"a coefficient above 1", restriction + `orifice = { bore = "30 mm", coefficient = 1.6 }`, "range: "},
		{"a bore of nothing", restriction + `fitting = { bore = "0 mm", loss = 1 }`, "must be positive"},
		{"one way only", restriction + `fitting = { bore = "5 mm", loss_in = 1 }`, "loss_in needs loss_out beside it"},
		{"a power of 3", restriction + `rated = { flow = "1 L/s", drop = "1 bar", power = 3 }`, "range: "},
		{"an opening of 2", restriction + `valve = { kv = 1, opening = 2 }`, "range: "},
		{"opening and close", restriction + `valve = { kv = 1, opening = 1, close = { at = "1 s", over = "1 s" } }`, "stated-twice: "},
		{"shut in no time", restriction + `valve = { kv = 1, close = { at = "1 s", over = "0 s" } }`, "must be positive"},
		{"a scale on a valve", restriction + "valve = { kv = 1 }\nscale = 0.5", "a scale on a valve"},
		{"a recovery of 2", restriction + `valve = { kv = 1, recovery = 2 }`, "range: "},
		{"a rangeability of a straight valve", restriction + `valve = { kv = 1, characteristic = "linear", rangeability = 30 }`, "a rangeability of another characteristic"},
		{"a characteristic nobody knows", restriction + `valve = { kv = 1, characteristic = "linar" }`, "did you mean \"linear\"?"},
		{"points that do not end", restriction + `valve = { kv = 1, characteristic = [[0, 0], [0.5, 1]] }`, "points that do not run from shut to open"},
		{"points that fall", restriction + `valve = { kv = 1, characteristic = [[0, 0], [0.5, 1], [1, 0.9]] }`, "a share that falls as the valve opens"},
		{"a check valve to itself", "[hydraulic.check.c]\nfrom = \"t\"\nto = \"t\"\nkv = 1", "feeds it too"},
		{"a check valve of nothing", "[hydraulic.check.c]\n" + from, "one of kv, cv, fitting, resistance is missing"},
		{"cracking below nothing", "[hydraulic.check.c]\n" + from + "kv = 1\ncracking = \"-1 bar\"", "range: "},
		{"full before set", "[hydraulic.relief.r]\n" + from + "set = \"10 bar\"\nfull_open = \"9 bar\"\nkv = 1", "it is fully open at 9 bar(g) and begins to open at 10 bar(g)"},
		{"set below the air", "[hydraulic.relief.r]\n" + from + "set = \"-0.1 bar\"\nfull_open = \"9 bar\"\nkv = 1", "below the pressure of the air"},
		{"an outfall to nowhere", "[hydraulic.outfall.o]\nfrom = \"t\"\nto = \"ditch\"", "node \"ditch\" is not defined"},
	} {
		if got := faults(throttled + c.part + "\n"); !strings.Contains(got, c.want) {
			t.Errorf("%s: %q is not among\n%s", c.name, c.want, got)
		}
	}
}
