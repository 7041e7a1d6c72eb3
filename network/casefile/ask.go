package casefile

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"

	"lagbook/network/quantity"
)

// maxRows is how many rows a table may have.
const maxRows = 100_000

var transferFields = []Field{
	{Name: "from", Type: Name, Required: true},
	{Name: "to", Type: Name, Required: true},
	{Name: "about", Type: loose},
}

var tableFields = []Field{
	{Name: "title", Type: Text},
	{Name: "show", Type: Names, Required: true},
	{Name: "above", Type: Name},
	{Name: "times", Type: loose, Help: `["0 s", "1 min"]`},
	{Name: "from", Type: Number, Dim: dimTime, HasMin: true, With: []string{"every"}},
	{Name: "to", Type: Number, Dim: dimTime, HasMin: true, With: []string{"every"}},
	{Name: "every", Type: Number, Dim: dimTime, HasMin: true, MinOpen: true},
	{Name: "also", Type: Names},
}

// questions reads what is asked.
func (r *reader) questions(asked []*key) {
	for _, k := range asked {
		if k.name == "result" {
			r.nameResults(k)
		}
	}
	r.readResults()
	for _, k := range asked {
		switch k.name {
		case "print":
			r.print(k)
		case "show":
			r.at(k.span, Diagnostic{Severity: Warning, Code: "old-word", Text: quoted(k.name) + " is an older word for [print]", Fix: "print"})
			r.print(k)
		case "transfer":
			r.each(k, r.transfer)
		case "table":
			r.each(k, r.table)
		case "limit":
			r.limits(k)
		case "find":
			r.finds(k)
		case "measured":
			r.measurements(k)
		case "scenario":
			r.scenarios(k, asked)
		}
	}
}

// each calls read for every table of [[k]].
func (r *reader) each(k *key, read func(o owner, n *node)) {
	if k.value.kind == kindTable && k.value.table.made == byHeader {
		r.at(k.value.span, Diagnostic{Code: "wrong-type", Text: "there may be several of " + quoted(k.name), Fix: "[[" + k.name + "]]"})
		return
	}
	if k.value.kind != kindArray {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "tables, [["+k.name+"]]")
		return
	}
	for i, n := range k.value.items {
		if n.kind != kindTable {
			r.wrongType(owner{}, n, &Field{Name: k.name}, "tables, [["+k.name+"]]")
			continue
		}
		label := k.name + " " + strconv.Itoa(i+1)
		if t := n.get("title"); t != nil && t.kind == kindString && t.text != "" {
			label = k.name + " " + quoted(t.text)
		}
		read(owner{label: label}, n)
	}
}

// transfer reads one [[transfer]].
func (r *reader) transfer(o owner, n *node) {
	f := fielder{r: r, o: o, word: "transfer", header: n.span}
	list, source, ok := f.fields(n, transferFields, nil)
	ask := AskTransfer{Source: source, Ref: r.c.ref(n.span, o)}
	for i := range list {
		x := &list[i]
		if x.n.kind != kindString || x.n.text == "" {
			if x.name == "about" {
				ok = r.aboutTime(o, x.n, &ask) && ok
			}
			continue
		}
		if x.name == "from" {
			var good bool
			ask.From, good = r.input(o, x.n)
			ok = ok && good
			continue
		}
		var good bool
		if x.name == "about" {
			good = r.aboutTime(o, x.n, &ask)
			ok = ok && good
			continue
		}
		ask.To, good = r.shown(o, x.n)
		if good && ask.To.Result != "" {
			r.at(x.n.span, Diagnostic{Code: "kinds", Thing: o.thing(), Text: fmt.Sprintf("%s is a result: a transfer goes to a node, a difference of two or a reading", quoted(x.n.text)),
				Hint: "ask for the transfers to what it is made of"})
			good = false
		}
		ok = ok && good
	}
	if ok {
		r.c.Questions.Transfers = append(r.c.Questions.Transfers, ask)
	}
}

// aboutTime reads the moment about which a transfer is linearised: "start" or a time.
func (r *reader) aboutTime(o owner, n *node, ask *AskTransfer) bool {
	if n.text == "start" {
		return true
	}
	if first, _ := utf8.DecodeRuneInString(n.text); n.kind == kindString && unicode.IsLetter(first) {
		d := Diagnostic{Code: "unknown-word", Thing: o.thing(), Text: "about is " + quoted(n.text) + "; expected \"start\" or a time, like \"2 s\""}
		if near, ok := quantity.Nearest(n.text, []string{"start"}); ok {
			d.Fix = basic(near)
		}
		r.at(n.span, d)
		return false
	}
	ask.About, ask.HasAbout = r.number(o, n, &Field{Name: "about", Dim: dimTime, HasMin: true})
	return ask.HasAbout && r.inRun(o, n, "about", r.c.slots[ask.About].si)
}

// table reads one [[table]].
func (r *reader) table(o owner, n *node) {
	f := fielder{r: r, o: o, word: "table", header: n.span}
	list, source, ok := f.fields(n, tableFields, [][]string{{"times", "every"}})
	ask := AskTable{Source: source, Ref: r.c.ref(n.span, o)}
	for i := range list {
		x := &list[i]
		switch x.name {
		case "title":
			ask.Title = x.n.text
		case "show":
			for j := range x.list {
				s, good := r.shown(o, x.list[j].n)
				ask.Show = append(ask.Show, s)
				ok = ok && good
			}
		case "above":
			var good bool
			ask.Above, good = r.above(o, x.n)
			ok = ok && good
		case "times":
			var good bool
			ask.Times, good = r.times(o, x.n)
			ok = ok && good
		case "from":
			ask.From, ask.HasFrom = x.slot, true
		case "to":
			ask.To, ask.HasTo = x.slot, true
		case "every":
			ask.Every, ask.HasEvery = x.slot, true
		case "also":
			ok = r.also(o, x, &ask) && ok
		}
	}
	if ok && ask.HasEvery {
		ok = r.rowsFit(o, n, &ask)
	}
	if ok && ask.Above != "" {
		ok = r.rises(o, n.get("above"), ask.Show)
	}
	if ok {
		r.c.Questions.Tables = append(r.c.Questions.Tables, ask)
	}
}

