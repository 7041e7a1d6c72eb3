package casefile_test

import (
	"fmt"
	"strconv"
	"strings"
	"testing"
	"time"

	"lagbook/network/casefile"
)

// numbered repeats a text with its number in it n times.
func numbered(n int, format string) string {
	var b strings.Builder
	for i := range n {
		fmt.Fprintf(&b, format, i)
	}
	return b.String()
}

// Questions meant to cost time or memory are refused, or read, soon.
func TestHostileQuestions(t *testing.T) {
	const room = 1<<20 - 4000
	x := strings.Repeat
	for name, text := range map[string]string{
		"ten thousand scenarios":          "[scenario]\n" + numbered(10_000, "s%d = { title = \"x\" }\n"),
		"a megabyte of sets":              "[given]\n" + numbered(9000, "a%d = 1\n") + "[scenario.s]\nset = {" + numbered(9000, "b%d = 2,") + "}\n",
		"a megabyte of tables":            "[scenario.s]\ntables = [" + numbered(40_000, "\"t%d\",") + "]\n",
		"a mean of ten thousand terms":    "[result.r]\nmean = {" + numbered(10_000, "n%d = 0.0001,") + "}\n",
		"a mean of many fractions":        "[result.r]\nmean = {" + numbered(1000, "case%d = \"= 1/7%[1]d\",") + "}\n",
		"ten thousand results":            "[result]\n" + numbered(10_000, "r%d = { expression = \"= case\" }\n"),
		"results in a ring of a thousand": "[result]\n" + numbered(999, "r%d = { expression = \"= r%[1]d + 1 K\" }\n"),
		"an expression of backquotes":     "[result.r]\nexpression = \"= " + x("`a`+", room/4) + "1\"\n",
		"an expression of many names":     "[result.r]\nexpression = \"= " + numbered(330, "`%d`+") + "1\"\n",
		"an expression of open quotes":    "[result.r]\nexpression = \"= " + x("`", room) + "\"\n",
		"an expression of parentheses":    "[result.r]\nexpression = \"= " + x("(", room) + "\"\n",
		"ten thousand finds":              "[find]\n" + numbered(10_000, "f%d = { when = \"case\", crosses = \"30 °C\" }\n"),
		"many limits of nothing":          "[limit]\n" + numbered(9999, "l%d = { of = \"cse\", swing_below = \"3 K\" }\n"),
		"a limit of many":                 "[limit.l]\nof = [" + numbered(40_000, "\"case%d\",") + "]\nstay_below = \"3 °C\"\n",
		"ten thousand logs":               "[measured]\n" + numbered(9999, "m%d = { of = \"case\", file = \"x.csv\" }\n"),
	} {
		t.Run(name, func(t *testing.T) {
			start := time.Now()
			c, diags := casefile.Read("case.toml", []byte(text+good), nil, testVocabulary()...)
			if c != nil || casefile.Listing(diags) == "" {
				t.Error("nothing is said")
			}
			if took := time.Since(start); took > 5*time.Second {
				t.Errorf("it takes %v", took)
			}
		})
	}
}

// A chain of results is read however it stands in the file.
func TestResultsInAChain(t *testing.T) {
	text := good + "[result.r999]\nexpression = \"= case - room\"\n"
	for i := 998; i >= 0; i-- {
		text = "[result.r" + strconv.Itoa(i) + "]\nexpression = \"= r" + strconv.Itoa(i+1) + " + 1 K\"\n" + text
	}
	c, diags := casefile.Read("case.toml", []byte(text), nil, testVocabulary()...)
	if diags != nil {
		t.Fatal(casefile.Listing(diags))
	}
	if r := c.Questions.Results; len(r) != 1000 || r[0].Name != "r999" || r[999].Name != "r0" {
		t.Error("the results stand in another order")
	}
}
