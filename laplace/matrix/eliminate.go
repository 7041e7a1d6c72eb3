package matrix

import (
	"fmt"
	"math"
)

// Singular reports that the balance does not determine the level of some
// stores: nothing, or nothing on balance, ties them to the reference.
type Singular struct {
	Stores []int // ascending
}

func (s *Singular) Error() string {
	if len(s.Stores) == 1 {
		return fmt.Sprintf("matrix: the level of store %d is not determined", s.Stores[0])
	}
	return fmt.Sprintf("matrix: the levels of %d stores are not determined", len(s.Stores))
}

// Elimination is a factorisation of the static balance
//
//	0 = Σ_j F[i,j] (x[j] − x[i]) − Leak[i] x[i] + f[i].
type Elimination struct {
	n     int
	order []int     // place → store
	done  int       // the stores at the first so many places are eliminated one by one
	g     []float64 // n×n by place: right of the diagonal the exchange with later stores, left of it the shares passed on
	s     []float64 // all that leaves a store when its turn comes
	leak  []float64
	noise []float64 // sum of the sizes of what went into leak
	rest  *pivoted  // the stores at the other places
}

// Eliminate prepares the static balance for any number of flows f. F need not
// be symmetric.
//
// Stores in whose balance nothing is negative go first, without a subtraction:
// where there are no others, every level comes out with a relative error of a
// few N·ε, however stiff the balance. Of stores with a negative Leak or
// exchange the one goes next in whose sum least cancels, and where all sums
// cancel the rest is solved by complete pivoting: what is lost there is lost in
// the data. It returns ErrShape, ErrValue, ErrRange or a *Singular.
//
// Source: Grassmann, Taksar, Heyman, Oper. Res. 33 (1985) 1107-1116; with
// leaks: Alfa, Xue, Ye, Math. Comp. 71 (2002) 217-236. Cost: N³ operations at
// most, fewer where F is sparse.
func (b *Balance) Eliminate() (*Elimination, error) {
	if err := b.check(); err != nil {
		return nil, err
	}
	if lost := b.adrift(); lost != nil {
		return nil, &Singular{lost}
	}
	e, clean := newElimination(b)
	for ; e.done < e.n; e.done++ {
		k := e.done
		if k >= clean && !e.choose(k) {
			break
		}
		if !e.step(k) {
			return nil, ErrRange
		}
	}
	if e.done < e.n {
		e.finish()
		if e.rest.rank < e.n-e.done {
			return nil, &Singular{e.undetermined()}
		}
	}
	return e, nil
}

// newElimination orders the stores, the clean ones first, and counts those.
func newElimination(b *Balance) (e *Elimination, clean int) {
	n := b.N
	e = &Elimination{n: n, order: make([]int, 0, n), g: make([]float64, n*n),
		s: make([]float64, n), leak: make([]float64, n), noise: make([]float64, n)}
	var others []int
	for i := range n {
		if b.clean(i) {
			e.order = append(e.order, i)
		} else {
			others = append(others, i)
		}
	}
	clean = len(e.order)
	e.order = append(e.order, others...)
	for p, i := range e.order {
		e.leak[p], e.noise[p] = b.Leak[i], math.Abs(b.Leak[i])
		for q, j := range e.order {
			if q != p {
				e.g[p*n+q] = b.F[i*n+j]
			}
		}
	}
	return e, clean
}

// clean reports whether nothing in the balance of store i is negative.
func (b *Balance) clean(i int) bool {
	if b.Leak[i] < 0 {
		return false
	}
	for j, f := range b.F[i*b.N : (i+1)*b.N] {
		if f < 0 && j != i {
			return false
		}
	}
	return true
}

// sum returns what leaves the store at place i to those from k on and to the
// reference, and the sum of the sizes that went into it.
func (e *Elimination) sum(i, k int) (sum, size float64) {
	sum, size = e.leak[i], e.noise[i]
	for j := k; j < e.n; j++ {
		if j != i {
			g := e.g[i*e.n+j]
			sum += g
			size += math.Abs(g)
		}
	}
	return sum, size
}

// kept is the part of a sum that must be left after cancelling for its store
// to be eliminated next; the last store is taken with less (rankTolerance).
const kept = 0.01

