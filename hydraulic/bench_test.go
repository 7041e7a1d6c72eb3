package hydraulic

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// grid is an invented water main of side × side junctions: fed at one corner, drawn from
// everywhere, with some 2·side² rough pipes in loops.
func grid(side int) string {
	var b strings.Builder
	b.WriteString("[hydraulic]\nfluid = \"water\"\nat = \"15 °C\"\n[hydraulic.node.n0_0]\nheld = \"6 bar\"\n")
	for i := range side {
		for k := range side {
			if i+k > 0 {
				fmt.Fprintf(&b, "[hydraulic.node.n%d_%d]\nelevation = \"%d m\"\n", i, k, (3*i+5*k)%7)
				fmt.Fprintf(&b, "[hydraulic.source.d%d_%d]\nout_of = \"n%d_%d\"\ndrive = \"%g L/s\"\n", i, k, i, k, 40/float64(side*side))
			}
			pipe := func(to string, n int) {
				fmt.Fprintf(&b, "[hydraulic.line.p%d_%d_%d]\nbetween = [\"n%d_%d\", %q]\npipe = { length = \"%d m\", size = \"DN %d\", roughness = \"0.1 mm\", rigid = true }\n",
					i, k, n, i, k, to, 60+(7*i+11*k)%90, []int{150, 200, 250}[(i+2*k+n)%3])
			}
			if i+1 < side {
				pipe(fmt.Sprintf("n%d_%d", i+1, k), 0)
			}
			if k+1 < side {
				pipe(fmt.Sprintf("n%d_%d", i, k+1), 1)
			}
		}
	}
	return b.String()
}

// In a looped network what flows in at the corner is what is drawn, and around each loop
// the drops of Darcy's law add up to nothing.
func TestLoopsBalance(t *testing.T) {
	m := casetest.Read(t, "grid.toml", grid(6), Vocabulary()...)
	s := m.Operate(0)
	if in := m.At(s, "flow of p0_0_0")[0] + m.At(s, "flow of p0_0_1")[0]; math.Abs(in-0.04*35/36) > 1e-9 {
		t.Errorf("%g m³/s into the network", in)
	}
	around := 0.0
	for _, b := range m.Net.Branches() {
		h, _ := m.Params.Drop[b.Index].Drop(s.Flows[b.Index])
		switch b.Name {
		case "p0_0_0", "p1_0_1":
			around += h
		case "p0_0_1", "p0_1_0":
			around -= h
		}
	}
	if math.Abs(around) > 1e-2 { // of 6 bar
		t.Errorf("%g Pa around a loop", around)
	}
}

func BenchmarkOperate(b *testing.B) {
	for _, side := range []int{3, 8, 23} {
		m := casetest.Read(b, "grid.toml", grid(side), Vocabulary()...)
		b.Run(fmt.Sprintf("pipes=%d", 2*side*(side-1)), func(b *testing.B) {
			for b.Loop() {
				if _, err := m.Net.Operate(m.Params, 0, nil); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// Setters write numbers and take no memory once their laws are there.
func TestSettersTakeNoMemory(t *testing.T) {
	m := casetest.Read(t, "pump.toml", shutLine(5, "")+`
[hydraulic.node.high]
held = "3 bar"
[hydraulic.pump.p]
from = "end"
to = "high"
rated_speed = "1450 rpm"
head = { flow = ["0 L/s", "5 L/s", "10 L/s"], head = ["30 m", "25 m", "10 m"] }
[hydraulic.pump.gear]
from = "end"
to = "high"
rated_speed = "1450 rpm"
displacement = "1 cm³"
`, Vocabulary()...)
	if n := testing.AllocsPerRun(20, m.Apply); n > 0 {
		t.Errorf("%g allocations", n)
	}
}

func BenchmarkDrop(b *testing.B) {
	s := pipeState{liquid: liquid{density: 1000, viscosity: 1e-3}, length: 10, bore: 0.1, area: math.Pi / 400, rough: 1e-3}
	d := s.drop(1)
	for _, re := range []float64{100, 3000, 3e5} {
		b.Run(fmt.Sprintf("Re=%g", re), func(b *testing.B) {
			for b.Loop() {
				d.Drop(re / d.reynolds)
			}
		})
	}
}
