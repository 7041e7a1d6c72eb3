package network

import (
	"errors"
	"slices"
	"strconv"
	"strings"

	"lagbook/laplace"
)

// A NoCycle error says why a network has no periodic steady state: an input that
// neither repeats nor settles, periods without a common multiple, a pole that does
// not decay, or a mean inflow that has no way out. Err is the error of laplace.
type NoCycle struct {
	Refs []Ref // of the inputs it is about, if any
	Text string
	Err  error
}

func (e *NoCycle) Error() string { return "network: no steady cycle: " + e.Text }
func (e *NoCycle) Unwrap() error { return e.Err }

// Cycle returns the periodic steady state of the outputs under the inputs of p, and
// how the response that starts as p says comes to it. Inputs that repeat count as if
// they had always done so, those that settle with their final value. Besides the
// errors of Respond it returns *NoCycle.
func (r *Reduction) Cycle(p *Params) (*laplace.Cycle, *laplace.Approach, error) {
	d, err := r.deviations(p)
	if err != nil {
		return nil, nil, err
	}
	var c *laplace.Cycle
	if p.Turns() {
		s, u := d.schedule()
		c, err = s.Cycle(u)
	} else {
		c, err = d.sys.Cycle(d.u, d.base)
	}
	if err != nil {
		return nil, nil, r.noCycle(err)
	}
	from, err := d.respond(0)
	if err != nil {
		return nil, nil, err
	}
	a, err := c.Approach(from)
	return c, a, atSwitch(err)
}

// respond returns the response from the start that p asks for.
func (d *deviations) respond(until float64) (*laplace.Response, error) {
	if d.p.Turns() {
		r, err := d.respondSwitching(until)
		return r, atSwitch(err)
	}
	if !d.p.StartCycle {
		return d.sys.Respond(d.u, d.base, until)
	}
	c, err := d.before()
	if err != nil {
		return nil, err
	}
	return c.Respond(d.u, until)
}

func (d *deviations) respondSwitching(until float64) (*laplace.Response, error) {
	s, u := d.schedule()
	if !d.p.StartCycle {
		return s.Respond(u, until)
	}
	c, err := d.before()
	if err != nil {
		return nil, err
	}
	return s.RespondFrom(c, u, until)
}

// before returns the cycle that ends at t = 0: of the inputs and switches that repeat,
// with every other at its value before t = 0.
func (d *deviations) before() (*laplace.Cycle, error) {
	if d.r.net.givesStart(d.p) {
		return nil, &NoCycle{Text: "the network is to start in its periodic state, and a start is stated too"}
	}
	var c *laplace.Cycle
	var err error
	if d.p.Turns() {
		s, u := d.schedule()
		s.Waves = repeating(s.Waves, func(w laplace.Waveform) float64 { return w.Before })
		c, err = s.Cycle(append(repeating(u[:len(u)-1], nothing), u[len(u)-1]))
	} else {
		c, err = d.sys.Cycle(repeating(d.u, nothing), d.base)
	}
	if err != nil {
		return nil, d.r.noCycle(err)
	}
	return c, nil
}

func nothing(laplace.Waveform) float64 { return 0 }

// repeating puts a constant in the place of each wave that does not repeat.
func repeating(waves []laplace.Waveform, value func(laplace.Waveform) float64) []laplace.Waveform {
	list := slices.Clone(waves)
	for i, w := range list {
		if !w.Repeats() {
			list[i] = laplace.Constant(value(w))
		}
	}
	return list
}

// cycleStart returns the state just before t = 0 where that is the periodic one.
func (n *Network) cycleStart(p *Params) (*StartState, error) {
	outs := make([]Output, len(n.g.nodes))
	for i := range outs {
		outs[i] = n.Level(NodeID(i))
	}
	for b := range n.g.inertances {
		outs = append(outs, n.InertanceFlowOf(InertanceID(b)))
	}
	r, err := n.Reduce(p, outs)
	if err != nil {
		return nil, err
	}
	d, err := r.deviations(p)
	if err != nil {
		return nil, err
	}
	c, err := d.before()
	if err != nil {
		return nil, err
	}
	s := &StartState{Levels: make([]float64, len(n.g.nodes)), Imbalance: make([]float64, len(r.States)+len(r.Flows)), How: CycleStart}
	for i := range s.Levels {
		s.Levels[i] = c.Left(i, 0)
	}
	for i := len(s.Levels); i < len(outs); i++ {
		s.Flows = append(s.Flows, c.Left(i, 0))
	}
	return s, nil
}

// noCycle names what laplace counts.
func (r *Reduction) noCycle(err error) error {
	var (
		wave  *laplace.Unsettled
		apart *laplace.NotCommensurate
		drift *laplace.Drifting
		swing *laplace.Resonant
		pole  *laplace.NotDecaying
		turn  *laplace.NotContracting
	)
	part := func(i int) noted { // the imbalance, which neither repeats nor fails to settle, comes between
		if k := i - len(r.net.g.inputs) - 1; k >= 0 {
			return r.net.g.switches[k]
		}
		return noted{r.net.g.inputs[i].name, r.net.g.inputs[i].ref}
	}
	name := func(i int) string { return strconv.Quote(part(i).name) }
	ref := func(i int) Ref { return part(i).ref }
	switch {
	case errors.As(err, &wave):
		return &NoCycle{[]Ref{ref(wave.Input)}, name(wave.Input) + ": " + wave.Why, err}
	case errors.As(err, &apart):
		a, b := apart.Inputs[0], apart.Inputs[1]
		return &NoCycle{[]Ref{ref(b), ref(a)}, name(a) + " repeats every " + number(apart.Periods[0]) + " s and " + name(b) + " every " +
			number(apart.Periods[1]) + " s, periods without a whole-number ratio, so that together they never repeat", err}
	case errors.As(err, &drift):
		per := " in every period"
		if drift.Period == 0 {
			per = " in every second"
		}
		return &NoCycle{nil, strconv.Quote(r.outs[drift.Output].Name) + " moves on by " + number(drift.PerPeriod) + per +
			", because what flows in on the mean finds no way out", err}
	case errors.As(err, &swing), errors.As(err, &pole), errors.As(err, &turn):
		_, text, _ := strings.Cut(err.Error(), "cycle: ")
		return &NoCycle{nil, text, err}
	}
	return atSwitch(err)
}