// above reads the node that levels are counted from.
func (r *reader) above(o owner, n *node) (string, bool) {
	if n.kind != kindString || n.text == "" {
		return "", false // reported where it was read
	}
	full, _, ok := r.nodeAt(o, n, n.text)
	return full, ok
}

// rises checks that what is shown above a node is a level of its domain.
func (r *reader) rises(o owner, above *node, shown []Shown) bool {
	_, base, _ := r.nodeAt(o, above, above.text)
	for _, s := range shown {
		text := ""
		switch {
		case s.Result != "" && s.Kind == quantity.Level:
			text = fmt.Sprintf("above goes with nodes; %s is a result, whose expression may subtract %s", quoted(s.Text), quoted(above.text))
		case s.Kind != quantity.Level || s.Node == "":
			text = fmt.Sprintf("above goes with levels; %s is none", quoted(s.Text))
		case base != nil && s.Dim != r.measures(base).Level:
			text = fmt.Sprintf("%s and %s are of two domains: their levels have no difference", quoted(s.Text), quoted(above.text))
		}
		if text != "" {
			r.at(above.span, Diagnostic{Code: "kinds", Thing: o.thing(), Text: text})
			return false
		}
	}
	return true
}

// also reads the rows a table shows besides.
func (r *reader) also(o owner, x *entry, ask *AskTable) bool {
	ok := true
	words := []string{"peaks", "jumps"}
	for i := range x.list {
		n := x.list[i].n
		switch n.text {
		case "peaks":
			ask.Peaks = true
		case "jumps":
			ask.Jumps = true
		default:
			d := Diagnostic{Code: "unknown-word", Thing: o.thing(), Text: "also: " + quoted(n.text) + " is not one of its words"}
			if near, good := quantity.Nearest(n.text, words); good {
				d.Fix = basic(near)
			} else {
				d.Hint = "there are " + strings.Join(words, ", ")
			}
			r.at(n.span, d)
			ok = false
		}
	}
	return ok
}

// times reads a list of ascending times.
func (r *reader) times(o owner, n *node) ([]Slot, bool) {
	if n.kind != kindArray || len(n.items) == 0 {
		r.wrongType(o, n, &Field{Name: "times"}, `a list of times, like ["0 s", "10 s"]`)
		return nil, false
	}
	if len(n.items) > maxRows {
		r.at(n.span, Diagnostic{Code: "too-many", Thing: o.thing(), Text: fmt.Sprintf("times has %d items, more than the %d rows a table may have", len(n.items), maxRows)})
		return nil, false
	}
	f := &Field{Name: "times", Dim: dimTime, HasMin: true}
	var list []Slot
	last := -1.0
	ok := true
	for _, item := range n.items {
		s, good := r.number(o, item, f)
		if !good {
			ok = false
			continue
		}
		at := r.c.slots[s].si
		if at <= last {
			r.at(item.span, Diagnostic{Code: "order", Thing: o.thing(), Text: fmt.Sprintf("the time %s comes after %s; times go forward", quoted(item.text), quantity.Duration(last))})
			ok = false
		} else if !r.inRun(o, item, "times", at) {
			ok = false
		}
		last = math.Max(last, at)
		list = append(list, s)
	}
	return list, ok
}

// inRun checks that a time lies in the run.
func (r *reader) inRun(o owner, n *node, what string, at float64) bool {
	q := &r.c.Questions
	if !q.HasTo {
		return true
	}
	end := r.c.slots[q.To].si
	if at <= end*(1+1e-12) {
		return true
	}
	r.at(n.span, Diagnostic{Code: "beyond-the-run", Thing: o.thing(), Text: fmt.Sprintf("%s: %s is beyond the run, which ends at %s", what,
		quantity.Duration(at), r.c.slots[q.To].n.text), Hint: "let the run go on for longer with [run] to"})
	return false
}

// rowsFit checks from, to and every of a table.
func (r *reader) rowsFit(o owner, n *node, ask *AskTable) bool {
	at := func(s Slot, has bool, otherwise float64) float64 {
		if has {
			return r.c.slots[s].si
		}
		return otherwise
	}
	q := &r.c.Questions
	if !ask.HasTo && r.endless {
		return false // reported where the run is stated
	}
	if !ask.HasTo && !q.HasTo {
		r.at(n.get("every").span, Diagnostic{Code: "missing-key", Thing: o.thing(), Text: "to is missing, and [run] states none", Hint: `add to = "1 h"`})
		return false
	}
	from := at(ask.From, ask.HasFrom, 0)
	to := at(ask.To, ask.HasTo, at(q.To, q.HasTo, 0))
	every := at(ask.Every, true, 0)
	if ask.HasTo && !r.inRun(o, n.get("to"), "to", to) {
		return false
	}
	if from > to {
		r.at(n.get("from").span, Diagnostic{Code: "order", Thing: o.thing(), Text: fmt.Sprintf("from, %s, comes after to, %s", quantity.Duration(from), quantity.Duration(to))})
		return false
	}
	if rows := (to-from)/every + 1; rows > maxRows {
		r.at(n.get("every").span, Diagnostic{Code: "too-many", Thing: o.thing(), Text: fmt.Sprintf("that makes %.4g rows, more than the %d a table may have", rows, maxRows)})
		return false
	}
	return true
}
