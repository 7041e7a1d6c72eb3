package quantity

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"
)

// The names every expression below may use.
var (
	exprNames  = []string{"roof", "t", "amb", "k", "area", "m", "fan.speed", "p", "dT", "h"}
	exprValues = []string{"3", "80 °C", "20 °C", "2 W/(m·K)", "2 m²", "3 kg", "5 rpm", "3 bar(g)", "4 Δ°C", "9 W/(m²·K)"}
)

func TestEval(t *testing.T) {
	given := parsed(t, exprValues...)
	for _, c := range []struct {
		text string
		want string // what Parse reads
	}{
		{"= roof * 2 mm", "6 mm"},
		{"roof*2 mm", "6 mm"},
		{"= 2 mm + 0.5 in", "14.7 mm"},
		{"= 20 °C + 5 K", "25 °C"},
		{"= 5 K + 20 °C", "25 °C"},
		{"= amb - 12 K", "8 °C"},
		{"= t - amb", "60 Δ°C"},
		{"= t - dT", "76 °C"},
		{"= 300 K + 5 K", "305 K"},
		{"= 300 K - 20 °C", "6.85 Δ°C"},
		{"= -20 °C + 5 K", "-15 °C"},
		{"= −20 °C", "-20 °C"},
		{"= -dT", "-4 Δ°C"},
		{"= abs(-5 K)", "5 Δ°C"},
		{"= min(t, amb, 30 °C)", "20 °C"},
		{"= max(t, 300 K)", "80 °C"},
		{"= max(2 mm, 3 in, 1 mil)", "3 in"},
		{"= min(2,3)", "2"},
		{"= min(2; 1.5)", "1.5"},
		{"= 10 K/W * 5 W + amb", "70 °C"},
		{"= 10 K/W * 5 W", "50 Δ°C"},
		{"= 0.1 + 0.2", "0.3"},
		{"= 2 mm/(k*area)", "0.0005 K/W"},
		{"= 2 mm / (k * area)", "0.0005 K/W"},
		{"= 1/(h*area)", "0.055555555555555555555555555555555555 K/W"},
		{"= 20 W/(m·K) * 2", "40 W/(m·K)"},
		{"= 20 W / m", "6.66666666666666666666666666666 W/kg"},
		{"= 20 W/K*roof", "60 W/K"},
		{"= 20 W·m", "20 W·m"},
		{"= 2 · roof", "6"},
		{"= roof·2 mm", "6 mm"},
		{"= 2 mm·roof", "6 mm"},
		{"= 2 mm × roof", "6 mm"},
		{"= 2 mm^2", "2 mm²"},
		{"= (2 mm)^2", "4 mm²"},
		{"= roof²", "9"},
		{"= (2 mm)⁻¹", "500 1/m"},
		{"= -2^2", "-4"},
		{"= 2^-1", "0.5"},
		{"= 2^3^2", "512"},
		{"= - -2", "2"},
		{"= 2 - -2", "4"},
		{"= +2", "2"},
		{"= 10 % * roof", "0.3"},
		{"= 110% * 2 W", "2.2 W"},
		{"= 3 min", "180 s"},
		{"= 3 h", "3 h"},
		{"= fan.speed * 2", "10 rpm"},
		{"= 0.5/(1 K)", "0.5 1/K"},
		{"= 0.5/1 K", "0.5 1/K"},
		{"= p - 2 bar", "1 bar(g)"},
		{"= 5 bar(g) - 2 bar(g)", "300000 Pa"},
		{"= (((((1)))))", "1"},
		{"= sqrt(4 m²)", "2 m"},
		{"= 1e3*2E-3", "2"},
	} {
		e, err := Compile(c.text, testNames(exprNames...))
		if err != nil {
			t.Errorf("%s: %v", c.text, err)
			continue
		}
		got, err := e.Eval(given)
		if err != nil {
			t.Errorf("%s: %v", c.text, err)
			continue
		}
		want := parsed(t, c.want)[0]
		kind := want.Kind
		if strings.Contains(c.text, "bar(g) - 2 bar(g)") {
			kind = Difference
		}
		if got.SI != want.SI || got.Dim != want.Dim || got.Kind != kind || got.Text != c.text {
			t.Errorf("%s = %v %v kind %d, want %v %v kind %d", c.text, got.SI, got.Dim, got.Kind, want.SI, want.Dim, kind)
		}
	}
}