// choose brings the store whose sum cancels least to place k; false where it
// cancels too much.
func (e *Elimination) choose(k int) bool {
	best, most := k, -1.0
	for i := k; i < e.n; i++ {
		if sum, size := e.sum(i, k); math.Abs(sum) > most*size {
			best, most = i, math.Abs(sum)/size
		}
	}
	if most < kept {
		return false
	}
	if best != k {
		e.swap(k, best)
	}
	return true
}

func (e *Elimination) swap(k, p int) {
	n := e.n
	for j := range n {
		e.g[k*n+j], e.g[p*n+j] = e.g[p*n+j], e.g[k*n+j]
	}
	for i := range n {
		e.g[i*n+k], e.g[i*n+p] = e.g[i*n+p], e.g[i*n+k]
	}
	e.order[k], e.order[p] = e.order[p], e.order[k]
	e.leak[k], e.leak[p] = e.leak[p], e.leak[k]
	e.noise[k], e.noise[p] = e.noise[p], e.noise[k]
}

// step eliminates the store at place k: whoever exchanged with it exchanges
// with its neighbours, and leaks, in proportion. False where numbers leave the
// range of doubles.
func (e *Elimination) step(k int) bool {
	n := e.n
	row := e.g[k*n : k*n+n]
	s, _ := e.sum(k, k)
	e.s[k] = s
	if s == 0 || s-s != 0 {
		return false
	}
	for i := k + 1; i < n; i++ {
		to := e.g[i*n : i*n+n]
		if to[k] == 0 {
			continue
		}
		share := to[k] / s
		if share-share != 0 {
			return false
		}
		for j := k + 1; j < n; j++ {
			to[j] += share * row[j]
		}
		to[i] = 0 // what returns to the store itself changes nothing
		passed := share * e.leak[k]
		e.leak[i] += passed
		e.noise[i] += math.Abs(share) * e.noise[k]
		to[k] = share
	}
	return true
}

// finish factorises the balance of the stores from place done on as a dense
// matrix, each row relative to the sizes that went into it.
func (e *Elimination) finish() {
	m := e.n - e.done
	a, scale := make([]float64, m*m), make([]float64, m)
	for i := range m {
		p := e.done + i
		sum, size := e.sum(p, e.done)
		if size == 0 { // all has cancelled: a row of zeros
			size = 1
		}
		scale[i] = 1 / size
		for j := range m {
			if a[i*m+j] = -e.g[p*e.n+e.done+j] / size; i == j {
				a[i*m+j] = sum / size
			}
		}
	}
	e.rest = factorPivoted(m, a, scale)
}

// Solve returns the levels x for the flows f into the stores. Where the
// balance has nothing negative and f has not, nothing is subtracted.
func (e *Elimination) Solve(f []float64) []float64 {
	y := e.permuted(f)
	for k := range e.done {
		if y[k] != 0 {
			for i := k + 1; i < e.n; i++ {
				y[i] += e.g[i*e.n+k] * y[k]
			}
		}
	}
	if e.rest != nil {
		e.rest.solve(y[e.done:])
	}
	e.back(y)
	return e.restored(y)
}

// back finds the levels of the eliminated stores from those of the others.
func (e *Elimination) back(y []float64) {
	for k := e.done - 1; k >= 0; k-- {
		sum := y[k]
		for j := k + 1; j < e.n; j++ {
			sum += e.g[k*e.n+j] * y[j]
		}
		y[k] = sum / e.s[k]
	}
}

// SolveTransposed solves with the transposed matrix: where f holds the weights
// of an output in the levels, it returns those in the flows.
func (e *Elimination) SolveTransposed(f []float64) []float64 {
	y := e.permuted(f)
	for k := range e.done {
		y[k] /= e.s[k]
		if y[k] != 0 {
			for j := k + 1; j < e.n; j++ {
				y[j] += e.g[k*e.n+j] * y[k]
			}
		}
	}
	if e.rest != nil {
		e.rest.solveTransposed(y[e.done:])
	}
	for k := e.done - 1; k >= 0; k-- {
		for i := k + 1; i < e.n; i++ {
			y[k] += e.g[i*e.n+k] * y[i]
		}
	}
	return e.restored(y)
}

func (e *Elimination) permuted(f []float64) []float64 {
	if len(f) != e.n {
		panic("matrix: the flows are not as many as the stores")
	}
	y := make([]float64, e.n)
	for p, i := range e.order {
		y[p] = f[i]
	}
	return y
}

func (e *Elimination) restored(y []float64) []float64 {
	x := make([]float64, e.n)
	for p, i := range e.order {
		x[i] = y[p]
	}
	return x
}
