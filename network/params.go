package network

import (
	"fmt"
	"math"
	"strconv"

	"lagbook/laplace"
)

// Params are the numbers of a Network, parallel to its graph. A setter of a
// domain writes a few cells; nothing here changes the graph.
type Params struct {
	C            []float64            // by CapacityID; several on one node add up; > 0
	G            []float64            // by ResistanceID, a conductance; through flow = G·(x_from − x_to); > 0
	L            []float64            // by InertanceID; L·i' = x_from − x_to − LR·i; > 0
	LR           []float64            // by InertanceID, a resistance in series with L; ≥ 0
	Shut         []bool               // by InertanceID: nothing flows, whatever the levels; its flow stops at once where it is shut, and begins from 0
	W            []float64            // by OneWayID; adds W·(x_from − x_to) to the balance of `to` only; ≥ 0
	K            []float64            // by FeedbackID; adds K·(x_on − About) to the balance of `into`
	About        []float64            // by FeedbackID; a level
	Law          []Law                // by ElementID; must be set
	Drive        [][]laplace.Waveform // by ElementID, by place in Shape.Drives
	Drop         []Drop               // by InertanceID; nil: none
	Datum        []float64            // by NodeID: what the level shown is less than the network's; 0 but where a height makes the difference
	Wave         []laplace.Waveform   // by InputID; the level of a held node, or the flow of a source
	Start        []float64            // by NodeID; the level at t = 0 where HasStart
	HasStart     []bool               // by NodeID
	AllStart     float64              // the level shown at t = 0 of every node without a start of its own, where HasAllStart
	StartFlow    []float64            // by InertanceID; the flow at t = 0 where HasStartFlow
	HasStartFlow []bool               // by InertanceID; without it the flow is the steady one, and 0 where HasAllStart
	HasAllStart  bool                 // false: those nodes start at the steady state of the values just before t = 0
	StartCycle   bool                 // the network starts in its periodic state; no level at t = 0 is stated then
	Switch       []laplace.Waveform   // by SwitchID; piecewise constant
	Now          []float64            // by SwitchID; the value for which the numbers above are set, just before t = 0 unless Turn says otherwise
	// Turn returns the numbers for other values of the switches, in parameters of their
	// own: of them C, G, LR, Shut, W, K and About count, everything else is that of p. nil where no
	// switch moves.
	Turn func(now []float64) (*Params, error)
}

// Numbers beyond these bounds are refused, so that the product of two of them over
// a third stays within double precision. No physical value comes near.
const (
	tiniest = 1e-100
	hugest  = 1e100
)

// balanceTol is how much more than it receives a node may give to streams before
// that counts as an imbalance: rounding of shares of one stream stays far below.
const balanceTol = 1e-9

// NewParams returns parameters of the right sizes: capacities and conductances
// are zero and must be set, and so are inertances; everything else is zero and may
// stay so.
func (n *Network) NewParams() *Params {
	g := &n.g
	p := &Params{
		C:            make([]float64, len(g.capacities)),
		G:            make([]float64, len(g.resistances)),
		L:            make([]float64, len(g.inertances)),
		LR:           make([]float64, len(g.inertances)),
		Shut:         make([]bool, len(g.inertances)),
		W:            make([]float64, len(g.oneWays)),
		K:            make([]float64, len(g.feedbacks)),
		About:        make([]float64, len(g.feedbacks)),
		Wave:         make([]laplace.Waveform, len(g.inputs)),
		Start:        make([]float64, len(g.nodes)),
		HasStart:     make([]bool, len(g.nodes)),
		Law:          make([]Law, len(g.elements)),
		Drive:        newDrives(g),
		Drop:         make([]Drop, len(g.inertances)),
		Datum:        make([]float64, len(g.nodes)),
		StartFlow:    make([]float64, len(g.inertances)),
		HasStartFlow: make([]bool, len(g.inertances)),
		Switch:       make([]laplace.Waveform, len(g.switches)),
		Now:          make([]float64, len(g.switches)),
	}
	for i := range p.Switch {
		p.Switch[i], p.Now[i] = laplace.Constant(1), 1
	}
	for i := range p.Wave {
		p.Wave[i] = laplace.Constant(0)
	}
	return p
}

