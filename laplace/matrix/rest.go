package matrix

// Rest is a factorisation of stores at rest, 0 = Σ F (x[j] − x[i]) − Leak x + K x + f.
type Rest struct {
	n   int
	a   []dd // L below the diagonal, U on and above it
	row []int
}

// restTolerance is the part of a row below which a pivot counts as 0: some hundred
// roundings of doubled precision.
const restTolerance = 0x1p-90

// AtRest prepares the stores at rest for any number of flows. Levels and flows come
// out to about 1e-16 times the condition above 1e15: what is lost below that is lost
// in the data. It returns nil where the state at rest is not determined.
//
// Method: elimination with exchanges by the largest part of a row, in doubled
// precision. Cost: 8 n³ operations where the stores exchange all with all, far less
// along a line.
func (s *Stores) AtRest() *Rest {
	if s.check() != nil {
		return nil
	}
	n := s.N
	r := &Rest{n: n, a: make([]dd, n*n), row: make([]int, n)}
	size := make([]float64, n)
	for i := range n {
		r.row[i] = i
		for j := range n {
			v, _ := s.entry(i, j)
			r.a[i*n+j] = v
			size[i] = max(size[i], v.hi, -v.hi)
		}
	}
	for k := range n {
		if !r.pivot(k, size) {
			return nil
		}
		r.eliminate(k)
	}
	return r
}

// pivot brings the row with the largest part in column k to place k.
func (r *Rest) pivot(k int, size []float64) bool {
	n := r.n
	best, most := k, 0.0
	for i := k; i < n; i++ {
		if v := r.a[i*n+k].abs().hi; size[i] > 0 && v/size[i] > most {
			best, most = i, v/size[i]
		}
	}
	if !(most > restTolerance) {
		return false
	}
	if best != k {
		for j := range n {
			r.a[k*n+j], r.a[best*n+j] = r.a[best*n+j], r.a[k*n+j]
		}
		r.row[k], r.row[best] = r.row[best], r.row[k]
		size[k], size[best] = size[best], size[k]
	}
	return true
}

func (r *Rest) eliminate(k int) {
	n := r.n
	for i := k + 1; i < n; i++ {
		if r.a[i*n+k].zero() {
			continue
		}
		f := r.a[i*n+k].div(r.a[k*n+k])
		r.a[i*n+k] = f
		for j := k + 1; j < n; j++ {
			if v := r.a[k*n+j]; !v.zero() {
				r.a[i*n+j] = r.a[i*n+j].sub(f.mul(v))
			}
		}
	}
}

// Solve returns x for the flows f.
func (r *Rest) Solve(f []float64) []float64 {
	n := r.n
	y := make([]dd, n)
	for i := range n {
		y[i] = toDD(-f[r.row[i]])
		for j := range i {
			if v := r.a[i*n+j]; !v.zero() && !y[j].zero() {
				y[i] = y[i].sub(v.mul(y[j]))
			}
		}
	}
	x := make([]float64, n)
	for i := n - 1; i >= 0; i-- {
		for j := i + 1; j < n; j++ {
			if v := r.a[i*n+j]; !v.zero() && !y[j].zero() {
				y[i] = y[i].sub(v.mul(y[j]))
			}
		}
		y[i] = y[i].div(r.a[i*n+i])
		x[i] = y[i].float()
	}
	return x
}
