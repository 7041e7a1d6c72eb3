package network

// A flowPlan is what depends on the graph alone where there are inertances. The
// flow i of each is a state, but where inertances meet at a joint, massless nodes
// that resistances join to one another and to nothing else, what flows in sums to
// zero at every instant:
//
//	Σ ±i_b + Σ q = 0.
//
// One inertance of each joint depends on the others then. The joints and, all in
// one, the rest of the network are the nodes of a graph whose branches are the
// inertances; those of a spanning tree depend, the others are free, and with them
//
//	i = N j + M q
//
// where j are the free flows, q the sources that lead into joints, and N and M hold
// 1, −1 and 0, found by walking the tree: nothing is judged by size (cut-sets: Bryant
// 1959; tree of what determines first). The flow of an inertance that is shut is 0:
// neither does it depend on others nor is it free.
type flowPlan struct {
	joint []bool  // by position < massless: the node that stands for its joint
	group []int   // joint of each node; −1
	rep   []int32 // position of the node that stands for each joint
	free  []InertanceID
	ends  [][2]int // joint at from and to of each inertance; −1

	n [][]float64 // by InertanceID, by place in free
	m [][]float64 // by InertanceID, by InputID
}

// joint tells whether the massless node at position m stands for a joint, whose
// level no resistance determines.
func (pl *plan) joint(m int) bool { return pl.flows != nil && pl.flows.joint[m] }

func newFlowPlan(g *graph, pl *plan, joints [][]NodeID) *flowPlan {
	if len(g.inertances) == 0 {
		return nil
	}
	f := &flowPlan{joint: make([]bool, pl.massless), group: make([]int, len(g.nodes))}
	for i := range f.group {
		f.group[i] = -1
	}
	for k, nodes := range joints {
		for _, n := range nodes {
			f.group[n] = k
		}
		m := pl.pos[nodes[0]]
		f.joint[m], f.rep = true, append(f.rep, m)
	}
	for _, b := range g.inertances {
		f.ends = append(f.ends, [2]int{f.group[b.from], f.group[b.to]})
	}
	order := make([]InertanceID, len(g.inertances))
	for i := range order {
		order[i] = InertanceID(i)
	}
	f.choose(g, order)
	return f
}

// choose fills free, n and m; the first inertances of order that make a tree depend.
func (f *flowPlan) choose(g *graph, order []InertanceID) {
	tree := f.tree(order)
	paths := f.paths(tree)
	place := make([]int, len(f.ends))
	f.free = nil
	for b := range f.ends {
		if !tree[b] && !g.inertances[b].shut() {
			place[b] = len(f.free)
			f.free = append(f.free, InertanceID(b))
		}
	}
	f.n, f.m = make([][]float64, len(f.ends)), make([][]float64, len(f.ends))
	for t := range f.ends {
		f.n[t], f.m[t] = make([]float64, len(f.free)), make([]float64, len(g.inputs))
		if g.inertances[t].shut() {
			continue
		}
		if !tree[t] {
			f.n[t][place[t]] = 1
			continue
		}
		for c, b := range f.free {
			f.n[t][c] = paths.at(f.ends[b][1], t) - paths.at(f.ends[b][0], t)
		}
		for k, in := range g.inputs {
			if !in.held {
				f.m[t][k] = in.sign * paths.at(f.group[in.node], t)
			}
		}
	}
}

// tree marks the inertances of a spanning tree, the first of order that join what
// is not yet joined (Kruskal 1956).
func (f *flowPlan) tree(order []InertanceID) []bool {
	parent := make([]int, len(f.rep)+1) // the last: all that is no joint
	for i := range parent {
		parent[i] = i
	}
	root := func(i int) int {
		if i < 0 {
			i = len(f.rep)
		}
		for parent[i] != i {
			i = parent[i]
		}
		return i
	}
	tree := make([]bool, len(f.ends))
	for _, b := range order {
		if p, q := root(f.ends[b][0]), root(f.ends[b][1]); p != q {
			parent[p] = q
			tree[b] = true
		}
	}
	return tree
}

// treePaths holds, for each joint and inertance, the flow that a unit brought into
// the joint makes on its way out through the tree.
type treePaths [][]float64

func (p treePaths) at(joint, b int) float64 {
	if joint < 0 {
		return 0
	}
	return p[joint][b]
}

func (f *flowPlan) paths(tree []bool) treePaths {
	p := make(treePaths, len(f.rep))
	for grown := true; grown; {
		grown = false
		for b, ends := range f.ends {
			if !tree[b] {
				continue
			}
			for side, sign := range [2]float64{1, -1} { // out of from is along the inertance
				near, far := ends[side], ends[1-side]
				if near < 0 || p[near] != nil || far >= 0 && p[far] == nil {
					continue
				}
				p[near] = make([]float64, len(f.ends))
				if far >= 0 {
					copy(p[near], p[far])
				}
				p[near][b] = sign
				grown = true
			}
		}
	}
	return p
}
