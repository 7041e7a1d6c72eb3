package casefile

import (
	"errors"
	"strings"

	"lagbook/network"
	"lagbook/network/quantity"
)

// Explain turns an error of network, or of a setter, into diagnostics with
// places. An error that knows no place becomes one about the whole case.
func (c *Case) Explain(err error) []Diagnostic {
	if err == nil {
		return nil
	}
	if many, ok := err.(interface{ Unwrap() []error }); ok {
		var list []Diagnostic
		for _, e := range many.Unwrap() {
			list = append(list, c.Explain(e)...)
		}
		return inFileOrder(list)
	}
	var (
		one    Diagnostic
		faults *network.Faults
		params *network.ParamFault
		steady *network.NoSteady
		cycle  *network.NoCycle
		march  *network.MarchFault
		bent   *network.Nonlinear
		list   []Diagnostic
	)
	switch {
	case errors.As(err, &one):
		return []Diagnostic{one}
	case errors.As(err, &march):
		return []Diagnostic{c.marchFault(march)}
	case errors.As(err, &bent):
		return []Diagnostic{{File: c.File, Code: "not-linear", Text: strings.TrimPrefix(bent.Error(), "network: ")}}
	case errors.As(err, &faults):
		for _, f := range faults.List {
			list = append(list, c.fault(f))
		}
	case errors.As(err, &params):
		for _, f := range params.List {
			list = append(list, c.fault(f))
		}
	case errors.As(err, &steady):
		for _, f := range steady.List {
			list = append(list, c.steadyFault(f))
		}
	case errors.As(err, &cycle):
		d := c.fault(network.Fault{Refs: cycle.Refs, Text: "there is no steady cycle: " + cycle.Text})
		d.Code, d.Hint = "no-cycle", ""
		list = append(list, d)
	default:
		return []Diagnostic{{File: c.File, Code: "not-computed", Text: err.Error()}}
	}
	return inFileOrder(list)
}

// Words for the codes of package network; the codes themselves are numbers.
var faultWords = map[network.FaultCode]struct{ code, hint string }{
	network.Empty:            {"empty", "add a node"},
	network.Unconnected:      {"unconnected", "join it to another node, or remove it"},
	network.SelfLoop:         {"self-loop", ""},
	network.HeldTwice:        {"held-twice", ""},
	network.Undetermined:     {"undetermined", "give one of them a capacitance, hold it, or join it to a node that has either"},
	network.BadNumber:        {"range", ""},
	network.Unbalanced:       {"unbalanced", "what enters a node in streams must leave it, and the other way round"},
	network.SingularMassless: {"singular", "give the node a capacitance"},
	network.FlippedMassless:  {"singular", "give the node a capacitance"},
	network.OutOfRange:       {"range", ""},
	network.StartOfNoStore:   {"start-of-no-store", "only a node with a capacitance has a start of its own"},
	network.HeldCapacity:     {"held-capacity", ""},
	network.NoEffect:         {"no-effect", ""},
	network.NoWayOut:         {"undetermined", "open a way for it, as a relief is one, or give one of them a capacitance"},
}

// fault turns a fault of the network into a diagnostic with a place.
func (c *Case) fault(f network.Fault) Diagnostic {
	w, ok := faultWords[f.Code]
	if !ok {
		w.code = "network"
	}
	ref := network.NoRef
	for _, candidate := range f.Refs {
		if candidate >= 0 {
			ref = candidate
			break
		}
	}
	if f.Code == network.Empty {
		w.hint += c.likeNode()
	}
	d := c.Diagnose(ref, w.code, c.figured(f.Text, f.Figure), c.inWords(ref, w.hint))
	d.Thing = c.inPart(ref) // the text names the parts
	return d
}

// steadyFault is the diagnostic of a group of nodes without a steady state.
func (c *Case) steadyFault(f network.SteadyFault) Diagnostic {
	g := network.Fault{Refs: f.Refs, Text: strings.TrimSuffix(f.Text, "; a start must be given"), Figure: f.Figure}
	if f.Reason == network.Enclosed {
		g.Code = network.NoWayOut // a start is no help
	}
	d := c.fault(g)
	if d.Code = "no-steady-state"; f.Reason != network.Enclosed {
		d.Hint = `state where it starts with [run] start, or start at the nodes`
	}
	return d
}

// marchFault is the diagnostic of a march that cannot go on.
func (c *Case) marchFault(m *network.MarchFault) Diagnostic {
	f, hint := network.Fault{Refs: m.Refs, Text: m.Text}, ""
	var why *network.ParamFault
	if errors.As(m.Err, &why) {
		for _, g := range why.List {
			f.Text = strings.Replace(f.Text, g.Text, c.figured(g.Text, g.Figure), 1)
			if f.Refs = append(f.Refs, g.Refs...); g.Code == network.NoWayOut {
				hint = c.fault(g).Hint
			}
		}
	}
	d := c.fault(f)
	d.Code, d.Hint = "not-marched", hint
	return d
}

// figured writes the flow that stands in a text in the unit of its node.
func (c *Case) figured(text string, f network.Figure) string {
	if f.Ref < 0 || int(f.Ref) >= len(c.refs) || c.refs[f.Ref].e == nil {
		return text
	}
	dim := c.Measures(c.refs[f.Ref].e.domain).Flow
	return f.In(text, c.Questions.Print[PrintWord(dim, quantity.Plain)].Format(f.Flow, dim, quantity.Plain))
}

// likeNode shows how a node is written.
func (c *Case) likeNode() string {
	for i := range c.voc {
		if d := c.voc[i].Domain; d != "" {
			return ", like [" + d + ".node.NAME]"
		}
	}
	return ""
}

// inWords puts a hint about a capacitance in the words of the domain it is about.
func (c *Case) inWords(ref network.Ref, hint string) string {
	if ref >= 0 && int(ref) < len(c.refs) && c.refs[ref].e != nil {
		if ways := c.Measures(c.refs[ref].e.domain).ways(); ways != "" {
			return strings.ReplaceAll(hint, "capacitance", ways)
		}
	}
	return hint
}

// ways puts the keys that make a node store into words: "compliance, tank or gas".
func (m Measures) ways() string {
	list := append([]string{m.StoreKey}, m.StoreAlso...)
	last := len(list) - 1
	if last == 0 {
		return m.StoreKey
	}
	return strings.Join(list[:last], ", ") + " or " + list[last]
}
