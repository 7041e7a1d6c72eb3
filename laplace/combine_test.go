package laplace

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"
)

// sameWave compares two waves on both sides of many instants, to a share of their size.
func sameWave(t rapid.TB, what string, got Waveform, want func(t float64, left bool) float64, tol float64, until float64) {
	t.Helper()
	got.check()
	for k := range 241 {
		at := until * (float64(k)*0.0042497131 - 0.01) // on no break
		for _, left := range []bool{false, true} {
			v := got.At(at)
			if left {
				v = got.Left(at)
			}
			if off := math.Abs(v - want(at, left)); !(off <= tol) {
				t.Fatalf("%s at %g s (left %v): %v, want %v: off by %.1e", what, at, left, v, want(at, left), off)
			}
		}
	}
}

func valueOf(w Waveform, at float64, left bool) float64 {
	if left {
		return w.Left(at)
	}
	return w.At(at)
}

// Sums and products are those of the values; they commute, and power and quotient undo them.
func TestCombinedValues(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		const end = 8
		a, b := drawWave(t, end), drawWave(t, end)
		size := (1 + a.size(end)) * (1 + b.size(end))
		tol := 1e-13 * size
		both := func(op func(x, y float64) float64) func(float64, bool) float64 {
			return func(at float64, left bool) float64 { return op(valueOf(a, at, left), valueOf(b, at, left)) }
		}
		plus := func(x, y float64) float64 { return x + y }
		into := func(x, y float64) float64 { return x * y }
		var closed *NotClosed
		var apartFor *NotCommensurate
		refused := func(err error) bool {
			if err != nil && !errors.As(err, &closed) && !errors.As(err, &apartFor) {
				t.Fatal(err)
			}
			return err != nil
		}
		if s, err := Sum(a, b); !refused(err) {
			sameWave(t, "sum", s, both(plus), tol, end)
			r, err := Sum(b, a)
			if err != nil {
				t.Fatal(err)
			}
			sameWave(t, "b + a", r, func(at float64, left bool) float64 { return valueOf(s, at, left) }, tol, end)
		}
		if p, err := Product(a, b); !refused(err) {
			sameWave(t, "product", p, both(into), tol, end)
			q, err := Product(b, a)
			if err != nil {
				t.Fatal(err)
			}
			sameWave(t, "b·a", q, func(at float64, left bool) float64 { return valueOf(p, at, left) }, tol, end)
		}
		n := rapid.IntRange(0, 3).Draw(t, "n")
		if p, err := Power(a, n); !refused(err) {
			sameWave(t, "power", p, both(func(x, _ float64) float64 { return math.Pow(x, float64(n)) }), 1e-13*math.Pow(1+a.size(end), float64(n)), end)
		}
		if p, err := Quotient(a, Step(2, -3, 1)); !refused(err) {
			s := Step(2, -3, 1)
			sameWave(t, "quotient", p, func(at float64, left bool) float64 { return valueOf(a, at, left) / valueOf(s, at, left) }, tol, end)
		}
	})
}

// The rate of a product is that of its factors: (ab)′ = a′b + ab′; and time scales out.
func TestRateOfProduct(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		draw := func() Waveform {
			w := bent(rapid.IntRange(1, 6).Draw(t, "degree")).Scaled(ordinary(-2, 2).Draw(t, "k"))
			w.Segments[1].At = rapid.Float64Range(0.5, 1.5).Draw(t, "at")
			return w
		}
		a, b := draw(), draw()
		p, err := Product(a, b)
		if err != nil {
			t.Fatal(err)
		}
		rate, ra, rb := p.Rate(), a.Rate(), b.Rate()
		size := 13 * (1 + rate.size(2)) * (1 + a.size(2)) * (1 + b.size(2))
		sameWave(t, "rate", rate, func(at float64, left bool) float64 {
			if at < 0 || at == 0 && left {
				return 0
			}
			return valueOf(ra, at, left)*valueOf(b, at, left) + valueOf(a, at, left)*valueOf(rb, at, left)
		}, 1e-14*size, 2)
		slow, err := Product(inTime(a, 3), inTime(b, 3))
		if d := cmp.Diff(inTime(p, 3), slow); err != nil || d != "" {
			t.Fatal(err, d)
		}
	})
}

