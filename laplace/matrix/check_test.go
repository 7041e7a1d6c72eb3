package matrix

import (
	"errors"
	"math"
	"testing"
)

func two() *Balance {
	b := newBalance(2)
	b.C[0], b.C[1] = 1, 2
	b.join(0, 1, 3)
	b.Leak[0] = 1
	return b
}

func TestIsRC(t *testing.T) {
	if !two().IsRC() || !newBalance(0).IsRC() {
		t.Error("an RC network is refused")
	}
	for name, spoil := range map[string]func(b *Balance){
		"one-sided": func(b *Balance) { b.F[1] = math.Nextafter(3, 4) },
		"negative":  func(b *Balance) { b.F[1], b.F[2] = -3, -3 },
		"feeding":   func(b *Balance) { b.Leak[1] = -1e-300 },
		"NaN":       func(b *Balance) { b.F[1], b.F[2] = math.NaN(), math.NaN() },
	} {
		b := two()
		if spoil(b); b.IsRC() {
			t.Errorf("%s: taken for an RC network", name)
		}
	}
}

func TestDense(t *testing.T) {
	b := two()
	b.F[0] = math.NaN() // the diagonal is ignored
	want := []float64{-4, 3, 1.5, -1.5}
	for i, x := range b.Dense() {
		if x != want[i] {
			t.Errorf("element %d is %g, want %g", i, x, want[i])
		}
	}
}

// TestModesRefuses: what has no answer is an error, never a panic or a NaN.
func TestModesRefuses(t *testing.T) {
	port := [][]float64{{1, 0}}
	for _, c := range []struct {
		name  string
		spoil func(b *Balance)
		ports [][]float64
		want  error
	}{
		{"short C", func(b *Balance) { b.C = b.C[:1] }, nil, ErrShape},
		{"short F", func(b *Balance) { b.F = b.F[:3] }, nil, ErrShape},
		{"negative N", func(b *Balance) { b.N = -1 }, nil, ErrShape},
		{"huge N", func(b *Balance) { b.N = 1 << 62 }, nil, ErrShape},
		{"short port", func(b *Balance) {}, [][]float64{{1}}, ErrShape},
		{"port NaN", func(b *Balance) {}, [][]float64{{1, math.NaN()}}, ErrValue},
		{"no capacity", func(b *Balance) { b.C[1] = 0 }, port, ErrValue},
		{"capacity infinite", func(b *Balance) { b.C[1] = math.Inf(1) }, port, ErrValue},
		{"exchange infinite", func(b *Balance) { b.F[1], b.F[2] = math.Inf(1), math.Inf(1) }, port, ErrValue},
		{"leak NaN", func(b *Balance) { b.Leak[1] = math.NaN() }, port, ErrValue},
		{"one-sided", func(b *Balance) { b.F[1] = 2 }, port, ErrNotRC},
		{"feeding", func(b *Balance) { b.Leak[0] = -1 }, port, ErrNotRC},
		{"capacities too far apart", func(b *Balance) { b.C[1] = 1e200 }, port, ErrRange},
		{"exchanges too far apart", func(b *Balance) { b.Leak[1] = 1e-200 }, port, ErrRange},
		{"pole beyond range", func(b *Balance) { b.C[0], b.C[1] = 1e-290, 1e-290; b.join(0, 1, 1e100); b.Leak[0] = 1e100 }, port, ErrRange},
	} {
		b := two()
		c.spoil(b)
		var w RCWork
		if _, err := w.Modes(b, c.ports); !errors.Is(err, c.want) {
			t.Errorf("%s: %v, want %v", c.name, err, c.want)
		}
	}
}

// TestModesEnds: no store, one store, one store that keeps all.
func TestModesEnds(t *testing.T) {
	var w RCWork
	if m, err := w.Modes(newBalance(0), [][]float64{{}}); err != nil || len(m.Lambda) != 0 || len(m.Port) != 1 {
		t.Errorf("no store: %v %v", m, err)
	}
	b := newBalance(1)
	b.C[0] = 4
	m, err := w.Modes(b, [][]float64{{-3}})
	if err != nil || m.Lambda[0] != 0 || m.Port[0][0] != 1.5 {
		t.Errorf("store that keeps all: %v %v", m, err)
	}
	b.Leak[0] = 2
	if m, err = w.Modes(b, [][]float64{{-3}}); err != nil || m.Lambda[0] != 0.5 || m.Port[0][0] != 1.5 {
		t.Errorf("leaking store: %v %v", m, err)
	}
}

// FuzzModes: any sizes and values end in a finite answer or an error.
func FuzzModes(f *testing.F) {
	f.Add(uint8(3), uint64(1), 1.0, 1.0)
	f.Add(uint8(0), uint64(2), math.Inf(1), -1.0)
	f.Add(uint8(9), uint64(3), 1e300, 1e-300)
	f.Add(uint8(6), uint64(4), 5e-324, math.NaN())
	f.Fuzz(func(t *testing.T, size uint8, seed uint64, odd, other float64) {
		r := splitmix(seed)
		n := int(size) % 12
		b := newBalance(n)
		if n > 0 {
			b = spreadNetwork(kinds[r.index(4)], n, 60*r.uniform(), &r)
		}
		port := make([]float64, n)
		for _, v := range []float64{odd, other} {
			if n == 0 {
				break
			}
			i, j := r.index(n), r.index(n)
			switch r.index(5) {
			case 0:
				b.C[i] = v
			case 1:
				b.Leak[i] = v
			case 2:
				b.F[i*n+j], b.F[j*n+i] = v, v
			case 3:
				port[i] = v
			case 4:
				b.F[i*n+j] = v
			}
		}
		var w RCWork
		if m, err := w.Modes(b, [][]float64{port}); err == nil {
			for k, l := range m.Lambda {
				if !(l >= 0 && l <= math.MaxFloat64) || m.Port[0][k]-m.Port[0][k] != 0 || k > 0 && l < m.Lambda[k-1] {
					t.Fatalf("mode %d: pole %g, port %g", k, l, m.Port[0][k])
				}
			}
		}
		if e, err := b.Eliminate(); err == nil {
			e.Solve(port)
			e.SolveTransposed(port)
		}
	})
}
