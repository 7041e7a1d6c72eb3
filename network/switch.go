package network

import (
	"errors"
	"slices"
	"strconv"

	"lagbook/laplace"
)

// SwitchID names a number of the network that changes in steps.
type SwitchID int32

// noted is a switch as the Builder receives it.
type noted struct {
	name string
	ref  Ref
}

// Switch adds a number that changes in steps while the network runs, a factor of some
// branches or the gain of a feedback. What it acts on is the business of Params.Turn;
// the stores stay what they are, but flows of inertances may be stopped and begin again.
func (b *Builder) Switch(name string, r Ref) SwitchID {
	b.g.switches = append(b.g.switches, noted{name, r})
	return SwitchID(len(b.g.switches) - 1)
}

// A SwitchView is what is known of a switch.
type SwitchView struct {
	ID   SwitchID
	Name string
	Ref  Ref
}

// Switches returns the switches, by SwitchID.
func (n *Network) Switches() []SwitchView {
	all := make([]SwitchView, len(n.g.switches))
	for i, s := range n.g.switches {
		all[i] = SwitchView{SwitchID(i), s.name, s.ref}
	}
	return all
}

// Clone returns parameters of their own with the same numbers.
func (p *Params) Clone() *Params {
	c := *p
	for _, v := range []*[]float64{&c.C, &c.G, &c.L, &c.LR, &c.W, &c.K, &c.About, &c.Start, &c.StartFlow, &c.Now} {
		*v = slices.Clone(*v)
	}
	for _, v := range []*[]bool{&c.HasStart, &c.HasStartFlow, &c.Shut} {
		*v = slices.Clone(*v)
	}
	c.Wave, c.Switch = slices.Clone(p.Wave), slices.Clone(p.Switch)
	return &c
}

// Turns reports whether any switch moves.
func (p *Params) Turns() bool {
	return slices.ContainsFunc(p.Switch, func(w laplace.Waveform) bool { return !w.Constant() })
}

// At returns the numbers in force at t (s), after a switch there.
func (p *Params) At(t float64) (*Params, error) {
	if !p.Turns() {
		return p, nil
	}
	now := make([]float64, len(p.Switch))
	for i, w := range p.Switch {
		now[i] = w.At(t)
	}
	return p.Turn(now)
}

// checkSwitches finds switches that move otherwise than in steps.
func (n *Network) checkSwitches(p *Params, faults []Fault) []Fault {
	for i, w := range p.Switch {
		if laplace.NotStairs([]laplace.Waveform{w}) >= 0 {
			s := n.g.switches[i]
			faults = append(faults, Fault{Code: BadNumber, Nodes: nil, Refs: []Ref{s.ref}, Text: strconv.Quote(s.name) +
				": changes otherwise than in steps, and between steps only is the network linear"})
		}
	}
	return faults
}

// schedule returns the network in its phases: each reduced on its own, all as
// deviations from the levels at the start and the inputs just before, so that in each
// the start has an imbalance of its own and the stores simply go on. It also returns
// the inputs, of which the last is that imbalance.
func (d *deviations) schedule() (*laplace.Schedule, []laplace.Waveform) {
	inputs := len(d.r.net.g.inputs)
	u := append(d.u[:inputs:inputs], laplace.Step(0, 1, 0))
	return &laplace.Schedule{Waves: d.p.Switch, Pick: d.phase}, u
}

// reference returns the state that a response is a deviation from: the start or, where
// that is the cycle of a network that switches, and the network just before t = 0 has no
// steady state of its own, one level for all.
func (r *Reduction) reference(p *Params) (*StartState, error) {
	start, err := r.net.startOf(p, r.e, r.flows)
	if err == nil || !p.StartCycle || !p.Turns() || !errors.As(err, new(*NoSteady)) {
		return start, err
	}
	level := p.Clone()
	level.HasAllStart, level.Datum = true, make([]float64, len(p.Datum))
	for k, in := range r.net.g.inputs {
		if in.held {
			level.AllStart = p.Wave[k].Before
			break
		}
	}
	return r.net.startOf(level, r.e, r.flows)
}

// phase reduces the network for the values given of its switches.
func (d *deviations) phase(now []float64) (laplace.Kind, error) {
	if slices.Equal(now, d.p.Now) {
		return d.r.kind(d.start.Imbalance, d.base, make([]float64, len(d.start.Flows)))
	}
	p, err := d.p.Turn(now)
	if err != nil {
		return laplace.Kind{}, err
	}
	p = p.Clone()
	p.HasAllStart, p.StartCycle, p.Wave = false, false, d.p.Wave
	for _, id := range d.r.States {
		p.Start[id], p.HasStart[id] = d.start.Levels[id], true
	}
	ref, err := d.beginFlows(p)
	if err != nil {
		return laplace.Kind{}, err
	}
	r, err := d.r.whole.Reduce(p, d.r.outs)
	if err != nil {
		return laplace.Kind{}, err
	}
	e, err := r.deviations(p)
	if err != nil {
		return laplace.Kind{}, err
	}
	return r.kind(e.start.Imbalance, e.base, ref)
}

// beginFlows sets the flows that deviations count from while p is in force: those of
// the start or, where p stops some, what is left of them. It returns the difference.
func (d *deviations) beginFlows(p *Params) ([]float64, error) {
	ref := make([]float64, len(d.start.Flows))
	if len(ref) == 0 {
		return ref, nil
	}
	copy(p.StartFlow, d.start.Flows)
	net, err := d.r.whole.inForce(p)
	if err != nil {
		return nil, err
	}
	if net != d.r.whole {
		f := &flows{n: net, p: p, plan: net.plan.flows}
		left, err := f.left(d.start.Flows)
		if err != nil {
			return nil, err
		}
		copy(p.StartFlow, left)
	}
	for b, v := range net.g.inertances {
		p.HasStartFlow[b] = !v.shut()
		ref[b] = p.StartFlow[b] - d.start.Flows[b]
	}
	return ref, nil
}

// kind returns the system with the imbalance as its last input, whether it is 0 or not.
func (r *Reduction) kind(imbalance, base, ref []float64) (laplace.Kind, error) {
	x, inputs := r.Realisation, len(r.net.g.inputs)
	x.B = append(x.B[:inputs:inputs], imbalance)
	x.D = withNone(r.Realisation.D, inputs)
	x.Rate = withNone(r.Realisation.Rate, inputs)
	for m, w := range r.weights {
		if w.rate != nil {
			return laplace.Kind{}, errors.New(strconv.Quote(r.outs[m].Name) + " follows the derivative of an input, which is not answered in a network that switches: do not show it")
		}
	}
	if !r.whole.carries() {
		s, err := laplace.NewCarrying(x)
		return laplace.Kind{System: s, Base: base}, err
	}
	over, err := r.carry(ref)
	if err != nil {
		return laplace.Kind{}, err
	}
	s, err := laplace.NewCarryingOver(x, over)
	return laplace.Kind{System: s, Base: base}, err
}

// atRest says why a node that has branches may have none that counts.
func atRest(p *Params) string {
	if len(p.Switch) > 0 {
		return "with branches open or streams at rest"
	}
	return "with streams at rest"
}

// atSwitch says in the text of a fault when the numbers came about that are at fault.
func atSwitch(err error) error {
	var at *laplace.SwitchError
	var faults *ParamFault
	if !errors.As(err, &at) || !errors.As(at.Err, &faults) {
		return err
	}
	list := slices.Clone(faults.List)
	for i := range list {
		list[i].Text += " (from " + number(at.At) + " s on, as the network is switched then)"
	}
	return &ParamFault{List: list}
}
