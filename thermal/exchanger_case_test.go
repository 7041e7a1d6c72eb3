package thermal

import (
	"fmt"
	"math"
	"testing"
)

// exchangerCase is two streams that meet once, by words of arrangement.
func exchangerCase(arrangement, scale string) string {
	return fmt.Sprintf(`
[thermal.node.hot_in]
held = "90 °C"
[thermal.node.hot_mid]
capacitance = "20 J/K"
[thermal.node.hot_out]
capacitance = "50 J/K"
[thermal.node.cold_in]
held = "20 °C"
[thermal.node.cold_out]
[thermal.stream.hot]
path          = ["hot_in", "hot_mid", "hot_out"]
capacity_rate = "40 W/K"
%s
[thermal.stream.cold]
path          = ["cold_in", "cold_out"]
capacity_rate = "25 W/K"
[thermal.exchanger.x]
streams       = ["hot", "cold"]
first_between = ["hot_mid", "hot_out"]
conductance   = "60 W/K"
%s
[[table]]
show  = ["hot_out", "cold_out"]
times = ["0 s", "1 s"]
`, scale, arrangement)
}

// A whole case with an exchanger is linear, and closes its balance: what one stream gives the other
// takes. Effectiveness by hand with NTU = 60/25 = 2.4 and r = 25/40.
func TestExchangerInACase(t *testing.T) {
	const ntu, r = 2.4, 0.625
	for _, c := range []struct {
		words string
		want  float64
	}{
		{`arrangement = "counterflow"`, (1 - math.Exp(-ntu*(1-r))) / (1 - r*math.Exp(-ntu*(1-r)))},
		{`arrangement = "parallel flow"`, (1 - math.Exp(-ntu*(1+r))) / (1 + r)},
		{`arrangement = "crossflow"`, 1 - math.Exp((math.Exp(-r*math.Pow(ntu, 0.78))-1)*math.Pow(ntu, 0.22)/r)},
		{`arrangement = "crossflow, first mixed"`, (1 - math.Exp(-r*(1-math.Exp(-ntu)))) / r},
		{`arrangement = "crossflow, second mixed"`, 1 - math.Exp(-(1-math.Exp(-r*ntu))/r)},
		{`arrangement = "shell and tube"`, 2 / (1 + r + math.Hypot(1, r)*(1+math.Exp(-ntu*math.Hypot(1, r)))/(1-math.Exp(-ntu*math.Hypot(1, r))))},
	} {
		m := read(t, c.words, exchangerCase(c.words, ""))
		if m.Net.Nonlinear() {
			t.Errorf("%s: the case is not linear", c.words)
		}
		near(t, c.words, m.Derived("effectiveness of x").SI, c.want, 1e-13)
		heat := c.want * 25 * 70
		run := m.Respond(1, "hot_out", "cold_out", "heat of x")
		near(t, c.words+": hot stream", run.At(0, 0), 363.15-heat/40, 1e-13)
		near(t, c.words+": cold stream", run.At(1, 0), 293.15+heat/25, 1e-13)
		near(t, c.words+": heat", run.At(2, 0), heat, 1e-12)
	}
}

// A pump that runs at half its speed changes both rates and the effectiveness.
func TestExchangerWithAScale(t *testing.T) {
	m := read(t, "half", exchangerCase(`arrangement = "counterflow"`, "scale = 0.5"))
	turning(m)
	w := exchanged(counterflow, 60, 20, 25)
	run := m.Respond(1, "hot_out", "cold_out")
	near(t, "hot stream", run.At(0, 0), 363.15-w*70/20, 1e-13)
	near(t, "cold stream", run.At(1, 0), 293.15+w*70/25, 1e-13)
}
