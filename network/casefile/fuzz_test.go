package casefile_test

import (
	"strings"
	"testing"

	"lagbook/network"
	"lagbook/network/casefile"
)

// FuzzRead reads anything: no panic, a case exactly where there is no error,
// places inside the text, the same answer twice, and a case that evaluates and
// builds.
func FuzzRead(f *testing.F) {
	fuzzRead(f, archives[0], whole)
}

// FuzzReadPlant does so with the words of parts that have laws of their own.
func FuzzReadPlant(f *testing.F) { fuzzRead(f, archives[1], wholePlant) }

func fuzzRead(f *testing.F, a archive, good string) {
	_, names, texts, _ := a.mistakes(&testing.T{})
	for _, name := range names {
		f.Add(texts[name] + texts["base"])
	}
	f.Add(good)
	f.Fuzz(func(t *testing.T, text string) {
		c, diags := casefile.Read("case.toml", []byte(text), nil, a.words()...)
		if (c == nil) != casefile.Failed(diags) {
			t.Fatalf("a case and errors, or neither: %v", diags)
		}
		lines := strings.Split(strings.TrimPrefix(text, "\ufeff"), "\n")
		for _, d := range diags {
			if d.Line > len(lines) || d.Line > 0 && d.Col > len([]rune(lines[d.Line-1]))+1 {
				t.Fatalf("%v lies outside the text", d)
			}
			if d.Code == "" || d.Text == "" || d.Line > 0 && (d.Col < 1 || d.Len < 1) {
				t.Fatalf("%#v says too little", d)
			}
		}
		again, second := casefile.Read("case.toml", []byte(text), nil, a.words()...)
		if casefile.Listing(diags) != casefile.Listing(second) || (again == nil) != (c == nil) {
			t.Fatalf("read twice, two answers:\n%s\n%s", casefile.Listing(diags), casefile.Listing(second))
		}
		if c == nil {
			return
		}
		use(t, c)
	})
}

// use evaluates a case and sets its network.
func use(t *testing.T, c *casefile.Case) {
	t.Helper()
	v, diags := c.Eval(nil)
	same, more := c.Eval(c.GivenValues())
	if diags != nil || more != nil {
		t.Fatalf("a good case does not evaluate: %v %v", diags, more)
	}
	for i := range v.Num {
		if v.Num[i] != same.Num[i] {
			t.Fatalf("slot %d is %g as written and %g from the same given values", i, v.Num[i], same.Num[i])
		}
	}
	net, setters, diags := c.Build()
	if net == nil || diags != nil {
		t.Fatalf("a good case does not build: %v", diags)
	}
	p := net.NewParams()
	for _, set := range setters {
		if err := set(v, p); err != nil {
			t.Fatal(err)
		}
	}
	for _, d := range c.Explain(net.Check(p)) {
		if d.Line == 0 {
			t.Fatalf("no place in %v", d)
		}
	}
	_ = network.NoRef
}
