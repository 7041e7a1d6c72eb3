package thermal

import (
	"fmt"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile/casetest"
)

// Motors in intermittent duty, which cool more slowly at rest than they warm while running: the
// highest and the lowest rise of the periodic state, (1 − a)/(1 − ab) of the final rise and b times that,
// with a = exp(−on/T), b = exp(−off/T₂), worked out to 30 digits. After 80 periods the start is
// gone to 4e-12.
func TestIntermittentDuty(t *testing.T) {
	for _, c := range []struct {
		source          string
		rise, on, off   float64 // K, min
		highest, lowest float64 // K
	}{
		{"Gupta and Singhal: Fundamentals of Electric Drives and Control, example 4.7", 55, 15, 25, 27.3561948437166564, 22.8824805701213332},
		{"Mittle and Mittal, example 13.2", 50, 20, 40, 23.5572207307075751, 17.7027164671266666},
	} {
		beat := fmt.Sprintf(`width = "%g min", period = "%g min"`, c.on, c.on+c.off)
		m := read(t, c.source, `
[given]
heating = "100 min"
cooling = "140 min"
[run]
start = "0 °C"
[thermal.node.air]
held = "0 °C"
[thermal.node.motor]
capacitance = "= heating * 1 W/K"
[thermal.resistance.frame]
between     = ["motor", "air"]
conductance = "1 W/K"
scale       = { pulse = { low = "= heating/cooling", high = 1, `+beat+` } }
[thermal.source.loss]
into  = "motor"
drive = { pulse = { low = "0 W", high = "`+fmt.Sprint(c.rise)+` W", `+beat+` } }
[[table]]
show  = ["motor"]
times = ["0 min", "30 min"]
`)
		turning(m)
		last := 79 * (c.on + c.off) * 60
		r := m.Respond(last+(c.on+c.off)*60, "motor - air")
		near(t, "highest rise", r.At(0, last+c.on*60), c.highest, 1e-11)
		near(t, "lowest rise", r.At(0, last+(c.on+c.off)*60), c.lowest, 1e-11)
	}
}

// turning lets the switches of a case move, as a study does.
func turning(m *casetest.Model) {
	for i, w := range m.Params.Switch {
		m.Params.Now[i] = w.Before
	}
	m.Apply()
	m.Params.Turn = func(now []float64) (*network.Params, error) {
		p := m.Net.NewParams()
		p.Now = now
		for _, set := range m.Set {
			if err := set(m.Values, p); err != nil {
				return nil, err
			}
		}
		return p, nil
	}
}
