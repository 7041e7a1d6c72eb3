package matrix

import "math"

// island finds the modes of island i and writes them to the lists of w.
func (w *RCWork) island(b *Balance, ports [][]float64, i int, m *RCModes) error {
	stores := w.isl.stores(i)
	t := &w.net
	t.begin(b, stores)
	var err error
	if w.only == anyRoute && w.isl.isPath(stores) {
		err = w.path(b, ports, stores)
	} else {
		err = w.mesh(b, ports, stores, m)
	}
	if err != nil {
		return err
	}
	return w.deliver(w.isl.first[i])
}

// path brings an island without loops and branches to singular values.
func (w *RCWork) path(b *Balance, ports [][]float64, stores []int) error {
	t := &w.net
	t.walk(&w.isl, stores, w.g)
	t.load(b, w.c, w.g)
	d, e := w.d[:t.rows], w.e[:t.n-1]
	if err := t.factorPath(d, e); err != nil {
		return err
	}
	w.sides(ports)
	w.measure(func(v []float64) { solvePath(d, e, v) })
	return w.values(d, e)
}

// mesh does the same for any other island.
func (w *RCWork) mesh(b *Balance, ports [][]float64, stores []int, m *RCModes) error {
	if err := w.factor(b, ports, stores); err != nil {
		return err
	}
	t := &w.net
	d, e := w.d[:t.rows], w.e[:t.n-1]
	if w.only == jacobiRoute {
		m.Jacobi = true
		return w.rotate(d)
	}
	w.house.reduce(t, d, e, w.side[storeSide], w.side[pivotSide], maxGrowth)
	if w.house.growth <= maxGrowth {
		if err := w.values(d, e); err == nil && t.drift(d) <= maxDrift(t.n) {
			m.Growth = max(m.Growth, w.house.growth)
			return nil
		}
	}
	m.Jacobi = true
	if err := w.factor(b, ports, stores); err != nil { // reduce has overwritten it
		return err
	}
	return w.rotate(d)
}

// factor eliminates an island and sets both sides of the ports.
func (w *RCWork) factor(b *Balance, ports [][]float64, stores []int) error {
	t := &w.net
	copy(t.store, stores)
	t.load(b, w.c, w.g)
	t.fill(w.isl.edges, w.isl.root, w.g)
	if err := t.eliminate(); err != nil {
		return err
	}
	w.sides(ports)
	w.measure(t.solve)
	return nil
}

// values replaces d by the singular values of the matrix of diagonals d and e,
// in any order, and both sides of each port by its value in every mode.
func (w *RCWork) values(d, e []float64) error {
	if len(e) == len(d) {
		dropColumn(d, e, w.side[storeSide])
		e = e[:max(len(d)-1, 0)]
	}
	return w.qr.run(d, e, w.side[storeSide], w.side[pivotSide])
}

// dropColumn turns a last column away to which only e[len(d)−1] belongs, from
// the bottom up: products only, so that nothing loses its relative accuracy.
// What the last column of right then holds belongs to the pole at 0.
func dropColumn(d, e []float64, right [][]float64) {
	if len(d) == 0 {
		return
	}
	n := len(d)
	x := e[n-1]
	for i := n - 1; i >= 0; i-- {
		c, s, r := givens(d[i], x)
		d[i] = r
		if i > 0 {
			x = -s * e[i-1]
			e[i-1] *= c
		}
		for _, v := range right {
			v[i], v[n] = c*v[i]+s*v[n], c*v[n]-s*v[i]
		}
	}
}

// deliver writes the modes of an island to the lists of w from place first on.
func (w *RCWork) deliver(first int) error {
	t := &w.net
	lambda := w.lambda[first : first+t.n]
	a, b := powers(w.g - w.c)
	for k, sigma := range w.d[:t.rows] {
		lambda[k] = sigma * sigma * a * b
		if !(lambda[k] >= minNormal && lambda[k] <= maxFinite) {
			return ErrRange
		}
	}
	if !t.grounded {
		lambda[t.rows] = 0
	}
	for j := range w.value {
		if !w.deliverPort(&w.port[j], j, w.value[j][first:first+t.n]) {
			return ErrRange
		}
	}
	for k := first; k < first+t.n; k++ {
		w.sign(k)
	}
	return nil
}

// deliverPort writes the values of a port in the modes of the island to out;
// false where one is not finite.
func (w *RCWork) deliverPort(p *portScale, j int, out []float64) bool {
	t := &w.net
	half := -w.c >> 1 // C^-½ of C divided by 2^c
	root := 1.0
	if w.c&1 != 0 {
		root = math.Sqrt2
	}
	store, pivot := w.side[storeSide][j], w.side[pivotSide][j]
	a, b := powers(p.exp + half)
	for k, sigma := range w.d[:t.rows] {
		out[k] = root * p.choose(sigma, store[k], pivot[k]) * a * b
	}
	if !t.grounded {
		out[t.rows] = root * p.mean * a * b
	}
	p.seen = 1e-12 * max(p.size[storeSide], math.Abs(p.mean)) * a * b
	finite := true
	for _, x := range out {
		finite = finite && x-x == 0
	}
	return finite
}

// sign makes the value at the first port that sees mode k positive. A value of
// rounding size is not seen: its sign means nothing.
func (w *RCWork) sign(k int) {
	for j, v := range w.value {
		if math.Abs(v[k]) <= w.port[j].seen {
			continue
		}
		if v[k] < 0 {
			for _, u := range w.value {
				u[k] = -u[k]
			}
		}
		return
	}
}

// powers returns two factors whose product is 2^e, |e| ≤ 2000.
func powers(e int) (a, b float64) { return pow2(e / 2), pow2(e - e/2) }

const minNormal = 0x1p-1022
