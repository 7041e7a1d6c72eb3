package casefile

import (
	"strings"

	"lagbook/network/quantity"
)

var runFields = []Field{
	{Name: "start", Type: loose},
	{Name: "to", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "clock", Type: loose},
}

// run reads [run]: how the case starts, how long it runs, what the clock says.
func (r *reader) run(k *key) {
	o := owner{label: "run"}
	list, ok := r.single(k, o, runFields, nil)
	q := &r.c.Questions
	defer func() { r.endless = !q.HasTo && k.value.kind == kindTable && k.value.get("to") != nil }()
	for i := range list {
		switch x := &list[i]; x.name {
		case "start":
			r.start(o, x.n)
		case "to":
			q.To, q.HasTo = x.slot, ok && x.slot != noSlot
		case "clock":
			at, good := clockTime(x.n.text)
			if !good || x.n.kind != kindString && x.n.kind != kindDate {
				r.at(x.n.span, Diagnostic{Code: "clock", Thing: "run", Text: "clock is " + quoted(x.n.text) + "; expected a time of day, like \"06:00\""})
				continue
			}
			q.Clock, q.HasClock = at, true
		}
	}
}

// single reads a table of which a case has one.
func (r *reader) single(k *key, o owner, fields []Field, notBuilt []string) ([]entry, bool) {
	if k.value.kind != kindTable {
		r.wrongType(o, k.value, &Field{Name: k.name}, "a table, ["+k.name+"]")
		return nil, false
	}
	f := fielder{r: r, o: o, v: &Vocabulary{NotBuilt: notBuilt}, word: k.name, header: k.span}
	list, _, ok := f.fields(k.value, fields, nil)
	return list, ok
}

// start reads what [run] start says: a word or a level.
func (r *reader) start(o owner, n *node) {
	q := &r.c.Questions
	words := []string{"steady", "at rest", "cycle"}
	q.StartRef = r.c.ref(n.span, o)
	switch {
	case n.kind != kindString:
	case n.text == "steady":
		q.Start = StartSteady
		return
	case n.text == "cycle":
		q.Start = StartCycle
		return
	case n.text == "at rest":
		q.Start = StartAtRest
		return
	case n.text != "" && !digit(n.text[0]) && strings.IndexByte("=+-.−", n.text[0]) < 0:
		d := Diagnostic{Code: "unknown-word", Thing: "run", Text: "start is " + quoted(n.text) + "; expected \"steady\", \"at rest\", \"cycle\" or " + r.levelSample()}
		if near, ok := quantity.Nearest(n.text, words); ok {
			d.Fix = basic(near)
		}
		r.at(n.span, d)
		return
	}
	domain, ok := r.startDomain(o, n)
	if !ok {
		return
	}
	if s, ok := r.number(o, n, &Field{Name: "start", Dim: r.c.Measures(domain).Level, Kind: quantity.Level}); ok {
		q.Start, q.StartAt, q.StartDomain = StartLevel, s, domain
	}
}

// startDomain is the domain whose level [run] start is: of several in one file,
// that which measures its levels so.
func (r *reader) startDomain(o owner, n *node) (string, bool) {
	switch len(r.domains) {
	case 0:
		if len(r.voc) == 0 {
			return "", false // nothing can start
		}
		return r.voc[0].Domain, true
	case 1:
		return r.domains[0].Domain, true
	}
	_, v, ok := r.quantity(o, n, &Field{Name: "start", Dim: r.domains[0].Measures.Level, Kind: quantity.Level})
	for _, d := range r.domains {
		if ok && v.Dim == d.Measures.Level {
			return d.Domain, true
		}
	}
	return r.domains[0].Domain, ok
}

// levelSample puts what a level may be in words: `a temperature, like "20 °C"`.
func (r *reader) levelSample() string {
	var words []string
	for _, d := range r.domains {
		words = append(words, article(d.Measures.LevelWord)+", like "+quoted(d.Measures.Sample))
	}
	if words == nil {
		return "a level"
	}
	return strings.Join(words, ", or ")
}

// clockTime reads 6:30, 06:30 or 06:30:15 as s after midnight.
func clockTime(s string) (float64, bool) {
	parts := strings.Split(s, ":")
	if len(parts) < 2 || len(parts) > 3 {
		return 0, false
	}
	t := 0
	for i, p := range parts {
		if len(p) == 0 || len(p) > 2 || i > 0 && len(p) != 2 {
			return 0, false
		}
		v := 0
		for _, c := range []byte(p) {
			if !digit(c) {
				return 0, false
			}
			v = v*10 + int(c-'0')
		}
		if i == 0 && v > 23 || v > 59 {
			return 0, false
		}
		t = t*60 + v
	}
	if len(parts) == 2 {
		t *= 60
	}
	return float64(t), true
}
