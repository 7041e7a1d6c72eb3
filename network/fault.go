package network

import (
	"math"
	"strconv"
	"strings"
)

// FaultCode tells kinds of faults apart.
type FaultCode uint8

const (
	Empty            FaultCode = iota // no node at all
	Unconnected                       // a node nothing connects to
	SelfLoop                          // a branch with both ends at one node
	HeldTwice                         // a node held by two inputs
	Undetermined                      // massless nodes whose level nothing determines
	BadNumber                         // a number that is not finite or has the wrong sign
	Unbalanced                        // more leaves a node in streams than enters it
	SingularMassless                  // a feedback cancels what determines a massless node
	FlippedMassless                   // a feedback outweighs what determines a massless node
	OutOfRange                        // numbers so far apart that double precision overflows between them
	StartOfNoStore                    // a start level at a node that stores nothing
	StartConflict                     // start flows that do not fit one another at a joint
	HeldCapacity                      // remark: a held node that stores
	NoEffect                          // remark: a source, stream or feedback into a held node
	NoWayOut                          // something flows into what is shut all round, or out of it
)

func (c FaultCode) String() string {
	return [...]string{
		"empty", "unconnected", "self loop", "held twice", "undetermined", "bad number", "unbalanced",
		"singular massless", "flipped massless", "out of range", "start of no store", "start conflict", "held capacity", "no effect", "no way out",
	}[c]
}

// A Fault is one thing wrong with a network, with the nodes and parts it is about.
// Text names them, in lower case and without a place: that is for whoever gave
// the references.
type Fault struct {
	Code  FaultCode
	Nodes []NodeID
	Refs  []Ref // of the parts at fault first, then of the nodes
	Text  string
	Figure
}

// Faults is the error of Build: everything wrong with the structure.
type Faults struct{ List []Fault }

func (f *Faults) Error() string { return join(f.List) }

// ParamFault is the error for numbers that a structure does not admit: not
// finite, of the wrong sign, or such that massless nodes have no level.
type ParamFault struct{ List []Fault }

func (f *ParamFault) Error() string { return join(f.List) }

// NoSteady is the error where a steady state was asked for that does not exist or
// is not the only one. Each Fault in List is one group of nodes.
type NoSteady struct{ List []SteadyFault }

// SteadyFault says why a group of nodes has no steady state of its own.
type SteadyFault struct {
	Nodes  []NodeID
	Refs   []Ref
	Reason SteadyReason
	Net    float64 // what flows into the group and finds no way out, where that is the reason
	Text   string
	Figure
}

// SteadyReason tells why there is no one steady state.
type SteadyReason uint8

const (
	Integrating   SteadyReason = iota // no held node to flow to, and the sources do not sum to zero
	LevelOpen                         // no held node, nothing flows: any level is steady
	FeedbackExact                     // feedback balances the losses exactly
	Unsolved                          // no levels were found at which all balances close
	Cycling                           // modes of elements follow one another for ever
	Enclosed                          // something flows into what is shut all round, or out of it
)

// Nonlinear is the error of what is answered for linear networks alone.
type Nonlinear struct {
	Asked string   // "the poles"
	Parts []string // names of the parts whose laws are not linear
}

func (e *Nonlinear) Error() string {
	names := make([]string, len(e.Parts))
	for i, p := range e.Parts {
		names[i] = strconv.Quote(p)
	}
	return "network: " + e.Asked + ": there is no such answer while the laws of " + listed(names) + " are not linear; march the network, or linearise it about a state"
}

func (e *NoSteady) Error() string {
	texts := make([]string, len(e.List))
	for i, f := range e.List {
		texts[i] = f.Text
	}
	return "network: no steady state: " + strings.Join(texts, "; ")
}

func join(list []Fault) string {
	texts := make([]string, len(list))
	for i, f := range list {
		texts[i] = f.Text
	}
	return "network: " + strings.Join(texts, "; ")
}

// maxNamed bounds how many nodes a message names.
const maxNamed = 6

// named writes "node a" or "nodes a, b and c".
func (g *graph) named(ids []NodeID) string {
	var s strings.Builder
	s.WriteString("node")
	if len(ids) > 1 {
		s.WriteString("s")
	}
	for i, id := range ids {
		if i == maxNamed && len(ids) > maxNamed+1 {
			s.WriteString(" and " + strconv.Itoa(len(ids)-i) + " more")
			break
		}
		switch {
		case i == 0:
			s.WriteString(" ")
		case i == len(ids)-1:
			s.WriteString(" and ")
		default:
			s.WriteString(", ")
		}
		s.WriteString(strconv.Quote(g.nodes[id].name))
	}
	return s.String()
}

func (g *graph) refsOf(ids []NodeID) []Ref {
	refs := make([]Ref, len(ids))
	for i, id := range ids {
		refs[i] = g.nodes[id].ref
	}
	return refs
}

// number writes a value in a message.
func number(v float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return "more than can be computed"
	}
	return strconv.FormatFloat(v, 'g', 6, 64)
}
