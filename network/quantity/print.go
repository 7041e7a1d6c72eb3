package quantity

import (
	"math"
	"strconv"
	"strings"
)

// Print says how a number is to be shown.
type Print struct {
	Unit   string // "": the SI unit that suits the size; °C for a level, min or h for a long time
	Digits int    // significant digits; 0: four
}

// DefaultDigits is how many significant digits a text shows unless asked.
const DefaultDigits = 4

// levelDecimals is the finest a level is printed: 273.15 K is not exact in
// binary, and 0 °C would otherwise show as 5.684e-14 °C.
const levelDecimals = 4

// Format returns v, in SI, as number, space, unit: "0.35 K/W", "143.2 °C",
// "12 kJ/K". A unit that does not fit the dimension, or cannot be read, gives
// the SI unit; check a unit the user chose with NewScale first.
func (p Print) Format(v float64, dim Dim, kind Kind) string {
	s := p.scale(v, dim, kind)
	return Join(s.Number(v, p.Digits), s.Unit)
}

// Number returns si in the scale's unit to so many significant digits.
func (s Scale) Number(si float64, digits int) string {
	x := s.Of(si)
	if s.p.zero != nil {
		x = roundTo(x, levelDecimals)
	}
	return Number(x, digits)
}

// Join puts number and unit together: a space between, none before the degree
// of an angle, and no unit for a plain number.
func Join(number, unit string) string {
	switch unit {
	case "", "1":
		return number
	case "°":
		return number + unit
	}
	return number + " " + unit
}

func (p Print) scale(v float64, dim Dim, kind Kind) Scale {
	unit := p.Unit
	if unit == "" {
		unit = suitable(v, dim, kind)
	}
	s, err := NewScale(unit, kind)
	if err != nil || s.dim != dim {
		s, _ = NewScale(UnitOf(dim), Plain)
	}
	return s
}

// suitable returns the largest of the customary units that leaves v at 1 or
// above, or the SI unit itself down to 0.1 of it.
func suitable(v float64, dim Dim, kind Kind) string {
	switch {
	case dim == dimKelvin && kind == Level:
		return "°C"
	case dim == dimTime:
		unit, _ := timeUnit(v)
		return unit
	case dim == dimPressure && kind == Gauge:
		return "bar(g)"
	case dim == dimPressure && kind == Absolute:
		return "bar(a)"
	}
	n := dim.named()
	if n == nil || n.ladder == "" || v == 0 {
		return UnitOf(dim)
	}
	rungs := ladder(*n)
	for i := len(rungs) - 1; i > 0; i-- {
		// A number that four digits round up to the next rung belongs there.
		least := 0.99995
		if rungs[i] == n.unit {
			least = 0.1
		}
		if x, err := Convert(v, rungs[i], Plain); err == nil && math.Abs(x) >= least {
			return rungs[i]
		}
	}
	return rungs[0]
}

// Number returns v to so many significant digits (0: four), without trailing
// zeros after the point, without an exponent from 0.0001 up to ten million, and
// never "-0".
func Number(v float64, digits int) string {
	if digits <= 0 {
		digits = DefaultDigits
	}
	digits = min(digits, 17)
	sci := strconv.FormatFloat(v, 'e', digits-1, 64)
	mantissa, power, ok := strings.Cut(sci, "e")
	if !ok {
		return sci // not a finite number
	}
	e, _ := strconv.Atoi(power)
	if v == 0 {
		return "0"
	}
	if e < -4 || e >= 7 {
		return trimZeros(mantissa) + "e" + strconv.Itoa(e)
	}
	rounded, _ := strconv.ParseFloat(sci, 64)
	return trimZeros(strconv.FormatFloat(rounded, 'f', max(0, digits-1-e), 64))
}

func trimZeros(s string) string {
	if !strings.Contains(s, ".") {
		return s
	}
	return strings.TrimSuffix(strings.TrimRight(s, "0"), ".")
}

// Column writes the numbers of a column with one number of decimals, so that
// the largest has so many significant digits (0: four) and the points stand in
// line. A column that spans more than that falls back to Number.
func Column(v []float64, digits int) []string {
	if digits <= 0 {
		digits = DefaultDigits
	}
	digits = min(digits, 17)
	decimals, ok := commonDecimals(v, digits)
	out := make([]string, len(v))
	for i, x := range v {
		if !ok {
			out[i] = Number(x, digits)
			continue
		}
		out[i] = unsigned(strconv.FormatFloat(x, 'f', decimals, 64))
	}
	return out
}

// commonDecimals is false where one number of decimals would not do: where the
// numbers are too large or small to be written plainly, or one that is not
// zero would show fewer than two digits.
func commonDecimals(v []float64, digits int) (int, bool) {
	largest, least := 0.0, math.Inf(1)
	for _, x := range v {
		a := math.Abs(x)
		if math.IsInf(a, 0) || math.IsNaN(a) {
			return 0, false
		}
		largest = max(largest, a)
		if a > 0 {
			least = min(least, a)
		}
	}
	if largest == 0 {
		return 0, true
	}
	if largest >= 1e7 || largest < 1e-3 {
		return 0, false
	}
	e, _ := strconv.Atoi(strings.Split(strconv.FormatFloat(largest, 'e', digits-1, 64), "e")[1])
	decimals := max(0, digits-1-e)
	return decimals, least >= 5*math.Pow10(-decimals) || noise(least, largest)
}

// noise: so far below the largest that zero is what should be read.
func noise(least, largest float64) bool { return least < 1e-9*largest }

// unsigned drops the sign of a number that rounded to zero.
func unsigned(s string) string {
	if rest, ok := strings.CutPrefix(s, "-"); ok && strings.Trim(rest, "0.") == "" {
		return rest
	}
	return s
}

func roundTo(x float64, decimals int) float64 {
	if math.Abs(x) >= 1e9 {
		return x
	}
	k := math.Pow10(decimals)
	return math.Round(x*k) / k
}

func ladder(n named) []string { return strings.Fields(n.ladder) }
