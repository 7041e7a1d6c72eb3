package hydraulic

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// Between two held nodes each part passes what its law says at 0.4 bar, and check shows
// what it passes at 1 bar.
func TestPartsPassWhatTheyShould(t *testing.T) {
	const d, rho = 4e4, 1000.0
	area := math.Pi / 4 * 0.02 * 0.02
	for _, c := range []struct {
		part    string
		want    float64
		derived string
		power   float64
	}{
		{"[hydraulic.check.x]\nfrom = \"a\"\nto = \"b\"\nresistance = \"2 MPa·s/m³\"", d / 2e6, "", 1},
		{"[hydraulic.check.x]\nfrom = \"a\"\nto = \"b\"\nfitting = { bore = \"20 mm\", loss = 2 }", area * math.Sqrt(2*d/(rho*2)), "", 2},
		{"[hydraulic.check.x]\nfrom = \"a\"\nto = \"b\"\ncv = 10", 10 * gallonMinute * math.Sqrt(d/onePsi), "", 2},
		{"[hydraulic.check.x]\nfrom = \"a\"\nto = \"b\"\nkv = \"3 m³/h\"\ncracking = \"0.1 bar\"", 3.0 / 3600 * math.Sqrt(0.3), "", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nfitting = { bore = \"20 mm\", loss = 2 }", area * math.Sqrt(2*d/(rho*2)), "flow of x at 1 bar", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nfitting = { bore = \"20 mm\", loss_in = 2, loss_out = 3 }", area * math.Sqrt(2*d/(rho*2)), "flow of x at 1 bar, forth", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\norifice = { bore = \"20 mm\", coefficient = 0.7 }", 0.7 * area * math.Sqrt(2*d/rho), "flow of x at 1 bar", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nvalve = { cv = \"10 gpm\", opening = 0.25, characteristic = \"quick opening\" }", 10 * gallonMinute * math.Sqrt(d/onePsi) / 2, "", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nvalve = { kv = 8, opening = 0.5, characteristic = [[0, 0], [1, 1]] }", 8.0 / 3600 * math.Sqrt(0.4) / 2, "", 2},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nresistance = \"2 MPa·s/m³\"\nscale = { points = [[\"0 s\", 0.5], [\"1 s\", 0]] }", d / 4e6, "", 1},
		{"[hydraulic.restriction.x]\nbetween = [\"a\", \"b\"]\nrated = { flow = \"3 L/s\", drop = \"0.4 bar\", power = 1.75 }", 0.003, "", 1},
	} {
		m := read(t, "part", water+"[hydraulic.node.a]\nheld = \"0.4 bar\"\n[hydraulic.node.b]\nheld = \"0 bar\"\n"+c.part+"\n")
		got := m.At(m.Begin(), "flow of x")[0]
		isNear(t, c.part, got, c.want, 1e-7*c.want)
		if c.derived != "" {
			isNear(t, c.derived, m.Derived(c.derived).SI, c.want*math.Sqrt(1e5/d), 1e-9)
		}
	}
}

// An orifice plate by the standard: what is shown of it agrees with what it passes.
func TestPlateShown(t *testing.T) {
	m := read(t, "plate", water+`
[hydraulic.node.a]
held = "1 bar"
[hydraulic.node.b]
held = "0 bar"
[hydraulic.restriction.x]
between = ["a", "b"]
orifice = { bore = "60 mm", pipe_bore = "100 mm", taps = "D and D/2" }
`)
	q := m.At(m.Begin(), "flow of x")[0]
	isNear(t, "flow at 1 bar", m.Derived("flow of x at 1 bar").SI, q, 1e-6*q)
	c := newReader5167(0.6, 0.1, bothBores)
	want, _ := c.at(4 * 1000 * q / (math.Pi * 0.1 * 1e-3))
	isNear(t, "coefficient", m.Derived("coefficient of x at 1 bar lost").SI, want, 1e-9)
}

// A plain tank beside a vessel of gas stays a capacity, and is said to run empty.
func TestPlainTankRunsEmpty(t *testing.T) {
	m := read(t, "plain", water+`
[hydraulic.node.t]
tank  = { area = "1 m²" }
start = { level = "0.5 m" }
[hydraulic.node.v]
gas   = { volume = "1 m³", precharge = "-0.5 bar", exponent = 1 }
start = "0 bar"
[hydraulic.line.l]
between    = ["t", "v"]
resistance = "100 MPa·s/m³"
[hydraulic.source.out]
into  = "t"
drive = { stairs = [["0 s", "-10 L/s"], ["60 s", "10 L/s"]] }
`)
	tr := m.March(100, "level of t", "stored of t")
	got := told(tr)
	if !strings.Contains(got, "runs empty") || !strings.Contains(got, "holds liquid again") || cautioned(tr) != "tank-empty" {
		t.Errorf("%s; %s", got, cautioned(tr))
	}
	isNear(t, "stored", tr.At(1, 10), tr.At(0, 10), 1e-12)
}

// A piston answers alike wherever it lies and however its start is stated: at rest where
// the header holds it, or pressed on from 1 bar.
func TestPistons(t *testing.T) {
	const plant = `
[hydraulic.node.header]
elevation = "%g m"
held      = { step = { from = "1 bar", to = "3 bar", at = "0 s" } }
[hydraulic.node.chamber]
elevation = "%g m"
trapped   = { volume = "5 cm³", wall = "1e-14 m³/Pa" }
piston    = { area = "5 cm²", spring = "20 N/mm"%s }
%s
[hydraulic.restriction.tube]
between    = ["header", "chamber"]
resistance = "5 GPa·s/m³"
`
	for _, moving := range []string{"", `, damper = "400 N·s/m"`, `, mass = "2 kg"`, `, mass = "2 kg", damper = "400 N·s/m", preload = "30 N"`} {
		free := 0.0
		if strings.Contains(moving, "preload") {
			free = 30.0 / 2e4
		}
		rest := read(t, "rest", water+fmt.Sprintf(plant, 0.0, 0.0, moving, "")).Respond(0.2, "travel of chamber", "chamber")
		for _, c := range []string{`start = "1 bar"`, "[run]\nstart = \"1 bar\""} {
			high := read(t, "high", water+fmt.Sprintf(plant, 7.5, 7.5, moving, c)).Respond(0.2, "travel of chamber", "chamber")
			for _, at := range []float64{0, 0.003, 0.05, 0.2} {
				isNear(t, fmt.Sprintf("travel%s at %v s", moving, at), high.At(0, at), rest.At(0, at), 1e-9)
				isNear(t, fmt.Sprintf("pressure%s at %v s", moving, at), high.At(1, at), rest.At(1, at), 1e-4)
			}
		}
		isNear(t, "travel at the start", rest.At(0, 0), 1e5*5e-4/2e4-free, 1e-9)
	}
	alone := strings.Replace(plant, "trapped   = { volume = \"5 cm³\", wall = \"1e-14 m³/Pa\" }\n", "", 1)
	m := read(t, "alone", water+fmt.Sprintf(alone, 2.0, 2.0, `, damper = "400 N·s/m"`, `start = "2 bar"`))
	isNear(t, "travel at its own start", m.Respond(0.2, "travel of chamber").At(0, 0), 2e5*5e-4/2e4, 1e-9)
}
