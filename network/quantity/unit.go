package quantity

import (
	"math/big"
	"sort"
	"strings"
)

// A unit is one symbol and what it is in SI: num/den·10^exp10, times π^pi,
// in the coherent unit of dim. Every factor is exact by definition, so the
// fractions are too; they are taken from NIST SP 811 (2008), appendix B, and
// the definitions it rests on:
//
//	yard and pound 1959      in = 0.0254 m, lb = 0.45359237 kg
//	standard gravity         9.80665 m/s²    lbf = 4.4482216152605 N
//	IT calorie               4.1868 J        Btu (IT) = 4.1868·453.59237·5/9 J
//	US gallon                231 in³         imperial gallon = 4.54609 L
//	conventional mercury     13.5951 kg/L    conventional water = 1 kg/L
//	horsepower               550 ft·lbf/s    ton of refrigeration = 12 000 Btu/h
//
// Btu without a suffix is the IT one, as in SP 811; a is the Julian year of
// 365.25 d, which is the annus of astronomy, not SP 811's common year.
type unit struct {
	sym      string
	num, den int64
	exp10    int8
	pi       int8
	prefix   bool // takes an SI prefix
	kind     Kind // of the unit standing alone
	dim      Dim
	offset   int32 // level = value·factor + offset/100 K
	degree   bool  // a degree: no prefix, no power, a difference inside a product
}

var (
	dimNone     = Dim{}
	dimLength   = Dim{0, 1}
	dimArea     = Dim{0, 2}
	dimVolume   = Dim{0, 3}
	dimMass     = Dim{1}
	dimTime     = Dim{0, 0, 1}
	dimKelvin   = Dim{0, 0, 0, 1}
	dimCurrent  = Dim{0, 0, 0, 0, 1}
	dimRate     = Dim{0, 0, -1}
	dimSpeed    = Dim{0, 1, -1}
	dimForce    = Dim{1, 1, -2}
	dimPressure = Dim{1, -1, -2}
	dimEnergy   = Dim{1, 2, -2}
	dimPower    = Dim{1, 2, -3}
	dimFlow     = Dim{0, 3, -1}
)

