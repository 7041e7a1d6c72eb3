package matrix

import (
	"math"
	"math/bits"
)

// Whether a determinant, a difference of sums or a remainder is exactly 0 cannot
// be seen in doubles. The doubles are rational numbers, so the question is put
// modulo a prime near 2^63 instead: what is not 0 comes out as 0 with a chance
// below 1e-15, and what is 0 always does.

const prime = 1<<63 - 25

type residue = uint64 // 0 ≤ r < prime

func modAdd(a, b residue) residue {
	if s := a + b; s >= prime {
		return s - prime
	} else {
		return s
	}
}

func modSub(a, b residue) residue {
	if a >= b {
		return a - b
	}
	return a + prime - b
}

func modMul(a, b residue) residue {
	hi, lo := bits.Mul64(a, b)
	return bits.Rem64(hi, lo, prime)
}

func modPow(a residue, k uint64) residue {
	r := residue(1)
	for ; k > 0; k >>= 1 {
		if k&1 == 1 {
			r = modMul(r, a)
		}
		a = modMul(a, a)
	}
	return r
}

// modInv is 1/a of a ≠ 0.
func modInv(a residue) residue { return modPow(a, prime-2) }

// modFloat is the residue of a finite double, taken as the rational it is.
func modFloat(v float64) residue {
	if v == 0 {
		return 0
	}
	m, e := math.Frexp(v)
	k := int64(m * (1 << 53))
	e -= 53
	r := residue(k)
	if k < 0 {
		r = prime - residue(-k)
	}
	if e >= 0 {
		return modMul(r, modPow(2, uint64(e)))
	}
	return modMul(r, modPow((prime+1)/2, uint64(-e)))
}

// modular is the matrix A of the given states, row-major.
func (s *system) modular(states []int) []residue {
	if s.stores != nil {
		return s.modularPart(states)
	}
	m := len(states)
	a := make([]residue, m*m)
	for p, i := range states {
		inv := modInv(modFloat(s.c[i]))
		for q, j := range states {
			if i != j && s.g[i*s.n+j] != 0 {
				a[p*m+q] = modMul(modFloat(s.g[i*s.n+j]), inv)
			}
		}
		if s.leak == nil {
			a[p*m+p] = modMul(modFloat(s.g[i*s.n+i]), inv)
			continue
		}
		sum := modFloat(s.leak[i])
		for j := 0; j < s.n; j++ {
			if j != i {
				sum = modAdd(sum, modFloat(s.g[i*s.n+j]))
			}
		}
		a[p*m+p] = modMul(modSub(0, sum), inv)
	}
	return a
}

// modCharacteristic returns det(sI − A), ascending and monic; a is overwritten.
//
// Method: Hessenberg form by elimination and its recurrence (H. Cohen, A Course in
// Computational Algebraic Number Theory, 1993, algorithm 2.2.9).
func modCharacteristic(n int, a []residue) []residue {
	modHessenberg(n, a)
	p := make([][]residue, n+1)
	p[0] = []residue{1}
	for k := 1; k <= n; k++ {
		q := make([]residue, k+1)
		d := a[(k-1)*n+k-1]
		for i, v := range p[k-1] {
			q[i+1] = modAdd(q[i+1], v)
			q[i] = modSub(q[i], modMul(d, v))
		}
		t := residue(1)
		for i := 1; i < k; i++ {
			t = modMul(t, a[(k-i)*n+k-i-1])
			if t == 0 {
				break
			}
			if w := modMul(t, a[(k-i-1)*n+k-1]); w != 0 {
				for j, v := range p[k-i-1] {
					q[j] = modSub(q[j], modMul(w, v))
				}
			}
		}
		p[k] = q
	}
	return p[n]
}

func modHessenberg(n int, a []residue) {
	for k := 1; k+1 < n; k++ {
		i := k
		for i < n && a[i*n+k-1] == 0 {
			i++
		}
		if i == n {
			continue
		}
		if i != k {
			for j := 0; j < n; j++ {
				a[i*n+j], a[k*n+j] = a[k*n+j], a[i*n+j]
			}
			for j := 0; j < n; j++ {
				a[j*n+i], a[j*n+k] = a[j*n+k], a[j*n+i]
			}
		}
		inv := modInv(a[k*n+k-1])
		for i := k + 1; i < n; i++ {
			f := modMul(a[i*n+k-1], inv)
			if f == 0 {
				continue
			}
			for j := k - 1; j < n; j++ {
				a[i*n+j] = modSub(a[i*n+j], modMul(f, a[k*n+j]))
			}
			for j := 0; j < n; j++ {
				a[j*n+k] = modAdd(a[j*n+k], modMul(f, a[j*n+i]))
			}
		}
	}
}

// modNumerator returns c adj(sI − A) b + d det(sI − A) and det(sI − A), ascending,
// by det(sI − A + b c) = det(sI − A) + c adj(sI − A) b.
func modNumerator(n int, a, b, c []residue, d residue) (num, den []residue) {
	shifted := make([]residue, n*n)
	for i := range b {
		for j := range c {
			shifted[i*n+j] = modSub(a[i*n+j], modMul(b[i], c[j]))
		}
	}
	den = modCharacteristic(n, append([]residue(nil), a...))
	num = modCharacteristic(n, shifted)
	for k := range num {
		num[k] = modAdd(modSub(num[k], den[k]), modMul(d, den[k]))
	}
	return modTrim(num), den
}

// modTrim takes leading zeros off.
func modTrim(p []residue) []residue {
	for len(p) > 0 && p[len(p)-1] == 0 {
		p = p[:len(p)-1]
	}
	return p
}

// modOrder is the multiplicity of the root 0.
func modOrder(p []residue) int {
	k := 0
	for k < len(p) && p[k] == 0 {
		k++
	}
	return k
}

// modCommon is the degree of the greatest common divisor.
func modCommon(p, q []residue) int {
	p, q = append([]residue(nil), p...), append([]residue(nil), q...)
	for len(q) > 0 {
		inv := modInv(q[len(q)-1])
		for len(p) >= len(q) {
			f := modMul(p[len(p)-1], inv)
			at := len(p) - len(q)
			for i, v := range q {
				p[at+i] = modSub(p[at+i], modMul(f, v))
			}
			p = modTrim(p)
		}
		p, q = q, p
	}
	return len(p) - 1
}