// A sum and a product answer as their parts do: a response is linear, and a square of a sum is
// the sum of squares and twice the product.
func TestSquareOfSum(t *testing.T) {
	must := wave(t)
	a := must(Points([][2]float64{{0, 0}, {1, 3}, {2, 3}, {5, -1}}))
	b := must(must(Pulse(PulseTrain{Low: 1, High: 4, Width: 0.3, Period: 0.8})).Unrolled(9))
	square := must(Power(must(Sum(a, b)), 2))
	parts := must(Sum(must(Power(a, 2)), must(Sum(must(Power(b, 2)), must(Product(a, b)).Scaled(2)))))
	s := parallelLags(t, 0.1, 2)
	x, err := s.Respond([]Waveform{square}, nil, 8)
	if err != nil {
		t.Fatal(err)
	}
	y, err := s.Respond([]Waveform{parts}, nil, 8)
	if err != nil {
		t.Fatal(err)
	}
	for k := range 200 {
		at := 8 * float64(k) / 199
		near(t, "response", x.At(0, at), y.At(0, at), 1e-13)
	}
	breaks, err := square.Breaks(0, 4, 100)
	if err != nil {
		t.Fatal(err)
	}
	if want := []float64{0, 0.3, 0.8, 1, 1.1}; !cmp.Equal(breaks[:5], want, near15) {
		t.Errorf("breaks %v, want %v", breaks[:5], want)
	}
}

// Periods in whole-number ratios make a common one, and what has settled by then counts as it is.
func TestCombinedPeriods(t *testing.T) {
	must := wave(t)
	saw := must(must(Points([][2]float64{{0, 0}, {0.3, 3}})).Repeated(0.3))
	train := must(Pulse(PulseTrain{High: 2, Width: 0.05, Period: 0.2, At: 0.1}))
	p := must(Product(saw, train))
	if math.Abs(p.Period-0.6) > 1e-15 || !p.Repeats() {
		t.Fatalf("period %v", p.Period)
	}
	sameWave(t, "product", p, func(at float64, left bool) float64 {
		return valueOf(saw, at+1e-9, left) * valueOf(train, at+1e-9, left)
	}, 1e-7, 0.1)
	for k := range 300 {
		at := 0.0137 * float64(k)
		if got, want := p.At(at), saw.At(at)*train.At(at); math.Abs(got-want) > 1e-12 {
			t.Errorf("at %g s: %v, want %v", at, got, want)
		}
	}
	later := must(Sum(p, Step(1, 5, 7.05)))
	if at := later.Segments[later.Repeat].At; at < 7.05 || later.Period != p.Period {
		t.Errorf("repeats from %v with %v", at, later.Period)
	}
	for k := range 300 {
		at := 0.0437 * float64(k)
		if got, want := later.At(at), p.At(at)+Step(1, 5, 7.05).At(at); math.Abs(got-want) > 1e-12 {
			t.Errorf("sum at %g s: %v, want %v", at, got, want)
		}
	}
	gated := must(Product(train, Sine(0, 1, 2*math.Pi/0.7, 0)))
	if math.Abs(gated.Period-1.4) > 1e-14 {
		t.Errorf("a gated sine repeats after %v s, want 1.4", gated.Period)
	}
	if square := must(Power(Sine(0, 2, 3, 0.4), 2)); len(square.Segments) != 1 || len(square.Segments[0].Exp) != 1 || math.Abs(square.Segments[0].A-2) > 1e-15 || square.Segments[0].Exp[0].Rate != 6i {
		t.Errorf("the square of a sine is %+v", square)
	}
}

