package laplace

import (
	"math"

	"lagbook/laplace/matrix"
)

// bend lets the powers of τ above the first drive the modes through the vector in; those of
// weight 0 at the end are forgotten.
func (p *piece) bend(g *segmentNow, in *vector) {
	g.Poly = trimmed(g.Poly)
	for k, c := range g.Poly {
		if k == len(p.bent) {
			p.bent = append(p.bent, p.m.vector())
		}
		if c != 0 {
			p.bent[k].add(c, in)
		}
	}
}

// degree returns the highest power of τ in the inputs, at least 1.
func (p *piece) degree() int { return 1 + len(p.bent) }

// bentReal returns what τ², τ³, … make of real mode k.
func (p *piece) bentReal(k int, tau, f1 float64) float64 {
	var g powers
	g.fill(p.m.real[k], tau, f1, p.degree())
	x := 0.0
	for i := range p.bent {
		x += g[i+2] * p.bent[i].real[k]
	}
	return x
}

// bentPair is bentReal for a pair.
func (p *piece) bentPair(k int, tau float64, f1 complex128) complex128 {
	var g cpowers
	g.fill(p.m.pair[k], tau, f1, p.degree())
	var x complex128
	for i := range p.bent {
		x += g[i+2] * p.bent[i].pair[k]
	}
	return x
}

// bentSeen returns what τ², τ³, … drive real mode k with, as an output of weight v sees it.
func (p *piece) bentSeen(v float64, k int) []float64 {
	c := make([]float64, len(p.bent))
	for i := range c {
		c[i] = v * p.bent[i].real[k]
	}
	return c
}

// bentSeenPair is bentSeen for a pair.
func (p *piece) bentSeenPair(v complex128, k int) []complex128 {
	c := make([]complex128, len(p.bent))
	for i := range c {
		c[i] = v * p.bent[i].pair[k]
	}
	return c
}

// sizeOfBent bounds what τ², τ³, … drive a mode with over the piece.
func (p *piece) sizeOfBent(of func(v *vector) float64) float64 {
	sum, power := 0.0, p.length
	for i := range p.bent {
		power *= p.length
		sum += power * of(&p.bent[i])
	}
	return sum
}

// bend adds to z what τ², τ³, … make of the block; phi holds φ₀, φ₁, … at τ.
func (r *pieceBlock) bend(phi [][]float64, tau float64, z []float64) {
	for k, c := range r.bent {
		w := ofPower(k+2, tau)
		for i := range z {
			var x float64
			for j, v := range c {
				x += phi[k+3][i*r.n+j] * v
			}
			z[i] += w * x
		}
	}
}

// ofPower returns k!·τ^(k+1), by which φ_(k+1) becomes the response to τ^k.
func ofPower(k int, tau float64) float64 {
	w := tau
	for i := 1; i <= k; i++ {
		w *= float64(i) * tau
	}
	return w
}

// bentRate returns (k+2)!·c of the power τ^(k+2): what the derivatives of order k+2 of the
// inputs drive the block with at the start of the piece; nil where there is none.
func (r *pieceBlock) bentRate(k int) []float64 {
	if k >= len(r.bent) {
		return nil
	}
	rate := make([]float64, r.n)
	for i, v := range r.bent[k] {
		rate[i] = falling(k+2, k+2) * v
	}
	return rate
}

// bentPhis returns φ₀ to φ_m of the block at τ; m counts from the powers of the inputs.
func (r *pieceBlock) bentPhis(tau float64, more int) [][]float64 {
	return matrix.Phis(r.n, r.t, tau, len(r.bent)+2+more)
}

// boundOfPower returns the largest value that the derivative of order terms of τ^k brings
// up to τ, per unit; 0 where it brings none.
func boundOfPower(k int, tau float64) float64 {
	if k < terms {
		return 0
	}
	return falling(k, terms) * math.Pow(tau, float64(k-terms))
}
