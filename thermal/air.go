package thermal

import (
	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

var pressureDim = quantity.Dim{1, -1, -2, 0, 0}

// airVocabulary is [air]: the air around everything, of every film and array of fins.
func airVocabulary() casefile.Vocabulary {
	return casefile.Vocabulary{
		Domain: "air",
		Head: []casefile.Field{
			{Name: "altitude", Type: casefile.Number, Dim: length, HasMin: true, Min: material.LowestAltitude, HasMax: true, Max: material.HighestAltitude,
				Help: "above sea level: the pressure is that of the standard atmosphere, ISO 2533"},
			{Name: "pressure", Type: casefile.Number, Dim: pressureDim, Kind: quantity.Absolute, HasMin: true, Min: 100, HasMax: true, Max: 1e7,
				Help: "absolute"},
		},
		OneOf: [][]string{{"altitude", "pressure", ""}},
	}
}

// airPressure is the pressure of the air in Pa, absolute: standard at sea level where
// the case says nothing.
func airPressure(c *casefile.Case) func(v casefile.Values) float64 {
	e := c.Head("air")
	switch {
	case e == nil:
	case e.Has("pressure"):
		slot := e.Num("pressure")
		return func(v casefile.Values) float64 { return v.Num[slot] }
	case e.Has("altitude"):
		slot := e.Num("altitude")
		return func(v casefile.Values) float64 {
			_, p := material.StandardAtmosphere(v.Num[slot])
			return p
		}
	}
	return func(casefile.Values) float64 { return casefile.StandardAtmosphere }
}
