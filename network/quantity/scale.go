package quantity

import (
	"math"
	"math/big"
	"sort"
	"strconv"
	"strings"
)

// A Scale turns numbers in SI into one unit. The zero value is no unit; make
// one with NewScale.
type Scale struct {
	Unit string // as to be printed: a difference asked for in °C is in K, one in °F in Δ°F
	kind Kind
	dim  Dim
	p    product
	unit *big.Rat // p.factor()
	mul  float64  // number = (si − zero)·mul/div
	div  float64
	zero float64
}

// NewScale reads a unit. Of a level "°F" means a point on the scale; of
// everything else, and inside a compound unit, the size of the degree. The
// error is a *SyntaxError for a unit that cannot be read, a *DimensionError
// for one that a quantity of this kind does not have.
func NewScale(unit string, kind Kind) (Scale, error) {
	p, f := parseUnit(unit)
	if f != nil {
		return Scale{}, f.syntax(unit, func(s string) *fault { _, f := parseUnit(s); return f })
	}
	s := Scale{Unit: unit, kind: p.kind, dim: p.dim, p: p, unit: p.factor(), mul: 1, div: 1}
	switch {
	case isLevel(kind) && !serves(p.kind, kind):
		return s, &DimensionError{Found: quote(unit) + " is a unit of " + Describe(p.dim, p.kind), Expected: "one of " + Describe(p.dim, kind)}
	case p.kind == Level && kind != Level:
		s.p.zero = nil
		s.Unit = map[bool]string{true: "K", false: "Δ°F"}[isOne(s.unit)]
	}
	if s.p.zero != nil {
		s.zero, _ = s.p.zero.Float64()
	}
	inverse := new(big.Rat).Inv(s.unit)
	if m, exact := inverse.Float64(); exact {
		s.mul = m
	} else {
		s.div, _ = s.unit.Float64()
	}
	if p.pi != 0 {
		s.div *= math.Pow(math.Pi, float64(p.pi))
	}
	return s, nil
}

func isOne(r *big.Rat) bool { return r.IsInt() && r.Num().IsInt64() && r.Num().Int64() == 1 }

// Dim returns the dimension of the scale's unit.
func (s Scale) Dim() Dim { return s.dim }

// Of returns si in the scale's unit, right to a few units in the last place of si.
func (s Scale) Of(si float64) float64 { return (si - s.zero) * s.mul / s.div }

// Full returns the shortest decimal that, read in the scale's unit, gives back
// si bit for bit: 313.15 K is "40" in °C, not 39.99999999999994.
func (s Scale) Full(si float64) string {
	x := s.Of(si)
	if math.IsInf(si, 0) || math.IsNaN(si) || s.p.pi != 0 || (isOne(s.unit) && s.p.zero == nil) {
		return plain(strconv.FormatFloat(x, 'e', -1, 64))
	}
	if s.readsBack("0", si) {
		return "0"
	}
	exact := new(big.Rat).SetFloat64(si)
	if s.p.zero != nil {
		exact.Sub(exact, s.p.zero)
	}
	exact.Quo(exact, s.unit)
	x, _ = exact.Float64()
	_, power, _ := strings.Cut(strconv.FormatFloat(x, 'e', -1, 64), "e")
	e, _ := strconv.Atoi(power)
	mantissa := scale10(exact, -e)
	text := func(decimals int) string { return mantissa.FloatString(decimals) + "e" + power }
	return plain(text(sort.Search(maxFull, func(n int) bool { return s.readsBack(text(n), si) })))
}

// maxFull bounds the decimals Full tries: a level near absolute zero needs
// many in °C, since its double is far finer than 273.15's.
const maxFull = 400

func (s Scale) readsBack(text string, si float64) bool {
	r, ok := new(big.Rat).SetString(text)
	if !ok {
		return false
	}
	r.Mul(r, s.unit)
	if s.p.zero != nil {
		r.Add(r, s.p.zero)
	}
	f, _ := r.Float64()
	return f == si
}

// plain rewrites a decimal in scientific notation without the exponent, where
// the number is of ordinary size.
func plain(sci string) string {
	mantissa, power, ok := strings.Cut(sci, "e")
	if !ok {
		return sci // not a finite number
	}
	e, _ := strconv.Atoi(power)
	sign := ""
	if mantissa[0] == '-' {
		sign, mantissa = "-", mantissa[1:]
	}
	whole, frac, _ := strings.Cut(mantissa, ".")
	point := len(whole) + e
	digits := strings.TrimRight(whole+frac, "0")
	switch {
	case digits == "":
		return "0"
	case e < -5 || e >= 15:
		return sign + trimZeros(mantissa) + "e" + strconv.Itoa(e)
	case digits[0] == '0': // a mantissa below 1
		return sign + plain(digits[1:2]+"."+digits[2:]+"e"+strconv.Itoa(e-1))
	case point <= 0:
		return sign + "0." + strings.Repeat("0", -point) + digits
	case point >= len(digits):
		return sign + digits + strings.Repeat("0", point-len(digits))
	}
	return sign + digits[:point] + "." + digits[point:]
}

// Convert turns a number in SI into the unit named. To convert many, make a
// Scale.
func Convert(si float64, unit string, kind Kind) (float64, error) {
	s, err := NewScale(unit, kind)
	if err != nil {
		return 0, err
	}
	return s.Of(si), nil
}
