package matrix

// Exact is what can be said of a transfer without error, the doubles of a Balance
// taken as the rational numbers they are.
type Exact struct {
	Order       int // degree of det(sE − A)
	Degree      int // of the numerator; −1 where the transfer is identically zero
	OriginPoles int // multiplicity of the pole at 0, before cancellation
	OriginZeros int // multiplicity of the zero at 0, before cancellation
	Common      int // common factors of numerator and denominator: the poles that cancel
}

// Exact decides degrees, poles and zeros at 0, and how many poles cancel, for the
// transfer from the flows in to the weights out, d passed on at once.
//
// Method: characteristic polynomials modulo a prime near 2^63; a decision is wrong
// with a chance below 1e-15. Cost: 4 n³ modular products, 3 ms at 50 stores.
func (b *Balance) Exact(in, out []float64, d float64) Exact {
	s := b.system()
	states := make([]int, b.N)
	for i := range states {
		states[i] = i
	}
	x, y := make([]residue, b.N), make([]residue, b.N)
	for i := range x {
		if in[i] != 0 {
			x[i] = modMul(modFloat(in[i]), modInv(modFloat(b.C[i])))
		}
		y[i] = modFloat(out[i])
	}
	num, den := modNumerator(b.N, s.modular(states), x, y, modFloat(d))
	e := Exact{Order: b.N, Degree: len(num) - 1, OriginPoles: modOrder(den), OriginZeros: modOrder(num)}
	if len(num) > 0 {
		e.Common = modCommon(den, num)
	}
	return e
}
