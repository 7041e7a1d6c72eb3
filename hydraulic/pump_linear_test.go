package hydraulic

import (
	"testing"

	"lagbook/network"
)

// A pump in series with a pipe: the pole is −(slope of the pipe + slope of the pump)/inertance, and the flow follows the
// speed. Both by differences of the steady flow (invented pump; by bisection in double precision).
func TestPumpAndPipeLinearised(t *testing.T) {
	m := read(t, "series", `
[hydraulic]
fluid = "water"
at = "20 °C"
pressures = "gauge"
[hydraulic.node.sump]
held = "0.3 bar"
[hydraulic.node.d]
[hydraulic.node.top]
elevation = "20 m"
held = "0 bar"
[hydraulic.pump.p]
from = "sump"
to = "d"
head = { flow = ["0 m³/h", "20 m³/h", "40 m³/h"], head = ["40 m", "35 m", "20 m"], efficiency = 0.6 }
rated_speed = "1450 rpm"
[hydraulic.line.main]
between = ["d", "top"]
pipe = { length = "200 m", bore = "100 mm", roughness = "0.1 mm", rigid = true }
`)
	lin, err := m.Net.Linearise(m.Params, m.Begin())
	if err != nil {
		t.Fatal(err)
	}
	outs, _ := lin.Outputs([]network.Output{m.Net.InertanceFlowOf(0)})
	r, err := lin.Net.Reduce(lin.Params, outs)
	if err != nil {
		t.Fatal(err)
	}
	isNear(t, "pole", real(r.System.Poles()[0].P), -1.3232, 8e-3) // friction by Colebrook and White there
	for _, e := range m.Net.Elements() {
		for k, name := range e.Drives {
			if name != "speed of p" {
				continue
			}
			h, err := r.System.Transfer(int(lin.Input(e.ID, k)), 0)
			if err != nil {
				t.Fatal(err)
			}
			isNear(t, "flow by speed, m³ a turn", real(h.Eval(0)), 8.556e-4, 5e-6)
			return
		}
	}
	t.Error("the speed is no drive")
}
