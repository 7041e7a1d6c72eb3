package hydraulic

import (
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// branch is a run of pipe to a valve and a tap, with a check valve before it. Invented.
const branch casetest.Piece = `[hydraulic.node.{bend}]
elevation = "3 m"
compliance = "2 mL/bar"
[hydraulic.node.{tap}]
elevation = "5 m"
[hydraulic.check.{stop}]
from = "<main>"
to   = "{bend}"
kv   = 6
[hydraulic.line.{run}]
between = ["{bend}", "{tap}"]
pipe    = { length = "20 m", bore = "25 mm", roughness = "0.1 mm", rigid = true }
[hydraulic.restriction.{valve}]
between = ["{tap}", "<drain>"]
valve   = { kv = "= kv", opening = { points = [["0 s", 0.2], ["1 s", 0.2], ["2 s", 1]] } }
`

// house is two branches on one main, written once or each by hand.
func house(byHand bool) string {
	var b strings.Builder
	b.WriteString(`[given]
kv = 4
[run]
start = "steady"
to = "5 s"
[hydraulic]
fluid = "water"
at = "15 °C"
pressures = "gauge"
[hydraulic.node.street]
held = "4 bar"
[hydraulic.node.riser]
compliance = "1 mL/bar"
[hydraulic.node.sewer]
held = "0 bar"
[hydraulic.line.service]
between = ["street", "riser"]
pipe    = { length = "12 m", bore = "32 mm", roughness = "0.1 mm", rigid = true }
`)
	if byHand {
		return b.String() + branch.ByHand("north", "main", "riser", "drain", "sewer") + branch.ByHand("south", "main", "riser", "drain", "sewer")
	}
	return b.String() + branch.Part("branch") + casetest.Use("north", "branch", "main", "riser", "drain", "sewer") +
		casetest.Use("south", "branch", "main", "riser", "drain", "sewer")
}

// TestPipeRunUsedTwice: what is marched is what the same case gives by hand, to the last
// bit, with the flows at the ends that are asked for by the names of the case.
func TestPipeRunUsedTwice(t *testing.T) {
	outputs := []string{"north.bend", "south.tap", "riser", "flow of north.run", "flow of south.valve", "flow of north.stop"}
	used := read(t, "used.toml", house(false)).March(5, outputs...)
	plain := read(t, "plain.toml", house(true)).March(5, outputs...)
	for i, name := range outputs {
		for _, at := range []float64{0, 0.5, 1.2, 2, 3, 5} {
			if got, want := used.At(i, at), plain.At(i, at); got != want {
				t.Errorf("%s at %g s is %v, by hand %v", name, at, got, want)
			}
		}
	}
	if before, after := used.At(3, 0), used.At(3, 5); after < 1.5*before || before <= 0 {
		t.Errorf("the flow goes from %g to %g m³/s: the valve does not open", before, after)
	}
}

// TestFaultInAPipeRun: what is wrong in the part is said of the part.
func TestFaultInAPipeRun(t *testing.T) {
	said := faults(strings.Replace(house(false), `bore = "25 mm"`, `bore = "0 mm"`, 1))
	if !strings.Contains(said, `line "run" (part "branch"): bore is 0 mm`) {
		t.Error(said)
	}
}
