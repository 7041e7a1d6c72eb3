package laplace

import (
	"errors"
	"math"
	"testing"
)

// What the cycle of a system says of its period and its errors, waves alone say too.
func TestCommonPeriodOfWaves(t *testing.T) {
	pulse, err := Pulse(PulseTrain{Low: 0, High: 1, Width: 1, Period: 4})
	if err != nil {
		t.Fatal(err)
	}
	six := Sine(0, 1, 2*math.Pi/6, 0)
	for _, c := range []struct {
		name         string
		u            []Waveform
		period, from float64
	}{
		{"none", []Waveform{Constant(1), Step(0, 2, 30)}, 0, 30},
		{"one", []Waveform{pulse, Constant(1)}, 4, 0},
		{"4 s and 6 s", []Waveform{pulse, six}, 12, 0},
	} {
		p, from, err := CommonPeriod(c.u)
		if err != nil || math.Abs(p-c.period) > 1e-12 || from != c.from {
			t.Errorf("%s: %v from %v, %v; want %v from %v", c.name, p, from, err, c.period, c.from)
		}
	}
	var apart *NotCommensurate
	if _, _, err := CommonPeriod([]Waveform{pulse, Sine(0, 1, 1, 0)}); !errors.As(err, &apart) {
		t.Errorf("4 s and 2π s: %v", err)
	}
}
