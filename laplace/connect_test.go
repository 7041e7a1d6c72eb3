package laplace

import (
	"math"
	"math/cmplx"
	"testing"

	"pgregory.net/rapid"
)

// drawnRoots draws real roots and pairs in the left half plane, apart from each other.
func drawnRoots(rt *rapid.T, name string, least, most int) []Pole {
	var list []Pole
	n := rapid.IntRange(least, most).Draw(rt, name)
	for len(list) < n {
		w := math.Pow(10, 0.4*(float64(len(list))+rapid.Float64Range(0, 0.7).Draw(rt, name+" modulus"))-1)
		if n-len(list) > 1 && rapid.Bool().Draw(rt, name+" pair") {
			angle := rapid.Float64Range(0.1, 1.5).Draw(rt, name+" angle")
			p := cmplx.Rect(w, math.Pi-angle)
			list = append(list, Pole{P: p, Mult: 1}, Pole{P: cmplx.Conj(p), Mult: 1})
			continue
		}
		list = append(list, Pole{P: complex(-w, 0), Mult: 1})
	}
	return list
}

func drawnTransfer(rt *rapid.T, name string) *Transfer {
	poles := drawnRoots(rt, name+" poles", 1, 4)
	zeros := drawnRoots(rt, name+" zeros", 0, len(poles))
	h, err := FromRoots(rapid.Float64Range(0.1, 3).Draw(rt, name+" lead"), zeros, poles)
	if err != nil {
		rt.Fatal(err)
	}
	return h
}

// sameAt compares at s, relative to the size that the parts have.
func sameAt(t interface{ Errorf(string, ...any) }, what string, got, want complex128, size float64) {
	if d := cmplx.Abs(got - want); !(d <= 1e-9*max(cmplx.Abs(want), size)) {
		t.Errorf("%s: %v, want %v, off by %.1e", what, got, want, d)
	}
}

// At random s, off the poles: products, sums and loops are what their names say, and
// so is every other form of each.
func TestConnectionsAtRandomS(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		g, k := drawnTransfer(rt, "G"), drawnTransfer(rt, "K")
		s := complex(rapid.Float64Range(0.5, 3).Draw(rt, "re s"), rapid.Float64Range(-9, 9).Draw(rt, "im s"))
		a, b := g.Eval(s), k.Eval(s)
		check := func(what string, h *Transfer, err error, want complex128) {
			if err != nil {
				rt.Fatalf("%s: %v", what, err)
			}
			sameAt(rt, what, h.Eval(s), want, cmplx.Abs(a)+cmplx.Abs(b))
		}
		h, err := Series(g, k)
		check("series", h, err, a*b)
		h, err = Parallel(g, k)
		check("parallel", h, err, a+b)
		h, err = g.Scaled(-2.5)
		check("scaled", h, err, -2.5*a)
		h, err = Feedback(g, k)
		if cmplx.Abs(1+a*b) > 0.05 {
			check("feedback", h, err, a/(1+a*b))
		}
	})
}

func TestFormsAtRandomS(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		poles := drawnRoots(rt, "poles", 1, 5)
		zeros := drawnRoots(rt, "zeros", 0, len(poles))
		lead := rapid.Float64Range(0.1, 3).Draw(rt, "lead")
		h, err := FromRoots(lead, zeros, poles)
		if err != nil {
			rt.Fatal(err)
		}
		s := complex(rapid.Float64Range(0.5, 3).Draw(rt, "re s"), rapid.Float64Range(-9, 9).Draw(rt, "im s"))
		want := complex(lead, 0)
		for _, z := range zeros {
			want *= s - z.P
		}
		for _, p := range poles {
			want /= s - p.P
		}
		sameAt(rt, "roots", h.Eval(s), want, 0)
		f := h.TimeConstants()
		sameAt(rt, "time constants", f.Eval(s), want, 0)
		rate, direct, list := h.PartialFractions()
		sum, size := complex(rate, 0)*s+complex(direct, 0), 0.0
		for _, x := range list {
			sum += x.Eval(s)
			size += cmplx.Abs(x.Eval(s))
		}
		sameAt(rt, "fractions", sum, want, size)
		if d := math.Abs(h.Lead() - lead); d > 1e-8*lead {
			rt.Errorf("lead %v, want %v", h.Lead(), lead)
		}
		r, err := FromRatio(product(lead, zeros), product(1, poles))
		if err != nil {
			rt.Fatal(err)
		}
		// rounded coefficients move poles that nearly coincide far, H(s) off them little
		sameAt(rt, "ratio", r.Eval(s), want, 100*cmplx.Abs(want))
	})
}

func must(t testing.TB) func(*Transfer, error) *Transfer {
	t.Helper()
	return func(h *Transfer, err error) *Transfer {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return h
	}
}

// An integrator of 2/s under unity feedback lags by 1/2 s, and a loop that only
// passes on, with a gain of −1, has no answer.
func TestFeedbackLoops(t *testing.T) {
	integrator := must(t)(FromRatio([]float64{2}, []float64{0, 1}))
	one := must(t)(FromRatio([]float64{1}, []float64{1}))
	h := must(t)(Feedback(integrator, one))
	if len(h.Poles) != 1 || math.Abs(real(h.Poles[0].P)+2) > 1e-15 || h.Gain != 1 {
		t.Errorf("%+v", h)
	}
	if _, err := Feedback(must(t)(one.Scaled(-1)), one); err == nil {
		t.Error("a loop of −1 without delay is answered")
	}
	if _, err := FromRatio([]float64{0, 0, 1}, []float64{1, 1}); err == nil {
		t.Error("an improper ratio is taken")
	}
	if _, err := FromRatio([]float64{1}, []float64{0}); err == nil {
		t.Error("a ratio over zero is taken")
	}
	if _, err := FromRoots(1, nil, []Pole{{P: complex(-1, 2), Mult: 1}}); err == nil {
		t.Error("half a pair is taken")
	}
	if _, err := FromRoots(1, []Pole{{P: -1, Mult: 2}}, []Pole{{P: -1, Mult: 1}}); err == nil {
		t.Error("more zeros than poles are taken")
	}
}

