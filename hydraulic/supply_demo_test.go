package hydraulic

import (
	"math"
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile/casetest"
)

// What the hand checks of the demo cases of pipes and pumps promise.
func TestSupplyDemosAreWhatTheirHandChecksSay(t *testing.T) {
	machines := casetest.Demo(t, "two-machines.toml", Vocabulary()...)
	m := machines.March(2400, "tee", "flow of valve_a", "flow of valve_b", "level of header")
	roof := casetest.Demo(t, "roof-pump.toml", Vocabulary()...)
	r := roof.March(10800, "flow of lift", "shaft power of lift", "level of roof")
	var events []network.Event // of the switch
	for _, e := range r.Events() {
		if strings.HasPrefix(e.What, "switched") {
			events = append(events, e)
		}
	}
	if len(events) != 7 {
		t.Fatalf("events %v", events)
	}
	for _, c := range []struct {
		what              string
		got, want, within float64
	}{
		{"surface over the floor before, m", m.At(3, 0), 1.18, 0.02},
		{"tee before, bar", m.At(0, 30) / 1e5, 0.553, 0.002},
		{"tee while B rinses, bar", m.At(0, 150) / 1e5, 0.37, 0.01},
		{"lowest, bar", m.Min(0, 0, 300).Y / 1e5, 0.325, 0.025},
		{"A while B rinses, m³/h", m.At(1, 150) * 3600, 3.05, 0.05},
		{"B, m³/h", m.At(2, 150) * 3600, 4.9, 0.05},
		{"the tank falls, m", m.At(3, 60) - m.At(3, 242), 0.18, 0.01},
		{"flow at the low level, L/s", litres(r.At(0, events[1].At+5)), 5.27, 0.03},
		{"flow at the high level, L/s", litres(r.Left(0, events[0].At)), 4.95, 0.03},
		{"filling, s", events[2].At - events[1].At, 1000, 20},
		{"emptying, s", events[1].At - events[0].At, 2400, 1},
		{"shaft, kW", r.At(1, events[1].At+500) / 1e3, 1.92, 0.04},
	} {
		if !(math.Abs(c.got-c.want) <= c.within) {
			t.Errorf("%s: %.4g, the hand check says %.4g", c.what, c.got, c.want)
		}
	}
}

// litres is a flow in L/s.
func litres(q float64) float64 { return q * 1000 }
