package quantity

import (
	"errors"
	"math/big"
	"strings"
	"testing"
)

func TestParse(t *testing.T) {
	for _, c := range []struct {
		text  string
		exact string // in SI
		unit  string
		kind  Kind
	}{
		{"5", "5", "1", Plain},
		{"-5", "-5", "1", Plain},
		{"− 5 W", "-5", "W", Plain},
		{"+.5e1 W", "5", "W", Plain},
		{"5.E-1W", "0.5", "W", Plain},
		{" 5\u00a0W ", "5", "W", Plain},
		{"5\u202fm²\u2009K/W", "5", "m²·K/W", Plain},
		{"10 %", "0.1", "1", Plain},
		{"10%/K", "0.1", "1/K", Plain},
		{"3 ‰", "0.003", "1", Plain},
		{"3 ppm/K", "0.000003", "1/K", Plain},
		{"0.004 /K", "0.004", "1/K", Plain},
		{"0.004 1/K", "0.004", "1/K", Plain},
		{"0.35 K/W", "0.35", "K/W", Plain},
		{"0.35 °C/W", "0.35", "K/W", Plain},
		{"1.8 °F·h/Btu", "180000000000/52752792631", "K/W", Plain},
		{"2 W/(m·K)", "2", "W/(m·K)", Plain},
		{"2 W/(m*K)", "2", "W/(m·K)", Plain},
		{"2 W·m⁻¹·K⁻¹", "2", "W/(m·K)", Plain},
		{"2 W m^-1 K^-1", "2", "W/(m·K)", Plain},
		{"2 W m^(-1)·K^-1", "2", "W/(m·K)", Plain},
		{"2 W⋅(m·K)^-1", "2", "W/(m·K)", Plain},
		{"2 m²·K/W", "2", "m²·K/W", Plain},
		{"2 m2·K / W", "2", "m²·K/W", Plain},
		{"2 J/(kg K)", "2", "J/(kg·K)", Plain},
		{"2 mL", "0.000002", "m³", Plain},
		{"2 ml", "0.000002", "m³", Plain},
		{"2 m³/h", "1/1800", "m³/s", Plain},
		{"2 mbar", "200", "Pa", Plain},
		{"2 µm", "0.000002", "m", Plain},
		{"2 μm", "0.000002", "m", Plain},
		{"2 um", "0.000002", "m", Plain},
		{"2 dam", "20", "m", Plain},
		{"2 min", "120", "s", Plain},
		{"2 Mm", "2000000", "m", Plain},
		{"2 mm^2/s", "0.000002", "m²/s", Plain},
		{"2 ohm", "2", "Ω", Plain},
		{"2 kΩ", "2000", "Ω", Plain},
		{"2 mΩ", "0.002", "Ω", Plain},
		{"2 US gal/min", "473176473/3750000000000", "m³/s", Plain},
		{"2 galUS", "0.007570823568", "m³", Plain},
		{"40 °C", "313.15", "K", Level},
		{"40 ℃", "313.15", "K", Level},
		{"40 ° C", "313.15", "K", Level},
		{"40 degC", "313.15", "K", Level},
		{"-40 °C", "233.15", "K", Level},
		{"-40 °F", "233.15", "K", Level},
		{"104 ℉", "313.15", "K", Level},
		{"40 K", "40", "K", Either},
		{"40 mK", "0.04", "K", Either},
		{"9 °R", "5", "K", Either},
		{"9 Δ°F", "5", "K", Difference},
		{"5 W·K/W", "5", "K", Difference},
		{"2 bar", "200000", "Pa", Plain},
		{"2 bar(g)", "200000", "Pa", Gauge},
		{"2 bar (g)", "200000", "Pa", Gauge},
		{"2 barg", "200000", "Pa", Gauge},
		{"2 kPa(a)", "2000", "Pa", Absolute},
		{"5 rpm", "1/12", "1/s", Plain},
		{"5 kW/(m²·°C)", "5000", "W/(m²·K)", Plain},
		{"123456789012345678901234567890 m", "123456789012345678901234567890", "m", Plain},
		{"1e-300 m", "1e-300", "m", Plain},
	} {
		v, err := Parse(c.text)
		if err != nil {
			t.Errorf("%q: %v", c.text, err)
			continue
		}
		want := fraction(t, c.exact)
		if v.Exact.Cmp(want) != 0 || UnitOf(v.Dim) != c.unit || v.Kind != c.kind || v.Text != c.text {
			t.Errorf("%q = %v %s kind %d, want %v %s kind %d", c.text, v.Exact, UnitOf(v.Dim), v.Kind, want, c.unit, c.kind)
		}
		if f, _ := want.Float64(); f != v.SI {
			t.Errorf("%q = %v, want %v", c.text, v.SI, f)
		}
	}
}

// fraction reads "a", "a/b" or "a/b/c".
func fraction(t *testing.T, s string) *big.Rat {
	t.Helper()
	var r *big.Rat
	for _, part := range strings.Split(s, "/") {
		x, ok := new(big.Rat).SetString(part)
		if !ok {
			t.Fatalf("%s is no fraction", s)
		}
		if r == nil {
			r = x
		} else {
			r.Quo(r, x)
		}
	}
	return r
}

func TestAngles(t *testing.T) {
	v := parsed(t, "90°")[0]
	if v.SI != 1.5707963267948966 || v.Exact != nil || v.Dim != dimNone {
		t.Errorf("90° = %v %v", v.SI, v.Exact)
	}
}

