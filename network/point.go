package network

// A point is the state of every node at one instant, as differences from a
// reference level of its island. Levels of some hundred kelvin that differ by
// millikelvin then keep their digits, and a network at rest stays at zero.
type point struct {
	pl   *plan
	held []float64 // level of each held node, by position − free
	ref  []float64 // reference level of each island
	dev  []float64 // level − ref of each free node, by position
	flow []float64 // what sources and the constants of feedbacks at ref bring into each free node
}

// newPoint takes the inputs as u. The reference of an island is the level of its
// first held node in the order of the rows; without one it is a start level, or 0.
func (n *Network) newPoint(p *Params, e *exchange, u []float64) *point {
	return n.newPointAt(p, e, u, nil)
}

// newPointAt takes ref as the references where it is not nil.
func (n *Network) newPointAt(p *Params, e *exchange, u, ref []float64) *point {
	g, pl := &n.g, n.plan
	pt := &point{pl: pl,
		held: make([]float64, len(pl.order)-pl.free),
		ref:  make([]float64, pl.islands),
		dev:  make([]float64, pl.free),
		flow: make([]float64, pl.free),
	}
	for i := range pt.held {
		pt.held[i] = u[g.nodes[pl.order[pl.free+i]].held]
	}
	found := make([]bool, pl.islands)
	for i := range pl.free {
		k := pl.island[pl.order[i]]
		for s := pl.start[i+1] - 1; s >= pl.upper[i] && int(pl.col[s]) >= pl.free && !found[k]; s-- {
			pt.ref[k], found[k] = pt.held[int(pl.col[s])-pl.free], true
		}
	}
	for i := pl.massless; i < pl.free; i++ {
		if k := pl.island[pl.order[i]]; !found[k] {
			if level, given := p.startOf(pl.order[i]); given {
				pt.ref[k], found[k] = level, true
			}
		}
	}
	if ref != nil {
		copy(pt.ref, ref)
	}
	for k, in := range g.inputs {
		if at := int(pl.pos[in.node]); !in.held && at < pl.free {
			pt.flow[at] += in.sign * u[k]
		}
	}
	for k, fb := range g.feedbacks {
		if at := int(pl.pos[fb.to]); at < pl.free {
			pt.flow[at] += p.K[k] * (pt.ref[pl.island[fb.to]] - p.About[k])
		}
	}
	return pt
}

// startOf returns the level at t = 0 that is stated for a store.
func (p *Params) startOf(n NodeID) (float64, bool) {
	if p.HasStart[n] {
		return p.Start[n], true
	}
	return p.AllStart + p.Datum[n], p.HasAllStart
}

// deviation returns the level of position j relative to the reference of island k,
// to which it belongs or which it holds.
func (pt *point) deviation(j, k int) float64 {
	if j >= pt.pl.free {
		return pt.held[j-pt.pl.free] - pt.ref[k]
	}
	return pt.dev[j]
}

// level returns the level of a position.
func (pt *point) level(j int) float64 {
	if j >= pt.pl.free {
		return pt.held[j-pt.pl.free]
	}
	return pt.ref[pt.pl.island[pt.pl.order[j]]] + pt.dev[j]
}

// difference returns the level of position i less that of j, from deviations where
// they share a reference.
func (pt *point) difference(i, j int) float64 {
	a, b := pt.pl.island[pt.pl.order[i]], pt.pl.island[pt.pl.order[j]]
	if k := max(a, b); k >= 0 && (a == b || a < 0 || b < 0) {
		return pt.deviation(i, k) - pt.deviation(j, k)
	}
	return pt.level(i) - pt.level(j)
}

// levels returns the level of every node.
func (pt *point) levels() []float64 {
	x := make([]float64, len(pt.pl.order))
	for j, n := range pt.pl.order {
		x[n] = pt.level(j)
	}
	return x
}

// back finds the deviations of the first count positions from those above, with
// the flows f as forward left them.
func (e *exchange) back(pl *plan, pt *point, f []float64, count int) {
	for m := count - 1; m >= 0; m-- {
		if e.pivot[m] == 0 {
			continue // open: the island is reported, not used
		}
		k := pl.island[pl.order[m]]
		sum := f[m]
		for s := pl.upper[m]; s < pl.start[m+1]; s++ {
			sum += e.val[s] * pt.deviation(int(pl.col[s]), k)
		}
		pt.dev[m] = sum / e.pivot[m]
	}
}

// follow sets the massless nodes to what the stores and held nodes make of them.
func (e *exchange) follow(pl *plan, pt *point) {
	f := append([]float64(nil), pt.flow...)
	e.forward(pl, f, pl.massless)
	e.back(pl, pt, f, pl.massless)
}

// inflow returns what flows into the store at position m, branch by branch from
// differences; f are the flows as forward through the massless nodes left them.
func (e *exchange) inflow(pl *plan, pt *point, f []float64, m int) float64 {
	k, own := pl.island[pl.order[m]], pt.dev[m]
	sum := 0.0
	for s := pl.start[m]; s < pl.start[m+1]; s++ {
		if j := int(pl.col[s]); j >= pl.massless {
			sum += e.val[s] * (pt.deviation(j, k) - own)
		}
	}
	return sum - e.leak[m]*own + f[m]
}
