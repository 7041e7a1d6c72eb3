package laplace

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace/matrix"
)

// single is one store of capacity c and leak g, driven and seen.
func single(t testing.TB, c, g float64) *System {
	t.Helper()
	s, err := New(Realisation{Balance: matrix.Balance{N: 1, C: []float64{c}, F: []float64{0}, Leak: []float64{g}},
		B: [][]float64{{1}}, Output: [][]float64{{1}}})
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// oscillator is y″ + 2ζωy' + ω²y = ω²u.
func oscillator(t testing.TB, omega, zeta float64) *System {
	t.Helper()
	s, err := FromMatrices(mat.NewDense(2, 2, []float64{0, omega, -omega, -2 * zeta * omega}),
		mat.NewDense(2, 1, []float64{0, omega}), mat.NewDense(1, 2, []float64{1, 0}), nil)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func respond(t testing.TB, s *System, until float64, u ...Waveform) *Response {
	t.Helper()
	r, err := s.Respond(u, nil, until)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func TestFirstAgainstClosedForm(t *testing.T) {
	r := respond(t, single(t, 2, 0.5), 100, Step(0, 1, 3)) // y = 2(1 − exp(−(t−3)/4))
	x, ok := r.First(0, 1.5, 0, 100)
	want := 3 + 4*math.Log(4)
	if !ok || x.Touch || math.Abs(x.T-want) > 1e-15*want || x.Lo > x.T || x.Hi < x.T {
		t.Errorf("%+v %v, want %v", x, ok, want)
	}
	if x, ok = r.First(0, 2.5, 0, 100); ok {
		t.Errorf("a level that is never reached is met at %+v", x)
	}
	if x, ok = r.First(0, 0, 1, 100); !ok || x.T != 1 {
		t.Errorf("a level that holds at the start is met at %+v %v", x, ok)
	}
	if _, ok = r.First(0, 1.5, 0, 5); ok {
		t.Error("a level beyond the window is met")
	}
}

// A level that the output tends to for ever is met within rounding only, and said
// to be.
func TestAsymptoteIsATouch(t *testing.T) {
	r := respond(t, single(t, 1, 1), 1000, Step(0, 1, 0))
	x, ok := r.First(0, 1, 0, 1000)
	if !ok || !x.Touch || x.T < 30 {
		t.Errorf("%+v %v, want a touch after 30 time constants", x, ok)
	}
	if x, ok := r.FirstOutside(0, -1, 1, 0, 1000); ok {
		t.Errorf("an asymptote leaves its own level at %+v", x)
	}
}

func TestJumpsCross(t *testing.T) {
	// y = u at once
	s, err := New(Realisation{B: [][]float64{{}}, Output: [][]float64{{}}, D: [][]float64{{1}}})
	if err != nil {
		t.Fatal(err)
	}
	w := wave(t)(Points([][2]float64{{0, 0}, {2, 1}, {2, 5}, {4, 3}, {4, -3}, {6, 0}}))
	r := respond(t, s, 10, w)
	if x, ok := r.First(0, 4.5, 0, 10); !ok || x.T != 2 {
		t.Errorf("a jump across the level: %+v %v", x, ok)
	}
	if e := r.Max(0, 0, 10); e != (Extreme{T: 2, Y: 5}) {
		t.Errorf("highest %+v", e)
	}
	if e := r.Max(0, 3.5, 10); e != (Extreme{T: 3.5, Y: 3.5}) {
		t.Errorf("highest from 3.5 s: %+v", e)
	}
	if e := r.Min(0, 0, 3.9); e != (Extreme{T: 0, Y: 0}) {
		t.Errorf("lowest %+v", e)
	}
	down := respond(t, s, 10, w.Scaled(-1))
	if e := down.Max(0, 3, 10); e != (Extreme{T: 4, Y: 3}) {
		t.Errorf("highest %+v", e)
	}
	rise := respond(t, s, 10, wave(t)(Points([][2]float64{{0, 0}, {2, 1}, {2, 0.5}, {4, 0.5}})))
	if e := rise.Max(0, 0, 10); e != (Extreme{T: 2, Y: 1, AtLeft: true}) {
		t.Errorf("highest %+v, want 1 approached from before 2 s", e)
	}
	if x, ok := r.FirstOutside(0, math.Inf(-1), 4, 0, 10); !ok || x.T != 2 {
		t.Errorf("out at %+v %v", x, ok)
	}
	if x, ok := r.FirstOutside(0, -2, math.Inf(1), 0, 10); !ok || x.T != 4 {
		t.Errorf("out at %+v %v", x, ok)
	}
	if x, ok := r.LastOutside(0, 0, 2, 0, 10); !ok || math.Abs(x.T-(4+2.0/3)) > 1e-14 {
		t.Errorf("last out at %+v %v", x, ok)
	}
	if y := [2]float64{r.Left(0, 4), r.At(0, 4)}; y != [2]float64{3, -3} {
		t.Errorf("about a jump: %v", y)
	}
}

// 1 − cos t touches 2 at π and never passes it.
func TestTouch(t *testing.T) {
	r := respond(t, oscillator(t, 1, 0), 20, Step(0, 1, 0))
	x, ok := r.First(0, 2, 0, 20)
	if !ok || !x.Touch || math.Abs(x.T-math.Pi) > 1e-7 {
		t.Errorf("%+v %v, want a touch at π", x, ok)
	}
	if x, ok := r.FirstOutside(0, -1, 2, 0, 20); ok {
		t.Errorf("a touch counts as outside: %+v", x)
	}
	// the band of ±1 about 1 is touched at every extremum
	if x, ok := r.LastOutside(0, 1, 1, 0, 20); ok {
		t.Errorf("%+v", x)
	}
	if e := r.Max(0, 0, 20); math.Abs(e.T-math.Pi) > 1e-8 || math.Abs(e.Y-2) > 1e-15 {
		t.Errorf("of equal maxima the first: %+v", e)
	}
	// a decaying swing whose second maximum meets the edge of the band
	d := respond(t, oscillator(t, 1, 0.05), 60, Step(0, 1, 0))
	second := d.Max(0, 8, 12)
	y, ok := d.LastOutside(0, 1, second.Y-1, 0, 60)
	if !ok || !y.Touch || math.Abs(y.Hi-second.T) > 1e-6 || y.T > 8 {
		t.Errorf("%+v %v, want a touch at %g", y, ok, second.T)
	}
}

// Four modes that beat come back over the band once, long after they seem to have
// settled: no sampling is needed to see it.
func TestNarrowExcursion(t *testing.T) {
	n := 8
	a, b, c := mat.NewDense(n, n, nil), mat.NewDense(n, 1, nil), mat.NewDense(1, n, nil)
	for k := range 4 {
		w := []float64{1, 1.07, 1.13, 17}[k]
		a.Set(2*k, 2*k+1, w)
		a.Set(2*k+1, 2*k, -w)
		a.Set(2*k+1, 2*k+1, -0.004*w)
		b.Set(2*k+1, 0, w)
		c.Set(0, 2*k, []float64{1, 1, 1, 0.01}[k])
	}
	s, err := FromMatrices(a, b, c, nil)
	if err != nil {
		t.Fatal(err)
	}
	const end = 1500
	r := respond(t, s, end, Step(0, 1, 0))
	mid, _ := r.Final(0)
	agreeWithSamples(t, r, mid, []float64{0.3, 1, 2.5}, end, 400_000)
}

// agreeWithSamples compares every search with dense sampling.
func agreeWithSamples(t *testing.T, r *Response, mid float64, bands []float64, end float64, n int) {
	t.Helper()
	times, y := make([]float64, n), make([]float64, n)
	for i := range times {
		times[i] = end * float64(i) / float64(n-1)
	}
	r.Table(times, [][]float64{y})
	step := end / float64(n-1)
	high, low := math.Inf(-1), math.Inf(1)
	for _, v := range y {
		high, low = max(high, v), min(low, v)
	}
	tol := 1e-9 * (math.Abs(high) + math.Abs(low))
	if e := r.Max(0, 0, end); e.Y < high-tol/1e3 || e.Capped {
		t.Errorf("highest %+v, a sample is %v", e, high)
	}
	if e := r.Min(0, 0, end); e.Y > low+tol/1e3 || e.Capped {
		t.Errorf("lowest %+v, a sample is %v", e, low)
	}
	for _, band := range bands {
		last, first := -1.0, -1.0
		for i, v := range y {
			if math.Abs(v-mid) > band+tol {
				if last = times[i]; first < 0 {
					first = last
				}
			}
		}
		x, ok := r.LastOutside(0, mid, band, 0, end)
		if last >= 0 && (!ok || x.T < last || x.T > last+step && math.Abs(r.At(0, x.T)-mid)-band > tol) {
			t.Errorf("last outside %g: %+v %v, samples say %v", band, x, ok, last)
		}
		x, ok = r.FirstOutside(0, mid-band, mid+band, 0, end)
		if first >= 0 && (!ok || x.T > first || x.Capped) {
			t.Errorf("first outside %g: %+v %v, samples say %v", band, x, ok, first)
		}
	}
}

// An undamped swing over very many periods exceeds the evaluations: the answer says
// so instead of being late or silent.
func TestCapIsSaid(t *testing.T) {
	r := respond(t, oscillator(t, 1, 0), 1e7, Sine(0, 0.5, 0.3, 0))
	x, ok := r.First(0, 3, 0, 1e7)
	if !ok || !x.Capped || x.T <= 0 {
		t.Errorf("%+v %v, want a search that stopped", x, ok)
	}
	if e := r.Max(0, 0, 1e7); !e.Capped {
		t.Errorf("%+v, want a search that stopped", e)
	}
}
