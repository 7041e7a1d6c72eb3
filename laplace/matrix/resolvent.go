package matrix

import (
	"math"
	"math/cmplx"
)

// A Resolvent answers a system under flows that go as exp(st), Re s ≥ 0, for any
// number of s, by (sE − A)⁻¹ and not by poles and residues: far above the corners of a
// transfer function those cancel to nothing, and these equations do not,
//
//	s C_i x_i = Σ_j F_ij (x_j − x_i) − Leak_i x_i + f_i       of a Balance,
//	s x_i = Σ_j a_ij x_j + f_i                                of a plain matrix,
//
// and those of Stores. It is a workspace: two goroutines must not share one.
type Resolvent struct {
	n     int
	solve resolventSolver
	x, y  []complex128
}

// A resolventSolver is one of the two ways to solve: starResolvent, which never
// subtracts, and refinedResolvent for everything else.
type resolventSolver interface {
	// factor prepares for s; false where the equations have no solution.
	factor(s complex128) bool
	// levels and weights solve with the matrix and with its transpose.
	levels(f []float64, x []complex128)
	weights(c []float64, y []complex128)
	// noise returns the sizes that went into equation i, for levels x.
	noise(s complex128, i int, x []complex128) float64
}

// Resolvent prepares the stores, whose slices are kept. Where there are levels alone and
// no exchange and no leak is negative, as in every network of resistances, capacitances
// and streams, star after star is replaced by its mesh: products and sums, the diagonal
// never formed. Any other goes to elimination with row exchanges, refined with residuals
// in twice the precision. It returns ErrShape or ErrValue.
func (s *Stores) Resolvent() (*Resolvent, error) {
	if err := s.check(); err != nil {
		return nil, err
	}
	if s.uncoupled() && s.Balance.allClean() {
		return newResolvent(s.N, newStarResolvent(&s.Balance)), nil
	}
	return newResolvent(s.N, refineStores(s)), nil
}

// DenseResolvent prepares x' = a x + f, a n×n row-major. It returns ErrShape or ErrValue.
func DenseResolvent(n int, a []float64) (*Resolvent, error) {
	if n < 0 || len(a) != n*n {
		return nil, ErrShape
	}
	if !allFinite(a) {
		return nil, ErrValue
	}
	return newResolvent(n, refineDense(n, a)), nil
}

func newResolvent(n int, by resolventSolver) *Resolvent {
	return &Resolvent{n: n, solve: by, x: make([]complex128, n), y: make([]complex128, n)}
}

// allClean reports whether nothing in the balance is negative.
func (b *Balance) allClean() bool {
	for i := range b.N {
		if !b.clean(i) {
			return false
		}
	}
	return true
}

// Transfer returns out·x + direct for the flows in: the transfer function at s. slack
// says by how much it moves where every given number moves by a rounding,
// 2⁻⁵³: what is lost beyond that is lost in the numbers. At a pole the transfer is
// infinite, and slack too.
//
// Accuracy, measured over s = iω from 1e-12 to 1e12 of the corners: within 4 slack,
// which for networks of resistances and capacitances is some 1e-15 of the result
// however small that is. Cost: the fill of the network once for each s.
func (w *Resolvent) Transfer(s complex128, in, out []float64, direct float64) (h complex128, slack float64) {
	if len(in) != w.n || len(out) != w.n {
		panic("matrix: the weights are not as many as the stores")
	}
	if !w.solve.factor(s) {
		return cmplx.Inf(), math.Inf(1)
	}
	w.solve.levels(in, w.x)
	w.solve.weights(out, w.y)
	h, slack = complex(direct, 0), math.Abs(direct)
	for i, c := range out {
		if c != 0 {
			h += realTimes(c, w.x[i])
			slack += math.Abs(c) * cmplx.Abs(w.x[i])
		}
		if w.y[i] != 0 {
			slack += cmplx.Abs(w.y[i]) * (w.solve.noise(s, i, w.x) + math.Abs(in[i]))
		}
	}
	if slack-slack != 0 {
		return cmplx.Inf(), math.Inf(1)
	}
	return h, slack * 0x1p-53
}

// realTimes returns k·z for a real k, without the products by zero that turn an
// infinite part into NaN.
func realTimes(k float64, z complex128) complex128 { return complex(k*real(z), k*imag(z)) }
