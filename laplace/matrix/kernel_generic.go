package matrix

// The kernels work on a row-major block whose rows are stride apart. The
// number of columns is a multiple of 4; the caller's rows and vectors hold
// zeros in the columns beyond the last. Every product is rounded before it is
// added (the conversions say so), and the sums run in the order of the vector
// registers, so that the plain and the assembly version give the same bits.

// dotRowsGo sets out[i] = Σ_j a[i,j] u[j], i < rows, j < cols.
func dotRowsGo(a []float64, stride, rows, cols int, u, out []float64) {
	u = u[:cols]
	for i := range rows {
		r := a[i*stride:]
		r = r[:len(u)]
		var s0, s1, s2, s3 float64
		for j := 3; j < len(u); j += 4 {
			s0 += float64(r[j-3] * u[j-3])
			s1 += float64(r[j-2] * u[j-2])
			s2 += float64(r[j-1] * u[j-1])
			s3 += float64(r[j] * u[j])
		}
		out[i] = (s0 + s2) + (s1 + s3)
	}
}

// updateRowsGo replaces a[i,j] by a[i,j] − (v[i] w[j] + t[i] u[j]) and sets
// sum[j] = Σ_i x[i] a[i,j] with the new values.
func updateRowsGo(a []float64, stride, rows, cols int, v, w, t, u, x, sum []float64) {
	w, u, sum = w[:cols], u[:cols], sum[:cols]
	clear(sum)
	i := 0
	for ; i+2 <= rows; i += 2 {
		r, q := a[i*stride:], a[(i+1)*stride:]
		r, q = r[:len(sum)], q[:len(sum)]
		v0, t0, x0, v1, t1, x1 := v[i], t[i], x[i], v[i+1], t[i+1], x[i+1]
		for j := range sum {
			p := r[j] - (float64(v0*w[j]) + float64(t0*u[j]))
			s := q[j] - (float64(v1*w[j]) + float64(t1*u[j]))
			r[j], q[j] = p, s
			sum[j] += float64(x0*p) + float64(x1*s)
		}
	}
	if i < rows {
		r := a[i*stride:]
		r = r[:len(sum)]
		v0, t0, x0 := v[i], t[i], x[i]
		for j := range sum {
			p := r[j] - (float64(v0*w[j]) + float64(t0*u[j]))
			r[j] = p
			sum[j] += float64(x0 * p)
		}
	}
}

// addRowGo adds f·x[j] to y[j].
func addRowGo(f float64, x, y []float64) {
	x = x[:len(y)]
	for j := range y {
		y[j] += float64(f * x[j])
	}
}

// turnRowsGo turns two rows into x − sin (y + half x) and y + sin (x − half y).
func turnRowsGo(sin, half float64, x, y []float64) {
	y = y[:len(x)]
	for j, p := range x {
		q := y[j]
		x[j] = p - float64(sin*(q+float64(half*p)))
		y[j] = q + float64(sin*(p-float64(half*q)))
	}
}
