package quantity

import (
	"math"
	"slices"
	"strconv"
	"testing"

	"pgregory.net/rapid"
)

func TestNumber(t *testing.T) {
	for _, c := range []struct {
		v      float64
		digits int
		want   string
	}{
		{0, 0, "0"}, {math.Copysign(0, -1), 0, "0"}, {25, 0, "25"}, {0.35, 0, "0.35"},
		{1, 0, "1"}, {-1.5, 0, "-1.5"}, {123.456, 0, "123.5"}, {1234.56, 0, "1235"},
		{123456, 0, "123500"}, {9999.6, 0, "10000"}, {0.00012345, 0, "0.0001234"},
		{0.000012345, 0, "1.234e-5"}, {1.5e7, 0, "1.5e7"}, {1e100, 0, "1e100"}, {-2e-9, 0, "-2e-9"},
		{9.9999e6, 0, "1e7"}, {math.Pi, 7, "3.141593"}, {math.Pi, 1, "3"}, {100, 1, "100"}, {0.7, 17, "0.69999999999999996"},
	} {
		if got := Number(c.v, c.digits); got != c.want {
			t.Errorf("Number(%v, %d) = %s, want %s", c.v, c.digits, got, c.want)
		}
	}
}

func TestFormat(t *testing.T) {
	for _, c := range []struct {
		text  string // the value
		print Print
		kind  Kind
		want  string
	}{
		{"0.35 K/W", Print{}, Plain, "0.35 K/W"},
		{"0.0023 K/W", Print{}, Plain, "2.3 mK/W"},
		{"12000 J/K", Print{}, Plain, "12 kJ/K"},
		{"12000 J/K", Print{Unit: "J/K"}, Plain, "12000 J/K"},
		{"999.96 W", Print{}, Plain, "1 kW"},
		{"-2500 W", Print{}, Plain, "-2.5 kW"},
		{"0 W", Print{}, Plain, "0 W"},
		{"25 W", Print{Unit: "BTU/h"}, Plain, "85.3 BTU/h"},
		{"6 cm²", Print{}, Plain, "6 cm²"},
		{"0.6 m²", Print{}, Plain, "0.6 m²"},
		{"2 L", Print{}, Plain, "2 L"},
		{"416.3 K", Print{}, Level, "143.2 °C"},
		{"273.15 K", Print{}, Level, "0 °C"},
		{"293.15 K", Print{Unit: "°F"}, Level, "68 °F"},
		{"293.15 K", Print{Unit: "K", Digits: 5}, Level, "293.15 K"},
		{"5 K", Print{}, Difference, "5 K"},
		{"5 mK", Print{}, Difference, "5 mK"},
		{"5 K", Print{Unit: "°C"}, Difference, "5 K"},
		{"5 K", Print{Unit: "°F"}, Difference, "9 Δ°F"},
		{"0.35 K/W", Print{Unit: "°F·h/BTU", Digits: 3}, Plain, "0.185 °F·h/BTU"},
		{"790 s", Print{}, Plain, "13.17 min"},
		{"90 s", Print{}, Plain, "90 s"},
		{"0.35", Print{}, Plain, "0.35"},
		{"0.35", Print{Unit: "%"}, Plain, "35 %"},
		{"90°", Print{Unit: "°"}, Plain, "90°"},
		{"2.5 bar", Print{}, Gauge, "2.5 bar(g)"},
		{"2.5 bar", Print{}, Absolute, "2.5 bar(a)"},
		{"2.5 bar", Print{Unit: "psi"}, Plain, "36.26 psi"},
		{"2.5 bar", Print{Unit: "psig"}, Gauge, "36.26 psig"},
		{"25 W", Print{Unit: "s"}, Plain, "25 W"},      // a unit that does not fit
		{"25 W", Print{Unit: "foo"}, Plain, "25 W"},    // no unit at all
		{"5 K", Print{Unit: "Δ°C"}, Level, "5 K"},      // no level
		{"3 kg·m/A", Print{}, Plain, "3 kg·m/A"},       // no name
		{"3 1/(m·A)", Print{}, Plain, "3 1/(m·A)"},     // nor above the line
		{"3 W/(m·K)", Print{}, Plain, "3 W/(m·K)"},     //
		{"3e12 W", Print{}, Plain, "3000 GW"},          // beyond the last of the ladder
		{"0.001 pW", Print{}, Plain, "1e-6 nW"},        // below the first
		{"80 W/(m²·K)", Print{}, Plain, "80 W/(m²·K)"}, //
	} {
		v := parsed(t, c.text)[0]
		if got := c.print.Format(v.SI, v.Dim, c.kind); got != c.want {
			t.Errorf("%s as %+v: %s, want %s", c.text, c.print, got, c.want)
		}
	}
}

func TestColumn(t *testing.T) {
	for _, c := range []struct {
		v    []float64
		want []string
	}{
		{[]float64{18, 143.21, -5.25}, []string{"18.0", "143.2", "-5.2"}},
		{[]float64{0, 0}, []string{"0", "0"}},
		{[]float64{-1e-14, 20, 25}, []string{"0.00", "20.00", "25.00"}},
		{[]float64{9999.9, 1}, []string{"10000", "1"}},
		{[]float64{1e-3, 250}, []string{"0.001", "250"}},
		{[]float64{1e9, 2e9}, []string{"1e9", "2e9"}},
		{nil, []string{}},
	} {
		if got := Column(c.v, 0); !slices.Equal(got, c.want) {
			t.Errorf("%v: %q, want %q", c.v, got, c.want)
		}
	}
}

