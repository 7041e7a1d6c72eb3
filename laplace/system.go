package laplace

import (
	"errors"
	"fmt"
	"sync"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

// A Realisation is the linear system
//
//	C x' = exchange of the Balance + K x + B u,   y = Output x + D u + Rate u'.
//
// B[k] is the flow into each store per unit of input k, Output[m] the weight of each
// store in output m, D[m][k] the share of input k that reaches output m at once,
// Rate[m][k] the share of its derivative: an output with such a share is improper. K and
// Mass couple stores as in matrix.Stores, levels with flows; a network of levels alone
// leaves them nil.
type Realisation struct {
	Balance matrix.Balance
	K, Mass []float64   // N×N row-major, or nil
	B       [][]float64 // inputs × N
	Output  [][]float64 // outputs × N
	D       [][]float64 // outputs × inputs; nil where nothing passes at once
	Rate    [][]float64 // outputs × inputs; nil where no output is improper

	// Rounded says that B, Output and D are rounded where they may have to cancel
	// exactly: error bounds then decide what does, not the numbers as they stand.
	Rounded bool
}

// A System is a linear system with several inputs and outputs, taken apart into
// its modes. It is never changed after New and may be used from several
// goroutines.
type System struct {
	plant plant
	b, c  [][]float64 // inputs × order, outputs × order
	d     [][]float64 // outputs × inputs, never nil
	rate  [][]float64 // outputs × inputs; nil where no output is improper

	rounded bool // as in Realisation
	modal   *modal
	poles   []Pole
	seats   [][]seat // of each pole, where its modes are
	carry   *carrier // nil unless from NewCarrying

	once  sync.Once
	solve func(b []float64) []float64 // of atRest
}

// New takes r apart. A network of resistances and capacitances (F symmetric, F and
// Leak ≥ 0) has its poles to about 1e-14 relative, each, however stiff (package
// matrix, RCWork); any other system goes through matrix.BlockForm. New keeps r's
// slices. An error says which number of r is not usable, or that the modes did
// not converge. The cost is that of the modes, of order N³.
func New(r Realisation) (*System, error) {
	p := plant{n: r.Balance.N, stores: &matrix.Stores{Balance: r.Balance, K: r.K, Mass: r.Mass}}
	if err := p.check(); err != nil {
		return nil, err
	}
	s, err := newSystem(p, r.B, r.Output, r.D)
	if err != nil {
		return nil, err
	}
	if s.rounded = r.Rounded; r.Rate == nil {
		return s, nil
	}
	if err := checkPorts(p.n, r.B, r.Output, r.Rate); err != nil {
		return nil, err
	}
	s.rate = r.Rate
	return s, nil
}

// FromMatrices takes apart x' = a x + b u, y = c x + d u, with a N×N, b N×inputs,
// c outputs×N and d outputs×inputs (nil: nothing passes at once). Where the system
// is a network, New is the better door: the sums on the diagonal of a have already
// lost the slow poles of a stiff one.
func FromMatrices(a, b, c, d mat.Matrix) (*System, error) {
	n, m := a.Dims()
	nb, inputs := b.Dims()
	outputs, nc := c.Dims()
	if n != m || nb != n || nc != n {
		return nil, errors.New("laplace: the shapes of a, b and c do not fit")
	}
	if d != nil {
		if r, k := d.Dims(); r != outputs || k != inputs {
			return nil, errors.New("laplace: the shape of d does not fit")
		}
	}
	p := plant{n: n, dense: flat(a)}
	var dd [][]float64
	if d != nil {
		dd = rows(d)
	}
	return newSystem(p, rows(b.T()), rows(c), dd)
}

func newSystem(p plant, b, c, d [][]float64) (*System, error) {
	if d == nil {
		d = make([][]float64, len(c))
		for m := range d {
			d[m] = make([]float64, len(b))
		}
	}
	if err := checkPorts(p.n, b, c, d); err != nil {
		return nil, err
	}
	s := &System{plant: p, b: b, c: c, d: d}
	roots, err := s.takeApart()
	if err != nil {
		return nil, err
	}
	s.poles, s.seats = gather(roots)
	return s, nil
}

// A workspace is room for taking a system apart, used again by the next one.
type workspace struct {
	rc     matrix.RCWork
	blocks matrix.BlockWork
}

var workspaces = sync.Pool{New: func() any { return new(workspace) }}

// takeApart fills modal and returns every pole with its seat.
func (s *System) takeApart() ([]seated, error) {
	w := workspaces.Get().(*workspace)
	defer workspaces.Put(w)
	if s.plant.isRC() {
		ports := append(append([][]float64(nil), s.b...), s.c...)
		m, err := w.rc.Modes(s.plant.balance(), ports)
		if err != nil {
			return nil, fmt.Errorf("laplace: %w", err)
		}
		s.modal = rcModal(m, len(s.b))
		list := make([]seated, len(m.Lambda))
		for k, l := range m.Lambda {
			list[k] = seated{complex(-l, 0), l * m.RelBound, seat{realSeat, k}}
		}
		return list, nil
	}
	f, err := s.plant.blockForm(&w.blocks)
	if err != nil {
		return nil, fmt.Errorf("laplace: %w", err)
	}
	var seats []seat
	s.modal, seats = blockModal(f, s.b, s.c)
	list := make([]seated, len(f.Poles))
	for k, r := range f.Poles {
		list[k] = seated{complex(r.Re, r.Im), r.Radius, seats[r.Block]}
	}
	return list, nil
}

// Order returns the number of stores, which is the number of poles.
func (s *System) Order() int { return s.plant.n }

func checkPorts(n int, b, c, d [][]float64) error {
	if len(d) != len(c) {
		return errors.New("laplace: D has not one row for each output")
	}
	for m := range d {
		if len(d[m]) != len(b) {
			return errors.New("laplace: D has not one column for each input")
		}
	}
	for what, list := range map[string][][]float64{"B": b, "Output": c} {
		for _, v := range list {
			if len(v) != n {
				return errors.New("laplace: a row of " + what + " has not one number for each store")
			}
		}
	}
	for _, list := range [][][]float64{b, c, d} {
		for _, v := range list {
			if err := finite("laplace: a weight of an input or an output", v...); err != nil {
				return err
			}
		}
	}
	return nil
}

func flat(a mat.Matrix) []float64 {
	n, m := a.Dims()
	v := make([]float64, 0, n*m)
	for i := range n {
		for j := range m {
			v = append(v, a.At(i, j))
		}
	}
	return v
}

func rows(a mat.Matrix) [][]float64 {
	n, m := a.Dims()
	v, r := flat(a), make([][]float64, n)
	for i := range r {
		r[i] = v[i*m : (i+1)*m : (i+1)*m]
	}
	return r
}
