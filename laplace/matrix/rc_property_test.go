package matrix

import (
	"fmt"
	"math"
	"math/big"
	"slices"
	"testing"
)

// spreadNetwork is a random network whose values reach from exp(−sigma) to
// exp(sigma). Kinds: path, tree, graph, dense.
func spreadNetwork(kind string, n int, sigma float64, r *splitmix) *Balance {
	b := newBalance(n)
	value := func() float64 { return math.Exp(sigma * (2*r.uniform() - 1)) }
	for i := range n {
		b.C[i] = value()
	}
	at := r.permutation(n)
	for i := 1; i < n; i++ {
		switch kind {
		case "path":
			b.join(at[i-1], at[i], value())
		case "dense":
			for j := range i {
				b.join(i, j, value())
			}
		default:
			b.join(at[i], at[r.index(i)], value())
		}
	}
	if kind == "graph" {
		for range n {
			b.join(r.index(n), r.index(n), value())
		}
	}
	leaks := 1
	switch u := r.uniform(); {
	case u < 0.3:
		leaks = 0
	case u > 0.7:
		leaks = 1 + n/3
	}
	for range leaks {
		b.Leak[r.index(n)] = value()
	}
	return b
}

func (s *splitmix) index(n int) int { return int(s.uniform() * float64(n)) }

func (s *splitmix) permutation(n int) []int {
	p := make([]int, n)
	for i := range p {
		p[i] = i
	}
	for i := n - 1; i > 0; i-- {
		j := s.index(i + 1)
		p[i], p[j] = p[j], p[i]
	}
	return p
}

var (
	kinds  = []string{"path", "tree", "graph", "dense"}
	sigmas = []float64{1, 3, 7, 12, 17}
)

// networks calls do with random networks of all kinds, spreads to 1e30.
func networks(t *testing.T, sizes []int, each int, do func(name string, b *Balance, r *splitmix)) {
	r := splitmix(17)
	for _, kind := range kinds {
		for _, n := range sizes {
			for _, sigma := range sigmas {
				for i := range each {
					do(fmt.Sprintf("%s n=%d sigma=%g #%d", kind, n, sigma, i), spreadNetwork(kind, n, sigma, &r), &r)
				}
			}
		}
	}
}

// worstRatio returns the largest relative difference of two lists of poles.
func worstRatio(a, b []float64) float64 {
	worst := 0.0
	for k := range a {
		if a[k] != b[k] {
			worst = max(worst, math.Abs(a[k]-b[k])/max(math.Abs(a[k]), math.Abs(b[k])))
		}
	}
	return worst
}

// TestModesRoutes: the ways to the poles agree within their bounds. They share
// the elimination, not what follows.
func TestModesRoutes(t *testing.T) {
	networks(t, []int{2, 3, 5, 9, 20, 45}, 6, func(name string, b *Balance, _ *splitmix) {
		own, mesh, jac := modesBy(t, b, "own"), modesBy(t, b, "mesh"), modesBy(t, b, "jacobi")
		if e := worstRatio(own.Lambda, jac.Lambda); e > own.RelBound {
			t.Errorf("%s: own and Jacobi differ by %.2g, bound %.2g", name, e, own.RelBound)
		}
		if e := worstRatio(mesh.Lambda, jac.Lambda); e > mesh.RelBound {
			t.Errorf("%s: mesh and Jacobi differ by %.2g, bound %.2g", name, e, mesh.RelBound)
		}
		if own.RelBound > 1e-13 || mesh.RelBound > 1e-13 {
			t.Errorf("%s: bound %.2g", name, mesh.RelBound)
		}
	})
}

// TestModesInertia: for every pole, the number of poles below λ(1 ± 1e-13) is
// counted in 400-bit arithmetic by the signs of the pivots of G − λC
// (Sylvester's law of inertia): exactly the right one lies between.
func TestModesInertia(t *testing.T) {
	networks(t, []int{2, 4, 9, 16}, 2, func(name string, b *Balance, _ *splitmix) {
		m := modesBy(t, b, "own")
		for k, l := range m.Lambda {
			if l == 0 {
				continue
			}
			if got := below(b, l, -1e-13); got > k {
				t.Errorf("%s: %d poles below (1−1e-13) of pole %d, %g", name, got, k, l)
			}
			if got := below(b, l, 1e-13); got < k+1 {
				t.Errorf("%s: %d poles below (1+1e-13) of pole %d, %g", name, got, k, l)
			}
		}
	})
}

