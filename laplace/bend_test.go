package laplace

import (
	"fmt"
	"math"
	"testing"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// plainly is the system of a plain matrix with one input and one output.
func plainly(t testing.TB, n int, a, b, c []float64) *System {
	t.Helper()
	return fromMatrices(t, mat.NewDense(n, n, a), mat.NewDense(n, 1, b), mat.NewDense(1, n, c))
}

// impulses are systems whose response to an impulse is known in closed form.
func impulses(t testing.TB) []impulseCase {
	return []impulseCase{
		{"slow pole", plainly(t, 1, []float64{-1e-7}, []float64{1}, []float64{2}), func(s float64) float64 { return 2 * math.Exp(-1e-7*s) }},
		{"pole at 0", plainly(t, 1, []float64{0}, []float64{1}, []float64{1}), func(s float64) float64 { return 1 }},
		{"pole at −3", plainly(t, 1, []float64{-3}, []float64{3}, []float64{1}), func(s float64) float64 { return 3 * math.Exp(-3*s) }},
		{"a fast pole beside a slow one", plainly(t, 2, []float64{-1, 0, 0, -200}, []float64{1, 200}, []float64{1, 1}),
			func(s float64) float64 { return math.Exp(-s) + 200*math.Exp(-200*s) }},
		{"growing", plainly(t, 1, []float64{2}, []float64{1}, []float64{1}), func(s float64) float64 { return math.Exp(2 * s) }},
		{"swinging", plainly(t, 2, []float64{-0.5, 5, -5, -0.5}, []float64{1, 0}, []float64{0, -1}), func(s float64) float64 { return math.Exp(-0.5*s) * math.Sin(5*s) }},
		{"critically damped", plainly(t, 2, []float64{-2, 2, 0, -2}, []float64{0, 2}, []float64{1, 0}), func(s float64) float64 { return 4 * s * math.Exp(-2*s) }},
		{"three equal poles", plainly(t, 3, []float64{-40, 40, 0, 0, -40, 40, 0, 0, -40}, []float64{0, 0, 40}, []float64{1, 0, 0}),
			func(s float64) float64 { return 64000 / 2 * s * s * math.Exp(-40*s) }},
		{"two integrators", plainly(t, 2, []float64{0, 1, 0, 0}, []float64{0, 1}, []float64{1, 0}), func(s float64) float64 { return s }},
	}
}

type impulseCase struct {
	name string
	*System
	h func(s float64) float64
}

// answer is ∫ h(t−s) u(s) ds over [0, t] by Gauss's rule of 24 points on parts so short that
// what is left out is below rounding; on every part u is one polynomial.
func (c *impulseCase) answer(w *Waveform, t float64) float64 {
	edges := []float64{0}
	all, err := w.starts(t, MaxBreaks)
	if err != nil {
		panic(err)
	}
	for _, at := range append(all, t) {
		if from := edges[len(edges)-1]; at > from {
			for k := range 20 {
				edges = append(edges, from+(at-from)*float64(k+1)/20)
			}
		}
	}
	sum := 0.0
	for k := range len(edges) - 1 {
		mid := (edges[k] + edges[k+1]) / 2
		n, i := w.locate(mid, false)
		start := w.start(n, i)
		sum += quad.Fixed(func(s float64) float64 { return c.h(t-s) * w.Segments[i].value(s-start) }, edges[k], edges[k+1], 24, quad.Legendre{}, 0)
	}
	return sum
}

// bent is two pieces of a degree, the second short of the first by a jump.
func bent(degree int) Waveform {
	w := Waveform{Segments: []Segment{{A: 0.3, B: -1}, {At: 1.3, A: -0.2, B: 0.4}}}
	for k := 2; k <= degree; k++ {
		sign := float64(1 - k%2*2)
		w.Segments[0].Poly = append(w.Segments[0].Poly, sign*float64(k)/7)
		w.Segments[1].Poly = append(w.Segments[1].Poly, -sign/float64(k))
	}
	return w
}

// Values, uniform and scattered tables agree with quadrature [measured: 1.2e-14 of the largest value].
func TestBentAgainstQuadrature(t *testing.T) {
	const end = 2.2
	worst := 0.0
	for _, c := range impulses(t) {
		for _, d := range []int{2, 3, 7, MaxDegree} {
			t.Run(fmt.Sprintf("%s, degree %d", c.name, d), func(t *testing.T) {
				w := bent(d)
				r, err := c.Respond([]Waveform{w}, nil, end)
				if err != nil {
					t.Fatal(err)
				}
				uniform, scattered := make([]float64, 331), make([]float64, 60)
				for i := range uniform {
					uniform[i] = end * float64(i) / 330
				}
				for i := range scattered {
					scattered[i] = end * math.Pow(float64(i)/59, 3)
				}
				peak := math.Max(math.Abs(r.Max(0, 0, end).Y), math.Abs(r.Min(0, 0, end).Y))
				for _, times := range [][]float64{uniform, scattered} {
					y := [][]float64{make([]float64, len(times))}
					r.Table(times, y)
					for i := 0; i < len(times); i += 23 {
						want := c.answer(&w, times[i])
						for _, got := range []float64{r.At(0, times[i]), y[0][i]} {
							if off := math.Abs(got - want); !(off <= 2e-13*peak) {
								t.Fatalf("at %g s: %v, want %v: off by %.1e of %.1e", times[i], got, want, off, peak)
							} else {
								worst = max(worst, off/peak)
							}
						}
					}
				}
				p := r.piece(1)
				got := r.curve(p, 0).integral()
				want := quad.Fixed(func(tau float64) float64 { return r.At(0, p.t0+tau) }, 0, p.length, 100, quad.Legendre{}, 0)
				if off := math.Abs(got - want); !(off <= 1e-12*peak) {
					t.Errorf("integral %v, want %v", got, want)
				}
			})
		}
	}
	t.Logf("worst %.1e of the largest value", worst)
}

// Source: closed form, derived here. A first-order lag of time constant T answers
//
//	t² with t² − 2Tt + 2T²(1 − e^(−t/T)),  t³ with t³ − 3Tt² + 6T²t − 6T³(1 − e^(−t/T)),
//
// by y + T y′ = u and y(0) = 0. A second-order system y″ + 2ζω y′ + ω² y = ω² u answers t²
// with the polynomial t² − 4ζt/ω + (8ζ² − 2)/ω² (put it in) and the free swing that takes
// value and slope at 0 away: y0 = (8ζ² − 2)/ω² and −4ζ/ω.
func TestBentAgainstClosedForms(t *testing.T) {
	const T, z, om = 0.8, 0.3, 4.0
	lag := plainly(t, 1, []float64{-1 / T}, []float64{1 / T}, []float64{1})
	swing := plainly(t, 2, []float64{0, 1, -om * om, -2 * z * om}, []float64{0, om * om}, []float64{1, 0})
	square := Waveform{Segments: []Segment{{Poly: []float64{1}}}}
	cube := Waveform{Segments: []Segment{{Poly: []float64{0, 1}}}}
	for _, c := range []struct {
		s    *System
		w    Waveform
		want func(t float64) float64
	}{
		{lag, square, func(t float64) float64 { return t*t - 2*T*t - 2*T*T*math.Expm1(-t/T) }},
		{lag, cube, func(t float64) float64 { return t*t*t - 3*T*t*t + 6*T*T*t + 6*T*T*T*math.Expm1(-t/T) }},
		{swing, square, func(t float64) float64 {
			y0, v0 := (8*z*z-2)/(om*om), -4*z/om
			wd, s := om*math.Sqrt(1-z*z), z*om
			free := math.Exp(-s*t) * (y0*math.Cos(wd*t) + (v0+s*y0)/wd*math.Sin(wd*t))
			return t*t - 4*z*t/om + y0 - free
		}},
	} {
		r, err := c.s.Respond([]Waveform{c.w}, nil, 10)
		if err != nil {
			t.Fatal(err)
		}
		for _, at := range []float64{0.3, 1, 2.5, 7, 10} {
			near(t, fmt.Sprint("at ", at), r.At(0, at), c.want(at), 1e-13)
		}
	}
}

// Source: closed form, derived here. A capacity C behind a resistance R takes up I²r with
// I = i0 + k t: the current is ramped, the loss is i0²r + 2 i0 k r t + k² r t². With
// T = R·C the rise is R·(the lag's answer to each power): for 1, t, t² these are 1 − e,
// t − T(1 − e), t² − 2Tt + 2T²(1 − e) with e = exp(−t/T).
func TestQuadraticLossOfARampedCurrent(t *testing.T) {
	const R, C, i0, k, r = 0.35, 40.0, 12.0, 1.5, 0.08
	const T = R * C
	current := Waveform{Segments: []Segment{{A: i0, B: k}}}
	loss, err := Power(current, 2)
	if err != nil {
		t.Fatal(err)
	}
	s := plainly(t, 1, []float64{-1 / T}, []float64{1 / C}, []float64{1})
	y, err := s.Respond([]Waveform{loss.Scaled(r)}, nil, 60)
	if err != nil {
		t.Fatal(err)
	}
	for _, at := range []float64{1, 5, 14, 33, 60} {
		one := -math.Expm1(-at / T)
		want := R * r * (i0*i0*one + 2*i0*k*(at-T*one) + k*k*(at*at-2*T*at+2*T*T*one))
		near(t, fmt.Sprint("rise at ", at), y.At(0, at), want, 2e-14)
	}
	hit, ok := y.First(0, 20, 0, 60)
	if !ok || math.Abs(y.At(0, hit.T)-20) > 1e-12 {
		t.Errorf("20 K is met at %+v, with %v there", hit, y.At(0, hit.T))
	}
}

// A cycle under bent inputs is what a long response comes to, its mean that of the
// input times the gain.
func TestBentCycleAgainstLongResponse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := drawSystem(t, "rc")
		w := bent(rapid.IntRange(2, MaxDegree).Draw(t, "degree"))
		w, err := w.Repeated(1.7)
		if err != nil {
			t.Fatal(err)
		}
		w = inTime(w, rapid.IntRange(-6, 6).Draw(t, "period"))
		slow := 1.0
		for _, p := range s.poles {
			slow = math.Max(slow, -1/real(p.P))
		}
		u := make([]Waveform, len(s.b))
		u[0] = w
		c, err := s.Cycle(u, nil)
		if err != nil {
			t.Fatal(err)
		}
		turns := math.Ceil(40 * slow / w.Period)
		if turns > 500 { // beyond, the rounding of the time shows
			return
		}
		r := mustRespond(t, s, u, (turns+1)*w.Period)
		for m := range s.c {
			for _, share := range []float64{0, 0.2, 0.7, 0.9} {
				got, want := c.At(m, share*w.Period), r.At(m, (turns+share)*w.Period)
				if off := math.Abs(got - want); !(off <= 4e-12*c.r.Rounding(m)/(4*epsilon)) {
					t.Fatalf("output %d at %g of the period: %v, in the long run %v", m, share, got, want)
				}
			}
		}
	})
}

