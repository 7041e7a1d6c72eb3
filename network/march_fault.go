package network

import (
	"errors"
	"fmt"
	"strconv"
)

// ErrStopped is the error of a march that Run.Stopped ended.
var ErrStopped = errors.New("network: the march was stopped")

// A MarchFault says why a march cannot go on.
type MarchFault struct {
	At    float64 // s
	Nodes []NodeID
	Refs  []Ref // of the part at fault; none where it is not known
	Text  string
	Err   error // what the equations said, nil where nothing
}

func (f *MarchFault) Error() string { return "network: " + f.Text }
func (f *MarchFault) Unwrap() error { return f.Err }

// seconds writes a time for a message.
func seconds(t float64) string { return strconv.FormatFloat(t, 'g', 6, 64) + " s" }

// noPoint is the fault where the algebraic rows have no solution at t.
func noPoint(t float64, err error) error {
	return &MarchFault{At: t, Err: err, Text: "no state at t = " + seconds(t) + " balances: " + err.Error()}
}

// tooLong is the fault of a run of more steps than memory or patience hold.
func tooLong(t, until float64, steps int) error {
	return &MarchFault{At: t, Text: fmt.Sprintf("%d steps came only to t = %s of %s: a shorter run, fewer outputs or a looser tolerance is needed",
		steps, seconds(t), seconds(until))}
}

// chatter is the fault of an element that changes its mode again and again at one instant.
func (n *Network) chatter(id ElementID, t float64, count int) error {
	e := &n.g.elements[id]
	return &MarchFault{At: t, Refs: []Ref{e.ref}, Text: fmt.Sprintf("%q changes back and forth %d times about t = %s without getting anywhere: what switches it must lie further apart",
		e.Name, count, seconds(t))}
}

// unknownName says in words what stands at a place of the unknowns, "" outside.
func (n *Network) unknownName(k int) string {
	l, g := newLayout(&n.g), &n.g
	for i := range g.nodes {
		if int(l.level[i]) == k || int(l.stored[i]) == k && k >= 0 {
			return g.named([]NodeID{NodeID(i)})
		}
	}
	for b := range g.inertances {
		if int(l.flow[b]) == k {
			return "the flow of " + strconv.Quote(g.inertances[b].name)
		}
	}
	for i, list := range l.unknown {
		for j, at := range list {
			if int(at) == k {
				return g.elements[i].Unknowns[j].Name + " of " + strconv.Quote(g.elements[i].Name)
			}
		}
	}
	return ""
}
