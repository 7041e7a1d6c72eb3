package casefile

import (
	"fmt"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// A Reading is what can be asked of the elements of a table: "level of t1" has the
// word level. Dim and Kind are those of its value.
type Reading struct {
	Word string
	Dim  quantity.Dim
	Kind quantity.Kind
	Help string
}

// flowWord is the reading that every part with a flow has: it needs no entry in
// Table.Readings, and its dimension is that of the domain's flows unless it has one.
// atWord goes before a node in the flow at one end: "flow at valve_in".
const (
	flowWord = "flow"
	atWord   = flowWord + " at "
)

// A showing names what is shown of a part.
type showing struct{ part, word string }

// Shows registers what is shown under a word of this element; Build calls it. The
// word is one of the table's Readings, "flow", or "flow at " and the name of a node
// of the domain. A word that an element does not register is refused with those it has.
//
// The flow of a part made of resistances or inertances, of a source and of a held
// node is found without it: the first branch of a chain carries the part's name.
func (e *Element) Shows(word string, out network.Output) {
	if word != flowWord && !strings.HasPrefix(word, atWord) && e.Table.reading(word) == nil {
		panic("casefile: an element shows a word that is not among the readings of its table")
	}
	if e.c.shows == nil {
		e.c.shows = map[showing]network.Output{}
	}
	out.Name = asked(e.FullName(), word)
	e.c.shows[showing{e.FullName(), word}] = out
}

// asked is how a case asks for a reading: "level of t1", "flow of main at valve_in".
func asked(part, word string) string {
	if node, ok := strings.CutPrefix(word, atWord); ok {
		return flowWord + " of " + part + " at " + node
	}
	return word + " of " + part
}

// reading returns the reading of a word, nil where the table has none.
func (t *Table) reading(word string) *Reading {
	for i := range t.Readings {
		if t.Readings[i].Word == word {
			return &t.Readings[i]
		}
	}
	return nil
}

// Showing returns what is shown under a word of a part, which is named in full, as in
// Shown: ("t1", "level"), ("main", "flow"), ("main", "flow at valve_in").
func (c *Case) Showing(part, word string) (network.Output, bool) {
	if out, ok := c.shows[showing{part, word}]; ok {
		return out, true
	}
	if word == flowWord {
		out, ok := c.flows[part]
		return out, ok
	}
	if node, ok := strings.CutPrefix(word, atWord); ok {
		return c.flowAt(part, node)
	}
	return network.Output{}, false
}

// noteFlows notes the flows that the network itself knows: of a resistance, an
// inertance, an element between two ports, a source, and into a held node.
func (c *Case) noteFlows() {
	c.flows = map[string]network.Output{}
	note := func(name string, out network.Output) {
		if _, ok := c.flows[name]; !ok && name != "" {
			out.Name = asked(name, flowWord)
			c.flows[name] = out
		}
	}
	for _, b := range c.net.Branches() {
		switch b.Kind {
		case network.ResistanceBranch:
			note(b.Name, c.net.FlowOf(network.ResistanceID(b.Index)))
		case network.InertanceBranch:
			note(b.Name, c.net.InertanceFlowOf(network.InertanceID(b.Index)))
		}
	}
	for _, e := range c.net.Elements() {
		if e.Joins && len(e.Ports) == 2 {
			note(e.Name, network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: e.ID, Sign: -1}})
		}
	}
	c.inputs = map[string]bool{}
	for _, in := range c.net.Inputs() {
		c.inputs[in.Name] = true
		if in.Held {
			note(in.Name, c.net.SupplyOf(in.Node))
		} else {
			note(in.Name, c.net.SourceFlowOf(in.ID))
		}
	}
}

