package laplace

import "math"

// The response of one mode z' = p z + u from rest to u = τ^k is
//
//	g_k = k!·τ^(k+1)·φ_(k+1)(pτ) = τ^(k+1)·γ_k(pτ),  γ_k(x) = Σ xⁱ·k!/(k+1+i)!,
//
// with g₀ = f1 and g₁ = f2 of phi1 and phi2. Of the recurrence k·γ_(k−1) = 1 + x·γ_k the
// upward way loses a factor (k+1)/|x| in each step and the downward way |x|/(k+1), so that
// each is gone where it gains: up while |x| is large beside k, down from the series of the
// highest for the rest. So a slow pole keeps all its digits, and a pole at 0 is no case of
// its own.

// A powers holds g[k] for each power of the input, and one more for an integral.
type powers [MaxDegree + 2]float64

// fill sets g[0] to g[d] at τ; f1 is what phi1 gave.
func (g *powers) fill(p, tau, f1 float64, d int) {
	g[0] = f1
	x, power, k := p*tau, tau, 1
	for ; k <= d && math.Abs(x) >= upward*float64(max(k, 2)+1); k++ {
		g[k] = (float64(k)*g[k-1] - power) / p
		power *= tau
	}
	if k > d {
		return
	}
	gamma := highest(x, d)
	g[d] = gamma
	for j := d; j > k; j-- {
		gamma = (1 + x*gamma) / float64(j)
		g[j-1] = gamma
	}
	for power *= tau; k <= d; k++ {
		g[k] *= power
		power *= tau
	}
}

// upward is the |x|/(k+1) from which on the way up is gone.
const upward = 0.7

// highest returns γ_d(x) by its series; for |x| below upward·(d+1) its terms cancel to a
// fifth of their sum at worst.
func highest(x float64, d int) float64 {
	sum, term := 1.0, 1.0
	for j := d + 2; math.Abs(term) > epsilon/8*sum; j++ {
		term *= x * inverse[j]
		sum += term
	}
	return sum / float64(d+1)
}

// inverse holds 1/j for every j that highest comes to.
var inverse = func() (v [96]float64) {
	for j := range v {
		v[j] = 1 / max(float64(j), 1)
	}
	return v
}()

// A cpowers is a powers for a complex pole.
type cpowers [MaxDegree + 2]complex128

// fill is that of powers.
func (g *cpowers) fill(p complex128, tau float64, f1 complex128, d int) {
	g[0] = f1
	x, power, k := complex(real(p)*tau, imag(p)*tau), tau, 1
	for ; k <= d && abs1(x) >= float64(max(k, 2)+1); k++ { // |x| ≥ upward·(k+1), whatever the angle
		g[k] = (complex(float64(k), 0)*g[k-1] - complex(power, 0)) / p
		power *= tau
	}
	if k > d {
		return
	}
	gamma := chighest(x, d)
	g[d] = gamma
	for j := d; j > k; j-- {
		gamma = over(1+x*gamma, float64(j))
		g[j-1] = gamma
	}
	for power *= tau; k <= d; k++ {
		g[k] = complex(real(g[k])*power, imag(g[k])*power)
		power *= tau
	}
}

// chighest is highest for a complex pole.
func chighest(x complex128, d int) complex128 {
	sum, term := complex(1, 0), complex(1, 0)
	for j := d + 2; abs1(term) > epsilon/8*abs1(sum); j++ {
		term = scale(term*x, inverse[j])
		sum += term
	}
	return over(sum, float64(d+1))
}

func over(z complex128, d float64) complex128 { return complex(real(z)/d, imag(z)/d) }
