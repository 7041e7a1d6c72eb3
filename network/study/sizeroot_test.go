package study

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Roots whose place is known: of odd powers, of an exponential, of a leap.
func TestSignChange(t *testing.T) {
	fine := func(a, b float64) float64 { return 1e-12 * math.Max(1, math.Max(math.Abs(a), math.Abs(b))) }
	rapid.Check(t, func(t *rapid.T) {
		root := rapid.Float64Range(-50, 50).Draw(t, "root")
		sign := rapid.SampledFrom([]float64{-1, 1}).Draw(t, "sign")
		shape := rapid.SampledFrom([]func(x float64) float64{
			func(x float64) float64 { return x },
			func(x float64) float64 { return x * x * x },
			func(x float64) float64 { return math.Expm1(x / 4) },
			func(x float64) float64 { return math.Atan(1e3 * x) },
			func(x float64) float64 { return math.Copysign(math.Inf(1), x) },
			func(x float64) float64 {
				if x < 0 {
					return math.Inf(-1)
				}
				return 1 + x
			},
		}).Draw(t, "shape")
		calls := 0
		f := func(x float64) float64 { calls++; return sign * shape(x-root) }
		a, b := -60.0, 70.0
		no, yes := signChange(f, a, f(a), b, f(b), fine)
		if f(no) >= 0 || f(yes) < 0 || math.Abs(no-yes) > 2*fine(no, yes) || math.Abs(yes-root) > 2*fine(root, yes) {
			t.Fatalf("root %v: between %v and %v", root, no, yes)
		}
		if calls > 130 {
			t.Fatalf("%d calls", calls)
		}
	})
}

func TestSummit(t *testing.T) {
	f := func(x float64) float64 { return 3 - math.Abs(x-0.7) } // a tent, as two limits make
	x, y := summit(f, 0, 0.5, f(0.5), 2, 40, 4)
	if math.Abs(x-0.7) > 1e-6 || y < 3-1e-6 {
		t.Errorf("%v %v", x, y)
	}
	if _, y = summit(f, 0, 0.5, f(0.5), 2, 40, 2.85); y > 2.99 {
		t.Error("did not stop when it was high enough:", y)
	}
}

// The numbers of each series in one decade, as many as the standard has, none twice.
func TestSeries(t *testing.T) {
	for series, n := range map[string]int{"E12": 12, "E24": 24, "R10": 10, "R20": 20} {
		list := inSeries(series, 0.1, 9.99)
		if len(list) != 2*n || list[0] != 0.1 {
			t.Errorf("%s: %v", series, list)
		}
		for i := 1; i < len(list); i++ {
			step := math.Pow(10, 1/float64(n))
			if r := list[i] / list[i-1]; r < step*0.93 || r > step*1.07 {
				t.Errorf("%s: from %v to %v", series, list[i-1], list[i])
			}
		}
	}
}
