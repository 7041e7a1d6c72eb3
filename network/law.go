package network

import "lagbook/laplace"

// ElementID identifies an element: a part whose law is not linear, or that only
// reads what others do.
type ElementID int32

// A Shape is what the graph needs to know of an element: what it touches. Its law,
// with the numbers, stands in Params.Law.
type Shape struct {
	Name     string
	Ports    []NodeID  // whose levels it sees and into which it may bring flow
	Unknowns []Unknown // of its own
	Drives   []string  // waveforms it follows, as transfer functions name them: "opening of sv1"
	Stores   bool      // its law says how much is stored at the first port
	Joins    bool      // it ties the levels of its ports, as a resistance does: a node that only such parts touch is determined by the others
	Gate     int       // index + 1 of the drive that shuts the element for as long as it is 0; 0: none
	Memory   int       // numbers it keeps from the start of a run on, or from one mode to the next
	Readings []string  // what can be read off it, as tables name it: "level", "gas volume"
	Passive  bool      // it brings no flow anywhere, has no unknowns and its readings are affine: it leaves a linear network linear
}

// An Unknown is a number that an element adds to the network's own: an integral, a
// temperature of gas, a speed.
type Unknown struct {
	Name      string
	Algebraic bool    // its row of the law is 0 = f, else x' = f
	Scale     float64 // of what size it is: 1 rad/s, 100 W; errors are judged by it. > 0
	Start     float64 // where a run begins unless a steady state or Beginning says otherwise
}

// A Stamp is what a law sees and what it answers. The local variables X are the
// levels of the ports, the unknowns and the values of the drives, in the order of
// the Shape. Levels are those of the network: of a node with a datum, the level
// shown is X less the datum.
type Stamp struct {
	T    float64   // s; laws should depend on time through their drives alone
	X    []float64 // ports, unknowns, drives
	Rate []float64 // dX/dt, set for Guards alone
	Mem  []float64 // Shape.Memory of them
	Mode int

	F  []float64 // ports: flow into that node; unknowns: their rates, or what must vanish
	DF []float64 // row-major len(F) × len(X): ∂F/∂X

	Stored, DStored float64   // what is stored at the first port at this level, and its derivative with respect to X[0]; where Shape.Stores
	DStoredBy       []float64 // by unknown that is a state: derivative of Stored with respect to it; may stay zero. What is stored must not depend on an algebraic unknown
}

// A Law computes an element. Eval sets every entry of F and DF (they come zeroed) and
// Stored where the Shape stores. It must be smooth within a mode, but for kinks across
// which it is continuous, must accept any finite X, and never returns NaN or Inf.
// Where no drive or unknown takes part and nothing is created, the flows into the ports
// sum to zero. It allocates nothing and keeps nothing: several marches may run on one law.
type Law interface {
	Eval(s *Stamp)
}

// Switching is a law with modes: a check valve, a thermostat. A run begins in mode 0
// unless Begin says otherwise.
type Switching interface {
	Law
	// Guards writes one number for each way out of the present mode into g, positive
	// while the mode lasts, and returns how many. The march finds the instant at which
	// one passes through zero.
	Guards(s *Stamp, g []float64) int
	// Next returns the mode in force after guard k has passed through zero and may
	// write s.Mem and the unknowns in s.X. What says in the words of a list of events
	// what happened: "shut", "runs over". Last ends the run there: vapour forms.
	Next(s *Stamp, k int) (mode int, what string, last bool)
	// Shut reports whether in this mode the element is gone: nothing flows through it
	// and no level acts through it.
	Shut(mode int) bool
}

// Mixed is a law whose unknowns may be algebraic in some modes and not in others.
type Mixed interface {
	Law
	Algebraic(mode, unknown int) bool
}

// Beginning is a law that must know the state at t = 0, after it was found: a gas that
// was charged slowly. Begin may write s.Mem, the unknowns in s.X and s.Mode. steady
// tells whether the state is the steady one; unknowns are then at their steady values.
type Beginning interface {
	Law
	Begin(s *Stamp, steady bool)
}

// Readable is a law with readings.
type Readable interface {
	Law
	// Read returns reading k and adds its derivatives by X to grad, which is zeroed or
	// nil where nobody asks.
	Read(s *Stamp, k int, grad []float64) float64
}

// Cautious is a law that knows where it stops being right. Caution returns a code and a
// sentence, "" where all is well; a march asks where it starts, at each bend of a wave and
// after each step, and keeps the first of each code.
type Cautious interface {
	Law
	Caution(s *Stamp) (code, text string)
}

// A Drop is the pressure (level) that an inertance loses to its flow q beside LR·q:
// L·q' = x_from − x_to − LR·q − h(q). It is odd or at least increasing, and smooth but
// for kinks.
type Drop interface {
	Drop(q float64) (h, dh float64)
}

// element is one as the Builder receives it.
type element struct {
	Shape
	ref Ref
}

// Element adds an element. Its law must be set in Params.Law, and its drives in
// Params.Drive.
func (b *Builder) Element(s Shape, r Ref) ElementID {
	for _, n := range s.Ports {
		b.need(n)
	}
	if s.Stores && len(s.Ports) == 0 {
		panic("network: an element that stores has a port")
	}
	if s.Stores {
		b.g.nodes[s.Ports[0]].stores = true
	}
	b.g.elements = append(b.g.elements, element{s, r})
	return ElementID(len(b.g.elements) - 1)
}

// Dropping marks an inertance whose Params.Drop is set.
func (b *Builder) Dropping(id InertanceID) { b.g.dropping = append(b.g.dropping, id) }

// Nonlinear reports whether the network has a part whose law is not linear.
func (n *Network) Nonlinear() bool {
	if len(n.g.dropping) > 0 {
		return true
	}
	for i := range n.g.elements {
		if !n.g.elements[i].Passive {
			return true
		}
	}
	return false
}

// An ElementView is an element of the graph.
type ElementView struct {
	ID ElementID
	Shape
	Ref Ref
}

// Elements returns the elements, by ElementID.
func (n *Network) Elements() []ElementView {
	all := make([]ElementView, len(n.g.elements))
	for i, e := range n.g.elements {
		all[i] = ElementView{ElementID(i), e.Shape, e.ref}
	}
	return all
}

// newDrives returns room for the waveforms of all drives, each constant 0.
func newDrives(g *graph) [][]laplace.Waveform {
	all := make([][]laplace.Waveform, len(g.elements))
	for i := range all {
		all[i] = make([]laplace.Waveform, len(g.elements[i].Drives))
	}
	return all
}
