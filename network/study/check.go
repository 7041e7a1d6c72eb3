package study

import (
	"fmt"
	"slices"
	"strings"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// Check lists the network as understood: nodes, parts with how each number
// follows, inputs in words, given values, and what is legal but worth a word.
func (m *Model) Check() (*Check, error) {
	c := m.Case
	start, err := m.startSnapshot() // whatever cannot be computed is said here, not first by table
	if err != nil {
		return nil, err
	}
	a := &Check{Title: c.Title, Understood: Understood{
		Nodes: m.checkNodes(start), Branches: []CheckBranch{}, Inputs: m.checkInputs(),
		Given: m.checkGiven(), Notes: m.notes(), LeavesOut: append([]string{}, c.LeavesOut...),
	}}
	a.Profiles, a.Uses = m.checkProfiles(), m.checkUses()
	if a.Scenarios, err = m.checkScenarios(); err != nil {
		return nil, err
	}
	for _, e := range c.Elements {
		if e.Table.Name != "node" {
			a.Branches = append(a.Branches, m.checkBranches(e, start)...)
		}
	}
	if a.State, err = m.checkState(start); err != nil {
		return nil, err
	}
	var warn []Warning
	if m.Nonlinear() {
		a.Nonlinear = m.nonlinearParts()
		if warn, err = m.unstableStart(); err != nil {
			return nil, err
		}
		if text := m.runaway(); text != "" {
			a.Notes = append(a.Notes, text)
		}
	}
	a.Evidence = m.evidence(warn)
	return a, nil
}

// unstableStart says in words which poles of the linear network about the start grow.
func (m *Model) unstableStart() ([]Warning, error) {
	red, err := m.reducedAbout(nil)
	if err != nil {
		return nil, err
	}
	warn := m.growing(red.System)
	for i := range warn {
		warn[i].Text += ", about the start"
	}
	return warn, nil
}

// checkNodes lists the nodes in file order.
func (m *Model) checkNodes(start *snapshot) []CheckNode {
	list := []CheckNode{}
	for _, e := range m.Case.Elements {
		id, ok := m.Case.Node(e.FullName())
		if e.Table.Name != "node" || !ok {
			continue
		}
		v := m.Net.Node(id)
		words := m.at(id)
		n := CheckNode{Name: e.FullName(), Domain: e.Domain(), Kind: "stored", Unit: words.capacity, LevelUnit: words.level, Source: e.Source()}
		switch {
		case v.Held:
			n.Kind = "held"
		case !m.stores(id):
			n.Kind = "massless"
		}
		if c := start.capacity(id); c > 0 {
			n.Capacitance = &c
		}
		level := start.shown(id)
		n.Start = &level
		if e.Table.Derive != nil {
			for _, d := range e.Table.Derive(e, m.Case, m.val) {
				n.From, n.Source = equation(d.Formula, d.Numbers), d.Source
			}
		}
		list = append(list, n)
	}
	return list
}

// How writes how the number follows: "1/(h·A) = 1/(9 kW/(m²·K) · 6 cm²)".
func (b CheckBranch) How() string { return equation(b.Formula, b.Numbers) }

// equation joins a formula and its numbers; a number typed as such stands for itself.
func equation(formula, numbers string) string {
	switch {
	case numbers == "":
		return formula
	case len([]rune(formula)) < 2: // its own letter says nothing more
		return numbers
	}
	return formula + " = " + numbers
}

// checkBranches lists one part: a line for each number it derives.
func (m *Model) checkBranches(e *casefile.Element, start *snapshot) []CheckBranch {
	var list []CheckBranch
	from, to := ends(e)
	var derived []casefile.Derivation
	if e.Table.Derive != nil {
		derived = e.Table.Derive(e, m.Case, m.val)
	}
	for _, d := range derived {
		list = append(list, CheckBranch{
			Name: e.FullName(), Part: e.Table.Name, From: from, To: to,
			Quantity: d.Quantity, Value: d.SI, Unit: unitOf(d.Dim), Kind: kindOf(d.Kind),
			Formula: d.Formula, Numbers: d.Numbers, Source: d.Source,
		})
	}
	out, ok := m.Case.Showing(e.FullName(), "flow")
	if !ok {
		return list
	}
	q, ok := start.flowShown(out)
	if !ok {
		return list
	}
	unit := m.physicsOf(e.Domain()).flow
	if len(list) == 0 && !m.drives(e) { // nothing but its flow is to be said of it
		list = append(list, CheckBranch{Name: e.FullName(), Part: e.Table.Name, From: from, To: to, Quantity: "flow", Value: q, Unit: unit, Source: e.Source()})
	}
	if len(list) > 0 {
		list[0].Flow, list[0].FlowUnit = &q, unit
	}
	return list
}

// drives reports whether a part is an input, which is listed among those.
func (m *Model) drives(e *casefile.Element) bool {
	return slices.ContainsFunc(m.Net.Inputs(), func(in network.InputView) bool { return in.Name == e.FullName() })
}

// ends are the names an element stands between: its own "between", the first
// and last of its "path", or where a source acts.
func ends(e *casefile.Element) (from, to string) {
	for _, f := range e.Table.Fields {
		if !e.Has(f.Name) {
			continue
		}
		switch f.Name {
		case "between", "path":
			if n := e.Names(f.Name); len(n) > 0 {
				return n[0], n[len(n)-1]
			}
		case "from":
			return e.NameOf("from"), e.NameOf("to")
		case "into":
			return "", e.NameOf("into")
		case "out_of":
			return e.NameOf("out_of"), ""
		}
	}
	return "", ""
}

func unitOf(d quantity.Dim) string {
	if u := quantity.UnitOf(d); u != "" {
		return u
	}
	return "1"
}

func kindOf(k quantity.Kind) string {
	switch k {
	case quantity.Level:
		return kindLevel
	case quantity.Difference:
		return kindDifference
	case quantity.Gauge:
		return kindGauge
	case quantity.Absolute:
		return kindAbsolute
	}
	return ""
}

// checkInputs puts what drives the network in words.
func (m *Model) checkInputs() []CheckInput {
	list := []CheckInput{}
	for _, in := range m.Net.Inputs() {
		words := m.at(in.Node)
		c := CheckInput{Name: in.Name, Held: in.Held, What: words.LevelWord + " of " + in.Name}
		if !in.Held {
			way := "into "
			if in.Sign < 0 {
				way = "out of "
			}
			c.What = words.FlowWord + " " + way + m.Net.Name(in.Node)
		}
		c.Wave = waveWords(m.par.Wave[in.ID], func(v float64) string { return m.inputValue(in, v) }, m.Show.Time)
		list = append(list, c)
	}
	return append(append(list, m.checkSwitches()...), m.checkDrives()...)
}

func (m *Model) checkGiven() []CheckGiven {
	list := []CheckGiven{}
	values := m.Case.GivenValues()
	for i, g := range m.Case.Given {
		v := values[i]
		list = append(list, CheckGiven{g.Name, v.SI, unitOf(v.Dim), kindOf(v.Kind), g.Text, g.Source})
	}
	return list
}

// notes are what is legal and worth knowing.
func (m *Model) notes() []string {
	notes := []string{}
	var names []string
	for _, id := range m.Net.Massless() {
		if !m.stores(id) {
			names = append(names, m.Net.Name(id))
		}
	}
	if n := len(names); n > 0 {
		if n > smallNetwork {
			names = append(names[:smallNetwork], fmt.Sprintf("%d more", n-smallNetwork))
		}
		how := "massless, eliminated exactly: "
		if m.Nonlinear() {
			how = "massless, at the level that balances what flows: "
		}
		notes = append(notes, how+strings.Join(names, ", "))
	}
	for _, r := range m.Net.Remarks() {
		notes = append(notes, r.Text)
	}
	if !m.Nonlinear() {
		notes = append(notes, m.islandNotes()...)
	}
	return append(append(notes, m.pressureNotes()...), m.orderNote())
}

// orderNote counts what stores. Where liquid columns meet or form a ring they are
// fewer states than they are lines.
func (m *Model) orderNote() string {
	count, words := map[string]int{}, []string{}
	for i := range m.Net.NodeCount() {
		if id := network.NodeID(i); m.stores(id) {
			count[m.at(id).StoreWord]++
		}
	}
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch && !m.par.Shut[b.Index] {
			count[inertiaWord]++
		}
	}
	var kinds []string
	for _, d := range m.Case.Domains() {
		kinds = append(kinds, m.physicsOf(d).StoreWord)
	}
	for _, w := range append(kinds, inertiaWord) {
		if n := count[w]; n > 0 {
			words = append(words, several(n, w))
		}
	}
	order := m.Net.StoreCount()
	if count[inertiaWord] > 0 || m.Nonlinear() {
		if _, sys, _, err := m.modal(nil); err == nil {
			order = sys.Order()
		}
	}
	if len(words) == 0 {
		return "order 0: nothing is stored"
	}
	if m.Nonlinear() {
		return fmt.Sprintf("order %d of the linear network about the start: %s", order, join(words))
	}
	return fmt.Sprintf("order %d: %s, that many poles", order, join(words))
}