// Check returns every number that the network does not admit, in a *ParamFault.
// Reduce, Start and SteadyState call it first.
func (n *Network) Check(p *Params) error {
	if len(p.C) != len(n.g.capacities) || len(p.G) != len(n.g.resistances) ||
		len(p.L) != len(n.g.inertances) || len(p.LR) != len(p.L) || len(p.Shut) != len(p.L) || len(p.StartFlow) != len(p.L) || len(p.HasStartFlow) != len(p.L) ||
		len(p.W) != len(n.g.oneWays) || len(p.K) != len(n.g.feedbacks) || len(p.About) != len(p.K) ||
		len(p.Switch) != len(n.g.switches) || len(p.Now) != len(p.Switch) ||
		len(p.Wave) != len(n.g.inputs) || len(p.Start) != len(n.g.nodes) || len(p.HasStart) != len(p.Start) {
		panic("network: parameters of another network")
	}
	var faults []Fault
	faults = n.checkStores(p, faults)
	faults = n.checkBranches(p, faults)
	faults = n.checkLevels(p, faults)
	faults = n.checkSwitches(p, faults)
	if len(faults) == 0 {
		faults = n.checkStreams(p, faults)
	}
	if len(faults) > 0 {
		return &ParamFault{List: faults}
	}
	return nil
}

func (n *Network) checkStores(p *Params, faults []Fault) []Fault {
	for i, c := range p.C {
		if why := wrong(c, true); why != "" {
			at := n.g.capacities[i].at
			faults = append(faults, Fault{Code: BadNumber, Nodes: []NodeID{at}, Refs: []Ref{n.g.capacities[i].ref, n.g.nodes[at].ref},
				Text: n.g.named([]NodeID{at}) + ": capacity is " + number(c) + why})
		}
	}
	return faults
}

func (n *Network) checkBranches(p *Params, faults []Fault) []Fault {
	report := func(b *branch, kind BranchKind, what string, v float64, why string) {
		if why != "" {
			faults = append(faults, Fault{Code: BadNumber, Nodes: []NodeID{b.from, b.to}, Refs: []Ref{b.ref},
				Text: kind.String() + " " + strconv.Quote(b.name) + ": " + what + " is " + number(v) + why})
		}
	}
	for i, v := range p.G {
		report(&n.g.resistances[i], ResistanceBranch, "conductance", v, wrong(v, v != 0 || len(p.Switch) == 0)) // a switch may open a branch
	}
	for i, v := range p.L {
		b := &n.g.inertances[i]
		report(b, InertanceBranch, "inertance", v, wrong(v, true))
		if p.LR[i] != 0 {
			report(b, InertanceBranch, "resistance", p.LR[i], wrong(p.LR[i], true))
		}
		if p.HasStartFlow[i] {
			report(b, InertanceBranch, "start", p.StartFlow[i], wrong(p.StartFlow[i], false))
		}
	}
	for i, v := range p.W {
		if v != 0 {
			report(&n.g.oneWays[i], OneWayBranch, "rate", v, wrong(v, true))
		}
	}
	for i, v := range p.K {
		if v != 0 {
			report(&n.g.feedbacks[i], FeedbackBranch, "gain", v, wrong(math.Abs(v), true))
		}
		report(&n.g.feedbacks[i], FeedbackBranch, "level of reference", p.About[i], wrong(p.About[i], false))
	}
	return faults
}

