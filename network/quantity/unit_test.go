package quantity

import (
	"math"
	"math/big"
	"slices"
	"strconv"
	"testing"
)

func TestUnitsAreSortedAndNamedOnce(t *testing.T) {
	if !slices.IsSortedFunc(units, func(a, b unit) int {
		if a.sym < b.sym {
			return -1
		}
		return 1
	}) {
		t.Error("units are not in order")
	}
	for i := 1; i < len(units); i++ {
		if units[i].sym == units[i-1].sym {
			t.Errorf("%s stands twice", units[i].sym)
		}
	}
}

// A unit that is not base must be what its definition makes it. The right side
// is built from the units its definition names, in fractions.
func TestFactorsFollowFromTheirDefinitions(t *testing.T) {
	for _, c := range []struct{ unit, definition string }{
		{"1 lbf", "= 1 lb * 9.80665 m/s²"},
		{"1 psi", "= 1 lbf / 1 in²"},
		{"1 ksi", "= 1000 psi"},
		{"1 psf", "= 1 lbf / 1 ft²"},
		{"1 Btu", "= 4.1868 J/(g·K) * 1 lb * 1 Δ°F"},
		{"1 Btu_th", "= 4.184 J/(g·K) * 1 lb * 1 Δ°F"},
		{"1 kBtu", "= 1000 Btu"},
		{"1 MMBtu", "= 1e6 Btu"},
		{"1 TR", "= 12000 Btu / 1 h"},
		{"1 hp", "= 550 ft * 1 lbf / 1 s"},
		{"1 US gal", "= 231 in³"},
		{"1 US qt", "= 1 US gal / 4"},
		{"1 US pt", "= 1 US gal / 8"},
		{"1 US fl oz", "= 1 US gal / 128"},
		{"1 gpm", "= 1 US gal / 1 min"},
		{"1 gph", "= 1 US gal / 1 h"},
		{"1 imp gpm", "= 4.54609 L / 1 min"},
		{"1 cfm", "= 1 ft³ / 1 min"},
		{"1 ft", "= 12 in"},
		{"1 yd", "= 3 ft"},
		{"1 mi", "= 5280 ft"},
		{"1 mil", "= 1 in / 1000"},
		{"1 oz", "= 1 lb / 16"},
		{"1 mph", "= 1 mi / 1 h"},
		{"1 kgf", "= 1 kg * 9.80665 m/s²"},
		{"1 mH2O", "= 1000 kg/m³ * 9.80665 m/s² * 1 m"},
		{"1 mmH2O", "= 1 mH2O / 1000"},
		{"1 inH2O", "= 1000 kg/m³ * 9.80665 m/s² * 1 in"},
		{"1 ftH2O", "= 1000 kg/m³ * 9.80665 m/s² * 1 ft"},
		{"1 mmHg", "= 13595.1 kg/m³ * 9.80665 m/s² * 1 mm"},
		{"1 inHg", "= 13595.1 kg/m³ * 9.80665 m/s² * 1 in"},
		{"1 Torr", "= 1 atm / 760"},
		{"1 a", "= 365.25 d"},
		{"1 week", "= 7 d"},
		{"1 rpm", "= 1 rev / 1 min"},
		{"1 t", "= 1000 kg"},
		{"1 Wh", "= 1 W * 1 h"},
		{"1 Ah", "= 1 A * 1 h"},
		{"1 L", "= 1 dm³"},
		{"1 P", "= 0.1 Pa·s"},
		{"1 St", "= 1 cm^2 / 1 s"},
		{"1 cSt", "= 1 mm²/s"},
		{"1 cP", "= 1 mPa·s"},
		{"46 cSt", "= 40.02 mPa·s / 870 kg/m³"},
		{"1450 1/min", "= 1450 rpm"},
		{"24 1/s", "= 24 rev/s"},
		{"1 N/mm", "= 1000 N/m"},
		{"40 N·s/m", "= 40 kg/s"},
		{"1 kg·m²", "= 1 N·m·s² * 1 rad"},
		{"16 m³/h", "= 16 m³ / 3600 s"},
	} {
		got := parsed(t, c.unit)[0]
		e, err := Compile(c.definition, testNames())
		if err != nil {
			t.Fatal(err)
		}
		want, err := e.Eval(nil)
		if err != nil {
			t.Fatal(err)
		}
		if got.Dim != want.Dim || got.Exact.Cmp(want.Exact) != 0 {
			t.Errorf("%s = %v %v, by definition %v %v", c.unit, got.Exact, got.Dim, want.Exact, want.Dim)
		}
	}
}

