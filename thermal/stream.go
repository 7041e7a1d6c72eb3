package thermal

import (
	"fmt"
	"math"
	"strings"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/thermal/material"
)

// streamTable is [thermal.stream.NAME]: a fluid that flows from node to node,
// each of them stirred.
func streamTable() casefile.Table {
	flow := with(casefile.Positive("flow", volumeFlow, "flow of the fluid, a volume or a mass in a time"), "fluid")
	flow.Also = []quantity.Dim{massFlow}
	return casefile.Table{
		Name:  "stream",
		Stage: 1,
		Help:  "a fluid on its way from node to node: each receives w·(T_up − T_down)",
		OneOf: [][]string{{"capacity_rate", "fluid"}},
		Fields: []casefile.Field{
			{Name: "path", Type: casefile.Names, Refers: "node", Structural: true, Required: true, HasMin: true, Min: 2, Help: "the nodes it passes, in order; fluid nodes only"},
			casefile.Positive("capacity_rate", conductance, "w, heat carried for each kelvin: flow·ρ·c"),
			{Name: "fluid", Type: casefile.Name, Structural: true, Help: "an own material or a liquid or gas of the handbook"},
			flow,
			with(level("flow_at", "temperature at which the flow is meant: must be stated for a gas; 20 °C for a liquid unless stated"), "fluid"),
			scaleField(),
		},
		Build:  buildStream,
		Derive: deriveStream,
	}
}

func buildStream(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	rate, faults := rateLaw(e, c)
	nodes, more := pathNodes(e, c)
	scale, wrong := casefile.ScalingOf(e, c, b)
	faults = append(append(append(faults, more...), solidsInPath(e, c)...), wrong...)
	if faults != nil {
		return nil, faults
	}
	names := e.Names("path")
	plain := make([]network.OneWayID, len(names)-1)
	for i := range plain {
		plain[i] = elsewhere
		if !builtElsewhere(c, e, i) {
			plain[i] = b.OneWay(stretchName(e, i), nodes[i], nodes[i+1], e.Ref)
		}
	}
	along := passagesOf(e, c, b, nodes)
	return func(v casefile.Values, p *network.Params) error {
		w := rate.value(v) * scale.Factor(v, p)
		for _, id := range plain {
			if id != elsewhere {
				p.W[id] = w
			}
		}
		for i := range along {
			along[i].set(v, p, w, plain)
		}
		return nil
	}, nil
}

// elsewhere marks a stretch on which an exchanger or a plug lies: that builds it.
const elsewhere network.OneWayID = -1

// builtElsewhere reports whether the stretch of a stream is an exchanger's or a plug's.
func builtElsewhere(c *casefile.Case, stream *casefile.Element, k int) bool {
	on := onStretch(c, stream, k)
	return len(on) > 0 && (isExchanger(on[0]) || isPlugOf(on[0], stream.Name))
}

// stretchName names a stretch: the first bears the name of the stream.
func stretchName(e *casefile.Element, i int) string {
	if i == 0 {
		return e.FullName()
	}
	return fmt.Sprintf("%s/%d", e.FullName(), i+1)
}

// pathNodes returns the nodes of the path.
func pathNodes(e *casefile.Element, c *casefile.Case) (nodes []network.NodeID, faults []casefile.Diagnostic) {
	names := e.Names("path")
	for i, name := range names {
		id, ok := e.Node(name)
		if !ok {
			return nil, []casefile.Diagnostic{e.Fault(inPath(i), fmt.Sprintf("%q is not a node", name), "names of nodes", "")}
		}
		if i > 0 && name == names[i-1] {
			faults = append(faults, e.Fault(inPath(i), fmt.Sprintf("%q follows itself", name), "different nodes one after another", ""))
		}
		nodes = append(nodes, id)
	}
	return nodes, faults
}

// inPath is the path of the i-th name of a stream's path.
func inPath(i int) string { return fmt.Sprintf("path[%d]", i) }

// solidsInPath finds nodes that are lumps of a solid of the handbook: nothing
// flows through them.
func solidsInPath(e *casefile.Element, c *casefile.Case) (faults []casefile.Diagnostic) {
	for i, name := range e.Names("path") {
		n, ok := c.Element("thermal.node", name)
		if !ok || !n.Has("lump") {
			continue
		}
		if s, unknown := substanceAt(n, c, "lump.material"); unknown == nil && s.solid() {
			d := e.Fault(inPath(i), fmt.Sprintf("node %q is solid (%s)", name, s.book.Key), "a fluid node", "")
			d.Hint = "let the stream pass beside it: a passage along the solid node"
			faults = append(faults, d)
		}
	}
	return faults
}

// rateLaw computes the capacity rate w.
func rateLaw(e *casefile.Element, c *casefile.Case) (law, []casefile.Diagnostic) {
	if e.Has("capacity_rate") {
		return asTyped("w", typed(e, "capacity_rate")), nil
	}
	if !e.Has("flow") {
		d := e.Fault("fluid", "fluid without flow", "", "")
		d.Hint = `add flow = "1 L/min" or "1 kg/s"`
		return law{}, []casefile.Diagnostic{d}
	}
	s, faults := substanceAt(e, c, "fluid")
	if faults != nil {
		return law{}, faults
	}
	if s.own != nil {
		return ownFluidLaw(e, s)
	}
	return bookFluidLaw(e, s.book)
}

// byMass reports whether the flow of a stream is that of a mass.
func byMass(e *casefile.Element) bool { return e.DimOf("flow") == massFlow }

