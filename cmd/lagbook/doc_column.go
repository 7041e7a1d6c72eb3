package main

import (
	"slices"
	"strings"

	"lagbook/cmd/lagbook/internal/present"
)

// dropLast takes the last column from what is read; CSV keeps it.
func dropLast(t *present.Table) { dropColumn(t, len(t.Columns)-1) }

// dropColumn takes a column from what is read; CSV keeps it.
func dropColumn(t *present.Table, k int) {
	t.Columns = slices.Delete(t.Columns, k, k+1)
	for i := range t.Rows {
		t.Rows[i] = slices.Delete(t.Rows[i], k, k+1)
	}
}

// dropFull takes a column from what CSV carries.
func dropFull(t *present.Table, name string) {
	k := slices.Index(t.FullHead, name)
	t.FullHead = slices.Delete(slices.Clone(t.FullHead), k, k+1)
	for i := range t.Full {
		t.Full[i] = slices.Delete(t.Full[i], k, k+1)
	}
}

// withoutScenario takes the scenario, in column k, from what is read where it is the same in
// all rows, and from CSV too where there is none.
func withoutScenario(t *present.Table, k int, names []string) {
	if !severalScenarios(names) {
		dropColumn(t, k)
	}
	if strings.Join(names, "") == "" {
		dropFull(t, "scenario")
	}
}
