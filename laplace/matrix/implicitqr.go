package matrix

import (
	"math"

	"gonum.org/v1/gonum/lapack/gonum"
)

// implicitQR finds the singular values of an upper bidiagonal matrix
// B = Q S Pᵀ and carries vectors along: of those on the right Pᵀv is wanted, of
// those on the left Qᵀy.
//
// Source: Demmel, Kahan, Accurate singular values of bidiagonal matrices, SIAM
// J. Sci. Stat. Comput. 11 (1990) 873-912.
type implicitQR struct {
	d, e []float64
	z    []float64 // index by index: the values of all right vectors, then of all left
	half int       // number of vectors on a side
	swap []bool    // at these indices the two sides have changed places
}

// givens returns c, s and r > 0 with c f + s g = r and c g − s f = 0.
func givens(f, g float64) (c, s, r float64) {
	r = math.Sqrt(f*f + g*g)
	return f / r, g / r, r
}

// tolerance is the size, relative to what it couples, at which an entry beside
// the diagonal is dropped.
const tolerance = eps / 2

// run replaces d by the singular values, in any order, and each of the vectors
// right and left, of which it uses the first len(d) elements, by its value
// along every singular vector.
func (q *implicitQR) run(d, e []float64, right, left [][]float64) error {
	q.d, q.e = d, e
	q.take(right, left)
	lo, hi := len(d), len(d)-1
	safe := false
	budget := 100*len(d) + 1000
	for hi > 0 {
		if e[hi-1] == 0 {
			hi--
			continue
		}
		fresh := hi <= lo // a block not looked at before
		if lo = q.top(hi); fresh {
			q.orient(lo, hi)
			safe = q.look(lo, hi)
			if lo = q.top(hi); lo == hi {
				continue
			}
		}
		if hi-lo == 1 {
			q.pair(lo)
			continue
		}
		if budget--; budget == 0 {
			return ErrNoConvergence
		}
		safe = q.sweep(lo, hi, q.shift(lo, hi, safe))
	}
	q.give(right, left)
	return nil
}

// top returns the first index of the block that ends at hi.
func (q *implicitQR) top(hi int) int {
	for hi > 0 && q.e[hi-1] != 0 {
		hi--
	}
	return hi
}

// take lays the vectors index by index, for a sweep to turn as it passes.
func (q *implicitQR) take(right, left [][]float64) {
	n := len(q.d)
	q.half = len(right)
	q.z = resized(q.z, 2*q.half*n)
	if cap(q.swap) < n {
		q.swap = make([]bool, n)
	}
	q.swap = q.swap[:n]
	clear(q.swap)
	for i := range n {
		z := q.row(i)
		for j := range right {
			z[j], z[q.half+j] = right[j][i], left[j][i]
		}
	}
}

// row returns the values at index i.
func (q *implicitQR) row(i int) []float64 { return q.z[2*q.half*i : 2*q.half*(i+1)] }

// give returns the vectors to their sides and makes the singular values positive.
func (q *implicitQR) give(right, left [][]float64) {
	for i, d := range q.d {
		z := q.row(i)
		r, l := z[:q.half], z[q.half:]
		if q.swap[i] {
			r, l = l, r
		}
		sign := 1.0
		if math.Signbit(d) {
			q.d[i], sign = -d, -1
		}
		for j := range right {
			right[j][i], left[j][i] = sign*r[j], l[j]
		}
	}
}

// orient turns a block round that grows downwards, since sweeps go from its
// large to its small end: read from the bottom, its transpose is upper
// bidiagonal again, and right and left have changed places.
func (q *implicitQR) orient(lo, hi int) {
	if math.Abs(q.d[lo]) >= math.Abs(q.d[hi]) {
		return
	}
	for i, k := lo, hi; i <= k; i, k = i+1, k-1 {
		q.d[i], q.d[k] = q.d[k], q.d[i]
		x, y := q.row(i), q.row(k)
		for j := range q.half {
			if i == k {
				x[j], x[q.half+j] = x[q.half+j], x[j]
			} else {
				x[j], x[q.half+j], y[j], y[q.half+j] = y[q.half+j], y[j], x[q.half+j], x[j]
			}
		}
		q.swap[i] = !q.swap[i]
		if i != k {
			q.swap[k] = !q.swap[k]
		}
	}
	for i, k := lo, hi-1; i < k; i, k = i+1, k-1 {
		q.e[i], q.e[k] = q.e[k], q.e[i]
	}
}

// pair solves a block of two.
func (q *implicitQR) pair(lo int) {
	small, large, snr, csr, snl, csl := gonum.Implementation{}.Dlasv2(q.d[lo], q.e[lo], q.d[lo+1])
	q.d[lo], q.e[lo], q.d[lo+1] = large, 0, small
	x, y := q.row(lo), q.row(lo+1)
	for j := range q.half {
		x[j], y[j] = csr*x[j]+snr*y[j], csr*y[j]-snr*x[j]
	}
	for j := q.half; j < 2*q.half; j++ {
		x[j], y[j] = csl*x[j]+snl*y[j], csl*y[j]-snl*x[j]
	}
}

// A watch runs along a bidiagonal block and drops the entries beside the
// diagonal that are negligible against μ, a lower bound of the singular values
// above them (Demmel, Kahan, section 4). 1/μ bounds a row sum of the inverse,
// so that a rounding error of size δ in row i moves no singular value by more
// than δ/μ, relatively. Where entries and μ are of a size in every row a sweep
// with a shift, which rounds relative to the entries, is as accurate as one
// without.
type watch struct {
	mu   float64
	safe bool // so far, in the block that begins after the last entry dropped
}

