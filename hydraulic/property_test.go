package hydraulic

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// A ladder of lines and vessels from a held main: values drawn, the ends of each
// line named in either order. times stretches time: L and C by times, sources and
// the run likewise.
type ladder struct {
	r, l, c []float64
	turned  []bool
}

func drawLadder(t *rapid.T) ladder {
	n := rapid.IntRange(1, 5).Draw(t, "sections")
	var d ladder
	for i := range n {
		d.r = append(d.r, rapid.Float64Range(1, 100).Draw(t, fmt.Sprint("R", i)))
		d.l = append(d.l, rapid.Float64Range(1, 100).Draw(t, fmt.Sprint("L", i)))
		d.c = append(d.c, rapid.Float64Range(1, 100).Draw(t, fmt.Sprint("C", i)))
		d.turned = append(d.turned, rapid.Bool().Draw(t, fmt.Sprint("turned", i)))
	}
	return d
}

// text writes the case: R in MPa·s/m³, L in MPa·s²/m³, C in 1e-9 m³/Pa.
func (d ladder) text(times float64, turn bool) string {
	var b strings.Builder
	fmt.Fprintf(&b, "[hydraulic.node.n0]\nheld = { step = { from = \"1 bar\", to = \"2 bar\", at = \"%.17g s\" } }\n", times)
	for i := range d.r {
		ends := []string{fmt.Sprintf("n%d", i), fmt.Sprintf("n%d", i+1)}
		if turn && d.turned[i] {
			ends[0], ends[1] = ends[1], ends[0]
		}
		fmt.Fprintf(&b, "[hydraulic.node.%s]\ncompliance = \"%.17ge-9 m³/Pa\"\n", fmt.Sprintf("n%d", i+1), d.c[i]*times)
		fmt.Fprintf(&b, "[hydraulic.line.b%d]\nbetween = [\"%s\", \"%s\"]\nresistance = \"%.17g MPa·s/m³\"\ninertance = \"%.17g MPa·s²/m³\"\n", i, ends[0], ends[1], d.r[i], d.l[i]*times)
	}
	return b.String()
}

// Which end of a line is named first changes the sign of its flow and nothing
// else; stretching time stretches the answers; a passive network dies away.
func TestLadders(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		d := drawLadder(rt)
		last := fmt.Sprintf("n%d", len(d.r))
		straight, turned := read(t, "case.toml", d.text(1, false)), read(t, "case.toml", d.text(1, true))
		slow := read(t, "case.toml", d.text(8, false))
		a, b := straight.Respond(20, last, "flow of b0"), turned.Respond(20, last, "flow of b0")
		c := slow.Respond(160, last, "flow of b0")
		sign := 1.0
		if d.turned[0] {
			sign = -1
		}
		for _, at := range []float64{0, 1.5, 3, 7, 20} {
			if p, q := a.At(0, at), b.At(0, at); math.Abs(p-q) > 1e-9*2e5 {
				rt.Fatalf("pressure at %v s: %v, turned %v", at, p, q)
			}
			if p, q := a.At(1, at), sign*b.At(1, at); math.Abs(p-q) > 1e-9 {
				rt.Fatalf("flow at %v s: %v, turned %v", at, p, q)
			}
			if p, q := a.At(0, at), c.At(0, 8*at); math.Abs(p-q) > 1e-8*2e5 {
				rt.Fatalf("pressure at %v s: %v, in stretched time %v", at, p, q)
			}
		}
		for _, p := range straight.Reduce().System.Poles() {
			if real(p.P) > p.Radius {
				rt.Fatalf("a passive network grows: pole %v", p.P)
			}
		}
	})
}
