package hydraulic

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network"
)

const water = `
[hydraulic]
density         = "1000 kg/m³"
viscosity       = "1 mPa·s"
bulk_modulus    = "2.2 GPa"
vapour_pressure = "2.3 kPa"
`

// told is what happened in a march, in words: "12.5 runs over".
func told(tr *network.Trajectory) string {
	var list []string
	for _, e := range tr.Events() {
		list = append(list, fmt.Sprintf("%.4g %s", e.At, e.What))
	}
	return strings.Join(list, "; ")
}

func cautioned(tr *network.Trajectory) string {
	var list []string
	for _, c := range tr.Cautions() {
		list = append(list, c.Code)
	}
	return strings.Join(list, " ")
}

func isNear(t *testing.T, what string, got, want, by float64) {
	t.Helper()
	if !(math.Abs(got-want) <= by) {
		t.Errorf("%s is %.9g, want %.9g within %.2g", what, got, want, by)
	}
}

// Water lifted over a crest 9 m above a tank boils there as the tank falls: it stands
// 10.09 m at most (1.01325 bar less 2.3 kPa), here 9 m and what flows takes.
func TestVapourEndsTheRun(t *testing.T) {
	m := read(t, "siphon", water+`
[hydraulic.node.t]
tank  = { area = "1 m²", top = "3 m" }
start = { level = "2 m" }
[hydraulic.node.crest]
elevation = "10.5 m"
[hydraulic.node.low]
elevation = "-3 m"
held      = "0 bar"
[hydraulic.restriction.up]
between    = ["t", "crest"]
resistance = "10 kPa·s/L"
[hydraulic.restriction.down]
between    = ["crest", "low"]
resistance = "1 MPa·s/L"
`)
	tr := m.March(60000, "level of t", "crest")
	e := tr.Events()
	if len(e) == 0 || !e[len(e)-1].Last || e[len(e)-1].What != "vapour forms" {
		t.Fatalf("events %q", told(tr))
	}
	isNear(t, "pressure at the crest", tr.At(1, tr.Until()), 2300-101325, 1)
}

// A surface held at a level is a pressure: 3 m of water over a node 2 m up press like 5 m
// over the datum, gauge or absolute.
func TestHeldLevel(t *testing.T) {
	plant := `
[hydraulic.node.lake]
elevation = "2 m"
held      = { level = { step = { from = "3 m", to = "4 m", at = "1 s" } } }
[hydraulic.node.pond]
held = { level = "1 m" }
[hydraulic.restriction.r]
between    = ["lake", "pond"]
resistance = "1 MPa·s/m³"
`
	for _, c := range []struct {
		head string
		air  float64
	}{{"", 0}, {"pressures = \"absolute\"\n", 101325}} {
		m := read(t, "held", water+c.head+plant)
		r := m.Respond(2, "flow of r", "lake", "level of lake")
		isNear(t, "flow", r.At(0, 0), 4*1000*gravity/1e6, 1e-12)
		isNear(t, "flow after the step", r.At(0, 1.5), 5*1000*gravity/1e6, 1e-12)
		isNear(t, "pressure", r.At(1, 0), 3*1000*gravity+c.air, 1e-6)
		isNear(t, "level", r.At(2, 1.5), 4, 1e-12)
	}
}

// [run] start is the pressure of every node, wherever it lies, and gauge and absolute
// cases are one plant.
func TestOnePlantTwoPressures(t *testing.T) {
	plant := `
[run]
start = "3 bar(g)"
[hydraulic.node.up]
elevation = "12 m"
gas       = { volume = "5 L", precharge = "2 bar(g)", exponent = 1.4 }
[hydraulic.node.down]
trapped = { volume = "3 L" }
piston  = { area = "10 cm²", mass = "3 kg", spring = "20 N/mm", damper = "600 N·s/m", preload = "100 N" }
[hydraulic.node.drain]
held = "0 bar(g)"
[hydraulic.restriction.a]
between = ["up", "down"]
orifice = { bore = "2 mm", coefficient = 0.62 }
[hydraulic.relief.rv]
from      = "down"
to        = "drain"
set       = "2.5 bar(g)"
full_open = "3.5 bar(g)"
kv        = 0.05
[hydraulic.restriction.v]
between = ["down", "drain"]
valve   = { kv = 0.02, recovery = 0.9, characteristic = "equal percentage", opening = { points = [["0 s", 0], ["5 s", 1]] } }
`
	gauge, absolute := read(t, "gauge", water+plant), read(t, "absolute", water+"pressures = \"absolute\"\n"+plant)
	names := []string{"up", "gas volume of up", "travel of down", "flow of rv", "flow of v", "level of up"}
	a, b := gauge.March(20, names...), absolute.March(20, names...)
	isNear(t, "start of up", a.At(0, 0), 3e5, 1e-3)
	for out, name := range names {
		for _, at := range []float64{0, 0.1, 1, 4, 20} {
			shift := 0.0
			if out == 0 {
				shift = 101325
			}
			isNear(t, fmt.Sprintf("%s at %v s", name, at), b.At(out, at)-shift, a.At(out, at), 2e-6*(math.Abs(a.At(out, at))+1e-4))
		}
	}
}

