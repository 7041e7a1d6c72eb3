package casefile

import (
	"errors"
	"math"

	"lagbook/network/quantity"
)

// StandardAtmosphere is taken, in Pa, where the case states none: the standard
// atmosphere, ISO 2533.
const StandardAtmosphere = 101325.0

// Pressures say how a case means a pressure that is a level, and what lies
// between gauge and absolute. A plain "2 bar" is meant so; "2 bar(g)" and
// "2 bar(a)" say it themselves and are converted.
type Pressures struct {
	Absolute   bool    // levels are absolute pressures; else gauge ones, above the atmosphere
	Atmosphere float64 // Pa, absolute
	Stated     bool    // the case says which
}

// Kind is what levels of pressure are: quantity.Gauge or quantity.Absolute.
func (p Pressures) Kind() quantity.Kind {
	if p.Absolute {
		return quantity.Absolute
	}
	return quantity.Gauge
}

// level converts a pressure to one as the case states levels.
func (p Pressures) level(v quantity.Value) (float64, error) {
	switch v.Kind {
	case quantity.Gauge:
		if p.Absolute {
			return v.SI + p.Atmosphere, nil
		}
		return v.SI, nil
	case quantity.Absolute:
		if _, err := v.Want(dimPressure, quantity.Absolute); err != nil { // below vacuum
			return 0, err
		}
		if !p.Absolute {
			return v.SI - p.Atmosphere, nil
		}
		return v.SI, nil
	}
	return v.Want(dimPressure, quantity.Level)
}

var dimPressure = quantity.Dim{1, -1, -2, 0, 0}

// want returns a value in SI where it is what a field takes: of its dimension or
// one of the others it allows, and of its kind, a pressure as the case states
// pressures. dim is the dimension it is of.
func (c *Case) want(v quantity.Value, f *Field) (si float64, dim quantity.Dim, err error) {
	for _, other := range f.Also {
		if v.Dim == other {
			si, err = v.Want(other, quantity.Plain)
			return si, other, err
		}
	}
	if f.Kind == quantity.Level && f.Dim == dimPressure && v.Dim == dimPressure {
		si, err = c.Pressures.level(v)
		return si, f.Dim, err
	}
	si, err = v.Want(f.Dim, f.Kind)
	var e *quantity.DimensionError
	if errors.As(err, &e) {
		if word := f.noun(); f.Unit != "" && word != "" {
			e.Expected = article(word) + " (" + f.Unit + ")"
		}
		for _, other := range f.Also {
			e.Expected += " or " + quantity.Describe(other, quantity.Plain)
		}
	}
	return si, f.Dim, err
}

// lowest is the value below which there is no level: absolute zero, vacuum.
func (c *Case) lowest(f *Field) (si float64, words string) {
	switch {
	case f.Kind != quantity.Level:
	case f.Dim == dimKelvin:
		return 0, "absolute zero, −273.15 °C"
	case f.Dim == dimPressure && c.Pressures.Absolute:
		return 0, "vacuum, 0 bar(a)"
	case f.Dim == dimPressure:
		return -c.Pressures.Atmosphere, "vacuum, " + c.show(-c.Pressures.Atmosphere, f)
	}
	return math.Inf(-1), ""
}

// printKind is the kind to print a value of a field with.
func (c *Case) printKind(f *Field) quantity.Kind {
	if f.Kind == quantity.Level && f.Dim == dimPressure {
		return c.Pressures.Kind()
	}
	return f.Kind
}

// show prints a value of a field in SI.
func (c *Case) show(si float64, f *Field) string {
	return quantity.Print{}.Format(si, f.Dim, c.printKind(f))
}
