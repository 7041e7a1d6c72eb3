package thermal

import (
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A number is one input of a law: typed in the case, or known from the handbook.
type number struct {
	slot   casefile.Slot
	fixed  bool
	value  float64 // SI, where fixed
	text   string  // as typed, or the handbook's value with its unit
	source string
}

// typed is the number that stands at a path of an element.
func typed(e *casefile.Element, path string) number {
	return number{slot: e.Num(path), text: asFactor(e.Text(path)), source: e.SourceOf(path)}
}

// typedOr is the number at a path, or v where the case does not state it.
func typedOr(e *casefile.Element, path string, v float64, text string) number {
	if e.Has(path) {
		return typed(e, path)
	}
	return number{fixed: true, value: v, text: text}
}

// known is a number of the handbook.
func known(v float64, dim quantity.Dim, source string) number {
	return number{fixed: true, value: v, text: quantity.Print{Digits: 6}.Format(v, dim, quantity.Plain), source: source}
}

func (n number) at(v casefile.Values) float64 {
	if n.fixed {
		return n.value
	}
	return v.Num[n.slot]
}

// asFactor makes a typed text fit to stand in a product: an expression in
// parentheses and without its "=".
func asFactor(text string) string {
	if body, ok := strings.CutPrefix(strings.TrimSpace(text), "="); ok {
		body = strings.TrimSpace(body)
		if strings.ContainsAny(body, " +-*/^") {
			return "(" + body + ")"
		}
		return body
	}
	return text
}

// sources joins the sources of several numbers, each once, in their order.
func sources(numbers ...number) string {
	var list []string
next:
	for _, n := range numbers {
		for _, s := range list {
			if s == n.source {
				continue next
			}
		}
		if n.source != "" {
			list = append(list, n.source)
		}
	}
	return strings.Join(list, "; ")
}
