package thermal

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// varies reports whether a layer's conductivity or specific heat goes by temperature.
func (w wallLayer) varies() bool { return w.k.points != nil || w.c.points != nil }

// A varyingWall is a wall in which a layer's properties go by temperature. The lumps are those of
// any wall, each with its capacitance in its middle; between them heat flows by ∫k dT, which is exact
// for the steady flow, and where two layers meet through the temperature at which what
// arrives from the one goes on into the other.
type varyingWall struct {
	layers []wallLayer
	lumps  int              // in each layer
	nodes  []network.NodeID // first end, lumps, second end
}

// build adds what stores and what conducts.
func (w *varyingWall) build(e *casefile.Element, b *network.Builder) (setters []casefile.Setter) {
	for k, node := range w.nodes[1 : len(w.nodes)-1] {
		setters = append(setters, w.store(e, b, node, &w.layers[k/w.lumps]))
	}
	for k := range len(w.nodes) - 1 {
		name := e.FullName()
		if k > 0 {
			name = fmt.Sprintf("%s/%d", e.FullName(), k+1)
		}
		setters = append(setters, w.conduct(e, b, name, k))
	}
	return setters
}

// store adds the capacitance of one lump.
func (w *varyingWall) store(e *casefile.Element, b *network.Builder, node network.NodeID, l *wallLayer) casefile.Setter {
	if l.c.points == nil {
		id := b.Capacity(node, e.Ref)
		return func(v casefile.Values, p *network.Params) error {
			p.C[id] = l.store(v, w.lumps)
			return nil
		}
	}
	id := b.Element(network.Shape{Name: e.FullName(), Ports: []network.NodeID{node}, Stores: true}, e.Ref)
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			p.Law[id] = &storing{}
		}
		s := p.Law[id].(*storing)
		s.mass = l.rho.at(v) * l.t.at(v) * l.a.at(v) / float64(w.lumps)
		onto(&s.heat, l.c.points, v)
		return nil
	}
}

// conduct adds what lies between node k and the next: half a lump at the ends, two halves of one
// layer or of two.
func (w *varyingWall) conduct(e *casefile.Element, b *network.Builder, name string, k int) casefile.Setter {
	last := len(w.nodes) - 2
	before, after := max(k-1, 0)/w.lumps, min(k, last-1)/w.lumps
	first, second := &w.layers[before], &w.layers[after]
	halves := 2.0 // of a lump, where one layer is between the nodes
	if k == 0 || k == last {
		halves = 1
	}
	if first.k.points == nil && second.k.points == nil {
		id := b.Resistance(name, w.nodes[k], w.nodes[k+1], e.Ref)
		return func(v casefile.Values, p *network.Params) error {
			r := halves * first.half(v, w.lumps)
			if first != second {
				r = first.half(v, w.lumps) + second.half(v, w.lumps)
			}
			p.G[id] = 1 / r
			return nil
		}
	}
	id := b.Between(name, w.nodes[k], w.nodes[k+1], false, e.Ref)
	return func(v casefile.Values, p *network.Params) error {
		if p.Law[id] == nil {
			p.Law[id] = &network.Through{Flow: &meeting{joined: first != second}}
		}
		m := p.Law[id].(*network.Through).Flow.(*meeting)
		first.conducting(&m.first, v, w.lumps, halves)
		if m.joined {
			first.conducting(&m.first, v, w.lumps, 1)
			second.conducting(&m.second, v, w.lumps, 1)
		}
		return nil
	}
}

// conducting writes what so many halves of a lump conduct.
func (w *wallLayer) conducting(c *conducting, v casefile.Values, lumps int, halves float64) {
	c.g = 2 * float64(lumps) * w.a.at(v) / (halves * w.t.at(v))
	if w.k.points != nil {
		onto(&c.k, w.k.points, v)
		return
	}
	k := w.k.at(v)
	c.k.set(1, func(int) (x, y float64) { return usual, k })
}

// A meeting is the flow through one stretch of a layer, or through two that meet: then at the
// temperature at which both carry the same.
type meeting struct {
	first, second conducting
	joined        bool
}

// Flow implements network.Flow.
func (m *meeting) Flow(a, b float64) (q, da, db float64) {
	if !m.joined {
		return m.first.Flow(a, b)
	}
	T := m.meets(a, b)
	q, da, to := m.first.Flow(a, T)
	_, from, db := m.second.Flow(T, b)
	// what a further kelvin at either end does to T, put into the flow
	return q, da * from / (from - to), db * to / (to - from)
}

// meets finds the temperature between a and b at which both stretches carry the same, by Newton's
// method kept between bounds: the flow out of the first falls with it and that into the
// second rises.
func (m *meeting) meets(a, b float64) float64 {
	low, high := math.Min(a, b), math.Max(a, b)
	T := low/2 + high/2
	const most = 100 // the bounds alone come to the last digit in 60
	for range most {
		in, _, in1 := m.first.Flow(a, T)
		out, out1, _ := m.second.Flow(T, b)
		switch {
		case in > out:
			low = T
		case in < out:
			high = T
		default:
			return T
		}
		next := T - (in-out)/(in1-out1)
		if !(next > low && next < high) {
			next = low/2 + high/2
		}
		if next == T || !(low < high) {
			return T
		}
		T = next
	}
	return T
}