// A check valve holds a column back and lets it through: a vessel charged through it keeps
// the highest pressure that was before it.
func TestCheckValveHolds(t *testing.T) {
	m := read(t, "check", water+`
[hydraulic.node.main]
held = { sine = { mean = "3 bar", amplitude = "1 bar", period = "4 s" } }
[hydraulic.node.vessel]
compliance = "1e-9 m³/Pa"
start      = "1 bar"
[hydraulic.check.cv]
from     = "main"
to       = "vessel"
cracking = "0.2 bar"
kv       = 2
`)
	tr := m.March(8, "vessel", "flow of cv")
	isNear(t, "vessel", tr.At(0, 8), 3.8e5, 50)
	isNear(t, "flow back", tr.Min(1, 0, 8).Y, 0, 1e-6)
	if got := told(tr); !strings.Contains(got, "shuts") {
		t.Error(got)
	}
}

// A valve that shuts is gone: behind it the pressure is that of what is left.
func TestShutValveIsGone(t *testing.T) {
	m := read(t, "shut", water+`
[hydraulic.node.main]
held = "4 bar"
[hydraulic.node.mid]
[hydraulic.node.out]
held = "0 bar"
[hydraulic.restriction.orifice]
between = ["main", "mid"]
orifice = { bore = "5 mm", coefficient = 0.62 }
[hydraulic.restriction.sv]
between = ["mid", "out"]
valve   = { kv = 1, close = { at = "1 s", over = "2 s" } }
[hydraulic.node.unused]
compliance = "1e-9 m³/Pa"
[hydraulic.restriction.gauge]
between    = ["mid", "unused"]
resistance = "1 MPa·s/m³"
`)
	tr := m.March(5, "mid", "flow of sv", "unused")
	if tr.At(1, 0.5) < 1e-4 {
		t.Errorf("open it passes %v m³/s", tr.At(1, 0.5))
	}
	isNear(t, "flow", tr.At(1, 4), 0, 0)
	isNear(t, "pressure behind", tr.At(0, 5), 4e5, 1)
	isNear(t, "pressure of the gauge", tr.At(2, 5), 4e5, 1)
}

// Bubbles make trapped oil soft at low pressure: the volume that goes in is that of the
// mixture, whatever the way there.
func TestTrappedBubbles(t *testing.T) {
	m := read(t, "bubbles", strings.Replace(water, "[hydraulic]", "[hydraulic]\nfree_gas = \"1 %\"", 1)+`
[hydraulic.node.box]
trapped = { volume = "10 L" }
start   = "0 bar"
[hydraulic.source.in]
into  = "box"
drive = "1 mL/s"
`)
	tr := m.March(100, "box")
	p := tr.At(0, 100) + 101325
	v := 0.01 * ((p-101325)/2.2e9 + 0.01*(1-math.Pow(101325/p, 1/1.4)))
	isNear(t, "volume taken up", v, 1e-4, 1e-10)
}

// A tank that runs over a lip into another one: the surface stands at the lip, what comes
// goes on, and stops where less comes than is drawn.
func TestOutfallOfATank(t *testing.T) {
	m := read(t, "outfall", water+`
[hydraulic.node.upper]
tank  = { area = "2 m²", floor = "3 m", top = "5 m" }
start = { level = "0.9 m" }
[hydraulic.node.lower]
tank  = { area = "4 m²", top = "2 m" }
start = { level = "0.2 m" }
[hydraulic.outfall.lip]
from      = "upper"
to        = "lower"
elevation = "4 m"
[hydraulic.source.in]
into  = "upper"
drive = { stairs = [["0 s", "10 L/s"], ["100 s", "-1 L/s"]] }
`)
	tr := m.March(200, "level of upper", "level of lower", "flow of lip")
	if got := told(tr); !strings.HasPrefix(got, "20 runs; 100") || !strings.HasSuffix(got, "runs dry") {
		t.Error(got)
	}
	isNear(t, "level at the lip", tr.At(0, 60), 1, 1e-6)
	isNear(t, "flow over the lip", tr.At(2, 60), 0.01, 1e-6)
	isNear(t, "level below", tr.At(1, 200), 0.2+0.8/4, 1e-5)
	isNear(t, "level above", tr.At(0, 200), 0.95, 2e-5)
}

