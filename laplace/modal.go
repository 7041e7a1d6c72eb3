package laplace

import (
	"math"
	"math/cmplx"

	"lagbook/laplace/matrix"
)

// A vector holds one number for each coordinate of a modal form: of every single
// real mode, of the upper member of every single conjugate pair (the other is its
// conjugate), and of the blocks, one after another.
type vector struct {
	real  []float64
	pair  []complex128
	block []float64
}

// A block is a set of modes too close to be told apart by their vectors.
type block struct {
	first, n int       // its coordinates in vector.block
	t        []float64 // n×n row-major
}

// A modal form is a system in coordinates that do not act on each other:
//
//	ζ' = p ζ + in u for each mode, z' = T z + in u for each block,
//	y = Σ out ζ over real modes + Σ Re(out ζ) over pairs + Σ out z over blocks.
type modal struct {
	real  []float64
	pair  []complex128 // Im > 0
	block []block
	width int // of vector.block
	in    []vector
	out   []vector
}

func (m *modal) vector() vector {
	return vector{make([]float64, len(m.real)), make([]complex128, len(m.pair)), make([]float64, m.width)}
}

// add adds k·v to z.
func (z *vector) add(k float64, v *vector) {
	for i, x := range v.real {
		z.real[i] += k * x
	}
	for i, x := range v.pair {
		z.pair[i] += complex(k*real(x), k*imag(x))
	}
	for i, x := range v.block {
		z.block[i] += k * x
	}
}

// rcModal builds the modal form from the modes of a network of resistances and
// capacitances whose ports were the inputs followed by the outputs.
func rcModal(r *matrix.RCModes, inputs int) *modal {
	m := &modal{real: make([]float64, len(r.Lambda))}
	for k, l := range r.Lambda {
		m.real[k] = -l
	}
	for j, p := range r.Port {
		if v := (vector{real: p}); j < inputs {
			m.in = append(m.in, v)
		} else {
			m.out = append(m.out, v)
		}
	}
	return m
}

// A seat says where in a modal form a block of a BlockForm went.
type seat struct {
	kind  seatKind
	index int
}

type seatKind uint8

const (
	realSeat seatKind = iota
	pairSeat
	blockSeat
)

// blockModal builds the modal form from a BlockForm; seats follow its Blocks.
func blockModal(f *matrix.BlockForm, in, out [][]float64) (m *modal, seats []seat) {
	m = &modal{}
	for i := range f.Blocks {
		b := &f.Blocks[i]
		switch p, isPair := pairPole(b); {
		case b.N == 1:
			seats = append(seats, seat{realSeat, len(m.real)})
			m.real = append(m.real, b.T[0])
		case isPair:
			seats = append(seats, seat{pairSeat, len(m.pair)})
			m.pair = append(m.pair, p)
		default:
			seats = append(seats, seat{blockSeat, len(m.block)})
			m.block = append(m.block, block{m.width, b.N, b.T})
			m.width += b.N
		}
	}
	for _, b := range in {
		m.in = append(m.in, m.seated(f, seats, f.In(b), false))
	}
	for _, c := range out {
		m.out = append(m.out, m.seated(f, seats, f.Out(c), true))
	}
	return m, seats
}

// pairPole returns the upper pole of a 2×2 block with a conjugate pair. A pair that
// is nearly critically damped stays a block: the weights of its members grow as
// their distance shrinks, and with them every bound made of weights.
func pairPole(b *matrix.Block) (complex128, bool) {
	if b.N != 2 {
		return 0, false
	}
	half := (b.T[0] - b.T[3]) / 2
	disc := -b.T[1]*b.T[2] - half*half
	mean := b.T[0] - half
	if !(disc > mean*mean/256) {
		return 0, false
	}
	return complex(mean, math.Sqrt(disc)), true
}

// seated puts x, given in the coordinates of the BlockForm, in its seats. With
// T v = p v, v = (1, (p−T₀₀)/T₀₁), a pair is z = Re(v ζ).
func (m *modal) seated(f *matrix.BlockForm, seats []seat, x []float64, output bool) vector {
	v := m.vector()
	for i := range f.Blocks {
		b, s := &f.Blocks[i], seats[i]
		x := x[b.First : b.First+b.N]
		switch s.kind {
		case realSeat:
			v.real[s.index] = x[0]
		case blockSeat:
			copy(v.block[m.block[s.index].first:], x)
		case pairSeat:
			im, half := imag(m.pair[s.index]), (b.T[0]-b.T[3])/2
			if output {
				v.pair[s.index] = complex(x[0]-half/b.T[1]*x[1], im/b.T[1]*x[1])
			} else {
				v.pair[s.index] = complex(x[0], -(b.T[1]*x[1]+half*x[0])/im)
			}
		}
	}
	return v
}

// transfer returns out(sI−T)⁻¹in at s.
func (m *modal) transfer(in, out int, s complex128) complex128 {
	b, c := &m.in[in], &m.out[out]
	var h complex128
	for k, p := range m.real {
		if w := c.real[k] * b.real[k]; w != 0 {
			h += complex(w, 0) / (s - complex(p, 0))
		}
	}
	for k, p := range m.pair {
		h += (c.pair[k]*b.pair[k]/(s-p) + cmplx.Conj(c.pair[k]*b.pair[k])/(s-cmplx.Conj(p))) / 2
	}
	for i := range m.block {
		q := &m.block[i]
		x := make([]complex128, q.n)
		for j := range x {
			x[j] = complex(b.block[q.first+j], 0)
		}
		q.resolve(s, x)
		for j := range x {
			h += complex(c.block[q.first+j], 0) * x[j]
		}
	}
	return h
}

// resolve replaces x by (sI − T)⁻¹ x.
func (q *block) resolve(s complex128, x []complex128) { q.resolveNear(s, 0, x) }

// resolveNear replaces x by ((p+δ)I − T)⁻¹ x: elimination with row exchanges. A δ
// far smaller than p keeps its digits.
func (q *block) resolveNear(p, delta complex128, x []complex128) {
	n := q.n
	a := make([]complex128, n*n)
	for i, v := range q.t {
		a[i] = complex(-v, 0)
	}
	for i := range n {
		a[i*n+i] = delta + (p + a[i*n+i])
	}
	for k := range n {
		r := k
		for i := k + 1; i < n; i++ {
			if abs1(a[i*n+k]) > abs1(a[r*n+k]) {
				r = i
			}
		}
		for j := range n {
			a[k*n+j], a[r*n+j] = a[r*n+j], a[k*n+j]
		}
		x[k], x[r] = x[r], x[k]
		for i := k + 1; i < n; i++ {
			if a[i*n+k] == 0 {
				continue
			}
			f := a[i*n+k] / a[k*n+k]
			for j := k; j < n; j++ {
				a[i*n+j] -= f * a[k*n+j]
			}
			x[i] -= f * x[k]
		}
	}
	for k := n - 1; k >= 0; k-- {
		for j := k + 1; j < n; j++ {
			x[k] -= a[k*n+j] * x[j]
		}
		x[k] /= a[k*n+k]
	}
}
