package casefile_test

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"lagbook/network/casefile"
)

// TestUsesKeepToBounds: parts that would fill the memory are refused before they do.
func TestUsesKeepToBounds(t *testing.T) {
	var doubling, many, wide, deep strings.Builder
	for i := range 40 {
		fmt.Fprintf(&doubling, "[part.p%d.use.a]\npart = \"p%d\"\n[part.p%[1]d.use.b]\npart = \"p%d\"\n", i, i+1, i+1)
	}
	doubling.WriteString("[part.p40.thermal.node.n]\nheld = \"1 K\"\n[use.u]\npart = \"p0\"\n")
	many.WriteString("[part.p.thermal.node]\n")
	for i := range 3000 {
		fmt.Fprintf(&many, "n%d = {}\n", i)
	}
	for i := range 3000 {
		fmt.Fprintf(&many, "[use.u%d]\npart = \"p\"\n", i)
	}
	fmt.Fprintf(&wide, "[part.p.thermal.source.s]\ninto = \"n\"\ndrive = { points = [%s] }\n", times(20000, `["%d s", "1 W"],`))
	for i := range 3000 {
		fmt.Fprintf(&wide, "[use.u%d]\npart = \"p\"\njoin = { n = \"n\" }\n", i)
	}
	deep.WriteString("[part.p.use.x]\npart = \"p\"\n")
	for i := range 9000 {
		fmt.Fprintf(&deep, "[use.u%d]\npart = \"p\"\n", i)
	}
	joined := "[part.p.thermal.stream.s]\npath = [" + times(2500, `"n%d",`) + "]\n[use.u]\npart = \"p\"\njoin = {" + strings.TrimSuffix(times(2500, `m%d = "x",`), ",") + "}\n"
	for name, text := range map[string]string{
		"parts that double": doubling.String(), "many in many": many.String(), "many values in many": wide.String(),
		"a part in itself, often": deep.String(), "ports and joins that do not meet": joined,
		"uses of nothing":         "[use]\n" + times(15000, "u%d = { part = \"p\" }\n"),
		"uses misspelt":           "[part.pat.thermal.node.n]\nheld = \"1 K\"\n[use]\n" + times(6000, "u%d = { part = \"pta\", join = { a = \"b\" } }\n"),
		"ports without joins":     "[part.pat.thermal.source.s]\ninto = \"n\"\ndrive = \"1 W\"\n[use]\n" + times(5000, "u%d = { part = \"pat\" }\n"),
		"joins of nothing":        "[part.pat.thermal.source.s]\ninto = \"n\"\ndrive = \"1 W\"\n[use]\n" + times(5000, "u%d = { part = \"pat\", join = { n = \"x\" } }\n"),
		"joins of what is none":   "[part.pat.thermal.source.s]\ninto = \"n\"\ndrives = \"1 W\"\n[use]\n" + times(5000, "u%d = { part = \"pat\", join = { m = \"x\" } }\n"),
		"given values in a chain": "[part.pat.thermal.node.n]\nheld = \"= a0\"\n[part.pat.given]\n" + times(9000, "a%d = \"= b\"\n") + "[use.u]\npart = \"pat\"\n",
	} {
		t.Run(name, func(t *testing.T) {
			start := time.Now()
			c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
			if c != nil || casefile.Listing(diags) == "" {
				t.Error("nothing is said")
			}
			if took := time.Since(start); took > 20*time.Second {
				t.Errorf("it takes %v", took)
			}
			if name == "many in many" && !strings.Contains(casefile.Listing(diags), "uses make more than the 20000 parts they may") {
				t.Error(casefile.Listing(diags))
			}
		})
	}
}

// times repeats a text with its number in it n times.
func times(n int, format string) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, format, i)
	}
	return b.String()
}
