package matrix

import (
	"errors"
	"math"
	"testing"
)

// The suite gives reduced polynomials; Ratio keeps common factors. Pairs where
// nothing cancels are compared coefficient by coefficient, the others by value.
func TestRatio(t *testing.T) {
	compared := 0
	for _, r := range readReference(t).Networks {
		if r.Form != "balance" || r.N > MaxRatioOrder {
			continue
		}
		b := r.balance()
		for _, p := range r.Pairs {
			num, den, err := b.Ratio(p.In, p.Out, p.D)
			if err != nil {
				t.Fatal(err)
			}
			if p.Zero {
				if len(num) != 0 {
					t.Errorf("%s %s: num = %v, want none", r.ID, p.Name, num)
				}
				continue
			}
			if p.Den == nil {
				continue
			}
			if len(den) == len(p.Den) {
				compared++
				comparePolynomials(t, r.ID+" "+p.Name+" numerator", num, p.Num)
				comparePolynomials(t, r.ID+" "+p.Name+" denominator", den, p.Den)
				continue
			}
			s := math.Abs(den[0]/den[1]) + 1e-3
			got, want := horner(num, s)/horner(den, s), horner(p.Num, s)/horner(p.Den, s)
			if math.Abs(got-want) > 1e-12*math.Abs(want) {
				t.Errorf("%s %s: H(%g) = %g, want %g", r.ID, p.Name, s, got, want)
			}
		}
	}
	if compared < 40 {
		t.Errorf("only %d pairs compared", compared)
	}
}

func comparePolynomials(t *testing.T, name string, got, want []float64) {
	t.Helper()
	if len(got) != len(want) {
		t.Errorf("%s: %v, want %v", name, got, want)
		return
	}
	for k := range got {
		// The coefficients of the suite are those of the decimals, rounded here to
		// doubles: differences of nearly equal ones (T28, T41) keep fewer digits.
		if tol := 1e-12 * math.Abs(want[k]); math.Abs(got[k]-want[k]) > tol {
			t.Errorf("%s: coefficient %d is %.17g, want %.17g", name, k, got[k], want[k])
		}
	}
}

func horner(p []float64, s float64) (v float64) {
	for k := len(p) - 1; k >= 0; k-- {
		v = v*s + p[k]
	}
	return v
}

func TestRatioRefuses(t *testing.T) {
	b := Balance{N: 11, C: make([]float64, 11), F: make([]float64, 121), Leak: make([]float64, 11)}
	if _, _, err := b.Ratio(make([]float64, 11), make([]float64, 11), 0); !errors.Is(err, ErrOrder) {
		t.Errorf("order 11: %v, want ErrOrder", err)
	}
	b = Balance{N: 1, C: []float64{1}, F: []float64{0}, Leak: []float64{math.NaN()}}
	if _, _, err := b.Ratio([]float64{1}, []float64{1}, 0); !errors.Is(err, ErrValue) {
		t.Errorf("NaN: %v, want ErrValue", err)
	}
}

// A numerator with coefficients that alternate nowhere has no positive zero
// (Descartes), and its degree is the count of zeros.
func TestZerosAgreeWithRatio(t *testing.T) {
	for _, r := range readReference(t).Networks {
		if r.Form != "balance" || r.N > MaxRatioOrder {
			continue
		}
		for _, p := range r.Pairs {
			if p.Zero {
				continue
			}
			b := r.balance()
			keep := b.Path(p.In, p.Out)
			part := b.Restrict(keep)
			num, _, err := part.Ratio(pick(p.In, keep), pick(p.Out, keep), p.D)
			if err != nil {
				t.Fatal(err)
			}
			zeros, err := b.Zeros(p.In, p.Out, p.D)
			if err != nil {
				t.Fatal(err)
			}
			if len(zeros) != len(num)-1 {
				t.Errorf("%s %s: %d zeros, numerator of degree %d", r.ID, p.Name, len(zeros), len(num)-1)
			}
			changes, positive := 0, 0
			for k := 1; k < len(num); k++ {
				if num[k]*num[k-1] < 0 {
					changes++
				}
			}
			for _, z := range zeros {
				if z.Im == 0 && z.Re > z.Radius {
					positive++
				}
			}
			if positive > changes || (changes-positive)%2 != 0 {
				t.Errorf("%s %s: %d positive zeros, %d changes of sign", r.ID, p.Name, positive, changes)
			}
		}
	}
}

func pick(v []float64, keep []int) []float64 {
	w := make([]float64, len(keep))
	for k, i := range keep {
		w[k] = v[i]
	}
	return w
}

func BenchmarkRatio(b *testing.B) {
	for _, n := range []int{4, 8} {
		net := randomNetwork(n, 5)
		in, out := unit(n, 0), unit(n, n-1)
		b.Run([]string{4: "n=4", 8: "n=8"}[n], func(b *testing.B) {
			for b.Loop() {
				if _, _, err := net.Ratio(in, out, 0); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// Coefficients that no double holds are refused, not returned as 0 or infinite.
func TestRatioRange(t *testing.T) {
	n := 8
	b := Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	for _, rate := range []float64{1e50, 1e-50} {
		for i := range n {
			b.C[i], b.Leak[i] = 1, rate
		}
		if _, _, err := b.Ratio(unit(n, 0), unit(n, 0), 0); !errors.Is(err, ErrRange) {
			t.Errorf("rates of %g: %v, want ErrRange", rate, err)
		}
	}
}