func TestCombinationsRefused(t *testing.T) {
	must := wave(t)
	ramp := Waveform{Segments: []Segment{{B: 1}}}
	train := must(Pulse(PulseTrain{High: 2, Width: 0.05, Period: 0.2, At: 0.1}))
	decay := must(Decay([][2]float64{{1, 2}}))
	for _, c := range []struct {
		want string
		make func() (Waveform, error)
	}{
		{"time to the power of 13, and at most 12", func() (Waveform, error) { return Power(ramp, 13) }},
		{"a ramp or a power of time times an exponential", func() (Waveform, error) { return Product(ramp, decay) }},
		{"a divisor that moves", func() (Waveform, error) { return Power(ramp.Plus(1), -1) }},
		{"the wave is infinite before 0 s", func() (Waveform, error) { return Power(ramp, -1) }},
		{"a divisor that moves", func() (Waveform, error) { return Quotient(ramp, decay) }},
		{"from 0 s on the wave has no closed form: one part repeats, of another it goes on straight", func() (Waveform, error) { return Sum(train, ramp) }},
		{"one part repeats, another dies away", func() (Waveform, error) { return Product(train, decay) }},
		{"have no common period", func() (Waveform, error) {
			return Sum(train, must(Pulse(PulseTrain{High: 1, Width: 0.1, Period: math.Pi})))
		}},
		{"the wave is infinite at 3 s", func() (Waveform, error) { return Quotient(Constant(1), Step(1, 0, 3)) }},
		{"the wave has no value before 0 s", func() (Waveform, error) { return Quotient(Constant(0), Constant(0)) }},
		{"the wave is infinite at 2 s", func() (Waveform, error) { return Product(Step(1, 1e200, 2), Step(1, 1e200, 1)) }},
	} {
		if _, err := c.make(); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("error %v, want %q", err, c.want)
		}
	}
	if w := must(Power(ramp, 12)); len(w.Segments[0].Poly) != 11 || w.Segments[0].Poly[10] != 1 {
		t.Errorf("t¹² is %+v", w)
	}
	free := must(must(train.Unrolled(3)).Repeated(0.7))
	if free.Period != 0.7 {
		t.Errorf("%+v", free)
	}
}

// Sampled waves keep within the bound that they state, at instants that no fit has seen.
func TestApplyKeepsItsBound(t *testing.T) {
	must := wave(t)
	day := must(must(Points([][2]float64{{0, 1}, {6, 4}, {9, 4}, {24, 1}})).Repeated(24))
	for _, c := range []struct {
		name string
		f    func(x []float64) float64
		w    []Waveform
	}{
		{"ramp times sine", func(x []float64) float64 { return x[0] * x[1] }, []Waveform{{Segments: []Segment{{A: 1, B: 0.2}}}, Sine(0, 1, 2, 0.3)}},
		{"exponential of points", func(x []float64) float64 { return math.Exp(x[0]) }, []Waveform{must(Points([][2]float64{{0, 0}, {10, 5}, {20, 2}}))}},
		{"root from 0", func(x []float64) float64 { return math.Sqrt(x[0]) }, []Waveform{must(Points([][2]float64{{0, 0}, {10, 5}}))}},
		{"a kink", func(x []float64) float64 { return math.Abs(x[0] - math.Pi) }, []Waveform{must(Points([][2]float64{{0, 0}, {10, 5}, {30, 0}}))}},
		{"the larger of two", func(x []float64) float64 { return max(x[0], x[1]) }, []Waveform{Sine(1, 1, 3, 0), Sine(1, 1, 2.1, 1)}},
		{"a day", func(x []float64) float64 { return math.Pow(x[0], 1.3) / (1 + x[1]) }, []Waveform{day, Sine(0, 0.5, math.Pi/6, 0)}},
		{"a decay", func(x []float64) float64 { return 1 / (1 + x[0]) }, []Waveform{must(Decay([][2]float64{{3, 0.5}, {1, 7}}))}},
		{"steps alone", func(x []float64) float64 { return math.Exp(x[0]) }, []Waveform{must(Stairs([][2]float64{{0, 1}, {3, 2}, {17, 0}}))}},
	} {
		for _, tol := range []float64{1e-3, 1e-6, 1e-9} {
			t.Run(fmt.Sprintf("%s to %g", c.name, tol), func(t *testing.T) {
				const until = 40
				w, bound, err := Apply(c.f, until, tol, c.w...)
				if err != nil {
					t.Fatal(err)
				}
				w.check()
				x, size := make([]float64, len(c.w)), 0.0
				for k := range 20011 {
					at := until * float64(k) / 20011
					for _, left := range []bool{false, true} {
						for i := range c.w {
							x[i] = valueOf(c.w[i], at, left)
						}
						want := c.f(x)
						size = max(size, math.Abs(want))
						if off := math.Abs(valueOf(w, at, left) - want); !(off <= bound+1e-14*size) {
							t.Fatalf("at %g s: %v, want %v: off by %.1e, bound %.1e", at, valueOf(w, at, left), want, off, bound)
						}
					}
				}
				if bound > tol*size*1.001 {
					t.Errorf("bound %g of %g", bound, size)
				}
				t.Logf("%d pieces, bound %.1e", len(w.Segments), bound)
				jumps, err := w.JumpTimes(0.001, until, 100)
				if c.name != "steps alone" && (err != nil || len(jumps) > 0) {
					t.Errorf("it jumps at %v", jumps)
				}
			})
		}
	}
}

