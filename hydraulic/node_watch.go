package hydraulic

import (
	"lagbook/network"
	"lagbook/network/casefile"
)

// watch adds what reads the level of a node and looks out for vapour there. Where the
// case says nothing of its liquid there is neither.
func (n *place) watch() {
	weighed, vapour := n.liquid.states(ofDensity), n.liquid.states(ofVapour)
	plain := n.tank != nil && n.tank.plain
	if !weighed && !vapour {
		return
	}
	s := network.Shape{Name: "watch of " + n.e.FullName(), Ports: []network.NodeID{n.id}, Passive: true}
	if weighed {
		s.Readings = []string{watchLevel: "level"}
	}
	if plain {
		s.Readings = append(s.Readings, "stored")
	}
	free := !n.e.Has("held") && n.tank == nil
	if len(s.Readings) == 0 && !free {
		return
	}
	id := n.b.Element(s, n.e.Ref)
	if weighed {
		n.shows("level", id, watchLevel)
	}
	if plain {
		n.shows("stored", id, watchStored)
	}
	n.with(func(v casefile.Values, l *liquid, p *network.Params) error {
		law, ok := p.Law[id].(*nodeWatch)
		if !ok {
			law = &nodeWatch{vacuum: !vapour}
			law.has.vapour, law.has.tank = free, plain
			law.floor = n.tank != nil && !plain
			p.Law[id] = law
		}
		rise := n.rise(v, l)
		law.zero, law.weight = rise+air(l), l.weight()
		law.vapour = l.vapour - l.offset + rise
		if plain {
			law.area = n.tank.area(v)
		}
		return nil
	})
}
