package matrix

import (
	"math"
	"sort"
)

// bothEnds puts a form together from the fast poles of g and the slow ones of the
// inverse matrix, formed in doubled precision: where rates spread by more than
// 1e15 the slow end of a Schur form is lost, and that of the inverse is its fast
// end. nil where the matrix is singular or the two lists do not meet.
func bothEnds(a *scaledMatrix, g *eigenblocks, w *BlockWork) *eigenblocks {
	m := a.m
	inv := a.inverse()
	if inv == nil {
		return nil
	}
	_, e := math.Frexp(norm2(inv))
	for k := range inv {
		inv[k] = math.Ldexp(inv[k], -e)
	}
	if !allFinite(inv) {
		return nil
	}
	if w.schur.schur(m, inv) != nil {
		return nil
	}
	h := &w.inverse
	h.uncouple(w)
	h.invertBlocks(-e)
	fast, slow := g.bySize(), h.bySize()
	at, ok := meet(g, h, fast, slow)
	if !ok {
		return nil
	}
	out := &eigenblocks{m: m, x: make([]float64, m*m), wt: make([]float64, m*m), d: make([]float64, m*m), start: []int{0}}
	for k := len(fast) - 1; k >= 0 && out.start[len(out.start)-1] < at; k-- {
		out.take(g, fast[k])
	}
	for k := 0; k < len(slow) && out.start[len(out.start)-1] < m; k++ {
		out.take(h, slow[k])
	}
	out.radius = make([]float64, len(out.start)-1)
	for a := range out.radius {
		out.radius[a] = math.Inf(1) // not good as it is
	}
	return out
}

// meet finds how many of the fastest poles to take from g, near the middle of the
// scale of rates, so that the rest are whole atoms of h.
func meet(g, h *eigenblocks, fast, slow []int) (at int, ok bool) {
	middle := math.Sqrt(g.modulus(fast[len(fast)-1])) * math.Sqrt(h.modulus(slow[0]))
	whole := map[int]bool{}
	left := g.m
	for _, a := range slow {
		left -= h.start[a+1] - h.start[a]
		whole[left] = true
	}
	best := math.Inf(1)
	taken := 0
	for k := len(fast) - 1; k > 0; k-- {
		taken += g.start[fast[k]+1] - g.start[fast[k]]
		edge := math.Sqrt(g.modulus(fast[k])) * math.Sqrt(g.modulus(fast[k-1]))
		if d := math.Abs(math.Log(edge / middle)); whole[taken] && d < best {
			best, at, ok = d, taken, true
		}
	}
	return at, ok
}

// modulus is that of the first pole of atom a.
func (g *eigenblocks) modulus(a int) float64 {
	p, d := g.block(a)
	return cabs(eigenvalues(p, d)[0])
}

// bySize orders the atoms by modulus, slowest first.
func (g *eigenblocks) bySize() []int {
	order, size := make([]int, len(g.radius)), make([]float64, len(g.radius))
	for a := range order {
		order[a], size[a] = a, g.modulus(a)
	}
	sort.SliceStable(order, func(i, j int) bool { return size[order[i]] < size[order[j]] })
	return order
}

// take appends atom a of g.
func (o *eigenblocks) take(g *eigenblocks, a int) {
	m, at := o.m, o.start[len(o.start)-1]
	k0, p := g.start[a], g.start[a+1]-g.start[a]
	for i := 0; i < m; i++ {
		copy(o.x[i*m+at:i*m+at+p], g.x[i*m+k0:])
		copy(o.wt[i*m+at:i*m+at+p], g.wt[i*m+k0:])
	}
	for i := 0; i < p; i++ {
		copy(o.d[(at+i)*m+at:(at+i)*m+at+p], g.d[(k0+i)*m+k0:])
	}
	o.start = append(o.start, at+p)
}

// invertBlocks replaces every diagonal block by its inverse times 2^e.
func (g *eigenblocks) invertBlocks(e int) {
	for a := range g.radius {
		p, d := g.block(a)
		x := invertSmall(p, d)
		for i := 0; i < p; i++ {
			for j := 0; j < p; j++ {
				g.d[(g.start[a]+i)*g.m+g.start[a]+j] = math.Ldexp(x[i*p+j], e)
			}
		}
	}
}

// invertSmall inverts a block, quasi upper triangular: column by column from its
// 1×1 and 2×2 diagonal blocks.
func invertSmall(p int, d []float64) []float64 {
	if p == 2 {
		det := toDD(d[0]).mul(toDD(d[3])).sub(toDD(d[1]).mul(toDD(d[2]))).float()
		return []float64{d[3] / det, -d[1] / det, -d[2] / det, d[0] / det}
	}
	x := make([]float64, p*p) // D·X − X·0 = I
	for i := 0; i < p; i++ {
		x[i*p+i] = 1
	}
	sylvester(p, d, p, make([]float64, p*p), x)
	return x
}

// inverse of hi + lo by elimination with partial pivoting in doubled precision,
// rounded; nil where a pivot is 0.
func (a *scaledMatrix) inverse() []float64 {
	m := a.m
	w := 2 * m
	x := make([]dd, m*w)
	for i := 0; i < m; i++ {
		for j := 0; j < m; j++ {
			x[i*w+j] = dd{a.hi[i*m+j], a.lo[i*m+j]}
		}
		x[i*w+m+i] = toDD(1)
	}
	for k := 0; k < m; k++ {
		best := k
		for i := k + 1; i < m; i++ {
			if math.Abs(x[i*w+k].hi) > math.Abs(x[best*w+k].hi) {
				best = i
			}
		}
		if x[best*w+k].zero() {
			return nil
		}
		if best != k {
			for j := 0; j < w; j++ {
				x[k*w+j], x[best*w+j] = x[best*w+j], x[k*w+j]
			}
		}
		inv := toDD(1).div(x[k*w+k])
		for j := k; j < w; j++ {
			if !x[k*w+j].zero() {
				x[k*w+j] = x[k*w+j].mul(inv)
			}
		}
		for i := 0; i < m; i++ {
			f := x[i*w+k]
			if i == k || f.zero() {
				continue
			}
			for j := k; j < w; j++ {
				if !x[k*w+j].zero() {
					x[i*w+j] = x[i*w+j].sub(f.mul(x[k*w+j]))
				}
			}
		}
	}
	out := make([]float64, m*m)
	for i := range out {
		out[i] = x[i/m*w+m+i%m].float()
	}
	return out
}
