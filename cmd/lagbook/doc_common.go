package main

import (
	"strconv"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/network/study"
)

// doubts are the warnings, which stand before what they concern.
func doubts(e study.Evidence) []present.Part {
	var parts []present.Part
	for _, w := range e.Warnings {
		if w.Code != "cancelled" { // named with the transfer function
			parts = append(parts, present.Warning{Text: w.Text})
		}
	}
	return parts
}

// closing are the parts that end every page: what is assumed, the caution.
func closing(c *casefile.Case, e study.Evidence) []present.Part {
	return []present.Part{
		present.Heading{Level: 1, Text: "Assumed"},
		present.List{Items: supposed(c, e)},
		present.Caution{Text: e.Caution},
	}
}

// supposed lists what every answer rests on: the start, what does not change,
// where the data come from.
func supposed(c *casefile.Case, e study.Evidence) []string {
	items := []string{"start: " + e.Start, e.Linear}
	if e.Marched != nil {
		items = append(items, "what came in, less what went out and what is stored more, is "+quantity.Number(e.Balance.Error, 1)+" of what passed in the march")
	}
	if words := dataWords(c); words != "" {
		items = append(items, words)
	}
	return items
}

// full writes a number at full precision, as CSV carries it.
func full(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// fullOf writes a number that may be absent.
func fullOf(v *float64) string {
	if v == nil {
		return ""
	}
	return full(*v)
}

// head is the head of a column: "junction / °C".
func head(name, unit string) string {
	if unit == "" || unit == "1" {
		return name
	}
	return name + " / " + unit
}

// title names a page, even of a case that has no title.
func title(t string) string {
	if t == "" {
		return "Case without a title"
	}
	return t
}

// kindWord says behind a unit whether a number is a level or a difference.
func kindWord(kind string) string {
	switch kind {
	case "level", "difference":
		return " (" + kind + ")"
	}
	return ""
}

// list joins names with commas.
func list(names []string) string { return strings.Join(names, ", ") }
