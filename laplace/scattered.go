package laplace

import "sort"

// dead is the x at which exp(−x) is lost beside 1.
const dead = 40

// chunk is the number of times evaluated together, so that they stay in the cache.
const chunk = 512

// points evaluates one piece at ascending times, into y[m][at:].
func (r *Response) points(p *piece, t []float64, at int, y [][]float64) {
	tau := make([]float64, len(t))
	for i, v := range t {
		tau[i] = min(v, r.until) - p.t0
	}
	for m := range y {
		if y[m] != nil {
			r.curve(p, m).withoutReal().fill(tau, y[m][at:])
		}
	}
	f := r.sharedTerms(p, y)
	var parts [3][chunk]float64
	for from := 0; from < len(tau); from += chunk {
		to := min(from+chunk, len(tau))
		for k := range f {
			f[k].fill(tau[from:to], at+from, y, &parts)
		}
	}
}

func (c *curve) withoutReal() *curve {
	c.real, c.realBent = nil, nil
	return c
}

// fill writes the curve at each time.
func (c *curve) fill(tau, y []float64) {
	if len(c.pair) == 0 && len(c.forced) == 0 && len(c.direct) == 0 && len(c.block) == 0 {
		for i, v := range tau {
			y[i] = c.base + c.slope*v
		}
		if len(c.bent) > 0 {
			for i, v := range tau {
				y[i] += v * v * powerSum(c.bent, v)
			}
		}
		return
	}
	for i, v := range tau {
		y[i] = c.value(v)
	}
}

// A sharedTerm is one real mode as all outputs see it.
type sharedTerm struct {
	p       float64
	h, a, b []float64 // for each output
	ramps   bool
	bent    [][]float64 // for each output of τ², τ³, …; nil: nothing
}

func (r *Response) sharedTerms(p *piece, y [][]float64) []sharedTerm {
	var list []sharedTerm
	for k, pole := range p.m.real {
		f := sharedTerm{p: pole, ramps: p.b.real[k] != 0}
		for m := range y {
			o := 0.0
			if y[m] != nil {
				o = p.of.System.modal.out[m].real[k]
			}
			f.h = append(f.h, o*p.z.real[k])
			f.a = append(f.a, o*p.a.real[k])
			f.b = append(f.b, o*p.b.real[k])
			if p.bent != nil {
				f.bent = append(f.bent, p.bentSeen(o, k))
			}
		}
		if !allZero(f.h) || !allZero(f.a) || !allZero(f.b) || p.bent != nil {
			list = append(list, f)
		}
	}
	return list
}

// fill adds the mode at each time. Once it has died out it leaves a constant and a
// ramp, which take no exponential.
func (f *sharedTerm) fill(tau []float64, at int, y [][]float64, parts *[3][chunk]float64) {
	alive := sort.Search(len(tau), func(i int) bool { return f.p*tau[i] < -dead })
	e, f1, f2 := parts[0][:alive], parts[1][:alive], parts[2][:alive]
	for i, v := range tau[:alive] {
		e[i], f1[i] = phi1(f.p, v)
	}
	if f.ramps {
		for i, v := range tau[:alive] {
			f2[i] = phi2(f.p, v, f1[i])
		}
	}
	for m := range y {
		if y[m] != nil {
			f.addTo(y[m][at:at+len(tau)], tau, alive, m, e, f1, f2)
		}
	}
	if f.bent != nil {
		f.bend(tau, alive, at, f1, y)
	}
}

// addTo adds the mode to one output.
func (f *sharedTerm) addTo(y, tau []float64, alive, m int, e, f1, f2 []float64) {
	h, a, b := f.h[m], f.a[m], f.b[m]
	for i, v := range e {
		y[i] += v*h + f1[i]*a
	}
	if f.ramps {
		for i, v := range f2 {
			y[i] += v * b
		}
	}
	if alive < len(tau) {
		constant, ramp := -(a+b/f.p)/f.p, -b/f.p
		for i, v := range tau[alive:] {
			y[alive+i] += constant + ramp*v
		}
	}
}
