package laplace

import (
	"errors"
	"fmt"
	"math"
	"math/cmplx"
)

// FromRatio returns the transfer num(s)/den(s), coefficients ascending, den of at
// least the degree of num. Time is scaled first so that the coefficients of den are
// of one size, and the equations are those of the companion matrix. Where zeros and
// poles are known, FromRoots keeps digits that coefficients have lost.
func FromRatio(num, den []float64) (*Transfer, error) {
	if err := finite("laplace: a coefficient", append(append([]float64(nil), num...), den...)...); err != nil {
		return nil, err
	}
	num, den = trimmed(num), trimmed(den)
	n := len(den) - 1
	switch {
	case n < 0:
		return nil, errors.New("laplace: the denominator is zero")
	case len(num) > len(den):
		return nil, errImproper
	}
	e := stateSpace{n: n, a: make([]float64, n*n), b: make([]float64, n), c: make([]float64, n)}
	lead := den[n]
	if len(num) == len(den) {
		e.d = num[n] / lead
	}
	w := timeScale(den)
	for i := range n {
		if i+1 < n {
			e.a[i*n+i+1] = w
		}
		// x_i is s^i/(w^i…): the last row holds the coefficients
		e.a[(n-1)*n+i] = -den[i] / lead * math.Pow(w, float64(i+1-n))
		var v float64
		if i < len(num) {
			v = num[i] / lead
		}
		e.c[i] = (v - e.d*den[i]/lead) * math.Pow(w, float64(i+1-n))
	}
	if n > 0 {
		e.b[n-1] = 1
	}
	return e.transfer()
}

// trimmed drops the zeros of the highest powers.
func trimmed(c []float64) []float64 {
	for len(c) > 0 && c[len(c)-1] == 0 {
		c = c[:len(c)-1]
	}
	return c
}

// timeScale is a power of two near the geometric mean of the moduli of the roots that
// are not 0.
func timeScale(den []float64) float64 {
	n, low := len(den)-1, 0
	for den[low] == 0 {
		low++
	}
	if n == low {
		return 1
	}
	return math.Exp2(math.Round(math.Log2(math.Abs(den[low]/den[n])) / float64(n-low)))
}

// FromRoots returns lead·Π(s − z)/Π(s − p), each root with its multiplicity and both
// members of a conjugate pair, no more zeros than poles. It is built as a row of
// sections of first and second order, so that no coefficient holds more than two
// roots: multiple and widely spread ones stay what they are.
func FromRoots(lead float64, zeros, poles []Pole) (*Transfer, error) {
	num, err := sections(zeros)
	if err != nil {
		return nil, err
	}
	den, err := sections(poles)
	if err != nil {
		return nil, err
	}
	if degree(num) > degree(den) {
		return nil, errImproper
	}
	e := stateSpace{d: lead}
	for len(den) > 0 {
		var top, bottom section
		top, num, bottom, den = nextSection(num, den)
		f := realised(top, bottom)
		e = e.series(&f)
	}
	return e.transfer()
}

// A section is one real root, or two: (s − root)·… with the roots p and q.
type section struct{ roots []complex128 }

func degree(list []section) int {
	n := 0
	for _, s := range list {
		n += len(s.roots)
	}
	return n
}

// sections splits roots into real ones and conjugate pairs.
func sections(roots []Pole) ([]section, error) {
	var list []section
	above, below := map[complex128]int{}, map[complex128]int{}
	for _, p := range roots {
		if !isNumber(real(p.P)) || !isNumber(imag(p.P)) || p.Mult < 1 {
			return nil, fmt.Errorf("laplace: %v (%d) is no root", p.P, p.Mult)
		}
		for range p.Mult {
			switch {
			case imag(p.P) == 0:
				list = append(list, section{[]complex128{p.P}})
			case imag(p.P) > 0:
				above[p.P]++
				list = append(list, section{[]complex128{p.P, cmplx.Conj(p.P)}})
			default:
				below[cmplx.Conj(p.P)]++
			}
		}
	}
	for _, p := range roots {
		up := complex(real(p.P), math.Abs(imag(p.P)))
		if above[up] != below[up] {
			return nil, fmt.Errorf("laplace: the root %v has no conjugate beside it", p.P)
		}
	}
	return list, nil
}

// nextSection takes the next poles, one or two, and no more zeros than those: a pair
// of poles the nearest pair of zeros or else two real ones, a real pole the nearest
// real zero or else, together with the next real pole, a pair.
func nextSection(num, den []section) (top section, restNum []section, bottom section, restDen []section) {
	bottom, den = den[0], den[1:]
	size := len(bottom.roots)
	if k := nearestSection(num, size, bottom); k >= 0 {
		top, num = num[k], without(num, k)
		return top, num, bottom, den
	}
	if size == 2 {
		for len(top.roots) < 2 {
			k := nearestSection(num, 1, bottom)
			if k < 0 {
				break
			}
			top.roots = append(top.roots, num[k].roots[0])
			num = without(num, k)
		}
		return top, num, bottom, den
	}
	if next := nearestSection(den, 1, bottom); next >= 0 && len(num) > 0 {
		bottom = section{[]complex128{bottom.roots[0], den[next].roots[0]}}
		den = without(den, next)
		k := nearestSection(num, 2, bottom)
		top, num = num[k], without(num, k)
	}
	return top, num, bottom, den
}

// nearestSection returns the section of that size whose root lies nearest, −1 for
// none.
func nearestSection(list []section, size int, to section) int {
	best := -1
	for k, s := range list {
		if len(s.roots) == size && (best < 0 || away(s, to) < away(list[best], to)) {
			best = k
		}
	}
	return best
}

func away(a, b section) float64 { return cmplx.Abs(a.roots[0] - b.roots[0]) }

func without(list []section, k int) []section {
	return append(append([]section(nil), list[:k]...), list[k+1:]...)
}

// realised returns Π(s − z)/Π(s − p) of a section.
func realised(top, bottom section) stateSpace {
	if len(bottom.roots) == 1 {
		p := real(bottom.roots[0])
		e := stateSpace{n: 1, a: []float64{p}, b: []float64{1}, c: []float64{1}}
		if len(top.roots) == 1 {
			e.d, e.c[0] = 1, p-real(top.roots[0])
		}
		return e
	}
	p, q := bottom.roots[0], bottom.roots[1]
	e := stateSpace{n: 2, b: []float64{0, 1}}
	// with x₁ = 1/((s−p)(s−q)) in units of link, x₂ = (s − first)·that
	first, link := real(p), 1.0
	e.a = []float64{real(p), 1, 0, real(q)}
	if imag(p) != 0 {
		link = imag(p)
		e.a = []float64{real(p), link, -link, real(p)}
	}
	r1, r0 := 0.0, 1.0 // the numerator left beside the direct part
	switch len(top.roots) {
	case 1:
		r1, r0 = 1, -real(top.roots[0])
	case 2:
		// (s−z)(s−w) − (s−p)(s−q)
		z, w := top.roots[0], top.roots[1]
		e.d = 1
		r1, r0 = real(p+q-z-w), real(z*w-p*q)
	}
	e.c = []float64{(r0 + r1*first) / link, r1}
	return e
}
