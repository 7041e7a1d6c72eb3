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

// BenchmarkUnder computes a case under a scenario: the cost of its numbers and waveforms.
func BenchmarkUnder(b *testing.B) {
	text := "[given]\nload = \"7 W\"\n" + good + "[thermal.source.lamp]\ninto = \"case\"\ndrive = \"= load\"\n[scenario.s]\nset = { load = \"9 W\" }\n"
	c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if diags != nil {
		b.Fatal(casefile.Listing(diags))
	}
	for b.Loop() {
		if _, diags := c.Under(&c.Questions.Scenarios[0], nil); diags != nil {
			b.Fatal(diags)
		}
	}
}

// BenchmarkResultExpr computes the expression of a result once, as a march does at every
// instant it looks at.
func BenchmarkResultExpr(b *testing.B) {
	c, diags := casefile.Read("case.toml", []byte(good+"[result.r]\nexpression = \"= (case - room) / 2 + 1 K\"\n"), nil, testVocabulary()...)
	if diags != nil {
		b.Fatal(casefile.Listing(diags))
	}
	v, _ := c.Eval(nil)
	r, _ := c.ResultNamed("r")
	x := []float64{300, 290}
	for b.Loop() {
		if r.Expr.Eval(x, v) != 6 {
			b.Fatal("it comes to something else")
		}
	}
}
