package matrix

import "math"

// PhiWork is the length of work that PhiInto needs for a block of n states.
func PhiWork(n int) int {
	if n <= 2 {
		return 0
	}
	return 5 * n * n
}

// Phi returns e^{tT}, φ₁(tT) and φ₂(tT) of a small block T (1/s), t in s, each n×n
// row-major, where
//
//	φ₁(Z) = Σ Zᵏ/(k+1)!,   φ₂(Z) = Σ Zᵏ/(k+2)!:
//
// z' = T z + b u answers a step with t·φ₁ b and a ramp with t²·φ₂ b, whatever the
// poles, 0 included.
//
// Accuracy: within 3e-15 of the norm of each function, mostly 5e-16, for one and two
// states; for more 4e-15, and of e^{tT} a further 1.5e-15·‖tT‖ of its own decayed norm. A decayed e^{tT} is 0; growth past 1e150 is held
// about there, so that nothing is NaN or infinite for finite arguments.
//
// Method: N. J. Higham, Functions of Matrices (2008), 10.7.4: series and doubling,
// the mean taken out of e^{tT}; closed forms for one and two states.
func Phi(n int, T []float64, t float64) (e, p1, p2 []float64) {
	e, p1, p2 = make([]float64, n*n), make([]float64, n*n), make([]float64, n*n)
	PhiInto(n, T, t, e, p1, p2, make([]float64, PhiWork(n)))
	return e, p1, p2
}

// PhiInto is Phi into the storage of e, p1 and p2, n×n each, without allocation;
// work has length PhiWork(n) or more.
func PhiInto(n int, T []float64, t float64, e, p1, p2, work []float64) {
	switch n {
	case 0:
	case 1:
		e[0], p1[0], p2[0] = phi1(T[0], t)
	case 2:
		phi2(T, t, e, p1, p2)
		holdAll(e, p1, p2)
	default:
		phiN(n, T, t, e, p1, p2, work)
		holdAll(e, p1, p2)
	}
}

// invFactorial[k] is 1/k!.
var invFactorial = func() (f [34]float64) {
	v := 1.0
	for k := range f {
		if k > 0 {
			v *= float64(k) // exact to 22!, then within rounding
		}
		f[k] = 1 / v
	}
	return f
}()

const phiCeiling = 345 // e^345 = 1e150: what grows is held there, so that its square is still a number

// expHeld is e^x held below overflow.
func expHeld(x float64) float64 { return math.Exp(math.Min(x, phiCeiling)) }

// phi1 is the case of one state.
func phi1(rate, t float64) (e, p1, p2 float64) {
	z := rate * t
	if z > phiCeiling {
		z = phiCeiling
	}
	if math.Abs(z) < 1 {
		for k := terms(math.Abs(z)); k >= 0; k-- {
			p2 = p2*z + invFactorial[k+2]
		}
		p1 = 1 + z*p2
		return 1 + z*p1, p1, p2
	}
	e = math.Exp(z)
	if low := math.FMA(rate, t, -z); e > 0 && math.Abs(low) < 1 {
		e += e * low
	}
	p1 = math.Expm1(z) / z
	return e, p1, (p1 - 1) / z
}

// terms is the degree at which the series of φ₂ ends for |z| ≤ 3.
func terms(z float64) int {
	switch {
	case z < 0x1p-10:
		return 5
	case z < 0.1:
		return 9
	case z < 0.5:
		return 13
	case z < 1:
		return 17
	}
	return 30
}

// A twin is p + q·N of the algebra that a 2×2 matrix of mean 0 spans, N² = Δ.
type twin struct{ p, q float64 }

func (x twin) times(y twin, delta float64) twin {
	return twin{x.p*y.p + x.q*y.q*delta, x.p*y.q + x.q*y.p}
}

