package casefile

import (
	"errors"
	"strings"

	"lagbook/network"
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
		d := c.fault(network.Fault{Refs: march.Refs, Text: march.Text})
		d.Code, d.Hint = "not-marched", ""
		return []Diagnostic{d}
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
			g := network.Fault{Refs: f.Refs, Text: f.Text}
			d := c.fault(g)
			d.Code, d.Hint = "no-steady-state", `state where it starts with [run] start, or start at the nodes`
			list = append(list, d)
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
	d := c.Diagnose(ref, w.code, f.Text, c.inWords(ref, w.hint))
	d.Thing = c.inPart(ref) // the text names the parts
	return d
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
