package network

import (
	"slices"

	"lagbook/laplace"
)

// Respond returns the outputs against time for t in [0, until], in real levels:
//
//	y(t) = y(start) + response to u(t) − u(0⁻) + response to the imbalance of the start.
//
// Waveforms and start levels are taken from p, so that a change of them alone
// needs no new reduction; capacities and conductances are those of the Reduction.
// It returns *NoSteady where the start state does not exist, *ParamFault for
// numbers that are not finite, and errors of laplace (*laplace.TooMany,
// *laplace.Overflow). until must be finite and not negative. Where p.StartCycle is
// set the response starts in the periodic state; *NoCycle says why there is none.
func (r *Reduction) Respond(p *Params, until float64) (*laplace.Response, error) {
	d, err := r.deviations(p)
	if err != nil {
		return nil, err
	}
	return d.respond(until)
}

// deviations are what a response is made of: the system, the inputs less their
// values just before t = 0, and the outputs at those.
type deviations struct {
	r    *Reduction
	p    *Params
	sys  *laplace.System
	u    []laplace.Waveform
	base []float64

	start *StartState // steady or given: what all are deviations from
}

func (r *Reduction) deviations(p *Params) (*deviations, error) {
	if err := r.net.Check(p); err != nil {
		return nil, err
	}
	if faults := r.net.checkWaves(p); len(faults) > 0 {
		return nil, &ParamFault{List: faults}
	}
	start, err := r.reference(p)
	if err != nil {
		return nil, err
	}
	sys, err := r.systemFor(start)
	if err != nil {
		return nil, err
	}
	u := make([]laplace.Waveform, len(p.Wave), len(p.Wave)+1)
	for k, w := range p.Wave {
		u[k] = w.Plus(-w.Before)
	}
	if r.HasImbalance || start.moves() {
		u = append(u, laplace.Step(0, 1, 0))
	}
	return &deviations{r: r, p: p, sys: sys, u: u, base: r.base(p, start), start: start}, nil
}

// systemFor returns the system whose last input is the imbalance of this start:
// that of the Reduction unless the start has changed since.
func (r *Reduction) systemFor(start *StartState) (*laplace.System, error) {
	if !r.HasImbalance && !start.moves() || r.HasImbalance && slices.Equal(start.Imbalance, r.start.Imbalance) {
		return r.System, nil
	}
	moved, inputs := r.Realisation, len(r.net.g.inputs)
	moved.B = append(moved.B[:inputs:inputs], start.Imbalance)
	moved.D = withNone(r.Realisation.D, inputs)
	moved.Rate = withNone(r.Realisation.Rate, inputs)
	return newSystem(moved)
}

// withNone gives each row a share 0 of the input after the given ones.
func withNone(rows [][]float64, inputs int) [][]float64 {
	if rows == nil {
		return nil
	}
	list := make([][]float64, len(rows))
	for m, row := range rows {
		list[m] = append(row[:inputs:inputs], 0)
	}
	return list
}

// base returns the outputs at the start.
func (r *Reduction) base(p *Params, start *StartState) []float64 {
	y := make([]float64, len(r.weights))
	for m := range y {
		y[m] = r.weights[m].atStart(r.net, p, start)
	}
	return y
}

// atStart applies the weights to a start state, all inputs constant at their values
// just before.
func (w *weights) atStart(n *Network, p *Params, s *StartState) float64 {
	y := w.value(n, p, s.pt) + w.constant
	for b, c := range w.inert {
		if c != 0 {
			y += c * s.Flows[b]
		}
	}
	for k, c := range w.direct {
		if c != 0 {
			y += c * p.Wave[k].Before
		}
	}
	return y
}

// value applies the weights of levels and sources to a point, in differences from the level of the node
// that weighs most.
func (w *weights) value(n *Network, p *Params, pt *point) float64 {
	g, pl := &n.g, n.plan
	most := -1
	for i, c := range w.at {
		if c != 0 && (most < 0 || c > w.at[most] || -c > w.at[most]) {
			most = i
		}
	}
	ref := 0.0
	if most >= 0 {
		ref = pt.level(most)
	}
	y := 0.0
	for i, c := range w.at {
		if c != 0 {
			y += c * pt.difference(i, most)
		}
	}
	for k, in := range g.inputs {
		if at := int(pl.pos[in.node]); !in.held && at < pl.massless {
			y += w.flow[at] * in.sign * p.Wave[k].Before
		}
	}
	for k, fb := range g.feedbacks {
		if at := int(pl.pos[fb.to]); at < pl.massless {
			y += w.flow[at] * p.K[k] * (ref - p.About[k])
		}
	}
	return w.sum*ref + y
}
