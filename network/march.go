package network

// A State is all that a run must know to go on from.
type State struct {
	T         float64
	Levels    []float64   // by NodeID, held nodes included; the network's own, not less the datum
	Flows     []float64   // by InertanceID
	Unknowns  [][]float64 // by ElementID
	Mem       [][]float64 // by ElementID
	Modes     []int       // by ElementID
	Beginning bool        // just before t = 0: waves have the values they have before, T is 0
	How       StartHow
}

// A Run says how far and how well to march.
type Run struct {
	Until   float64     // s
	RelTol  float64     // of a step; 0: DefaultTolerance; less than 1e-12 counts as that
	Stopped func() bool // asked at each step; nil: never
}

// DefaultTolerance is the error allowed in one step, as a share of each value.
const DefaultTolerance = 1e-7

// An Event is a change of mode.
type Event struct {
	Element ElementID
	What    string
	At      float64
	Last    bool // the run ends here
}

// A Warned is a caution of a law, with the first instant at which it was given.
type Warned struct {
	Element    ElementID
	Code, Text string
	At         float64
}

// March integrates from a state on and returns the outputs against time. It stops at
// every bend of a wave and at every event, an instant at which a guard of an element
// passes through zero, and goes on from there with what then holds; where several
// fall on one instant they follow one another until no guard is violated.
//
// Method: see package stiff; the order is 5, errors are judged in each unknown by
// RelTol of its size. Cost: for each step one factorisation of the Jacobian and eight
// solves. The error is *ParamFault, *laplace.TooMany, *MarchFault or ErrStopped.
func (n *Network) March(p *Params, from *State, outs []Output, run Run) (*Trajectory, error) {
	m, err := n.newMarch(p, from, outs, run)
	if err != nil {
		return nil, err
	}
	return m.through()
}
