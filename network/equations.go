package network

import "lagbook/network/internal/sparse"

// Equations are a network with its numbers as M x' = F(t, x): levels of free nodes,
// flows of inertances, stored quantities of nodes with a storing element, unknowns of
// elements. The places of the unknowns never change; which rows are algebraic (mass 0),
// which parts are shut and which segments of the waves are in force is set by enter for
// a stretch of time in which no wave breaks and no mode changes.
//
//	free node        C x' = Σ inflow, or 0 = Σ inflow without a store
//	storing element  S' = Σ inflow,   0 = S − C x − Σ Stored
//	inertance        L q' = x_from − x_to − LR q − h(q)
//	joint            0 = d/dt Σ inflow, for one node of each group where inertances meet
//	cut off          x' = 0, for one node of each group that nothing determines
type equations struct {
	n   *Network
	g   *graph
	p   *Params // as given
	now *Params // in force
	l   *layout

	pat   *sparse.Matrix
	rowAt [][]int32 // slots of each row
	base  []float64 // what linear branches bring into the Jacobian
	wires []wireAt  // by ResistanceID
	m     []float64 // mass

	courses []course  // by place in z, less size
	moving  []int32   // places in z that change in the stretch
	floor   []float64 // by place in z, less size: below it the drive of a gate that opens or shuts is taken to stay
	z, acc  []float64 // what laws see, and the balances, by place in z
	dz, ddz []float64 // derivatives of z by time, 0 for unknowns
	told    bool      // z holds the waves at the instant at
	at      float64
	t0, t1  float64 // the stretch

	law     []stamped
	through []throughAt
	modes   []int
	mem     [][]float64
	top     topology
	tied    ties
	dropAt  []int32 // by InertanceID: slot of its own flow
	joint   []jointRow
	dead    []int32 // slots of the rows that are not balances now
	key     []bool  // what was shut or algebraic when all this was set
	rest    bool    // nothing moves: joints are balances, too
	refs    []guardRef
	group   []int32 // by NodeID: its island; −1 held
	islands int
	part    []int32 // by NodeID: what it hangs together with, held nodes included
	parts   int
	edge    edge
	newton  *newton
	entered bool
}

// A wireAt is a resistance with its places.
type wireAt struct {
	a, b, ra, rb int32    // in z, in acc
	slot         [4]int32 // row of a: columns a, b; row of b: columns a, b; −1: none
}

// A guardRef names a guard of an element in its present mode.
type guardRef struct {
	Element ElementID
	Index   int
}

// newEquations prepares the equations. The numbers are those of p; where switches turn,
// enter asks p.Turn for those in force. It returns *ParamFault as Check does.
func (n *Network) newEquations(p *Params) (*equations, error) {
	if err := n.Check(p); err != nil {
		return nil, err
	}
	if faults := n.checkWaves(p); len(faults) > 0 {
		return nil, &ParamFault{List: faults}
	}
	g, l := &n.g, newLayout(&n.g)
	e := &equations{n: n, g: g, p: p, now: p, l: l, m: make([]float64, l.size),
		courses: make([]course, l.width-l.size), floor: make([]float64, l.width-l.size),
		z: make([]float64, l.width), acc: make([]float64, l.width), dz: make([]float64, l.width), ddz: make([]float64, l.width),
		modes: make([]int, len(g.elements)), mem: make([][]float64, len(g.elements))}
	for k := range g.elements {
		e.mem[k] = make([]float64, g.elements[k].Memory)
	}
	e.tied = newTies(g)
	e.pat = l.pattern(g, e.tied.joining(g, p))
	e.rowAt = make([][]int32, l.size)
	for slot, row := range e.pat.Row {
		e.rowAt[row] = append(e.rowAt[row], int32(slot))
	}
	e.base = make([]float64, len(e.pat.Val))
	for _, b := range g.resistances {
		w := wireAt{a: l.level[b.from], b: l.level[b.to], ra: l.balance[b.from], rb: l.balance[b.to]}
		w.slot = [4]int32{e.slot(w.ra, w.a), e.slot(w.ra, w.b), e.slot(w.rb, w.a), e.slot(w.rb, w.b)}
		e.wires = append(e.wires, w)
	}
	for _, at := range l.flow {
		e.dropAt = append(e.dropAt, e.slot(at, at))
	}
	e.layLaws()
	e.findGroups()
	e.findEdge()
	return e, nil
}

// slot returns the place of an entry in the Jacobian's values, −1 where row or column is
// no unknown.
func (e *equations) slot(row, col int32) int32 {
	if int(row) >= e.l.size || int(col) >= e.l.size {
		return none
	}
	return int32(e.pat.Slot(int(row), int(col)))
}

// findGroups numbers the islands: free nodes that act on one another, directly or not.
// Parts are the same with held nodes taken along.
func (e *equations) findGroups() {
	e.group, e.islands = e.numbered(func(n NodeID) bool { return !e.g.isHeld(n) })
	e.part, e.parts = e.numbered(func(NodeID) bool { return true })
}

func (e *equations) numbered(belongs func(NodeID) bool) (of []int32, count int) {
	of = make([]int32, len(e.g.nodes))
	for i := range of {
		of[i] = none
	}
	groups := e.g.groups(belongs)
	for k, nodes := range groups {
		for _, n := range nodes {
			of[n] = int32(k)
		}
	}
	return of, len(groups)
}

// size is the number of unknowns.
func (e *equations) size() int { return e.l.size }

// mass is the diagonal of M in the present stretch; enter may change it. It is the slice
// itself: do not write.
func (e *equations) mass() []float64 { return e.m }

// pattern returns the pattern of the Jacobian, fixed for good. It holds the diagonal.
// Matrices for jacobian are made with pattern().Like().
func (e *equations) pattern() *sparse.Matrix { return e.pat }