// safeRatio is the ratio of an entry to μ up to which a shift is taken.
const safeRatio = 100

func newWatch(d float64) watch { return watch{math.Abs(d), true} }

// pass takes the next entry beside the diagonal and the next on it, and
// returns the former, 0 where it is negligible.
func (w *watch) pass(e, d float64) float64 {
	x, y := math.Abs(e), math.Abs(d)
	if x <= tolerance*w.mu {
		*w = watch{y, true}
		return 0
	}
	most := safeRatio * w.mu
	w.mu = y * (w.mu / (w.mu + x))
	if x > most || y > safeRatio*w.mu {
		w.safe = false
	}
	return e
}

// look passes a block without turning it, and says whether its last part is safe.
func (q *implicitQR) look(lo, hi int) bool {
	w := newWatch(q.d[lo])
	for i := lo; i < hi; i++ {
		q.e[i] = w.pass(q.e[i], q.d[i+1])
	}
	return w.safe
}

// shift returns the smaller singular value of the last two rows, or 0 where a
// shift would cost accuracy or would be lost beside the first entry.
func (q *implicitQR) shift(lo, hi int, safe bool) float64 {
	if !safe {
		return 0
	}
	s, _ := gonum.Implementation{}.Dlas2(q.d[hi-1], q.e[hi-1], q.d[hi])
	if r := s / q.d[lo]; r*r < eps {
		return 0
	}
	return s
}

// sweep runs one QR step down a block, drops what has become negligible, and
// says whether the last part of the block is safe for a shift.
//
// Step i turns columns i, i+1 by (f, g)/r, then rows i, i+1 by (F, G)/R. Only
// the direction of (f, g) is needed to go on: so F, G and the next f, g are
// formed without waiting for 1/r and 1/R, which are most of the time, and kept
// in size by a power of two; scale·(f, g) are their true values. d[i+1] is
// formed as the product that keeps the determinant, and cross is exactly 0
// where there is no shift: no difference is left then (the zero-shift QR).
func (q *implicitQR) sweep(lo, hi int, shift float64) (safe bool) {
	d, e := q.d[:hi+1], q.e[:hi]
	f, g, scale := d[lo], e[lo], 1.0
	if shift != 0 {
		f = (math.Abs(f) - shift) * (math.Copysign(1, f) + shift/f)
	}
	var w watch
	for i := lo; i < len(e); i++ {
		below := f*f + g*g
		r := math.Sqrt(below)
		beside := r * scale
		if beside < lostBulge {
			f, g, below, r = 1, 0, 1, 1
		}
		di, dn, cross := d[i], d[i+1], 0.0
		if shift != 0 {
			cross = f*e[i] - g*di
		}
		F, G := f*di+g*e[i], g*dn
		above := F*F + G*G
		R := math.Sqrt(above)
		ir, iR := 1/r, 1/R
		cr, sr, cl, sl := f*ir, g*ir, F*iR, G*iR
		d[i] = R * ir
		if i == lo {
			w = newWatch(d[i])
		} else {
			e[i-1] = w.pass(beside, d[i])
		}
		down, up := nearRoot(below, above)
		scale = ir * iR * up
		f = (F*cross + G*(f*dn)) * down
		d[i+1] = di * dn * (r * iR)
		if i+1 < len(e) {
			g = G * e[i+1] * (r * down)
			e[i+1] *= cl
		}
		if q.half > 0 {
			q.turn(i, cr, sr, cl, sl)
		}
	}
	last := w.pass(f*scale, d[hi])
	if math.Abs(last) <= tolerance*math.Abs(d[hi]) {
		last = 0
	}
	e[hi-1] = last
	return w.safe
}

// nearRoot returns a power of two near √(xy), up to a factor of 4, and its
// inverse, from the exponents of x and y.
func nearRoot(x, y float64) (inverse, root float64) {
	e := (math.Float64bits(x)>>52 + math.Float64bits(y)>>52) / 2 // biased by 1023
	return math.Float64frombits((2046 - e) << 52), math.Float64frombits(e << 52)
}

// lostBulge is a size of (f, g) at which the entry it leaves is negligible, and
// the shift it carried lost: d lies within 2^±190 (maxSpread).
const lostBulge = 0x1p-240

// turn applies the rotations of a step to the vectors.
func (q *implicitQR) turn(i int, cr, sr, cl, sl float64) {
	z := q.z[2*q.half*i : 2*q.half*(i+2)]
	if len(z) == 8 { // one input, one output
		a, b := z[0], z[4]
		z[0], z[4] = cr*a+sr*b, cr*b-sr*a
		a, b = z[1], z[5]
		z[1], z[5] = cr*a+sr*b, cr*b-sr*a
		a, b = z[2], z[6]
		z[2], z[6] = cl*a+sl*b, cl*b-sl*a
		a, b = z[3], z[7]
		z[3], z[7] = cl*a+sl*b, cl*b-sl*a
		return
	}
	x, y := z[:2*q.half], z[2*q.half:]
	for j := range q.half {
		x[j], y[j] = cr*x[j]+sr*y[j], cr*y[j]-sr*x[j]
	}
	for j := q.half; j < 2*q.half; j++ {
		x[j], y[j] = cl*x[j]+sl*y[j], cl*y[j]-sl*x[j]
	}
}
