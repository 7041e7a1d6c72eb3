package network_test

import (
	"math"
	"testing"

	"lagbook/network"
)

// bench builds two stores, two massless nodes and a held node of which tests join
// what they need.
type bench struct {
	*network.Builder
	a, b, m, n, air network.NodeID
	G               []float64
}

func newBench() *bench {
	k := &bench{Builder: network.NewBuilder()}
	k.a, k.b = k.Node("a", 1), k.Node("b", 2)
	k.m, k.n = k.Node("m", 3), k.Node("n", 4)
	k.air = k.Node("air", 5)
	k.Capacity(k.a, network.NoRef)
	k.Capacity(k.b, network.NoRef)
	k.Hold(k.air, network.NoRef)
	return k
}

func (k *bench) join(from, to network.NodeID, G float64) network.ResistanceID {
	k.G = append(k.G, G)
	return k.Resistance("", from, to, network.NoRef)
}

// weights returns what a, b and air weigh in the flow of a resistance.
func (k *bench) weights(t *testing.T, id network.ResistanceID) (a, b, air float64) {
	t.Helper()
	net, err := k.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	p.C[0], p.C[1] = 1, 1
	copy(p.G, k.G)
	r, err := net.Reduce(p, []network.Output{net.FlowOf(id)})
	if err != nil {
		t.Fatal(err)
	}
	row := r.Realisation.Output[0]
	for i, n := range r.States {
		if n == k.a {
			a = row[i]
		} else {
			b = row[i]
		}
	}
	if r.Realisation.D != nil {
		air = r.Realisation.D[0][0]
	}
	return a, b, air
}

// The flow through a resistance of 1e-12 between a store and a massless node is
// that of the resistance of 1 behind it, to the last digits; G times a difference
// of levels would leave 4.
func TestFlowThroughStrongTie(t *testing.T) {
	k := newBench()
	strong := k.join(k.a, k.m, 1e12)
	k.join(k.m, k.b, 1)
	k.join(k.b, k.n, 1)
	k.join(k.n, k.air, 1)
	a, b, air := k.weights(t, strong)
	want := 1e12 / (1e12 + 1)
	near(t, "a", a, want, 1e-15, 1)
	near(t, "b", b, -want, 1e-15, 1)
	near(t, "air", air, 0, 0, 0)
}

// The same between two massless nodes, in either direction of elimination.
func TestFlowBetweenMasslessNodes(t *testing.T) {
	for _, strong := range []float64{1e-12, 1, 1e12} {
		for _, reversed := range []bool{false, true} {
			k := newBench()
			from, to := k.m, k.n
			if reversed {
				from, to = to, from
			}
			k.join(k.a, from, 2)
			id := k.join(from, to, strong)
			k.join(to, k.b, 3)
			k.join(k.b, k.air, 1)
			a, b, air := k.weights(t, id)
			want := 1 / (1/2.0 + 1/strong + 1/3.0)
			near(t, "a", a, want, 1e-15, want)
			near(t, "b", b, -want, 1e-15, want)
			near(t, "air", air, 0, 0, 0)
		}
	}
}

// The flow through the middle of a bridge has either sign, and in a balanced
// bridge it is exactly zero, whatever the levels.
func TestBridge(t *testing.T) {
	for _, c := range []struct{ am, an, mb, nb float64 }{{1, 2, 3, 6}, {1, 2, 3, 5}, {1, 2, 3, 7}, {7, 0.3, 0.2, 5}} {
		k := newBench()
		k.join(k.a, k.m, c.am)
		k.join(k.a, k.n, c.an)
		k.join(k.m, k.b, c.mb)
		k.join(k.n, k.b, c.nb)
		k.join(k.a, k.air, 1)
		middle := k.join(k.m, k.n, 11)
		a, b, air := k.weights(t, middle)
		// m: am(a−m) + mb(b−m) = 11(m−n), n: an(a−n) + nb(b−n) = −11(m−n).
		P, Q := c.am+c.mb, c.an+c.nb
		want := 11 * (c.am*c.nb - c.an*c.mb) / (P*Q + 11*(P+Q))
		near(t, "a", a, want, 1e-15, math.Abs(want))
		near(t, "b", b, -want, 1e-15, math.Abs(want))
		near(t, "air", air, 0, 0, 0)
	}
}

// A massless node is a mean of what surrounds it: the weights are positive and sum
// to one, those of a source into it are the resistance it sees.
func TestMasslessLevelIsMean(t *testing.T) {
	k := newBench()
	k.join(k.a, k.m, 1)
	k.join(k.m, k.n, 2)
	k.join(k.n, k.b, 4)
	k.join(k.n, k.air, 8)
	heater := k.Source("", k.n, 1, network.NoRef)
	net, err := k.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	copy(p.C, []float64{1, 1})
	copy(p.G, k.G)
	r, err := net.Reduce(p, []network.Output{net.Level(k.m), net.Level(k.n)})
	if err != nil {
		t.Fatal(err)
	}
	for o := range 2 {
		sum := r.Realisation.D[o][0]
		for _, w := range r.Realisation.Output[o] {
			if w <= 0 {
				t.Errorf("weight %v of output %d", w, o)
			}
			sum += w
		}
		near(t, "sum", sum, 1, 1e-15, 1)
	}
	// From n: 8 to air, 4 to b, and 1 in series with 2 to a.
	seen := 1 / (8 + 4 + 2.0/3)
	near(t, "n", r.Realisation.D[1][heater], seen, 1e-15, seen)
	near(t, "m", r.Realisation.D[0][heater], seen*2/3, 1e-15, seen)
}

// Exchange between stores across massless nodes is symmetric bit for bit.
func TestReducedExchangeIsSymmetric(t *testing.T) {
	b := network.NewBuilder()
	const n = 12
	var ids []network.NodeID
	for i := range n {
		ids = append(ids, b.Node("", network.NoRef))
		if i%3 == 0 {
			b.Capacity(ids[i], network.NoRef)
		}
	}
	var G []float64
	for i := range n {
		for j := range i {
			if (i*7+j*3)%4 != 0 {
				b.Resistance("", ids[i], ids[j], network.NoRef)
				G = append(G, math.Exp(float64((i*31+j*17)%23)-11)/3)
			}
		}
	}
	net, err := b.Build()
	if err != nil {
		t.Fatal(err)
	}
	p := net.NewParams()
	for i := range p.C {
		p.C[i] = 1
	}
	copy(p.G, G)
	r, err := net.Reduce(p, nil)
	if err != nil {
		t.Fatal(err)
	}
	if bal := r.Realisation.Balance; !bal.IsRC() {
		t.Errorf("F is not symmetric: %v", bal.F)
	}
}
