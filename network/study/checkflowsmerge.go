package study

import (
	"math"
	"slices"

	"lagbook/network"
)

// sameFlow is the share of a flow below which a difference is rounding.
const sameFlow = 1e-9

// forward returns r with a flow that is not negative.
func (r running) forward() running {
	if r.flow < 0 {
		r.from, r.to, r.out, r.in, r.flow = r.to, r.from, r.in, r.out, -r.flow
	}
	r.flow += 0 // no −0
	return r
}

// across puts, of an element with several ports, what it takes at some and gives at
// others on lines from node to node, in the order of its ports. What it gives more, or
// less, comes from nowhere or goes there.
func across(list []running) []running {
	var all []running
	for i := 0; i < len(list); {
		k := i + 1
		for k < len(list) && list[i].law != noLaw && list[k].law == list[i].law {
			k++
		}
		if k == i+1 {
			all = append(all, list[i])
		} else {
			all = append(all, joined(list[i:k])...)
		}
		i = k
	}
	return all
}

// joined does so for the ports of one element.
func joined(ports []running) []running {
	ports = slices.Clone(ports)
	largest := 0.0
	for _, p := range ports {
		largest = math.Max(largest, p.flow)
	}
	var all []running
	for i := range ports {
		taken := &ports[i]
		for j := range ports {
			given := &ports[j]
			if taken.to != nowhere || given.from != nowhere || taken.flow <= 0 || given.flow <= 0 {
				continue
			}
			r := *given
			r.from, r.out, r.flow = taken.from, taken.out, math.Min(taken.flow, given.flow)
			taken.flow, given.flow = taken.flow-r.flow, given.flow-r.flow
			all = append(all, r)
		}
	}
	for _, p := range ports {
		if p.flow > sameFlow*largest {
			all = append(all, p)
		}
	}
	return all
}

// summed adds up what one part carries between the same two nodes: of a source, what it
// is stated to give and what it gives more as its node gets hotter.
func summed(list []running) []running {
	type ends struct {
		ref      network.Ref
		part     string
		from, to network.NodeID
		out, in  network.NodeID
	}
	at := map[ends]int{}
	var all []running
	for _, r := range list {
		if k, ok := at[ends{r.ref, r.part, r.from, r.to, r.out, r.in}]; ok {
			all[k].flow += r.flow
		} else if k, ok := at[ends{r.ref, r.part, r.to, r.from, r.in, r.out}]; ok {
			all[k].flow -= r.flow
		} else {
			at[ends{r.ref, r.part, r.from, r.to, r.out, r.in}] = len(all)
			all = append(all, r)
		}
	}
	for i := range all {
		all[i] = all[i].forward()
	}
	return all
}