// flowAt is the flow of a part at one of its ends, positive from the first-named end
// to the second: that of its only branch or element there.
func (c *Case) flowAt(part, node string) (out network.Output, ok bool) {
	e, known := c.Part(part)
	id, there := network.NodeID(0), false
	if known {
		id, there = e.Node(node)
	}
	if !there || c.net == nil {
		return out, false
	}
	found := 0
	for _, b := range c.net.Branches() {
		switch {
		case b.Ref != e.Ref || b.From != id && b.To != id:
		case b.Kind == network.ResistanceBranch:
			found, out = found+1, c.net.FlowOf(network.ResistanceID(b.Index))
		case b.Kind == network.InertanceBranch:
			found, out = found+1, c.net.InertanceFlowOf(network.InertanceID(b.Index))
		}
	}
	for _, x := range c.net.Elements() {
		if x.Ref == e.Ref && x.Joins && len(x.Ports) == 2 && (x.Ports[0] == id || x.Ports[1] == id) {
			found, out = found+1, network.Output{Flow: &network.FlowTerm{Kind: network.PortFlow, Element: x.ID, Sign: -1}}
			if x.Ports[1] == id {
				out.Flow.Port, out.Flow.Sign = 1, 1
			}
		}
	}
	out.Name = asked(part, atWord+node)
	return out, found == 1
}

// readings lists the words of what can be shown of an element.
func (e *Element) readings() []string {
	var list []string
	if e.shows(flowWord) || e.c.net == nil && !e.isNode() {
		list = append(list, flowWord)
	}
	for _, x := range e.Table.Readings {
		if x.Word != flowWord && e.shows(x.Word) {
			list = append(list, x.Word)
		}
	}
	return list
}

// readingWords lists the words that parts of any domain may have.
func (r *reader) readingWords() []string {
	words := []string{flowWord}
	for i := range r.voc {
		for j := range r.voc[i].Tables {
			for _, x := range r.voc[i].Tables[j].Readings {
				if !contains(words, x.Word) {
					words = append(words, x.Word)
				}
			}
		}
	}
	return words
}

// asReading splits "level of t1". It is false where a text is probably meant for
// something else: neither is the first half a word nor the second a part.
func (r *reader) asReading(text string) (word, part string, ok bool) {
	word, part, ok = strings.Cut(text, " of ")
	word, part = strings.TrimSpace(word), strings.TrimSpace(part)
	if !ok || len(r.c.parts(text)) > 0 {
		return "", "", false
	}
	words := r.readingWords()
	if contains(words, word) || len(r.c.parts(part)) > 0 {
		return word, part, true
	}
	_, near := quantity.Nearest(word, words)
	return word, part, near
}

// reading reads "level of t1", "flow of main", "flow of main at valve_in".
func (r *reader) reading(o owner, n *node, s *Shown, word, part string) bool {
	at := ""
	if word == flowWord {
		part, at = r.splitEnd(part)
	}
	e, ok := r.pick(o, n, part, func(e *Element) bool { return r.mayShow(e, word) })
	switch {
	case !ok && e == nil:
		r.noPart(o, n, word, part)
		return false
	case !ok && r.mayShow(e, word):
		return false // there are two: reported
	case !ok:
		r.noReading(o, n, e, word, part)
		return false
	}
	s.Part, s.Word, s.Dim, s.Kind = e.FullName(), word, r.measures(e).Flow, quantity.Plain
	if x := e.Table.reading(word); x != nil {
		s.Dim, s.Kind = x.Dim, x.Kind
	}
	if at != "" {
		if domain, bare := r.c.domainOf(at); domain == e.domain {
			at = bare
		}
		s.Word = atWord + at
		return r.atEnd(o, n, e, at)
	}
	return true
}

// splitEnd splits "main at valve_in". Either name may hold an " at " of its own.
func (r *reader) splitEnd(text string) (part, node string) {
	const sep = " at "
	if len(r.c.parts(text)) > 0 {
		return text, ""
	}
	last := -1
	for i := range text {
		if !strings.HasPrefix(text[i:], sep) {
			continue
		}
		if last = i; len(r.c.parts(strings.TrimSpace(text[:i]))) > 0 {
			break
		}
	}
	if last <= 0 {
		return text, ""
	}
	return strings.TrimSpace(text[:last]), strings.TrimSpace(text[last+len(sep):])
}

