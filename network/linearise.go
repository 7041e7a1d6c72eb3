package network

import (
	"errors"
	"math"

	"lagbook/laplace"
)

// A Linear is a network linearised about a state. Levels, flows and waveforms of Net
// and Params are deviations from it, and so are the outputs; where the state is not
// steady, the rates it has enter as a step at t = 0.
//
// Nodes, inertances and inputs keep their identifiers; the unknowns of elements
// become nodes and their drives held nodes.
type Linear struct {
	Net    *Network
	Params *Params

	of         *Network
	p          *Params
	from       *Params // the numbers in force
	at         *State
	equations  *equations // of the network, with every wave at its value at the state
	x          []float64  // the state there
	stamps     []*Stamp   // by ElementID; nil where the element is passive
	gone       []bool     // by ElementID: shut by its mode
	resistance []ResistanceID
	solved     [][][]float64 // by ElementID, by unknown: see solve
	tally      [][]bool      // by ElementID, by unknown: left out, see findTallies
	unknown    [][]NodeID
	drive      [][]NodeID
	moves      bool      // the state is a beginning that is not steady
	inflow     []float64 // by NodeID
	rate       [][]float64
	lost       []float64 // by InertanceID: the flow that its rate at the state comes to
}

// Linearise returns the linear network about a state, of the numbers in force just
// after its time, or just before t = 0 where the state is a beginning. A resistance
// or an element that is shut is gone from it; a node that only such parts touch stays
// where it is. It returns *ParamFault where the numbers of the derivatives are beyond
// what a network admits.
//
// An element's derivatives become branches: what its flows have in common both ways is
// a resistance, so that a network of reciprocal parts keeps the accuracy of its poles;
// the rest are feedbacks.
func (n *Network) Linearise(p *Params, at *State) (*Linear, error) {
	l := &Linear{of: n, p: p, at: at, lost: make([]float64, len(n.g.inertances))}
	if err := l.freeze(p); err != nil {
		return nil, err
	}
	l.stamp(p)
	l.solve()
	l.findTallies()
	l.findRates()
	if err := l.build(); err != nil {
		return nil, err
	}
	return l, nil
}

// build makes Net and Params.
func (l *Linear) build() (err error) {
	d := l.draft(nil)
	l.Net, err = d.b.Build()
	var faults *Faults
	if errors.As(err, &faults) {
		d = l.draft(l.loose(faults))
		l.Net, err = d.b.Build()
	}
	if err != nil {
		return err
	}
	l.Params = l.Net.NewParams()
	for _, set := range d.set {
		set(l.Params)
	}
	l.waves()
	l.start()
	return nil
}

// freeze sets up the equations of the network at the state.
func (l *Linear) freeze(p *Params) (err error) {
	if l.equations, err = l.of.newEquations(p); err != nil {
		return err
	}
	l.from = p
	if !l.at.Beginning {
		if l.from, err = l.equations.numbers(l.at.T); err != nil {
			return err
		}
	}
	value := func(w *laplace.Waveform) float64 { return valueAt(*w, l.at) }
	if err = l.equations.freeze(l.at, l.from, value); err != nil {
		return err
	}
	l.x = l.equations.vector(l.at)
	return nil
}

// valueAt is the value of a wave at the state.
func valueAt(w laplace.Waveform, at *State) float64 {
	if at.Beginning {
		return w.Before
	}
	return w.At(at.T)
}

// stamp evaluates every law at the state.
func (l *Linear) stamp(p *Params) {
	g := &l.of.g
	l.stamps, l.gone = make([]*Stamp, len(g.elements)), make([]bool, len(g.elements))
	for i := range g.elements {
		e := &g.elements[i]
		s := newStamp(&e.Shape)
		s.T = l.at.T
		for k, node := range e.Ports {
			s.X[k] = l.at.Levels[node]
		}
		copy(s.X[len(e.Ports):], l.at.Unknowns[i])
		for k, w := range p.Drive[i] {
			s.X[len(e.Ports)+len(e.Unknowns)+k] = valueAt(w, l.at)
		}
		copy(s.Mem, l.at.Mem[i])
		s.Mode = l.at.Modes[i]
		l.stamps[i] = s
		m, ok := p.Law[i].(Switching)
		l.gone[i] = ok && m.Shut(s.Mode)
		switch {
		case l.gone[i]:
		case l.equations.law[i].shut:
			p.Law[i].Eval(s)
			s.keepDrives(&e.Shape)
		default:
			p.Law[i].Eval(s)
		}
	}
}

