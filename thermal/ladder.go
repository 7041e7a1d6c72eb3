package thermal

import (
	"math"
	"slices"
)

// maxTerms bounds the terms of one impedance, so that a setter needs no memory of its own.
const maxTerms = 64

// A ladder is the physical form of a transient thermal impedance: C[0] at the
// hot end, R[0] to the next node, C[1] there, and so on; R[n-1] ends at the far end.
type ladder struct {
	n    int
	c, r [maxTerms]float64 // J/K, K/W
}

// A term is one summand R·(1 − exp(−t/τ)) of a transient thermal impedance.
type term struct{ r, tau float64 } // K/W, s

// fromFoster turns a transient thermal impedance
//
//	Z(t) = Σ R_i (1 − exp(−t/τ_i))
//
// into the ladder that has the same impedance at its first end. The terms are
// sorted in place; R_i and τ_i are positive, the τ_i differ, and there are at
// most maxTerms of them.
//
// Method: Z(s) = Σ (R_i/τ_i)/(s + 1/τ_i) is written as Stieltjes' continued
// fraction m/(s + q₁/(1 + e₁/(s + q₂/(1 + …)))), whose coefficients are products
// of the ladder's elements. Poles are put in one by one, the fastest first: the
// origin moves down to the new pole (the stationary quotient-difference step,
// with a positive shift), then the pole is put in at the origin, which leaves
// the progressive step unchanged (after Rutishauser's qd; Laurie, J. Comput.
// Appl. Math. 112, 1999, 165–180, recovers quadrature coefficients alike). Every step adds,
// multiplies or divides positive numbers; the only differences are those of the
// time constants given. So each element of the ladder is right to a few dozen
// roundings, however far apart or close together the time constants lie.
// The cost is n² small steps.
func (l *ladder) fromFoster(terms []term) {
	slices.SortFunc(terms, func(a, b term) int {
		switch {
		case a.tau < b.tau:
			return -1
		case a.tau > b.tau:
			return 1
		}
		return 0
	})
	part(terms)
	var f fraction
	for i, t := range terms {
		if i > 0 {
			fast := terms[i-1].tau
			f.shift((t.tau - fast) / t.tau / fast)
		}
		f.insert(t.r / t.tau)
	}
	n := len(terms)
	f.shift(1 / terms[n-1].tau)
	f.ladder(l)
}

// A fraction is m/(s + q₁/(1 + e₁/(s + … q_n))).
type fraction struct {
	n    int
	m    float64
	q, e [maxTerms]float64
}

// shift moves the origin down by by > 0: every pole moves away from it by as much.
func (f *fraction) shift(by float64) {
	t := by
	for i := range f.n {
		q := f.q[i] + t
		t = f.e[i]*(t/q) + by
		f.e[i] *= f.q[i] / q
		f.q[i] = q
	}
}

// insert adds weight/s. The last q becomes 0: the pole stands at the origin
// until the next shift.
func (f *fraction) insert(weight float64) {
	if f.n == 0 {
		f.n, f.m = 1, weight
		return
	}
	total := f.m + weight
	keep, rise := f.m/total, weight/total // q' = keep·q, e' = e + rise·q
	for i := range f.n {
		gain := f.q[i] * rise
		f.q[i] *= keep
		e := f.e[i] + gain
		keep, rise = f.e[i]/e, gain/e
		f.e[i] = e
	}
	f.n++
	f.m = total
}

// ladder reads the elements off the coefficients.
func (f *fraction) ladder(l *ladder) {
	l.n = f.n
	c := 1 / f.m
	for i := range f.n {
		r := 1 / (c * f.q[i])
		l.c[i], l.r[i] = c, r
		if i < f.n-1 {
			c = 1 / (r * f.e[i])
		}
	}
}

// part moves equal time constants apart. The terms must be sorted.
func part(terms []term) {
	for i := 1; i < len(terms); i++ {
		if terms[i].tau <= terms[i-1].tau {
			terms[i].tau = math.Nextafter(terms[i-1].tau, math.Inf(1))
		}
	}
}

// within reports whether every element lies between two bounds.
func (l *ladder) within(low, high float64) bool {
	for i := range l.n {
		if !(l.c[i] > low && l.c[i] < high && l.r[i] > low && l.r[i] < high) {
			return false
		}
	}
	return true
}
