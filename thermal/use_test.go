package thermal

import (
	"fmt"
	"strings"
	"testing"

	"lagbook/network/casefile/casetest"
)

// die is a semiconductor as its maker states it, and what it is mounted with. Invented.
const die casetest.Piece = `[thermal.node.{junction}]
[thermal.node.{case}]
capacitance = "12 J/K"
[thermal.impedance.{array}]
between = ["{junction}", "{case}"]
foster  = [["0.05 K/W", "0.8 ms"], ["0.22 K/W", "11 ms"], ["0.35 K/W", "90 ms"]]
[thermal.resistance.{paste}]
between = ["{case}", "<sink>"]
contact = { coefficient = "9 kW/(m²·K)", area = "6 cm²" }
[thermal.source.{loss}]
into  = "{junction}"
drive = { stairs = [["0 s", "= loss"], ["8 s", "= loss / 3"]], before = "10 W" }
`

// module is twelve of them on three sinks, the dies written once or each by hand.
func module(byHand bool) string {
	var b strings.Builder
	b.WriteString("[given]\nloss = \"60 W\"\n[thermal.node.room]\nheld = \"25 °C\"\n")
	if !byHand {
		b.WriteString(die.Part("die"))
	}
	for i := range 3 {
		fmt.Fprintf(&b, "[thermal.node.sink_%d]\ncapacitance = \"%d J/K\"\n[thermal.resistance.fins_%[1]d]\nbetween = [\"sink_%[1]d\", \"room\"]\nvalue = \"0.12 K/W\"\n", i, 600+100*i)
	}
	for i := range 12 {
		use, sink := fmt.Sprintf("d%d", i), fmt.Sprintf("sink_%d", i%3)
		if byHand {
			b.WriteString(die.ByHand(use, "sink", sink))
		} else {
			b.WriteString(casetest.Use(use, "die", "sink", sink))
		}
	}
	return b.String()
}

// TestLadderUsedTwelveTimes: the answers are those of the same case written by hand, to
// the last bit.
func TestLadderUsedTwelveTimes(t *testing.T) {
	outputs := []string{"d0.junction", "d11.junction", "sink_1", "d7.array.1", "flow of d4.paste", "d4.junction - d4.case"}
	used := read(t, "used.toml", module(false)).Respond(60, outputs...)
	plain := read(t, "plain.toml", module(true)).Respond(60, outputs...)
	for i, name := range outputs {
		for _, at := range []float64{0, 0.001, 0.05, 1, 7.9, 8.1, 20, 60} {
			if got, want := used.At(i, at), plain.At(i, at); got != want {
				t.Errorf("%s at %g s is %v, by hand %v", name, at, got, want)
			}
		}
	}
	if rise := used.At(0, 7.9) - used.At(0, 0); rise < 20 {
		t.Errorf("the junction rises by %g K only: the pulse is not there", rise)
	}
}

// TestFaultInAPartOfADie: what a domain finds wrong stands at the place in the part, once.
func TestFaultInAPartOfADie(t *testing.T) {
	text := strings.Replace(module(false), `coefficient = "9 kW/(m²·K)"`, `coefficient = "9 kW/m²"`, 1)
	said := faults(text)
	if !strings.Contains(said, `resistance "paste" (part "die"): `) || strings.Count(said, "coefficient: ") != 1 {
		t.Error(said)
	}
}
