package quantity

import (
	"strings"
)

// Want returns v in SI where it is of the wanted dimension and kind, and a
// *DimensionError where it is not.
//
// "40 K" serves as a level and as a difference; "40 °C" only as a level, and
// what an expression knows to be a difference not as a level. A plain pressure
// serves as gauge, absolute or difference, as the case states. Below absolute
// zero and below vacuum there is no level.
func (v Value) Want(dim Dim, kind Kind) (float64, error) {
	if v.Dim != dim {
		return 0, &DimensionError{
			Found:    v.subject() + " " + Describe(v.Dim, v.Kind),
			Expected: Describe(dim, kind),
			Suggest:  v.remedy(dim, kind),
		}
	}
	if !serves(v.Kind, kind) {
		return 0, &DimensionError{
			Found:    v.subject() + " " + Describe(v.Dim, v.Kind),
			Expected: Describe(dim, kind),
			Suggest:  v.otherKind(dim, kind),
		}
	}
	if v.SI < 0 && kind == Level && dim == dimKelvin {
		return 0, &DimensionError{Found: quote(v.Text) + " is below absolute zero", Expected: "a level above −273.15 °C"}
	}
	if v.SI < 0 && kind == Absolute {
		return 0, &DimensionError{Found: quote(v.Text) + " is below vacuum", Expected: "an absolute pressure of 0 or more"}
	}
	return v.SI, nil
}

// serves reports whether a value of kind have may stand where want is asked.
func serves(have, want Kind) bool {
	switch have {
	case want, Plain, Either:
		return true
	case Difference:
		return want == Plain || want == Either
	case Level:
		return want == Either
	}
	return false
}

func (v Value) subject() string {
	if isExpression(v.Text) {
		return quote(v.Text) + " comes to"
	}
	return quote(v.Text) + " is"
}

func isExpression(s string) bool { return strings.HasPrefix(strings.TrimSpace(s), "=") }

// otherKind offers 5 K for 5 °C, 9 Δ°F for 9 °F, and the mere pressure for a
// gauge one.
func (v Value) otherKind(dim Dim, kind Kind) string {
	if isExpression(v.Text) {
		return ""
	}
	for _, r := range [][2]string{{"°C", "K"}, {"℃", "K"}, {"degC", "K"}, {"°F", "Δ°F"}, {"℉", "Δ°F"}, {"degF", "Δ°F"}, {"Δ°C", "°C"}, {"Δ°F", "°F"},
		{"(g)", ""}, {"(a)", ""}, {"barg", "bar"}, {"bara", "bar"}, {"psig", "psi"}, {"psia", "psi"}} {
		if head, ok := strings.CutSuffix(strings.TrimSpace(v.Text), r[0]); ok {
			if s := head + r[1]; v.suits(s, dim, kind) {
				return s
			}
		}
	}
	return ""
}

// remedy offers a text of the right dimension: another capital, a degree sign,
// a unit where none was given, the reciprocal.
func (v Value) remedy(dim Dim, kind Kind) string {
	number, unit := split(v.Text)
	if v.Dim == dimNone && unit == "" && number != "" {
		return number + " " + usual(dim, kind)
	}
	if number != "" {
		for _, u := range variants(unit) {
			if s := number + u; v.suits(s, dim, kind) {
				return s
			}
		}
	}
	if under, ok := (Dim{}).plus(v.Dim, -1); ok && under == dim {
		return "= 1/(" + strings.TrimSpace(strings.TrimPrefix(strings.TrimSpace(v.Text), "=")) + ")"
	}
	return ""
}

func usual(dim Dim, kind Kind) string {
	switch {
	case dim == dimKelvin && kind == Level:
		return "°C"
	case kind == Gauge:
		return "bar(g)"
	case kind == Absolute:
		return "bar(a)"
	}
	return UnitOf(dim)
}

// suits reports whether s would be accepted.
func (v Value) suits(s string, dim Dim, kind Kind) bool {
	w, f := parse(s)
	return f == nil && w.Dim == dim && serves(w.Kind, kind) && (w.SI >= 0 || kind != Level)
}

// split parts a text into its number and its unit with the space before it;
// both are "" for an expression.
func split(s string) (number, unit string) {
	if isExpression(s) {
		return "", ""
	}
	pos := spaces(s)
	_, n := scanSign(s[pos:])
	pos += n
	pos += spaces(s[pos:])
	_, n, _ = scanNumber(s[pos:])
	return s[:pos+n], strings.TrimRightFunc(s[pos+n:], isSpace)
}

// variants lists the unit with one symbol changed: C and F to degrees, a
// symbol to one that differs in capitals only.
func variants(unit string) []string {
	var list []string
	for at := 0; at < len(unit); {
		sym, n := symbolAt(unit[at:])
		if n == 0 {
			at++
			continue
		}
		for _, s := range alike(sym) {
			list = append(list, unit[:at]+s+unit[at+n:])
		}
		at += n
	}
	return list
}

func alike(sym string) []string {
	list := []string{}
	if sym == "C" || sym == "F" {
		list = append(list, "°"+sym)
	}
	for i := range units {
		if s := units[i].sym; s != sym && strings.EqualFold(s, sym) {
			list = append(list, s)
		}
		for _, p := range &prefixes {
			if s := p.sym + units[i].sym; units[i].prefix && s != sym && strings.EqualFold(s, sym) {
				list = append(list, s)
			}
		}
	}
	return list
}
