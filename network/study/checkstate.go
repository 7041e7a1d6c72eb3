package study

import (
	"slices"

	"lagbook/network"
	"lagbook/network/casefile"
)

// checkState lists what can be read off the parts just before t = 0, in file order, and
// which of them are shut.
func (m *Model) checkState(start *snapshot) ([]CheckValue, error) {
	list := []CheckValue{}
	var asked []casefile.Shown
	for _, e := range m.Case.Elements {
		for _, r := range e.Table.Readings {
			if _, ok := m.Case.Showing(e.FullName(), r.Word); ok && r.Word != "flow" && (r.Word != "level" || speaksOfLevels(e)) {
				asked = append(asked, casefile.Shown{Text: r.Word + " of " + e.FullName(), Part: e.FullName(), Word: r.Word, Dim: r.Dim, Kind: r.Kind})
			}
		}
	}
	values, shows, err := m.atStart(asked, start)
	if err != nil {
		return nil, err
	}
	for i, w := range shows {
		list = append(list, CheckValue{Name: w.name, Value: &values[i], Unit: w.unit, Kind: w.kind})
	}
	for _, name := range m.shutParts(start) {
		list = append(list, CheckValue{Name: name, State: "shut"})
	}
	return list, nil
}

// speaksOfLevels reports whether the case gives a node a surface: the level of any other
// says no more than its pressure.
func speaksOfLevels(e *casefile.Element) bool {
	return e.Has("tank") || e.Has("held.level") || e.Has("start.level")
}

// atStart returns what is shown, just before t = 0.
func (m *Model) atStart(asked []casefile.Shown, start *snapshot) (values []float64, shows []shown, err error) {
	if len(asked) == 0 {
		return nil, nil, nil
	}
	c := m.copied()
	c.outs, c.shows, c.index = nil, nil, map[string]int{}
	for _, s := range asked {
		if _, err := c.want(s, ""); err != nil {
			return nil, nil, err
		}
	}
	if start.lin != nil {
		values = start.lin.Values(c.outs)
		return values, c.shows, nil
	}
	resp, err := c.response()
	if err != nil {
		return nil, nil, err
	}
	for k := range c.outs {
		values = append(values, resp.Left(k, 0))
	}
	return values, c.shows, nil
}

// shutParts are the parts through which nothing can flow just before t = 0.
func (m *Model) shutParts(start *snapshot) []string {
	var names []string
	for _, e := range m.elements() {
		shut := e.Gate > 0 && m.par.Drive[e.ID][e.Gate-1].Before == 0
		if law, ok := m.par.Law[e.ID].(network.Switching); ok && start.lin != nil {
			k, err := m.moment(nil)
			shut = shut || err == nil && law.Shut(k.state.Modes[e.ID])
		}
		if name := m.elementName(e.ID); shut && !slices.Contains(names, name) {
			names = append(names, name)
		}
	}
	for _, b := range m.Net.Branches() {
		if b.Kind == network.InertanceBranch && m.par.Shut[b.Index] || b.Kind == network.ResistanceBranch && m.par.G[b.Index] == 0 {
			if name := m.partOf(b.Ref); !slices.Contains(names, name) {
				names = append(names, name)
			}
		}
	}
	return names
}