func newStamp(e *Shape) *Stamp {
	rows := len(e.Ports) + len(e.Unknowns)
	return &Stamp{X: make([]float64, rows+len(e.Drives)), Mem: make([]float64, e.Memory), F: make([]float64, rows),
		DF: make([]float64, rows*(rows+len(e.Drives))), DStoredBy: make([]float64, len(e.Unknowns))}
}

// keepDrives leaves of the derivatives what opens the element.
func (s *Stamp) keepDrives(e *Shape) {
	inner := len(e.Ports) + len(e.Unknowns)
	for r := range e.Ports {
		for c := range inner {
			s.DF[r*len(s.X)+c] = 0
		}
	}
}

// loose are the nodes among those of faults that shut parts alone touch: nothing
// determines them, and they stay where they are.
func (l *Linear) loose(f *Faults) map[NodeID]bool {
	g := &l.of.g
	all := map[NodeID]bool{}
	for _, fault := range f.List {
		for _, id := range fault.Nodes {
			if int(id) < len(g.nodes) && (fault.Code == Unconnected || fault.Code == Undetermined) {
				all[id] = true
			}
		}
	}
	for k, b := range g.resistances {
		if l.from.G[k] != 0 {
			delete(all, b.from)
			delete(all, b.to)
		}
	}
	for k, b := range g.inertances {
		if !l.from.Shut[k] {
			delete(all, b.from)
			delete(all, b.to)
		}
	}
	for i := range g.elements {
		for _, id := range g.elements[i].Ports {
			if !l.gone[i] && !l.equations.law[i].shut {
				delete(all, id)
			}
		}
	}
	return all
}

// A draft is the linear network while it is built, with what sets its numbers.
type draft struct {
	l   *Linear
	b   *Builder
	set []func(*Params)
}

// draft builds the graph; the nodes of hold are held where they are.
func (l *Linear) draft(hold map[NodeID]bool) *draft {
	g := &l.of.g
	d := &draft{l: l, b: NewBuilder()}
	for _, v := range g.nodes {
		d.b.Node(v.name, v.ref)
	}
	l.unknown, l.drive = d.inner(), make([][]NodeID, len(g.elements))
	for _, in := range g.inputs {
		if in.held {
			d.b.Hold(in.node, in.ref)
		} else {
			d.b.Source(in.name, in.node, in.sign, in.ref)
		}
	}
	for i := range g.elements {
		for _, name := range g.elements[i].Drives {
			node := d.b.Node(name, g.elements[i].ref)
			d.b.Hold(node, g.elements[i].ref)
			l.drive[i] = append(l.drive[i], node)
		}
	}
	for i := range g.nodes {
		if hold[NodeID(i)] {
			d.b.Hold(NodeID(i), g.nodes[i].ref)
		}
	}
	d.keep()
	d.stores()
	d.branches()
	for i := range g.elements {
		d.element(ElementID(i))
	}
	d.sources()
	return d
}

// keep ties held nodes and unknowns to themselves by a feedback of 0: they are part of the
// network whether anything acts on them at the state or not.
func (d *draft) keep() {
	for i, v := range d.b.g.nodes {
		if v.held != noInput {
			d.feedback(v.name, NodeID(i), NodeID(i), 0, v.ref)
		}
	}
	for _, unknowns := range d.l.unknown {
		for _, node := range unknowns {
			if node == absent {
				continue
			}
			d.feedback(d.b.g.nodes[node].name, node, node, 0, d.b.g.nodes[node].ref)
		}
	}
}

// inner adds a node for each unknown of an element; those that are states store 1.
func (d *draft) inner() [][]NodeID {
	l := d.l
	all := make([][]NodeID, len(l.of.g.elements))
	for i := range all {
		e := &l.of.g.elements[i]
		for k, u := range e.Unknowns {
			if l.tally[i][k] || l.solved[i][k] != nil {
				all[i] = append(all[i], absent)
				continue
			}
			node := d.b.Node(u.Name+" of "+e.Name, e.ref)
			all[i] = append(all[i], node)
			if !l.equations.algebraic(i, k) {
				d.capacity(node, 1, e.ref)
			}
		}
	}
	return all
}

func (d *draft) capacity(at NodeID, c float64, r Ref) {
	id := d.b.Capacity(at, r)
	d.set = append(d.set, func(p *Params) { p.C[id] = c })
}

// stores adds the capacities, those of elements by the slope of what they store.
func (d *draft) stores() {
	l := d.l
	for k, c := range l.of.g.capacities {
		d.capacity(c.at, l.from.C[k], c.ref)
	}
	for i, s := range l.stamps {
		if e := &l.of.g.elements[i]; e.Stores && s.DStored > 0 {
			d.capacity(e.Ports[0], s.DStored, e.ref)
		}
	}
}

