package thermal

import (
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A law computes one parameter of a part from what was typed, and says how. The
// setter and the derivation of a part share it, so that what is printed is what
// was reckoned.
type law struct {
	formula string // "t/(k·A)"
	numbers string // the numbers put in
	source  string
	value   func(v casefile.Values) float64 // SI; arithmetic only
}

// derive shows the law's result under a name.
func (l law) derive(quantityName string, dim quantity.Dim, v casefile.Values) casefile.Derivation {
	return casefile.Derivation{
		Quantity: quantityName, Formula: l.formula, Numbers: l.numbers, Source: l.source, SI: l.value(v), Dim: dim,
	}
}

// asTyped is the law of a parameter that the case states itself.
func asTyped(symbol string, n number) law {
	return law{formula: symbol, numbers: n.text, source: n.source, value: n.at}
}
