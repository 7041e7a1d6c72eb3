package quantity

import (
	"math"
	"math/big"
	"strings"
)

// Dim holds the exponents of kg, m, s, K and A.
type Dim [5]int8

// Kind tells a level (40 °C) from a difference (5 K); both have the unit K.
type Kind uint8

const (
	Plain      Kind = iota // neither a level nor a difference of one: a length, a watt, a pressure as "2 bar"
	Level                  // a temperature as read on a thermometer
	Difference             // how far two levels are apart
	Either                 // "40 K": a level or a difference, decided by where it stands
	Gauge                  // a pressure above the atmosphere's
	Absolute               // a pressure above vacuum
)

// A Value is a number with its dimension, in SI.
type Value struct {
	SI    float64  // the double next to Exact, where there is one
	Dim   Dim      //
	Kind  Kind     //
	Exact *big.Rat // the decimal as written, in SI; nil where it is not rational. Never changed once made
	Text  string   // as the user wrote it
}

// Parse reads a number with its unit: "0.35 K/W", "40 °C", "12.5e3", "−3 mK",
// "2 bar(g)". The unit is everything behind the number.
//
// The decimal is multiplied by the exact factor of the unit and rounded once,
// so SI is the double nearest to what was written. Errors are *SyntaxError;
// nan, inf, an exponent beyond ±400, more than 400 digits, and what no float64
// holds are refused.
func Parse(s string) (Value, error) {
	v, f := parse(s)
	if f != nil {
		return Value{}, f.syntax(s, func(t string) *fault { _, f := parse(t); return f })
	}
	return v, nil
}

func parse(s string) (Value, *fault) {
	if len(s) > maxText {
		return Value{}, &fault{n: len(s), found: "a text of more than 2000 bytes", want: "a number with a unit"}
	}
	pos := spaces(s)
	neg, n := scanSign(s[pos:])
	pos += n
	pos += spaces(s[pos:])
	d, n, f := scanNumber(s[pos:])
	if f == nil && n > 0 {
		f = afterNumber(s[pos:], n)
	}
	if f != nil {
		return Value{}, f.at(pos)
	}
	if n == 0 {
		return Value{}, noNumber(s, pos)
	}
	end := pos + n
	at := end + spaces(s[end:])
	var p product
	if rest := strings.TrimRightFunc(s[at:], isSpace); rest != "" {
		if p, f = parseUnit(rest); f != nil {
			return Value{}, f.at(at)
		}
	}
	d.neg = neg
	v, f := measure(d, p)
	if f != nil {
		f.off, f.n = pos, len(s)-pos
		return Value{}, f
	}
	v.Text = s
	return v, nil
}

// maxText bounds every text this package reads.
const maxText = 2000

// measure multiplies a decimal by its unit and rounds once.
func measure(d decimal, p product) (Value, *fault) {
	x := d.rat(p.exp10)
	if p.rat != nil {
		x.Mul(x, p.rat)
	}
	if p.zero != nil {
		x.Add(x, p.zero)
	}
	v := Value{Dim: p.dim, Kind: p.kind, Exact: x}
	v.SI, _ = x.Float64()
	if p.pi != 0 {
		v.SI *= math.Pow(math.Pi, float64(p.pi))
		v.Exact = nil
	}
	switch {
	case math.IsInf(v.SI, 0):
		return v, &fault{found: "a number too large to reckon with", want: "a magnitude below 1.8e308 in SI"}
	case math.Abs(v.SI) < smallest && x.Sign() != 0:
		return v, &fault{found: "a number too small to reckon with", want: "a magnitude of at least 2.3e-308 in SI, or 0"}
	}
	return v, nil
}

// smallest is the least number that has all its digits in a float64.
const smallest = 0x1p-1022

func noNumber(s string, pos int) *fault {
	rest := strings.TrimRightFunc(s[pos:], isSpace)
	switch {
	case rest == "":
		return &fault{off: 0, n: len(s), found: "nothing", want: "a number with a unit"}
	case rest[0] == '=':
		return &fault{off: pos, n: 1, found: "an expression", want: "a number with a unit"}
	}
	return &fault{off: pos, n: len(rest), found: quote(rest) + " is not a number", want: "a number with a unit"}
}
