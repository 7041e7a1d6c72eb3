package network

import "math/bits"

// A plan is all that depends on the graph alone. Nodes get positions in the order
// of elimination: massless nodes first, then stores, then held nodes, which are
// never eliminated. A free node has a row of exchanges F_ij with the nodes j of
// other positions; rows are stored one after the other, columns ascending, with
// room for all that elimination will add.
type plan struct {
	massless, stores, free int      // free = massless + stores
	order                  []NodeID // node at each position
	pos                    []int32  // position of each node
	island                 []int    // of each node; −1 where held
	islands                int
	group                  []int // group of massless nodes joined to one another, of each position < massless

	flows *flowPlan // nil where there is no inertance

	start []int32 // of row i: slots start[i] … start[i+1]−1
	upper []int32 // first slot of row i whose column is above i
	col   []int32

	inStart []int32 // of column m: the rows below that have it, inStart[m] … inStart[m+1]−1
	inRow   []int32
	inSlot  []int32

	resistance [][2]int32 // slots in the rows of from and to; none where that end is held
	oneWay     []int32
	feedback   []int32
}

// none marks an exchange that has no slot because its row is that of a held node.
const none int32 = -1

func newPlan(g *graph) *plan {
	pl := &plan{pos: make([]int32, len(g.nodes)), island: make([]int, len(g.nodes))}
	if g.nonlinear() {
		pl.list(g)
		return pl
	}
	e := newOrdering(g)
	joints := g.joints()
	last := make(map[NodeID]bool, len(joints)) // those that stand for a joint
	for _, nodes := range joints {
		last[nodes[0]] = true
	}
	e.eliminate(func(n NodeID) bool { return g.isMassless(n) && !last[n] })
	e.eliminate(g.isMassless)
	pl.massless = len(e.order)
	e.eliminate(func(n NodeID) bool { return !g.isHeld(n) })
	pl.free = len(e.order)
	pl.stores = pl.free - pl.massless
	pl.order = e.order
	for i := range g.nodes {
		if g.isHeld(NodeID(i)) {
			pl.order = append(pl.order, NodeID(i))
		}
	}
	for i, n := range pl.order {
		pl.pos[n] = int32(i)
	}
	pl.layOut(e)
	pl.findSlots(g)
	pl.findIslands(g)
	pl.flows = newFlowPlan(g, pl, joints)
	return pl
}

// list gives positions without an elimination: a network with laws that are not linear
// has equations in its place.
func (pl *plan) list(g *graph) {
	take := func(class func(NodeID) bool) int {
		for i := range g.nodes {
			if class(NodeID(i)) {
				pl.pos[i] = int32(len(pl.order))
				pl.order = append(pl.order, NodeID(i))
			}
		}
		return len(pl.order)
	}
	pl.massless = take(g.isMassless)
	pl.free = take(func(n NodeID) bool { return !g.isHeld(n) && !g.isMassless(n) })
	pl.stores = pl.free - pl.massless
	take(g.isHeld)
	pl.findIslands(g)
}

// An ordering chooses the order of elimination on bit patterns: row[i] holds the
// nodes that influence i, in[j] the free nodes that j influences.
type ordering struct {
	words   int
	row, in [][]uint64
	order   []NodeID
	final   [][]uint64 // row of each node at its elimination
	done    []bool
}

func newOrdering(g *graph) *ordering {
	n := len(g.nodes)
	e := &ordering{words: (n + 63) / 64, done: make([]bool, n)}
	slab := make([]uint64, 2*n*e.words)
	table := func() [][]uint64 {
		sets := make([][]uint64, n)
		for i := range sets {
			sets[i], slab = slab[:e.words:e.words], slab[e.words:]
		}
		return sets
	}
	e.row, e.in = table(), table()
	e.final = make([][]uint64, n)
	link := func(of, by NodeID) {
		if of != by && !g.isHeld(of) {
			e.row[of][by/64] |= 1 << (by % 64)
			e.in[by][of/64] |= 1 << (of % 64)
		}
	}
	for kind, list := range g.branches() {
		if BranchKind(kind) == InertanceBranch {
			continue // its flow is a state: it acts on both ends, and neither end on the other at once
		}
		for _, b := range list {
			link(b.to, b.from)
			if BranchKind(kind) == ResistanceBranch {
				link(b.from, b.to)
			}
		}
	}
	return e
}

// eliminate takes out all nodes of a class, always the one whose mesh has the
// fewest branches (Markowitz 1957), the lowest-numbered of several.
func (e *ordering) eliminate(class func(NodeID) bool) {
	for {
		best, cost := -1, 0
		for i := range e.row {
			if e.done[i] || !class(NodeID(i)) {
				continue
			}
			c := count(e.row[i]) * count(e.in[i])
			if best < 0 || c < cost {
				best, cost = i, c
			}
		}
		if best < 0 {
			return
		}
		e.take(best)
	}
}