func (n *Network) checkLevels(p *Params, faults []Fault) []Fault {
	for i := range p.Wave {
		if why := wrong(p.Wave[i].Before, false); why != "" {
			in := &n.g.inputs[i]
			faults = append(faults, Fault{Code: BadNumber, Nodes: []NodeID{in.node}, Refs: []Ref{in.ref},
				Text: "input " + strconv.Quote(in.name) + ": value before the start is " + number(p.Wave[i].Before) + why})
		}
	}
	for i, has := range p.HasStart {
		if !has {
			continue
		}
		id := []NodeID{NodeID(i)}
		if why := wrong(p.Start[i], false); why != "" {
			faults = append(faults, Fault{Code: BadNumber, Nodes: id, Refs: n.g.refsOf(id), Text: n.g.named(id) + ": start is " + number(p.Start[i]) + why})
		}
		if n.g.isHeld(id[0]) || n.g.isMassless(id[0]) {
			faults = append(faults, Fault{Code: StartOfNoStore, Nodes: id, Refs: n.g.refsOf(id),
				Text: n.g.named(id) + ": has a start and stores nothing, so that its level follows from the others"})
		}
	}
	if why := wrong(p.AllStart, false); p.HasAllStart && why != "" {
		faults = append(faults, Fault{Code: BadNumber, Nodes: nil, Refs: nil, Text: "start of all nodes is " + number(p.AllStart) + why})
	}
	return faults
}

// checkWaves finds waveforms with a number in them that is none.
func (n *Network) checkWaves(p *Params) []Fault {
	var faults []Fault
	for i := range p.Wave {
		for k := range p.Wave[i].Segments {
			if finite(&p.Wave[i].Segments[k]) {
				continue
			}
			in := &n.g.inputs[i]
			faults = append(faults, Fault{Code: BadNumber, Nodes: []NodeID{in.node}, Refs: []Ref{in.ref},
				Text: "input " + strconv.Quote(in.name) + ": its waveform holds a value that is not finite"})
			break
		}
	}
	return faults
}

func finite(s *laplace.Segment) bool {
	zero := 0*s.At + 0*s.A + 0*s.B // NaN if one of them is infinite or none
	for _, c := range s.Poly {
		zero += 0 * c
	}
	for _, e := range s.Exp {
		zero += 0*real(e.Amplitude) + 0*imag(e.Amplitude) + 0*real(e.Rate) + 0*imag(e.Rate)
	}
	return zero == 0
}

// checkStreams finds free nodes that streams take more from than they bring. That
// they bring more is legal: the rest leaves the network.
func (n *Network) checkStreams(p *Params, faults []Fault) []Fault {
	if len(p.W) == 0 {
		return faults
	}
	brought, taken := make([]float64, len(n.g.nodes)), make([]float64, len(n.g.nodes))
	for i, b := range n.g.oneWays {
		brought[b.to] += p.W[i]
		taken[b.from] += p.W[i]
	}
	for i := range n.g.nodes {
		id := NodeID(i)
		if n.g.isHeld(id) || taken[i] <= brought[i]*(1+balanceTol) {
			continue
		}
		var refs []Ref
		for _, b := range n.g.oneWays {
			if b.from == id || b.to == id {
				refs = append(refs, b.ref)
			}
		}
		faults = append(faults, Fault{Code: Unbalanced, Nodes: []NodeID{id}, Refs: append(refs, n.g.nodes[i].ref),
			Text: n.g.named([]NodeID{id}) + ": streams bring " + number(brought[i]) + " and take " + number(taken[i])})
	}
	return faults
}

// wrong says what is wrong with a number, "" if nothing is.
func wrong(v float64, positive bool) string {
	switch size := math.Abs(v); {
	case math.IsNaN(v), math.IsInf(v, 0):
		return ", must be finite"
	case positive && v <= 0:
		return ", must be positive"
	case size > hugest:
		return fmt.Sprintf(", must be %.0g or below", hugest)
	case positive && v < tiniest:
		return fmt.Sprintf(", must be %.0g or above", tiniest)
	}
	return ""
}