// What happens after the span that was asked for.
func TestApplyGoesOn(t *testing.T) {
	must := wave(t)
	one := func(x []float64) float64 { return x[0] * x[0] }
	settled, _, err := Apply(one, 1, 1e-6, must(Points([][2]float64{{0, 0}, {5, 3}})))
	if v, ok := settled.Final(); err != nil || !ok || v != 9 || settled.At(6) != 9 {
		t.Errorf("settles at %v %v, %v", v, ok, err)
	}
	repeats, _, err := Apply(one, 1, 1e-6, must(must(Points([][2]float64{{0, 0}, {5, 3}})).Repeated(5)))
	if err != nil || repeats.Period != 5 || math.Abs(repeats.At(52)-1.44) > 1e-5 {
		t.Errorf("%v at 52 s, period %v, %v", repeats.At(52), repeats.Period, err)
	}
	waning, _, err := Apply(func(x []float64) float64 { return x[0] + x[1] }, 1, 1e-6, Sine(0, 1, 2*math.Pi, 0), must(Decay([][2]float64{{1, 0.4}})))
	if err != nil || waning.Period != 1 || waning.Segments[waning.Repeat].At != 16 {
		t.Errorf("a sine and a decay repeat from %v s with %v s, %v", waning.Segments[waning.Repeat].At, waning.Period, err)
	}
	rises, _, err := Apply(one, 10, 1e-6, Waveform{Segments: []Segment{{B: 1}}})
	if _, ok := rises.Final(); err != nil || ok || math.Abs(rises.At(12)-140) > 1e-3 {
		t.Errorf("a square of a ramp goes on to %v at 12 s, want 100 + 2·20; %v", rises.At(12), err)
	}
	ringing := Waveform{Segments: []Segment{{Exp: []Exponential{{1, complex(-1e-3, 1e6)}}}}}
	if w, _, err := Apply(one, 1e-5, 1e-6, ringing); err != nil || math.Abs(w.At(1e-5)-math.Pow(ringing.At(1e-5), 2)) > 1e-6 {
		t.Errorf("what rings for long is not sampled up to the end asked for: %v", err)
	}
	if zero, bound, err := Apply(func([]float64) float64 { return 0 }, 1, 1e-6, Sine(0, 1, 1, 0)); err != nil || bound != 0 || zero.At(3) != 0 {
		t.Errorf("%v %v %v", zero, bound, err)
	}
	if c, _, err := Apply(func([]float64) float64 { return 7 }, 1, 1e-6); err != nil || !c.Constant() || c.At(1) != 7 {
		t.Errorf("%v %v", c, err)
	}
}

func TestApplyRefuses(t *testing.T) {
	ramp := Waveform{Segments: []Segment{{B: 1}}}
	for _, c := range []struct {
		want string
		f    func(x float64) float64
		w    Waveform
	}{
		{"the wave has no value at 3", func(x float64) float64 { return math.Sqrt(3 - x) }, ramp},
		{"the wave is infinite at 0 s", func(x float64) float64 { return 1 / x }, Waveform{Before: 1, Segments: []Segment{{B: 1}}}},
		{"the wave is infinite before 0 s", func(x float64) float64 { return 1 / x }, Waveform{Segments: []Segment{{A: 1}}}},
		{"the wave jumps at about 2 s, from 1 to 2", func(x float64) float64 { return math.Floor(x) }, Waveform{Before: 1.5, Segments: []Segment{{A: 1.5}, {At: 1.5, A: 1.5, B: 1}, {At: 2.8, A: 2.8}}}},
		{"at least", func(x float64) float64 { return x }, Sine(0, 1, 1e9, 0.1)},
	} {
		until := 10.0
		if strings.Contains(c.want, "least") {
			until = 1e9
			c.w.Segments = append(c.w.Segments, Segment{At: 1e8, B: 1})
		}
		_, _, err := Apply(func(x []float64) float64 { return c.f(x[0]) }, until, 1e-6, c.w)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("error %v, want %q", err, c.want)
		}
	}
	for _, bad := range [][2]float64{{0, 1e-6}, {1, 0}, {math.Inf(1), 1}} {
		if _, _, err := Apply(func([]float64) float64 { return 1 }, bad[0], bad[1]); err == nil {
			t.Errorf("until %g and tolerance %g are taken", bad[0], bad[1])
		}
	}
}
