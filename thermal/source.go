package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// sourceTable is [thermal.source.NAME]: heat put into a node or taken out of
// it, drive + slope·(T − about).
func sourceTable() casefile.Table {
	into := nodeName("into", "the node it heats")
	outOf := nodeName("out_of", "the node it cools")
	follows := nodeName("follows", "the node whose temperature the slope goes by, if not its own")
	follows.With = []string{"slope"}
	return casefile.Table{
		Name:  "source",
		Stage: 1,
		Help:  "a heat flow into a node or out of it",
		OneOf: [][]string{{"into", "out_of"}},
		Fields: []casefile.Field{
			into, outOf,
			{Name: "drive", Type: casefile.Wave, Dim: power, Required: true, Help: "the heat flow"},
			{Name: "slope", Type: casefile.Number, Dim: conductance, With: []string{"about"}, Help: "added for each kelvin of its node above about"},
			{Name: "about", Type: casefile.Number, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true,
				With: []string{"slope"}, Help: "temperature at which the slope adds nothing"},
			follows,
		},
		Build:  buildSource,
		Derive: deriveSource,
	}
}

func buildSource(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	end, sign := "into", 1.0
	if e.Has("out_of") {
		end, sign = "out_of", -1
	}
	var faults []casefile.Diagnostic
	node, ok := e.Node(e.NameOf(end))
	if !ok {
		faults = append(faults, e.Fault(end, "a name that is not a node", "the name of a node", ""))
	}
	on := node
	if e.Has("follows") {
		if on, ok = e.Node(e.NameOf("follows")); !ok {
			faults = append(faults, e.Fault("follows", "a name that is not a node", "the name of a node", ""))
		}
	}
	if faults != nil {
		return nil, faults
	}
	in, wave := b.Source(e.FullName(), node, sign, e.Ref), e.Wave("drive")
	setters := []casefile.Setter{func(v casefile.Values, p *network.Params) error {
		p.Wave[in] = v.Wave[wave]
		return nil
	}}
	if e.Has("slope") {
		fb := b.Feedback(e.FullName(), node, on, e.Ref)
		slope, about := e.Num("slope"), e.Num("about")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.K[fb], p.About[fb] = sign*v.Num[slope], v.Num[about]
			return nil
		})
	}
	return together(setters), intoHeld(e, c, end)
}

// intoHeld warns of heat that changes nothing.
func intoHeld(e *casefile.Element, c *casefile.Case, end string) []casefile.Diagnostic {
	n, ok := c.Element("thermal.node", e.NameOf(end))
	if !ok || !n.Has("held") {
		return nil
	}
	d := e.Fault(end, fmt.Sprintf("node %q is held: this source changes nothing", n.Name), "", "")
	d.Severity, d.Code = casefile.Warning, "source-into-held"
	return []casefile.Diagnostic{d}
}

func deriveSource(e *casefile.Element, c *casefile.Case, v casefile.Values) []casefile.Derivation {
	if !e.Has("slope") {
		return nil
	}
	slope, about := typed(e, "slope"), typed(e, "about")
	on := e.NameOf("follows")
	if on == "" {
		on = e.NameOf("into") + e.NameOf("out_of") // one of them is ""
	}
	return []casefile.Derivation{{
		Quantity: "slope of " + e.Name, Formula: "drive + slope·(" + on + " − about)", Numbers: slope.text + " about " + about.text,
		Source: sources(slope, about), SI: slope.at(v), Dim: conductance,
	}}
}
