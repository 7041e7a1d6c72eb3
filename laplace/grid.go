package laplace

import (
	"math"

	"gonum.org/v1/gonum/blas"
	"gonum.org/v1/gonum/blas/blas64"
)

// A grid of times τ = τ₀ + (q·J + j)·h, 0 ≤ j < J: the state at each giant step q
// is worked out once for all outputs, what an output sees j baby steps later is one
// column for each j, and the table is their product,
//
//	y(q,j) = out·e^{T·jh}·z(q) + (response over jh to the inputs from q on),
//
// the inputs at q being the powers of τ and the exponentials there. All
// entries come from the φ-functions: nothing cancels and nothing accumulates. Real
// modes stand last in a state; those that have died out are cut off.
type grid struct {
	p      *piece
	baby   int       // J
	giants []float64 // τ of each giant step
	inputs int       // coordinates of the powers of τ: 1, τ and, where inputs are bent, τ², …
	fixed  int       // coordinates before the real modes: powers, inputs, blocks, pairs
	width  int
}

// grid fills y[m][from:to] with the times t0 + i·h.
func (r *Response) grid(p *piece, t0, h float64, from, to int, y [][]float64) {
	n := to - from
	g := &grid{p: p, baby: columns(n)}
	for q := 0; q*g.baby < n; q++ {
		g.giants = append(g.giants, t0-p.t0+float64(q*g.baby)*h)
	}
	g.inputs = 2 + len(p.bent)
	g.fixed = g.inputs + 2*len(p.forced) + 2*len(p.m.pair)
	for i := range p.blocks {
		g.fixed += p.blocks[i].n + 2*len(p.blocks[i].far)
	}
	g.width = g.fixed + len(p.m.real)
	states := make([]float64, len(g.giants)*g.width)
	starts := g.runs()
	for i, q := range starts {
		end := len(g.giants)
		if i+1 < len(starts) {
			end = starts[i+1]
		}
		for alive := g.alive(g.giants[q]); q < end; q++ {
			g.giant(g.giants[q], alive, states[q*g.width:(q+1)*g.width])
		}
	}
	steps := g.steps(h)
	v := g.view()
	for m := range y {
		if y[m] != nil {
			v.see(steps, &p.of.System.modal.out[m], p.of.System.d[m], p.of.Base[m])
			v.multiply(starts, states, y[m][from:to])
		}
	}
}

// columns returns J near √n, of long tables a multiple of 64, the width of the
// panels in which a matrix product is formed.
func columns(n int) int {
	j := max(int(math.Sqrt(float64(n))), 1)
	if j > 48 {
		j = (j + 63) / 64 * 64
	}
	return j
}

// runs returns the first giant step of each run: over a run the time grows by a
// half, and the real modes alive at its start are carried.
func (g *grid) runs() []int {
	starts := []int{0}
	for q := 1; q < len(g.giants); q += (q + 1) / 2 {
		starts = append(starts, q)
	}
	return starts
}

// alive returns the number of real modes to carry from τ on: up to the last that
// has not died out. A mode that is driven by an exponential is always carried.
func (g *grid) alive(tau float64) int {
	k := len(g.p.m.real)
	for k > 0 && len(g.p.forced) == 0 && g.p.m.real[k-1]*tau < -dead {
		k--
	}
	return k
}

// giant writes the inputs and the state at τ, of the real modes those alive.
func (g *grid) giant(tau float64, alive int, row []float64) {
	p := g.p
	for k := range alive {
		row[g.fixed+k] = p.realAt(k, tau)
	}
	row[0], row[1] = 1, tau
	for k := 2; k < g.inputs; k++ {
		row[k] = row[k-1] * tau
	}
	row = row[g.inputs:]
	put := func(z complex128) {
		row[0], row[1] = real(z), imag(z)
		row = row[2:]
	}
	for _, f := range p.forced {
		put(f.amp * cexp(f.rate, tau))
	}
	for i := range p.blocks {
		b := &p.blocks[i]
		b.joint(newBlockWork(b.n), tau, row[:b.n])
		row = row[b.n:]
		for _, f := range b.far {
			put(cexp(f.rate, tau))
		}
	}
	for k := range p.m.pair {
		put(p.pairAt(k, tau))
	}
}

// A view is what one output sees of each coordinate of a state: one row for each
// coordinate, one column for each baby step.
type view struct {
	g              *grid
	steps          *babySteps
	out            *vector
	seen           []float64
	constant, ramp []float64   // rows 0 and 1 without the real modes
	gone, goneRamp []float64   // what the real modes from k on leave when they have died out
	bent, goneBent [][]float64 // the same of τ², τ³, …; nil where inputs run straight
}

func (g *grid) view() *view {
	k := len(g.p.m.real) + 1
	v := &view{g: g, seen: make([]float64, g.width*g.baby), constant: make([]float64, g.baby),
		ramp: make([]float64, g.baby), gone: make([]float64, k), goneRamp: make([]float64, k)}
	for range g.p.bent {
		v.bent, v.goneBent = append(v.bent, make([]float64, g.baby)), append(v.goneBent, make([]float64, k))
	}
	return v
}

// multiply fills y run by run, from the last to the first, so that modes only join.
func (v *view) multiply(starts []int, states, y []float64) {
	end, carried := len(v.g.giants), 0
	for i := len(starts) - 1; i >= 0; i-- {
		q := starts[i]
		carried = v.carry(carried, v.g.alive(v.g.giants[q]))
		from, to := q*v.g.baby, min(end*v.g.baby, len(y))
		v.run(states[q*v.g.width:], carried, y[from:to])
		end = q
	}
}

// carry lets the real modes from carried up to alive join, and writes the rows of
// the inputs 1 and τ for them.
func (v *view) carry(carried, alive int) int {
	n := v.g.baby
	for ; carried < alive; carried++ {
		v.steps.gather(carried, v.out.real[carried], v.constant, v.ramp)
		v.steps.gatherBent(carried, v.out.real[carried], v.bent)
	}
	if v.bent != nil {
		v.carryBent(alive)
		return alive
	}
	for j, delta := range v.steps.delta {
		v.seen[j] = v.constant[j] + (v.gone[alive] + v.goneRamp[alive]*delta)
		v.seen[n+j] = v.ramp[j] + v.goneRamp[alive]
	}
	return alive
}

// run multiplies consecutive giant steps with the rows of the modes carried; the
// last step may be cut short.
func (v *view) run(states []float64, carried int, y []float64) {
	n, w := v.g.baby, v.g.width
	k := v.g.fixed + carried
	whole := len(y) / n
	b := blas64.General{Rows: k, Cols: n, Stride: n, Data: v.seen}
	if whole > 0 {
		a := blas64.General{Rows: whole, Cols: k, Stride: w, Data: states}
		c := blas64.General{Rows: whole, Cols: n, Stride: n, Data: y}
		blas64.Gemm(blas.NoTrans, blas.NoTrans, 1, a, b, 0, c)
	}
	if rest := len(y) - whole*n; rest > 0 {
		b.Cols = rest
		x := blas64.Vector{N: k, Inc: 1, Data: states[whole*w:]}
		blas64.Gemv(blas.Trans, 1, b, x, 0, blas64.Vector{N: rest, Inc: 1, Data: y[whole*n:]})
	}
}