// below counts the poles slower than l(1+shift).
func below(b *Balance, l, shift float64) int {
	const bits = 400
	num := func(x float64) *big.Float { return new(big.Float).SetPrec(bits).SetFloat64(x) }
	n := b.N
	level := new(big.Float).SetPrec(bits).Mul(num(l), new(big.Float).Add(num(1), num(shift)))
	a := make([]*big.Float, n*n)
	for i := range n {
		d := num(b.Leak[i])
		for j := range n {
			if j != i {
				d.Add(d, num(b.F[i*n+j]))
				a[i*n+j] = new(big.Float).Neg(num(b.F[i*n+j]))
			}
		}
		a[i*n+i] = d.Sub(d, new(big.Float).Mul(level, num(b.C[i])))
	}
	count := 0
	f, p := num(0), num(0)
	for k := range n {
		if a[k*n+k].Sign() < 0 {
			count++
		}
		for i := k + 1; i < n; i++ {
			if a[i*n+k].Sign() == 0 {
				continue
			}
			f.Quo(a[i*n+k], a[k*n+k])
			for j := k + 1; j < n; j++ {
				a[i*n+j].Sub(a[i*n+j], p.Mul(f, a[k*n+j]))
			}
		}
	}
	return count
}

// TestModesTransfer: H(s) from the modes is the level found by elimination when
// s C is added to the leaks, at several real s. Between distant stores H(s) is
// what is left of terms that cancel: the error is measured against how far each
// port reaches by itself.
func TestModesTransfer(t *testing.T) {
	networks(t, []int{1, 2, 5, 12, 40}, 3, func(name string, b *Balance, r *splitmix) {
		in, out := r.index(b.N), r.index(b.N)
		m := modesBy(t, b, "own", unit(b.N, in), unit(b.N, out))
		for _, at := range []float64{0.1, 0.5, 0.9} {
			lo, hi := math.Log(1e-3*firstPositive(m.Lambda)), math.Log(1e3*m.Lambda[b.N-1]+1e-3)
			s := math.Exp(lo + at*(hi-lo))
			c := *b
			c.Leak = slices.Clone(b.Leak)
			for i := range c.Leak {
				c.Leak[i] += s * c.C[i]
			}
			e, err := c.Eliminate()
			if err != nil {
				t.Fatal(err)
			}
			want := e.Solve(unit(b.N, in))[out]
			got := 0.0
			for k, l := range m.Lambda {
				got += m.Port[0][k] * m.Port[1][k] / (s + l)
			}
			if math.Abs(got-want) > 1e-14*math.Sqrt(m.reach(0, s)*m.reach(1, s)) {
				t.Errorf("%s: H(%g) from %d to %d is %.15g, want %.15g", name, s, in, out, got, want)
			}
		}
	})
}

// reach is min(H(0), ‖C^-½v‖²/s) of a port to itself, the scale of the errors of
// its values: ε√λ‖X⁻¹C^-½v‖ and ε‖C^-½v‖, over λ or s.
func (m *RCModes) reach(port int, s float64) float64 {
	steady, fast := 0.0, 0.0
	for k, l := range m.Lambda {
		p := m.Port[port][k] * m.Port[port][k]
		fast += p / s
		steady += p / l
	}
	if steady < fast {
		return steady
	}
	return fast
}

func firstPositive(v []float64) float64 {
	for _, x := range v {
		if x > 0 {
			return x
		}
	}
	return 1
}

// TestModesScale: powers of two in capacities, exchanges and ports pass through
// to the last bit; those of the capacities by their square root to the ports.
func TestModesScale(t *testing.T) {
	networks(t, []int{1, 2, 7, 24}, 1, func(name string, b *Balance, r *splitmix) {
		v := make([]float64, b.N)
		for i := range v {
			v[i] = r.uniform() - 0.3
		}
		m := modesBy(t, b, "own", v)
		for _, k := range [][3]int{{1, 0, 0}, {6, -3, 11}, {-300, 300, 5}, {332, 332, -300}} {
			c := newBalance(b.N)
			u := make([]float64, b.N)
			for i := range b.N {
				c.C[i] = math.Ldexp(b.C[i], k[0])
				c.Leak[i] = math.Ldexp(b.Leak[i], k[1])
				u[i] = math.Ldexp(v[i], k[2])
			}
			for i := range b.F {
				c.F[i] = math.Ldexp(b.F[i], k[1])
			}
			s := modesBy(t, c, "own", u)
			for i := range m.Lambda {
				if want := math.Ldexp(m.Lambda[i], k[1]-k[0]); s.Lambda[i] != want {
					t.Fatalf("%s: scaled by %v, pole %d is %g, want %g", name, k, i, s.Lambda[i], want)
				}
				if want := math.Ldexp(m.Port[0][i], k[2]-k[0]/2); k[0]%2 == 0 && s.Port[0][i] != want {
					t.Fatalf("%s: scaled by %v, port %d is %g, want %g", name, k, i, s.Port[0][i], want)
				}
			}
		}
	})
}

