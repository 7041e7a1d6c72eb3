package hydraulic

import (
	"math"
	"testing"

	"lagbook/network"
)

// A trial is a law at a point: its numbers of ports, unknowns and drives, the local
// variables in that order, and by how much to vary each.
type trial struct {
	law             network.Law
	ports, unknowns int
	x, step         []float64
	mem             []float64
	mode            int
}

func (c *trial) stamp(x []float64) *network.Stamp {
	n := c.ports + c.unknowns
	s := &network.Stamp{X: x, Rate: make([]float64, len(x)), Mem: c.mem, Mode: c.mode,
		F: make([]float64, n), DF: make([]float64, n*len(x)), DStoredBy: make([]float64, c.unknowns)}
	c.law.Eval(s)
	return s
}

// near tells whether a derivative agrees with a difference quotient, whose own error is
// taken from that with twice the step.
func near(got, once, twice, size float64) bool {
	return math.Abs(got-once) <= 4*math.Abs(once-twice)+1e-6*math.Abs(once)+size
}

// jacobian holds the derivatives of a law against central differences, and the sum of
// its flows against zero where conserves is set.
func (c *trial) jacobian(t *testing.T, name string, conserves bool) {
	t.Helper()
	at := c.stamp(c.x)
	moved := func(j int, by float64) *network.Stamp {
		x := append([]float64(nil), c.x...)
		x[j] += by * c.step[j]
		return c.stamp(x)
	}
	for j := range c.x {
		a1, b1, a2, b2 := moved(j, 1), moved(j, -1), moved(j, 2), moved(j, -2)
		slope := func(of func(*network.Stamp) float64) (once, twice, size float64) {
			size = 1e-15 * math.Abs(of(at)) / c.step[j]
			return (of(a1) - of(b1)) / (2 * c.step[j]), (of(a2) - of(b2)) / (4 * c.step[j]), 10 * size
		}
		for i := range at.F {
			once, twice, size := slope(func(s *network.Stamp) float64 { return s.F[i] })
			if got := at.DF[i*len(c.x)+j]; !near(got, once, twice, size) {
				t.Errorf("%s at %v: ∂F%d/∂x%d is %v, by differences %v", name, c.x, i, j, got, once)
			}
		}
		once, twice, size := slope(func(s *network.Stamp) float64 { return s.Stored })
		got := 0.0
		switch {
		case j == 0:
			got = at.DStored
		case j >= c.ports && j < c.ports+c.unknowns:
			got = at.DStoredBy[j-c.ports]
		}
		if !near(got, once, twice, size) {
			t.Errorf("%s at %v: ∂Stored/∂x%d is %v, by differences %v", name, c.x, j, got, once)
		}
	}
	sum, largest := 0.0, 0.0
	for i := range c.ports {
		sum, largest = sum+at.F[i], max(largest, math.Abs(at.F[i]))
	}
	if conserves && math.Abs(sum) > 1e-15*largest {
		t.Errorf("%s at %v: flows into the ports sum to %v", name, c.x, sum)
	}
	for _, y := range append(append([]float64(nil), at.F...), append(at.DF, at.Stored, at.DStored)...) {
		if math.IsNaN(y) || math.IsInf(y, 0) {
			t.Errorf("%s at %v: a number that is none", name, c.x)
		}
	}
}

// drops are differences of pressure over the whole range of a flow law, in Pa.
var drops = []float64{1e-6, 1e-3, 0.03, 0.1, 0.5, 7, 300, 2e4, 1e6, 3e7}

// through tests a Flow over its whole range: derivatives, which way they go, what it
// does at extremes.
func flowLaw(t *testing.T, name string, law network.Flow) {
	t.Helper()
	l := &network.Through{Flow: law}
	for _, d := range drops {
		for _, sign := range []float64{1, -1} {
			x := []float64{sign * d, 0}
			c := trial{law: l, ports: 2, x: x, step: []float64{d * 1e-4, d * 1e-4}}
			c.jacobian(t, name, true)
			if _, da, db := law.Flow(x[0], x[1]); da < 0 || db > 0 {
				t.Errorf("%s at %v: the flow falls as the drop grows: %v, %v", name, x, da, db)
			}
		}
	}
	for _, x := range [][2]float64{{0, 0}, {1e308, -1e308}, {-1e308, 1e308}, {1e-320, 0}} {
		q, da, db := law.Flow(x[0], x[1])
		if bad := q + da + db; math.IsNaN(bad) || math.IsInf(bad, 0) {
			t.Errorf("%s at %v: %v, %v, %v", name, x, q, da, db)
		}
	}
}

func TestFlows(t *testing.T) {
	for _, c := range []struct {
		name string
		law  network.Flow
	}{
		{"straight", flowOf(straight(3e7))},
		{"square root", flowOf(rooted(1e-6, 1e-5, 0.04))},
		{"square root of water", flowOf(rooted(6e-4, 0.0177, 1e-3))},
		{"power 1.75", &powerFlow{1e-5, leastCore, 1.75}},
		{"two ways", &twoWay{withSlope(1e-5, 1e-6), withSlope(3e-5, 1e-6)}},
	} {
		flowLaw(t, c.name, c.law)
	}
}

func flowOf(l powerFlow) *powerFlow { return &l }

// The core takes less than a millionth of the flow from 500 times its width on, and in it
// an opening creeps as Merritt's laminar coefficient says.
func TestCore(t *testing.T) {
	l := rooted(1e-6, 1e-5, 0.04)
	if slope := creeping(1e-5, 0.04); math.Abs(l.k/math.Sqrt(l.core)-slope) > 1e-12*slope {
		t.Errorf("slope at zero %v, creeping %v", l.k/math.Sqrt(l.core), slope)
	}
	d := 500 * l.core
	if q, _ := l.across(d); math.Abs(q/(l.k*math.Sqrt(d))-1) > 1.01e-6 {
		t.Errorf("at 500 cores %v of the square root", q/(l.k*math.Sqrt(d)))
	}
	back := &twoWay{withSlope(1e-5, 1e-6), withSlope(3e-5, 1e-6)}
	for _, d := range drops {
		forth, _, _ := back.Flow(d, 0)
		other := &twoWay{back.back, back.forth}
		if q, _, _ := other.Flow(0, d); q != -forth {
			t.Errorf("turned round at %v Pa: %v and %v", d, q, forth)
		}
	}
}