// phi2 is the case of two states: tT = a + N with N² = Δ. The mean and √Δ are
// formed in doubled precision before they meet t, so that the phase of an
// undamped pair is right after many periods.
func phi2(T []float64, t float64, e, p1, p2 []float64) {
	half := toDD(0.5 * T[0]).sub(toDD(0.5 * T[3]))
	mean := toDD(0.5 * T[0]).add(toDD(0.5 * T[3]))
	disc := half.mul(half).add(toDD(T[1]).mul(toDD(T[2])))
	n0, n1, n2 := half.hi*t, T[1]*t, T[2]*t
	m := mean.mul(toDD(t))
	r := disc.abs().sqrt().mul(toDD(t)).abs()
	size := math.Abs(m.hi) + r.hi
	if !(size < math.MaxFloat64) || !(math.Abs(n0)+math.Abs(n1)+math.Abs(n2) < math.MaxFloat64) {
		beyond(2, m.hi, e, p1, p2)
		return
	}
	delta := math.Copysign(r.hi*r.hi, disc.hi)
	var x0, x1, x2 twin
	if size <= 3 {
		x0, x1, x2 = series2(m.hi, delta, size)
		if size > 0.5 {
			x0 = exp2(m, r, disc.hi < 0)
		}
	} else {
		x0, x1, x2 = far2(m, r, delta)
	}
	for k, x := range [3]twin{x0, x1, x2} {
		out := [3][]float64{e, p1, p2}[k]
		out[0], out[1], out[2], out[3] = x.p+x.q*n0, x.q*n1, x.q*n2, x.p-x.q*n0
	}
}

// beyond fills in what is left where t·T is not finite: nothing of a decaying
// block, the bound of growth otherwise.
func beyond(n int, a float64, out ...[]float64) {
	for _, x := range out {
		clear(x[:n*n])
		if a > 0 {
			for i := 0; i < n; i++ {
				x[i*n+i] = 1e150
			}
		}
	}
}

// series2 sums the series of φ₂ and takes φ₁ and the exponential from it.
func series2(a, delta, size float64) (x0, x1, x2 twin) {
	for k := terms(size); k >= 0; k-- {
		x2 = twin{x2.p*a + x2.q*delta + invFactorial[k+2], x2.p + x2.q*a}
	}
	z := twin{a, 1}
	x1 = x2.times(z, delta)
	x1.p++
	x0 = x1.times(z, delta)
	x0.p++
	return x0, x1, x2
}

// far2 is phi2 beyond the series: the exponential in closed form, the others by
// Z φ_{k+1} = φ_k − 1/k!, or by doubling where Z is nearly singular.
func far2(a, r dd, delta float64) (x0, x1, x2 twin) {
	x0 = exp2(a, r, delta < 0)
	det := (math.Abs(a.hi) - r.hi) * (math.Abs(a.hi) + r.hi)
	if delta < 0 {
		det = a.hi*a.hi + r.hi*r.hi
	}
	if !(math.Abs(det) < math.MaxFloat64) {
		return x0, twin{x0.p, 0}, twin{x0.p, 0}
	}
	if math.Abs(det) < 0.05*(a.hi*a.hi+r.hi*r.hi) {
		_, x1, x2 = double2(a.hi, delta, r.hi)
		return x0, x1, x2
	}
	inv := twin{a.hi / det, -1 / det}
	x1 = twin{x0.p - 1, x0.q}.times(inv, delta)
	x2 = twin{x1.p - 1, x1.q}.times(inv, delta)
	return x0, x1, x2
}

// exp2 is e^(a+N) with N² = ±r², minus where the poles are a pair.
func exp2(a, r dd, pair bool) twin {
	if pair {
		s, c := math.Sincos(r.hi)
		s, c = s+c*r.lo, c-s*r.lo
		g := expDD(a)
		if r.hi < 1e-8 { // sin r/r
			return twin{g * c, g}
		}
		return twin{g * c, g * s / r.hi}
	}
	if r.hi < 1 {
		g, sum, dif, delta := expDD(a), 0.0, 0.0, r.hi*r.hi
		for k := 9; k >= 0; k-- {
			sum = sum*delta + invFactorial[2*k]
			dif = dif*delta + invFactorial[2*k+1]
		}
		return twin{g * sum, g * dif}
	}
	up, down := expDD(a.add(r))/2, expDD(a.sub(r))/2
	return twin{up + down, (up - down) / r.hi}
}

// expDD is e^x of a doubled number, held below overflow.
func expDD(x dd) float64 {
	if math.Abs(x.lo) > 0.5 {
		return expHeld(x.hi)
	}
	g := expHeld(x.hi)
	return g + g*x.lo
}

// double2 starts from the series at a fraction 2^−s and doubles:
// φ₁(2z) = (e^z+1)φ₁(z)/2, φ₂(2z) = (φ₁(z)²+2φ₂(z))/4.
func double2(a, delta, r float64) (x0, x1, x2 twin) {
	_, s := math.Frexp((math.Abs(a) + r) / 2)
	f := math.Ldexp(1, -s)
	a, delta = a*f, delta*f*f
	x0, x1, x2 = series2(a, delta, (math.Abs(a) + r*f))
	for ; s > 0; s-- {
		sq, pr := x1.times(x1, delta), x0.times(x1, delta)
		x2 = twin{(sq.p + 2*x2.p) / 4, (sq.q + 2*x2.q) / 8}
		x1 = twin{(pr.p + x1.p) / 2, (pr.q + x1.q) / 4}
		x0 = x0.times(x0, delta)
		x0.q /= 2
		x0 = twin{held(x0.p), held(x0.q)}
		x1 = twin{held(x1.p), held(x1.q)}
		delta *= 4
	}
	return x0, x1, x2
}

