package quantity

import (
	"slices"
	"testing"
)

// testNames knows the names listed, each at its index.
func testNames(names ...string) func(string) (int, bool) {
	return func(s string) (int, bool) {
		i := slices.Index(names, s)
		return i, i >= 0
	}
}

func parsed(t testing.TB, texts ...string) []Value {
	t.Helper()
	var list []Value
	for _, s := range texts {
		v, err := Parse(s)
		if err != nil {
			t.Fatalf("%s: %v", s, err)
		}
		list = append(list, v)
	}
	return list
}
