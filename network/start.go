package network

// StartHow tells how the start state was found.
type StartHow uint8

const (
	SteadyStart StartHow = iota // steady at the values just before t = 0
	GivenStart                  // every store has a level that was stated
	MixedStart                  // some stores have one, the others are steady
	CycleStart                  // in the periodic state
)

func (h StartHow) String() string {
	return [...]string{"steady", "given", "given in part", "periodic"}[h]
}

// A StartState is the state at t = 0, with the inputs at their values just before.
type StartState struct {
	Levels    []float64 // by NodeID; massless nodes follow the stores
	Imbalance []float64 // flow into each store, in the order of Reduction.States, then what drives each of Reduction.Flows; exactly 0 where steady
	How       StartHow
	Flows     []float64 // by InertanceID; nil where there are none
	// Circulating are inertances on a loop without resistance: a flow round it is
	// steady whatever it is, and is taken as 0 where none is stated.
	Circulating []InertanceID
	// Unattained are the stores that start at a steady state which the network
	// would not come to by itself, because a pole of theirs is not left of 0.
	Unattained []NodeID

	pt *point
}

// moves tells whether anything changes by itself from the start on.
func (s *StartState) moves() bool {
	for _, v := range s.Imbalance {
		if v != 0 {
			return true
		}
	}
	return false
}

// Start returns the state at t = 0. Stores without a stated level start at the
// steady state that the whole network has at the values of the inputs just before
// t = 0; a stated level then takes the place of its own. It returns *NoSteady,
// naming the nodes, where an island that needs its steady state has none or not
// one only, and *ParamFault as Reduce does.
//
// Where p.StartCycle is set it is the periodic state just before t = 0, with the
// errors of Reduction.Cycle.
func (n *Network) Start(p *Params) (*StartState, error) {
	if n.g.nonlinear() {
		return nil, n.notLinear("the start of a linear network")
	}
	if p.StartCycle {
		return n.cycleStart(p)
	}
	n, err := n.inForce(p)
	if err != nil {
		return nil, err
	}
	e, err := n.reduced(p)
	if err != nil {
		return nil, err
	}
	f, err := n.newFlows(e, p)
	if err != nil {
		return nil, err
	}
	return n.startOf(p, e, f)
}

// Start returns the state at t = 0 for the capacities and conductances of the
// Reduction and the waveforms and starts of p, see Network.Start.
func (r *Reduction) Start(p *Params) (*StartState, error) {
	if p.StartCycle {
		return r.whole.cycleStart(p)
	}
	return r.net.startOf(p, r.e, r.flows)
}

// startOf finds the start state island by island.
func (n *Network) startOf(p *Params, e *exchange, f *flows) (*StartState, error) {
	if f != nil {
		return n.startWithFlows(p, e, f)
	}
	pl := n.plan
	u := make([]float64, len(p.Wave))
	for k := range u {
		u[k] = p.Wave[k].Before
	}
	s := &StartState{Imbalance: make([]float64, pl.stores), pt: n.newPoint(p, e, u)}
	given, stores := n.countGiven(p)
	var faults []SteadyFault
	if st := n.staticFor(p, e, given, stores); st != nil {
		st.solve(s.pt)
		for k := range st.island {
			if given[k] == stores[k] {
				continue
			}
			if st.island[k].open >= 0 {
				faults = append(faults, st.fault(s.pt, k))
			}
			if !st.island[k].attained {
				s.Unattained = append(s.Unattained, n.storesOf(k)...)
			}
		}
	}
	if len(faults) > 0 {
		return nil, &NoSteady{List: faults}
	}
	n.putGiven(p, e, s, given, stores)
	e.follow(pl, s.pt)
	s.Levels = s.pt.levels()
	s.How = how(given, stores)
	return s, nil
}

// countGiven counts the stores of each island, and those whose level is stated.
func (n *Network) countGiven(p *Params) (given, stores []int) {
	pl := n.plan
	given, stores = make([]int, pl.islands), make([]int, pl.islands)
	for _, id := range pl.order[pl.massless:pl.free] {
		stores[pl.island[id]]++
		if _, ok := p.startOf(id); ok {
			given[pl.island[id]]++
		}
	}
	return given, stores
}

// staticFor eliminates the stores where some island needs its steady state.
func (n *Network) staticFor(p *Params, e *exchange, given, stores []int) *static {
	for k := range stores {
		if given[k] < stores[k] {
			return n.newStatic(p, e)
		}
	}
	return nil
}

// putGiven sets the stated levels and forms the imbalance. Of an island that is
// steady otherwise it is the exchange of what the stated levels differ by, which
// keeps more digits than the sum of all flows, of which the steady part cancels.
func (n *Network) putGiven(p *Params, e *exchange, s *StartState, given, stores []int) {
	pl := n.plan
	change := &point{pl: pl, held: make([]float64, len(s.pt.held)), ref: make([]float64, pl.islands), dev: make([]float64, pl.free)}
	for i := pl.massless; i < pl.free; i++ {
		id := pl.order[i]
		if level, ok := p.startOf(id); ok {
			dev := level - s.pt.ref[pl.island[id]]
			change.dev[i] = dev - s.pt.dev[i]
			s.pt.dev[i] = dev
		}
	}
	f := append([]float64(nil), s.pt.flow...)
	e.forward(pl, f, pl.massless)
	nothing := make([]float64, pl.free)
	for i := pl.massless; i < pl.free; i++ {
		switch k := pl.island[pl.order[i]]; given[k] {
		case 0:
		case stores[k]:
			s.Imbalance[i-pl.massless] = e.inflow(pl, s.pt, f, i)
		default:
			s.Imbalance[i-pl.massless] = e.inflow(pl, change, nothing, i)
		}
	}
}

func (n *Network) storesOf(island int) []NodeID {
	var ids []NodeID
	for _, id := range n.plan.order[n.plan.massless:n.plan.free] {
		if n.plan.island[id] == island {
			ids = append(ids, id)
		}
	}
	return ids
}

func how(given, stores []int) StartHow {
	all, some := true, false
	for k := range stores {
		all = all && given[k] == stores[k]
		some = some || given[k] > 0
	}
	switch {
	case !some:
		return SteadyStart
	case all:
		return GivenStart
	}
	return MixedStart
}