// The initial and final values of 3(s+2)/((s+1)(s+4)) + 0.5, and none where it grows.
func TestInitialAndFinal(t *testing.T) {
	a := must(t)(FromRoots(3, []Pole{{P: -2, Mult: 1}}, []Pole{{P: -1, Mult: 1}, {P: -4, Mult: 1}}))
	h := must(t)(Parallel(a, must(t)(FromRatio([]float64{0.5}, []float64{1}))))
	if v, slope := h.Initial(); v != 0.5 || math.Abs(slope-3) > 1e-14 {
		t.Errorf("begins at %v with %v", v, slope)
	}
	if v, ok := h.Final(); !ok || math.Abs(v-2) > 1e-14 {
		t.Errorf("ends at %v, %v", v, ok)
	}
	grows := must(t)(FromRatio([]float64{1}, []float64{-1, 1}))
	if _, ok := grows.Final(); ok {
		t.Error("what grows has a final value")
	}
	slow := must(t)(FromRatio([]float64{1}, []float64{1, 3, 3, 1}))
	if v, slope := slow.Initial(); v != 0 || slope != 0 || math.Abs(slow.Lead()-1) > 1e-12 {
		t.Errorf("1/(s+1)³ begins at %v with %v, lead %v", v, slope, slow.Lead())
	}
}

// A pair 1e-5 apart goes at 1e-4 and stays at 1e-6; the gain stays, the change is as
// stated; one on the right never goes.
func TestWithoutPairs(t *testing.T) {
	h := must(t)(FromRoots(2, []Pole{{P: -3.00003, Mult: 1}}, []Pole{{P: -3, Mult: 1}, {P: -1, Mult: 1}}))
	r, list, err := h.WithoutPairs(1e-4)
	if err != nil || len(list) != 1 || len(r.Poles) != 1 || len(r.Zeros) != 0 {
		t.Fatalf("%+v, %v, %v", r, list, err)
	}
	if math.Abs(r.Gain-h.Gain) > 1e-15*h.Gain || math.Abs(list[0].Change-1e-5) > 1e-9 {
		t.Errorf("gain %v for %v, change %v", r.Gain, h.Gain, list[0].Change)
	}
	for _, w := range []float64{0, 0.3, 3, 30, 3000} {
		s := complex(0, w)
		if d := cmplx.Abs(r.Eval(s)/h.Eval(s) - 1); d > 2*list[0].Change {
			t.Errorf("ω = %g: changed by %v", w, d)
		}
	}
	if r, list, _ := h.WithoutPairs(1e-6); r != h || list != nil {
		t.Errorf("dropped %v", list)
	}
	bad := must(t)(FromRoots(2, []Pole{{P: 3.00003, Mult: 1}}, []Pole{{P: 3, Mult: 1}, {P: -1, Mult: 1}}))
	if _, list, _ := bad.WithoutPairs(1e-3); list != nil {
		t.Errorf("dropped %v", list)
	}
	pairs := must(t)(FromRoots(1, []Pole{{P: complex(-1, 2.00001), Mult: 1}, {P: complex(-1, -2.00001), Mult: 1}},
		[]Pole{{P: complex(-1, 2), Mult: 1}, {P: complex(-1, -2), Mult: 1}, {P: -5, Mult: 1}}))
	if r, list, err := pairs.WithoutPairs(1e-4); err != nil || len(list) != 2 || len(r.Poles) != 1 {
		t.Errorf("%+v, %v, %v", r, list, err)
	}
}

// Poles in half-plane, sector and disc; an edge within the error bound decides nothing.
func TestRegion(t *testing.T) {
	r := Region{Decay: 1, Damping: 0.5, Fastest: 10}
	for _, c := range []struct {
		p    Pole
		want int // 0 inside, 1 undecided, 2 outside
	}{
		{Pole{P: -2, Mult: 1}, 0},
		{Pole{P: -0.5, Mult: 1}, 2},
		{Pole{P: complex(-2, 3), Mult: 1}, 0}, // ζ 0.555
		{Pole{P: complex(-2, 4), Mult: 1}, 2}, // ζ 0.447
		{Pole{P: -11, Mult: 1}, 2},
		{Pole{P: -1, Mult: 1, Radius: 1e-9}, 1},
		{Pole{P: -10, Mult: 1, Radius: 1e-9}, 1},
		{Pole{P: complex(-2, 2*math.Sqrt(3)), Mult: 1, Radius: 1e-9}, 1},
	} {
		outside, undecided := r.Judge([]Pole{c.p})
		if got := 2*len(outside) + len(undecided); got != c.want {
			t.Errorf("%v: %d, want %d", c.p.P, got, c.want)
		}
	}
	if outside, undecided := (Region{}).Judge([]Pole{{P: 5, Mult: 1}}); outside != nil || undecided != nil {
		t.Error("a region that asks nothing refuses")
	}
}
