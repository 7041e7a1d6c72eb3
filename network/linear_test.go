package network_test

import (
	"errors"
	"math"
	"math/cmplx"
	"slices"
	"strings"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// Poles: 1e-13 relative each where all branches are resistances, 1e-12 for other
// simple poles; the members of a defective multiple pole within 1e-5 and their
// number right. A pole at 0 is exactly 0.
func TestSuitePoles(t *testing.T) {
	each(t, func(t *testing.T, m *model) {
		tol := 1e-12
		if m.isRC() {
			tol = 1e-13
		}
		var want []complex128
		for _, p := range m.Poles {
			for range int(p[2]) {
				want = append(want, complex(p[0], p[1]))
			}
		}
		var got []complex128
		for _, p := range m.reduce(t).System.Poles() {
			for range p.Mult {
				got = append(got, p.P)
			}
		}
		if len(got) != len(want) {
			t.Fatalf("%d poles, want %d: %v", len(got), len(want), got)
		}
		worst := 0.0
		for i, w := range want {
			if w == 0 {
				if got[i] != 0 {
					t.Errorf("pole %d is %v, want exactly 0", i, got[i])
				}
				continue
			}
			worst = max(worst, cmplx.Abs(got[i]-w)/cmplx.Abs(w))
		}
		t.Logf("worst relative error %.1e", worst)
		if worst > tol {
			t.Errorf("worst relative error of a pole %.2e, allowed %.0e", worst, tol)
		}
	})
}

// Responses from rest to step, ramp, pulse, polyline and sine: 1e-12 of the range.
// The range of an output that is a sum is the sum of its terms' ranges; between
// two nearly identical resistance–capacitance branches (T28) it is the sum of the
// weights of the poles, which cancel but for one part in 1e12.
func TestSuiteResponses(t *testing.T) {
	worst := 0.0
	each(t, func(t *testing.T, m *model) {
		for _, pair := range m.Pairs {
			if pair.Zero {
				continue
			}
			for kind, w := range pair.waves(t) {
				e := m.compare(t, &pair, w.u, w.s)
				worst = max(worst, e)
				if e > 1e-12 {
					t.Errorf("%s → %s, %s: error over range %.2e", pair.In, pair.Out, kind, e)
				}
			}
		}
	})
	t.Logf("worst error over range %.1e", worst)
}

func (m *model) compare(t *testing.T, pair *suitePair, u laplace.Waveform, s samples) float64 {
	t.Helper()
	p := *m.p
	p.Wave = slices.Clone(m.p.Wave)
	for i, in := range m.input[pair.In] {
		p.Wave[in] = u.Scaled(m.gain[pair.In][i])
	}
	o := m.outs[m.out(pair.Out)]
	outs := []network.Output{o}
	var coef []float64
	terms := o.Terms
	if o.Flow != nil && o.Flow.Kind == network.ResistanceFlow {
		r := m.Resistances[o.Flow.Resistance]
		terms = []network.Term{{Node: m.node[r.name(1)], Coef: 1 / r.value()}, {Node: m.node[r.name(2)], Coef: 1 / r.value()}}
	}
	for _, term := range terms {
		outs = append(outs, m.net.Level(term.Node))
		coef = append(coef, math.Abs(term.Coef))
	}
	r, err := m.net.Reduce(&p, outs)
	if err != nil {
		t.Fatal(err)
	}
	resp, err := r.Respond(&p, s.T[len(s.T)-1])
	if err != nil {
		t.Fatal(err)
	}
	scale, worst := 0.0, 0.0
	for i, at := range s.T {
		sum := 0.0
		for k, c := range coef {
			sum += c * math.Abs(resp.At(1+k, at))
		}
		scale = max(scale, sum, math.Abs(s.Y[i]))
		worst = max(worst, math.Abs(resp.At(0, at)-s.Y[i]))
	}
	if m.reciprocal() {
		scale = max(scale, pair.weights())
	}
	return worst / scale
}

// isRC tells whether all branches are resistances, reciprocal whether all are
// resistances and inertances.
func (m *model) isRC() bool { return m.reciprocal() && len(m.Inertances) == 0 }

func (m *model) reciprocal() bool { return len(m.Streams)+len(m.Feedbacks) == 0 }

// weights is the sum of what each pole contributes to a step response.
func (p *suitePair) weights() float64 {
	sum := 0.0
	for _, r := range p.Residues {
		pole := math.Hypot(r[0].(float64), r[1].(float64))
		for k, c := range r[2].([]any) {
			if pole != 0 {
				sum += math.Hypot(c.([]any)[0].(float64), c.([]any)[1].(float64)) / math.Pow(pole, float64(k+1))
			}
		}
	}
	return sum
}

func TestSuiteTransfers(t *testing.T) {
	each(t, func(t *testing.T, m *model) {
		r := m.reduce(t)
		for _, pair := range m.Pairs {
			if len(m.input[pair.In]) > 1 {
				continue // a source into several nodes is several inputs here
			}
			h, err := r.System.Transfer(int(m.input[pair.In][0]), m.out(pair.Out))
			if err != nil {
				t.Fatal(err)
			}
			name := pair.In + " → " + pair.Out
			if h.Zero != pair.Zero {
				t.Errorf("%s: identically zero %v, want %v", name, h.Zero, pair.Zero)
			}
			if pair.Zero {
				continue
			}
			if h.RelativeDegree != pair.Degree {
				t.Errorf("%s: relative degree %d, want %d", name, h.RelativeDegree, pair.Degree)
			}
			if h.HasGain != (pair.Gain != nil) {
				t.Errorf("%s: has a gain: %v, want %v", name, h.HasGain, pair.Gain != nil)
			} else if h.HasGain && math.Abs(h.Gain-*pair.Gain) > 1e-12*m.gainScale(t, &pair) {
				t.Errorf("%s: gain %v, want %v", name, h.Gain, *pair.Gain)
			}
			for what, c := range map[string][2][]float64{"numerator": {h.Numerator, pair.Num}, "denominator": {h.Denominator, pair.Den}} {
				if got, want := c[0], c[1]; len(m.Poles) <= 6 && !closeTo(got, want, 1e-12) {
					t.Errorf("%s: %s %v, want %v", name, what, got, want)
				}
			}
			checkZeros(t, name, h.Zeros, pair.Zeros)
			// Pairs of a pole and a zero closer than double precision may be dropped.
			zeros, cancelled := order(h.Zeros), order(h.Cancelled)
			lost := m.closePairs(&pair)
			if zeros+cancelled != count(pair.Zeros)+count(pair.Cancelled) || zeros < count(pair.Zeros)-lost || zeros > count(pair.Zeros) {
				t.Errorf("%s: %d zeros and %d cancelled, want %d and %d", name, zeros, cancelled, count(pair.Zeros), count(pair.Cancelled))
			}
		}
	})
}

// gainScale is the sum of the sizes of what a gain is made of: a difference of two
// levels can have a gain of 0.
func (m *model) gainScale(t *testing.T, pair *suitePair) float64 {
	o := m.outs[m.out(pair.Out)]
	terms := o.Terms
	if o.Flow != nil {
		return math.Abs(*pair.Gain)
	}
	outs := make([]network.Output, len(terms))
	for i, term := range terms {
		outs[i] = m.net.Level(term.Node)
	}
	r, err := m.net.Reduce(m.p, outs)
	if err != nil {
		t.Fatal(err)
	}
	sum := math.Abs(*pair.Gain)
	for i, term := range terms {
		g, _ := r.System.Gain(int(m.input[pair.In][0]), i)
		sum += math.Abs(term.Coef * g)
	}
	return sum
}

// checkZeros compares simple zeros, 1e-12 relative, where none was dropped.
func checkZeros(t *testing.T, name string, got []laplace.Pole, want [][3]float64) {
	t.Helper()
	if len(got) != len(want) {
		return
	}
	for i, w := range want {
		z := complex(w[0], w[1])
		if w[2] == 1 && cmplx.Abs(got[i].P-z) > 1e-12*cmplx.Abs(z) {
			t.Errorf("%s: zero %d is %v, want %v", name, i, got[i].P, z)
		}
	}
}

// closeTo compares coefficients, each relative to itself.
func closeTo(got, want []float64, tol float64) bool {
	if len(got) != len(want) {
		return false
	}
	for i, w := range want {
		if math.Abs(got[i]-w) > tol*math.Abs(w) {
			return false
		}
	}
	return true
}

// closePairs counts zeros within 1e-13 of a pole.
func (m *model) closePairs(pair *suitePair) int {
	n := 0
	for _, z := range pair.Zeros {
		for _, p := range m.Poles {
			if math.Hypot(z[0]-p[0], z[1]-p[1]) < 1e-13*math.Hypot(p[0], p[1]) {
				n++
				break
			}
		}
	}
	return n
}

func count(roots [][3]float64) int {
	n := 0
	for _, r := range roots {
		n += int(r[2])
	}
	return n
}

func order(poles []laplace.Pole) int {
	n := 0
	for _, p := range poles {
		n += p.Mult
	}
	return n
}

// Measures of the unit step: 1e-10 relative, less where the output is what is left
// of larger terms that cancel (T28); percentages that are 0 to 1e-10 %.
func TestSuiteMeasures(t *testing.T) {
	each(t, func(t *testing.T, m *model) {
		r := m.reduce(t)
		for _, pair := range m.Pairs {
			if pair.Zero || len(m.input[pair.In]) > 1 {
				continue
			}
			got, err := r.System.Step(int(m.input[pair.In][0]), m.out(pair.Out))
			if err != nil {
				t.Fatal(err)
			}
			tol := 1e-10 + 1e-12*m.cancellation(t, &pair)
			for key, have := range map[string]*float64{
				"final": got.Final, "rise_10_90": got.RiseTime, "settling_2pct": got.Settling2, "settling_5pct": got.Settling5,
				"overshoot_pct": got.Overshoot, "undershoot_pct": got.Undershoot, "peak_time": got.PeakTime,
			} {
				want, ok := pair.Metrics[key].(float64)
				switch {
				case !ok:
				case have == nil:
					t.Errorf("%s → %s: no %s, want %v", pair.In, pair.Out, key, want)
				case math.Abs(*have-want) > tol*max(math.Abs(want), 1):
					t.Errorf("%s → %s: %s is %v, want %v", pair.In, pair.Out, key, *have, want)
				}
			}
		}
	})
}

// cancellation is how much larger the terms of a step response are than itself.
func (m *model) cancellation(t *testing.T, pair *suitePair) float64 {
	span, sum := 0.0, 0.0
	for _, y := range pair.Step.Y {
		span = max(span, math.Abs(y))
	}
	if pair.Gain != nil {
		sum = m.gainScale(t, pair)
	}
	if m.reciprocal() {
		sum = max(sum, pair.weights())
	}
	return max(1, sum/span)
}

// The first time a unit step response reaches a level, through the whole way from
// the network: 1e-10 relative.
func TestSuiteThresholds(t *testing.T) {
	each(t, func(t *testing.T, m *model) {
		for _, pair := range m.Pairs {
			if pair.Zero || pair.Threshold == nil {
				continue
			}
			p := *m.p
			p.Wave = slices.Clone(m.p.Wave)
			for i, in := range m.input[pair.In] {
				p.Wave[in] = laplace.Constant(m.gain[pair.In][i]).WithBefore(0)
			}
			r, err := m.net.Reduce(&p, m.outs)
			if err != nil {
				t.Fatal(err)
			}
			level, want := pair.Threshold[0], pair.Threshold[1]
			resp, err := r.Respond(&p, 2*want+1)
			if err != nil {
				t.Fatal(err)
			}
			if want == 0 { // there by the jump at t = 0
				if y := resp.At(m.out(pair.Out), 0); math.Abs(y) < math.Abs(level) {
					t.Errorf("%s → %s begins at %v, want beyond %v", pair.In, pair.Out, y, level)
				}
				continue
			}
			root, ok := resp.First(m.out(pair.Out), level, 0, 2*want+1)
			if !ok || relative(root.T, want) > 1e-10+1e-12*m.cancellation(t, &pair) {
				t.Errorf("%s → %s reaches %v at %v (%v), want %v", pair.In, pair.Out, level, root.T, ok, want)
			}
		}
	})
}

// What has no answer is refused, with the right nodes named.
func TestSuiteRefusals(t *testing.T) {
	want := map[string]string{
		"X01-floating-massless-island": "undetermined a b",
		"X02-isolated-massless-node":   "unconnected a",
		"X03-massless-feedback-cancel": "singular massless a",
		"X04-massless-feedback-flip":   "flipped massless a",
		"X05-zero-resistance":          "bad number a b",
		"X06-negative-capacity":        "bad number a",
		"X07-transport-sink-imbalance": "unbalanced a",
	}
	seen := 0
	for _, s := range loadSuite(t) {
		if !s.Refused {
			continue
		}
		seen++
		t.Run(s.ID, func(t *testing.T) {
			m, err := build(&s)
			if err == nil {
				_, err = m.net.Reduce(m.p, nil)
			}
			list := faultsOf(err)
			if len(list) != 1 {
				t.Fatalf("%d faults, want one: %v", len(list), err)
			}
			var names []string
			for _, n := range s.Nodes {
				names = append(names, n.name(0))
			}
			if got := describe(list[0], append(names, s.Held...)); got != want[s.ID] {
				t.Errorf("fault %q, want %q (%v)", got, want[s.ID], err)
			}
			if !strings.Contains(err.Error(), `"a"`) && !strings.Contains(err.Error(), `"Rab"`) {
				t.Errorf("message names nothing: %v", err)
			}
			if len(list[0].Refs) == 0 || list[0].Refs[0] == network.NoRef {
				t.Errorf("no reference in %+v", list[0])
			}
		})
	}
	if seen != len(want) {
		t.Errorf("%d ill-posed networks in testdata, want %d", seen, len(want))
	}
}

func faultsOf(err error) []network.Fault {
	var structure *network.Faults
	var params *network.ParamFault
	switch {
	case errors.As(err, &structure):
		return structure.List
	case errors.As(err, &params):
		return params.List
	}
	return nil
}
