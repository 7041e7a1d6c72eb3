package laplace

import "math/cmplx"

// see fills the view for one output: its row d of D and its base.
func (v *view) see(s *babySteps, o *vector, d []float64, base float64) {
	p, n := v.g.p, v.g.baby
	v.steps, v.out = s, o
	for j, delta := range s.delta {
		v.constant[j], v.ramp[j] = base, 0
		for _, u := range p.u {
			if g := d[u.input]; g != 0 {
				v.constant[j] += g * (u.A + u.B*delta)
				v.ramp[j] += g * u.B
			}
		}
	}
	if v.bent != nil {
		v.seeBent(d)
	}
	seen := v.seeForced(d, v.seen[v.g.inputs*n:])
	for i := range p.blocks {
		seen = v.seeBlock(i, seen)
	}
	for i, w := range o.pair {
		for j := range n {
			x := w * s.pe[i*n+j]
			seen[j], seen[n+j] = real(x), -imag(x)
			v.constant[j] += real(w * s.ps[i*n+j])
			v.ramp[j] += real(w * s.pr[i*n+j])
		}
		seen = seen[2*n:]
	}
	for i, w := range o.real {
		row, e := seen[i*n:(i+1)*n], s.e[i*n:(i+1)*n]
		for j := range row {
			row[j] = w * e[j]
		}
	}
	v.seeGone(o.real)
}

// seeGone sums what the modes leave, from the last to each.
func (v *view) seeGone(out []float64) {
	p := v.g.p
	v.gone[len(out)], v.goneRamp[len(out)] = 0, 0
	for k := len(out) - 1; k >= 0; k-- {
		v.gone[k], v.goneRamp[k] = v.gone[k+1], v.goneRamp[k+1]
		if pole := p.m.real[k]; pole < 0 {
			v.gone[k] -= out[k] * (p.a.real[k] + p.b.real[k]/pole) / pole
			v.goneRamp[k] -= out[k] * p.b.real[k] / pole
		}
	}
	if v.bent != nil {
		v.seeGoneBent(out)
	}
}

// seeBlock writes out·e^{δT} and the steady answers of block i.
func (v *view) seeBlock(i int, seen []float64) (rest []float64) {
	b, n := &v.g.p.blocks[i], v.g.baby
	out := v.out.block[b.first : b.first+b.own]
	for j, delta := range v.steps.delta {
		w := v.steps.block[i][j]
		for q := range b.n {
			var x, x1, x2 float64
			for r, o := range out {
				x += o * w.e[r*b.n+q]
				x1 += o * w.p1[r*b.n+q]
				x2 += o * w.p2[r*b.n+q]
			}
			seen[q*n+j] = x
			v.constant[j] += delta * (x1*b.a[q] + delta*x2*b.b[q])
			v.ramp[j] += delta * x1 * b.b[q]
		}
	}
	seen = seen[b.n*n:]
	for _, f := range b.far {
		var y complex128
		for r, o := range out {
			y += complex(o, 0) * f.y[r]
		}
		for j, delta := range v.steps.delta {
			x := y * cexp(f.rate, delta)
			seen[j], seen[n+j] = real(x), -imag(x)
		}
		seen = seen[2*n:]
	}
	return seen
}

// seeForced writes what the output makes, δ later, of each exponential.
func (v *view) seeForced(d []float64, seen []float64) (rest []float64) {
	p, n := v.g.p, v.g.baby
	for i := range p.forced {
		f := &p.forced[i]
		for j, delta := range v.steps.delta {
			x := complex(d[f.input], 0) * cexp(f.rate, delta)
			for k, o := range v.out.real {
				if w := o * f.in.real[k]; w != 0 {
					x += complex(w, 0) * divided(f.rate, complex(p.m.real[k], 0), delta)
				}
			}
			for k, o := range v.out.pair {
				if w := o * f.in.pair[k] / 2; w != 0 {
					x += w*divided(f.rate, p.m.pair[k], delta) + cmplx.Conj(w*divided(cmplx.Conj(f.rate), p.m.pair[k], delta))
				}
			}
			seen[j], seen[n+j] = real(x), -imag(x)
		}
		seen = seen[2*n:]
	}
	return seen
}