// The doubles a factor is rounded to, computed by hand from the definitions.
func TestExactFactors(t *testing.T) {
	for _, c := range []struct {
		text string
		want float64
		unit string
	}{
		{"1 psi", 6894.757293168362, "Pa"},
		{"1 US gal", 3.785411784e-3, "m³"},
		{"1 gpm", 6.30901964e-5, "m³/s"},
		{"1 psi/gpm", 1.0928413107885589e8, "Pa·s/m³"},
		{"1 Btu", 1055.05585262, "J"},
		{"1 BTU/(h·ft²·°F)", 5.678263341113488, "W/(m²·K)"},
		{"1 BTU/(h·ft·°F)", 1.7307346663713912, "W/(m·K)"},
		{"1 BTU/h", 0.2930710701722222, "W"},
		{"1 h·°F/BTU", 1.8956342406266344, "K/W"},
		{"1 BTU/°F", 1899.100534716, "J/K"},
		{"1 lb", 0.45359237, "kg"},
	} {
		v := parsed(t, c.text)[0]
		if v.SI != c.want || UnitOf(v.Dim) != c.unit {
			t.Errorf("%s = %v %s, want %v %s", c.text, v.SI, UnitOf(v.Dim), c.want, c.unit)
		}
	}
}

// NIST Special Publication 811 (2008), appendix B.8: seven digits as printed.
func TestPublishedFactors(t *testing.T) {
	for _, c := range []struct {
		text string
		want string
	}{
		{"1 atm", "1.01325E+05"},
		{"1 bar", "1.0E+05"},
		{"1 Btu_IT", "1.055056E+03"},
		{"1 Btu_th", "1.054350E+03"},
		{"1 Btu·ft/(h·ft²·°F)", "1.730735E+00"},
		{"1 Btu/(h·ft²·°F)", "5.678263E+00"},
		{"1 Btu/h", "2.930711E-01"},
		{"1 Btu/lb", "2.326E+03"},
		{"1 Btu/(lb·°F)", "4.1868E+03"},
		{"1 °F·h·ft²/Btu", "1.761102E-01"},
		{"1 °F·h/Btu", "1.895634E+00"},
		{"1 cal_IT", "4.1868E+00"},
		{"1 cal_th", "4.184E+00"},
		{"1 cfm", "4.719474E-04"},
		{"1 ftH2O", "2.989067E+03"},
		{"1 US gal", "3.785412E-03"},
		{"1 imp gal", "4.54609E-03"},
		{"1 gpm", "6.309020E-05"},
		{"1 hp", "7.456999E+02"},
		{"1 inHg", "3.386389E+03"},
		{"1 inH2O", "2.490889E+02"},
		{"1 kgf", "9.80665E+00"},
		{"1 kWh", "3.6E+06"},
		{"1 lbf", "4.448222E+00"},
		{"1 lb/ft³", "1.601846E+01"},
		{"1 mil", "2.54E-05"},
		{"1 mmHg", "1.333224E+02"},
		{"1 oz", "2.834952E-02"},
		{"1 US fl oz", "2.957353E-05"},
		{"1 US pt", "4.731765E-04"},
		{"1 US qt", "9.463529E-04"},
		{"1 psf", "4.788026E+01"},
		{"1 psi", "6.894757E+03"},
		{"1 TR", "3.516853E+03"},
		{"1 Torr", "1.333224E+02"},
		{"1 mph", "4.4704E-01"},
		{"1 °", "1.745329E-02"},
	} {
		want, err := strconv.ParseFloat(c.want, 64)
		if err != nil {
			t.Fatal(err)
		}
		got := parsed(t, c.text)[0].SI
		if math.Abs(got-want) > 0.5000001e-6*math.Pow(10, math.Floor(math.Log10(want))) {
			t.Errorf("%s = %v, printed %s", c.text, got, c.want)
		}
	}
}

// Every prefix on every unit that takes one is read as that power of ten, or
// is the symbol of a unit of its own.
func TestPrefixes(t *testing.T) {
	for i := range units {
		u := &units[i]
		for _, p := range &prefixes {
			sym := p.sym + u.sym
			v, err := Parse("1 " + sym)
			if !u.prefix {
				if err == nil && v.Dim == u.dim && !isUnit(sym) && !otherSplit(sym, u) {
					t.Errorf("%s is read, though %s takes no prefix", sym, u.sym)
				}
				continue
			}
			if isUnit(sym) || otherSplit(sym, u) {
				continue
			}
			want := scale10(big.NewRat(u.num, u.den), int(u.exp10)+int(p.exp10))
			if err != nil || v.Exact.Cmp(want) != 0 || v.Dim != u.dim {
				t.Errorf("1 %s = %v %v, %v; want %v", sym, v.Exact, v.Dim, err, want)
			}
		}
	}
}

// otherSplit: dam is read as a decametre before d and am are tried.
func otherSplit(sym string, u *unit) bool {
	v, _, ok := lookup(sym)
	return ok && v.sym != u.sym
}

// Every unit this package prints must be one it reads, of the same dimension.
func TestNamesReadBack(t *testing.T) {
	seen := map[Dim]bool{}
	for _, n := range names {
		if seen[n.dim] {
			t.Errorf("%v has two names", n.dim)
		}
		seen[n.dim] = true
		for _, unit := range append([]string{n.unit}, ladder(n)...) {
			v, err := Parse("1 " + unit)
			if err != nil || v.Dim != n.dim {
				t.Errorf("%s: %v %v, %v", unit, v.Dim, n.dim, err)
			}
		}
		last := 0.0
		for _, unit := range ladder(n) {
			v := parsed(t, "1 "+unit)[0]
			if v.SI <= last {
				t.Errorf("%s is out of order", unit)
			}
			last = v.SI
		}
	}
}
