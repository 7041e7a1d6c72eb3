package matrix

// A chain of Householder reflectors moves a bulge down a Hessenberg matrix:
// reflector k changes entries k, k+1 and k+2. It is kept as reflectorSize
// numbers t0, t1, t2, v1, v2, its action on (x0, x1, x2) being
//
//	s = (t0 x0 + t1 x1) + t2 x2,  x0 − s,  x1 − v1 s,  x2 − v2 s.
//
// Five zeros leave everything as it is; t2 = v2 = 0 leaves the third entry.
// The plain and the assembly version give the same bits.
const reflectorSize = 5

// chaseRowsGo applies the first k reflectors of c to k+2 rows, from the first:
// cols entries of each, a multiple of 4.
func chaseRowsGo(a []float64, stride, k, cols int, c []float64) {
	for i := range k {
		t0, t1, t2, v1, v2 := c[0], c[1], c[2], c[3], c[4]
		c = c[reflectorSize:]
		p, q, r := a[i*stride:], a[(i+1)*stride:], a[(i+2)*stride:]
		p, q, r = p[:cols], q[:cols], r[:cols]
		for j, x := range p {
			s := float64(t0*x) + float64(t1*q[j]) + float64(t2*r[j])
			p[j] = x - s
			q[j] -= float64(v1 * s)
			r[j] -= float64(v2 * s)
		}
	}
}

// chaseColumnsGo applies the first k reflectors of c, k a multiple of 4, to k+2
// columns of a number of rows that is a multiple of 4.
func chaseColumnsGo(a []float64, stride, k, rows int, c []float64) {
	for i := range rows {
		r := a[i*stride : i*stride+k+2]
		x, y := r[0], r[1]
		for j := range k {
			f := c[j*reflectorSize : j*reflectorSize+reflectorSize]
			z := r[j+2]
			s := float64(f[0]*x) + float64(f[1]*y) + float64(f[2]*z)
			r[j] = x - s
			x, y = y-float64(f[3]*s), z-float64(f[4]*s)
		}
		r[k], r[k+1] = x, y
	}
}

// sumRowsGo adds Σ_i f[i] a[i,j], i < rows, to y[j], j < cols, cols a multiple of 4.
func sumRowsGo(a []float64, stride, rows, cols int, f, y []float64) {
	y = y[:cols]
	for i := range rows {
		g, r := f[i], a[i*stride:]
		r = r[:len(y)]
		for j := range y {
			y[j] += float64(g * r[j])
		}
	}
}
