package quantity

import (
	"errors"
	"strings"
	"testing"
)

func dimOf(t testing.TB, unit string) Dim { return parsed(t, "1 "+unit)[0].Dim }

func TestWant(t *testing.T) {
	for _, c := range []struct {
		text, unit string
		kind       Kind
		want       float64
	}{
		{"0.35 K/W", "K/W", Plain, 0.35},
		{"40 °C", "K", Level, 313.15},
		{"40 K", "K", Level, 40},
		{"40 K", "K", Difference, 40},
		{"9 Δ°F", "K", Difference, 5},
		{"2 bar", "Pa", Gauge, 200000},
		{"2 bar", "Pa", Plain, 200000},
		{"2 bar(g)", "Pa", Gauge, 200000},
		{"0 K", "K", Level, 0},
		{"-5 K", "K", Difference, -5},
		{"-459.67 °F", "K", Level, 0},
	} {
		v := parsed(t, c.text)[0]
		got, err := v.Want(dimOf(t, c.unit), c.kind)
		if err != nil || got != c.want {
			t.Errorf("%s: %v, %v", c.text, got, err)
		}
	}
}

func TestWantRefuses(t *testing.T) {
	for _, c := range []struct {
		text, unit string
		kind       Kind
		message    string
	}{
		{"0.35 W/K", "K/W", Plain, `"0.35 W/K" is a thermal conductance (W/K); expected a thermal resistance (K/W); did you mean "= 1/(0.35 W/K)"?`},
		{"5 °C", "K", Difference, `"5 °C" is a temperature level (°C, K); expected a temperature difference (K); did you mean "5 K"?`},
		{"9 °F", "K", Difference, `"9 °F" is a temperature level (°C, K); expected a temperature difference (K); did you mean "9 Δ°F"?`},
		{"5 Δ°C", "K", Level, `"5 Δ°C" is a temperature difference (K); expected a temperature level (°C, K); did you mean "5 °C"?`},
		{"-5 K", "K", Level, `"-5 K" is below absolute zero; expected a level above −273.15 °C`},
		{"-300 °C", "K", Level, `"-300 °C" is below absolute zero; expected a level above −273.15 °C`},
		{"40 C", "K", Level, `"40 C" is a charge (C); expected a temperature level (°C, K); did you mean "40 °C"?`},
		{"0.35 C/W", "K/W", Plain, `"0.35 C/W" is a quantity in s⁴·A/(kg·m²); expected a thermal resistance (K/W); did you mean "0.35 °C/W"?`},
		{"1 BTU/(h·ft²·F)", "W/(m²·K)", Plain, `"1 BTU/(h·ft²·F)" is a quantity in kg²·m²/(s⁷·A²); expected a heat transfer coefficient (W/(m²·K)); did you mean "1 BTU/(h·ft²·°F)"?`},
		{"10 S", "s", Plain, `"10 S" is an electrical conductance (S); expected a time (s); did you mean "10 s"?`},
		{"10", "s", Plain, `"10" is a plain number; expected a time (s); did you mean "10 s"?`},
		{"40", "K", Level, `"40" is a plain number; expected a temperature level (°C, K); did you mean "40 °C"?`},
		{"10 %", "s", Plain, `"10 %" is a plain number; expected a time (s)`},
		{"10 m", "s", Plain, `"10 m" is a length (m); expected a time (s)`},
		{"10 m", "1", Plain, `"10 m" is a length (m); expected a plain number`},
		{"2 bar(g)", "Pa", Absolute, `"2 bar(g)" is a gauge pressure, bar(g); expected an absolute pressure, bar(a); did you mean "2 bar"?`},
		{"-2 bar", "Pa", Absolute, `"-2 bar" is below vacuum; expected an absolute pressure of 0 or more`},
	} {
		v := parsed(t, c.text)[0]
		_, err := v.Want(dimOf(t, c.unit), c.kind)
		var e *DimensionError
		if !errors.As(err, &e) {
			t.Errorf("%s: %v", c.text, err)
			continue
		}
		if err.Error() != c.message {
			t.Errorf("%s:\n got %s\nwant %s", c.text, err, c.message)
		}
		if e.Suggest != "" {
			x, err := Compile(e.Suggest, testNames())
			if err != nil {
				t.Error(err)
				continue
			}
			w, err := x.Eval(nil)
			if err != nil {
				t.Error(err)
			} else if _, err := w.Want(dimOf(t, c.unit), c.kind); err != nil {
				t.Errorf("%s: the suggestion: %v", c.text, err)
			}
		}
	}
}

func TestWantOfAnExpression(t *testing.T) {
	e, err := Compile("= 2 W * 3", testNames())
	if err != nil {
		t.Fatal(err)
	}
	v, err := e.Eval(nil)
	if err != nil {
		t.Fatal(err)
	}
	_, err = v.Want(dimTime, Plain)
	if err == nil || !strings.HasPrefix(err.Error(), `"= 2 W * 3" comes to a power (W); expected a time (s)`) {
		t.Error(err)
	}
}
