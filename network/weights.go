package network

import "math"

// Weights are a linear functional of the network: the sum of at[i]·x_i over
// stores and held nodes (by position) and of flow[m]·f_m over massless nodes,
// f_m being what sources bring into m.
type weights struct {
	at   []float64 // by position; zero for massless nodes
	flow []float64 // by position < massless
	sum  float64   // of the coefficients it was made of: the level it takes where all levels are equal

	size []float64 // by position, of what at was added up from; nil where nobody asks

	inert    []float64 // of the flow of each inertance; nil: none
	direct   []float64 // of each input, on top of what at and flow say; nil: none
	rounded  bool      // made of quotients or sums that may have to cancel exactly
	rate     []float64 // of the derivative of each input; nil: none
	constant float64
}

// weightsOf turns an output into weights on what is not eliminated.
func (e *exchange) weightsOf(pl *plan, g *graph, p *Params, o *Output) weights {
	w := weights{at: make([]float64, len(pl.order)), flow: make([]float64, pl.massless)}
	if o.Flow != nil {
		b, G := g.resistances[o.Flow.Resistance], p.G[o.Flow.Resistance]*o.Flow.Sign
		w.add(pl, b.from, G)
		w.add(pl, b.to, -G)
	} else {
		for _, t := range o.Terms {
			w.add(pl, t.Node, t.Coef)
		}
	}
	top := -1
	for i, c := range w.at {
		w.sum += c
		if c != 0 {
			top = i
		}
	}
	if w.sum == 0 && top >= 0 {
		e.expandDifference(pl, &w, top)
	} else {
		e.expand(pl, &w, 0)
	}
	e.gather(pl, w.flow)
	return w
}

func (w *weights) add(pl *plan, n NodeID, c float64) { w.at[pl.pos[n]] += c }

// expand replaces massless nodes from position first on by the means of their
// neighbours.
func (e *exchange) expand(pl *plan, w *weights, first int) {
	for m := first; m < pl.massless; m++ {
		if w.at[m] == 0 || pl.joint(m) {
			continue
		}
		t := w.at[m] / e.pivot[m]
		w.at[m] = 0
		w.flow[m] = t
		for s := pl.upper[m]; s < pl.start[m+1]; s++ {
			w.put(int(pl.col[s]), t*e.val[s])
		}
	}
}

// expandDifference expands a functional whose coefficients sum to zero as a sum
// of differences c_j·(x_j − x_b) to one of its nodes, b. Expanding a massless j
// gives positive multiples of differences again, and what falls on b itself drops
// out, so that the large and equal parts of x_j and x_b never enter.
func (e *exchange) expandDifference(pl *plan, w *weights, b int) {
	w.at[b] = 0
	own := 0.0 // coefficient of x_b itself, which only a feedback's leak brings in
	stays := b >= pl.massless || pl.joint(b)
	for m := 0; m < pl.massless && (m < b || stays); m++ {
		if w.at[m] == 0 || pl.joint(m) {
			continue
		}
		t := w.at[m] / e.pivot[m]
		w.at[m] = 0
		w.flow[m] = t
		own -= t * e.leak[m]
		for s := pl.upper[m]; s < pl.start[m+1]; s++ {
			if j := int(pl.col[s]); j != b {
				w.put(j, t*e.val[s])
			}
		}
	}
	if !stays {
		e.splitDifference(pl, w, b, own)
		e.expand(pl, w, b+1)
		return
	}
	total := 0.0
	for _, c := range w.at {
		total += c
	}
	w.at[b] = own - total
}

// splitDifference finishes Σ c_j (x_j − x_b) + own·x_b where b is massless itself.
// With x_b = Σ v_k x_k + f_b/pivot and 1 = Σ v_k + λ the coefficient of x_j is
// c_j·(Σ_{k≠j} v_k + λ) − v_j·(Σ_{k≠j} c_k) + own·v_j: the one subtraction left is
// that of a bridge, where the flow may truly have either sign.
func (e *exchange) splitDifference(pl *plan, w *weights, b int, own float64) {
	n := len(w.at)
	share := make([]float64, n)
	for s := pl.upper[b]; s < pl.start[b+1]; s++ {
		share[pl.col[s]] = e.val[s] / e.pivot[b]
	}
	lambda := e.leak[b] / e.pivot[b]
	shareAfter, coefAfter := make([]float64, n+1), make([]float64, n+1)
	for j := n - 1; j > b; j-- {
		shareAfter[j] = shareAfter[j+1] + share[j]
		coefAfter[j] = coefAfter[j+1] + w.at[j]
	}
	w.flow[b] = (own - coefAfter[b+1]) / e.pivot[b]
	shareBefore, coefBefore := lambda, 0.0
	for j := b + 1; j < n; j++ {
		c, v := w.at[j], share[j]
		plus, minus := c*(shareBefore+shareAfter[j+1]), v*(coefBefore+coefAfter[j+1])
		w.at[j] = plus - minus + own*v
		if w.size != nil {
			w.size[j] = math.Abs(plus) + math.Abs(minus) + math.Abs(own*v)
		}
		shareBefore += v
		coefBefore += c
	}
}

// gather turns weights on the flows that reach each massless node through the
// elimination into weights on the flows that sources bring there: the transpose
// of forward.
func (e *exchange) gather(pl *plan, flow []float64) {
	for m := pl.massless - 1; m >= 0; m-- {
		if flow[m] == 0 {
			continue
		}
		for s := pl.start[m]; s < pl.upper[m]; s++ {
			l := pl.col[s]
			flow[l] += e.val[s] * flow[m] / e.pivot[l]
		}
	}
}

// put adds x to the weight at position i.
func (w *weights) put(i int, x float64) {
	w.at[i] += x
	if w.size != nil {
		w.size[i] += math.Abs(x)
	}
}

// weightNoise is the part of what a weight was added up from below which it is rounding.
const weightNoise = 0x1p-49

// clean makes weights that are rounding of what cancels in them exactly 0.
func (w *weights) clean() {
	for i, c := range w.at {
		if math.Abs(c) <= weightNoise*w.size[i] {
			w.at[i] = 0
		}
	}
}
