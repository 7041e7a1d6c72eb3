package thermal

import (
	"fmt"

	"lagbook/network"
	"lagbook/network/casefile"
)

// innerNodes makes n nodes inside a part, NAME.1 to NAME.n. Like any node they
// can be shown and limited.
func innerNodes(e *casefile.Element, c *casefile.Case, b *network.Builder, n int) ([]network.NodeID, []casefile.Diagnostic) {
	nodes := make([]network.NodeID, n)
	for i := range nodes {
		name := fmt.Sprintf("%s.%d", e.FullName(), i+1)
		if _, taken := c.Node(name); taken {
			d := e.Fault("", fmt.Sprintf("its inner node %q bears the name of another node", name), "", "")
			d.Hint = "rename one of the two"
			return nil, []casefile.Diagnostic{d}
		}
		nodes[i] = b.Node(name, e.Ref)
		c.BindNode(name, nodes[i])
	}
	return nodes, nil
}

// chain joins nodes one after another. The first resistance bears the part's
// name, so that the part's flow is read at its first end; the others bear names
// that no part of a case can have.
func chain(e *casefile.Element, b *network.Builder, nodes []network.NodeID) []network.ResistanceID {
	list := make([]network.ResistanceID, len(nodes)-1)
	for i := range list {
		name := e.FullName()
		if i > 0 {
			name = fmt.Sprintf("%s/%d", e.FullName(), i+1)
		}
		list[i] = b.Resistance(name, nodes[i], nodes[i+1], e.Ref)
	}
	return list
}
