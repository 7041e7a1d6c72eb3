package laplace

import (
	"errors"
	"math"
)

// Transfer functions are connected as systems of equations, one block after another
// in one matrix, and what results is taken apart anew. No polynomial is multiplied
// out and no root expanded: products of coefficients lose the slow poles of a stiff
// system, these do not.
//
// A connection is a plain matrix, as FromMatrices has it: where a network is at hand,
// connect it there, and each pole keeps its own relative accuracy however stiff it is.

// errImproper refuses what a connection cannot hold.
var errImproper = errors.New("laplace: an improper transfer cannot be connected: it has no equations of first order of its own")

// errLoop refuses a loop without delay.
var errLoop = errors.New("laplace: the loop passes at once what comes back to it: 1 + G(∞)K(∞) is 0")

// A stateSpace is x' = a x + b u, y = c x + d u with one input and one output.
type stateSpace struct {
	n    int
	a    []float64
	b, c []float64
	d    float64
}

// equations returns the transfer as such.
func (h *Transfer) equations() (stateSpace, error) {
	if h.rate != 0 {
		return stateSpace{}, errImproper
	}
	e := stateSpace{d: h.direct}
	if h.system == nil {
		return e, nil
	}
	s := h.system
	e.n, e.c = s.plant.n, s.c[0]
	var err error
	e.a, e.b, err = s.plant.matrix(s.b[0])
	return e, err
}

// transfer takes the equations apart.
func (e *stateSpace) transfer() (*Transfer, error) {
	if !isNumber(e.d) {
		return nil, errors.New("laplace: a connection leaves the range of numbers")
	}
	if e.n == 0 {
		return (&System{}).static(&Transfer{direct: e.d, Form: "strictly proper"}), nil
	}
	s, err := newSystem(plant{n: e.n, dense: e.a}, [][]float64{e.b}, [][]float64{e.c}, [][]float64{{e.d}})
	if err != nil {
		return nil, err
	}
	return s.Transfer(0, 0)
}

// beside returns a matrix with the states of e followed by those of f, not yet
// coupled.
func (e *stateSpace) beside(f *stateSpace) stateSpace {
	n := e.n + f.n
	g := stateSpace{n: n, a: make([]float64, n*n), b: make([]float64, n), c: make([]float64, n)}
	for i := range e.n {
		copy(g.a[i*n:], e.a[i*e.n:(i+1)*e.n])
	}
	for i := range f.n {
		copy(g.a[(e.n+i)*n+e.n:], f.a[i*f.n:(i+1)*f.n])
	}
	return g
}

// series feeds e into f.
func (e *stateSpace) series(f *stateSpace) stateSpace {
	g := e.beside(f)
	for i, b := range f.b {
		for j, c := range e.c {
			g.a[(e.n+i)*g.n+j] = b * c
		}
		g.b[e.n+i] = b * e.d
	}
	copy(g.b, e.b)
	for j, c := range e.c {
		g.c[j] = f.d * c
	}
	copy(g.c[e.n:], f.c)
	g.d = e.d * f.d
	return g
}

// parallel adds the outputs of e and f to one input.
func (e *stateSpace) parallel(f *stateSpace) stateSpace {
	g := e.beside(f)
	copy(g.b, e.b)
	copy(g.b[e.n:], f.b)
	copy(g.c, e.c)
	copy(g.c[e.n:], f.c)
	g.d = e.d + f.d
	return g
}

// feedback returns e to itself, through f and subtracted: with k = 1/(1 + d_e d_f),
//
//	u_e = k (u − c_f x_f − d_f c_e x_e),   y = c_e x_e + d_e u_e,   u_f = y.
func (e *stateSpace) feedback(f *stateSpace) (stateSpace, error) {
	loop := 1 + e.d*f.d
	if math.Abs(loop) <= 4*epsilon*(1+math.Abs(e.d*f.d)) {
		return stateSpace{}, errLoop
	}
	k := 1 / loop
	g := e.beside(f)
	back := make([]float64, g.n) // u_e = k u − back·x
	for j, c := range e.c {
		back[j] = k * f.d * c
		g.c[j] = k * c
	}
	for j, c := range f.c {
		back[e.n+j] = k * c
		g.c[e.n+j] = -k * e.d * c
	}
	for i, b := range e.b {
		for j, v := range back {
			g.a[i*g.n+j] -= b * v
		}
		g.b[i] = k * b
	}
	for i, b := range f.b {
		for j, v := range g.c {
			g.a[(e.n+i)*g.n+j] += b * v
		}
		g.b[e.n+i] = k * b * e.d
	}
	g.d = k * e.d
	return g, nil
}

// join folds a list of transfers by one of the connections.
func join(list []*Transfer, with func(e, f *stateSpace) stateSpace) (*Transfer, error) {
	if len(list) == 0 {
		panic("laplace: nothing to connect")
	}
	sum, err := list[0].equations()
	for _, h := range list[1:] {
		if err != nil {
			return nil, err
		}
		var next stateSpace
		if next, err = h.equations(); err == nil {
			sum = with(&sum, &next)
		}
	}
	if err != nil {
		return nil, err
	}
	return sum.transfer()
}

// Series returns the product of transfers: the output of each is the input of the
// next. Poles and zeros that meet cancel as those of any transfer do. It panics
// where the list is empty; the error says that a transfer is improper or that roots
// did not converge. The cost is that of a system of the sum of their orders.
func Series(list ...*Transfer) (*Transfer, error) {
	return join(list, func(e, f *stateSpace) stateSpace { return e.series(f) })
}

// Parallel returns the sum of transfers that share their input. Errors and cost are
// those of Series.
func Parallel(list ...*Transfer) (*Transfer, error) {
	return join(list, func(e, f *stateSpace) stateSpace { return e.parallel(f) })
}

// Feedback returns forward/(1 + forward·back): the output of forward comes back
// through back and is subtracted from the input. For a loop that adds, pass
// back.Scaled(−1). The error is that of Series, or says that the loop has no delay
// and a gain of exactly −1.
func Feedback(forward, back *Transfer) (*Transfer, error) {
	e, err := forward.equations()
	if err != nil {
		return nil, err
	}
	f, err := back.equations()
	if err != nil {
		return nil, err
	}
	g, err := e.feedback(&f)
	if err != nil {
		return nil, err
	}
	return g.transfer()
}

// Scaled returns k·H.
func (h *Transfer) Scaled(k float64) (*Transfer, error) {
	e, err := h.equations()
	if err != nil {
		return nil, err
	}
	c := make([]float64, len(e.c))
	for j, v := range e.c {
		c[j] = k * v
	}
	e.c, e.d = c, k*e.d
	return e.transfer()
}
