package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// sourceTable is [thermal.source.NAME]: heat put into a node or taken out of
// it, drive + slope·(T − about), or drive·(1 + per_kelvin·(T − at)), drive·2^((T − at)/doubles_every),
// or points against temperature.
func sourceTable() casefile.Table {
	into := casefile.NodeName("into", "the node it heats")
	outOf := casefile.NodeName("out_of", "the node it cools")
	follows := casefile.NodeName("follows", "the node whose temperature slope, per_kelvin, doubles_every and points go by, if not its own")
	heat := casefile.Field{Name: "heat", Type: casefile.Number, Dim: power}
	return casefile.Table{
		Name:  "source",
		Stage: 1,
		Help:  "a heat flow into a node or out of it",
		OneOf: [][]string{{"into", "out_of"}, {"drive", "points"}, {"per_kelvin", "doubles_every", ""}},
		Fields: []casefile.Field{
			into, outOf,
			{Name: "drive", Type: casefile.Wave, Dim: power, Help: "the heat flow"},
			{Name: "slope", Type: casefile.Number, Dim: conductance, With: []string{"about"}, Help: "added for each kelvin of its node above about"},
			{Name: "about", Type: casefile.Number, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true,
				With: []string{"slope"}, Help: "temperature at which the slope adds nothing"},
			follows,
			{Name: "per_kelvin", Type: casefile.Number, Dim: inverseKelvin, With: []string{"drive", "at"}, Help: "share by which the drive grows for each kelvin of its node above at"},
			withAll(difference("doubles_every", "rise of its node with which the drive doubles; it is held at a million times the drive, and said so"), "drive", "at"),
			level("at", "temperature at which the drive is what is stated"),
			{Name: "points", Type: casefile.Pairs, Dim: temperature, Kind: quantity.Level, HasMin: true, MinOpen: true, Ascending: true, Second: &heat,
				Help: "heat flow against temperature, in place of drive: straight between, constant outside"},
			{Name: "scale", Type: casefile.Wave, Dim: dimless, Help: "multiplies what the points give"},
		},
		Readings: []casefile.Reading{{Word: "flow", Dim: power, Help: "the heat flow, as it is at the temperature of the moment"}},
		Build:    buildSource,
		Derive:   deriveSource,
	}
}

func buildSource(e *casefile.Element, c *casefile.Case, b *network.Builder) (casefile.Setter, []casefile.Diagnostic) {
	end, sign := e.SourceEnd()
	node, faults := e.NodeAt(end)
	on := node
	if e.Has("follows") {
		if !e.Has("slope") && !e.Has("per_kelvin") && !e.Has("doubles_every") && !e.Has("points") {
			d := e.Fault("follows", "follows needs slope, per_kelvin, doubles_every or points beside it", "", "")
			d.Code, d.Hint = "missing-key", `add slope = "1 W/K" and about, or per_kelvin = "0.4 %/K" and at`
			faults = append(faults, d)
		}
		followed, more := e.NodeAt("follows")
		on, faults = followed, append(faults, more...)
	}
	if e.Has("at") && !e.Has("per_kelvin") && !e.Has("doubles_every") {
		d := e.Fault("at", "at needs per_kelvin or doubles_every beside it", "", "")
		d.Code, d.Hint = "missing-key", `add per_kelvin = "0.4 %/K", or doubles_every = "10 K"`
		faults = append(faults, d)
	}
	if e.Has("scale") && !e.Has("points") {
		d := e.Fault("scale", "scale needs points beside it", "", "")
		d.Code, d.Hint = "missing-key", "a drive is scaled by an expression of its own: drive = \"= 2 * loss\""
		faults = append(faults, d)
	}
	if faults != nil {
		return nil, faults
	}
	in := b.Source(e.FullName(), node, sign, e.Ref)
	var setters []casefile.Setter
	if e.Has("drive") {
		setters = append(setters, casefile.SetWave(in, e.Wave("drive")))
	}
	if e.Has("slope") {
		fb := b.Feedback(e.FullName(), node, on, e.Ref)
		showsWhole(e, in, fb, sign)
		slope, about := e.Num("slope"), e.Num("about")
		setters = append(setters, func(v casefile.Values, p *network.Params) error {
			p.K[fb], p.About[fb] = sign*v.Num[slope], v.Num[about]
			return nil
		})
	}
	switch {
	case e.Has("per_kelvin") && casefile.NotInSteps(e, c, "drive", "") == nil:
		setters = append(setters, perKelvinOf(e, b, in, node, on, sign))
	case e.Has("per_kelvin"), e.Has("doubles_every"), e.Has("points"):
		setters = append(setters, lossOf(e, b, node, on, sign))
	}
	return casefile.Together(setters...), intoHeld(e, c, end)
}

// perKelvinOf builds drive·(1 + α·(T − at)) as a feedback α·drive beside the drive: one
// that switches with it, where it changes in steps.
func perKelvinOf(e *casefile.Element, b *network.Builder, in network.InputID, node, on network.NodeID, sign float64) casefile.Setter {
	fb, id := b.Feedback(e.FullName()+" per kelvin", node, on, e.Ref), b.Switch(e.FullName(), e.Ref)
	showsWhole(e, in, fb, sign)
	drive, alpha, at := e.Wave("drive"), e.Num("per_kelvin"), e.Num("at")
	return func(v casefile.Values, p *network.Params) error {
		p.Switch[id] = v.Wave[drive]
		p.K[fb], p.About[fb] = sign*v.Num[alpha]*p.Now[id], v.Num[at]
		return nil
	}
}

// showsWhole makes "flow of" the drive and what the feedback adds to it.
func showsWhole(e *casefile.Element, in network.InputID, fb network.FeedbackID, sign float64) {
	drive := network.Output{Flow: &network.FlowTerm{Kind: network.SourceFlow, Input: in, Sign: 1}}
	more := network.Output{Flow: &network.FlowTerm{Kind: network.FeedbackFlow, Feedback: fb, Sign: 1}}
	e.Shows("flow", network.Output{Parts: []network.Part{{Coef: 1, Output: drive}, {Coef: sign, Output: more}}})
}

// intoHeld warns of heat that changes nothing.
func intoHeld(e *casefile.Element, c *casefile.Case, end string) []casefile.Diagnostic {
	n, ok := c.Element("thermal.node", e.NameOf(end))
	if !ok || !n.Has("held") {
		return nil
	}
	d := e.Fault(end, fmt.Sprintf("node %q is held: this %s changes nothing", n.Name, e.Table.Name), "", "")
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
	list = append(list, deriveLoss(e, on, v)...)
	if !e.Has("slope") {
		return list
	}
	slope, about := typed(e, "slope"), typed(e, "about")
	return append(list, casefile.Derivation{
		Quantity: "slope of " + e.Name, Formula: "drive + slope·(" + on + " − about)", Numbers: slope.text + " about " + about.text,
		Source: sources(slope, about), SI: slope.at(v), Dim: conductance,
	})
}
