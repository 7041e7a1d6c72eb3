package hydraulic

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// A pipeline is a pipe as it stands in a network: columns one after another, and
// compliances at the nodes between them and at its ends.
type pipeline struct {
	pipe
	e        *casefile.Element
	from, to pipeEnd
	inner    []network.NodeID
	columns  []network.InertanceID
	stores   []pipeStore
	watches  []network.ElementID // of the inner nodes, in which vapour may form
	profile  [][2]casefile.Slot  // distance, elevation
	start    number
}

// A pipeEnd is a node at an end of a pipe.
type pipeEnd struct {
	id        network.NodeID
	elevation number
	held      casefile.WaveSlot
	isHeld    bool // whatever flows
	byWave    bool // by a plain pressure
	byLevel   bool // by the level of an open surface
}

// A pipeStore is what takes up liquid at one node: a capacity, or an element where
// free gas makes it go by the pressure.
type pipeStore struct {
	node    network.NodeID
	share   float64 // of a section
	gas     bool
	plain   network.CapacityID
	element network.ElementID
}

// buildPipe adds a pipe between two nodes.
func buildPipe(e *casefile.Element, c *casefile.Case, b *network.Builder, from, to network.NodeID) (casefile.Setter, []casefile.Diagnostic) {
	l := &pipeline{pipe: pipeOf(e, c), e: e, start: optional(e, "start")}
	names := e.Names("between")
	l.from, l.to = endOf(c, names[0], from), endOf(c, names[1], to)
	faults := l.check(e)
	for i := range e.Len("pipe.elevations") {
		at := fmt.Sprintf("pipe.elevations[%d].", i)
		l.profile = append(l.profile, [2]casefile.Slot{e.Num(at + "first"), e.Num(at + "second")})
	}
	if faults != nil {
		return nil, faults
	}
	written := asWritten(c)
	s, err := l.at(e, written)
	if err != nil {
		return nil, c.Explain(err)
	}
	n := l.count(e, written, &s)
	if n > maxPipeLumps {
		return nil, []casefile.Diagnostic{e.Fault("pipe.accuracy", fmt.Sprintf("an accuracy that needs more than %d sections", maxPipeLumps), "a lower accuracy or frequency", "")}
	}
	if n == 1 && len(l.profile) > 0 {
		return nil, []casefile.Diagnostic{e.Fault("pipe.elevations", "elevations along a pipe of one section, which has no nodes between its ends", "lumps = 2 or more", "")}
	}
	if faults = l.add(e, c, b, n); faults != nil {
		return nil, faults
	}
	e.Shows("velocity", network.Output{Flow: &network.FlowTerm{Kind: network.InertanceFlow, Inertance: l.columns[0], Sign: 1 / s.area}})
	return l.set, nil
}

// endOf reads what the case says of the node at an end.
func endOf(c *casefile.Case, name string, id network.NodeID) pipeEnd {
	end := pipeEnd{id: id}
	node, ok := c.Element("hydraulic.node", name)
	if !ok {
		return end
	}
	end.elevation = heightOf(node)
	end.isHeld = node.Has("held")
	if end.byWave = node.Plain("held"); end.byWave {
		end.held = node.Wave("held")
	}
	if end.byLevel = node.Has("held.level"); end.byLevel {
		end.held = node.Wave("held.level")
	}
	return end
}

// asWritten returns the values of the case as the file states them, for what the
// network's shape follows from.
func asWritten(c *casefile.Case) casefile.Values {
	const name = "hydraulic: values as written"
	if v, ok := c.Kept(name).(casefile.Values); ok {
		return v
	}
	v, _ := c.Eval(nil) // what is wrong with it is said when the case is read
	c.Keep(name, v)
	return v
}

// count is the number of sections. Where it follows from an accuracy it is that of the
// values as the file states them.
func (p *pipe) count(e *casefile.Element, v casefile.Values, s *pipeState) int {
	switch {
	case p.rigid:
		return 1
	case e.Has("pipe.lumps"):
		return e.Count("pipe.lumps")
	}
	n := s.sections(v.Num[e.Num("pipe.accuracy")], v.Num[e.Num("pipe.up_to")])
	return int(min(max(n, 1), maxPipeLumps+1))
}