// TestModesRelabelled: renumbering the stores changes nothing but rounding.
func TestModesRelabelled(t *testing.T) {
	networks(t, []int{2, 3, 8, 30}, 3, func(name string, b *Balance, r *splitmix) {
		p := r.permutation(b.N)
		c := newBalance(b.N)
		for i := range b.N {
			c.C[p[i]], c.Leak[p[i]] = b.C[i], b.Leak[i]
			for j := range b.N {
				c.F[p[i]*b.N+p[j]] = b.F[i*b.N+j]
			}
		}
		if e := worstRatio(modesBy(t, b, "own").Lambda, modesBy(t, c, "own").Lambda); e > 1e-14 {
			t.Errorf("%s: poles differ by %.2g", name, e)
		}
	})
}

// TestModesIslands: islands put side by side keep their poles, each has its own pole at 0 where nothing leaks, and no port sees across.
func TestModesIslands(t *testing.T) {
	r := splitmix(5)
	var parts []*Balance
	var want []float64
	n := 0
	for i, size := range []int{1, 4, 1, 9, 2, 6} {
		b := spreadNetwork(kinds[i%4], size, 6, &r)
		if i%2 == 0 {
			clear(b.Leak)
		}
		parts = append(parts, b)
		want = append(want, modesBy(t, b, "own").Lambda...)
		n += size
	}
	all := newBalance(n)
	at := 0
	for _, b := range parts {
		for i := range b.N {
			all.C[at+i], all.Leak[at+i] = b.C[i], b.Leak[i]
			for j := range b.N {
				all.F[(at+i)*n+at+j] = b.F[i*b.N+j]
			}
		}
		at += b.N
	}
	m := modesBy(t, all, "own", unit(n, 0), unit(n, 3))
	slices.Sort(want)
	if e := worstRatio(m.Lambda, want); e > 1e-14 {
		t.Errorf("poles differ by %.2g\n%v\n%v", e, m.Lambda, want)
	}
	zeros := 0
	for k, l := range m.Lambda {
		if l == 0 {
			zeros++
		}
		if m.Port[0][k] != 0 && m.Port[1][k] != 0 {
			t.Errorf("mode %d is seen in two islands", k)
		}
	}
	if zeros != 3 {
		t.Errorf("%d poles at 0, want 3", zeros)
	}
}

// TestModesPorts: Σ_k Port_i Port_j = v_iᵀ C⁻¹ v_j, because the modes are
// orthonormal and complete; the first port that sees a mode is positive there;
// and the poles do not depend on the ports.
func TestModesPorts(t *testing.T) {
	networks(t, []int{1, 2, 6, 31}, 2, func(name string, b *Balance, r *splitmix) {
		ports := make([][]float64, 3)
		for j := range ports {
			ports[j] = make([]float64, b.N)
			for i := range b.N {
				ports[j][i] = r.uniform() - 0.5
			}
		}
		m := modesBy(t, b, "own", ports...)
		if none := modesBy(t, b, "own"); !slices.Equal(none.Lambda, m.Lambda) {
			t.Errorf("%s: poles differ with ports", name)
		}
		for i, v := range ports {
			for j, u := range ports {
				got, want, size := 0.0, 0.0, [2]float64{}
				for k := range b.N {
					got += m.Port[i][k] * m.Port[j][k]
					want += v[k] * u[k] / b.C[k]
					size[0] += v[k] * v[k] / b.C[k]
					size[1] += u[k] * u[k] / b.C[k]
				}
				if math.Abs(got-want) > 3e-14*math.Sqrt(size[0]*size[1]) {
					t.Errorf("%s: ports %d, %d: %g, want %g", name, i, j, got, want)
				}
			}
		}
		for k, x := range m.Port[0] {
			if x < 0 && -x > 1e-11*largest(m.Port[0]) {
				t.Errorf("%s: mode %d has sign %g", name, k, x)
			}
		}
	})
}

// TestModesAllocate: a used workspace allocates the result alone.
func TestModesAllocate(t *testing.T) {
	var w RCWork
	b := randomNetwork(30, 4)
	ports := [][]float64{unit(30, 0), unit(30, 29)}
	run := func() {
		if _, err := w.Modes(b, ports); err != nil {
			t.Fatal(err)
		}
	}
	run()
	if got := testing.AllocsPerRun(20, run); got > 3 {
		t.Errorf("%g allocations, want 3", got)
	}
}