// branches adds what is linear already.
func (d *draft) branches() {
	g, from := &d.l.of.g, d.l.from
	d.l.resistance = make([]ResistanceID, len(g.resistances))
	for k, b := range g.resistances {
		d.l.resistance[k] = -1
		if G := from.G[k]; G != 0 {
			d.l.resistance[k] = d.resistance(b.name, b.from, b.to, G, b.ref)
		}
	}
	for k, b := range g.oneWays {
		if W := from.W[k]; W != 0 {
			id := d.b.OneWay(b.name, b.from, b.to, b.ref)
			d.set = append(d.set, func(p *Params) { p.W[id] = W })
		}
	}
	for k, b := range g.feedbacks {
		if K := from.K[k]; K != 0 {
			d.feedback(b.name, b.to, b.from, K, b.ref)
		}
	}
	for k, b := range g.inertances {
		id, L, LR, shut := d.b.Inertance(b.name, b.from, b.to, b.ref), from.L[k], d.l.slope(k), from.Shut[k]
		d.set = append(d.set, func(p *Params) { p.L[id], p.LR[id], p.Shut[id] = L, LR, shut })
	}
}

// slope is the resistance of an inertance to a small change of its flow.
func (l *Linear) slope(k int) float64 {
	R := l.from.LR[k]
	if drop := l.from.Drop[k]; drop != nil {
		_, dh := drop.Drop(l.at.Flows[k])
		R += dh
	}
	return R
}

func (d *draft) resistance(name string, from, to NodeID, G float64, r Ref) ResistanceID {
	id := d.b.Resistance(name, from, to, r)
	d.set = append(d.set, func(p *Params) { p.G[id] = G })
	return id
}

func (d *draft) feedback(name string, into, on NodeID, K float64, r Ref) {
	id := d.b.Feedback(name, into, on, r)
	d.set = append(d.set, func(p *Params) { p.K[id] = K })
}

// locals are the nodes that stand for the local variables of an element.
func (l *Linear) locals(i int) []NodeID {
	e := &l.of.g.elements[i]
	all := append([]NodeID(nil), e.Ports...)
	all = append(all, l.unknown[i]...)
	return append(all, l.drive[i]...)
}

// element adds the derivatives of one law.
func (d *draft) element(id ElementID) {
	e, s := &d.l.of.g.elements[id], d.l.stamps[id]
	at := d.l.locals(int(id))
	J := s.slopes(e)
	rows, cols, ports := len(s.F), len(s.X), len(e.Ports)
	for i := range ports {
		for j := i + 1; j < ports; j++ {
			G := math.Min(J[i*cols+j], J[j*cols+i])
			if !(G > 0) || at[i] == at[j] {
				continue
			}
			d.resistance(e.Name, at[i], at[j], G, e.ref)
			J[i*cols+j] -= G
			J[i*cols+i] += G
			J[j*cols+i] -= G
			J[j*cols+j] += G
		}
	}
	for r := range rows {
		if d.l.of.isHeldLocal(e, r) || at[r] == absent {
			continue
		}
		for c := range cols {
			if at[c] == absent {
				continue
			}
			driven := c >= rows // a drive is there whether it acts or not
			if K := J[r*cols+c]; driven || math.Abs(K) > leftover*s.largest(r) {
				d.feedback(e.Name, at[r], at[c], K, e.ref)
			}
		}
	}
}

// leftover is the share of a row's derivatives below which what is left of them, after
// what is reciprocal was taken out, is rounding.
const leftover = 0x1p-49

// slopes returns the derivatives as they act on balances: storing elements whose
// content depends on an unknown z take ∂S/∂z·z' out of the balance of their port.
func (s *Stamp) slopes(e *element) []float64 {
	J := append([]float64(nil), s.DF...)
	cols := len(s.X)
	for k, by := range s.DStoredBy {
		row := (len(e.Ports) + k) * cols
		for c := range cols {
			J[c] -= by * s.DF[row+c]
		}
	}
	return J
}

func (s *Stamp) largest(row int) float64 {
	most := 0.0
	for _, v := range s.DF[row*len(s.X) : (row+1)*len(s.X)] {
		most = math.Max(most, math.Abs(v))
	}
	return most
}

// isHeldLocal tells whether a row of an element is the balance of a held node.
func (n *Network) isHeldLocal(e *element, row int) bool {
	return row < len(e.Ports) && n.g.isHeld(e.Ports[row])
}

// Input is the input of Net that stands for a drive. Inputs of the nonlinear network keep
// their identifiers.
func (l *Linear) Input(e ElementID, drive int) InputID {
	return l.Net.g.nodes[l.drive[e][drive]].held
}
