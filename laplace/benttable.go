package laplace

// bend adds what τ², τ³, … make of the mode at each time; of the first alive times f1 is
// what phi1 gave.
func (f *sharedTerm) bend(tau []float64, alive, at int, f1 []float64, y [][]float64) {
	var g powers
	d := len(f.bent[0]) + 1
	for i, v := range tau[:alive] {
		g.fill(f.p, v, f1[i], d)
		for m := range y {
			if y[m] == nil {
				continue
			}
			for k, c := range f.bent[m] {
				y[m][at+i] += g[k+2] * c
			}
		}
	}
	if alive == len(tau) {
		return
	}
	for m := range y {
		if y[m] == nil {
			continue
		}
		c := append([]float64{0, 0}, f.bent[m]...)
		settled(c, f.p)
		for i, v := range tau[alive:] {
			y[m][at+alive+i] += powerSum(c, v)
		}
	}
}

// settled turns the coefficients of what drives a mode with a pole p ≠ 0 into those of
// the polynomial that it comes to.
func settled(c []float64, p float64) {
	above := 0.0
	for k := len(c) - 1; k >= 0; k-- {
		c[k] = (float64(k+1)*above - c[k]) / p
		above = c[k]
	}
}

// bend fills the rows of the powers of τ: of the inputs as seen from a giant step at τ, a
// share of τ^m goes on as δ^(k−m), of which a mode makes g_(k−m).
func (s *babySteps) bend() {
	p, n := s.g.p, s.g.baby
	for range p.bent {
		s.bent = append(s.bent, make([]float64, len(p.m.real)*n))
		s.pairBent = append(s.pairBent, make([]complex128, len(p.m.pair)*n))
	}
	for i := range p.m.real {
		s.bendReal(i)
	}
	for i := range p.m.pair {
		s.bendPair(i)
	}
	for i := range p.blocks {
		list := make([][][]float64, n)
		for j, delta := range s.delta {
			list[j] = p.blocks[i].bentPhis(delta, 0)
		}
		s.phis = append(s.phis, list)
	}
}

func (s *babySteps) bendReal(i int) {
	p, n := s.g.p, s.g.baby
	pole := p.m.real[i]
	var g powers
	for j, delta := range s.delta {
		f1 := -1 / pole
		if pole*delta >= -dead {
			_, f1 = phi1(pole, delta)
		}
		g.fill(pole, delta, f1, p.degree())
		for k := range p.bent {
			c := p.bent[k].real[i]
			if c == 0 {
				continue
			}
			s.set[i*n+j] += g[k+2] * c
			s.slope[i*n+j] += float64(k+2) * g[k+1] * c
			for m := 2; m <= k+2; m++ {
				s.bent[m-2][i*n+j] += choose(k+2, m) * g[k+2-m] * c
			}
		}
	}
}

func (s *babySteps) bendPair(i int) {
	p, n := s.g.p, s.g.baby
	pole := p.m.pair[i]
	var g cpowers
	for j, delta := range s.delta {
		_, f1 := cphi1(pole, delta)
		g.fill(pole, delta, f1, p.degree())
		for k := range p.bent {
			c := p.bent[k].pair[i]
			if c == 0 {
				continue
			}
			s.ps[i*n+j] += g[k+2] * c
			s.pr[i*n+j] += complex(float64(k+2), 0) * g[k+1] * c
			for m := 2; m <= k+2; m++ {
				s.pairBent[m-2][i*n+j] += complex(choose(k+2, m), 0) * g[k+2-m] * c
			}
		}
	}
}

// gatherBent is gather for τ², τ³, ….
func (s *babySteps) gatherBent(k int, w float64, bent [][]float64) {
	n := len(s.delta)
	for m := range bent {
		for j, v := range s.bent[m][k*n : (k+1)*n] {
			bent[m][j] += w * v
		}
	}
}

// seeBent adds to the rows of the powers what does not pass through real modes.
func (v *view) seeBent(d []float64) {
	p, s := v.g.p, v.steps
	for m := range v.bent {
		clear(v.bent[m])
		for i, w := range v.out.pair {
			n := v.g.baby
			for j := range v.bent[m] {
				v.bent[m][j] += real(w * s.pairBent[m][i*n+j])
			}
		}
	}
	for _, u := range p.u {
		if g := d[u.input]; g != 0 && len(u.Poly) > 0 {
			v.seeDirect(g, u.Poly)
		}
	}
	for i := range p.blocks {
		v.seeBentBlock(i)
	}
}

// seeDirect adds g times the powers of one input.
func (v *view) seeDirect(g float64, bent []float64) {
	c := make([]float64, len(bent)+2)
	for j, delta := range v.steps.delta {
		c[0], c[1] = 0, 0
		copy(c[2:], bent)
		shift(c, delta)
		for m, x := range c {
			v.power(m)[j] += g * x
		}
	}
}

// power returns the row of τ^m.
func (v *view) power(m int) []float64 {
	switch m {
	case 0:
		return v.constant
	case 1:
		return v.ramp
	}
	return v.bent[m-2]
}

func (v *view) seeBentBlock(i int) {
	b := &v.g.p.blocks[i]
	out := v.out.block[b.first : b.first+b.own]
	for j, delta := range v.steps.delta {
		phi := v.steps.phis[i][j]
		for q, c := range b.bent {
			k := q + 2
			for m := 0; m <= k; m++ {
				var x float64
				for r, o := range out {
					for n, in := range c {
						x += o * phi[k-m+1][r*b.n+n] * in
					}
				}
				v.power(m)[j] += choose(k, m) * ofPower(k-m, delta) * x
			}
		}
	}
}

// seeGoneBent sums what the modes leave where inputs are bent, from the last to each.
func (v *view) seeGoneBent(out []float64) {
	p := v.g.p
	last := len(out)
	for m := range v.goneBent {
		v.goneBent[m][last] = 0
	}
	c := make([]float64, v.g.inputs)
	for k := last - 1; k >= 0; k-- {
		clear(c)
		if pole := p.m.real[k]; pole < 0 {
			c[0], c[1] = out[k]*p.a.real[k], out[k]*p.b.real[k]
			for m := range p.bent {
				c[m+2] = out[k] * p.bent[m].real[k]
			}
			settled(c, pole)
		}
		v.gone[k], v.goneRamp[k] = v.gone[k+1]+c[0], v.goneRamp[k+1]+c[1]
		for m := range v.goneBent {
			v.goneBent[m][k] = v.goneBent[m][k+1] + c[m+2]
		}
	}
}

// carryBent writes the rows of the powers where the real modes up to alive are carried.
func (v *view) carryBent(alive int) {
	c, n := make([]float64, v.g.inputs), v.g.baby
	for j, delta := range v.steps.delta {
		c[0], c[1] = v.gone[alive], v.goneRamp[alive]
		for m := range v.goneBent {
			c[m+2] = v.goneBent[m][alive]
		}
		shift(c, delta)
		for m, x := range c {
			v.seen[m*n+j] = v.power(m)[j] + x
		}
	}
}
