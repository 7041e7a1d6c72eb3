package casefile

import (
	"fmt"
	"strconv"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A result is a quantity of its own, made of what the network shows: a weighted mean, an
// expression of values at one instant, or an integral over time. Wherever something shown
// is named, in other results too, a result may be.

// AskResult is one [result.NAME]: exactly one of Mean, Expr and IntegralOf is stated.
type AskResult struct {
	Name       string
	Mean       []MeanTerm  // the weights add up to 1
	Expr       *ResultExpr // of values at one instant
	IntegralOf *Shown      // over time, SI·s, from 0 s or from After
	After      Slot        // s
	HasAfter   bool
	Dim        quantity.Dim
	Kind       quantity.Kind // Level, Difference or Plain
	Text       string        // what states it, as written
	Source     string        // where it comes from, "" if not stated
	Ref        network.Ref
}

// A MeanTerm is one thing in a weighted mean.
type MeanTerm struct {
	Shown
	Weight Slot
}

const (
	maxResults   = 1000
	maxMeanTerms = 1000
)

var resultFields = []Field{
	{Name: "mean", Type: loose, Help: `{ a = 0.6, b = 0.4 }`},
	{Name: "expression", Type: Text},
	{Name: "integral_of", Type: Name},
	{Name: "after", Type: Number, Dim: dimTime, HasMin: true, With: []string{"integral_of"}},
}

var resultForms = [][]string{{"mean", "expression", "integral_of"}}

// asking is what a reader knows of results.
type asking struct {
	results     []result
	resultIndex map[string]int
	resultPath  []int // those that wait for others
	noResults   bool  // [result] cannot be read: any name may be one
}

// A result is one that is being read.
type result struct {
	key   *key
	owner owner
	state profileState
	bad   bool
	ask   AskResult
}

// nameResults gathers the names of [result], before anything that may show one is read.
func (r *reader) nameResults(k *key) {
	r.resultIndex = map[string]int{}
	if !r.countNamed(k, maxResults) {
		r.noResults = true
		return
	}
	r.eachAsked(k, func(x *key) {
		o := owner{label: "result " + quoted(x.name)}
		named := r.checkName(x, o)
		if !r.ownResultName(x, o) {
			named = false // the name means the other
		} else {
			r.resultIndex[x.name] = len(r.results)
		}
		r.results = append(r.results, result{key: x, owner: o, bad: !named})
	})
}

// countNamed checks that k holds tables, and not more than most.
func (r *reader) countNamed(k *key, most int) bool {
	if k.value.kind != kindTable {
		r.wrongType(owner{}, k.value, &Field{Name: k.name}, "tables like ["+k.name+".NAME]")
		return false
	}
	if n := len(k.value.table.keys); n > most {
		r.at(k.span, Diagnostic{Code: "too-many", Text: fmt.Sprintf("a case may have up to %d tables [%s.NAME]; this has %d", most, k.name, n)})
		return false
	}
	return true
}

// eachAsked calls read for every table [WORD.NAME] of a question.
func (r *reader) eachAsked(k *key, read func(x *key)) {
	for i := range k.value.table.keys {
		x := &k.value.table.keys[i]
		if x.value.kind != kindTable {
			r.at(x.span, Diagnostic{Code: "wrong-type", Text: fmt.Sprintf("%s stands where the name of a %s is expected", quoted(x.name), k.name), Hint: "write [" + k.name + ".NAME] above it"})
			continue
		}
		read(x)
	}
}

// ownResultName checks that nothing else that can be shown has the name of a result.
func (r *reader) ownResultName(k *key, o owner) bool {
	d := Diagnostic{Code: "defined-twice", Thing: o.thing(), Hint: "nodes and results share one set of names, since both are shown by name"}
	switch _, part, reads := r.asReading(k.name); {
	case r.isNode(k.name):
		d.Text = "the name is taken by a node"
		if list := r.c.parts(k.name); len(list) > 0 {
			d.Text = "the name is taken by the node on line " + r.line(list[0].header)
		}
	case reads && len(r.c.parts(part)) > 0:
		d.Text, d.Hint = "the name is that of a reading of "+quoted(part), "choose another name"
	default:
		return true
	}
	r.at(k.span, d)
	return false
}

// readResults reads all results, each after those it is made of.
func (r *reader) readResults() {
	for i := range r.results {
		r.result(i)
	}
}

// result reads one.
func (r *reader) result(i int) {
	x := &r.results[i]
	if x.state != unread {
		return
	}
	x.state = beingRead
	r.resultPath = append(r.resultPath, i)
	ok := r.resultOf(x)
	r.resultPath = r.resultPath[:len(r.resultPath)-1]
	x.state = profileRead
	if x.bad = x.bad || !ok; !x.bad {
		r.c.Questions.Results = append(r.c.Questions.Results, x.ask)
	}
}

// resultOf reads what a result is.
func (r *reader) resultOf(x *result) bool {
	f := fielder{r: r, o: x.owner, word: "result", header: x.key.span}
	list, source, ok := f.fields(x.key.value, resultFields, resultForms)
	x.ask = AskResult{Name: x.key.name, Source: source, Ref: r.c.ref(x.key.span, x.owner)}
	for i := range list {
		e := &list[i]
		good := true
		switch e.name {
		case "mean":
			good = r.mean(x.owner, x.key.value.table.find("mean"), &x.ask)
		case "expression":
			good = e.n.kind == kindString && r.resultExpression(x.owner, e.n, &x.ask)
		case "integral_of":
			good = e.n.kind == kindString && e.n.text != "" && r.integral(x.owner, e.n, &x.ask)
		case "after":
			x.ask.After, x.ask.HasAfter = e.slot, e.slot != noSlot
			good = x.ask.HasAfter && r.inRun(x.owner, e.n, "after", r.c.slots[e.slot].si)
		}
		ok = ok && good
	}
	return ok
}

// resultShown reads the name of a result; is tells that it is one.
func (r *reader) resultShown(o owner, n *node, s *Shown) (is, ok bool) {
	i, is := r.resultIndex[n.text]
	if !is {
		return false, false
	}
	if r.results[i].state == beingRead {
		r.resultCycle(o, n, i)
		return true, false
	}
	r.result(i)
	x := &r.results[i]
	s.Result, s.Dim, s.Kind = x.key.name, x.ask.Dim, x.ask.Kind
	return true, !x.bad
}

// resultCycle reports results that are made of themselves.
func (r *reader) resultCycle(o owner, n *node, first int) {
	at := len(r.resultPath) - 1
	for r.resultPath[at] != first {
		at--
	}
	var names []string
	for _, i := range r.resultPath[at:] {
		r.results[i].bad = true
		if len(names) < 8 {
			names = append(names, brief(r.results[i].key.name))
		} else if len(names) == 8 {
			names = append(names, "…")
		}
	}
	names = append(names, brief(r.results[first].key.name))
	r.at(n.span, Diagnostic{Code: "cycle", Thing: o.thing(), Text: "depends on itself: " + strings.Join(names, " → "), Hint: "make one of them of nodes only"})
}

// shownAs reads a name that stands elsewhere than in a text of its own; write puts a
// better name where it stands.
func (r *reader) shownAs(o owner, n *node, write func(string) string) (Shown, bool) {
	from := len(r.diags)
	s, ok := r.shown(o, n)
	for i := from; i < len(r.diags); i++ {
		if d := &r.diags[i]; d.Fix != "" {
			name, err := strconv.Unquote(d.Fix)
			if err != nil {
				name = d.Fix
			}
			if d.Fix = write(name); d.Fix == "" {
				d.Hint = "did you mean " + quoted(name) + "?"
			}
		}
	}
	return s, ok
}

// keyFor writes a better name in the place of the key of a stated one: of a.b = … the key
// is b, so that only a name within a can stand there; "" where none can.
func (r *reader) keyFor(x *stated, better string) string {
	last := strings.Trim(r.src.text[x.key.at:x.key.end], "\"'")
	rest, ok := strings.CutPrefix(better, strings.TrimSuffix(x.name, last))
	if last != x.name && (!ok || rest == "") {
		return ""
	}
	if last == x.name {
		rest = better
	}
	return tomlKey(rest)
}

// mean reads a weighted mean.
func (r *reader) mean(o owner, k *key, ask *AskResult) bool {
	list, ok := r.statedIn(o, k, "a table of names with their weights, like { a = 0.6, b = 0.4 }")
	if !ok {
		return false
	}
	if len(list) == 0 || len(list) > maxMeanTerms {
		r.at(k.value.span, Diagnostic{Code: "list-length", Thing: o.thing(), Text: fmt.Sprintf("mean has %s, must have 1 to %d", items(len(list)), maxMeanTerms)})
		return false
	}
	ask.Text = oneLine(r.src.text[k.value.at:k.value.end])
	sum := meanSum{n: k.value, owner: o}
	seen := map[string]bool{}
	for i := range list {
		x := &list[i]
		name := node{span: x.key, kind: kindString, text: x.name}
		s, good := r.shownAs(o, &name, func(better string) string { return r.keyFor(x, better) })
		if seen[x.name] {
			r.at(x.key, Diagnostic{Code: "same-name", Thing: o.thing(), Text: fmt.Sprintf("mean names %s twice", quoted(x.name))})
			good = false
		}
		seen[x.name] = true
		w, right := r.number(o, x.n, &Field{Name: "mean." + x.name, HasMin: true})
		if ok = ok && good && right; !ok {
			continue
		}
		if first := ask.Mean; len(first) > 0 && !alikeShown(&first[0].Shown, &s) {
			r.at(x.key, Diagnostic{Code: "kinds", Thing: o.thing(), Text: fmt.Sprintf("mean mixes %s, %s, and %s, %s", quoted(first[0].Text), described(&first[0].Shown), quoted(s.Text), described(&s))})
			ok = false
			continue
		}
		ask.Mean = append(ask.Mean, MeanTerm{s, w})
		sum.add(r, w, x.n)
	}
	if !ok {
		return false
	}
	ask.Dim, ask.Kind = ask.Mean[0].Dim, ask.Mean[0].Kind
	if d := sum.fault(r.c, func(s Slot) float64 { return r.c.slots[s].si }); d != nil {
		r.report(*d)
		return false
	}
	if sum.moves {
		r.c.sums = append(r.c.sums, sum)
	}
	return true
}

// alikeShown reports whether two things shown have one dimension and kind.
func alikeShown(a, b *Shown) bool { return a.Dim == b.Dim && a.Kind == b.Kind }

// described says what kind of quantity is shown: "a temperature level (°C, K)".
func described(s *Shown) string { return quantity.Describe(s.Dim, s.Kind) }

// integral reads what a result is the integral of over time.
func (r *reader) integral(o owner, n *node, ask *AskResult) bool {
	s, ok := r.shown(o, n)
	if !ok {
		return false
	}
	if s.Kind == quantity.Level && s.Dim == dimKelvin {
		r.at(n.span, Diagnostic{Code: "kinds", Thing: o.thing(), Text: fmt.Sprintf("%s is %s, which counts from absolute zero or from 0 °C: its integral could mean either", quoted(n.text), described(&s)),
			Hint: `take the integral of a difference, "a - b", or of a result: expression = "= ` + operandText(n.text) + ` - 20 °C"`})
		return false
	}
	dim := s.Dim
	if dim[2] >= 100 {
		r.at(n.span, Diagnostic{Code: "dimension", Thing: o.thing(), Text: quoted(n.text) + " has too high a power of time to be integrated"})
		return false
	}
	dim[2]++
	ask.IntegralOf, ask.Dim, ask.Text = &s, dim, "integral of "+n.text
	if dim == dimKelvin {
		ask.Kind = quantity.Difference
	}
	return true
}

// ResultNamed returns the result of that name.
func (c *Case) ResultNamed(name string) (*AskResult, bool) {
	for i := range c.Questions.Results {
		if r := &c.Questions.Results[i]; r.Name == name {
			return r, true
		}
	}
	return nil, false
}
