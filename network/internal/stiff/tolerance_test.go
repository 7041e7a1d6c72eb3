package stiff

import (
	"math"
	"testing"
)

// adaptive integrates with step control and returns the largest error at the ends of
// steps and within them, relative to what is allowed in one step.
func (p *problem) adaptive(t *testing.T, tol float64) (end, within float64, g *Integrator) {
	t.Helper()
	n := len(p.sys.mass)
	g = New(p.sys, Control{RelTol: tol, Scale: ones(n)}, n)
	x := make([]float64, n)
	p.exact(0, x)
	g.Start(p.sys.mass, 0, x, p.end, 0)
	p.sys.factors = 0
	for g.T1 < p.end {
		if err := g.Step(p.end, math.Inf(1)); err != nil {
			t.Fatal(err)
		}
		p.exact(g.T1, x)
		for k := range x {
			end = max(end, math.Abs(g.X1[k]-x[k])/(tol*max(1, math.Abs(x[k]))))
		}
		for _, theta := range []float64{0.1, 0.25, 0.5, 0.75, 0.9} {
			p.exact(g.T0+theta*(g.T1-g.T0), x)
			for k := range x {
				within = max(within, math.Abs(g.At(k, theta)-x[k])/(tol*max(1, math.Abs(x[k]))))
			}
		}
	}
	return end, within, g
}

// The error follows the tolerance, at the ends of the steps and between them.
func TestErrorFollowsTolerance(t *testing.T) {
	for _, p := range problems() {
		for _, tol := range []float64{1e-4, 1e-6, 1e-7, 1e-9} {
			end, within, g := p.adaptive(t, tol)
			t.Logf("%-22s tol %.0e: %3d steps, %d taken back, error/tol %.3f, within %.3f", p.name, tol, g.Taken, g.Missed, end, within)
			if end > 10 || within > 10 {
				t.Errorf("%s, tolerance %g: error %.3g and %.3g times the tolerance", p.name, tol, end, within)
			}
			if p.sys.factors != g.Taken+g.Missed {
				t.Errorf("%s: %d factorisations for %d steps", p.name, p.sys.factors, g.Taken+g.Missed)
			}
		}
	}
}