const inertiaWord = "flow with inertia"

// several counts things: "1 vessel", "3 vessels", "2 flows with inertia".
func several(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	head, rest, cut := strings.Cut(what, " with ")
	if cut {
		rest = " with " + rest
	}
	return fmt.Sprintf("%d %ss%s", n, head, rest)
}

// pressureNotes say what a level of pressure is, in a case that has some.
func (m *Model) pressureNotes() []string {
	for _, d := range m.Case.Domains() {
		if m.physicsOf(d).level != "Pa" {
			continue
		}
		p, fine := m.Case.Pressures, m.Show
		fine.digits = max(fine.digits, 6)
		air := fine.Value(p.Atmosphere, "Pa", kindAbsolute)
		if p.Absolute {
			return []string{"pressures are absolute; where one is stated as gauge, the atmosphere is " + air}
		}
		return []string{"pressures are gauge, above an atmosphere of " + air}
	}
	return nil
}

// islandNotes names the parts of the network that nothing joins.
func (m *Model) islandNotes() []string {
	var groups [][]string
	at := map[int]int{}
	fixed := map[int]bool{}
	for id := range m.Net.NodeCount() {
		n := m.Net.Node(network.NodeID(id))
		if n.Held {
			continue
		}
		k, ok := at[n.Island]
		if !ok {
			k = len(groups)
			at[n.Island] = k
			groups = append(groups, nil)
		}
		groups[k] = append(groups[k], n.Name)
		for _, nb := range n.Neighbours {
			fixed[k] = fixed[k] || m.Net.Node(nb).Held
		}
	}
	var notes []string
	if len(groups) > 1 {
		notes = append(notes, fmt.Sprintf("%d islands that do not influence one another", len(groups)))
	}
	for k, g := range groups {
		if !fixed[k] {
			notes = append(notes, "no held node reaches "+join(g)+": what is put in stays, a pole at exactly 0")
		}
	}
	return notes
}
