package laplace

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Whatever waves are sampled, the bound holds at instants of chance, on both sides of the
// breaks, and what is made is a wave that systems take.
func TestApplyOfAnyWaves(t *testing.T) {
	functions := map[string]func(x []float64) float64{
		"product": func(x []float64) float64 { return x[0] * x[1] },
		"larger":  func(x []float64) float64 { return max(x[0], x[1]) },
		"square":  func(x []float64) float64 { return x[0]*x[0] + 0.1*x[1] },
		"swell":   func(x []float64) float64 { return math.Exp(x[0] / 8) },
		"ratio":   func(x []float64) float64 { return x[0] / (1 + x[1]*x[1]) },
	}
	lags := parallelLags(t, 0.05, 3)
	rapid.Check(t, func(t *rapid.T) {
		const end = 8
		w := []Waveform{drawWave(t, end), drawWave(t, end)}
		name := rapid.SampledFrom([]string{"product", "larger", "square", "swell", "ratio"}).Draw(t, "function")
		tol := math.Pow(10, -float64(rapid.IntRange(2, 8).Draw(t, "digits")))
		got, bound, err := Apply(functions[name], end, tol, w...)
		var value *NoValue
		if errors.As(err, &value) { // exp of a large power
			return
		}
		if err != nil {
			t.Fatal(err)
		}
		got.check()
		at, x, size := rapid.Float64Range(0, end), make([]float64, 2), 0.0
		for k := range 400 {
			s := end * (float64(k) + 0.37) / 400
			if k < 40 {
				s = at.Draw(t, "at")
			}
			if nearBreak(w, s) {
				continue
			}
			for i := range w {
				x[i] = w[i].At(s)
				size = max(size, math.Pow(1+w[i].size(end), 2)) // of what the values are rounded from
			}
			if want := functions[name](x); !(math.Abs(got.At(s)-want) <= bound+1e-13*(size+math.Abs(want))) {
				t.Fatalf("%s at %v s: %v, want %v, bound %v", name, s, got.At(s), want, bound)
			}
		}
		r := mustRespond(t, lags, []Waveform{got}, end)
		if y := r.Max(0, 0, end).Y; !isNumber(y) {
			t.Fatalf("the response is %v", y)
		}
	})
}

// nearBreak reports an instant within rounding of a break of one of the waves.
func nearBreak(w []Waveform, t float64) bool {
	for i := range w {
		list, err := w[i].starts(t+1e-9, MaxBreaks)
		if err != nil || len(list) > 0 && math.Abs(t-list[len(list)-1]) < 1e-9 {
			return true
		}
	}
	return false
}
