package study

import (
	"strconv"
	"testing"

	"lagbook/laplace"
)

func TestWaveWords(t *testing.T) {
	watts := func(v float64) string { return strconv.FormatFloat(v, 'g', 4, 64) + " W" }
	seconds := func(v float64) string { return strconv.FormatFloat(v, 'g', 4, 64) + " s" }
	points := func(pts ...[2]float64) laplace.Waveform {
		w, err := laplace.Points(pts)
		if err != nil {
			t.Fatal(err)
		}
		return w
	}
	stairs, err := laplace.Stairs([][2]float64{{0, 75}, {8, 60}})
	if err != nil {
		t.Fatal(err)
	}
	day, err := points([2]float64{0, 16}, [2]float64{10, 22}, [2]float64{24, 16}).Repeated(24)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		wave laplace.Waveform
		want string
	}{
		{laplace.Constant(12), "12 W, constant"},
		{laplace.Step(0, 10, 0), "0 W before 0 s, 10 W from 0 s"},
		{stairs.WithBefore(30), "30 W before 0 s, 75 W from 0 s, 60 W from 8 s"},
		{day, "straight from 16 W at 0 s to 22 W at 10 s to 16 W at 24 s, repeated every 24 s"},
		{points([2]float64{0, 1}, [2]float64{2, 3}, [2]float64{2, 5}), "straight from 1 W at 0 s to 3 W at 2 s, 5 W from 2 s"},
	} {
		if got := waveWords(c.wave, watts, seconds); got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
}

func TestTimeWords(t *testing.T) {
	p := Printer{digits: 4}
	for s, want := range map[float64]string{
		0: "0 s", 0.001: "1 ms", 0.12: "120 ms", 1: "1 s", 60: "1 min", 95: "95 s", 198.6: "3.31 min", 3600: "1 h", 4500: "75 min",
		4571: "76.18 min", 259200: "72 h", 94024.9768: "26.12 h", 1e7: "115.7 d", -90: "-90 s", 0.99999999: "1 s", 8e-4: "800 µs",
	} {
		if got := p.Time(s); got != want {
			t.Errorf("%v s is %q, want %q", s, got, want)
		}
	}
}

// A column of times is in the unit in which most come out even.
func TestTimeColumn(t *testing.T) {
	p := Printer{digits: 4}
	for _, c := range []struct {
		times []float64
		want  string
	}{
		{[]float64{0, 1200, 2400, 7200}, "min"}, {[]float64{0, 43200, 345600}, "h"}, {[]float64{0, 1, 10}, "s"}, {[]float64{0}, "s"}, {nil, "s"},
	} {
		if unit, _ := p.TimeUnit(c.times); unit != c.want {
			t.Errorf("%v in %s, want %s", c.times, unit, c.want)
		}
	}
}
