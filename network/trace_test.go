package network_test

import (
	"errors"
	"math"
	"testing"

	"lagbook/network"
)

// What is traced is the function to the tolerance, with its extremes, crossings, rates and
// integral; a bend and a jump at a cut are kept.
func TestTrace(t *testing.T) {
	smooth := func(t float64) float64 { return math.Exp(-t/3) * math.Abs(math.Sin(t)) }
	y := func(t float64) float64 {
		if t >= 7 {
			return smooth(t) + 1
		}
		return smooth(t)
	}
	left := func(t float64) float64 {
		if t > 7 {
			return smooth(t) + 1
		}
		return smooth(t)
	}
	r, err := network.Trace([]float64{0, 1, 7, 20}, 1e-10, y, left)
	if err != nil {
		t.Fatal(err)
	}
	for k := range 2001 {
		at := float64(k) / 100
		if e := math.Abs(r.At(0, at) - y(at)); e > 2e-9 {
			t.Fatalf("at %v wrong by %v", at, e)
		}
	}
	if e := r.Max(0, 0, 6); math.Abs(e.T-math.Atan(3)) > 1e-4 || math.Abs(e.Y-y(math.Atan(3))) > 1e-9 {
		t.Errorf("maximum %+v", e)
	}
	if x, ok := r.First(0, 1, 0, 20); !ok || x.T != 7 {
		t.Errorf("reaches 1 at %+v, %v; it jumps there at 7", x, ok)
	}
	if e := r.MaxRate(0, 0, 6); math.Abs(e.Y-1) > 1e-6 || e.T != 0 {
		t.Errorf("largest rate %+v, want 1 at 0", e)
	}
	want := (1 - math.Exp(-math.Pi/3)*(math.Cos(math.Pi)+math.Sin(math.Pi)/3)) / (1 + 1./9) // ∫ e^(−t/3) sin t to π
	if got := r.Integral(0, 0, math.Pi); math.Abs(got-want) > 1e-9 {
		t.Errorf("integral %v, want %v", got, want)
	}
	var none *network.NoValue
	root := func(t float64) float64 { return math.Sqrt(1 - t) }
	if _, err = network.Trace([]float64{0, 2}, 1e-9, root, root); !errors.As(err, &none) || none.At <= 1 {
		t.Errorf("the root of a negative number: %v", err)
	}
	noise := func(t float64) float64 { return math.Mod(1e9*math.Sin(1e9*t), 1) }
	if r, err = network.Trace([]float64{0, 1}, 1e-9, noise, noise); err != nil || r.Rounding(0) < 0.1 {
		t.Errorf("noise is taken for smooth: %v, %v", r.Rounding(0), err)
	}
}

// The steepest slope of a march: y' of a store that is charged through a resistance.
func TestMarchedRate(t *testing.T) {
	charge := func(t float64) float64 { return 1 - math.Exp(-t) }
	r, err := network.Trace([]float64{0, 5}, 1e-12, charge, charge)
	if err != nil {
		t.Fatal(err)
	}
	if hi, lo := r.MaxRate(0, 0, 5), r.MinRate(0, 0, 5); math.Abs(hi.Y-1) > 1e-8 || math.Abs(lo.Y-math.Exp(-5)) > 1e-8 || hi.T != 0 || lo.T != 5 {
		t.Errorf("rates %+v, %+v", hi, lo)
	}
}
