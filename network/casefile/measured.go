package casefile

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/quantity"
)

// AskMeasured is one [measured.NAME]: what a log holds of something shown. A time that
// stands twice is a jump.
type AskMeasured struct {
	Name   string
	Of     Shown
	Times  []float64 // s, in order
	Values []float64 // SI; a level of pressure as the case states levels
	File   string
	Column string // as the header of the file names it
	Source string
	Ref    network.Ref
}

const maxMeasured = 1000

var measuredFields = []Field{
	{Name: "of", Type: Name, Required: true},
	{Name: "file", Type: Text, Required: true, Help: "a table of numbers beside the case"},
	{Name: "column", Type: Text},
	{Name: "time", Type: Text},
}

// measurements reads [measured.NAME].
func (r *reader) measurements(k *key) {
	if r.countNamed(k, maxMeasured) {
		r.eachAsked(k, r.measured)
	}
}

// measured reads one.
func (r *reader) measured(k *key) {
	o := owner{label: "measured " + quoted(k.name)}
	ok := r.checkName(k, o)
	f := fielder{r: r, o: o, word: "measured", header: k.span}
	list, source, good := f.fields(k.value, measuredFields, nil)
	ok = ok && good
	ask := AskMeasured{Name: k.name, Source: source, Ref: r.c.ref(k.span, o)}
	times := ""
	for i := range list {
		x := &list[i]
		if x.n.kind != kindString || x.n.text == "" {
			if x.n.kind == kindString && x.name != "of" {
				r.at(x.n.span, Diagnostic{Code: "missing-name", Thing: o.thing(), Text: x.name + " is empty"})
			}
			ok = false // reported
			continue
		}
		switch x.name {
		case "of":
			ask.Of, good = r.shown(o, x.n)
			ok = ok && good
		case "file":
			ask.File = x.n.text
		case "column":
			ask.Column = x.n.text
		case "time":
			times = x.n.text
		}
	}
	if ok && r.logged(f, k.value, times, &ask) {
		r.c.Questions.Measured = append(r.c.Questions.Measured, ask)
	}
}

// logged reads the rows of the file.
func (r *reader) logged(f fielder, n *node, times string, ask *AskMeasured) bool {
	data, err := r.open(ask.File)
	key := "file"
	var pts [][2]float64
	if err == nil {
		pts, key, err = data.points(r.c, ask.File, times, ask.Column, &Field{Name: "column", Dim: ask.Of.Dim, Kind: ask.Of.Kind})
	}
	if err != nil {
		f.dataFault(n, key, err)
		return false
	}
	if _, v, _, err := data.columns(ask.File, times, ask.Column); err == nil {
		ask.Column = data.heads[v].name
	}
	ask.Times, ask.Values = make([]float64, len(pts)), make([]float64, len(pts))
	inside := false
	q := &r.c.Questions
	for i, p := range pts {
		ask.Times[i], ask.Values[i] = p[0], p[1]
		inside = inside || p[0] >= 0 && (!q.HasTo || p[0] <= r.c.slots[q.To].si)
	}
	if !inside {
		text := fmt.Sprintf("no row of %s lies in the run: its times go from %s to %s", quoted(ask.File), quantity.Duration(pts[0][0]), quantity.Duration(pts[len(pts)-1][0]))
		r.at(n.get("file").span, Diagnostic{Code: "beyond-the-run", Thing: f.o.thing(), Text: text, Hint: "the run begins at 0 s, and ends where [run] to says"})
	}
	return inside
}