// Without fractions the doubles may differ in the last place, and nothing is
// allocated.
func TestEvalInDoubles(t *testing.T) {
	given := parsed(t, "2 mm", "200 W/(m·K)", "4 cm²")
	e, err := Compile("= sqrt(2) * pi * thickness/(k*area) + max(0.02 K/W, 1e-3 K/W)", testNames("thickness", "k", "area"))
	if err != nil {
		t.Fatal(err)
	}
	with, err := e.Eval(given)
	if err != nil {
		t.Fatal(err)
	}
	for i := range given {
		given[i].Exact = nil
	}
	without, err := e.Eval(given)
	if err != nil || math.Abs(with.SI-without.SI) > 4e-16*with.SI || without.Exact != nil {
		t.Errorf("%v %v, %v", with.SI, without, err)
	}
	if n := testing.AllocsPerRun(100, func() { _, _ = e.Eval(given) }); n != 0 {
		t.Errorf("%v allocations", n)
	}
	if got := e.Uses(); !slices.Equal(got, []int{0, 1, 2}) || e.Constant() {
		t.Errorf("uses %v", got)
	}
}

func TestCompileRefuses(t *testing.T) {
	for _, c := range []struct{ text, suggest, found string }{
		{"= 20 W/[m]", "", "m is both a unit and a name here"},
		{"= 20 W*[m]", "", "m is both a unit and a name here"},
		{"= 2 W/[s/K]", "= 2 W/(s·K)", ""},
		{"= 2 W/[s·K] * 2", "= 2 W/(s·K) * 2", ""},
		{"= 2 [w]/k", "= 2 W/k", ""},
		{"= 5 % [of] t", "", ""},
		{"= 2 mm[^]roof", "", "a power of a unit"},
		{"= [bore]²", "", `"bore" is not defined`},
		{"= [sqrt]", "", `"sqrt" without its argument`},
		{"= [W]*2", "= 1 W*2", `"W" is a unit`},
		{"= 0.5/[K]", "= 0.5/1 K", ""},
		{"= roof [mm]", "= roof * 1 mm", ""},
		{"= 2 [roof]", "= 2 * roof", ""},
		{"= 2 mm [roof]", "= 2 mm * roof", ""},
		{"= roof [(]2)", "= roof * (2)", ""},
		{"= roof [2]", "", "a number"},
		{"= [(]roof", "", "a ( that is not closed"},
		{"= min[(]roof", "", "a ( that is not closed"},
		{"= roof[)]", "", "a ) that nothing opens"},
		{"= []", "", "the end"},
		{"[]", "", "the end"},
		{"= roof +[]", "", "the end"},
		{"= roof + [*] 2", "", ""},
		{"= 2 [**] 3", "= 2 ^ 3", ""},
		{"= 1[,]5 * 2", "= 1.5 * 2", ""},
		{"= [sin](2)", "", `"sin" is not defined`},
		{"= [sqrt(2, 3)]", "", "too many arguments"},
		{"= 1 [=] 2", "", ""},
		{"= roof [;] 2", "", ""},
		{"= [1e999]", "", ""},
		{"= 2 [gal]", "= 2 US gal", ""},
		{"= [\"2 mm\"]", "", ""},
	} {
		off := strings.IndexByte(c.text, '[')
		n := strings.IndexByte(c.text, ']') - off - 1
		text := strings.NewReplacer("[", "", "]", "").Replace(c.text)
		_, err := Compile(text, testNames(exprNames...))
		var e *SyntaxError
		if !errors.As(err, &e) {
			t.Errorf("%q: %v", text, err)
			continue
		}
		if e.Off != off || (e.Len != n && !strings.Contains(text, `"`)) || e.Suggest != c.suggest || (c.found != "" && e.Found != c.found) {
			t.Errorf("%q: %d+%d %v; want %d+%d %q", text, e.Off, e.Len, err, off, n, c.suggest)
		}
		if e.Suggest != "" {
			if _, err := Compile(e.Suggest, testNames(exprNames...)); err != nil {
				t.Error(err)
			}
		}
	}
}

func TestUnknownNameIsHandedOver(t *testing.T) {
	_, err := Compile("= 2 * rooof.x + 1", testNames("roof"))
	var e *SyntaxError
	if !errors.As(err, &e) || e.Name != "rooof.x" || e.Off != 6 || e.Len != 7 {
		t.Errorf("%+v", err)
	}
}

