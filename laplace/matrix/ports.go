package matrix

import "math"

// A port vector v is carried on two sides. In the coordinates of the stores it
// is v̂ = C^-½ v, and p_k·v̂ comes out with an error of about ε‖v̂‖: of no use to
// a slow mode that a fast store hardly sees. In those of the elimination it is
// y with X y = v̂, and since p_k X = σ_k q_k, p_k·v̂ = σ_k (q_k·y) comes out with
// an error of about ε σ_k ‖|X⁻¹| |v̂|‖, which is small just for the slow modes.

const (
	storeSide = iota // v̂, turned by V
	pivotSide        // y, turned by U
)

// portScale is what one port of one island needs beside its two vectors.
type portScale struct {
	exp  int        // v is held divided by 2^exp
	mean float64    // p_0·v̂, where nothing leaks
	size [2]float64 // ‖v̂‖, ‖|X⁻¹| |v̂|‖
	seen float64    // size from which a value in a mode means something
}

// sides fills both vectors of each port of the island, except that the pivot
// side still holds v̂: solve turns it into y. Where nothing leaks, the part of v
// along the mode that all stores move in alike is split off first.
func (w *RCWork) sides(ports [][]float64) {
	t := &w.net
	for k := range t.n {
		t.inv[k] = 1 / math.Sqrt(t.c[k])
	}
	for j, v := range ports {
		p := &w.port[j]
		x := w.side[storeSide][j]
		clear(x)
		*p = portScale{}
		most := 0.0
		for _, i := range t.store[:t.n] {
			most = max(most, math.Abs(v[i]))
		}
		if most > 0 {
			p.exp = min(max(exponent(most), -maxExponent), maxExponent)
		}
		down := pow2(-p.exp)
		for k, i := range t.store[:t.n] {
			x[k] = v[i] * down
		}
		if !t.grounded {
			p.mean = splitMean(x[:t.n], t.c[:t.n])
		}
		for k, f := range t.inv[:t.n] {
			x[k] *= f
		}
		p.size[storeSide] = length(x)
		copy(w.side[pivotSide][j], x)
	}
}

// splitMean takes from the flows v the share of each store in a rise of all
// stores alike, v_i − c_i Σv/Σc, and returns the modal flow Σv/√Σc. For the one
// store that holds nearly all the capacity, and takes nearly all the flow, the
// difference is formed from what the others hold and take.
func splitMean(v, c []float64) float64 {
	flow, capacity, big := 0.0, 0.0, 0
	for i := range c {
		if c[i] > c[big] {
			big = i
		}
	}
	for i := range c {
		if i != big {
			flow += v[i]
			capacity += c[i]
		}
	}
	total := capacity + c[big]
	rise := (flow + v[big]) / total
	v[big] = (v[big]*capacity - c[big]*flow) / total
	for i := range c {
		if i != big {
			v[i] -= c[i] * rise
		}
	}
	return rise * math.Sqrt(total)
}

// measure sets the error scale of the pivot side, given a way to solve X y = v.
// Where the signs of v agree, X⁻¹ being positive, it is the size of y itself.
func (w *RCWork) measure(solve func(v []float64)) {
	for j := range w.port[:len(w.value)] {
		y := w.side[pivotSide][j]
		if !sameSign(y[:w.net.n]) {
			x := w.scratch[:len(y)]
			for k := range y {
				x[k] = math.Abs(y[k])
			}
			solve(x)
			w.port[j].size[pivotSide] = length(x[:w.net.rows])
			solve(y)
			continue
		}
		solve(y)
		w.port[j].size[pivotSide] = length(y[:w.net.rows])
	}
}

// sameSign reports whether no two elements of v have opposite signs.
func sameSign(v []float64) bool {
	lo, hi := 0.0, 0.0
	for _, x := range v {
		lo, hi = min(lo, x), max(hi, x)
	}
	return lo == 0 || hi == 0
}

// length returns the Euclidean norm of v.
func length(v []float64) float64 {
	s := 0.0
	for _, x := range v {
		s += x * x
	}
	return math.Sqrt(s)
}

// choose returns the value of port j in a mode of singular value sigma, given
// what the two sides hold.
func (p *portScale) choose(sigma, store, pivot float64) float64 {
	if sigma*p.size[pivotSide] < p.size[storeSide] {
		return sigma * pivot
	}
	return store
}
