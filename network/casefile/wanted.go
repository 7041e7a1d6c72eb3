package casefile

import (
	"strings"

	"lagbook/network/quantity"
)

// What messages say stands after the key of a number, and with which unit.

// bare reports whether a number without a unit may stand in a field.
func (f *Field) bare() bool {
	for _, d := range f.Also {
		if d == (quantity.Dim{}) {
			return true
		}
	}
	return f.Dim == (quantity.Dim{})
}

// unitOf is the unit a suggestion uses for a field.
func unitOf(f *Field) string {
	switch {
	case f.Unit != "":
		return f.Unit
	case f.Dim == dimKelvin && f.Kind == quantity.Level:
		return "°C"
	case f.Dim == dimPressure:
		return "bar"
	}
	return quantity.UnitOf(f.Dim)
}

// noun is what the quantity of a field is called, "" where there is no word.
func (f *Field) noun() string {
	switch f.Unit { // where the dimension alone would say something else
	case turns:
		return "speed"
	case "N·s/m":
		return "damping"
	case "Hz":
		return "frequency"
	}
	return quantity.WordOf(f.Dim)
}

// wanted says what stands after a field's key.
func wanted(f *Field) string {
	if f == nil {
		return "a quantity"
	}
	unit := unitOf(f)
	if f.Dim == (quantity.Dim{}) {
		return "a number"
	}
	word := f.noun()
	switch {
	case f.Dim == dimKelvin && f.Kind == quantity.Level:
		word = "temperature"
	case f.Dim == dimKelvin:
		word = "temperature difference"
	case word == "":
		return `a quantity with its unit, like "1 ` + unit + `"`
	}
	text := article(word) + ` with its unit, like "1 ` + unit + `"`
	for _, d := range f.Also {
		if d == (quantity.Dim{}) {
			text += " or a bare number"
			continue
		}
		text += ` or "1 ` + quantity.UnitOf(d) + `"`
	}
	return text
}

// article puts a or an before a word.
func article(word string) string {
	if strings.IndexByte("aeiou", word[0]) >= 0 {
		return "an " + word
	}
	return "a " + word
}

// turns is the unit of a speed that counts turns. A radian is 1 as a turn is, so that
// "50 rad/s" would be read as fifty turns in a second.
const turns = "rpm"

func (r *reader) radians(o owner, n *node, f *Field) {
	d := Diagnostic{Code: "radians", Thing: o.thing(), Text: label(f) + quoted(n.text) + ` counts radians; expected turns in a time, like "1450 rpm"`, Found: n.text, Want: "turns in a time"}
	d.Fix = basic("= " + strings.TrimSpace(n.text) + " / (2 * pi)")
	r.at(n.span, d)
}
