package casefile

import "lagbook/network"

// startsOfItsOwn reports nodes that state a start where the case starts in its
// periodic state.
func (r *reader) startsOfItsOwn(p *network.Params) bool {
	found := false
	for id, has := range p.HasStart {
		if !has {
			continue
		}
		found = true
		ref := r.c.net.Node(network.NodeID(id)).Ref
		d := r.c.Diagnose(ref, "start-twice", `it states a start, and [run] start = "cycle" says that the case starts in its periodic state`, "leave one of the two out")
		if e := r.c.refs[ref].e; e != nil {
			if x := e.find("start"); x != nil {
				d = r.c.src.place(d, x.n.span)
			}
		}
		r.report(d)
	}
	return found
}
