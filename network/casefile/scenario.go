package casefile

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A Scenario is the same network under other loads: some given values and profiles are
// others. Case.Under computes the values of the case with it in force.
type Scenario struct {
	Name     string
	Title    string // "" where it states none
	Set      []ScenarioSet
	Profiles [][2]string // a profile and the one that stands in for it
	Tables   []string    // the titles of those it is asked for; nil: all, empty: none
	Limits   []string    // the names of those it is asked for; nil: all, empty: none
	Source   string      // where it comes from, "" if not stated
	Ref      network.Ref
}

// A ScenarioSet is one given value that a scenario sets. An expression in it holds the
// given values of the case, so that load = "= 1.2 * load" is a fifth more.
type ScenarioSet struct {
	Given  string
	Text   string // as written
	Source string // where it comes from, "" if not stated
	Slot   Slot   // the value in SI
	Ref    network.Ref

	index int // of the given value
	x     settled
}

// maxScenarios is how many scenarios a case may have: each is computed once when the case
// is read.
const maxScenarios = 200

var scenarioFields = []Field{
	{Name: "title", Type: Text},
	{Name: "set", Type: loose, Help: `{ given = "a value" }`},
	{Name: "profiles", Type: loose, Help: `{ profile = "another" }`},
	{Name: "tables", Type: loose, Help: `["the title of a table"]`},
	{Name: "limits", Type: loose, Help: `["a limit"]`},
}

// A settled is a value that a scenario sets.
type settled struct {
	expr  *quantity.Expr // nil: value for ever
	value quantity.Value
	field *Field
	n     *node
	owner owner
}

// scenarios reads [scenario.NAME]; asked are the questions of the case.
func (r *reader) scenarios(k *key, asked []*key) {
	if !r.countNamed(k, maxScenarios) {
		return
	}
	r.eachAsked(k, func(x *key) { r.scenario(x, asked) })
}

// scenario reads one.
func (r *reader) scenario(k *key, asked []*key) {
	o := owner{label: "scenario " + quoted(k.name)}
	ok := r.checkName(k, o)
	f := fielder{r: r, o: o, word: "scenario", header: k.span}
	list, source, good := f.fields(k.value, scenarioFields, nil)
	ok = ok && good
	s := Scenario{Name: k.name, Source: source, Ref: r.c.ref(k.span, o)}
	for i := range list {
		x := &list[i]
		good := true
		switch x.name {
		case "title":
			s.Title = x.n.text
		case "set":
			s.Set, good = r.scenarioSet(o, k.value.table.find("set"))
		case "profiles":
			s.Profiles, good = r.standIns(o, x.n)
		case "tables":
			s.Tables, good = r.listed(o, x.n, "tables", "the title of a table", tableTitles(asked))
		case "limits":
			s.Limits, good = r.listed(o, x.n, "limits", "the name of a limit", limitNames(asked))
		}
		ok = ok && good
	}
	if ok {
		r.c.Questions.Scenarios = append(r.c.Questions.Scenarios, s)
	}
}

// scenarioSet reads the given values that a scenario sets.
func (r *reader) scenarioSet(o owner, k *key) ([]ScenarioSet, bool) {
	list, ok := r.statedIn(o, k, `a table like { given = "a value" }`)
	var set []ScenarioSet
	seen := map[string]bool{}
	for i := range list {
		x := &list[i]
		if seen[x.name] { // a.b beside "a.b"
			r.at(x.key, Diagnostic{Code: "defined-twice", Thing: o.thing(), Text: "set states " + quoted(x.name) + " twice"})
			ok = false
			continue
		}
		seen[x.name] = true
		g, found := r.givenCalled(o, x)
		if !found {
			ok = false
			continue
		}
		s, good := r.setGiven(o, x, g)
		if ok = ok && good; good {
			set = append(set, s)
		}
	}
	return set, ok
}

// givenCalled finds the given value that a scenario sets.
func (r *reader) givenCalled(o owner, x *stated) (int, bool) {
	if i, ok := r.c.GivenIndex(x.name); ok {
		return i, !r.c.givens[i].bad
	}
	if r.full() {
		r.report(Diagnostic{})
		return 0, false
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: "set: " + quoted(x.name) + " is not defined in [given]", Found: x.name, Want: "a given value"}
	names := make([]string, len(r.c.Given))
	for i := range r.c.Given {
		names[i] = r.c.Given[i].Name
	}
	if _, profile := r.c.profileNamed(x.name); profile {
		d.Text, d.Hint = "set: "+quoted(x.name)+" is a profile, not a given value", "write profiles = { "+tomlKey(x.name)+` = "another profile" }`
	} else if near, ok := quantity.Nearest(x.name, names); ok {
		if d.Fix = r.keyFor(x, near); d.Fix == "" {
			d.Hint = "did you mean " + quoted(near) + "?"
		}
	} else if len(names) == 0 {
		d.Hint = "the case has no given values; write [given]"
	} else {
		d.Hint = "the given values are" + listed(names)[1:]
	}
	r.at(x.key, d)
	return 0, false
}