func (e *ordering) take(m int) {
	clearBit := func(set []uint64, i int) { set[i/64] &^= 1 << (i % 64) }
	each(e.in[m], func(i int) {
		merge(e.row[i], e.row[m])
		clearBit(e.row[i], i)
		clearBit(e.row[i], m)
	})
	each(e.row[m], func(j int) {
		merge(e.in[j], e.in[m])
		clearBit(e.in[j], j)
		clearBit(e.in[j], m)
	})
	e.final[m] = e.row[m]
	e.done[m] = true
	e.order = append(e.order, NodeID(m))
}

func merge(into, from []uint64) {
	for w := range into {
		into[w] |= from[w]
	}
}

func count(set []uint64) int {
	n := 0
	for _, w := range set {
		n += bits.OnesCount64(w)
	}
	return n
}

func each(set []uint64, visit func(int)) {
	for w, word := range set {
		for ; word != 0; word &= word - 1 {
			visit(64*w + bits.TrailingZeros64(word))
		}
	}
}

// layOut turns the bit patterns into rows by position. The row of m as it was at
// its elimination gives the columns above m; the rows that had m then get m as a
// column below themselves.
func (pl *plan) layOut(e *ordering) {
	n := len(pl.order)
	below := make([][]int32, pl.free) // columns of row i below i, ascending
	above := make([][]int32, pl.free)
	scratch := make([]bool, n)
	for m := range pl.free {
		each(e.final[pl.order[m]], func(j int) { scratch[pl.pos[j]] = true })
		for j := m + 1; j < n; j++ {
			if scratch[j] {
				above[m] = append(above[m], int32(j))
				scratch[j] = false
			}
		}
		each(e.in[pl.order[m]], func(i int) {
			below[pl.pos[i]] = append(below[pl.pos[i]], int32(m))
		})
	}
	pl.start = make([]int32, pl.free+1)
	pl.upper = make([]int32, pl.free)
	counts := make([]int32, pl.free+1)
	for i := range pl.free {
		pl.col = append(pl.col, below[i]...)
		pl.upper[i] = int32(len(pl.col))
		pl.col = append(pl.col, above[i]...)
		pl.start[i+1] = int32(len(pl.col))
		for _, m := range below[i] {
			counts[m+1]++
		}
	}
	for m := range pl.free {
		counts[m+1] += counts[m]
	}
	pl.inStart = append([]int32(nil), counts...)
	pl.inRow = make([]int32, counts[pl.free])
	pl.inSlot = make([]int32, counts[pl.free])
	for i := range pl.free {
		for s := pl.start[i]; s < pl.upper[i]; s++ {
			m := pl.col[s]
			pl.inRow[counts[m]], pl.inSlot[counts[m]] = int32(i), s
			counts[m]++
		}
	}
}

// slot finds where the exchange of row i with column j is kept.
func (pl *plan) slot(of, by NodeID) int32 {
	i, j := pl.pos[of], pl.pos[by]
	if int(i) >= pl.free || i == j {
		return none
	}
	lo, hi := pl.start[i], pl.start[i+1]
	for lo < hi {
		mid := (lo + hi) / 2
		if pl.col[mid] < j {
			lo = mid + 1
		} else {
			hi = mid
		}
	}
	return lo
}

func (pl *plan) findSlots(g *graph) {
	pl.resistance = make([][2]int32, len(g.resistances))
	for k, b := range g.resistances {
		pl.resistance[k] = [2]int32{pl.slot(b.from, b.to), pl.slot(b.to, b.from)}
	}
	pl.oneWay = make([]int32, len(g.oneWays))
	for k, b := range g.oneWays {
		pl.oneWay[k] = pl.slot(b.to, b.from)
	}
	pl.feedback = make([]int32, len(g.feedbacks))
	for k, b := range g.feedbacks {
		pl.feedback[k] = pl.slot(b.to, b.from)
	}
}

// findIslands numbers the groups of free nodes and of massless nodes.
func (pl *plan) findIslands(g *graph) {
	for i := range pl.island {
		pl.island[i] = -1
	}
	islands := g.groups(func(n NodeID) bool { return !g.isHeld(n) })
	pl.islands = len(islands)
	for k, nodes := range islands {
		for _, n := range nodes {
			pl.island[n] = k
		}
	}
	pl.group = make([]int, pl.massless)
	for k, nodes := range g.groups(g.isMassless) {
		for _, n := range nodes {
			pl.group[pl.pos[n]] = k
		}
	}
}
