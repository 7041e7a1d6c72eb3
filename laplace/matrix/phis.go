package matrix

import "math"

// Phis returns φ₀(tT) = e^{tT} to φ_m(tT), m ≥ 2, of a small block T (1/s), t in s, each
// n×n row-major, where φ_k(Z) = Σ Zⁱ/(i+k)!: z' = T z + b·t^k answers from rest with
// k!·t^(k+1)·φ_(k+1)(tT) b.
//
// Accuracy: within 4e-15 of the norm of each function up to φ₁₄, and of e^{tT} a further
// 1.5e-15·‖tT‖ of its own decayed norm.
//
// Method: the series of φ_m at a fraction of the argument, the others from
// φ_k = Z φ_(k+1) + 1/k!, and doubling,
// φ_k(2Z) = 2^−k (e^Z φ_k(Z) + Σ φ_j(Z)/(k−j)!, 1 ≤ j ≤ k). Source: Berland, Skaflestad,
// Wright, ACM Trans. Math. Softw. 33 (2007) article 4, with Padé approximants where this
// has the series.
func Phis(n int, T []float64, t float64, m int) [][]float64 {
	phi := make([][]float64, m+1)
	for k := range phi {
		phi[k] = make([]float64, n*n)
	}
	if n == 0 {
		return phi
	}
	z, u := make([]float64, n*n), make([]float64, n*n)
	s := scaled(n, T, t, 0, z)
	if s < 0 {
		var mean float64
		for i := range n {
			mean += T[i*n+i] / float64(n)
		}
		beyond(n, mean*t, phi...)
		return phi
	}
	startPhis(n, z, u, phi)
	for ; s > 0; s-- {
		doublePhis(n, u, phi)
	}
	holdAll(phi...)
	return phi
}

// startPhis sums the series for ‖z‖ ≤ ½.
func startPhis(n int, z, u []float64, phi [][]float64) {
	m := len(phi) - 1
	for k := 14; k >= 0; k-- {
		multiply(n, u, phi[m], z)
		copy(phi[m], u)
		for i := range n {
			phi[m][i*n+i] += invFactorial[k+m]
		}
	}
	for k := m - 1; k >= 0; k-- {
		multiply(n, phi[k], phi[k+1], z)
		for i := range n {
			phi[k][i*n+i] += invFactorial[k]
		}
	}
}

// doublePhis takes the functions from Z to 2Z, the highest first.
func doublePhis(n int, u []float64, phi [][]float64) {
	for k := len(phi) - 1; k >= 0; k-- {
		multiply(n, u, phi[0], phi[k])
		f := math.Ldexp(1, -k)
		for i, v := range u {
			for j := 1; j <= k; j++ {
				v += phi[j][i] * invFactorial[k-j]
			}
			u[i] = held(f * v)
		}
		copy(phi[k], u)
	}
}
