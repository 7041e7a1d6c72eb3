package matrix

import (
	"errors"
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// randomStores has levels that exchange, flows between them and a group of flows
// tied by a mass matrix.
func randomStores(t *rapid.T) *Stores {
	n := rapid.IntRange(1, 6).Draw(t, "n")
	v := func(name string, lo int) float64 { return float64(rapid.IntRange(lo, 32).Draw(t, name)) / 8 }
	s := &Stores{Balance: Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}, K: make([]float64, n*n)}
	for i := range n {
		s.C[i], s.Leak[i] = v("C", 1), v("leak", 0)
		for j := range i {
			if rapid.Bool().Draw(t, "resistance") {
				s.F[i*n+j] = v("F", 0)
				s.F[j*n+i] = s.F[i*n+j]
			} else if rapid.Bool().Draw(t, "flow") {
				s.K[i*n+j], s.K[j*n+i] = 1, -1
			}
		}
	}
	if rapid.Bool().Draw(t, "tied") {
		s.Mass = make([]float64, n*n)
		for i := range n {
			s.Mass[i*n+i] = s.C[i]
			if i > 0 && rapid.Bool().Draw(t, "with the one before") { // diagonally dominant
				m := min(s.C[i], s.C[i-1]) / 4
				s.Mass[i*n+i-1], s.Mass[(i-1)*n+i] = m, m
			}
		}
	}
	return s
}

// at returns direct + rate·s + out (s Mass − G)⁻¹ in by plain elimination.
func (s *Stores) at(p complex128, in, out []float64, direct, rate float64) complex128 {
	n := s.N
	a, x := make([]complex128, n*n), make([]complex128, n)
	for i := range n {
		x[i] = complex(in[i], 0)
		for j := range n {
			v, _ := s.entry(i, j)
			a[i*n+j] = p*complex(s.massOf(i, j), 0) - complex(v.float(), 0)
		}
	}
	for k := range n {
		r := k
		for i := k; i < n; i++ {
			if cmplx.Abs(a[i*n+k]) > cmplx.Abs(a[r*n+k]) {
				r = i
			}
		}
		for j := range n {
			a[k*n+j], a[r*n+j] = a[r*n+j], a[k*n+j]
		}
		x[k], x[r] = x[r], x[k]
		for i := range n {
			if f := a[i*n+k] / a[k*n+k]; i != k {
				for j := k; j < n; j++ {
					a[i*n+j] -= f * a[k*n+j]
				}
				x[i] -= f * x[k]
			}
		}
	}
	h := complex(direct, 0) + complex(rate, 0)*p
	for i := range n {
		h += complex(out[i], 0) * x[i] / a[i*n+i]
	}
	return h
}

func value(c []float64, p complex128) (v complex128) {
	for k := len(c) - 1; k >= 0; k-- {
		v = v*p + complex(c[k], 0)
	}
	return v
}

// Polynomials, poles, zeros and the sum over the blocks all are the same transfer.
func TestStoresTransfer(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := randomStores(t)
		in, out := make([]float64, s.N), make([]float64, s.N)
		in[rapid.IntRange(0, s.N-1).Draw(t, "in")], out[rapid.IntRange(0, s.N-1).Draw(t, "out")] = 2, 3
		direct, rate := float64(rapid.IntRange(-1, 1).Draw(t, "d")), float64(rapid.IntRange(-1, 1).Draw(t, "r"))
		p := complex(rapid.Float64Range(0.5, 4).Draw(t, "re"), rapid.Float64Range(0, 4).Draw(t, "im"))
		want := s.at(p, in, out, direct, rate)
		num, den, err := s.Ratio(in, out, direct, rate)
		if err != nil {
			t.Fatal(err)
		}
		if got := value(num, p) / value(den, p); cmplx.Abs(got-want) > 1e-11*(1+cmplx.Abs(want)) {
			t.Fatalf("from polynomials %v, want %v", got, want)
		}
		e, err := s.Exact(in, out, direct, rate)
		if err != nil || e.Degree != len(num)-1 || e.Order != s.N {
			t.Fatalf("%+v (%v) for %v over %v", e, err, num, den)
		}
		f, err := s.BlockForm()
		if err != nil {
			t.Fatal(err)
		}
		q := complex(1, 0)
		for _, r := range f.Poles {
			q *= p - complex(r.Re, r.Im)
		}
		if d := value(den, p); cmplx.Abs(q-d) > 1e-9*cmplx.Abs(d) {
			t.Fatalf("poles make %v, the denominator %v", q, d)
		}
		zeros, err := s.Zeros(in, out, direct, rate)
		if errors.Is(err, ErrZeroTransfer) {
			if len(num) > 0 {
				t.Fatalf("no zeros, numerator %v", num)
			}
			return
		}
		if err != nil {
			t.Fatal(err)
		}
		// Zeros leaves out the stores off the path, with their poles.
		z := complex(num[len(num)-1], 0)
		for _, r := range zeros {
			z *= p - complex(r.Re, r.Im)
		}
		if len(zeros) == len(num)-1 && cmplx.Abs(z-value(num, p)) > 1e-6*cmplx.Abs(value(num, p)) {
			t.Fatalf("zeros make %v, the numerator %v: %v", z, value(num, p), zeros)
		}
	})
}

// At rest everything balances, to the rounding of the largest part.
func TestStoresAtRest(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := randomStores(t)
		r := s.AtRest()
		if r == nil {
			f, err := s.BlockForm()
			if err != nil {
				t.Fatal(err)
			}
			if p := f.Poles[0]; math.Hypot(p.Re, p.Im) > p.Radius {
				t.Fatalf("not determined, and the slowest pole is %v", p)
			}
			return
		}
		f := make([]float64, s.N)
		for i := range f {
			f[i] = float64(i + 1)
		}
		x := r.Solve(f)
		for i := range s.N {
			sum, size := toDD(f[i]), math.Abs(f[i])
			for j, v := range x {
				a, _ := s.entry(i, j)
				sum, size = sum.add(a.mul(toDD(v))), size+math.Abs(a.hi*v)
			}
			if math.Abs(sum.float()) > 4*eps*size {
				t.Fatalf("store %d is off by %g of %g", i, sum.float(), size)
			}
		}
	})
}

func TestStoresRefused(t *testing.T) {
	b := Balance{N: 2, C: []float64{1, 1}, F: make([]float64, 4), Leak: make([]float64, 2)}
	for name, s := range map[string]*Stores{
		"indefinite mass": {Balance: b, Mass: []float64{1, 2, 2, 1}},
		"negative mass":   {Balance: b, Mass: []float64{1, 0, 0, -1}},
		"infinite K":      {Balance: b, K: []float64{0, math.Inf(1), 0, 0}},
	} {
		if _, err := s.BlockForm(); !errors.Is(err, ErrValue) {
			t.Errorf("%s: error %v", name, err)
		}
	}
	s := &Stores{Balance: b, K: make([]float64, 3)}
	if _, err := s.BlockForm(); !errors.Is(err, ErrShape) {
		t.Errorf("short K: error %v", err)
	}
}