// add adds nodes, columns and stores. The first column bears the part's name, so that
// its flow is read at the first end; the others bear names that no part of a case can have.
func (l *pipeline) add(e *casefile.Element, c *casefile.Case, b *network.Builder, n int) []casefile.Diagnostic {
	for i := 1; i < n; i++ {
		name := fmt.Sprintf("%s.%d", e.FullName(), i)
		if _, taken := c.Node(name); taken {
			d := e.Fault("", fmt.Sprintf("its inner node %q bears the name of another node", name), "", "")
			d.Hint = "rename one of the two"
			return []casefile.Diagnostic{d}
		}
		id := b.Node(name, e.Ref)
		c.BindNode(name, id)
		l.inner = append(l.inner, id)
		l.watches = append(l.watches, b.Element(network.Shape{Name: "watch of " + name, Ports: []network.NodeID{id}, Passive: true}, e.Ref))
	}
	all := append(append([]network.NodeID{l.from.id}, l.inner...), l.to.id)
	for i := range n {
		name := e.FullName()
		if i > 0 {
			name = fmt.Sprintf("%s/%d", e.FullName(), i+1)
		}
		id := b.Inertance(name, all[i], all[i+1], e.Ref)
		b.Dropping(id)
		l.columns = append(l.columns, id)
	}
	if l.rigid {
		return nil
	}
	for i, node := range all {
		share := 1.0
		if i == 0 || i == n {
			share = 0.5
		}
		if i == 0 && l.from.isHeld || i == n && l.to.isHeld {
			continue
		}
		l.stores = append(l.stores, l.store(e, b, node, share, i))
	}
	return nil
}

func (l *pipeline) store(e *casefile.Element, b *network.Builder, node network.NodeID, share float64, i int) pipeStore {
	s := pipeStore{node: node, share: share, gas: l.bubbles()}
	if s.gas {
		s.element = b.Element(network.Shape{Name: fmt.Sprintf("%s/liquid %d", e.FullName(), i), Ports: []network.NodeID{node}, Stores: true}, e.Ref)
	} else {
		s.plain = b.Capacity(node, e.Ref)
	}
	return s
}

// set writes the numbers of the pipe.
func (l *pipeline) set(v casefile.Values, p *network.Params) error {
	s, err := l.at(l.e, v)
	if err != nil {
		return err
	}
	if err := l.reaches(&s, v); err != nil {
		return err
	}
	n := float64(len(l.columns))
	law, ok := p.Drop[l.columns[0]].(*pipeDrop)
	if !ok {
		law = new(pipeDrop)
		for _, id := range l.columns {
			p.Drop[id] = law
		}
	}
	*law = s.drop(n)
	for _, id := range l.columns {
		p.L[id] = s.inertance() / n
		if l.start.has {
			p.StartFlow[id], p.HasStartFlow[id] = l.start.of(v), true
		}
	}
	l.raise(&s, v, p)
	for i := range l.stores {
		l.stores[i].set(&s, s.area*s.length/n, p)
	}
	l.begin(&s, v, p)
	return nil
}

// ends are how high the ends lie.
func (l *pipeline) ends(v casefile.Values) (from, to float64) {
	if l.from.elevation.has {
		from = l.from.elevation.of(v)
	}
	if l.to.elevation.has {
		to = l.to.elevation.of(v)
	}
	return from, to
}

