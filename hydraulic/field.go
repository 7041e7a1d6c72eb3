package hydraulic

import (
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Dimensions: exponents of kg, m, s, K, A.
var (
	pressure   = quantity.Dim{1, -1, -2, 0, 0}
	flow       = quantity.Dim{0, 3, -1, 0, 0}
	compliance = quantity.Dim{-1, 4, 2, 0, 0}
	resistance = quantity.Dim{1, -4, -1, 0, 0}
	inertance  = quantity.Dim{1, -4, 0, 0, 0}

	length      = quantity.Dim{0, 1, 0, 0, 0}
	area        = quantity.Dim{0, 2, 0, 0, 0}
	volume      = quantity.Dim{0, 3, 0, 0, 0}
	velocity    = quantity.Dim{0, 1, -1, 0, 0}
	density     = quantity.Dim{1, -3, 0, 0, 0}
	viscosity   = quantity.Dim{1, -1, -1, 0, 0}
	kinematic   = quantity.Dim{0, 2, -1, 0, 0}
	turning     = quantity.Dim{1, 2, 0, 0, 0} // moment of inertia
	power       = quantity.Dim{1, 2, -3, 0, 0}
	frequency   = quantity.Dim{0, 0, -1, 0, 0} // of events or turns
	duration    = quantity.Dim{0, 0, 1, 0, 0}
	temperature = quantity.Dim{0, 0, 0, 1, 0}
)

// atmosphere is what lies between gauge and absolute.
func atmosphere() casefile.Field {
	return casefile.Field{Name: "atmosphere", Type: casefile.Number, Dim: pressure, Kind: quantity.Absolute, HasMin: true, MinOpen: true, Structural: true,
		Help: "pressure of the air, absolute: what lies between gauge and absolute; 101325 Pa unless stated"}
}

// stated is a number that stands in the case as it is.
func stated(e *casefile.Element, path, symbol string, dim quantity.Dim, v casefile.Values) casefile.Derivation {
	text := strings.TrimSpace(strings.TrimPrefix(strings.TrimSpace(e.Text(path)), "="))
	return casefile.Derivation{Quantity: path + " of " + e.Name, Formula: symbol, Numbers: text, Source: e.SourceOf(path), SI: v.Num[e.Num(path)], Dim: dim}
}
