package study

import (
	"math"
	"slices"

	"lagbook/laplace"
	"lagbook/network"
)

// An expression is a result of values at one instant that is no sum. At, Left and Table
// are the expression itself; extremes, crossings, rates and the integral are those of
// polynomials through its values, as short as it takes.
type expression struct {
	*network.Trajectory
	of    *resulting
	outs  []int
	value func(x []float64) float64
	slack float64 // what the rounding of its operands makes of it
	start float64 // s
}

const (
	expressionNoise = 1e-10 // share of the largest value to which the polynomials follow
	gradedCuts      = 30    // halvings towards a break, behind which things move fast
	fewBreaks       = 20
	someBreaks      = 500
)

// newExpression traces one over a run; *network.NoValue says where it has none.
func (m *Model) newExpression(r *resulting, d *derivation, t0, t1 float64) (*expression, error) {
	x := &expression{of: r, outs: d.of, start: t0}
	val := m.val
	if d.ask.Expr != nil {
		x.value = func(v []float64) float64 { return d.ask.Expr.Eval(v, val) }
	} else {
		x.value = func(v []float64) float64 {
			sum := 0.0
			for i, t := range d.ask.Mean {
				sum += val.Num[t.Weight] * v[i]
			}
			return sum
		}
	}
	cuts := x.cuts(t0, t1)
	var err error
	x.Trajectory, err = network.Trace(cuts, expressionNoise, func(t float64) float64 { return x.At(0, t) }, func(t float64) float64 { return x.Left(0, t) })
	if err != nil {
		return nil, err
	}
	x.slack = x.carried(cuts)
	return x, nil
}

// cuts are the breaks of the run, instants ever nearer to the right of each, and the
// extremes of the operands.
func (x *expression) cuts(t0, t1 float64) []float64 {
	list := []float64{t0}
	for _, t := range x.of.Breaks() {
		if t > t0 && t < t1 {
			list = append(list, t)
		}
	}
	list = append(list, t1)
	halvings := 4
	switch n := len(list); {
	case n <= fewBreaks:
		halvings = gradedCuts
	case n <= someBreaks:
		halvings = gradedCuts / 3
	}
	for k, n := 0, len(list); k+1 < n; k++ {
		a, b := list[k], list[k+1]
		for h := 1; h <= halvings; h++ {
			if t := a + math.Ldexp(b-a, -h); t > a {
				list = append(list, t)
			}
		}
		if n <= fewBreaks {
			for _, out := range x.outs {
				list = append(list, x.of.Max(out, a, b).T, x.of.Min(out, a, b).T)
			}
		}
	}
	slices.Sort(list)
	return slices.Compact(list)
}

// carried estimates what the rounding of the operands makes of the value, at its worst of
// some instants.
func (x *expression) carried(cuts []float64) float64 {
	most, v := 0.0, make([]float64, len(x.outs))
	for k := 0; k+1 < len(cuts); k += 1 + len(cuts)/64 {
		t := cuts[k] + (cuts[k+1]-cuts[k])/2
		y, sum := x.At(0, t), 0.0
		for i := range v {
			v[i] = x.of.At(x.outs[i], t)
		}
		for i := range v {
			was := v[i]
			v[i] += x.of.Rounding(x.outs[i])
			if d := math.Abs(x.value(v) - y); d < math.Inf(1) {
				sum += d
			}
			v[i] = was
		}
		most = math.Max(most, sum)
	}
	return most
}

func (x *expression) At(_ int, t float64) float64 {
	v := make([]float64, len(x.outs))
	for i, out := range x.outs {
		v[i] = x.of.At(out, t)
	}
	return x.value(v)
}

func (x *expression) Left(_ int, t float64) float64 {
	v := make([]float64, len(x.outs))
	for i, out := range x.outs {
		v[i] = x.of.Left(out, t)
	}
	return x.value(v)
}

func (x *expression) Table(at []float64, y [][]float64) {
	for i, t := range at {
		y[0][i] = x.At(0, t)
	}
}

func (x *expression) Final(int) (float64, bool) {
	v := make([]float64, len(x.outs))
	for i, out := range x.outs {
		var ok bool
		if v[i], ok = x.of.Final(out); !ok {
			return 0, false
		}
	}
	y := x.value(v)
	return y, !math.IsNaN(y) && !math.IsInf(y, 0)
}

func (x *expression) Rounding(int) float64 { return x.Trajectory.Rounding(0) + x.slack }

// pieces is the number of polynomials, each through five instants.
func (x *expression) pieces() int { return 4*x.Trajectory.Pieces() + 1 }

// impulses are those of all operands.
func (x *expression) impulses() (list []laplace.Impulse) {
	for _, out := range x.outs {
		all, _ := x.of.Impulses(out)
		list = append(list, all...)
	}
	slices.SortStableFunc(list, func(a, b laplace.Impulse) int {
		switch {
		case a.T < b.T:
			return -1
		case a.T > b.T:
			return 1
		}
		return 0
	})
	return list
}