// reaches refuses a pipe that is shorter than what it climbs.
func (l *pipeline) reaches(s *pipeState, v casefile.Values) error {
	const rounding = 1 + 1e-9
	if from, to := l.ends(v); math.Abs(to-from) > s.length*rounding {
		return l.e.Fault("pipe.length", fmt.Sprintf("%s of pipe between nodes %s apart in height", inUnits(s.length, length), inUnits(math.Abs(to-from), length)),
			"a pipe at least as long as that", "")
	}
	for i := 1; i < len(l.profile); i++ {
		a, b := l.profile[i-1], l.profile[i]
		along, up := v.Num[b[0]]-v.Num[a[0]], math.Abs(v.Num[b[1]]-v.Num[a[1]])
		switch {
		case v.Num[b[0]] > s.length*rounding:
			return l.e.Fault("pipe.elevations", fmt.Sprintf("a point %s along a pipe of %s", inUnits(v.Num[b[0]], length), inUnits(s.length, length)), "distances along the pipe", "")
		case up > along*rounding:
			return l.e.Fault("pipe.elevations", fmt.Sprintf("it rises or falls %s within %s of pipe", inUnits(up, length), inUnits(along, length)), "no more than the pipe is long", "")
		}
	}
	return nil
}

// raise sets how high the inner nodes lie, and at which level vapour forms there.
func (l *pipeline) raise(s *pipeState, v casefile.Values, p *network.Params) {
	from, to := l.ends(v)
	for i, id := range l.inner {
		f := float64(i+1) / float64(len(l.columns))
		z := from + (to-from)*f
		if len(l.profile) > 0 {
			z = l.profileAt(f*s.length, v)
		}
		p.Datum[id] = s.weight() * z
		law, ok := p.Law[l.watches[i]].(*pipeWatch)
		if !ok {
			law = &pipeWatch{nodeWatch{vacuum: !l.liquid.states(ofVapour)}, fmt.Sprintf(" at %s.%d", l.e.FullName(), i+1)}
			law.has.vapour = true
			p.Law[l.watches[i]] = law
		}
		law.vapour = s.vapour - s.offset + p.Datum[id]
	}
}

// profileAt is the elevation at a distance from the first end, that of the nearest
// point beyond the first and the last.
func (l *pipeline) profileAt(x float64, v casefile.Values) float64 {
	last := len(l.profile) - 1
	if x <= v.Num[l.profile[0][0]] {
		return v.Num[l.profile[0][1]]
	}
	for i := range last {
		a, b := l.profile[i], l.profile[i+1]
		if x0, x1 := v.Num[a[0]], v.Num[b[0]]; x <= x1 {
			return v.Num[a[1]] + (v.Num[b[1]]-v.Num[a[1]])*(x-x0)/(x1-x0)
		}
	}
	return v.Num[l.profile[last][1]]
}

// set writes the compliance of a share of a section of some volume.
func (t *pipeStore) set(s *pipeState, volume float64, p *network.Params) {
	if !t.gas {
		p.C[t.plain] = t.share * volume * (s.compress + s.stretch)
		return
	}
	law, ok := p.Law[t.element].(*bubbly)
	if !ok {
		law = new(bubbly)
		p.Law[t.element] = law
	}
	*law = bubbly{volume: t.share * volume, stretch: s.stretch, mixture: s.mixture(), offset: s.offset - p.Datum[t.node]}
}

// begin starts the inner nodes on the line between the levels at the ends, where a
// start is stated for the flow and both of them are known at t = 0.
func (l *pipeline) begin(s *pipeState, v casefile.Values, p *network.Params) {
	if !l.start.has {
		return
	}
	a, okA := l.from.level(s, v, p)
	b, okB := l.to.level(s, v, p)
	for i, id := range l.inner {
		f := float64(i+1) / float64(len(l.columns))
		p.Start[id], p.HasStart[id] = a+(b-a)*f, okA && okB
	}
}

// level is that of the network at an end at t = 0, where it is stated.
func (n *pipeEnd) level(s *pipeState, v casefile.Values, p *network.Params) (float64, bool) {
	switch {
	case n.byWave:
		return v.Wave[n.held].Before + p.Datum[n.id], true
	case n.byLevel:
		return s.weight()*v.Wave[n.held].Before + s.air - s.offset + p.Datum[n.id], true
	}
	return p.Start[n.id], p.HasStart[n.id]
}
