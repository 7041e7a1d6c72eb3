package laplace

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
	"testing"
)

// span is the largest value of a case.
func (c *distributedCase) span() float64 {
	r := 0.0
	for _, y := range c.Y {
		r = max(r, math.Abs(y))
	}
	return r
}

// asStated inverts a case at its times.
func (c *distributedCase) asStated(t *testing.T, o InvertOptions) []Estimate {
	t.Helper()
	out, err := Invert(transforms[c.F], c.T, o)
	if err != nil {
		t.Fatalf("%s: %v", c.ID, err)
	}
	return out
}

// honest checks that no trusted value is off by more than the tolerance, that every
// estimate covers its error, and returns the largest error over the span among the
// trusted, and the largest error over its estimate, rounding left out.
func (c *distributedCase) honest(t *testing.T, out []Estimate) (worst, ratio float64) {
	t.Helper()
	for i, e := range out {
		d := math.Abs(e.Y - c.Y[i])
		if e.Trusted && !(d <= 1e-9*c.span()) {
			t.Errorf("%s at %g: trusted %v, want %v", c.ID, c.T[i], e, c.Y[i])
		}
		if !(d <= e.Error) {
			t.Errorf("%s at %g: %v, want %v: off by %g", c.ID, c.T[i], e, c.Y[i], d)
		}
		if (e.Note == "") != e.Trusted {
			t.Errorf("%s at %g: %+v: a note goes with a doubt", c.ID, c.T[i], e)
		}
		if e.Trusted {
			worst = max(worst, d/c.span())
		}
		if d > 1e-14*c.span() {
			ratio = max(ratio, d/e.Error)
		}
	}
	return worst, ratio
}

// TestInvertSuite inverts every transform as it stands, nothing told about jumps. All
// without jumps or bends are trusted, and right to 2e-11 of their span.
func TestInvertSuite(t *testing.T) {
	most, mostRatio := 0.0, 0.0
	for _, c := range loadDistributed(t) {
		out := c.asStated(t, InvertOptions{})
		worst, ratio := c.honest(t, out)
		most, mostRatio = max(most, worst), max(mostRatio, ratio)
		t.Logf("%s: %.1g of the span", c.ID, worst)
		smooth := len(c.Jumps) == 0 && c.ID != "D27-delay-lag-step"
		for i, e := range out {
			if smooth && !e.Trusted {
				t.Errorf("%s at %g: not trusted: %+v", c.ID, c.T[i], e)
			}
		}
		if smooth && worst > 2e-11 {
			t.Errorf("%s: error %.2g of the span", c.ID, worst)
		}
	}
	t.Logf("largest error of a trusted value %.2g of the span, of any %.2g of its estimate", most, mostRatio)
}

// TestInvertWaves: away from jumps the fraction still follows waves; the values are
// good though not trusted, as one method stands alone.
func TestInvertWaves(t *testing.T) {
	for _, c := range loadDistributed(t) {
		if len(c.Jumps) == 0 {
			continue
		}
		for i, e := range c.asStated(t, InvertOptions{}) {
			late := c.T[i] > 10
			close := math.Abs(c.T[i]-c.Jumps[0][0]) < 0.05
			if d := math.Abs(e.Y - c.Y[i]); !late && !close && d > 2e-10*c.span() {
				t.Errorf("%s at %g: %+v, want %g", c.ID, c.T[i], e, c.Y[i])
			}
		}
	}
}

// TestInvertDelay states the delay, which leaves smooth transforms.
func TestInvertDelay(t *testing.T) {
	delay := map[string]float64{"D23": 1, "D24": 1, "D26": 1, "D27": 1, "DM10": 5}
	for _, c := range loadDistributed(t) {
		o := InvertOptions{Delay: delay[c.ID[:min(4, len(c.ID))]] + delay[c.ID[:3]]}
		if o.Delay == 0 {
			continue
		}
		out := c.asStated(t, o)
		c.honest(t, out)
		for i, e := range out {
			if front := c.T[i] > o.Delay && c.T[i] < 1.02*o.Delay; e.Trusted == front {
				t.Errorf("%s at %g: %+v", c.ID, c.T[i], e)
			}
			if c.T[i] < o.Delay && e != (Estimate{Trusted: true}) {
				t.Errorf("%s at %g, before the delay: %+v", c.ID, c.T[i], e)
			}
		}
	}
}

// squareJumps are the jumps of D20 and D22, 100 of them.
func squareJumps(id string) []Jump {
	j := []Jump{{0, 1}}
	if id == "D20-lossless-deadend-step" {
		j = nil
	}
	for k := range 100 {
		sign := 2 - 4*float64(k%2)
		if j != nil && j[0].At == 0 {
			j = append(j, Jump{float64(2*k + 2), -sign})
		} else {
			j = append(j, Jump{float64(2*k + 1), sign})
		}
	}
	return j
}