// held keeps a growing number from overflowing when squared twice.
func held(v float64) float64 { return math.Max(-1e150, math.Min(v, 1e150)) }

// holdAll replaces what grew past all bounds.
func holdAll(out ...[]float64) {
	for _, x := range out {
		for i, v := range x {
			if v-v != 0 { // ±Inf or NaN
				x[i] = 1e150
				if v < 0 {
					x[i] = -1e150
				}
			}
		}
	}
}

// phiN is the case of three states and more.
func phiN(n int, T []float64, t float64, e, p1, p2, work []float64) {
	nn := n * n
	if len(work) < 5*nn {
		work = make([]float64, 5*nn)
	}
	z, u, w, y := work[:nn], work[nn:2*nn], work[2*nn:3*nn], work[3*nn:4*nn]
	var mean float64
	for i := 0; i < n; i++ {
		mean += T[i*n+i] / float64(n)
	}
	s := scaled(n, T, t, 0, z)
	if s < 0 {
		beyond(n, mean*t, e, p1, p2)
		return
	}
	seriesN(n, z, e, p1, p2, w)
	for ; s > 0; s-- {
		multiply(n, u, p1, p1)
		for i := range p2 {
			p2[i] = held((u[i] + 2*p2[i]) / 4)
		}
		multiply(n, u, e, p1)
		for i := range p1 {
			p1[i] = held((p1[i] + u[i]) / 2)
		}
		multiply(n, u, e, e)
		for i := range e {
			e[i] = held(u[i])
		}
	}
	if a := mean * t; math.Abs(a) > 1 {
		shifted(n, T, t, mean, e, z, u, w, y, work[4*nn:5*nn])
	}
}

// shifted sets e = e^{mt}·e^{t(T−m)}.
func shifted(n int, T []float64, t, mean float64, e, z, u, w, y, v []float64) {
	s := scaled(n, T, t, mean, z)
	if s < 0 {
		return
	}
	seriesN(n, z, u, y, v, w)
	for ; s > 0; s-- {
		multiply(n, w, u, u)
		for i := range u {
			u[i] = held(w[i])
		}
	}
	g := expDD(toDD(mean).mul(toDD(t)))
	for i := range e {
		if x := g * u[i]; math.Abs(u[i]) < 1e150 {
			e[i] = x
		}
	}
}

// scaled sets z = t(T − mean)·2^−s with a norm of at most one half and returns s,
// or −1 where t·T is not finite.
func scaled(n int, T []float64, t, mean float64, z []float64) (s int) {
	var norm float64
	for i := 0; i < n; i++ {
		var row float64
		for j := 0; j < n; j++ {
			v := T[i*n+j]
			if i == j {
				v -= mean
			}
			z[i*n+j] = v * t
			row += math.Abs(v * t)
		}
		norm = math.Max(norm, row)
	}
	if math.IsInf(norm, 0) || math.IsNaN(norm) {
		return -1
	}
	if norm > 0.5 {
		_, s = math.Frexp(norm)
		s++
		f := math.Ldexp(1, -s)
		for i := range z {
			z[i] *= f
		}
	}
	return s
}

// seriesN sums φ₂(z) and takes φ₁ and the exponential from it.
func seriesN(n int, z, e, p1, p2, w []float64) {
	clear(p2)
	for k := 14; k >= 0; k-- {
		multiply(n, w, p2, z)
		copy(p2, w)
		for i := 0; i < n; i++ {
			p2[i*n+i] += invFactorial[k+2]
		}
	}
	multiply(n, p1, p2, z)
	for i := 0; i < n; i++ {
		p1[i*n+i]++
	}
	multiply(n, e, p1, z)
	for i := 0; i < n; i++ {
		e[i*n+i]++
	}
}

// multiply sets dst = a·b, dst apart from both; zeros of a are passed over.
func multiply(n int, dst, a, b []float64) {
	for i := 0; i < n; i++ {
		row := dst[i*n : i*n+n]
		clear(row)
		for k := 0; k < n; k++ {
			if v := a[i*n+k]; v != 0 {
				for j, x := range b[k*n : k*n+n] {
					row[j] += v * x
				}
			}
		}
	}
}