// The rate of a wave is its derivative, and an output of improper systems follows it.
func TestBentRate(t *testing.T) {
	w := bent(MaxDegree)
	r := w.Rate()
	for _, at := range []float64{0.01, 0.4, 1.2, 1.4, 2} {
		const h = 1e-5
		near(t, fmt.Sprint("rate at ", at), r.At(at), (w.At(at+h)-w.At(at-h))/(2*h), 1e-6)
	}
}

// Between two jets no value and no derivative leaves the spread: what excludes intervals
// from a search.
func TestBentSpreadHolds(t *testing.T) {
	for _, c := range impulses(t) {
		for _, d := range []int{2, 7, 8, MaxDegree} {
			w := bent(d)
			r, err := c.Respond([]Waveform{w}, nil, 2.2)
			if err != nil {
				t.Fatal(err)
			}
			tol := 16 * r.Rounding(0)
			v := r.curve(r.piece(1), 0)
			for _, part := range [][2]float64{{0, 0.9}, {0, 0.01}, {0.2, 0.5}, {0.8, 0.9}, {0.3, 0.301}} {
				l, m, e := v.jet(part[0]), v.jet((part[0]+part[1])/2), v.jet(part[1])
				s := v.spread(&l, &m, &e)
				for k := range 40 {
					j := v.jet(part[0] + (part[1]-part[0])*float64(k)/39)
					for i := range s {
						scale := tol * math.Pow(200, float64(i))
						if off := math.Abs(j.d[i] - m.d[i]); !(off <= s[i]+scale) {
							t.Fatalf("%s, degree %d, %v: derivative %d differs by %g, spread %g", c.name, d, part, i, off, s[i])
						}
					}
				}
			}
			for _, e := range []Extreme{r.Max(0, 0, 2.2), r.Min(0, 0, 2.2)} {
				if e.Capped {
					t.Errorf("%s, degree %d: the search for an extreme was given up", c.name, d)
				}
			}
		}
	}
}

// The jets are the derivatives: by differences of the order before.
func TestBentJets(t *testing.T) {
	for _, c := range impulses(t) {
		w := bent(MaxDegree)
		r, err := c.Respond([]Waveform{w}, nil, 2.2)
		if err != nil {
			t.Fatal(err)
		}
		v := r.curve(r.piece(1), 0)
		const at, h = 0.37, 1e-6
		j, a, b := v.jet(at), v.jet(at-h), v.jet(at+h)
		near(t, c.name+", value", j.d[0], r.At(0, at+r.times[1]), 1e-12)
		for i := 1; i < terms; i++ {
			got, want := j.d[i], (b.d[i-1]-a.d[i-1])/(2*h)
			if off := math.Abs(got - want); !(off <= 1e-6*(math.Abs(want)+math.Abs(j.d[i-1])+math.Abs(b.d[i-1]))+1e-9*math.Pow(200, float64(i))*r.Rounding(0)/epsilon) {
				t.Errorf("%s, derivative %d: %g, by differences %g", c.name, i, got, want)
			}
		}
	}
}
