package main

import (
	"strings"

	"lagbook/cmd/lagbook/internal/present"
	"lagbook/network/study"
)

// checkDoc is the page of the verb check: everything in SI but levels, which
// stand in K and in the unit people read.
func checkDoc(p study.Printer, a *study.Check) present.Doc {
	d := present.Doc{Title: title(a.Title), Parts: doubts(a.Evidence)}
	d.Parts = append(d.Parts, nodesParts(p, a.Nodes)...)
	d.Parts = append(d.Parts, branchesPart(p, a.Branches), inputsPart(a.Inputs))
	if len(a.Given) > 0 {
		d.Parts = append(d.Parts, givenPart(p, a.Given))
	}
	d.Parts = append(d.Parts, present.List{Items: a.Notes})
	if len(a.LeavesOut) > 0 {
		d.Parts = append(d.Parts, present.Heading{Level: 1, Text: "Left out"}, present.List{Items: a.LeavesOut})
	}
	d.Parts = append(d.Parts, closing(a.Evidence)...)
	return d
}

// nodesParts lists the nodes, those of each domain in a table of their own.
func nodesParts(p study.Printer, nodes []study.CheckNode) []present.Part {
	var parts []present.Part
	for _, own := range byDomain(nodes) {
		caption := "Nodes"
		if len(own) < len(nodes) {
			caption += ", " + own[0].Domain
		}
		parts = append(parts, nodesPart(p, caption, own))
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

func nodesPart(p study.Printer, caption string, nodes []study.CheckNode) present.Table {
	store, level := nodes[0].Unit, nodes[0].LevelUnit
	t := present.Table{
		Caption: caption,
		Columns: []present.Column{{Head: "node"}, {Head: "kind"}, {Head: "C / " + bracketed(p.Unit(store, "")), Align: present.Point},
			{Head: head("start", p.Unit(level, "level")), Align: present.Point}, {Head: "how"}, {Head: "source"}},
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
		t.Rows = append(t.Rows, []string{n.Name, n.Kind, c, start, n.From, n.Source})
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

func branchesPart(p study.Printer, branches []study.CheckBranch) present.Table {
	t := present.Table{
		Caption:  "Parts (flow is positive along the arrow)",
		Columns:  []present.Column{{Head: "part"}, {Head: "name"}, {Head: "from → to"}, {Head: "quantity"}, {Head: "value"}, {Head: "how"}, {Head: "source"}},
		FullHead: []string{"part", "name", "from", "to", "quantity", "value", "unit", "formula", "numbers", "source"},
	}
	for _, b := range branches {
		t.Rows = append(t.Rows, []string{b.Part, b.Name, arrow(b.From, b.To), strings.TrimSuffix(b.Quantity, " of "+b.Name), p.Value(b.Value, b.Unit, b.Kind), b.How(), b.Source})
		t.Full = append(t.Full, []string{b.Part, b.Name, b.From, b.To, b.Quantity, full(b.Value), b.Unit, b.Formula, b.Numbers, b.Source})
	}
	return t
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

func givenPart(p study.Printer, given []study.CheckGiven) present.Table {
	t := present.Table{
		Caption:  "Given",
		Columns:  []present.Column{{Head: "name"}, {Head: "value"}, {Head: "as written"}, {Head: "source"}},
		FullHead: []string{"name", "value", "unit", "as written", "source"},
	}
	for _, g := range given {
		t.Rows = append(t.Rows, []string{g.Name, p.Value(g.Value, g.Unit, g.Kind), g.Text, g.Source})
		t.Full = append(t.Full, []string{g.Name, full(g.Value), g.Unit + kindWord(g.Kind), g.Text, g.Source})
	}
	return t
}
