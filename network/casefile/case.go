package casefile

import (
	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/quantity"
)

// A Case is a file read and checked. Its values are computed by Eval; its
// network is handed out by Build.
type Case struct {
	File       string
	Title      string
	Author     string
	Date       string
	Revision   string
	References []string
	LeavesOut  []string // what the model does not hold, in the author's words
	Given      []Given
	Pressures  Pressures
	Elements   []*Element // in file order
	Questions  Questions

	src    *source
	heads  map[string]*Element // by domain
	voc    []Vocabulary
	refs   []place
	byName map[elementName]*Element
	givens []given
	order  []int // of givens, so that each comes after those it uses
	slots  []slot
	moving []Slot // those that depend on given values
	waves  []wave

	profiles     []profile
	profileIndex map[string]int
	curves       []*curve            // of profiles, as written
	horizon      float64             // s; sampled waveforms go so far at least
	inSteps      map[WaveSlot]string // waveforms of profiles that must change in steps, and why

	nodes   map[string]network.NodeID
	shows   map[showing]network.Output // that elements registered
	flows   map[string]network.Output  // that the network knows by itself, by full name
	inputs  map[string]bool            // sources and held nodes, by full name
	drives  map[string]driven
	kept    map[string]any
	rising  []climb         // of which some number may vary
	sums    []meanSum       // of which some weight may vary
	warned  map[string]bool // what Read has warned of already
	net     *network.Network
	setters []Setter
	faults  []Diagnostic // of building
	files   []string     // read beside it
	uses    []*use       // of parts, those in a part behind the use of it

	useNamed, useWords map[string]*use // by full name, by what messages say
}

// Files returns the names of the data files that the case reads, as it states them.
func (c *Case) Files() []string { return c.files }

// A place is what a network.Ref stands for.
type place struct {
	span
	owner
}

// An owner is what a value belongs to: an element, or a part of the file with a
// name of its own.
type owner struct {
	e     *Element
	label string
}

// thing names the owner as messages do.
func (o owner) thing() string {
	if o.e != nil {
		return o.e.Thing()
	}
	return o.label
}

// ref notes a place that a fault may come back to.
func (c *Case) ref(at span, o owner) network.Ref {
	c.refs = append(c.refs, place{at, o})
	return network.Ref(len(c.refs) - 1)
}

// Element returns the element of that name in a table: Element("stream",
// "water"), or Element("thermal.stream", "water").
func (c *Case) Element(table, name string) (*Element, bool) {
	for i := range c.voc {
		for j := range c.voc[i].Tables {
			t, domain := &c.voc[i].Tables[j], c.voc[i].Domain
			if t.Name != table && (domain == "" || domain+"."+t.Name != table) {
				continue
			}
			for _, key := range []elementName{elementKey(domain, t.Name, name), besideKey(domain, name)} {
				if e := c.byName[key]; e != nil && e.Table == t {
					return e, true
				}
			}
		}
	}
	return nil, false
}

// elementName is the key of Case.byName. The parts of a domain share one set of
// names; tables outside domains have a set each.
type elementName struct{ domain, table, name string }

func elementKey(domain, table, name string) elementName {
	if domain == "" {
		return elementName{"", table, name}
	}
	return elementName{domain, "", name}
}

// Part returns the node or branch of that name, whatever its table. Where two
// domains have one, the first is meant unless the name says "thermal:tank".
func (c *Case) Part(name string) (*Element, bool) {
	if list := c.parts(name); len(list) > 0 {
		return list[0], true
	}
	return nil, false
}

// Node returns what the network builder called the node of that full name.
// Build functions look up the nodes they connect with Element.Node.
func (c *Case) Node(name string) (network.NodeID, bool) {
	id, ok := c.nodes[name]
	return id, ok
}

// BindNode notes the identifier of a node under its full name; the Build function
// of a table of nodes calls it.
func (c *Case) BindNode(name string, id network.NodeID) { c.nodes[name] = id }

// Diagnose returns an error about the part that ref stands for, for whoever
// finds a fault in a case that only reckoning shows. code is a stable word.
func (c *Case) Diagnose(ref network.Ref, code, text, hint string) Diagnostic {
	d := Diagnostic{Code: code, Text: text, Hint: hint}
	if ref < 0 || int(ref) >= len(c.refs) {
		d.File = c.File
		return d
	}
	p := c.refs[ref]
	d.Thing = p.thing()
	return c.src.place(d, p.span)
}

// A slot is one number of the case.
type slot struct {
	expr  *quantity.Expr // nil: si for ever
	si    float64
	dim   quantity.Dim
	field *Field
	n     *node
	owner owner
}

// constant adds a slot that always holds v.
func (c *Case) constant(v float64) Slot {
	c.slots = append(c.slots, slot{si: v})
	return Slot(len(c.slots) - 1)
}

// Eval computes every value of the case. given holds one value for each Given,
// as GivenValues returns them; nil means as written. A Given that is an
// expression is worked out anew from the others: its entry is not looked at.
// Ranges are checked again, so that a value varied beyond them is a diagnostic.
// Warnings that Read gave are not given again.
func (c *Case) Eval(given []quantity.Value) (Values, []Diagnostic) { return c.evalWith(given, nil) }

// evalNumbers computes all slots and makes room for the waveforms; known are the given
// values, the derived ones worked out.
func (c *Case) evalNumbers(given []quantity.Value, fixed ...bool) (v Values, known []quantity.Value, diags []Diagnostic) {
	known = c.GivenValues()
	if given != nil {
		if len(given) != len(c.givens) {
			panic("casefile: Eval needs one value for each Given")
		}
		known, diags = c.derive(given, fixed)
	}
	v = Values{Num: make([]float64, len(c.slots)), Wave: make([]laplace.Waveform, len(c.waves))}
	for i := range c.slots {
		v.Num[i] = c.slots[i].si
	}
	if given != nil && diags == nil {
		for _, i := range c.moving {
			si, d := c.evaluate(&c.slots[i], known)
			if d != nil {
				diags = append(diags, *d)
			}
			v.Num[i] = si
		}
	}
	for i := range c.rising {
		if d := c.climbs(&c.rising[i], func(s Slot) float64 { return v.Num[s] }); d != nil && given != nil && diags == nil {
			diags = append(diags, *d)
		}
	}
	if given != nil && diags == nil {
		diags = c.unbalanced(&v)
	}
	return v, known, diags
}

// warn notes warnings that Read gives, so that no Eval gives them again.
func (c *Case) warn(diags []Diagnostic) {
	for _, d := range diags {
		if d.Severity == Warning {
			if c.warned == nil {
				c.warned = map[string]bool{}
			}
			c.warned[d.Error()] = true
		}
	}
}

// news leaves out the warnings that Read gave.
func (c *Case) news(diags []Diagnostic) []Diagnostic {
	var list []Diagnostic
	for _, d := range diags {
		if d.Severity != Warning || !c.warned[d.Error()] {
			list = append(list, d)
		}
	}
	return list
}
