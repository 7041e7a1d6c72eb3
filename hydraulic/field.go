package hydraulic

import (
	"strings"

	"lagbook/network"
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
)

// positive is a key that holds a number above zero.
func positive(name string, dim quantity.Dim, help string) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Number, Dim: dim, HasMin: true, MinOpen: true, Help: help}
}

// nodeName is a key that names a node of the case.
func nodeName(name, help string) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Name, Refers: "node", Structural: true, Help: help}
}

// between names the two ends of a part; its flow is positive from the first to the second.
func between() casefile.Field {
	return casefile.Field{Name: "between", Type: casefile.Names, Refers: "node", Structural: true, Required: true,
		HasMin: true, Min: 2, HasMax: true, Max: 2, Help: "the two nodes it joins; flow from the first to the second is positive"}
}

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

// together makes one setter of several, nil of none.
func together(setters []casefile.Setter) casefile.Setter {
	if len(setters) < 2 {
		for _, set := range setters {
			return set
		}
		return nil
	}
	return func(v casefile.Values, p *network.Params) error {
		for _, set := range setters {
			if err := set(v, p); err != nil {
				return err
			}
		}
		return nil
	}
}