// TestInvertJumps states all jumps of lossless waves, which leaves nothing.
func TestInvertJumps(t *testing.T) {
	for _, c := range loadDistributed(t) {
		if c.ID != "D20-lossless-deadend-step" && c.ID != "D22-lossless-inflow-step" {
			continue
		}
		out := c.asStated(t, InvertOptions{Jumps: squareJumps(c.ID)})
		c.honest(t, out)
		for i, e := range out {
			if !e.Trusted || math.Abs(e.Y-c.Y[i]) > 2e-10 {
				t.Errorf("%s at %g: %+v, want %g", c.ID, c.T[i], e, c.Y[i])
			}
		}
	}
}

// TestInvertAtJumps asks for the instants of jumps: the mean, never trusted.
func TestInvertAtJumps(t *testing.T) {
	for _, c := range loadDistributed(t) {
		for _, j := range c.Jumps {
			if j[0] == 0 {
				continue
			}
			at := []float64{j[0]}
			for _, o := range []InvertOptions{{}, {Jumps: []Jump{{j[0], j[2] - j[1]}}}, {Jumps: []Jump{{At: j[0]}}}, {Tolerance: 1e-4}} {
				out, err := Invert(transforms[c.F], at, o)
				if err == nil && (out[0].Trusted || out[0].Error < 0.4*math.Abs(j[2]-j[1])) {
					t.Errorf("%s at its jump %g, options %v: %+v", c.ID, j[0], o, out[0])
				}
			}
		}
	}
}

// TestInvertHostile: no transform, no number. What a function of no meaning gives is
// either an error or not trusted.
func TestInvertHostile(t *testing.T) {
	one := func(f func(s complex128) complex128) func(complex128) complex128 { return f }
	node := newContour(contourPoints[0]).z[3]
	for name, f := range map[string]func(complex128) complex128{
		"not a number":    one(func(s complex128) complex128 { return cmplx.NaN() }),
		"infinite":        one(func(s complex128) complex128 { return cmplx.Inf() }),
		"growth s²":       one(func(s complex128) complex128 { return cmplx.Exp(s * s) }),
		"growth −s²":      one(func(s complex128) complex128 { return cmplx.Exp(-s * s) }),
		"advance":         one(func(s complex128) complex128 { return cmplx.Exp(5*s) / s }),
		"pole at 2":       one(func(s complex128) complex128 { return 1 / (s - 2) }),
		"pole at 100":     one(func(s complex128) complex128 { return 1 / (s - 100) }),
		"pair at 30±20i":  one(func(s complex128) complex128 { return 1 / ((s-30)*(s-30) + 400) }),
		"pair at 10±20i":  one(func(s complex128) complex128 { return 1 / ((s-10)*(s-10) + 400) }),
		"not real":        one(func(s complex128) complex128 { return 1i / s }),
		"not mirrored":    one(func(s complex128) complex128 { return 1 / (s + 1i) }),
		"modulus":         one(func(s complex128) complex128 { return complex(1/cmplx.Abs(s), 0) }),
		"noise":           one(func(s complex128) complex128 { return complex(math.Mod(1e9*(real(s)+imag(s)*imag(s)), 1), 0) }),
		"noisy step":      one(func(s complex128) complex128 { return (1 + complex(1e-4*math.Sin(1e9*real(s)*imag(s)), 0)) / s }),
		"ringing 200":     one(func(s complex128) complex128 { return 1/s + 1/(s*s+4e4) }),
		"ringing 1e3":     one(func(s complex128) complex128 { return 1e3 / (s*s + 1e6) }),
		"ringing 1e4":     one(func(s complex128) complex128 { return 1/s + 1e-3*s/(s*s+1e8) }),
		"fast pulses":     one(func(s complex128) complex128 { return 1 / (s * (1 + cmplx.Exp(-s*0.001))) }),
		"nowhere smooth":  one(func(s complex128) complex128 { return complex(math.Floor(1e3*real(1/s))/1e3, 0) }),
		"pole on contour": one(func(s complex128) complex128 { return 1 / ((s - node) * (s - cmplx.Conj(node))) }),
	} {
		out, err := Invert(f, []float64{0.5, 1, 1.1, 10}, InvertOptions{})
		if err != nil {
			var no *NotInverted
			if !errors.As(err, &no) {
				t.Errorf("%s: %v", name, err)
			}
			continue
		}
		for i, e := range out {
			if name == "pole on contour" {
				a, b := real(node), imag(node)
				x := []float64{0.5, 1, 1.1, 10}[i]
				if y := math.Exp(a*x) * math.Sin(b*x) / b; e.Trusted && math.Abs(e.Y-y) > max(1e-10, 1e-9*y) {
					t.Errorf("%s: %+v, want %g", name, e, y)
				}
			} else if e.Trusted {
				t.Errorf("%s: trusted %+v", name, e)
			}
		}
	}
}

