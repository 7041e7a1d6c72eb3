package hydraulic

import (
	"fmt"
	"math"
	"testing"
)

// A case with one level stated as text, pressures as head says.
func held(head, level string) string {
	return fmt.Sprintf(`
[hydraulic]
%s
[hydraulic.node.a]
held = "%s"
[hydraulic.node.b]
compliance = "1e-9 m³/Pa"
[hydraulic.line.l]
between    = ["a", "b"]
resistance = "1 GPa·s/m³"
`, head, level)
}

// A plain level is meant as the case says, one that says more is converted with
// the case's atmosphere; the standard one is 101325 Pa (ISO 2533), 1 psi is
// 6894.757293168 Pa (0.45359237 kg · 9.80665 m/s² on a square inch).
func TestGaugeAndAbsolute(t *testing.T) {
	const psi = 6894.757293168361
	for _, c := range []struct {
		head, level string
		want        float64 // Pa, as the case states pressures
	}{
		{``, "2 bar", 2e5},
		{`pressures = "gauge"`, "2 bar", 2e5},
		{`pressures = "absolute"`, "2 bar", 2e5},
		{`pressures = "gauge"`, "2 bar(g)", 2e5},
		{`pressures = "gauge"`, "2 bar(a)", 2e5 - 101325},
		{`pressures = "absolute"`, "2 bar(g)", 2e5 + 101325},
		{`pressures = "absolute"`, "2 bara", 2e5},
		{`pressures = "gauge"`, "30 psig", 30 * psi},
		{`pressures = "gauge"`, "30 psia", 30*psi - 101325},
		{"pressures = \"absolute\"\natmosphere = \"950 mbar\"", "30 psig", 30*psi + 95000},
		{"pressures = \"gauge\"\natmosphere = \"0.95 bar(a)\"", "1 bar(a)", 5000},
		{`pressures = "gauge"`, "= 3 bar(g) - 1 bar", 2e5},
		{`pressures = "absolute"`, "= 3 bar(g) - 1 bar", 2e5 + 101325},
		{`pressures = "gauge"`, "-0.4 bar", -4e4},
	} {
		m := read(t, "case.toml", held(c.head, c.level))
		if got := m.Respond(1, "a").At(0, 0); math.Abs(got-c.want) > 1e-9*(1e5+math.Abs(c.want)) {
			t.Errorf("%s with %q is %.10g Pa, want %.10g", c.level, c.head, got, c.want)
		}
	}
}

// The same plant stated in gauge and in absolute pressures answers alike, the
// levels one atmosphere apart.
func TestGaugeOrAbsoluteIsOnePlant(t *testing.T) {
	plant := `
[hydraulic.node.main]
held = { step = { from = "3 bar(g)", to = "5 bar(a)", at = "0 s" } }
[hydraulic.node.vessel]
compliance = "2e-9 m³/Pa"
[hydraulic.node.drain]
held = "0 bar(g)"
[hydraulic.line.pipe]
between    = ["main", "vessel"]
resistance = "90 MPa·s/m³"
inertance  = "120 MPa·s²/m³"
[hydraulic.line.nozzle]
between    = ["vessel", "drain"]
resistance = "1 GPa·s/m³"
`
	gauge := read(t, "gauge.toml", "[hydraulic]\npressures = \"gauge\"\n"+plant).Respond(10, "vessel", "flow of pipe", "main - vessel")
	absolute := read(t, "absolute.toml", "[hydraulic]\npressures = \"absolute\"\n"+plant).Respond(10, "vessel", "flow of pipe", "main - vessel")
	for _, at := range []float64{0, 0.1, 1, 3, 10} {
		if d := absolute.At(0, at) - gauge.At(0, at) - 101325; math.Abs(d) > 1e-8*101325 {
			t.Errorf("vessel at %v s: %v Pa beside one atmosphere", at, d)
		}
		for out := 1; out < 3; out++ {
			if a, g := absolute.At(out, at), gauge.At(out, at); math.Abs(a-g) > 1e-9*math.Abs(g)+1e-15 {
				t.Errorf("output %d at %v s: %v absolute, %v gauge", out, at, a, g)
			}
		}
	}
}
