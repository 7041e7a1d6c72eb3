package thermal

import (
	"fmt"
	"strings"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A number is one input of a law: typed in the case, or known from the handbook.
type number struct {
	slot   casefile.Slot
	fixed  bool
	value  float64   // SI, where fixed
	points []onCurve // where it is stated against temperature: at is then its value at the usual one
	text   string    // as typed, or the handbook's value with its unit
	source string
}

// onCurve is one point of a property against temperature.
type onCurve struct{ x, y casefile.Slot }

// typed is the number that stands at a path of an element.
func typed(e *casefile.Element, path string) number {
	if at := path + ".points"; e.Has(at) {
		return number{points: pointsAt(e, at), text: "(points)", source: e.SourceOf(path)}
	}
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
	switch {
	case n.fixed:
		return n.value
	case n.points != nil:
		return n.alongPoints(v, usual)
	}
	return v.Num[n.slot]
}

// pointsAt are the points that stand at a path.
func pointsAt(e *casefile.Element, path string) []onCurve {
	points := make([]onCurve, e.Len(path))
	for i := range points {
		one := fmt.Sprintf("%s[%d].", path, i)
		points[i] = onCurve{e.Num(one + "first"), e.Num(one + "second")}
	}
	return points
}

// alongPoints is the value at x, straight between the points and constant outside.
func (n number) alongPoints(v casefile.Values, x float64) float64 {
	before := n.points[0]
	for _, p := range n.points {
		if v.Num[p.x] > x {
			if p == before {
				break
			}
			share := (x - v.Num[before.x]) / (v.Num[p.x] - v.Num[before.x])
			return v.Num[before.y] + share*(v.Num[p.y]-v.Num[before.y])
		}
		before = p
	}
	return v.Num[before.y]
}

// onto puts points into a curve.
func onto(c *curve, points []onCurve, v casefile.Values) {
	c.set(len(points), func(i int) (x, y float64) { return v.Num[points[i].x], v.Num[points[i].y] })
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
