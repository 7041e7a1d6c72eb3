package network_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"lagbook/laplace"
)

// The balances as they stand, E x' + A x = b u, index 2 where lines meet, marched with
// the Radau method of two stages (Hairer, Wanner 1996, table IV.5.5): its flows and
// store levels agree with the closed form to the march's own error, which a second
// march with half the step bounds.
func TestFlowMarch(t *testing.T) {
	compared := 0
	for k := range 12 {
		s := rapid.Custom(anyTubes).Example(k)
		m := s.build(t)
		for i := range m.p.Wave {
			m.p.Wave[i] = laplace.Waveform{Segments: []laplace.Segment{{B: float64(i + 1)}}}
		}
		const until = 1
		y := m.respond(t, until)
		coarse, fine := m.march(t, until, 200), m.march(t, until, 400)
		if coarse == nil || fine == nil {
			continue
		}
		for i, x := range fine {
			if i < len(s.kinds) && s.kinds[i] == massless {
				continue
			}
			compared++
			allowed := math.Abs(x-coarse[i]) + 1e-8
			if got := y.At(i, until); math.Abs(got-x) > allowed {
				t.Errorf("network %d, output %d: %v, marched %v ± %v", k, i, got, x, allowed)
			}
		}
	}
	if compared < 50 {
		t.Errorf("%d numbers compared", compared)
	}
}

// march returns nodes and flows at the end, from rest, input i being (i+1)t.
func (m *flowing) march(t *testing.T, until float64, steps int) []float64 {
	t.Helper()
	return m.marchOn(make([]float64, len(m.kinds)+len(m.tubes.tubes)), 0, until, steps)
}

// marchOn marches from x at t0 to t1.
func (m *flowing) marchOn(x []float64, t0, t1 float64, steps int) []float64 {
	N := len(x)
	E, A, b := m.pencil(N)
	h := (t1 - t0) / float64(steps)
	stage, at := [2][2]float64{{5.0 / 12, -1.0 / 12}, {3.0 / 4, 1.0 / 4}}, [2]float64{1.0 / 3, 1}
	x = append([]float64(nil), x...)
	for n := range steps {
		// E k_p + A (x + h Σ a_pq k_q) = b u(t + c_p h)
		a, f := make([]complex128, 4*N*N), make([]complex128, 2*N)
		for p := range 2 {
			for i := range N {
				f[p*N+i] = complex(b[i]*(t0+(float64(n)+at[p])*h), 0)
				for j := range N {
					f[p*N+i] -= complex(A[i*N+j]*x[j], 0)
					for q := range 2 {
						v := h * stage[p][q] * A[i*N+j]
						if p == q {
							v += E[i*N+j]
						}
						a[(p*N+i)*2*N+q*N+j] = complex(v, 0)
					}
				}
			}
		}
		if !complexGauss(2*N, a, f) {
			return nil
		}
		for i := range N {
			x[i] += h * (stage[1][0]*real(f[i]) + stage[1][1]*real(f[N+i]))
		}
	}
	return x
}

// pencil returns E, A and what all inputs with slope i+1 bring.
func (m *flowing) pencil(N int) (E, A, b []float64) {
	E, A, b = make([]float64, N*N), make([]float64, N*N), make([]float64, N)
	for in, id := range m.inputs {
		at0, at1 := make([]complex128, N*N), make([]complex128, N*N)
		f := make([]complex128, N)
		m.fillNodes(at0, make([]complex128, N), in, 0)
		m.fillNodes(at1, f, in, 1)
		for k := range at0 {
			A[k], E[k] = real(at0[k]), real(at1[k]-at0[k])
		}
		for i := range f {
			b[i] += real(f[i]) * float64(id+1)
		}
	}
	n := len(m.kinds)
	for k, w := range m.tubes.tubes {
		E[(n+k)*N+n+k], A[(n+k)*N+n+k] = w.L, w.R
		A[(n+k)*N+w.from]--
		A[(n+k)*N+w.to]++
	}
	return E, A, b
}