// Gas pressed together quickly gives its heat to the wall: at constant volume its
// pressure goes to the isothermal one with the time constant τ/γ (law of an ideal gas).
func TestGasGivesItsHeat(t *testing.T) {
	m := read(t, "heat", water+`
[hydraulic.node.bottle]
gas   = { volume = "10 L", precharge = "90 bar", thermal_time_constant = "14 s" }
start = "120 bar"
[hydraulic.source.in]
into  = "bottle"
drive = { stairs = [["0 s", "10 L/s"], ["0.2 s", "0 L/s"]] }
`)
	tr := m.March(60, "bottle", "gas volume of bottle")
	charge := 0.01 * (90e5 + 101325)
	v := charge/(120e5+101325) - 2e-3
	isNear(t, "gas after the push, m³", tr.At(1, 10), v, 1e-9)
	rest := charge / v
	over := func(at float64) float64 { return tr.At(0, at) + 101325 - rest }
	isNear(t, "of what is over the rest, left after 10 s", over(11)/over(1), math.Exp(-10*1.4/14), 1e-5)
	quick := (120e5 + 101325) * math.Pow((v+2e-3)/v, 1.4)
	isNear(t, "pressure just after the push, of that without exchange of heat", (over(0.2)+rest)/quick, 1, 6e-3)
}

// Between the mains of a two-way loss each way has its own flow.
func TestTwoWays(t *testing.T) {
	m := read(t, "ways", water+`
[hydraulic.node.tunnel]
held = { step = { from = "0.1 bar", to = "-0.1 bar", at = "1 s" } }
[hydraulic.node.shaft]
held = "0 bar"
[hydraulic.restriction.throttle]
between = ["tunnel", "shaft"]
fitting = { bore = "200 mm", loss_in = 2.25, loss_out = 1 }
scale   = { points = [["2 s", 1], ["4 s", 0]] }
`)
	tr := m.March(5, "flow of throttle")
	k := math.Pi / 4 * 0.04 * math.Sqrt(2*1e4/1000)
	isNear(t, "in", tr.At(0, 0.5), k/1.5, 1e-8)
	isNear(t, "out", tr.At(0, 1.5), -k, 1e-8)
	isNear(t, "out, half shut", tr.At(0, 3), -k/2, 1e-8)
	isNear(t, "shut", tr.At(0, 4.5), 0, 0)
}

// A valve that shuts on a rigid column: from L·dq/dt = p₀ − R·q − p with q = φ·K·√p the
// pressure before it rises to p with p = p₀ + L·K·√p/T as the stroke goes to nothing, where T
// is the time that the whole stroke takes (law of a rigid column).
func TestValveShutsOnAColumn(t *testing.T) {
	m := read(t, "column", water+`
[hydraulic.node.lake]
held = "5 bar"
[hydraulic.node.v]
[hydraulic.node.out]
held = "0 bar"
[hydraulic.line.pipe]
between    = ["lake", "v"]
inertance  = "10 MPa·s²/m³"
resistance = "1 MPa·s/m³"
[hydraulic.restriction.sv]
between = ["v", "out"]
valve   = { kv = 100, close = { at = "1 s", over = "4 s" } }
[run]
start = "steady"
`)
	tr := m.March(8, "v", "flow of pipe")
	k := 100.0 / 3600 / math.Sqrt(1e5)
	b := 1e7 * k / 4
	root := (b + math.Sqrt(b*b+4*5e5)) / 2
	isNear(t, "highest pressure, of the law", tr.Max(0, 0, 8).Y/(root*root), 1, 1e-4)
	if got := told(tr); got != "5 shuts" {
		t.Error(got)
	}
	isNear(t, "pressure behind it, shut", tr.At(0, 6), 5e5, 1e-6)
	isNear(t, "flow, shut", tr.At(1, 6), 0, 0)
}