// mayShow reports whether an element has a reading, or may have it: one at fault was
// not built, and of a network at fault the flows are not known.
func (r *reader) mayShow(e *Element, word string) bool {
	if e.faulty || word == flowWord && r.c.net == nil {
		return true
	}
	return e.shows(word)
}

// noPart reports a reading of a part that is not there.
func (r *reader) noPart(o owner, n *node, word, part string) {
	if r.missing(part) {
		return
	}
	var parts []string
	for _, e := range r.c.Elements {
		if e.domain != "" && !e.faulty && r.mayShow(e, word) && !(word == flowWord && e.isNode()) {
			parts = append(parts, e.FullName())
		}
	}
	d := Diagnostic{Code: "unknown-name", Thing: o.thing(), Text: quoted(part) + " is not defined", Found: part, Want: "a part with " + article(word)}
	if word == flowWord {
		d.Want = "a part between two nodes"
	}
	at := n.part(strings.LastIndex(n.text, part), len(part))
	near, ok := quantity.Nearest(part, parts)
	switch {
	case ok && at == n.span:
		d.Fix = basic(word + " of " + near)
	case ok:
		d.Fix = near
	case len(parts) > 0:
		d.Hint = "parts with " + article(word) + listed(parts)
	}
	r.at(at, d)
}

// noReading reports a word that an element does not have.
func (r *reader) noReading(o owner, n *node, e *Element, word, part string) {
	has := e.readings()
	if word == flowWord && len(has) == 0 {
		r.at(n.part(strings.LastIndex(n.text, part), len(part)), Diagnostic{Code: "no-flow", Thing: o.thing(),
			Text: fmt.Sprintf("%s is %s, whose flow cannot be shown", quoted(part), article(e.Table.Name)),
			Hint: "shown is the flow of a part between two nodes, of a source, or into a held node"})
		return
	}
	d := Diagnostic{Code: "no-reading", Thing: o.thing(), Text: fmt.Sprintf("%s %s has no %s", e.Table.Name, quoted(part), quoted(word)), Found: word}
	at := n.part(strings.Index(n.text, word), len(word))
	near, ok := quantity.Nearest(word, has)
	switch {
	case ok && at == n.span:
		d.Fix = basic(near + " of " + part)
	case ok:
		d.Fix = near
	case len(has) > 0:
		d.Hint = "it has " + strings.Join(has, ", ")
	case e.isNode():
		d.Hint = "it has a " + r.measures(e).LevelWord + ", which is shown by its name alone"
	default:
		d.Hint = "nothing of it can be shown"
	}
	r.at(at, d)
}

// atEnd checks that a node is an end of a part at which its flow is known.
func (r *reader) atEnd(o owner, n *node, e *Element, node string) bool {
	if _, ok := r.c.Showing(e.FullName(), atWord+node); ok || e.faulty || r.c.net == nil {
		return true
	}
	var ends []string
	for _, name := range r.namesOf(e.domain, "node") {
		if _, ok := r.c.Showing(e.FullName(), atWord+name); ok {
			ends = append(ends, name)
		}
	}
	d := Diagnostic{Code: "no-reading", Thing: o.thing(), Text: fmt.Sprintf("%s is no end of %s at which its flow is known", quoted(node), quoted(e.Name)), Found: node}
	at := n.part(strings.LastIndex(n.text, node), len(node))
	near, ok := quantity.Nearest(node, ends)
	switch {
	case ok && at != n.span:
		d.Fix = near
	case ends != nil:
		d.Hint = "its ends are " + strings.Join(ends, ", ")
	default:
		d.Hint = "its flow is shown as " + quoted("flow of "+e.FullName())
	}
	r.at(at, d)
	return false
}