// units is sorted by symbol, byte by byte.
var units = []unit{
	{sym: "%", num: 1, den: 1, exp10: -2},
	{sym: "A", num: 1, den: 1, prefix: true, dim: dimCurrent},
	{sym: "Ah", num: 3600, den: 1, prefix: true, dim: Dim{0, 0, 1, 0, 1}},
	{sym: "BTU", num: 105505585262, den: 1, exp10: -8, dim: dimEnergy},
	{sym: "Btu", num: 105505585262, den: 1, exp10: -8, dim: dimEnergy},
	{sym: "Btu_IT", num: 105505585262, den: 1, exp10: -8, dim: dimEnergy},
	{sym: "Btu_th", num: 94891523804, den: 9, exp10: -7, dim: dimEnergy},
	{sym: "C", num: 1, den: 1, prefix: true, dim: Dim{0, 0, 1, 0, 1}},
	{sym: "F", num: 1, den: 1, prefix: true, dim: Dim{-1, -2, 4, 0, 2}},
	{sym: "H", num: 1, den: 1, prefix: true, dim: Dim{1, 2, -2, 0, -2}},
	{sym: "Hz", num: 1, den: 1, prefix: true, dim: dimRate},
	{sym: "J", num: 1, den: 1, prefix: true, dim: dimEnergy},
	{sym: "K", num: 1, den: 1, prefix: true, dim: dimKelvin, kind: Either},
	{sym: "L", num: 1, den: 1, exp10: -3, prefix: true, dim: dimVolume},
	{sym: "MMBTU", num: 105505585262, den: 1, exp10: -2, dim: dimEnergy},
	{sym: "MMBtu", num: 105505585262, den: 1, exp10: -2, dim: dimEnergy},
	{sym: "N", num: 1, den: 1, prefix: true, dim: dimForce},
	{sym: "P", num: 1, den: 1, exp10: -1, prefix: true, dim: Dim{1, -1, -1}},
	{sym: "Pa", num: 1, den: 1, prefix: true, dim: dimPressure},
	{sym: "S", num: 1, den: 1, prefix: true, dim: Dim{-1, -2, 3, 0, 2}},
	{sym: "St", num: 1, den: 1, exp10: -4, prefix: true, dim: Dim{0, 2, -1}},
	{sym: "T", num: 1, den: 1, prefix: true, dim: Dim{1, 0, -2, 0, -1}},
	{sym: "TR", num: 105505585262, den: 3, exp10: -7, dim: dimPower},
	{sym: "Torr", num: 101325, den: 760, dim: dimPressure},
	{sym: "US fl oz", num: 295735295625, den: 1, exp10: -16, dim: dimVolume},
	{sym: "US gal", num: 3785411784, den: 1, exp10: -12, dim: dimVolume},
	{sym: "US gpm", num: 630901964, den: 1, exp10: -13, dim: dimFlow},
	{sym: "US pt", num: 473176473, den: 1, exp10: -12, dim: dimVolume},
	{sym: "US qt", num: 946352946, den: 1, exp10: -12, dim: dimVolume},
	{sym: "V", num: 1, den: 1, prefix: true, dim: Dim{1, 2, -3, 0, -1}},
	{sym: "VA", num: 1, den: 1, prefix: true, dim: dimPower},
	{sym: "W", num: 1, den: 1, prefix: true, dim: dimPower},
	{sym: "Wb", num: 1, den: 1, prefix: true, dim: Dim{1, 2, -2, 0, -1}},
	{sym: "Wh", num: 3600, den: 1, prefix: true, dim: dimEnergy},
	{sym: "a", num: 31557600, den: 1, dim: dimTime},
	{sym: "atm", num: 101325, den: 1, dim: dimPressure},
	{sym: "bar", num: 1, den: 1, exp10: 5, prefix: true, dim: dimPressure},
	{sym: "bara", num: 1, den: 1, exp10: 5, dim: dimPressure, kind: Absolute},
	{sym: "barg", num: 1, den: 1, exp10: 5, dim: dimPressure, kind: Gauge},
	{sym: "cal_IT", num: 41868, den: 1, exp10: -4, prefix: true, dim: dimEnergy},
	{sym: "cal_th", num: 4184, den: 1, exp10: -3, prefix: true, dim: dimEnergy},
	{sym: "cfm", num: 28316846592, den: 60, exp10: -12, dim: dimFlow},
	{sym: "d", num: 86400, den: 1, dim: dimTime},
	{sym: "degC", num: 1, den: 1, dim: dimKelvin, kind: Level, offset: 27315, degree: true},
	{sym: "degF", num: 5, den: 9, dim: dimKelvin, kind: Level, offset: degF, degree: true},
	{sym: "degR", num: 5, den: 9, dim: dimKelvin, kind: Either, degree: true},
	{sym: "ft", num: 3048, den: 1, exp10: -4, dim: dimLength},
	{sym: "ftH2O", num: 298906692, den: 1, exp10: -5, dim: dimPressure},
	{sym: "g", num: 1, den: 1, exp10: -3, prefix: true, dim: dimMass},
	{sym: "gph", num: 3785411784, den: 3600, exp10: -12, dim: dimFlow},
	{sym: "gpm", num: 630901964, den: 1, exp10: -13, dim: dimFlow},
	{sym: "h", num: 3600, den: 1, dim: dimTime},
	{sym: "hp", num: 74569987158227022, den: 1, exp10: -14, dim: dimPower},
	{sym: "imp gal", num: 454609, den: 1, exp10: -8, dim: dimVolume},
	{sym: "imp gpm", num: 454609, den: 60, exp10: -8, dim: dimFlow},
	{sym: "in", num: 254, den: 1, exp10: -4, dim: dimLength},
	{sym: "inH2O", num: 24908891, den: 1, exp10: -5, dim: dimPressure},
	{sym: "inHg", num: 3386388640341, den: 1, exp10: -9, dim: dimPressure},
	{sym: "kBTU", num: 105505585262, den: 1, exp10: -5, dim: dimEnergy},
	{sym: "kBtu", num: 105505585262, den: 1, exp10: -5, dim: dimEnergy},
	{sym: "kgf", num: 980665, den: 1, exp10: -5, dim: dimForce},
	{sym: "ksi", num: 44482216152605, den: 64516, exp10: -2, dim: dimPressure},
	{sym: "l", num: 1, den: 1, exp10: -3, prefix: true, dim: dimVolume},
	{sym: "lb", num: 45359237, den: 1, exp10: -8, dim: dimMass},
	{sym: "lbf", num: 44482216152605, den: 1, exp10: -13, dim: dimForce},
	{sym: "lbm", num: 45359237, den: 1, exp10: -8, dim: dimMass},
	{sym: "m", num: 1, den: 1, prefix: true, dim: dimLength},
	{sym: "mH2O", num: 980665, den: 1, exp10: -2, dim: dimPressure},
	{sym: "mi", num: 1609344, den: 1, exp10: -3, dim: dimLength},
	{sym: "mil", num: 254, den: 1, exp10: -7, dim: dimLength},
	{sym: "min", num: 60, den: 1, dim: dimTime},
	{sym: "mmH2O", num: 980665, den: 1, exp10: -5, dim: dimPressure},
	{sym: "mmHg", num: 133322387415, den: 1, exp10: -9, dim: dimPressure},
	{sym: "mph", num: 44704, den: 1, exp10: -5, dim: dimSpeed},
	{sym: "ohm", num: 1, den: 1, prefix: true, dim: Dim{1, 2, -3, 0, -2}},
	{sym: "oz", num: 45359237, den: 16, exp10: -8, dim: dimMass},
	{sym: "ppm", num: 1, den: 1, exp10: -6},
	{sym: "psf", num: 44482216152605, den: 9290304, exp10: -5, dim: dimPressure},
	{sym: "psi", num: 44482216152605, den: 64516, exp10: -5, dim: dimPressure},
	{sym: "psia", num: 44482216152605, den: 64516, exp10: -5, dim: dimPressure, kind: Absolute},
	{sym: "psig", num: 44482216152605, den: 64516, exp10: -5, dim: dimPressure, kind: Gauge},
	{sym: "rad", num: 1, den: 1, prefix: true},
	{sym: "rev", num: 1, den: 1},
	{sym: "rpm", num: 1, den: 60, dim: dimRate},
	{sym: "s", num: 1, den: 1, prefix: true, dim: dimTime},
	{sym: "t", num: 1000, den: 1, dim: dimMass},
	{sym: "week", num: 604800, den: 1, dim: dimTime},
	{sym: "yd", num: 9144, den: 1, exp10: -4, dim: dimLength},
	{sym: "°", num: 1, den: 180, pi: 1},
	{sym: "°C", num: 1, den: 1, dim: dimKelvin, kind: Level, offset: 27315, degree: true},
	{sym: "°F", num: 5, den: 9, dim: dimKelvin, kind: Level, offset: degF, degree: true},
	{sym: "°R", num: 5, den: 9, dim: dimKelvin, kind: Either, degree: true},
	{sym: "Δ°C", num: 1, den: 1, dim: dimKelvin, kind: Difference, degree: true},
	{sym: "Δ°F", num: 5, den: 9, dim: dimKelvin, kind: Difference, degree: true},
	{sym: "Ω", num: 1, den: 1, prefix: true, dim: Dim{1, 2, -3, 0, -2}},
	{sym: "‰", num: 1, den: 1, exp10: -3},
}

