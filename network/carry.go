package network

import (
	"gonum.org/v1/gonum/mat"

	"lagbook/laplace"
)

// What goes over a switch are the levels of the stores, in the order of the whole
// network, and the flows of all inertances. A network in which some are shut takes of
// the flows i what is left when the shut ends have stopped them. The stop is an impulse
// of pressure at the shut end, of whatever strength it takes, and no other acts that
// fast, so that with the flows i = N j that remain possible
//
//	Nᵀ L (N j − i) = 0,   j = (Nᵀ L N)⁻¹ Nᵀ L i.
//
// The flow of a column of liquid that is shut, or that ends at what is shut, is lost;
// where several meet at a junction, those left keep their momentum together.

// carries tells whether flows go over a switch one by one. Where a source leads into a
// joint of the whole network the states do (findKick); nothing can be shut then.
func (n *Network) carries() bool {
	if n.plan.flows == nil {
		return false
	}
	for _, row := range n.plan.flows.m {
		for _, x := range row {
			if x != 0 {
				return false
			}
		}
	}
	return true
}

// kept returns (NᵀLN)⁻¹ NᵀL, the free flows that are left of the flow of each inertance.
func (f *flows) kept() (*mat.Dense, error) {
	M, all := len(f.plan.free), len(f.plan.n)
	if M == 0 {
		return nil, nil
	}
	part := mat.NewDense(M, all, nil)
	for b, row := range f.plan.n {
		for c, x := range row {
			part.Set(c, b, x*f.p.L[b])
		}
	}
	diagonal, whole := f.mass()
	if whole == nil {
		for c, m := range diagonal {
			for b := range all {
				part.Set(c, b, part.At(c, b)/m)
			}
		}
		return part, nil
	}
	var chol mat.Cholesky
	if !chol.Factorize(mat.NewSymDense(M, whole)) {
		return nil, outOfRange()
	}
	// The factorisation has judged the matrix; its condition is not an error.
	_ = chol.SolveTo(part, part)
	return part, nil
}

// stopped returns N (NᵀLN)⁻¹ NᵀL: what is left of the flow of each inertance, by row
// of what remains.
func (f *flows) stopped() (*mat.Dense, error) {
	all := len(f.plan.n)
	p := mat.NewDense(all, all, nil)
	part, err := f.kept()
	if part == nil {
		return p, err
	}
	n := mat.NewDense(all, len(f.plan.free), nil)
	for b, row := range f.plan.n {
		n.SetRow(b, row)
	}
	p.Mul(n, part)
	return p, nil
}

// left returns what is left of the flows i.
func (f *flows) left(i []float64) ([]float64, error) {
	p, err := f.stopped()
	if err != nil {
		return nil, err
	}
	var y mat.VecDense
	y.MulVec(p, mat.NewVecDense(len(i), i))
	return y.RawVector().Data, nil
}

// carry says what goes over a switch; ref are the flows that this reduction's
// deviations count from, less those of the start.
func (r *Reduction) carry(ref []float64) (laplace.Carry, error) {
	stores := r.whole.plan.order[r.whole.plan.massless:r.whole.plan.free]
	K, N, first := len(stores)+len(ref), r.Realisation.Balance.N, r.net.plan.stores
	over := laplace.Carry{In: grid(K, N), Out: grid(K, N), Ref: make([]float64, K)}
	copy(over.Ref[len(stores):], ref)
	for i, id := range stores {
		at := int(r.net.plan.pos[id]) - r.net.plan.massless
		over.In[i][at], over.Out[i][at] = r.Realisation.Balance.C[at], 1
	}
	f := r.flows
	for b, row := range f.plan.n {
		for c, x := range row {
			over.In[len(stores)+b][first+c] = x * f.p.L[b]
			over.Out[len(stores)+b][first+c] = x
		}
	}
	if len(f.plan.free) == len(ref) {
		return over, nil
	}
	p, err := f.stopped()
	if err != nil {
		return over, err
	}
	over.Onto = grid(K, K)
	for i := range stores {
		over.Onto[i][i] = 1
	}
	for b := range ref {
		copy(over.Onto[len(stores)+b][len(stores):], p.RawRowView(b))
	}
	return over, nil
}
