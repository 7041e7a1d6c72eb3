package matrix

import (
	"errors"
	"math"
)

// ErrShape reports slices whose lengths do not fit Balance.N.
var ErrShape = errors.New("matrix: lengths do not fit the number of stores")

// ErrValue reports a capacity that is not positive, or a value that is not finite.
var ErrValue = errors.New("matrix: a capacity is not positive or a value is not finite")

// ErrNotRC reports a Balance that is not a network of resistances and capacitances.
var ErrNotRC = errors.New("matrix: exchange is not symmetric and non-negative")

// ErrRange reports capacities or exchanges of one network that differ by more than a factor of about 1e108.
var ErrRange = errors.New("matrix: values too far apart for floating point")

// check reports slices of the wrong length, capacities that are not positive
// and anything that is not finite. The diagonal of F is never looked at.
func (b *Balance) check() error {
	n := b.N
	if n < 0 || len(b.C) != n || len(b.Leak) != n || (n > 0 && (len(b.F)%n != 0 || len(b.F)/n != n)) {
		return ErrShape
	}
	for i := range n {
		// x−x is 0 for every finite x and NaN for the rest
		if c := b.C[i]; !(c > 0) || c-c != 0 || b.Leak[i]-b.Leak[i] != 0 {
			return ErrValue
		}
		for j, f := range b.F[i*n : i*n+n] {
			if f-f != 0 && j != i {
				return ErrValue
			}
		}
	}
	return nil
}

// IsRC reports whether b is a network of resistances and capacitances: F
// symmetric bit for bit, and no exchange or leak negative.
func (b *Balance) IsRC() bool {
	n := b.N
	for i := range n {
		if !(b.Leak[i] >= 0) {
			return false
		}
		for j := range i {
			if f := b.F[i*n+j]; f != b.F[j*n+i] || !(f >= 0) {
				return false
			}
		}
	}
	return true
}

// Dense returns A of x' = A x + f/C in 1/s, N×N row-major. Its diagonal is a
// rounded sum, in which a slow pole of a stiff network is lost: it serves small
// checks and the zeros of a transfer, never the poles of an RC network.
func (b *Balance) Dense() []float64 {
	n := b.N
	a := make([]float64, n*n)
	for i := range n {
		sum := b.Leak[i]
		for j := range n {
			if j != i {
				sum += b.F[i*n+j]
				a[i*n+j] = b.F[i*n+j] / b.C[i]
			}
		}
		a[i*n+i] = -sum / b.C[i]
	}
	return a
}

// exponent returns e with 2^e ≤ x < 2^(e+1) for a positive x.
func exponent(x float64) int {
	_, e := math.Frexp(x)
	return e - 1
}
