package thermal

import (
	"fmt"
	"math"
	"math/big"
	"math/rand/v2"
	"testing"
)

// The ladder's impedance as a fraction of polynomials in s, in exact arithmetic, from its doubles.
// Z = P/Q with the innermost cell first: Z_n = R_n/(1 + s R_n C_n), Z_i = (R_i + Z_{i+1})/(1 + s C_i (R_i + Z_{i+1})).
func ladderRatio(l *ladder) (num, den []*big.Rat) {
	rat := func(v float64) *big.Rat { return new(big.Rat).SetFloat64(v) }
	num, den = []*big.Rat{new(big.Rat)}, []*big.Rat{big.NewRat(1, 1)}
	for i := l.n - 1; i >= 0; i-- {
		top := make([]*big.Rat, max(len(den), len(num))) // P + R Q
		for k := range top {
			top[k] = new(big.Rat)
			if k < len(den) {
				top[k].Mul(rat(l.r[i]), den[k])
			}
			if k < len(num) {
				top[k].Add(top[k], num[k])
			}
		}
		bottom := make([]*big.Rat, len(top)+1) // Q + s C top
		for k := range bottom {
			bottom[k] = new(big.Rat)
			if k < len(den) {
				bottom[k].Set(den[k])
			}
			if k > 0 {
				bottom[k].Add(bottom[k], new(big.Rat).Mul(rat(l.c[i]), top[k-1]))
			}
		}
		num, den = top, bottom
	}
	return num, den
}

func horner(p []*big.Rat, x *big.Float) (value, slope *big.Float) {
	value, slope = new(big.Float).SetPrec(prec), new(big.Float).SetPrec(prec)
	for k := len(p) - 1; k >= 0; k-- {
		slope.Add(slope.Mul(slope, x), value)
		value.Add(value.Mul(value, x), new(big.Float).SetPrec(prec).SetRat(p[k]))
	}
	return value, slope
}

const prec = 1200

// ladderErrors returns the worst relative error of the ladder's poles against −1/τ, and of its impedance at
// s = 0 and at every 1/τ. From exact coefficients a few Newton steps from the known pole reach the ladder's own pole.
func ladderErrors(l *ladder, terms []term) (pole, impedance float64) {
	num, den := ladderRatio(l)
	exact := func(v float64) *bigFloat { return new(bigFloat).SetPrec(prec).SetFloat64(v) }
	at := []*bigFloat{exact(0)}
	for _, t := range terms {
		rate := new(bigFloat).SetPrec(prec).Quo(exact(1), exact(t.tau))
		at = append(at, rate)
		want := new(bigFloat).SetPrec(prec).Neg(rate)
		x := new(bigFloat).SetPrec(prec).Set(want)
		for range 12 {
			v, d := horner(den, x)
			x.Sub(x, v.Quo(v, d))
		}
		pole = max(pole, relative(x, want))
	}
	for _, s := range at {
		n, _ := horner(num, s)
		d, _ := horner(den, s)
		want := new(bigFloat).SetPrec(prec)
		for _, t := range terms { // R/(1 + sτ)
			share := new(bigFloat).SetPrec(prec).Mul(s, exact(t.tau))
			share.Quo(exact(t.r), share.Add(share, exact(1)))
			want.Add(want, share)
		}
		impedance = max(impedance, relative(n.Quo(n, d), want))
	}
	return pole, impedance
}

type bigFloat = big.Float

func relative(got, want *big.Float) float64 {
	d := new(big.Float).SetPrec(prec).Sub(got, want)
	f, _ := d.Quo(d, want).Float64()
	return math.Abs(f)
}

// exactLadder is Z06's route in exact rationals: divide 1/Z, take the constant out, invert, and so on.
func exactLadder(terms []term) (c, r []float64) {
	num, den := []*big.Rat{new(big.Rat)}, []*big.Rat{big.NewRat(1, 1)}
	for _, t := range terms { // Z = Σ R/(1 + sτ)
		R, tau := new(big.Rat).SetFloat64(t.r), new(big.Rat).SetFloat64(t.tau)
		grown := make([]*big.Rat, len(den)+1)
		sum := make([]*big.Rat, len(den)+1)
		for k := range grown {
			grown[k], sum[k] = new(big.Rat), new(big.Rat)
			if k < len(den) {
				grown[k].Set(den[k])
				sum[k].Mul(R, den[k])
			}
			if k < len(num) {
				sum[k].Add(sum[k], num[k])
			}
			if k > 0 {
				grown[k].Add(grown[k], new(big.Rat).Mul(tau, den[k-1]))
				if k-1 < len(num) {
					sum[k].Add(sum[k], new(big.Rat).Mul(tau, num[k-1]))
				}
			}
		}
		num, den = sum[:len(den)], grown
	}
	for len(den) > 1 {
		C := new(big.Rat).Quo(den[len(den)-1], num[len(num)-1]) // 1/Z = sC + …
		f, _ := C.Float64()
		c = append(c, f)
		for k := range num {
			den[k+1].Sub(den[k+1], new(big.Rat).Mul(C, num[k]))
		}
		den = den[:len(den)-1]
		R := new(big.Rat).Quo(num[len(num)-1], den[len(den)-1])
		f, _ = R.Float64()
		r = append(r, f)
		for k := range den {
			num[k].Sub(num[k], new(big.Rat).Mul(R, den[k]))
		}
		num = num[:len(num)-1]
	}
	return c, r
}

