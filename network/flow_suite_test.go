package network_test

import (
	"math"
	"math/cmplx"
	"testing"

	"lagbook/laplace"
)

// H(iω) from the modes and from the equations: 1e-12 relative where the residues do
// not cancel, as here; improper transfers included.
func TestSuiteFrequencies(t *testing.T) {
	seen := 0
	each(t, func(t *testing.T, m *model) {
		r := m.reduce(t)
		for _, pair := range m.Pairs {
			if pair.Freq == nil {
				continue
			}
			seen++
			h, err := r.System.Transfer(int(m.input[pair.In][0]), m.out(pair.Out))
			if err != nil {
				t.Fatal(err)
			}
			f, err := h.Frequency()
			if err != nil {
				t.Fatal(err)
			}
			for _, w := range pair.Freq {
				want := complex(w[1], w[2])
				if got := f.At(w[0]).H; cmplx.Abs(got-want) > 1e-12*cmplx.Abs(want) {
					t.Errorf("%s → %s at %v: %v from the equations, want %v", pair.In, pair.Out, w[0], got, want)
				}
				if got := h.Eval(complex(0, w[0])); cmplx.Abs(got-want) > 1e-12*max(cmplx.Abs(want), pair.weights()) {
					t.Errorf("%s → %s at %v: %v from the modes, want %v", pair.In, pair.Out, w[0], got, want)
				}
			}
		}
	})
	if seen < 20 {
		t.Errorf("%d transfers compared", seen)
	}
}

// What passes at once, and the impulse with which an improper output answers a step.
func TestSuiteImproper(t *testing.T) {
	improper := 0
	each(t, func(t *testing.T, m *model) {
		r := m.reduce(t)
		for _, pair := range m.Pairs {
			if pair.Poly == nil {
				continue
			}
			out := m.out(pair.Out)
			h, err := r.System.Transfer(int(m.input[pair.In][0]), out)
			if err != nil {
				t.Fatal(err)
			}
			if !closeTo(h.Polynomial(), pair.Poly, 1e-13) {
				t.Errorf("%s → %s: polynomial part %v, want %v", pair.In, pair.Out, h.Polynomial(), pair.Poly)
			}
			if pair.Impulse == nil {
				continue
			}
			improper++
			if h.Form != "improper" || h.RelativeDegree != -1 {
				t.Errorf("%s → %s: form %q of degree %d", pair.In, pair.Out, h.Form, h.RelativeDegree)
			}
			p := *m.p
			p.Wave = append([]laplace.Waveform(nil), p.Wave...)
			p.Wave[m.input[pair.In][0]] = laplace.Step(0, 1, 0)
			resp, err := r.Respond(&p, 1)
			if err != nil {
				t.Fatal(err)
			}
			list, err := resp.Impulses(out)
			if err != nil || len(list) != 1 || list[0].T != 0 || math.Abs(list[0].Weight-pair.Impulse[0]) > 1e-13*math.Abs(pair.Impulse[0]) {
				t.Errorf("%s → %s: impulses %v (%v), want one at 0 of %v", pair.In, pair.Out, list, err, pair.Impulse)
			}
		}
	})
	if improper < 2 {
		t.Errorf("%d improper transfers in testdata, want a supply and a joint", improper)
	}
}