// ownFluidLaw is flow·ρ·c, or mass flow·c, of a material of the case.
func ownFluidLaw(e *casefile.Element, s substance) (law, []casefile.Diagnostic) {
	heat, faults := s.property(e, "fluid", "specific_heat", specificHeat)
	flow := typed(e, "flow")
	if byMass(e) {
		return law{"ṁ·c", flow.text + " · " + heat.text, sources(heat, flow),
			func(v casefile.Values) float64 { return flow.at(v) * heat.at(v) }}, faults
	}
	rho, more := s.property(e, "fluid", "density", density)
	return law{"V̇·ρ·c", flow.text + " · " + rho.text + " · " + heat.text, sources(rho, heat, flow),
		func(v casefile.Values) float64 { return flow.at(v) * rho.at(v) * heat.at(v) }}, append(faults, more...)
}

// bookFluidLaw is the same for a fluid of the handbook at the temperature the
// flow is meant at.
func bookFluidLaw(e *casefile.Element, m material.Material) (law, []casefile.Diagnostic) {
	if m.Phase == material.Solid {
		return law{}, []casefile.Diagnostic{e.Fault("fluid", m.Key+" is a solid", "a liquid or a gas", "")}
	}
	if m.Phase == material.Gas && !byMass(e) && !e.Has("flow_at") {
		d := e.Fault("flow", "the volume of a gas depends on its temperature: flow_at is missing", "", "")
		d.Hint = `add the temperature at which this flow is measured: flow_at = "20 °C"`
		return law{}, []casefile.Diagnostic{d}
	}
	at := typedOr(e, "flow_at", usual, "20 °C")
	formula, flow, byVolume := "V̇·ρ·c", typed(e, "flow"), !byMass(e)
	if !byVolume {
		formula = "ṁ·c"
	}
	return law{
		formula: formula,
		numbers: flow.text + " of " + m.Key + " at " + at.text,
		source:  m.Name + ": " + m.Points[0].Source,
		value: func(v casefile.Values) float64 {
			p, _ := m.At(at.at(v))
			if byVolume {
				return flow.at(v) * p.Density * p.SpecificHeat
			}
			return flow.at(v) * p.SpecificHeat
		},
	}, nil
}

func deriveStream(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	l, faults := rateLaw(e, c)
	if faults != nil {
		return nil
	}
	return []casefile.Derivation{l.derive("capacity rate of "+e.Name, conductance, v)}
}

// unbalanced is how much more may leave a node than enters it, as a share: what
// rounding of flows written in decimals makes, and no more.
const unbalanced = 1e-9

// checkStreams compares what all streams carry into each node with what they
// carry out of it. More may enter than leaves, for the rest leaves the model at
// the node's temperature; where more leaves than enters, heat would appear from
// nowhere. Held nodes supply and swallow what they must. It also finds fluids
// whose properties the handbook does not reach.
func checkStreams(c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	type balance struct {
		in, out float64
		leaver  *casefile.Element // the first stream that leaves the node, and where in its path
		place   int
	}
	nodes := map[string]*balance{}
	var order []string
	var faults []casefile.Diagnostic
	at := func(name string) *balance {
		if nodes[name] == nil {
			nodes[name] = &balance{}
			order = append(order, name)
		}
		return nodes[name]
	}
	for _, e := range c.Elements {
		if e.Domain() != "thermal" || e.Table.Name != "stream" {
			continue
		}
		rate, broken := rateLaw(e, c)
		path := e.Names("path")
		if broken != nil || len(path) < 2 {
			continue // already reported, by the part itself
		}
		faults = append(faults, beyondHandbook(e, c, v)...)
		w := rate.value(v)
		for i := range path[1:] {
			up := at(path[i])
			up.out += w
			if up.leaver == nil {
				up.leaver, up.place = e, i
			}
			at(path[i+1]).in += w
		}
	}
	for _, name := range order {
		n := nodes[name]
		if e, ok := c.Element("thermal.node", name); ok && e.Has("held") || n.out <= n.in*(1+unbalanced) {
			continue
		}
		d := n.leaver.Fault(inPath(n.place), fmt.Sprintf("more leaves node %q than enters it: %s in, %s out", name, perKelvin(n.in), perKelvin(n.out)), "", "")
		d.Code = "unbalanced-streams"
		d.Hint = "what flows out of a node must flow in: add the stream that feeds it, or hold its temperature if the fluid comes from outside"
		faults = append(faults, d)
	}
	return faults
}

func perKelvin(w float64) string {
	return quantity.Print{Digits: 6}.Format(w, conductance, quantity.Plain)
}

// beyondHandbook warns of a handbook fluid taken at a temperature outside its points.
func beyondHandbook(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Diagnostic {
	if !e.Has("fluid") || !e.Has("flow_at") {
		return nil
	}
	s, unknown := substanceAt(e, c, "fluid")
	if unknown != nil || s.own != nil {
		return nil
	}
	T := v.Num[e.Num("flow_at")]
	if _, inside := s.book.At(T); inside {
		return nil
	}
	celsius := func(T float64) string { return quantity.Print{Digits: 4}.Format(T, temperature, quantity.Level) }
	first, last := s.book.Points[0].Temperature, s.book.Points[len(s.book.Points)-1].Temperature
	nearest := math.Min(math.Max(T, first), last)
	d := e.Fault("flow_at", fmt.Sprintf("the handbook knows %s from %s to %s: its values at %s are used", s.book.Key, celsius(first), celsius(last), celsius(nearest)), "", "")
	d.Severity, d.Code = casefile.Warning, "beyond-handbook"
	return []casefile.Diagnostic{d}
}

// quotedNames lists names as messages show them.
func quotedNames(names []string) string {
	return `"` + strings.Join(names, `", "`) + `"`
}
