package network

import (
	"math"

	"lagbook/network/internal/stiff"
)

// A recorder makes a Trajectory while the march goes on.
type recorder struct {
	t      *Trajectory
	e      *equations
	outs   []Output
	tol    float64
	plain  []plain
	reads  bool      // some output is not plain
	x      []float64 // room for a state
	rate   []float64
	now    []float64             // by output: what it shows of the error of the present step
	at     [][len(nodes)]float64 // by output: its values at the nodes
	curves [mostHalvings + 1][]quartic
}

// A plain output is one unknown times a factor plus a constant.
type plain struct {
	place       int32 // −1: the output is none
	coef, shift float64
}

// plainly returns an output as a plain one if it is: the level of a free node, the flow of
// an inertance.
func (l *layout) plainly(o *Output, datum []float64) plain {
	switch {
	case o.Flow == nil && o.Reading == nil && o.Parts == nil && len(o.Terms) == 1:
		at := o.Terms[0]
		if k := l.level[at.Node]; int(k) < l.size {
			return plain{k, at.Coef, o.Constant - at.Coef*datum[at.Node]}
		}
	case o.Flow != nil && o.Flow.Kind == InertanceFlow:
		return plain{l.flow[o.Flow.Inertance], o.Flow.Sign, o.Constant}
	}
	return plain{place: -1}
}

// mostPieces bounds the polynomials kept: 160 MB.
const mostPieces = 4_000_000

// mostSteps bounds the steps of a march.
const mostSteps = 2_000_000

func newRecorder(e *equations, l *layout, datum []float64, outs []Output, t0, tol float64) *recorder {
	r := &recorder{e: e, outs: outs, tol: tol, x: make([]float64, e.size()), rate: make([]float64, e.size()),
		now: make([]float64, len(outs)), at: make([][len(nodes)]float64, len(outs)), t: &Trajectory{
			times: []float64{t0}, curves: make([][]quartic, len(outs)), before: make([]float64, len(outs)),
			breaks: []float64{t0}, miss: make([]float64, len(outs)), size: make([]float64, len(outs))}}
	for i := range outs {
		r.plain = append(r.plain, l.plainly(&outs[i], datum))
		r.reads = r.reads || r.plain[i].place < 0
	}
	for k := range r.curves {
		r.curves[k] = make([]quartic, len(outs))
	}
	return r
}

// full reports that no further step can be kept.
func (r *recorder) full() bool {
	steps := len(r.t.times)
	return steps > mostSteps || steps*len(r.outs) > mostPieces
}

// add keeps a span; g has the error of the step it was taken from.
func (r *recorder) add(s *span, g *stiff.Integrator) {
	r.doubt(s, g)
	for i := range r.outs {
		if p := r.plain[i]; p.place >= 0 {
			r.t.miss[i] = max(r.t.miss[i], math.Abs(p.coef*g.Miss(int(p.place))))
		}
	}
	r.piece(s, 0, 1, mostHalvings)
}

// mostHalvings is how often a step is halved for the sake of an output that is no
// polynomial of degree 4 in it, as one with a bend.
const mostHalvings = 6

// doubt works out how much of the step's error, and of the rounding of the state, each
// output that must be read shows.
func (r *recorder) doubt(s *span, g *stiff.Integrator) {
	if !r.reads {
		return
	}
	for k, x := range s.end() {
		r.x[k] = x + g.Miss(k) + hair(k, x)
	}
	last := len(nodes) - 1
	for i := range r.outs {
		if r.plain[i].place < 0 {
			o := &r.outs[i]
			r.now[i] = math.Abs(r.e.value(o, s.t1, r.x, s.rate[last]) - r.e.value(o, s.t1, s.end(), s.rate[last]))
			r.t.miss[i] = max(r.t.miss[i], r.now[i])
		}
	}
}

// piece keeps the part of a span between two shares of it, in halves where an output
// asks for that.
func (r *recorder) piece(s *span, a, b float64, halvings int) {
	curves := r.curves[halvings]
	for i := range r.outs {
		if p := r.plain[i]; p.place >= 0 {
			curves[i] = s.curve[p.place].part(a, b).times(p.coef)
			curves[i][0] += p.shift
		}
	}
	if r.reads && !r.read(s, a, b, curves) && halvings > 0 {
		m := a + (b-a)/2
		r.piece(s, a, m, halvings-1)
		r.piece(s, m, b, halvings-1)
		return
	}
	for i, c := range curves {
		r.t.curves[i] = append(r.t.curves[i], c)
		r.t.size[i] = max(r.t.size[i], c.bound())
	}
	r.t.times = append(r.t.times, s.time(b))
}

// offNodes are the shares of a piece at which what is read is compared with its curve.
var offNodes = [2]float64{0.33, 0.92}

// read sets the curves of the outputs that must be read, and reports whether they are
// right between the nodes as well.
func (r *recorder) read(s *span, a, b float64, curves []quartic) bool {
	var y [len(nodes)]float64
	for j, theta := range nodes {
		t, x, rate := r.state(s, a+theta*(b-a))
		for i := range r.outs {
			if r.plain[i].place < 0 {
				r.at[i][j] = r.e.value(&r.outs[i], t, x, rate)
			}
		}
	}
	for i := range r.outs {
		if r.plain[i].place < 0 {
			y = r.at[i]
			curves[i] = through(&y)
		}
	}
	for _, theta := range offNodes {
		t, x, rate := r.state(s, a+theta*(b-a))
		for i := range r.outs {
			if r.plain[i].place >= 0 {
				continue
			}
			allowed := max(10*r.tol*max(r.t.size[i], curves[i].bound()), 4*r.now[i])
			off := math.Abs(r.e.value(&r.outs[i], t, x, rate) - curves[i].at(theta))
			if off > allowed {
				return false
			}
			r.t.miss[i] = max(r.t.miss[i], off)
		}
	}
	return true
}

// state returns the state at a share of a span.
func (r *recorder) state(s *span, theta float64) (t float64, x, rate []float64) {
	for j, v := range nodes {
		if v == theta {
			return s.node(j), s.x[j], s.rate[j]
		}
	}
	t = s.time(theta)
	s.at(t, r.x, r.rate)
	return t, r.x, r.rate
}

// rest keeps a run of no length.
func (r *recorder) rest(t float64, x, rate []float64) {
	for i := range r.outs {
		v := r.e.value(&r.outs[i], t, x, rate)
		r.t.curves[i], r.t.size[i] = append(r.t.curves[i], quartic{v}), math.Abs(v)
	}
	r.t.times = append(r.t.times, t)
}

// bend notes an instant at which something jumps or begins another law.
func (r *recorder) bend(t float64) {
	if b := r.t.breaks; t > b[len(b)-1] {
		r.t.breaks = append(b, t)
	}
}
