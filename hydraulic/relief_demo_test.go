package hydraulic

import (
	"testing"

	"lagbook/network/casefile/casetest"
)

// What the hand check in the demo of a press promises.
func TestPressCircuitIsWhatItsHandCheckSays(t *testing.T) {
	m := casetest.Demo(t, "press-circuit.toml", Vocabulary()...)
	tr := m.March(75, "header", "stored of header", "flow of stroke", "flow of gear", "flow of rv", "gas volume of header")
	isNear(t, "gas at 150 bar(g), L", tr.At(5, 0)*1e3, 21.41, 0.01)
	isNear(t, "pump, L/min", tr.At(3, 10)*6e4, 25.3, 0.05)
	on, _ := tr.First(0, 130e5, 0, 10)
	off, _ := tr.First(0, 165e5, 5, 20)
	isNear(t, "between the pump's pressures, L", (tr.At(5, on.T)-tr.At(5, off.T))*1e3, 3.69, 0.01)
	isNear(t, "stroke, L", tr.Integral(2, 0, 10)*1e3, 2.6, 0.15)
	isNear(t, "relief valve at the end of the push, bar(g)", tr.At(0, 58)/1e5, 193.4, 0.7)
	isNear(t, "relief valve, share of what it comes to", tr.At(4, 58)*6e4/60, (tr.At(0, 58)/1e5-180)/15, 1e-6)
	if tr.Balance() > 1e-5 {
		t.Errorf("the balance closes to %v", tr.Balance())
	}
}

// What the hand check in the demo of an impulse line promises.
func TestImpulseLineIsWhatItsHandCheckSays(t *testing.T) {
	m := casetest.Demo(t, "impulse-line.toml", Vocabulary()...)
	tr := m.March(3, "transmitter", "gas volume of transmitter")
	isNear(t, "bubble, cm³", tr.At(1, 0)*1e6, 0.506, 0.001)
	peak := tr.Max(0, 0, 3)
	isNear(t, "peak, bar(g)", peak.Y/1e5, 13.1, 0.1)
	trough := tr.Min(0, peak.T, peak.T+0.1)
	isNear(t, "half a swing, s", trough.T-peak.T, 0.133/2, 0.01)
}
