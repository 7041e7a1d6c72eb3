package thermal

import (
	"math"
	"testing"

	"lagbook/network/casefile/casetest"
)

// What the hand checks in the demo cases promise, of cases that are marched.
func TestMarchedDemoCasesAreWhatTheirHandChecksSay(t *testing.T) {
	type figure struct {
		what              string
		got, want, within float64
	}
	compare := func(name string, list []figure) {
		for _, c := range list {
			if math.Abs(c.got-c.want) > c.within {
				t.Errorf("%s, %s: %.4g, the hand check says %.4g", name, c.what, c.got, c.want)
			}
		}
	}

	m := casetest.Demo(t, "batch-oven.toml", Vocabulary()...)
	r := m.March(4*3600, "elements", "outside", "heat of control", "energy of control", "flow of element_glow", "load")
	end := 4 * 3600.0
	compare("batch oven", []figure{
		{"elements", r.At(0, end) - 273.15, 217, 1},
		{"outside", r.At(1, end) - 273.15, 30, 1},
		{"heat", r.At(2, end), 1410, 10},
		{"energy", r.At(3, end), 30.5e6, 0.5e6},
		{"glow", r.At(4, end), 236, 2},
	})
	if first, ok := r.First(5, 443.15, 0, end); !ok || first.T > 70*60 {
		t.Errorf("batch oven: load at 170 °C after %v", first)
	}

	m = casetest.Demo(t, "hot-water-tank.toml", Vocabulary()...)
	turning(m)
	r = m.March(8*3600, "tank", "energy of electric")
	compare("hot-water tank", []figure{
		{"after a draw", r.At(0, 100*60) - 273.15, 48.3, 0.1},
		{"before the next", r.At(0, 150*60) - 273.15, 58.5, 0.1},
		{"energy", r.At(1, 8*3600), 33e6, 0.2e6},
	})
	if events := r.Events(); len(events) != 2 || math.Abs(events[1].At-events[0].At-184*60) > 60 {
		t.Errorf("hot-water tank: switched %v", events)
	}

	m = casetest.Demo(t, "motor-duty.toml", Vocabulary()...)
	turning(m)
	r = m.March(6*3600, "winding", "frame", "stator")
	last := 350 * 60.0
	compare("motor", []figure{
		{"winding, highest", r.Max(0, last, 6*3600).Y - 273.15, 131, 1},
		{"winding, swing", r.Max(0, last, 6*3600).Y - r.Min(0, last, 6*3600).Y, 38, 1},
		{"frame", r.Integral(1, last, 6*3600)/600 - 273.15, 86, 1},
	})
}
