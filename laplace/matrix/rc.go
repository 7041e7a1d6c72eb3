package matrix

import (
	"math"
	"slices"
)

// RCModes holds the modes of a network of resistances and capacitances. In the
// coordinates z = C^½ x its poles are −Lambda[k] with orthonormal vectors p_k.
// The transfer function from port i to port o is
//
//	H(s) = Σ_k Port[i][k]·Port[o][k] / (s + Lambda[k]).
type RCModes struct {
	Lambda   []float64   // 1/s, ascending (slowest first); exactly 0 for each adiabatic island
	Port     [][]float64 // ports × N: p_k · C^-½ v for the port vector v
	Growth   float64     // largest growth of a row in a bidiagonalisation, 1 where there was none
	Jacobi   bool        // the modes of some island are from one-sided Jacobi
	RelBound float64     // bound of the relative error of every Lambda
}

// RCWork is the workspace of Modes. Its zero value is ready; a second use with
// no more stores and ports than before allocates nothing but the result. It
// must not be used by two goroutines at once.
type RCWork struct {
	isl     islands
	c, g    int       // C is held divided by 2^c, F and Leak by 2^g
	net     network   // the island at hand
	d, e    []float64 // its bidiagonal matrix
	side    [2][][]float64
	port    []portScale
	house   householder
	qr      implicitQR
	jac     jacobi
	scratch []float64
	lambda  []float64   // of all islands, not yet sorted
	value   [][]float64 // ports × N, likewise
	order   []int
	only    route // by tests
}

// route makes an island go another way than its own.
type route uint8

const (
	anyRoute    route = iota
	meshRoute         // bidiagonalise paths too
	jacobiRoute       // rotate paths and meshes
)

// maxGrowth is the growth of a row beyond which the bidiagonalisation is
// replaced by one-sided Jacobi. Over 26,000 random networks of 2 to 200 stores
// and spreads to 1e30 the worst relative error of a pole was 3e-14 up to here
// (with the check of drift); without a limit it is 5e-13 at a growth of 1e3 and
// 5e-11 at 3e4.
const maxGrowth = 40

// Modes returns the modes of b, whose F must be symmetric and F and Leak not
// negative. ports holds vectors of length N in flow or output weights.
//
// Every Lambda is as good, relatively, as the values of the network are: no
// diagonal sum is formed and nothing is subtracted before the orthogonal part
// of the computation, so that a spread of 1e30 costs the slow poles nothing.
// RelBound states it. Each Port value is formed on the side on which its error
// is smaller: ε‖C^-½v‖ in the coordinates of the stores, ε·√Lambda·‖X⁻¹C^-½v‖
// in those of the elimination. The sign of mode k makes Port[j][k] positive
// for the first port j that sees the mode.
//
// It returns ErrShape, ErrValue, ErrNotRC or ErrRange, the last where the
// capacities, or the exchanges, of a network differ by more than about 1e108, and
// ErrNoConvergence, which has not been seen.
//
// Method: elimination with a pivot of the largest F/C (gth.go) gives X with
// C^-½ G C^-½ = X Xᵀ; Xᵀ is bidiagonalised (bidiagonal.go) and its singular
// values found by an implicit zero-shift QR (implicitqr.go); a network without
// loops or branches is bidiagonal at once (path.go); one whose rows grow too
// much, or whose poles miss the determinant, goes to Jacobi (jacobi.go). Cost:
// about 3 N³ + 100 N² operations, with Jacobi some five times that.
func (w *RCWork) Modes(b *Balance, ports [][]float64) (*RCModes, error) {
	if err := w.prepare(b, ports); err != nil {
		return nil, err
	}
	m := newModes(b.N, len(ports))
	for i := range w.isl.count {
		if err := w.island(b, ports, i, m); err != nil {
			return nil, err
		}
	}
	w.collect(m)
	m.RelBound = relBound(b.N, m)
	return m, nil
}

// newModes allocates a result for n stores in one piece.
func newModes(n, ports int) *RCModes {
	m := &RCModes{Growth: 1, Port: make([][]float64, ports)}
	all := make([]float64, n*(ports+1))
	m.Lambda = all[:n:n]
	for j := range m.Port {
		m.Port[j] = all[(j+1)*n : (j+2)*n : (j+2)*n]
	}
	return m
}

// prepare checks the input, finds the islands and sizes the workspace.
func (w *RCWork) prepare(b *Balance, ports [][]float64) error {
	for _, v := range ports {
		if len(v) != b.N {
			return ErrShape
		}
		for _, x := range v {
			if x-x != 0 {
				return ErrValue
			}
		}
	}
	if err := w.isl.find(b); err != nil {
		return err
	}
	if err := w.scales(b); err != nil {
		return err
	}
	w.size(b.N, len(ports))
	return nil
}

// scales chooses the powers of two that bring the largest capacity and the
// largest exchange near 1. They change no digit of the result.
func (w *RCWork) scales(b *Balance) error {
	w.c, w.g = 0, 0
	if b.N == 0 {
		return nil
	}
	w.c = exponent(slices.Max(b.C))
	if w.c-exponent(slices.Min(b.C)) > maxSpread || abs(w.c) > maxExponent {
		return ErrRange
	}
	if w.isl.most > 0 {
		w.g = exponent(w.isl.most)
		if w.g-exponent(w.isl.least) > maxSpread || abs(w.g) > maxExponent {
			return ErrRange
		}
	}
	return nil
}

// maxSpread is the largest ratio of two capacities, or two exchanges, as a
// power of two. Singular values then lie within 2^±190, where products of four
// of them are doubles.
const maxSpread = 360

// maxExponent keeps the powers of two that scale the values themselves doubles.
const maxExponent = 1000

// size makes room for n stores and the ports.
func (w *RCWork) size(n, ports int) {
	w.net.size(n)
	w.d, w.e = resized(w.d, n), resized(w.e, n)
	w.lambda = resized(w.lambda, n)
	w.order = resized(w.order, n)
	w.scratch = resized(w.scratch, n+padding)
	w.port = slices.Grow(w.port[:0], ports)[:ports]
	w.value = resizedRows(w.value, ports, n)
	for i := range w.side {
		w.side[i] = resizedRows(w.side[i], ports, n+padding)
	}
}

func abs(i int) int { return max(i, -i) }

// largest returns the largest magnitude in v.
func largest(v []float64) float64 {
	m := 0.0
	for _, x := range v {
		m = max(m, math.Abs(x))
	}
	return m
}

// relBound is a bound of the relative error of the poles: rounding errors of
// many rotations grow like √n, those of reflections with the growth of rows.
// Nearly twice what the worst of 26,000 random networks asks for.
func relBound(n int, m *RCModes) float64 {
	return eps * (16 + 8*math.Sqrt(float64(n)) + 8*m.Growth)
}

// collect sorts the modes of all islands, slowest first.
func (w *RCWork) collect(m *RCModes) {
	for k := range w.order {
		w.order[k] = k
	}
	slices.SortStableFunc(w.order, func(i, j int) int {
		switch {
		case w.lambda[i] < w.lambda[j]:
			return -1
		case w.lambda[i] > w.lambda[j]:
			return 1
		}
		return 0
	})
	for k, from := range w.order {
		m.Lambda[k] = w.lambda[from]
		for j, v := range w.value {
			m.Port[j][k] = v[from]
		}
	}
}
