package network_test

import (
	"errors"
	"strings"
	"testing"

	"lagbook/network"
)

// Joints that nothing ties to the rest, and joints with a stream, are named.
func TestFlowFaults(t *testing.T) {
	b := network.NewBuilder()
	air := b.Node("air", 1)
	b.Hold(air, 2)
	tank := b.Node("tank", 3)
	b.Capacity(tank, 4)
	b.Inertance("good", air, tank, 5)
	x, y := b.Node("x", 6), b.Node("y", 7)
	b.Inertance("adrift", x, y, 8)
	b.Source("q", x, 1, 9)
	z := b.Node("z", 10)
	b.Inertance("line", tank, z, 11)
	b.OneWay("stream", z, tank, 12)
	b.Inertance("loop", tank, tank, 13)
	_, err := b.Build()
	var faults *network.Faults
	if !errors.As(err, &faults) {
		t.Fatalf("error %v", err)
	}
	for _, want := range []string{
		`inertance "loop": begins and ends at node "tank"`,
		`node "z": inertances meet here`,
		`nodes "x" and "y": have no capacity and no path`,
	} {
		if !strings.Contains(err.Error(), want) {
			t.Errorf("no %q in %v", want, err)
		}
	}
	if len(faults.List) != 3 {
		t.Errorf("%d faults: %v", len(faults.List), err)
	}
}

func TestFlowNumbers(t *testing.T) {
	m := newPair(t)
	m.p.L[0], m.p.LR[1], m.p.HasStartFlow[1] = 0, -1, true
	m.p.StartFlow[1] = 1e300
	err := m.net.Check(m.p)
	var bad *network.ParamFault
	if !errors.As(err, &bad) || len(bad.List) != 3 {
		t.Fatalf("error %v", err)
	}
	for k, want := range []string{`inertance "first": inertance is 0`, `inertance "second": resistance is -1`, `inertance "second": start is 1e+300`} {
		if !strings.Contains(bad.List[k].Text, want) {
			t.Errorf("fault %q, want %q", bad.List[k].Text, want)
		}
	}
}

// Behaviour is decided exactly where the numbers decide it.
func TestFlowBehaviour(t *testing.T) {
	want := map[string]string{
		"H01-rlc-under": "underdamped", "H02-rlc-critical": "critically damped", "H04-rlc-undamped": "undamped",
		"H20-ladder-quad": "critically damped", "T42-driven-capacity": "overdamped",
	}
	seen := 0
	each(t, func(t *testing.T, m *model) {
		name, ok := want[m.ID]
		if !ok {
			return
		}
		seen++
		h, err := m.reduce(t).System.Transfer(int(m.input[m.Pairs[0].In][0]), m.out(m.Pairs[0].Out))
		if err != nil {
			t.Fatal(err)
		}
		if h.Behaviour != name {
			t.Errorf("%q, want %q: poles %v", h.Behaviour, name, h.Poles)
		}
	})
	if seen != len(want) {
		t.Errorf("%d of %d networks in testdata", seen, len(want))
	}
}
