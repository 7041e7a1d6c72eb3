package thermal

import (
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Dimensions: exponents of kg, m, s, K, A.
var (
	dimless       = quantity.Dim{}
	length        = quantity.Dim{0, 1, 0, 0, 0}
	area          = quantity.Dim{0, 2, 0, 0, 0}
	volume        = quantity.Dim{0, 3, 0, 0, 0}
	mass          = quantity.Dim{1, 0, 0, 0, 0}
	duration      = quantity.Dim{0, 0, 1, 0, 0}
	temperature   = quantity.Dim{0, 0, 0, 1, 0}
	power         = quantity.Dim{1, 2, -3, 0, 0}
	resistance    = quantity.Dim{-1, -2, 3, 1, 0}
	conductance   = quantity.Dim{1, 2, -3, -1, 0}
	capacitance   = quantity.Dim{1, 2, -2, -1, 0}
	conductivity  = quantity.Dim{1, 1, -3, -1, 0}
	coefficient   = quantity.Dim{1, 0, -3, -1, 0}
	inverseKelvin = quantity.Dim{0, 0, 0, -1, 0}
	density       = quantity.Dim{1, -3, 0, 0, 0}
	specificHeat  = quantity.Dim{0, 2, -2, -1, 0}
	volumeFlow    = quantity.Dim{0, 3, -1, 0, 0}
	massFlow      = quantity.Dim{1, 0, -1, 0, 0}
	energy        = quantity.Dim{1, 2, -2, 0, 0}
	latentHeat    = quantity.Dim{0, 2, -2, 0, 0}
)

// level is a key that holds a temperature, not a difference of two.
func level(name, help string) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Number, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true, Help: help}
}

// materialName is a key that names an own material or one of the handbook.
func materialName(help string) casefile.Field {
	return casefile.Field{Name: "material", Type: casefile.Name, Structural: true, Help: help}
}

func required(f casefile.Field) casefile.Field {
	f.Required = true
	return f
}

// with says that a key must not stand alone.
func with(f casefile.Field, key string) casefile.Field { return withAll(f, key) }

func withAll(f casefile.Field, keys ...string) casefile.Field {
	f.With = keys
	return f
}

// difference is a key that holds a difference of two temperatures, above 0.
func difference(name, help string) casefile.Field {
	return casefile.Field{Name: name, Type: casefile.Number, Dim: temperature, Kind: quantity.Difference, HasMin: true, MinOpen: true, Help: help}
}

// againstTemperature lets a number be stated by points against temperature too.
func againstTemperature(f casefile.Field) casefile.Field {
	at := level("temperature", "temperature of the point")
	f.Against = &at
	f.Help += "; or points against temperature, straight between, constant outside"
	return f
}

// startLevel is the temperature at which a node is held or starts, where the case says so.
func startLevel(c *casefile.Case, v casefile.Values, node string) (T float64, ok bool) {
	e, known := c.Element("thermal.node", node)
	switch {
	case !known:
		return 0, false
	case e.Has("held"):
		return v.Wave[e.Wave("held")].Before, true
	case e.Has("start"):
		return v.Num[e.Num("start")], true
	case c.Questions.Start == casefile.StartLevel:
		return v.Num[c.Questions.StartAt], true
	}
	return 0, false
}
