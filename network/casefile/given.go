package casefile

import (
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A Given is one named quantity of [given].
type Given struct {
	Name    string
	Text    string // as written: "28 °C" or "= wall / k"
	Source  string // where it comes from, "" if not stated
	Derived bool   // an expression of other given values
	Used    bool   // something in the case depends on it
	Use     string // the use of a part whose own it is, "c.r_cell" of use "c"; "" of the case
	Ref     network.Ref
}

// A given is what Eval needs of one.
type given struct {
	expr  *quantity.Expr // nil: a constant
	value quantity.Value // as written
	n     *node
	key   span
	uses  []int
	bad   bool // without a value: what uses it is not reported again
	used  bool
	use   *use // whose own it is; nil: the case
	scope *use // in whose part it stands; nil: the case
}

// GivenValues returns the given values as written, for a caller that varies some.
func (c *Case) GivenValues() []quantity.Value {
	list := make([]quantity.Value, len(c.givens))
	for i := range c.givens {
		list[i] = c.givens[i].value
	}
	return list
}

// GivenIndex returns the index of a given value.
func (c *Case) GivenIndex(name string) (int, bool) {
	for i := range c.Given {
		if c.Given[i].Name == name {
			return i, true
		}
	}
	return 0, false
}

func (c *Case) givenNames() []string {
	names := make([]string, 0, len(c.Given))
	for i := range c.Given {
		if c.Given[i].Use == "" {
			names = append(names, c.Given[i].Name)
		}
	}
	return names
}

// derive works out the derived values from the others, but for those that are fixed: none
// where fixed is nil.
func (c *Case) derive(from []quantity.Value, fixed []bool) ([]quantity.Value, []Diagnostic) {
	known := append([]quantity.Value(nil), from...)
	var diags []Diagnostic
	for _, i := range c.order {
		g := &c.givens[i]
		if g.expr == nil || fixed != nil && fixed[i] {
			continue
		}
		v, err := g.expr.Eval(known)
		if err != nil {
			diags = append(diags, c.dimension(c.givenOwner(i), g.n, nil, err))
		}
		known[i] = v
	}
	return known, diags
}

// readGiven reads [given]: first all names, then what they stand for, in an
// order in which each comes after those it uses.
func (r *reader) readGiven(k *key) {
	if k.value.kind != kindTable {
		r.at(k.value.span, Diagnostic{Code: "wrong-type", Text: "given is " + k.value.kind.a() + "; expected a table of named quantities"})
		return
	}
	r.collect(k.value, "", 0)
	for i := range r.c.givens {
		r.compileGiven(i)
	}
	r.sortGiven()
	r.known = make([]quantity.Value, len(r.c.givens))
	for _, i := range r.c.order {
		r.evalGiven(i)
	}
}

// collect gathers the names under a table; a.b = … makes the name "a.b".
func (r *reader) collect(n *node, prefix string, depth int) {
	for i := range n.table.keys {
		k := &n.table.keys[i]
		name := prefix + k.name
		v, source := k.value, ""
		if v.kind == kindTable {
			if v.get("value") == nil {
				r.collect(v, name+".", depth+1)
				continue
			}
			v, source = r.withSource(owner{label: "given " + quoted(name)}, v)
			if v == nil {
				continue
			}
		}
		if !r.goodName(k, name, "a given name") {
			continue
		}
		if first, ok := r.givenIndex[name]; ok { // a.b beside "a.b"
			r.at(k.span, Diagnostic{Code: "defined-twice", Text: "given " + quoted(name) + " is defined twice, first on line " + r.line(r.c.givens[first].key)})
			continue
		}
		r.givenIndex[name] = len(r.c.givens)
		r.c.givens = append(r.c.givens, given{n: v, key: k.span})
		r.c.Given = append(r.c.Given, Given{Name: name, Text: v.text, Source: source,
			Ref: r.c.ref(k.span, owner{label: "given " + quoted(name)})})
	}
}

// goodName checks that a name can stand in an expression.
func (r *reader) goodName(k *key, name, what string) bool {
	switch {
	case !identifier(name):
		d := Diagnostic{Code: "bad-name", Text: quoted(name) + " cannot stand in an expression", Hint: what + " is letters, digits, _ and dots, and begins with a letter"}
		if better := asIdentifier(name); better != name && identifier(better) {
			d.Fix = better
		}
		r.at(k.span, d)
		return false
	case quantity.Reserved(name):
		r.at(k.span, Diagnostic{Code: "bad-name", Text: quoted(name) + " has a meaning of its own in expressions", Hint: "choose another name"})
		return false
	}
	return true
}

// identifier reports a name that an expression can use: letters, digits and
// underscores in parts joined by dots, each part beginning with a letter or _.
func identifier(name string) bool {
	begin := true
	for i := 0; i < len(name); i++ {
		c := name[i]
		letter := c >= 'a' && c <= 'z' || c >= 'A' && c <= 'Z' || c == '_'
		switch {
		case letter:
			begin = false
		case digit(c) && !begin:
		case c == '.' && !begin:
			begin = true
		default:
			return false
		}
	}
	return !begin
}

// asIdentifier makes an identifier of a name with spaces or dashes.
func asIdentifier(name string) string {
	return strings.Map(func(c rune) rune {
		if c == ' ' || c == '-' {
			return '_'
		}
		return c
	}, name)
}

func (r *reader) givenSlot(name string) (int, bool) {
	if i, ok := r.scope.givenIndex(name); ok {
		return i, true
	}
	i, ok := r.givenIndex[name]
	return i, ok
}

// compileGiven reads what stands for a given value, without reckoning yet.
func (r *reader) compileGiven(i int) {
	g := &r.c.givens[i]
	o := r.c.givenOwner(i)
	if g.n.kind == kindString && strings.HasPrefix(strings.TrimLeft(g.n.text, " \t"), "=") {
		expr, err := quantity.Compile(g.n.text, r.givenSlot)
		if err != nil {
			r.syntax(o, g.n, nil, err)
			g.bad = true
			return
		}
		g.expr, g.uses = expr, expr.Uses()
		r.c.Given[i].Derived = len(g.uses) > 0
		return
	}
	_, v, ok := r.quantity(o, g.n, nil)
	g.value, g.bad = v, !ok
}

// sortGiven finds the order of reckoning, and cycles.
func (r *reader) sortGiven() {
	const (
		unseen = iota
		open   // on the path being followed
		done
	)
	state := make([]uint8, len(r.c.givens))
	var path []int
	var visit func(i int)
	visit = func(i int) {
		state[i] = open
		path = append(path, i)
		for _, u := range r.c.givens[i].uses {
			switch state[u] {
			case unseen:
				visit(u)
			case open:
				r.cycle(path, u)
			}
		}
		path = path[:len(path)-1]
		state[i] = done
		r.c.order = append(r.c.order, i)
	}
	for i := range r.c.givens {
		if state[i] == unseen {
			visit(i)
		}
	}
}

// cycle reports the given values from first on the path, which depend on
// themselves.
func (r *reader) cycle(path []int, first int) {
	at := len(path) - 1
	for path[at] != first {
		at--
	}
	ring := path[at:]
	fresh := false
	for _, i := range ring {
		fresh = fresh || !r.c.givens[i].bad
		r.c.givens[i].bad = true
	}
	if !fresh {
		return
	}
	var names []string
	for _, i := range ring {
		if len(names) == 8 {
			names = append(names, "…")
			break
		}
		names = append(names, r.c.Given[i].Name)
	}
	names = append(names, r.c.Given[first].Name)
	g := &r.c.givens[first]
	r.at(g.n.span, Diagnostic{Code: "cycle", Thing: "given " + quoted(r.c.Given[first].Name),
		Text: "depends on itself: " + strings.Join(names, " → "), Hint: "give one of them a value"})
}

// evalGiven computes a given value from those before it.
func (r *reader) evalGiven(i int) {
	g := &r.c.givens[i]
	for _, u := range g.uses {
		g.bad = g.bad || r.c.givens[u].bad
	}
	if g.expr != nil && !g.bad {
		v, err := g.expr.Eval(r.known)
		if err != nil {
			r.report(r.c.dimension(r.c.givenOwner(i), g.n, nil, err))
			g.bad = true
		}
		g.value = v
		if !r.c.Given[i].Derived {
			g.expr = nil
		}
	}
	r.known[i] = g.value
}

// use marks a given value, and those it is made of, as having an effect.
func (r *reader) use(i int) {
	g := &r.c.givens[i]
	if g.used {
		return
	}
	g.used = true
	r.c.Given[i].Used = true
	for _, u := range g.uses {
		r.use(u)
	}
}

// unused warns of given values on which nothing depends.
func (r *reader) unused() {
	for i := range r.c.givens {
		if g := &r.c.givens[i]; !g.used && !g.bad {
			r.at(g.key, Diagnostic{Severity: Warning, Code: "unused", Thing: "given " + quoted(r.c.Given[i].Name), Text: "nothing in the case uses it"})
		}
	}
}
