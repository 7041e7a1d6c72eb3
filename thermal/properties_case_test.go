package thermal

import (
	"math"
	"testing"
)

// Points against temperature, a layer with k against temperature, a lump with c against it: steady and in time by hand.
func TestPropertiesAgainstTemperatureInACase(t *testing.T) {
	m := read(t, "layer", hotBody("", `
[material.board]
conductivity = [["0 °C", "0.1 W/(m·K)"], ["100 °C", "0.3 W/(m·K)"]]
[thermal.resistance.layer]
between = ["body", "air"]
layer   = { material = "board", thickness = "1 cm", area = "1 m²" }
[thermal.source.heat]
into   = "body"
points = [["0 °C", "300 W"], ["100 °C", "900 W"]]
`))
	s := m.At(m.Operate(0), "body", "flow of layer", "flow of heat", "resistance of layer")
	hot := s[0] - 273.15
	near(t, "flow", s[1], 100*(hot-20)*(0.1+0.002*(hot+20)/2), 1e-9)
	near(t, "heat", s[2], 300+6*hot, 1e-9)
	near(t, "balance", s[1], s[2], 1e-8)
	near(t, "resistance", s[3], (hot-20)/s[1], 1e-12)

	// 3 kg of c = 400 + 2·(T − 0 °C) under 60 W for 1000 s from 20 °C: 3·(400·x + x² + 40·x) = 60 kJ
	m = read(t, "lump", `
[run]
start = "20 °C"
[material.alloy]
specific_heat = [["0 °C", "400 J/(kg·K)"], ["500 °C", "1400 J/(kg·K)"]]
[thermal.node.far]
held = "20 °C"
[thermal.node.body]
lump = { material = "alloy", mass = "3 kg" }
[thermal.resistance.hardly]
between     = ["body", "far"]
conductance = "1e-9 W/K"
[thermal.source.heat]
into  = "body"
drive = "60 W"
[[table]]
show  = ["body"]
times = ["0 s", "1 s"]
`)
	r := m.March(1000, "body", "stored of body")
	near(t, "rise", r.At(0, 1000)-293.15, (-440+math.Sqrt(440*440+4*20000))/2, 1e-6)
	near(t, "heat", r.At(1, 1000)-r.At(1, 0), 60e3, 1e-9)
}
