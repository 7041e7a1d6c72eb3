package stiff

import (
	"math"
	"testing"
)

// closing is a column with flow q before a valve that shuts within 8 s and behind which the
// pressure hardly changes the flow: q' = −z − q/2, 0 = s·(1 − ε·z) − q, s = 1 − t/8. For ε → 0
// z = 1/8 − s/2.
type closing struct {
	slack, t, q, z, shift float64
}

func (c *closing) Rates(t float64, x, f []float64) {
	s := 1 - t/8
	f[0], f[1] = -x[1]-x[0]/2, s*(1-c.slack*x[1])-x[0]
}

func (c *closing) Linearise(t float64, x, f, ft []float64) {
	c.Rates(t, x, f)
	c.t, c.q, c.z = t, x[0], x[1]
	ft[0], ft[1] = 0, -(1-c.slack*x[1])/8
}
func (c *closing) Factor(shift float64) error { c.shift = shift; return nil }

// Solve solves (shift + 1/2) u + v = a, u + s·ε·v = b.
func (c *closing) Solve(b []float64) {
	s := c.slack * (1 - c.t/8)
	det := (c.shift+0.5)*s - 1
	b[0], b[1] = (b[0]*s-b[1])/det, ((c.shift+0.5)*b[1]-b[0])/det
}

func (c *closing) Settle(float64, []float64) bool { return false }

// Where a rounding of the flow moves the pressure by more than the tolerance, and sooner than
// any step is long, the march goes on.
func TestWeaklyDetermined(t *testing.T) {
	const slack, begin, end = 1e-14, 7.0, 8 - 1e-6
	g := New(&closing{slack: slack}, Control{RelTol: 1e-7, Scale: []float64{1e-3, 1e-3}}, 2)
	s := 1 - begin/8
	g.Start([]float64{1, 0}, begin, []float64{s, 1./8 - s/2 + 1e-5}, end, 0)
	for g.T1 < end {
		if err := g.Step(end, math.Inf(1)); err != nil {
			t.Fatalf("%v after %d steps", err, g.Taken)
		}
		s := 1 - g.T1/8
		if e := math.Abs(g.X1[0] - s); e > 1e-6 {
			t.Fatalf("flow off by %g at %g", e, g.T1)
		}
		if e := math.Abs(g.X1[1] - (1./8 - s/2)); e > 1e-3 {
			t.Fatalf("pressure off by %g at %g", e, g.T1)
		}
	}
	t.Logf("%d steps, %d back", g.Taken, g.Missed)
}
