package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// sourceTable is [thermal.source.NAME]: heat put into a node or taken out of
// it, drive + slope·(T − about), or drive·(1 + per_kelvin·(T − at)).
func sourceTable() casefile.Table {
	into := casefile.NodeName("into", "the node it heats")
	outOf := casefile.NodeName("out_of", "the node it cools")
	follows := casefile.NodeName("follows", "the node whose temperature slope and per_kelvin go by, if not its own")
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
			{Name: "per_kelvin", Type: casefile.Number, Dim: inverseKelvin, With: []string{"at"}, Help: "share by which the drive grows for each kelvin of its node above at"},
			with(level("at", "temperature at which the drive is what is stated"), "per_kelvin"),
		},
		Build:  buildSource,
		Derive: deriveSource,
	}
}

func buildSource(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	end, sign := e.SourceEnd()
	node, faults := e.NodeAt(end)
	on := node
	if e.Has("follows") {
		if !e.Has("slope") && !e.Has("per_kelvin") {
			d := e.Fault("follows", "follows needs slope or per_kelvin beside it", "", "")
			d.Code, d.Hint = "missing-key", `add slope = "1 W/K" and about, or per_kelvin = "0.4 %/K" and at`
			faults = append(faults, d)
		}
		followed, more := e.NodeAt("follows")
		on, faults = followed, append(faults, more...)
	}
	if faults != nil {
		return nil, faults
	}
	in := b.Source(e.FullName(), node, sign, e.Ref)
	setters := []casefile.Setter{casefile.SetWave(in, e.Wave("drive"))}
	if e.Has("slope") {
		fb := b.Feedback(e.FullName(), node, on, e.Ref)
		slope, about := e.Num("slope"), e.Num("about")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.K[fb], p.About[fb] = sign*v.Num[slope], v.Num[about]
			return nil
		})
	}
	if e.Has("per_kelvin") {
		set, faults := perKelvinOf(e, c, b, node, on, sign)
		if faults != nil {
			return nil, faults
		}
		setters = append(setters, set)
	}
	return casefile.Together(setters...), intoHeld(e, c, end)
}

// perKelvinOf builds drive·(1 + α·(T − at)) as a feedback α·drive beside the drive: one
// that switches with it, and so must change in steps.
func perKelvinOf(e *casefile.Element, c *casefile.Case, b *network.Builder, node, on network.NodeID, sign float64) (casefile.Setter, []casefile.Diagnostic) {
	if d := casefile.NotInSteps(e, c, "drive", "with per_kelvin it switches a feedback, and the network must be linear between its changes"); d != nil {
		return nil, d
	}
	fb, id := b.Feedback(e.FullName()+" per kelvin", node, on, e.Ref), b.Switch(e.FullName(), e.Ref)
	drive, alpha, at := e.Wave("drive"), e.Num("per_kelvin"), e.Num("at")
	return func(v casefile.Values, p *network.Params) error {
		p.Switch[id] = v.Wave[drive]
		p.K[fb], p.About[fb] = sign*v.Num[alpha]*p.Now[id], v.Num[at]
		return nil
	}, nil
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
	var list []casefile.Derivation
	on := e.NameOf("follows")
	if on == "" {
		end, _ := e.SourceEnd()
		on = e.NameOf(end)
	}
	if e.Has("per_kelvin") {
		alpha, at := typed(e, "per_kelvin"), typed(e, "at")
		list = append(list, casefile.Derivation{
			Quantity: "share per kelvin of " + e.Name, Formula: "drive·(1 + α·(" + on + " − at))", Numbers: alpha.text + " at " + at.text,
			Source: sources(alpha, at), SI: alpha.at(v), Dim: inverseKelvin,
		})
	}
	if !e.Has("slope") {
		return list
	}
	slope, about := typed(e, "slope"), typed(e, "about")
	return append(list, casefile.Derivation{
		Quantity: "slope of " + e.Name, Formula: "drive + slope·(" + on + " − about)", Numbers: slope.text + " about " + about.text,
		Source: sources(slope, about), SI: slope.at(v), Dim: conductance,
	})
}
