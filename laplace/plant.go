package laplace

import (
	"errors"
	"fmt"
	"math"

	"lagbook/laplace/matrix"
)

// A plant holds the equations of the stores, as they were stated or as a plain matrix a
// with x' = a x.
type plant struct {
	n      int
	stores *matrix.Stores // nil: a plain matrix
	dense  []float64      // n×n row-major
}

// balance returns the stores where they are levels alone, without couplings of their
// own; nil otherwise.
func (p *plant) balance() *matrix.Balance {
	if p.stores == nil || p.coupled() {
		return nil
	}
	return &p.stores.Balance
}

// coupled reports that flows are stores too.
func (p *plant) coupled() bool {
	return p.stores != nil && (p.stores.K != nil || p.stores.Mass != nil)
}

// asStores returns the plant as stores, a plain matrix as couplings of capacities 1.
func (p *plant) asStores() *matrix.Stores {
	if p.stores != nil {
		return p.stores
	}
	b := matrix.Balance{N: p.n, C: make([]float64, p.n), F: make([]float64, p.n*p.n), Leak: make([]float64, p.n)}
	for i := range b.C {
		b.C[i] = 1
	}
	return &matrix.Stores{Balance: b, K: p.dense}
}

func (p *plant) check() error {
	b, n := &p.stores.Balance, p.n
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

func (p *plant) isRC() bool {
	b := p.balance()
	return b != nil && b.IsRC()
}

func (p *plant) blockForm(w *matrix.BlockWork) (*matrix.BlockForm, error) {
	if p.stores != nil {
		return w.Stores(p.stores)
	}
	for _, v := range p.dense {
		if !isNumber(v) {
			return nil, errors.New("a number of the matrix is not finite")
		}
	}
	return w.Dense(p.n, p.dense, nil)
}

func (p *plant) resolvent() (*matrix.Resolvent, error) {
	if p.stores != nil {
		return p.stores.Resolvent()
	}
	return matrix.DenseResolvent(p.n, p.dense)
}

// matrix returns the plant and the flows b as a plain matrix and rates.
func (p *plant) matrix(b []float64) (a, rates []float64, err error) {
	if p.stores != nil {
		return p.stores.Dense(b)
	}
	return p.dense, b, nil
}

// pattern returns a balance with the same graph, for questions of structure only.
func (p *plant) pattern() *matrix.Balance {
	if b := p.balance(); b != nil {
		return b
	}
	return p.asStores().Pattern()
}

// restrict returns the plant of the stores in keep with all others held at 0.
func (p *plant) restrict(keep []int) plant {
	r := plant{n: len(keep)}
	if p.stores != nil {
		b := p.stores.Restrict(keep)
		r.stores = &b
		return r
	}
	for _, i := range keep {
		for _, j := range keep {
			r.dense = append(r.dense, p.dense[i*p.n+j])
		}
	}
	return r
}

// maxCondition is the condition from which a plain matrix counts as singular.
const maxCondition = 1e16

// solver returns what solves the balance at rest, 0 = a x + b, for x; nil where a is
// singular. A network is eliminated without subtraction, stores that are flows in
// doubled precision, a plain matrix by LU with one step of refinement.
func (p *plant) solver() func(b []float64) []float64 {
	if b := p.balance(); b != nil {
		if e, err := b.Eliminate(); err == nil {
			return e.Solve
		}
		return nil
	}
	if p.stores != nil {
		if r := p.stores.AtRest(); r != nil {
			return r.Solve
		}
		return nil
	}
	f := newRefinedLU(p.n, p.dense)
	if f == nil || !(f.condition() < maxCondition) {
		return nil
	}
	return f.solveNegative
}