// degF marks the offset 459.67·5/9 K, which is no whole number of centikelvin.
const degF = -1

// same maps other spellings of one symbol to the one in units.
var same = [...][2]string{
	{"℃", "°C"}, {"℉", "°F"}, {"Ω", "Ω"}, {"Δ℃", "Δ°C"}, {"Δ℉", "Δ°F"},
	{"USgal", "US gal"}, {"galUS", "US gal"}, {"gal_US", "US gal"},
	{"galUK", "imp gal"}, {"gal_UK", "imp gal"}, {"impgal", "imp gal"},
	{"US_gal", "US gal"}, {"imp_gal", "imp gal"}, {"usgpm", "US gpm"}, {"USgpm", "US gpm"},
}

// A prefix multiplies a unit by 10^exp10.
type prefix struct {
	sym   string
	exp10 int8
}

var prefixes = [...]prefix{
	{"da", 1}, // before d: dam is a decametre
	{"q", -30}, {"r", -27}, {"y", -24}, {"z", -21}, {"a", -18}, {"f", -15}, {"p", -12}, {"n", -9},
	{"µ", -6}, {"μ", -6}, {"u", -6}, {"m", -3}, {"c", -2}, {"d", -1},
	{"h", 2}, {"k", 3}, {"M", 6}, {"G", 9}, {"T", 12}, {"P", 15}, {"E", 18}, {"Z", 21}, {"Y", 24}, {"R", 27}, {"Q", 30},
}

// plainUnit finds a symbol that carries no prefix.
func plainUnit(sym string) (*unit, bool) {
	i := sort.Search(len(units), func(i int) bool { return units[i].sym >= sym })
	if i < len(units) && units[i].sym == sym {
		return &units[i], true
	}
	for _, s := range &same {
		if s[0] == sym {
			return plainUnit(s[1])
		}
	}
	return nil, false
}

// lookup finds a symbol, with or without a prefix. A symbol that is a unit as
// it stands is never split: min is a minute, not a milli-inch.
func lookup(sym string) (u *unit, pre int8, ok bool) {
	if u, ok = plainUnit(sym); ok {
		return u, 0, true
	}
	for _, p := range &prefixes {
		rest, has := strings.CutPrefix(sym, p.sym)
		if !has {
			continue
		}
		if u, ok = plainUnit(rest); ok && u.prefix {
			return u, p.exp10, true
		}
	}
	return nil, 0, false
}

// ratio is num/den, nil where that is 1.
func (u *unit) ratio() *big.Rat {
	if u.num == 1 && u.den == 1 {
		return nil
	}
	return big.NewRat(u.num, u.den)
}

// zero is the level in K at which the unit's scale starts.
func (u *unit) zero() *big.Rat {
	switch u.offset {
	case 0:
		return nil
	case degF:
		return big.NewRat(45967*5, 900)
	}
	return big.NewRat(int64(u.offset), 100)
}

// scale10 multiplies r by 10^n in place.
func scale10(r *big.Rat, n int) *big.Rat {
	if n == 0 {
		return r
	}
	p := pow10(max(n, -n))
	if n > 0 {
		return r.SetFrac(p.Mul(p, r.Num()), r.Denom())
	}
	return r.SetFrac(r.Num(), p.Mul(p, r.Denom()))
}

func pow10(n int) *big.Int {
	if n < len(smallPow10) {
		return big.NewInt(smallPow10[n])
	}
	return new(big.Int).Exp(big.NewInt(10), big.NewInt(int64(n)), nil)
}

// smallPow10 holds the powers nearly every decimal needs.
var smallPow10 = [...]int64{1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18}
