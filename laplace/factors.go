package laplace

import (
	"math"
	"math/cmplx"
	"slices"
)

// factors is |H(iω)| = exp(scale)·Π|iω − z| / Π|iω − p| with u = ln ω as the
// variable: sums that are bounded over a whole interval of u at once.
type factors struct {
	scale float64
	each  []factor
	atTop float64 // ln |H| for ω → ∞, where the relative degree is 0
	off   float64 // by how much the product was seen to differ from H, in ln: poles and zeros that nearly coincide
}

// A factor is |iω − root|^power of a real root or, with im > 0, of a conjugate pair
// |iω − root|^power·|iω − conj|^power. power is the multiplicity, negative for a pole.
type factor struct {
	re, im, power float64
}

func sortedCorners(list []Corner) []Corner {
	slices.SortStableFunc(list, func(a, b Corner) int {
		switch {
		case a.Omega < b.Omega:
			return -1
		case a.Omega > b.Omega:
			return 1
		}
		return 0
	})
	return list
}

// factors builds the product; its scale is that of H itself at one frequency
// between the corners.
func (r *FrequencyResponse) factors() factors {
	var f factors
	f.add(r.h.Zeros, +1)
	f.add(r.h.Poles, -1)
	omega := 1.0
	if c := r.h.Corners(); len(c) > 0 {
		omega = 0.37 * c[0].Omega // well off the axis roots, where H is far from lost
	}
	h, _ := r.solve(omega)
	f.scale = math.Log(cmplx.Abs(h)) - f.log(omega)
	f.atTop = f.scale
	for _, c := range r.h.Corners() {
		h, _ := r.solve(c.Omega)
		if d := math.Abs(f.log(c.Omega) - math.Log(cmplx.Abs(h))); d < math.Inf(1) {
			f.off = max(f.off, 2*d)
		}
	}
	return f
}

func (f *factors) add(roots []Pole, sign float64) {
	for _, p := range roots {
		if imag(p.P) >= 0 {
			f.each = append(f.each, factor{real(p.P), imag(p.P), sign * float64(p.Mult)})
		}
	}
}

// log returns ln |H(iω)|.
func (f *factors) log(omega float64) float64 {
	sum := f.scale
	for _, x := range f.each {
		v := math.Log(math.Hypot(x.re, omega-x.im))
		if x.im > 0 {
			v += math.Log(math.Hypot(x.re, omega+x.im))
		}
		sum += x.power * v
	}
	return sum
}

// slope returns d ln|H| / d ln ω: decades a decade.
func (f *factors) slope(omega float64) float64 {
	lo, hi := f.slopes(omega, omega)
	return lo + (hi-lo)/2
}

// slopes encloses the slope over [a, b]. Whole numbers are summed apart, so that
// far from the corners the rest keeps its sign.
func (f *factors) slopes(a, b float64) (lo, hi float64) {
	whole := 0.0
	for i := range f.each {
		x := &f.each[i]
		w, l, h := x.slopes(a, b)
		if x.power < 0 {
			l, h = h, l
		}
		whole += x.power * w
		lo += x.power * l
		hi += x.power * h
	}
	return lo + whole, hi + whole
}

// slopes encloses whole + [lo, hi], the slope of the factor with power 1. With
// x = ω² it is x/(x+α²) for a real root α, and 2x(x+c)/Q for a pair α ± iβ,
// c = α²−β², Q = (α²+(ω−β)²)·(α²+(ω+β)²); above the corner what is missing to 1 and
// to 2 is taken.
func (x *factor) slopes(a, b float64) (whole, lo, hi float64) {
	if x.im == 0 {
		if a > math.Abs(x.re) {
			return 1, -share(x.re, a), -share(x.re, b)
		}
		return 0, share(a, x.re), share(b, x.re)
	}
	corner := square(x.re) + square(x.im)
	least, most := x.quartic(a, b)
	c, xa, xb := (x.re-x.im)*(x.re+x.im), square(a), square(b)
	if xa > corner {
		n0, n1 := -2*(c*xa+square(corner)), -2*(c*xb+square(corner))
		lo, hi = quotients(min(n0, n1), max(n0, n1), least, most)
		return 2, lo, hi
	}
	n0, n1 := 2*xa*(xa+c), 2*xb*(xb+c)
	low := min(n0, n1)
	if v := -c / 2; xa < v && v < xb {
		low = 2 * v * (v + c)
	}
	lo, hi = quotients(low, max(n0, n1), least, most)
	return 0, lo, hi
}

// quartic encloses Q of slopes.
func (x *factor) quartic(a, b float64) (least, most float64) {
	re := square(x.re)
	near, far := max(0, a-x.im, x.im-b), max(math.Abs(a-x.im), math.Abs(b-x.im))
	return (re + square(near)) * (re + square(a+x.im)), (re + square(far)) * (re + square(b+x.im))
}

// quotients encloses [n0, n1]/[d0, d1], d0 ≥ 0.
func quotients(n0, n1, d0, d1 float64) (lo, hi float64) {
	over := func(n, near, far float64) float64 {
		switch {
		case n > 0:
			return n / near
		case n < 0:
			return n / far
		}
		return 0
	}
	return over(n0, d1, d0), over(n1, d0, d1)
}

func square(x float64) float64 { return x * x }

// share returns x²/(x² + y²), of a root at 0 all.
func share(x, y float64) float64 {
	h := math.Hypot(x, y)
	if h == 0 {
		return 1
	}
	return (x / h) * (x / h)
}

// logs encloses ln|H| over [a, b] = [m/k, m·k]: from its value in the middle and the
// slopes.
func (f *factors) logs(a, m, b float64) (lo, hi, down, up float64) {
	down, up = f.slopes(a, b)
	half := math.Log(b/a) / 2
	reach := half * max(math.Abs(down), math.Abs(up))
	v := f.log(m)
	return v - reach - f.off, v + reach + f.off, down, up
}

// unwind returns the phase of w followed from ω → 0: that of the product, moved to
// the whole turn nearest to the phase itself.
func (f *factors) unwind(w FrequencyPoint) float64 {
	var sum float64
	for _, x := range f.each {
		v := x.turn(w.Omega, x.im)
		if x.im > 0 {
			v += x.turn(w.Omega, -x.im)
		}
		sum += x.power * v
	}
	sum *= 180 / math.Pi
	turns := math.Round((sum - w.Phase) / 180)
	return w.Phase + 180*turns
}

// turn returns how far the angle of iω − (re + i·im) has turned on the way from 0 to
// ω; a root at 0 starts with a quarter turn, one on the axis is passed as if it lay
// just left of it.
func (x *factor) turn(omega, im float64) float64 {
	if x.re == 0 {
		switch {
		case im == 0:
			return math.Pi / 2
		case im > 0 && omega > im:
			return math.Pi
		}
		return 0
	}
	a := math.Atan2(omega-im, math.Abs(x.re)) - math.Atan2(-im, math.Abs(x.re))
	if x.re > 0 {
		return -a
	}
	return a
}