func TestEvalRefuses(t *testing.T) {
	given := parsed(t, exprValues...)
	for _, c := range []struct{ text, found string }{
		{"= [5 % * t]", "a part or a multiple of a level"},
		{"= 1 + [t * 2]", "a part or a multiple of a level"},
		{"= [t / amb]", "a part or a multiple of a level"},
		{"= [t^2]", "a power of a level"},
		{"= [t + amb]", "a level plus a level"},
		{"= [amb + 5 °C]", "a level plus a level"},
		{"= [dT - amb]", "a difference minus a level"},
		{"= [-t]", "the negative of a level"},
		{"= [abs(t)]", "the magnitude of a level"},
		{"= [min(t, dT)]", "a level beside a difference, or two kinds of level"},
		{"= [min(t, 2 W)]", "a temperature level (°C, K) beside a power (W)"},
		{"= [2 mm + 3 s] + 1", "a length (m) plus a time (s)"},
		{"= [2 mm - 3]", "a length (m) minus a plain number"},
		{"= [p*2]", "a part or a multiple of a level"},
		{"= [2 bar(a) - p]", "a gauge and an absolute pressure"},
		{"= [2 bar - p]", "a difference minus a level"},
		{"= [sqrt(2 m)]", "a power that leaves a unit in fractions"},
		{"= [2 m^2^0.3]", ""},
		{"= [2^roof^(1 m)]", ""},
		{"= [ln(2 m)]", "a function of a length (m)"},
		{"= [exp(t)]", "a function of a temperature level (°C, K)"},
		{"= [1/(roof - 3)]", "a division by zero"},
		{"= [0^-1]", "a result that is not a finite number"},
		{"= [(-8)^(1/3)]", "a result that is not a finite number"},
		{"= [1e300^2]", "a result that is not a finite number"},
		{"= [exp(1000)]", "a result that is not a finite number"},
		{"= [sqrt(-1)]", "the square root of a negative number"},
		{"= [ln(0)]", "the logarithm of a number that is not positive"},
		{"= [((((m^20)^20)^20))]", ""},
	} {
		off := strings.IndexByte(c.text, '[')
		n := strings.IndexByte(c.text, ']') - off - 1
		text := strings.NewReplacer("[", "", "]", "").Replace(c.text)
		e, err := Compile(text, testNames(exprNames...))
		if err != nil {
			if c.found != "" {
				t.Errorf("%s: %v", text, err)
			}
			continue
		}
		_, err = e.Eval(given)
		var de *DimensionError
		var ve *ValueError
		switch {
		case errors.As(err, &de):
		case errors.As(err, &ve):
			de = &DimensionError{Off: ve.Off, Len: ve.Len, Found: ve.Found}
		default:
			t.Errorf("%s: %v", text, err)
			continue
		}
		if c.found != "" && (de.Off != off || de.Len != n || !strings.HasSuffix(de.Found, " is "+c.found)) {
			t.Errorf("%s: %d+%d %v, want %d+%d", text, de.Off, de.Len, err, off, n)
		}
	}
}

func TestExpressionsAreBounded(t *testing.T) {
	for _, s := range []string{
		strings.Repeat("(", 70) + "1" + strings.Repeat(")", 70),
		strings.Repeat("-", 1000) + "1",
		strings.Repeat("2^", 500) + "1",
		"min(" + strings.Repeat("1,", 20) + "1)",
		strings.Repeat("1+", 1500) + "1",
		strings.Repeat("min(1,(", 100),
	} {
		if _, err := Compile(s, testNames()); err == nil {
			t.Errorf("%.20s… is accepted", s)
		}
	}
	e, err := Compile(strings.Repeat("9999^9*", 200)+"1", testNames())
	if err != nil {
		t.Fatal(err)
	}
	if _, err := e.Eval(nil); err == nil {
		t.Error("an overflow passes")
	}
	e, err = Compile("1/3"+strings.Repeat("*(1+1/7)", 200), testNames())
	if err != nil {
		t.Fatal(err)
	}
	if v, err := e.Eval(nil); err != nil || v.SI <= 0 || (v.Exact != nil && bits(v.Exact) > maxBits) {
		t.Errorf("%v %v", v.SI, err)
	}
}

func TestNames(t *testing.T) {
	for s, want := range map[string]bool{
		"roof": true, "a.b": true, "_x1": true, "größe": true, "λ": true,
		"": false, "1a": false, "a b": false, "a.": false, ".a": false, "a-b": false, "pi": false, "min": false, "a..b": false,
	} {
		if IsName(s) != want {
			t.Errorf("IsName(%q) = %v", s, !want)
		}
	}
}