// TestInvertOverflow: an answer too large for a double is none.
func TestInvertOverflow(t *testing.T) {
	out, err := Invert(func(s complex128) complex128 { return 1 / (s - 1000) }, []float64{0.1, 1}, InvertOptions{Abscissa: 1000})
	if err == nil && (out[1].Trusted || !math.IsInf(out[1].Error, 1)) {
		t.Errorf("e^1000: %+v", out[1])
	}
}

func TestInvertRefuses(t *testing.T) {
	f := transforms["1/s"]
	bad := []struct {
		t []float64
		o InvertOptions
	}{
		{t: []float64{0}}, {t: []float64{1, -1}}, {t: []float64{math.NaN()}}, {t: []float64{math.Inf(1)}},
		{t: []float64{1e-200, 1e200}}, {[]float64{1}, InvertOptions{Abscissa: math.NaN()}}, {[]float64{1}, InvertOptions{Delay: -1}},
		{[]float64{1}, InvertOptions{Tolerance: -1}}, {[]float64{1}, InvertOptions{Range: math.Inf(1)}},
		{[]float64{1}, InvertOptions{Jumps: []Jump{{-1, 1}}}}, {[]float64{1}, InvertOptions{Jumps: []Jump{{1, math.NaN()}}}},
	}
	for _, c := range bad {
		if out, err := Invert(f, c.t, c.o); err == nil {
			t.Errorf("%v %+v: %v", c.t, c.o, out)
		}
	}
	if out, err := Invert(f, nil, InvertOptions{}); out != nil || err != nil {
		t.Errorf("no times: %v, %v", out, err)
	}
}

// TestInvertPlain: transforms with an answer in the head.
func TestInvertPlain(t *testing.T) {
	for _, c := range []struct {
		name string
		f    func(complex128) complex128
		o    InvertOptions
		y    func(t float64) float64
	}{
		{"nothing", func(complex128) complex128 { return 0 }, InvertOptions{}, func(float64) float64 { return 0 }},
		{"impulse at 0", func(complex128) complex128 { return 3 }, InvertOptions{}, func(float64) float64 { return 0 }},
		{"differentiator", func(s complex128) complex128 { return s }, InvertOptions{}, func(float64) float64 { return 0 }},
		{"growth", func(s complex128) complex128 { return 1 / (s - 2) }, InvertOptions{Abscissa: 2}, func(t float64) float64 { return math.Exp(2 * t) }},
		{"decay known", func(s complex128) complex128 { return 1 / (s + 3) }, InvertOptions{Abscissa: -3}, func(t float64) float64 { return math.Exp(-3 * t) }},
		{"blind to the left", func(s complex128) complex128 {
			if real(s) < 0 {
				return cmplx.NaN()
			}
			return 1 / s
		}, InvertOptions{}, func(float64) float64 { return 1 }},
	} {
		times := []float64{3, 0.1, 0.5, 0.5, 8}
		out, err := Invert(c.f, times, c.o)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		for i, e := range out {
			y := c.y(times[i])
			if !e.Trusted || math.Abs(e.Y-y) > 3e-10*max(1, c.y(8)) {
				t.Errorf("%s at %g: %+v, want %g", c.name, times[i], e, y)
			}
		}
	}
}

// TestInvertTable: many times at once equal the same times one by one.
func TestInvertTable(t *testing.T) {
	for _, c := range loadDistributed(t) {
		if len(c.Jumps) > 0 {
			continue
		}
		var times []float64
		for x := 0.3; x < 2; x *= 1.01 {
			times = append(times, x)
		}
		all, err := Invert(transforms[c.F], times, InvertOptions{})
		if err != nil {
			t.Fatal(err)
		}
		for i := 0; i < len(times); i += 17 {
			single, err := Invert(transforms[c.F], times[i:i+1], InvertOptions{})
			if err != nil {
				t.Fatal(err)
			}
			if a, b := all[i], single[0]; a.Trusted && b.Trusted && !(math.Abs(a.Y-b.Y) <= a.Error+b.Error) {
				t.Errorf("%s at %g: %+v in a table, %+v alone", c.ID, times[i], a, b)
			}
		}
	}
	same := make([]float64, 40)
	for i := range same {
		same[i] = 0.7
	}
	out, err := Invert(transforms["1/s^2"], same, InvertOptions{})
	if err != nil || math.Abs(out[39].Y-0.7) > 1e-12 || fmt.Sprint(out[0]) != fmt.Sprint(out[39]) {
		t.Errorf("one time 40 times: %v, %v", out[39], err)
	}
}
