package matrix

import (
	"math"
	"math/cmplx"
	"slices"
)

// refinedResolvent solves (M s − A) x = f by elimination with row exchanges and corrects
// the result with residuals in twice the precision until it no longer moves: every
// level then has its own relative accuracy, small ones too, as long as the equations
// are not singular to working precision.
//
// Source: R. D. Skeel, Math. Comp. 35 (1980) 817-832; Higham, Accuracy and
// Stability of Numerical Algorithms, 2nd ed., ch. 12.
type refinedResolvent struct {
	n    int
	c    []float64 // capacities; nil: 1
	mass []float64 // M, N×N; nil: diag(c)
	a    []dd      // A
	size []float64 // sums of the sizes that went into A

	s     complex128
	lu    []complex128
	scale []float64 // of the rows
	row   []int
	r     []complex128
}

func refineStores(s *Stores) *refinedResolvent {
	n := s.N
	w := &refinedResolvent{n: n, c: s.C, mass: s.Mass, a: make([]dd, n*n), size: make([]float64, n*n)}
	for i := range n {
		for j := range n {
			w.a[i*n+j], w.size[i*n+j] = s.entry(i, j)
		}
	}
	return w.ready()
}

func refineDense(n int, a []float64) *refinedResolvent {
	w := &refinedResolvent{n: n, a: make([]dd, n*n), size: make([]float64, n*n)}
	for k, v := range a {
		w.a[k], w.size[k] = toDD(v), math.Abs(v)
	}
	return w.ready()
}

func (w *refinedResolvent) ready() *refinedResolvent {
	w.lu = make([]complex128, w.n*w.n)
	w.scale = make([]float64, w.n)
	w.row = make([]int, w.n)
	w.r = make([]complex128, w.n)
	return w
}

// massOf returns M[i,j].
func (w *refinedResolvent) massOf(i, j int) float64 {
	switch {
	case w.mass != nil:
		return w.mass[i*w.n+j]
	case i != j:
		return 0
	case w.c == nil:
		return 1
	}
	return w.c[i]
}

// factor fills lu, rows scaled by powers of two so that their largest entries agree.
func (w *refinedResolvent) factor(s complex128) bool {
	w.s = s
	n := w.n
	for i := range n {
		line := w.lu[i*n : (i+1)*n]
		most := 0.0
		for j := range line {
			line[j] = realTimes(w.massOf(i, j), s) - complex(w.a[i*n+j].float(), 0)
			most = max(most, magnitude(line[j]))
		}
		if most == 0 || math.IsInf(most, 0) {
			return false
		}
		w.scale[i] = math.Ldexp(1, -exponent(most))
		for j := range line {
			line[j] = realTimes(w.scale[i], line[j])
		}
		w.row[i] = i
	}
	return w.eliminate()
}

func magnitude(z complex128) float64 { return max(math.Abs(real(z)), math.Abs(imag(z))) }

func (w *refinedResolvent) eliminate() bool {
	n := w.n
	for k := range n {
		p := k
		for i := k + 1; i < n; i++ {
			if magnitude(w.lu[i*n+k]) > magnitude(w.lu[p*n+k]) {
				p = i
			}
		}
		if w.lu[p*n+k] == 0 {
			return false
		}
		if p != k {
			w.row[k], w.row[p] = w.row[p], w.row[k]
			for j := range n {
				w.lu[k*n+j], w.lu[p*n+j] = w.lu[p*n+j], w.lu[k*n+j]
			}
		}
		for i := k + 1; i < n; i++ {
			if w.lu[i*n+k] == 0 {
				continue
			}
			m := w.lu[i*n+k] / w.lu[k*n+k]
			w.lu[i*n+k] = m
			for j := k + 1; j < n; j++ {
				w.lu[i*n+j] -= m * w.lu[k*n+j]
			}
		}
	}
	return true
}

// forward replaces w.r, a right side, by the solution.
func (w *refinedResolvent) forward() {
	n := w.n
	z := make([]complex128, n)
	for k, i := range w.row {
		z[k] = realTimes(w.scale[i], w.r[i])
		for j := range k {
			z[k] -= w.lu[k*n+j] * z[j]
		}
	}
	for k := n - 1; k >= 0; k-- {
		for j := k + 1; j < n; j++ {
			z[k] -= w.lu[k*n+j] * z[j]
		}
		z[k] /= w.lu[k*n+k]
	}
	copy(w.r, z)
}

// transposed does so with the transposed matrix.
func (w *refinedResolvent) transposed() {
	n := w.n
	z := slices.Clone(w.r)
	for k := range n {
		for j := range k {
			z[k] -= w.lu[j*n+k] * z[j]
		}
		z[k] /= w.lu[k*n+k]
	}
	for k := n - 1; k >= 0; k-- {
		for j := k + 1; j < n; j++ {
			z[k] -= w.lu[j*n+k] * z[j]
		}
	}
	for k, i := range w.row {
		w.r[i] = realTimes(w.scale[i], z[k])
	}
}

// corrections bounds the refinements; a level smaller by 2^−53 than the largest
// takes one more.
const corrections = 24

func (w *refinedResolvent) levels(f []float64, x []complex128) {
	clear(x)
	last := math.Inf(1)
	for range corrections {
		w.residual(f, x)
		w.forward()
		moved := 0.0
		for i, d := range w.r {
			if d != 0 {
				x[i] += d
				moved = max(moved, cmplx.Abs(d)/max(cmplx.Abs(x[i]), math.SmallestNonzeroFloat64))
			}
		}
		if moved <= 0x1p-52 || moved >= 1 && last < 1 || math.IsNaN(moved) {
			return
		}
		last = moved
	}
}

func (w *refinedResolvent) weights(c []float64, y []complex128) {
	for i, v := range c {
		w.r[i] = complex(v, 0)
	}
	w.transposed()
	copy(y, w.r)
}

// residual sets w.r to f − (M s − A)x.
func (w *refinedResolvent) residual(f []float64, x []complex128) {
	n := w.n
	for i := range n {
		re, im := toDD(f[i]), dd{}
		for j := range n {
			a, m := w.a[i*n+j], w.massOf(i, j)
			if a.zero() && m == 0 {
				continue
			}
			a = a.sub(exactly(m, real(w.s))) // what x_j counts for: a − i·b
			b := exactly(m, imag(w.s))
			xr, xi := toDD(real(x[j])), toDD(imag(x[j]))
			re = re.add(a.mul(xr)).add(b.mul(xi))
			im = im.add(a.mul(xi)).sub(b.mul(xr))
		}
		w.r[i] = complex(re.float(), im.float())
	}
}

// exactly returns a·b without error.
func exactly(a, b float64) dd {
	p, e := twoProd(a, b)
	return dd{p, e}
}

func (w *refinedResolvent) noise(s complex128, i int, x []complex128) float64 {
	var sum float64
	for j, v := range w.size[i*w.n : (i+1)*w.n] {
		sum += (v + math.Abs(w.massOf(i, j))*cmplx.Abs(s)) * cmplx.Abs(x[j])
	}
	return sum
}