func elementError(l *ladder, terms []term) float64 {
	c, r := exactLadder(terms)
	worst := 0.0
	for i := range c {
		worst = max(worst, math.Abs(l.c[i]/c[i]-1), math.Abs(l.r[i]/r[i]-1))
	}
	return worst
}

func TestLadderOfKnownImpedances(t *testing.T) {
	for _, c := range []struct {
		name, source string
		terms        []term
		c, r         []float64
		tol          float64
	}{
		{"Z06", "textbook driving-point example Z(s) = (2s+5)/(s²+4s+3), first Cauer form 1/2, 4/3, 3/2, 1/3",
			[]term{{1.5, 1}, {1.0 / 6, 1.0 / 3}}, []float64{0.5, 1.5}, []float64{4.0 / 3, 1.0 / 3}, 1e-15},
		{"one term", "C = τ/R", []term{{0.2, 3}}, []float64{15}, []float64{0.2}, 1e-15},
		{"Z03", "four-term set as IEC 60747-9 states it, converted in 30-digit arithmetic",
			[]term{{0.004, 0.001}, {0.012, 0.012}, {0.032, 0.055}, {0.012, 0.35}},
			[]float64{0.1780593839607807, 0.5196127684143216, 2.0510811155834725, 41.62859625381583},
			[]float64{0.00770409072640172, 0.025080682846930137, 0.0194243757381067, 0.007790850688561442}, 1e-14},
	} {
		var l ladder
		l.fromFoster(c.terms)
		for i := range c.c {
			if math.Abs(l.c[i]/c.c[i]-1) > c.tol || math.Abs(l.r[i]/c.r[i]-1) > c.tol {
				t.Errorf("%s (%s): cell %d is %.17g J/K, %.17g K/W, want %.17g, %.17g", c.name, c.source, i, l.c[i], l.r[i], c.c[i], c.r[i])
			}
		}
	}
}

// Elements, poles and impedance against exact rational arithmetic, over spreads of 1e10 and more and time
// constants that nearly meet: the claim of fromFoster.
func TestLadderIsAccurateForAnySpread(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 11))
	shapes := []struct {
		name string
		tau  func(i, n int) float64
	}{
		{"decades over 1e10", func(i, n int) float64 {
			return 1e-6 * math.Pow(1e10, float64(i)/float64(n-1)) * (1 + 0.3*rng.Float64())
		}},
		{"decades over 1e24", func(i, n int) float64 {
			return 1e-12 * math.Pow(1e24, float64(i)/float64(n-1)) * (1 + 0.3*rng.Float64())
		}},
		{"within a factor 2", func(i, n int) float64 { return 1 + (float64(i)+0.9*rng.Float64())/float64(n) }},
		{"within 1e-9", func(i, n int) float64 { return 1 + 1e-9*(float64(i)+0.9*rng.Float64())/float64(n) }},
		{"pairs 1e-13 apart", func(i, n int) float64 { return math.Pow(10, float64(i/2)) * (1 + 1e-13*float64(i%2)) }},
	}
	var element, pole, impedance float64
	for _, shape := range shapes {
		for _, n := range []int{2, 3, 4, 6, 9, 12} {
			for range 1 + 6/n {
				terms := make([]term, n)
				for i := range terms {
					terms[i] = term{math.Pow(10, 4*rng.Float64()-3), shape.tau(i, n)}
				}
				rng.Shuffle(n, func(i, j int) { terms[i], terms[j] = terms[j], terms[i] })
				var l ladder
				l.fromFoster(terms)
				e := elementError(&l, terms)
				p, z := ladderErrors(&l, terms)
				if e > 1e-13 || p > 1e-13 || z > 1e-13 {
					t.Errorf("%s, %d terms: elements off by %.1e, poles by %.1e, impedance by %.1e", shape.name, n, e, p, z)
				}
				element, pole, impedance = max(element, e), max(pole, p), max(impedance, z)
			}
		}
	}
	t.Logf("worst relative error: elements %.1e, poles %.1e, impedance %.1e", element, pole, impedance)
}

func TestEqualTimeConstantsKeepTheirImpedance(t *testing.T) {
	terms := []term{{1, 2}, {0.5, 7}, {3, 2}}
	var l ladder
	l.fromFoster(terms)
	num, den := ladderRatio(&l)
	for _, s := range []float64{0, 1e-3, 0.5, 40} {
		x := new(big.Float).SetPrec(prec).SetFloat64(s)
		n, _ := horner(num, x)
		d, _ := horner(den, x)
		got, _ := n.Quo(n, d).Float64()
		want := 4/(1+2*s) + 0.5/(1+7*s)
		if math.Abs(got/want-1) > 4e-15 {
			t.Errorf("Z(%g) = %.17g, want %.17g", s, got, want)
		}
	}
}

func BenchmarkLadder(b *testing.B) {
	for _, n := range []int{4, 12} {
		b.Run(fmt.Sprintf("terms=%d", n), func(b *testing.B) {
			var l ladder
			terms := make([]term, n)
			for i := range terms {
				terms[i] = term{0.1, math.Pow(10, float64(i)-6)}
			}
			b.ReportAllocs()
			for b.Loop() {
				l.fromFoster(terms)
			}
		})
	}
}
