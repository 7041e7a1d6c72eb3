package casetest

import (
	"io/fs"
	"testing"

	"lagbook/network/casefile"
)

// Fuzz varies the cases of some folders. Whatever stands in a case, it ends in an
// answer or in diagnostics, never in a panic; what is read without an error builds,
// takes its numbers, and reduces or says why not.
func Fuzz(f *testing.F, words []casefile.Vocabulary, seeds ...fs.FS) {
	f.Helper()
	for _, source := range seeds {
		files, err := fs.Glob(source, "*.toml")
		if err != nil || len(files) == 0 {
			f.Fatal("no case to begin with")
		}
		for _, name := range files {
			text, err := fs.ReadFile(source, name)
			if err != nil {
				f.Fatal(err)
			}
			f.Add(string(text))
		}
	}
	f.Fuzz(func(t *testing.T, text string) { holds(t, text, words) })
}

func holds(t *testing.T, text string, words []casefile.Vocabulary) {
	c, diags := casefile.Read("case.toml", []byte(text), nil, words...)
	if casefile.Failed(diags) {
		if casefile.Listing(diags) == "" {
			t.Fatal("a failure without a word")
		}
		return
	}
	net, set, diags := c.Build()
	if casefile.Failed(diags) {
		t.Fatalf("read without an error and not built:\n%s", casefile.Listing(diags))
	}
	v, diags := c.Eval(nil)
	if casefile.Failed(diags) {
		t.Fatalf("read without an error and not computed:\n%s", casefile.Listing(diags))
	}
	p := net.NewParams()
	for _, s := range set {
		if err := s(v, p); err != nil {
			t.Fatalf("read without an error and not set: %v", err)
		}
	}
	for _, e := range c.Elements {
		if e.Table.Derive != nil {
			e.Table.Derive(e, c, v)
		}
	}
	const small = 30 // stores: the modes of more take too long here
	switch {
	case net.Nonlinear():
		if _, err := net.Begin(p); err != nil && len(c.Explain(err)) == 0 {
			t.Fatalf("%v is not explained", err)
		}
	case net.StoreCount() <= small:
		if _, err := net.Reduce(p, nil); err != nil && len(c.Explain(err)) == 0 {
			t.Fatalf("%v is not explained", err)
		}
	}
}
