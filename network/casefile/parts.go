package casefile

import (
	"strconv"

	"lagbook/network"
	"lagbook/network/quantity"
)

// What the parts of every domain have in common: the keys, and how the network is
// told of them. A domain adds its own physics.

// Positive is a key that holds a number above zero.
func Positive(name string, dim quantity.Dim, help string) Field {
	return Field{Name: name, Type: Number, Dim: dim, HasMin: true, MinOpen: true, Help: help}
}

// NodeName is a key that names a node of the domain.
func NodeName(name, help string) Field {
	return Field{Name: name, Type: Name, Refers: "node", Structural: true, Help: help}
}

// Between names the two ends of a part; its flow is positive from the first to the second.
func Between() Field {
	return Field{Name: "between", Type: Names, Refers: "node", Structural: true, Required: true,
		HasMin: true, Min: 2, HasMax: true, Max: 2, Help: "the two nodes it joins; flow from the first to the second is positive"}
}

// From names the end that a part with one way takes from; its flow is positive from there.
func From() Field {
	f := NodeName("from", "the node it takes from")
	f.Required = true
	return f
}

// To names the end that a part with one way feeds.
func To() Field {
	f := NodeName("to", "the node it feeds")
	f.Required = true
	return f
}

// FromTo returns the two nodes of a part with one way.
func (e *Element) FromTo() (from, to network.NodeID, faults []Diagnostic) {
	from, faults = e.NodeAt("from")
	to, more := e.NodeAt("to")
	if faults = append(faults, more...); faults == nil && from == to {
		d := e.Fault("to", "it takes from "+strconv.Quote(e.NameOf("from"))+" and feeds it too", "another node", "")
		d.Code = "same-name"
		faults = append(faults, d)
	}
	return from, to, faults
}

// Ends returns the two nodes of a part that lies between them.
func (e *Element) Ends() (from, to network.NodeID, faults []Diagnostic) {
	names := e.Names("between") // two, and different: names sees to it
	from, okFrom := e.Node(names[0])
	to, okTo := e.Node(names[1])
	if !okFrom || !okTo {
		return 0, 0, []Diagnostic{e.Fault("between", "a name that is not a node", "the names of two nodes", "")}
	}
	return from, to, nil
}

// NodeAt returns the node that a key names.
func (e *Element) NodeAt(key string) (network.NodeID, []Diagnostic) {
	id, ok := e.Node(e.NameOf(key))
	if !ok {
		return 0, []Diagnostic{e.Fault(key, "a name that is not a node", "the name of a node", "")}
	}
	return id, nil
}

// SourceEnd returns the key that names the node of a source, into or out_of, and the
// sign of its flow into that node.
func (e *Element) SourceEnd() (key string, sign float64) {
	if e.Has("out_of") {
		return "out_of", -1
	}
	return "into", 1
}

// AddNode adds a node with what any node may have, held and start. Where it stores is
// for the domain to say, and what a held or a start means that is not a plain value: a
// node is then held by whoever reads it.
func (e *Element) AddNode(c *Case, b *network.Builder) (network.NodeID, []Setter, []Diagnostic) {
	id := b.Node(e.FullName(), e.Ref)
	c.BindNode(e.FullName(), id)
	var set []Setter
	if e.Plain("held") {
		set = append(set, SetWave(b.Hold(id, e.Ref), e.Wave("held")))
	}
	if !e.Has("start") {
		return id, set, nil
	}
	if e.Has("held") {
		return id, set, []Diagnostic{e.Fault("start", "start of a held node: it starts where it is held", "", "")}
	}
	if !e.Plain("start") {
		return id, set, nil
	}
	return id, append(set, SetStart(id, e.Num("start"))), nil
}

// SetWave drives an input by a waveform.
func SetWave(in network.InputID, wave WaveSlot) Setter {
	return func(v Values, p *network.Params) error {
		p.Wave[in] = v.Wave[wave]
		return nil
	}
}

// SetStart gives a node its level at t = 0.
func SetStart(id network.NodeID, slot Slot) Setter {
	return func(v Values, p *network.Params) error {
		p.Start[id], p.HasStart[id] = v.Num[slot], true
		return nil
	}
}

// Together makes one setter of several, nil of none.
func Together(set ...Setter) Setter {
	switch len(set) {
	case 0:
		return nil
	case 1:
		return set[0]
	}
	return func(v Values, p *network.Params) error {
		for _, s := range set {
			if err := s(v, p); err != nil {
				return err
			}
		}
		return nil
	}
}
