package casefile

import (
	"errors"
	"fmt"
	"strings"

	"lagbook/network/quantity"
)

// The words of [print] and what each is the unit of. A resistance may be one of
// heat or of flow; the unit says which.
var printWords = []struct {
	word string
	dims []quantity.Dim
	kind quantity.Kind
}{
	{"temperature", []quantity.Dim{dimKelvin}, quantity.Level},
	{"difference", []quantity.Dim{dimKelvin}, quantity.Difference},
	{"pressure", []quantity.Dim{dimPressure}, quantity.Plain},
	{"time", []quantity.Dim{dimTime}, quantity.Plain},
	{"power", []quantity.Dim{{1, 2, -3, 0, 0}}, quantity.Plain},
	{"flow", []quantity.Dim{{0, 3, -1, 0, 0}}, quantity.Plain},
	{"resistance", []quantity.Dim{{-1, -2, 3, 1, 0}, {1, -4, -1, 0, 0}}, quantity.Plain},
	{"conductance", []quantity.Dim{{1, 2, -3, -1, 0}, {-1, 4, 1, 0, 0}}, quantity.Plain},
	{"capacitance", []quantity.Dim{{1, 2, -2, -1, 0}}, quantity.Plain},
	{"compliance", []quantity.Dim{{-1, 4, 2, 0, 0}}, quantity.Plain},
	{"inertance", []quantity.Dim{{1, -4, 0, 0, 0}}, quantity.Plain},
	{"level", []quantity.Dim{dimLength}, quantity.Plain},
	{"volume", []quantity.Dim{{0, 3, 0, 0, 0}}, quantity.Plain},
	{"energy", []quantity.Dim{{1, 2, -2, 0, 0}}, quantity.Plain},
	{"velocity", []quantity.Dim{{0, 1, -1, 0, 0}}, quantity.Plain},
	{"speed", []quantity.Dim{dimRate}, quantity.Plain},
}

// printAlso are other words for those above.
var printAlso = [][2]string{{"heat", "power"}, {"length", "level"}}

var printNotBuilt = []string{"print.mass"}

// PrintWord returns the word of [print] under which the unit of a quantity is
// stated, "" where there is none.
func PrintWord(dim quantity.Dim, kind quantity.Kind) string {
	if dim == dimKelvin && kind != quantity.Level {
		return "difference"
	}
	for _, w := range printWords {
		for _, d := range w.dims {
			if d == dim {
				return w.word
			}
		}
	}
	return ""
}

// print reads [print]: the units to print in.
func (r *reader) print(k *key) {
	o := owner{label: "print"}
	fields := []Field{{Name: "digits", Type: Count, HasMin: true, Min: 1, HasMax: true, Max: 17}}
	for _, w := range printWords {
		fields = append(fields, Field{Name: w.word, Type: Text})
	}
	for _, also := range printAlso {
		fields = append(fields, Field{Name: also[0], Type: Text})
	}
	list, _ := r.single(k, o, fields, printNotBuilt)
	stated := map[string]string{}
	q := &r.c.Questions
	for i := range list {
		x := &list[i]
		if x.name == "digits" {
			if x.slot != noSlot {
				q.Digits = int(r.c.slots[x.slot].si)
			}
			continue
		}
		if x.n.kind != kindString {
			continue // reported where it was read
		}
		word := x.name
		for _, also := range printAlso {
			if also[0] == word {
				word = also[1]
			}
		}
		if first := stated[word]; first != "" {
			r.at(x.n.span, Diagnostic{Code: "stated-twice", Thing: o.thing(), Text: fmt.Sprintf("%s and %s are the unit of one thing", first, x.name), Hint: "keep one of them"})
			continue
		}
		stated[word] = x.name
		for i := range printWords {
			if w := &printWords[i]; w.word == word {
				r.printUnit(o, x.n, word, w.dims, w.kind)
			}
		}
	}
	for word, p := range q.Print {
		p.Digits = q.Digits
		q.Print[word] = p
	}
}

func (r *reader) printUnit(o owner, n *node, word string, dims []quantity.Dim, kind quantity.Kind) {
	unit := strings.TrimSpace(n.text)
	err := unitFits(unit, dims, kind)
	if err != nil {
		f := &Field{Name: word, Dim: dims[0], Kind: kind}
		d := Diagnostic{Code: "unit", Thing: o.thing(), Text: quoted(n.text) + " is not the unit of " + article(word) + ", like \"" + unitOf(f) + "\""}
		var e *quantity.DimensionError
		if errors.As(err, &e) && dims[0] == dimPressure && strings.HasPrefix(e.Suggest, "1 ") {
			d.Text = quoted(n.text) + " says gauge or absolute, which [hydraulic] pressures does"
			d.Fix = basic(strings.TrimPrefix(e.Suggest, "1 "))
		}
		r.at(n.span, d)
		return
	}
	if r.c.Questions.Print == nil {
		r.c.Questions.Print = map[string]quantity.Print{}
	}
	r.c.Questions.Print[word] = quantity.Print{Unit: unit}
}

// unitFits checks a unit against the dimensions of a word.
func unitFits(unit string, dims []quantity.Dim, kind quantity.Kind) error {
	v, err := quantity.Parse("1 " + unit)
	if err == nil && kind == quantity.Difference && v.Kind == quantity.Level {
		v, err = quantity.Parse("1 Δ" + unit) // a difference may be printed in °C
	}
	if err != nil {
		return err
	}
	for _, d := range dims {
		if _, err = v.Want(d, kind); err == nil {
			return nil
		}
	}
	return err
}
