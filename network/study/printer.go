package study

import (
	"math"
	"strconv"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Kinds of a value whose unit alone does not say.
const (
	kindLevel      = "level"
	kindDifference = "difference"
	kindGauge      = "gauge" // of a given pressure, which may be stated otherwise than the case's
	kindAbsolute   = "absolute"
)

// dims are the dimensions of the SI units that answers carry.
var dims = map[string]quantity.Dim{
	"1":   {},
	"s":   {0, 0, 1, 0, 0},
	"1/s": {0, 0, -1, 0, 0},
	"K":   {0, 0, 0, 1, 0},
	"W":   {1, 2, -3, 0, 0},
	"K/W": {-1, -2, 3, 1, 0},
	"W/K": {1, 2, -3, -1, 0},
	"J/K": {1, 2, -2, -1, 0},
	"K/K": {},
	"W/W": {},
	"Pa":  {1, -1, -2, 0, 0},

	"m³/s":      {0, 3, -1, 0, 0},
	"m³/Pa":     {-1, 4, 2, 0, 0},
	"Pa·s/m³":   {1, -4, -1, 0, 0},
	"m³/(Pa·s)": {-1, 4, 1, 0, 0},
	"Pa·s²/m³":  {1, -4, 0, 0, 0},
}

// dimOf is the dimension of an SI unit.
func dimOf(unit string) quantity.Dim {
	if d, ok := dims[unit]; ok {
		return d
	}
	if v, err := quantity.Parse("1 " + unit); err == nil {
		return v.Dim
	}
	return quantity.Dim{}
}

// A Printer turns SI numbers into words in the units the case asks for: unless
// [print] says otherwise temperatures in °C, pressures in bar, those that are
// levels in bar(g) or bar(a), flows in L/min, volumes in L, energies in kJ, what turns
// in rpm; four significant digits, times in the unit that suits each.
type Printer struct {
	asked     map[string]quantity.Print
	pressures casefile.Pressures
	digits    int
}

// NewPrinter returns the printer of a case.
func NewPrinter(c *casefile.Case) Printer {
	p := Printer{asked: c.Questions.Print, pressures: c.Pressures, digits: c.Questions.Digits}
	if p.digits == 0 {
		p.digits = 4
	}
	return p
}

// Unit returns the unit in which a value of that SI unit and kind is printed.
func (p Printer) Unit(unit, kind string) string {
	if unit == "K/K" || unit == "W/W" {
		return unit
	}
	d := dimOf(unit)
	u := p.unitAsked(d, kind)
	switch unit {
	case "K":
		switch {
		case kind == kindLevel && u == "":
			return "°C"
		case kind != kindLevel && (u == "" || u == "°C"):
			return "K"
		}
	case "Pa":
		if u == "" {
			u = "bar"
		}
		return p.pressure(u, kind)
	case "m³/s":
		if u == "" {
			return "L/min"
		}
	}
	if usual, ok := usualUnits[unit]; ok && u == "" {
		if unit == "m³" && p.cubicMetres() {
			return unit
		}
		return usual
	}
	if u == "" {
		return unit
	}
	return u
}

// usualUnits are those in which people read what is not asked for in another.
var usualUnits = map[string]string{"m³": "L", "J": "kJ", turning: "rpm"}

// cubicMetres reports whether flows are asked for in m³ in some time: volumes are then
// read in m³ too.
func (p Printer) cubicMetres() bool {
	return strings.HasPrefix(p.asked[casefile.PrintWord(dims["m³/s"], quantity.Plain)].Unit, "m³")
}

// unitAsked is the unit that [print] states for a quantity, "" for none. A
// difference of temperatures goes by the unit of temperatures unless it has one.
func (p Printer) unitAsked(d quantity.Dim, kind string) string {
	k := quantity.Plain
	switch kind {
	case kindLevel:
		k = quantity.Level
	case kindDifference:
		k = quantity.Difference
	}
	u := p.asked[casefile.PrintWord(d, k)].Unit
	if u == "" {
		u = p.asked[casefile.PrintWord(d, quantity.Level)].Unit
	}
	if s, err := quantity.NewScale(u, k); u == "" || err == nil && s.Dim() != d {
		return "" // a resistance of heat, where that of a flow is meant
	}
	return u
}

// pressure says of a unit whether a level in it is gauge or absolute: psi makes
// psig, bar makes bar(g).
func (p Printer) pressure(unit, kind string) string {
	k := p.pressures.Kind()
	switch kind {
	case kindGauge:
		k = quantity.Gauge
	case kindAbsolute:
		k = quantity.Absolute
	case kindLevel:
	default:
		return unit
	}
	letter := "g"
	if k == quantity.Absolute {
		letter = "a"
	}
	if unit == "psi" {
		return unit + letter
	}
	return unit + "(" + letter + ")"
}

// In returns v, in the SI unit given, in the unit that Unit names.
func (p Printer) In(v float64, unit, kind string) float64 {
	u := p.Unit(unit, kind)
	if u == unit {
		return v
	}
	k := quantity.Plain
	switch {
	case unit == "Pa": // a pressure has no zero but its own
		u = p.Unit(unit, kindDifference)
	case kind == kindLevel:
		k = quantity.Level
	case kind == kindDifference:
		k = quantity.Difference
	}
	x, err := quantity.Convert(v, u, k)
	if err != nil {
		return v
	}
	return x
}

// Value returns v with its unit: "76.78 °C", "1.483 K/W".
func (p Printer) Value(v float64, unit, kind string) string {
	switch unit {
	case "s":
		return p.Time(v)
	case "1":
		return p.Number(v)
	case "Pa·s/m³", "Pa·s²/m³": // anything from kPa to TPa
		if d := dimOf(unit); p.unitAsked(d, kind) == "" {
			return quantity.Print{Digits: p.digits}.Format(v, d, quantity.Plain)
		}
	}
	return p.Number(p.In(v, unit, kind)) + " " + p.Unit(unit, kind)
}

// Number returns v to the digits asked for.
func (p Printer) Number(v float64) string { return quantity.Number(v, p.digits) }

// Time returns a time in the unit that suits it.
func (p Printer) Time(s float64) string {
	if s == 0 {
		return "0 s"
	}
	unit, factor := p.timeUnit(math.Abs(s))
	if p.asked["time"].Unit == "" {
		for _, u := range timeUnits { // a whole number of hours or minutes is said as such
			if n := math.Abs(s) / u.factor; u.factor > 1 && u.unit != "d" && n >= 1 && n < 240 && n == math.Round(n) {
				return p.Number(s/u.factor) + " " + u.unit
			}
		}
	}
	return p.Number(s/factor) + " " + unit
}

// timeUnits and the time from which on each is used: a cooling of 95 s is
// spoken of in seconds, a season in hours.
var timeUnits = []struct {
	unit         string
	factor, from float64
}{{"d", 86400, 10 * 86400}, {"h", 3600, 2 * 3600}, {"min", 60, 120}, {"s", 1, 1}, {"ms", 1e-3, 1e-3}, {"µs", 1e-6, 1e-6}, {"ns", 1e-9, 0}}

// timeUnit returns the unit for times of that size and its length in s. A time
// that rounds up to the next unit is printed in that.
func (p Printer) timeUnit(size float64) (unit string, factor float64) {
	if a, ok := p.asked["time"]; ok && a.Unit != "" {
		if x, err := quantity.Convert(1, a.Unit, quantity.Plain); err == nil && x > 0 {
			return a.Unit, 1 / x
		}
	}
	for _, u := range timeUnits {
		if size*(1+5e-5) >= u.from {
			return u.unit, u.factor
		}
	}
	return "s", 1
}

// TimeUnit returns the unit for a column of times and its length in s: the one
// that suits the largest, or the next smaller where more of the times come out
// even in it, as 20 min does.
func (p Printer) TimeUnit(times []float64) (unit string, factor float64) {
	largest := 0.0
	for _, t := range times {
		largest = math.Max(largest, math.Abs(t))
	}
	if largest == 0 {
		return "s", 1
	}
	unit, factor = p.timeUnit(largest)
	for i, u := range timeUnits[:len(timeUnits)-1] {
		next := timeUnits[i+1]
		if u.unit == unit && largest/next.factor < 1e4 && p.even(times, next.factor) > p.even(times, factor) {
			return next.unit, next.factor
		}
	}
	return unit, factor
}

// even counts the times that need no more digits than are printed.
func (p Printer) even(times []float64, factor float64) int {
	n := 0
	for _, t := range times {
		x, err := strconv.ParseFloat(p.Number(t/factor), 64)
		if err == nil && math.Abs(x*factor-t) <= 1e-9*math.Abs(t) {
			n++
		}
	}
	return n
}

// Percent returns a fraction in per cent.
func (p Printer) Percent(f float64) string { return quantity.Number(100*f, 3) + " %" }

// join lists words: "a", "a and b", "a, b and c".
func join(words []string) string {
	n := len(words)
	if n < 2 {
		return strings.Join(words, "")
	}
	return strings.Join(words[:n-1], ", ") + " and " + words[n-1]
}

// Rough returns v to two digits.
func (p Printer) Rough(v float64) string { return quantity.Number(v, 2) }

// Cell returns v to the digits asked for, trailing zeros kept, so that a column
// shows how far each number is known.
func (p Printer) Cell(v float64) string {
	sci := strconv.FormatFloat(v, 'e', p.digits-1, 64)
	_, power, _ := strings.Cut(sci, "e")
	e, err := strconv.Atoi(power)
	rounded, err2 := strconv.ParseFloat(sci, 64)
	if err != nil || err2 != nil || v == 0 || e < -4 || e >= 7 {
		return p.Number(v)
	}
	return strconv.FormatFloat(rounded, 'f', max(0, p.digits-1-e), 64)
}