// setGiven reads the value that a scenario gives to a given value: of its dimension, and
// of temperatures of its kind.
func (r *reader) setGiven(o owner, x *stated, i int) (s ScenarioSet, ok bool) {
	like := r.c.givens[i].value
	f := &Field{Name: "set." + x.name, Dim: like.Dim, Kind: quantity.Plain}
	if like.Dim == dimKelvin {
		f.Kind = like.Kind
	}
	expr, v, ok := r.quantity(o, x.n, f)
	if !ok {
		return s, false
	}
	if v.Dim == dimPressure && v.Kind != quantity.Plain { // as a level it is converted where it is used
		if f.Kind = v.Kind; isLevel(v.Kind) {
			f.Kind = quantity.Level
		}
	}
	si, dim, err := r.c.want(v, f)
	if err != nil {
		r.report(r.c.dimension(o, x.n, f, err))
		return s, false
	}
	if v.Kind == quantity.Either {
		v.Kind = f.Kind
	}
	slot := r.c.addSlot(slot{expr: expr, si: si, dim: dim, field: f, n: x.n, owner: o})
	return ScenarioSet{Given: r.c.Given[i].Name, Text: x.n.text, Source: x.source, Slot: slot, Ref: r.c.ref(x.n.span, o),
		index: i, x: settled{expr: expr, value: v, field: f, n: x.n, owner: o}}, true
}

// standIns reads profiles = { load = "overload" }.
func (r *reader) standIns(o owner, n *node) (list [][2]string, ok bool) {
	if n.kind != kindTable {
		r.wrongType(o, n, &Field{Name: "profiles"}, `a table like { profile = "another" }`)
		return nil, false
	}
	ok = true
	for i := range n.table.keys {
		swap, good := r.standIn(o, &n.table.keys[i])
		if ok = ok && good; good {
			list = append(list, swap)
		}
	}
	return list, ok
}

// listed reads a list of names that must be among those known; an empty list is not nil.
func (r *reader) listed(o owner, n *node, what, one string, known []string) (list []string, ok bool) {
	if n.kind != kindArray {
		d := Diagnostic{Code: "wrong-type", Thing: o.thing(), Text: what + ": this is " + n.kind.a() + "; expected a list, like [" + quoted(one) + "]"}
		if n.kind == kindString {
			d.Fix = "[" + basic(n.text) + "]"
		}
		r.at(n.span, d)
		return nil, false
	}
	list, ok = make([]string, 0, len(n.items)), true
	is, seen := map[string]bool{}, map[string]bool{}
	for _, name := range known {
		is[name] = true
	}
	for _, item := range n.items {
		d := Diagnostic{Thing: o.thing()}
		switch {
		case r.full():
			r.report(d)
			return nil, false
		case item.kind != kindString:
			r.wrongType(o, item, &Field{Name: what}, one+" in quotes")
			ok = false
			continue
		case !is[item.text]:
			d.Code, d.Text, d.Found, d.Want = "unknown-name", fmt.Sprintf("%s: %s is not %s", what, quoted(item.text), one), item.text, one
			if near, good := quantity.Nearest(item.text, known); good {
				d.Fix = basic(near)
			} else if d.Hint = "the case has no " + what; len(known) > 0 {
				d.Hint = "there are" + listed(known)[1:]
			}
		case seen[item.text]:
			d.Code, d.Text = "same-name", fmt.Sprintf("%s names %s twice", what, quoted(item.text))
		default:
			list, seen[item.text] = append(list, item.text), true
			continue
		}
		r.at(item.span, d)
		ok = false
	}
	return list, ok
}

// tableTitles lists the titles of the tables that are asked for, those at fault too.
func tableTitles(asked []*key) (titles []string) {
	for _, k := range asked {
		if k.name != "table" {
			continue
		}
		for _, n := range k.value.items {
			if t := n.get("title"); t != nil && t.kind == kindString && t.text != "" {
				titles = append(titles, t.text)
			}
		}
	}
	return titles
}

// limitNames lists the limits that are asked for, those at fault too.
func limitNames(asked []*key) (names []string) {
	for _, k := range asked {
		if k.name != "limit" || k.value.kind != kindTable {
			continue
		}
		for i := range k.value.table.keys {
			names = append(names, k.value.table.keys[i].name)
		}
	}
	return names
}
