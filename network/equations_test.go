package network

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// anyEquations draws a network in a stretch [0, 1], with some elements shut by their modes.
func anyEquations(t *rapid.T) *equations {
	n, p := anyNonlinear(t)
	e, err := n.newEquations(p)
	if err != nil {
		t.Fatal(err)
	}
	s := e.blank()
	for k := range s.Modes {
		if e.law[k].switching != nil {
			s.Modes[k] = rapid.IntRange(0, 1).Draw(t, "mode")
		}
	}
	err = e.enter(s, 0, 1)
	if errors.As(err, new(*ParamFault)) {
		t.Skip(err.Error()) // what the drawn modes shut leaves something without a meaning: no draw
	}
	if err != nil {
		t.Fatal(err)
	}
	return e
}

// The Jacobian and the derivative by time are what central differences of the rates give,
// and the rates come out the same from both functions.
func TestEquationsJacobian(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		e := anyEquations(t)
		e.rest = rapid.Bool().Draw(t, "rest")
		n := e.size()
		x, f, ft, again := anyVector(t, n), make([]float64, n), make([]float64, n), make([]float64, n)
		jac := e.pattern().Like()
		e.jacobian(0.5, x, f, ft, jac)
		e.rates(0.5, x, again)
		for i := range f {
			if f[i] != again[i] {
				t.Fatalf("row %d: %v from jacobian, %v from rates", i, f[i], again[i])
			}
		}
		const h = 1e-5
		up, down := make([]float64, n), make([]float64, n)
		for j := range n {
			was := x[j]
			x[j] = was + h
			e.rates(0.5, x, up)
			x[j] = was - h
			e.rates(0.5, x, down)
			x[j] = was
			for i := range n {
				got := 0.0
				if slot := jac.Slot(i, j); slot >= 0 {
					got = jac.Val[slot]
				}
				if want := (up[i] - down[i]) / (2 * h); differs(got, want, 1e-6, 10+math.Abs(want)) {
					t.Fatalf("∂F%d/∂x%d = %v, differences give %v", i, j, got, want)
				}
			}
		}
		if e.rest {
			return
		}
		e.rates(0.5+h, x, up)
		e.rates(0.5-h, x, down)
		for i := range n {
			if want := (up[i] - down[i]) / (2 * h); differs(ft[i], want, 1e-6, 10+math.Abs(want)) {
				t.Fatalf("∂F%d/∂t = %v, differences give %v", i, ft[i], want)
			}
		}
	})
}

// What flows into the islands is what their stores take up: Σ over the nodes of an island of
// its balances is its net inflow.
func TestEquationsBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		e := anyEquations(t)
		x := anyVector(t, e.size())
		in, gross := make([]float64, e.balances()), make([]float64, e.balances())
		e.netInflow(0.25, x, in, gross)
		e.fill(0.25, x)
		e.sum()
		sum := make([]float64, e.balances())
		for _, n := range e.l.nodes {
			sum[e.group[n]] += e.acc[e.l.balance[n]]
		}
		for k := range sum {
			if differs(sum[k], in[k], 1e-12, 100+gross[k]) {
				t.Fatalf("island %d: balances sum to %v, net inflow %v", k, sum[k], in[k])
			}
		}
	})
}

// After project the algebraic rows hold, joints pass on what they get, and what is not
// algebraic has changed only where flows had to.
func TestProject(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		e := anyEquations(t)
		n := e.size()
		x := anyVector(t, n)
		e.restore(0, x)
		before := append([]float64(nil), x...)
		if err := e.project(0, x); err != nil {
			return // a flow into what is shut; messages have tests of their own
		}
		f := make([]float64, n)
		e.rates(0, x, f)
		for i, m := range e.m {
			if m == 0 && math.Abs(f[i]) > 1e-8 {
				t.Fatalf("row %d: %v left over", i, f[i])
			}
			if m != 0 && x[i] != before[i] && !e.isFlow(i) {
				t.Fatalf("unknown %d moved from %v to %v", i, before[i], x[i])
			}
		}
		for k := range e.top.joints {
			if sum, size := e.arriving(&e.top.joints[k]); math.Abs(sum) > 1e-10*(1+size) {
				t.Fatalf("joint %d: %v flows in and nowhere out", k, sum)
			}
		}
	})
}

func (e *equations) isFlow(i int) bool {
	for _, at := range e.l.flow {
		if int(at) == i {
			return true
		}
	}
	return false
}