func TestConvert(t *testing.T) {
	for _, c := range []struct {
		si   float64
		unit string
		kind Kind
		want float64
	}{
		{273.15, "°C", Level, 0}, {310.15, "°F", Level, 98.6}, {5, "°C", Difference, 5}, {5, "°F", Difference, 9},
		{0.5, "%", Plain, 50}, {1055.05585262, "Btu", Plain, 1}, {3600, "h", Plain, 1},
	} {
		got, err := Convert(c.si, c.unit, c.kind)
		if err != nil || math.Abs(got-c.want) > 1e-13*math.Abs(c.want) {
			t.Errorf("%v in %s: %v, %v", c.si, c.unit, got, err)
		}
	}
	for _, c := range []struct {
		unit string
		kind Kind
	}{{"W/m·K", Plain}, {"bar(g)", Absolute}, {"Δ°C", Level}} {
		if _, err := Convert(1, c.unit, c.kind); err == nil {
			t.Errorf("%s is taken for kind %d", c.unit, c.kind)
		}
	}
}

// What Full writes gives the same double when read again, and no shorter
// decimal does.
func TestFullReadsBack(t *testing.T) {
	for _, c := range []struct {
		text, unit string
		kind       Kind
	}{
		{"40", "°C", Level}, {"98.6", "°F", Level}, {"-0.1", "°C", Level}, {"0", "°C", Level}, {"-273.149", "°C", Level}, {"1e20", "min", Plain}, {"1234567", "min", Plain}, {"1.5e-9", "h", Plain},
		{"0.1", "psi", Plain}, {"13.2", "min", Plain}, {"1", "BTU/(h·ft²·°F)", Plain},
	} {
		v := parsed(t, c.text+" "+c.unit)[0]
		s, err := NewScale(c.unit, c.kind)
		if err != nil {
			t.Fatal(err)
		}
		if got := s.Full(v.SI); got != c.text {
			t.Errorf("%s %s: %s", c.text, c.unit, got)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		unit := rapid.SampledFrom([]string{"°C", "°F", "K", "psi", "min", "gpm", "%", "BTU/(h·ft²·°F)"}).Draw(t, "unit")
		kind := Plain
		if unit[0] == 0xc2 {
			kind = Level
		}
		si := rapid.Float64Range(1e-3, 1e6).Draw(t, "si")
		s, err := NewScale(unit, kind)
		if err != nil {
			t.Fatal(err)
		}
		v, err := Parse(s.Full(si) + " " + unit)
		if err != nil || v.SI != si {
			t.Fatalf("%v %s: %s reads %v, %v", si, unit, s.Full(si), v.SI, err)
		}
	})
}

func TestTimes(t *testing.T) {
	for _, c := range []struct {
		span float64
		unit string
	}{{0, "s"}, {1e-9, "ns"}, {1e-4, "µs"}, {0.5, "ms"}, {10, "s"}, {300, "s"}, {3600, "min"}, {10800, "min"}, {36000, "h"}, {86400, "h"}, {864000, "d"}, {-3600, "min"}} {
		unit, factor := FitTime(c.span)
		if v := parsed(t, "1 "+unit)[0]; unit != c.unit || v.SI != factor {
			t.Errorf("%v s: %s of %v s, want %s", c.span, unit, factor, c.unit)
		}
	}
	for s, want := range map[float64]string{0: "0 s", 792: "13.2 min", 93960: "26.1 h", 1.5: "1.5 s", 0.0123: "12.3 ms", 4.5e-5: "45 µs", 3e-8: "30 ns", 1e6: "11.6 d", 1e9: "31.7 a", 119.96: "120 s", -792: "-13.2 min", 0.99999: "1 s"} {
		if got := Duration(s); got != want {
			t.Errorf("Duration(%v) = %s, want %s", s, got, want)
		}
	}
}

func TestNearest(t *testing.T) {
	among := []string{"case", "sink", "ambient", "node_1", "R"}
	for word, want := range map[string]string{"cse": "case", "snk": "sink", "csae": "case", "ambeint": "ambient", "AMBIENT": "ambient", "node1": "node_1", "amb": "", "x": "", "r": "R", "junction": "", "": ""} {
		got, ok := Nearest(word, among)
		if got != want || ok != (want != "") {
			t.Errorf("Nearest(%q) = %q, want %q", word, got, want)
		}
	}
	if got, _ := Nearest("case", []string{"case"}); got != "" {
		t.Errorf("a word is nearest to itself: %q", got)
	}
}

// Dimensions form a group: (a·b)/b = a, and powers add.
func TestDimensionAlgebra(t *testing.T) {
	dim := rapid.Custom(func(t *rapid.T) Dim {
		var d Dim
		for i := range d {
			d[i] = int8(rapid.IntRange(-9, 9).Draw(t, "e"+strconv.Itoa(i)))
		}
		return d
	})
	rapid.Check(t, func(t *rapid.T) {
		a, b := dim.Draw(t, "a"), dim.Draw(t, "b")
		ab, ok := a.plus(b, 1)
		if !ok {
			t.Fatal("beyond the range")
		}
		if back, _ := ab.plus(b, -1); back != a {
			t.Fatalf("%v·%v/%v = %v", a, b, b, back)
		}
		square, _ := a.times(2)
		if root, ok := square.power(0.5); !ok || root != a {
			t.Fatalf("√(%v²) = %v", a, root)
		}
		v, err := Parse("1 " + UnitOf(a))
		if err != nil || v.Dim != a || v.SI != 1 {
			t.Fatalf("%v is printed as %s, which is read as %v %v, %v", a, UnitOf(a), v.SI, v.Dim, err)
		}
	})
}
