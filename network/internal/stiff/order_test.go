package stiff

import (
	"math"
	"testing"
)

// A problem has a known solution.
type problem struct {
	name  string
	sys   *dense
	exact func(t float64, x []float64)
	end   float64
	order float64 // of the end value, at least
	dense float64 // of the values within steps, at least
	steps int     // the coarser number of steps
}

func problems() []problem {
	logistic := newDense(1)
	logistic.rates = func(_ float64, x, f []float64) { f[0] = x[0] * (1 - x[0]) }
	logistic.jac = func(_ float64, x []float64, j [][]float64) { j[0][0] = 1 - 2*x[0] }

	driven := newDense(2) // 2 x′ = 2 cos t · x, x = exp(sin t)
	driven.rates = func(t float64, x, f []float64) { f[0] = 2 * math.Cos(t) * x[0] }
	driven.jac = func(t float64, _ []float64, j [][]float64) { j[0][0] = 2 * math.Cos(t) }
	driven.drift = func(t float64, x, ft []float64) { ft[0] = -2 * math.Sin(t) * x[0] }

	// index 1, autonomous: a′ = −a b, 0 = b² − a − 1 + …: with b = 1 + a: a′ = −a(1+a)
	dae := newDense(1, 0)
	dae.rates = func(_ float64, x, f []float64) {
		f[0] = -x[0] * x[1]
		f[1] = (1+x[0])*(1+x[0]) - x[1]*x[1]
	}
	dae.jac = func(_ float64, x []float64, j [][]float64) {
		j[0][0], j[0][1] = -x[1], -x[0]
		j[1][0], j[1][1] = 2*(1+x[0]), -2*x[1]
	}

	// index 1 with time: a′ = −a + b, 0 = b³ − sin³ t·…, b = 2 + sin t
	timed := newDense(1, 0)
	timed.rates = func(t float64, x, f []float64) {
		s := 2 + math.Sin(t)
		f[0], f[1] = -x[0]+x[1], s*s*s-x[1]*x[1]*x[1]
	}
	timed.jac = func(_ float64, x []float64, j [][]float64) {
		j[0][0], j[0][1], j[1][0], j[1][1] = -1, 1, 0, -3*x[1]*x[1]
	}
	timed.drift = func(t float64, _, ft []float64) {
		s := 2 + math.Sin(t)
		ft[0], ft[1] = 0, 3*s*s*math.Cos(t)
	}

	stiffly := newDense(1) // Prothero and Robinson: x′ = −10⁶ (x − sin t) + cos t
	const lambda = 1e6
	stiffly.rates = func(t float64, x, f []float64) { f[0] = -lambda*(x[0]-math.Sin(t)) + math.Cos(t) }
	stiffly.jac = func(_ float64, _ []float64, j [][]float64) { j[0][0] = -lambda }
	stiffly.drift = func(t float64, _, ft []float64) { ft[0] = lambda*math.Cos(t) - math.Sin(t) }

	return []problem{
		{"logistic", logistic, func(t float64, x []float64) { x[0] = 1 / (1 + 9*math.Exp(-t)) }, 4, 4.7, 4.5, 8},
		{"driven", driven, func(t float64, x []float64) { x[0] = math.Exp(math.Sin(t)) }, 3, 4.7, 4.5, 8},
		{"index 1", dae, func(t float64, x []float64) {
			q := math.Exp(-t) / 2
			x[0] = q / (1 - q)
			x[1] = 1 + x[0]
		}, 3, 4.7, 3.9, 64},
		{"index 1 with time", timed, func(t float64, x []float64) {
			x[0] = 2 - 1.5*math.Exp(-t) + (math.Sin(t)-math.Cos(t))/2
			x[1] = 2 + math.Sin(t)
		}, 3, 4.7, 3.9, 24},
		{"Prothero and Robinson", stiffly, func(t float64, x []float64) { x[0] = math.Sin(t) }, 3, 3, 3.9, 4},
	}
}

// fixed goes to the end in equal steps, whatever the error, and returns the largest
// error at the end and within the steps, over all unknowns.
func (p *problem) fixed(steps int) (end, within float64) {
	n := len(p.sys.mass)
	g := New(p.sys, Control{RelTol: 1e9, Scale: ones(n)}, n)
	x := make([]float64, n)
	p.exact(0, x)
	h := p.end / float64(steps)
	g.Start(p.sys.mass, 0, x, p.end, h)
	for range steps {
		g.h, g.pace = h, pace{}
		if err := g.Step(100*p.end, h); err != nil {
			panic(err)
		}
		for _, theta := range []float64{0.2, 0.4, 0.5, 0.6, 0.8} {
			p.exact(g.T0+theta*h, x)
			for k := range x {
				within = max(within, math.Abs(g.At(k, theta)-x[k]))
			}
		}
	}
	p.exact(g.T1, x)
	for k := range x {
		end = max(end, math.Abs(g.X1[k]-x[k]))
	}
	return end, within
}

// The order that the conditions of order promise shows in the error: halving the step
// divides it by 2^5 on smooth problems; on the stiff one driven by time, where methods
// of this kind fall to order 1 or 2, by 2^4.
func TestOrderShows(t *testing.T) {
	for _, p := range problems() {
		a, ia := p.fixed(p.steps)
		b, ib := p.fixed(2 * p.steps)
		c, ic := p.fixed(4 * p.steps)
		t.Logf("%-22s end %.2e %.2e %.2e order %.2f %.2f  within %.2e %.2e %.2e order %.2f %.2f", p.name, a, b, c,
			math.Log2(a/b), math.Log2(b/c), ia, ib, ic, math.Log2(ia/ib), math.Log2(ib/ic))
		if got := math.Log2(b / c); got < p.order {
			t.Errorf("%s: order %.2f, want %.2f or more", p.name, got, p.order)
		}
		if got := math.Log2(ib / ic); got < p.dense {
			t.Errorf("%s: order within steps %.2f, want %.2f or more", p.name, got, p.dense)
		}
	}
}
