package study_test

import (
	"fmt"
	"strings"
	"testing"

	"lagbook/network/casefile"
	"lagbook/network/quantity"
	"lagbook/network/study"
	"lagbook/thermal"
)

// rowOfBodies is a case of n bodies, each joined to the one before it, the first to
// the room, and every twentieth heated; what is asked for is one transfer function from end to end.
func rowOfBodies(n int) []byte {
	var b strings.Builder
	b.WriteString("title = \"A row of bodies\"\n[given]\nroom = \"25 °C\"\nhold = \"1 K/W\"\n[run]\nto = \"10 h\"\n[thermal.node.room]\nheld = \"= room\"\n")
	before := "room"
	for i := range n {
		value := fmt.Sprintf("%.4f K/W", 0.1+float64(i)/100)
		if i == 0 {
			value = "= hold"
		}
		fmt.Fprintf(&b, "\n[thermal.node.n%d]\ncapacitance = \"%d J/K\"\n", i, 100+i)
		fmt.Fprintf(&b, "[thermal.resistance.r%d]\nbetween = [\"n%d\", %q]\nvalue   = %q\n", i, i, before, value)
		if i%20 == 0 {
			fmt.Fprintf(&b, "[thermal.source.s%d]\ninto  = \"n%d\"\ndrive = \"%d W\"\n", i, i, i+1)
		}
		before = fmt.Sprintf("n%d", i)
	}
	fmt.Fprintf(&b, "\n[[transfer]]\nfrom = \"s0\"\nto   = %q\n[[table]]\nshow = [\"n0\"]\nevery = \"1 h\"\n", before)
	return []byte(b.String())
}

func readRow(b *testing.B, text []byte) *study.Model {
	c, diags := casefile.Read("row.toml", text, nil, thermal.Vocabulary()...)
	if casefile.Failed(diags) {
		b.Fatal(casefile.Listing(diags))
	}
	m, diags := study.New(c)
	if m == nil {
		b.Fatal(casefile.Listing(diags))
	}
	return m
}

// From the text of a case of 200 nodes to its poles: reading and checking, and all
// else (reduction, poles, one transfer function with its zeros and step measures).
func BenchmarkPoles200(b *testing.B) {
	text := rowOfBodies(200)
	b.Run("read", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			readRow(b, text)
		}
	})
	b.Run("rest", func(b *testing.B) {
		m := readRow(b, text)
		b.ReportAllocs()
		for b.Loop() {
			if ds := m.At(nil); casefile.Failed(ds) {
				b.Fatal(casefile.Listing(ds))
			}
			if _, err := m.Poles(); err != nil {
				b.Fatal(err)
			}
		}
	})
}

// Other given values in a case that is read: what sizing and sweeps repeat.
func BenchmarkAt(b *testing.B) {
	for _, n := range []int{10, 50, 200} {
		b.Run(fmt.Sprintf("nodes=%d", n), func(b *testing.B) {
			m := readRow(b, rowOfBodies(n))
			given := m.Case.GivenValues()
			b.ReportAllocs()
			for b.Loop() {
				vary(given)
				if ds := m.At(given); casefile.Failed(ds) {
					b.Fatal(casefile.Listing(ds))
				}
			}
		})
	}
}

// vary changes the second of the given, the first resistance.
func vary(given []quantity.Value) {
	given[1].SI *= 1 + 1e-9
	given[1].Exact = nil
}

// A scenario of other loads costs its response: beside it a scenario that changes the
// network, and so the analysis of it.
func BenchmarkScenario(b *testing.B) {
	const more = "\n[scenario.loads]\nset = { room = \"30 °C\" }\n[scenario.network]\nset = { hold = \"2 K/W\" }\n"
	for _, n := range []int{10, 50, 200} {
		m := readRow(b, append(rowOfBodies(n), more...))
		all, err := m.Scenarios(nil)
		if err != nil {
			b.Fatal(err)
		}
		for _, s := range all {
			b.Run(fmt.Sprintf("nodes=%d/%s", n, s.Name), func(b *testing.B) {
				b.ReportAllocs()
				use := []*casefile.Scenario{nil, s} // from the case as written and back
				for k := 0; b.Loop(); k++ {
					if ds := m.Use(use[k%2]); casefile.Failed(ds) {
						b.Fatal(casefile.Listing(ds))
					}
					if _, err := m.Tables(); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