// Each is refused, at the place between the brackets; where there is a
// suggestion it is accepted.
func TestParseRefuses(t *testing.T) {
	for _, c := range []struct{ text, suggest, found string }{
		{"2 W/[m·K]", "2 W/(m·K)", `how much of "W/m·K" is below the line is not clear`},
		{"2 W/[m/K]", "2 W/(m·K)", ""},
		{"2 W/[m K]", "2 W/(m·K)", ""},
		{"2 W/[m^2/K]", "2 W/(m^2·K)", ""},
		{"2 J/[(kg)/K/s]", "2 J/((kg)·K·s)", ""},
		{"2 [k°C]", "2 kK", `"k°C" is not a unit`},
		{"2 [°C]²", "2 K²", "a power of °C"},
		{"2 W/(m·[°C]²)", "2 W/(m·K²)", ""},
		{"2 [gal]", "2 US gal", `"gal" is not a unit`},
		{"2 [gal]/min", "2 US gal/min", ""},
		{"2 [MM]", "2 mm", ""},
		{"2 [w]/k", "2 W/K", ""},
		{"2 [w]/m/k", "2 W/(m·K)", ""},
		{"2 [KW]", "2 kW", ""},
		{"2 [Kpa]", "2 kPa", ""},
		{"2 [mpa]", "2 mPa", ""},
		{"2 [MPA]", "2 MPa", ""},
		{"2 [hz]", "2 Hz", ""},
		{"2 W/m[2]K", "2 W/(m^2·K)", "a symbol that touches a power"},
		{"2 W/m[-]K", "2 W/(m·K)", "a - between units"},
		{"2 Pa[.]s", "2 Pa·s", "a . between units"},
		{"2 [Nm]", "2 N·m", ""},
		{"2 [Nm]³/h", "", ""},
		{"2 [kPag]", "2 kPa(g)", ""},
		{"2 [ton]", "2 TR", ""},
		{"2 [cal]", "2 cal_IT", ""},
		{"2 [MBtu]/h", "2 kBtu/h", ""},
		{"2 [watts]", "2 W", ""},
		{"2 [hours]", "2 h", ""},
		{"2 [deg C]", "2 °C", ""},
		{"2 W/[degrees F]", "2 W/°F", ""},
		{"2 [foo]", "", `"foo" is not a unit`},
		{"2 [US]", "", ""},
		{"1[,]5 W", "1.5 W", ""},
		{"1[,]500 W", "", ""},
		{"1[_]500 W", "1500 W", ""},
		{"1.5[.]2 W", "", ""},
		{"[nan]", "", `"nan" is not a number`},
		{"[inf W]", "", ""},
		{"[1e400 W]", "", "a number too large to reckon with"},
		{"[1e308 kW]", "", "a number too large to reckon with"},
		{"[1e-310 W]", "", "a number too small to reckon with"},
		{"[1e999999999999999999] W", "", "a number with an exponent beyond ±400"},
		{"[1e-401] W", "", ""},
		{"[]", "", "nothing"},
		{"[  ]", "", "nothing"},
		{"[=] 5", "", "an expression"},
		{"5 W/[]", "", "the end"},
		{"5 [(]W", "", "a ( that is not closed"},
		{"5 W[)]", "5 W", ""},
		{"5 W/[/]K", "", ""},
		{"5 W[^]0.5", "", ""},
		{"5 W[^]", "", ""},
		{"5 W[^0]", "", ""},
		{"5 W [4]", "", "a number inside a unit"},
		{"5 W [(]m)", "", ""},
		{"5 [%]²³⁴", "", ""},
		{"0[x]10", "", ""},
	} {
		off := strings.IndexByte(c.text, '[')
		n := strings.IndexByte(c.text, ']') - off - 1
		text := strings.NewReplacer("[", "", "]", "").Replace(c.text)
		_, err := Parse(text)
		var e *SyntaxError
		if !errors.As(err, &e) {
			t.Errorf("%q: %v", text, err)
			continue
		}
		if (e.Off != off || e.Len != n) && c.text != "5 [%]²³⁴" {
			t.Errorf("%q: at %d+%d, want %d+%d: %v", text, e.Off, e.Len, off, n, err)
		}
		if e.Suggest != c.suggest {
			t.Errorf("%q: suggests %q, want %q", text, e.Suggest, c.suggest)
		}
		if c.found != "" && e.Found != c.found {
			t.Errorf("%q: found %q, want %q", text, e.Found, c.found)
		}
		if e.Want == "" {
			t.Errorf("%q: says not what is expected", text)
		}
		if e.Suggest != "" {
			parsed(t, e.Suggest)
		}
	}
}

func TestParseIsBounded(t *testing.T) {
	for _, s := range []string{
		strings.Repeat("9", 401) + " m",
		strings.Repeat("9", 5000),
		"1 " + strings.Repeat("m·", 1000) + "m",
		"1 " + strings.Repeat("(", 50) + "m" + strings.Repeat(")", 50),
		"1 ((((%^100)^100)^100)^100)",
		"1 ((qrad)^100)^100",
		"1 m^100·m^100",
		"1 m^101",
	} {
		if _, err := Parse(s); err == nil {
			t.Errorf("%.40q is accepted", s)
		} else if len(err.Error()) > 300 {
			t.Errorf("%.40q: a message of %d bytes", s, len(err.Error()))
		}
	}
	if v := parsed(t, strings.Repeat("9", 300)+"e-300 m")[0]; v.SI != 1 {
		t.Errorf("300 nines = %v", v.SI)
	}
}
