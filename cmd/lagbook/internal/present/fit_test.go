package present

import (
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestShare(t *testing.T) {
	list := []measure{{5, 5}, {4, 30}, {6, 50}}
	for _, c := range []struct {
		room int
		want []int
	}{
		{89, []int{5, 30, 50}}, // all fits
		{70, []int{5, 30, 31}}, // the widest gives first
		{49, []int{5, 20, 20}}, // then both to one width
		{19, []int{5, 4, 6}},   // down to the least
		{18, nil},
	} {
		if d := cmp.Diff(c.want, share(list, 2, c.room)); d != "" {
			t.Errorf("room %d: %s", c.room, d)
		}
	}
}

// What one column leaves unused goes to the others.
func TestSettle(t *testing.T) {
	g := grid{
		heads:  []string{"a", "b"},
		rows:   [][]string{{"unbreakable unbreakable", "one two three four five six"}},
		aligns: []Align{Left, Left},
	}
	pieces := g.fit(width, 2, 40)
	if len(pieces) != 1 {
		t.Fatalf("%d pieces", len(pieces))
	}
	if d := cmp.Diff([]int{11, 27}, pieces[0].widths); d != "" {
		t.Error(d)
	}
}

// The first column stands in every piece.
func TestPieces(t *testing.T) {
	g := grid{heads: []string{"t", "a", "b", "c"}, rows: [][]string{{"1", "22222222", "33333333", "44444444"}}, aligns: []Align{Point, Point, Point, Point}}
	var heads [][]string
	for _, p := range g.fit(width, 2, 22) {
		heads = append(heads, p.heads)
	}
	if d := cmp.Diff([][]string{{"t", "a", "b"}, {"t", "c"}}, heads); d != "" {
		t.Error(d)
	}
}
