package casefile_test

import (
	"fmt"
	"strings"
	"testing"

	"lagbook/network/casefile"
)

// rowOfNodes is a case of n nodes, each joined to the one before it and heated.
func rowOfNodes(n int) []byte {
	var b strings.Builder
	b.WriteString("title = \"A row of nodes\"\n[given]\nroom = \"25 °C\"\n[run]\nstart = \"steady\"\nto = \"10 h\"\n[thermal.node.room]\nheld = \"= room\"\n")
	before := "room"
	for i := range n {
		fmt.Fprintf(&b, "\n[thermal.node.n%d]\ncapacitance = \"%d J/K\"\n", i, 100+i)
		fmt.Fprintf(&b, "[thermal.resistance.r%d]\nbetween = [\"n%d\", %q]\nvalue   = \"%.4f K/W\"\n", i, i, before, 0.1+float64(i)/100)
		fmt.Fprintf(&b, "[thermal.source.s%d]\ninto  = \"n%d\"\ndrive = \"%d W\"\n", i, i, i+1)
		before = fmt.Sprintf("n%d", i)
	}
	b.WriteString("\n[[table]]\nshow = [\"n0\"]\nevery = \"1 h\"\n")
	return []byte(b.String())
}

func BenchmarkRead(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		text := rowOfNodes(n)
		b.Run(fmt.Sprintf("nodes=%d", n), func(b *testing.B) {
			b.SetBytes(int64(len(text)))
			b.ReportAllocs()
			for b.Loop() {
				if c, diags := casefile.Read("case.toml", text, nil, testVocabulary()...); c == nil {
					b.Fatal(casefile.Listing(diags))
				}
			}
		})
	}
}

func BenchmarkEval(b *testing.B) {
	c, _ := casefile.Read("case.toml", rowOfNodes(200), nil, testVocabulary()...)
	given := c.GivenValues()
	b.ReportAllocs()
	for b.Loop() {
		if _, diags := c.Eval(given); diags != nil {
			b.Fatal(diags)
		}
	}
}
