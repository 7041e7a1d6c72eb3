package laplace

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

// A plant holds the equations of the stores in one of three forms: as the balance
// of a network, with couplings of its own where flows are stores too, or as a plain
// matrix a with x' = a x.
type plant struct {
	n       int
	balance *matrix.Balance
	stores  *matrix.Stores
	dense   []float64 // n×n row-major, where balance and stores are nil
}

func (p *plant) check() error {
	b, n := p.balance, p.n
	if n < 0 || len(b.C) != n || len(b.F) != n*n || len(b.Leak) != n {
		return errors.New("laplace: C, F and Leak do not have the shapes that N asks for")
	}
	for i, c := range b.C {
		if !(c > 0) || math.IsInf(c, 0) {
			return fmt.Errorf("laplace: the capacity of store %d is %g, must be positive", i, c)
		}
		for j := range n {
			if j != i && !isNumber(b.F[i*n+j]) {
				return fmt.Errorf("laplace: the exchange of store %d with store %d is %g", i, j, b.F[i*n+j])
			}
		}
		if !isNumber(b.Leak[i]) {
			return fmt.Errorf("laplace: the leak of store %d is %g", i, b.Leak[i])
		}
	}
	return nil
}

func (p *plant) isRC() bool { return p.balance != nil && p.balance.IsRC() }

func (p *plant) blockForm() (*matrix.BlockForm, error) {
	if p.balance != nil {
		return p.balance.BlockForm()
	}
	if p.stores != nil {
		return p.stores.BlockForm()
	}
	for _, v := range p.dense {
		if !isNumber(v) {
			return nil, errors.New("a number of the matrix is not finite")
		}
	}
	return matrix.DenseBlockForm(p.n, p.dense, nil)
}

// pattern returns a balance with the same graph, for questions of structure only.
func (p *plant) pattern() *matrix.Balance {
	if p.balance != nil {
		return p.balance
	}
	if p.stores != nil {
		return p.stores.Pattern()
	}
	b := &matrix.Balance{N: p.n, C: make([]float64, p.n), F: p.dense, Leak: make([]float64, p.n)}
	for i := range b.C {
		b.C[i] = 1
	}
	return b
}

// restrict returns the plant of the stores in keep with all others held at 0.
func (p *plant) restrict(keep []int) plant {
	if p.balance != nil {
		b := p.balance.Restrict(keep)
		return plant{n: len(keep), balance: &b}
	}
	if p.stores != nil {
		b := p.stores.Restrict(keep)
		return plant{n: len(keep), stores: &b}
	}
	r := plant{n: len(keep)}
	for _, i := range keep {
		for _, j := range keep {
			r.dense = append(r.dense, p.dense[i*p.n+j])
		}
	}
	return r
}

// solver returns what solves the balance at rest, 0 = a x + b, for x; nil where a
// is singular. A balance is eliminated without subtraction where it is a network,
// a plain matrix by LU with one step of refinement.
func (p *plant) solver() func(b []float64) []float64 {
	if p.stores != nil {
		if r := p.stores.AtRest(); r != nil {
			return r.Solve
		}
		return nil
	}
	if p.balance == nil {
		if solveDense(p.n, p.dense, make([]float64, p.n)) == nil {
			return nil
		}
		return func(b []float64) []float64 { return solveDense(p.n, p.dense, b) }
	}
	e, err := p.balance.Eliminate()
	if err != nil {
		return nil
	}
	return e.Solve
}

// solveDense returns x of 0 = a x + b, nil where a is singular to rounding.
func solveDense(n int, a, b []float64) []float64 {
	if n == 0 {
		return []float64{}
	}
	var lu mat.LU
	lu.Factorize(mat.NewDense(n, n, append([]float64(nil), a...)))
	if !(lu.Cond() < 1e16) {
		return nil
	}
	x, r := mat.NewVecDense(n, nil), mat.NewVecDense(n, nil)
	for i, v := range b {
		r.SetVec(i, -v)
	}
	for range 2 {
		step := mat.NewVecDense(n, nil)
		if err := lu.SolveVecTo(step, false, r); err != nil && !errors.As(err, new(mat.Condition)) {
			return nil
		}
		x.AddVec(x, step)
		for i := range n {
			r.SetVec(i, residual(a[i*n:(i+1)*n], x.RawVector().Data, b[i]))
		}
	}
	return x.RawVector().Data
}

// residual returns −b − a·x with products and sums in twice the precision.
func residual(a, x []float64, b float64) float64 {
	hi, lo := -b, 0.0
	for j, v := range a {
		p := -v * x[j]
		lo += math.FMA(-v, x[j], -p)
		s := hi + p
		t := s - hi
		lo += (hi - (s - t)) + (p - t)
		hi = s
	}
	return hi + lo
}
