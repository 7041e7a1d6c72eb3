package main

import (
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// checkDoc is the page of the verb check: everything in SI but levels, which
// stand in K and in the unit people read.
func checkDoc(m *study.Model, a *study.Check) present.Doc {
	p, d := m.Show, newDoc(m.Case)
	var notes sourceNotes
	d.Parts = doubts(a.Evidence)
	d.Parts = append(d.Parts, nodesParts(p, &notes, a.Nodes)...)
	d.Parts = append(d.Parts, branchesPart(p, &notes, a.Branches))
	if len(a.State) > 0 {
		d.Parts = append(d.Parts, statePart(p, a.State))
	}
	d.Parts = append(d.Parts, inputsPart(a.Inputs))
	d.Parts = append(d.Parts, flowsParts(p, a.Flows)...)
	if len(a.Given) > 0 {
		d.Parts = append(d.Parts, givenPart(p, &notes, a.Given))
	}
	if len(a.Profiles) > 0 {
		d.Parts = append(d.Parts, profilesPart(p, &notes, a.Profiles))
	}
	if len(a.Uses) > 0 {
		d.Parts = append(d.Parts, usesPart(p, &notes, a.Uses))
	}
	if len(a.Scenarios) > 0 {
		d.Parts = append(d.Parts, scenariosPart(p, &notes, a.Scenarios))
	}
	notesOf := a.Notes
	if len(a.Nonlinear) > 0 {
		notesOf = append([]string{"not linear: " + list(a.Nonlinear)}, notesOf...)
	}
	d.Parts = append(d.Parts, present.List{Items: notesOf})
	if len(a.LeavesOut) > 0 {
		d.Parts = append(d.Parts, present.Heading{Level: 1, Text: "Left out"}, present.List{Items: a.LeavesOut})
	}
	d.Parts = append(d.Parts, notes.parts()...)
	d.Parts = append(d.Parts, closing(m.Case, a.Evidence)...)
	return d
}

// nodesParts lists the nodes, those of each domain in a table of their own.
func nodesParts(p study.Printer, notes *sourceNotes, nodes []study.CheckNode) []present.Part {
	var parts []present.Part
	for _, own := range byDomain(nodes) {
		caption := "Nodes"
		if len(own) < len(nodes) {
			caption += ", " + own[0].Domain
		}
		parts = append(parts, nodesPart(p, notes, caption, own))
	}
	return parts
}

// byDomain sorts nodes by domain, in the order of the first of each.
func byDomain(nodes []study.CheckNode) [][]study.CheckNode {
	at := map[string]int{}
	var groups [][]study.CheckNode
	for _, n := range nodes {
		k, ok := at[n.Domain]
		if !ok {
			k = len(groups)
			at[n.Domain], groups = k, append(groups, nil)
		}
		groups[k] = append(groups[k], n)
	}
	return groups
}

func nodesPart(p study.Printer, notes *sourceNotes, caption string, nodes []study.CheckNode) present.Table {
	store, level := nodes[0].Unit, nodes[0].LevelUnit
	t := present.Table{
		Caption: caption,
		Columns: []present.Column{{Head: "node"}, {Head: "kind"}, {Head: "C / " + bracketed(p.Unit(store, "")), Align: present.Point},
			{Head: head("start", p.Unit(level, "level")), Align: present.Point}, {Head: "how, and source"}},
		FullHead: []string{"node", "kind", "C / " + bracketed(store), head("start", level), "how", "source"},
	}
	for _, n := range nodes {
		c, start := "", ""
		if n.Capacitance != nil {
			c = p.Number(p.In(*n.Capacitance, store, ""))
		}
		if n.Start != nil {
			start = p.Number(p.In(*n.Start, level, "level"))
		}
		t.Rows = append(t.Rows, []string{n.Name, n.Kind, c, start, notes.behind(n.From, n.Source)})
		t.Full = append(t.Full, []string{n.Name, n.Kind, fullOf(n.Capacitance), fullOf(n.Start), n.From, n.Source})
	}
	return t
}

// bracketed puts a compound unit in brackets, as it stands behind a stroke.
func bracketed(unit string) string {
	if strings.ContainsAny(unit, "/·") {
		return "(" + unit + ")"
	}
	return unit
}

// branchesPart lists the parts. What the lines of one part share stands in its
// first alone, and the two numbers of a rung of a ladder are one line.
func branchesPart(p study.Printer, notes *sourceNotes, branches []study.CheckBranch) present.Table {
	t := present.Table{
		Caption: "Parts (flow is positive along the arrow; it is that just before t = 0)",
		Columns: []present.Column{{Head: "part"}, {Head: "name"}, {Head: "from → to"}, {Head: "flow", Align: present.Right}, {Head: "quantity"}, {Head: "value"},
			{Head: "how, and source"}},
		FullHead: []string{"part", "name", "from", "to", "flow", "flow unit", "quantity", "value", "unit", "formula", "numbers", "source"},
	}
	for _, b := range branches {
		t.Full = append(t.Full, []string{b.Part, b.Name, b.From, b.To, fullOf(b.Flow), b.FlowUnit, b.Quantity, full(b.Value), b.Unit, b.Formula, b.Numbers, b.Source})
	}
	for i := 0; i < len(branches); i++ {
		b := branches[i]
		row := []string{b.Part, b.Name, arrow(b.From, b.To), flowWords(p, b), quantityOf(b), p.Value(b.Value, b.Unit, b.Kind), notes.behind(b.How(), b.Source)}
		first := i == 0 || branches[i-1].Name != b.Name || branches[i-1].Part != b.Part
		if !first {
			row[0], row[1], row[2] = "", "", ""
			if before := branches[i-1]; before.How() == b.How() && before.Source == b.Source {
				row[6] = ""
			}
		}
		if b.Quantity == "flow" {
			row[4], row[5] = "", "" // it stands before
		}
		if i+1 < len(branches) && sameRung(b, branches[i+1]) {
			i++
			row[4] += ", " + quantityOf(branches[i])
			row[5] += ", " + p.Value(branches[i].Value, branches[i].Unit, branches[i].Kind)
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// flowWords prints what a part carries along its arrow just before t = 0.
func flowWords(p study.Printer, b study.CheckBranch) string {
	if b.Flow == nil {
		return ""
	}
	return p.Value(*b.Flow, b.FlowUnit, "")
}

// statePart lists what else is known of t = 0: what can be read off parts, what is shut.
func statePart(p study.Printer, state []study.CheckValue) present.Table {
	t := present.Table{
		Caption:  "State just before t = 0",
		Columns:  []present.Column{{Head: "of"}, {Head: "value"}},
		FullHead: []string{"of", "value", "unit", "kind", "state"},
	}
	for _, v := range state {
		value := v.State
		if v.Value != nil {
			value = p.Value(*v.Value, v.Unit, v.Kind)
		}
		t.Rows = append(t.Rows, []string{v.Name, value})
		t.Full = append(t.Full, []string{v.Name, fullOf(v.Value), v.Unit, v.Kind, v.State})
	}
	return t
}

// quantityOf names a number of a part, which its line names already.
func quantityOf(b study.CheckBranch) string { return strings.TrimSuffix(b.Quantity, " of "+b.Name) }

// sameRung reports whether two numbers, such as C2 and R2, are of one rung.
func sameRung(a, b study.CheckBranch) bool {
	rung := strings.TrimPrefix(a.Quantity, "C")
	return a.Part == b.Part && a.Name == b.Name && rung != a.Quantity && b.Quantity == "R"+rung && a.Formula == b.Formula && a.Source == b.Source
}

func arrow(from, to string) string {
	if from == "" && to == "" {
		return ""
	}
	return from + " → " + to
}

func inputsPart(inputs []study.CheckInput) present.Table {
	t := present.Table{Caption: "Loads and held levels", Columns: []present.Column{{Head: "name"}, {Head: "what"}, {Head: "against time"}}}
	for _, in := range inputs {
		t.Rows = append(t.Rows, []string{in.Name, in.What, in.Wave})
	}
	return t
}

func givenPart(p study.Printer, notes *sourceNotes, given []study.CheckGiven) present.Table {
	t := present.Table{
		Caption:  "Given",
		Columns:  []present.Column{{Head: "name"}, {Head: "value"}, {Head: "as written"}, {Head: "source"}},
		FullHead: []string{"name", "value", "unit", "as written", "source"},
	}
	for _, g := range given {
		t.Rows = append(t.Rows, []string{g.Name, p.Value(g.Value, g.Unit, g.Kind), g.Text, notes.cell(g.Source)})
		t.Full = append(t.Full, []string{g.Name, full(g.Value), g.Unit + kindWord(g.Kind), g.Text, g.Source})
	}
	return t
}
