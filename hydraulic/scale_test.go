package hydraulic

import (
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// What a scale makes of a line: a share of its conductance, a resistance divided by it
// beside an inertance, and at 0 shut.
func TestScale(t *testing.T) {
	m := read(t, "scaled", good+"scale = { stairs = [[\"0 s\", 1], [\"1 s\", 0.25], [\"2 s\", 0]] }\n")
	column := read(t, "column", strings.Replace(good, "between    =", "inertance = \"3 Pa·s²/m³\"\nscale = { stairs = [[\"0 s\", 1], [\"1 s\", 0.25], [\"2 s\", 0]] }\nbetween =", 1))
	for _, c := range []struct {
		now, g, r float64
		shut      bool
	}{{1, 1e-6, 1e6, false}, {0.25, 0.25e-6, 4e6, false}, {0, 0, 1e6, true}} {
		m.Params.Now[0], column.Params.Now[0] = c.now, c.now
		for _, x := range []*casetest.Model{m, column} {
			for _, set := range x.Set {
				if err := set(x.Values, x.Params); err != nil {
					t.Fatal(err)
				}
			}
		}
		if g := m.Params.G[0]; g != c.g {
			t.Errorf("scale %v: conductance %v", c.now, g)
		}
		if r, shut := column.Params.LR[0], column.Params.Shut[0]; r != c.r || shut != c.shut || column.Params.L[0] != 3 {
			t.Errorf("scale %v: resistance %v, shut %v", c.now, r, shut)
		}
	}
	if v := m.Params.Switch[0].At(1.5); v != 0.25 {
		t.Errorf("the wave handed over is %v at 1.5 s", v)
	}
}
