package matrix

import "slices"

// components returns the strongly connected parts of the graph in which state i
// feels state j where feels(i, j), each with its states ascending. A part comes
// after every part that feels it: what is downstream comes first.
//
// Method: R. Tarjan, SIAM J. Comput. 1 (1972) 146, with a stack of its own in
// place of recursion. The pattern is that of the exact zeros; the search starts
// from the states in order, so the same matrix gives the same parts.
func components(n int, feels func(i, j int) bool) [][]int {
	room := make([]int, 6*n) // in one piece: small systems are many
	cut := func() []int {
		v := room[:n:n]
		room = room[n:]
		return v
	}
	t := tarjan{index: cut(), low: cut(), next: cut(), stack: cut()[:0], call: cut()[:0], states: cut()[:0], on: make([]bool, n)}
	for i := 0; i < n; i++ {
		if t.index[i] == 0 {
			t.walk(n, i, feels)
		}
	}
	// A part is closed once all it feels is: upstream first. Turn it round.
	for i, j := 0, len(t.parts)-1; i < j; i, j = i+1, j-1 {
		t.parts[i], t.parts[j] = t.parts[j], t.parts[i]
	}
	return t.parts
}

type tarjan struct {
	index, low, next []int // 1-based order of discovery; lowest reachable; next neighbour to try
	on               []bool
	stack, call      []int
	states           []int // of the parts closed, one after the other
	count            int
	parts            [][]int
}

func (t *tarjan) open(i int) {
	t.count++
	t.index[i], t.low[i] = t.count, t.count
	t.stack = append(t.stack, i)
	t.call = append(t.call, i)
	t.on[i] = true
}

func (t *tarjan) walk(n, root int, feels func(i, j int) bool) {
	t.open(root)
	for len(t.call) > 0 {
		i := t.call[len(t.call)-1]
		if t.next[i] == n {
			t.close(i)
			continue
		}
		j := t.next[i]
		t.next[i]++
		switch {
		case j == i || !feels(i, j):
		case t.index[j] == 0:
			t.open(j)
		case t.on[j]:
			t.low[i] = min(t.low[i], t.index[j])
		}
	}
}

func (t *tarjan) close(i int) {
	t.call = t.call[:len(t.call)-1]
	if len(t.call) > 0 {
		up := t.call[len(t.call)-1]
		t.low[up] = min(t.low[up], t.low[i])
	}
	if t.low[i] != t.index[i] {
		return
	}
	k := len(t.stack) - 1
	for t.stack[k] != i {
		k--
	}
	from := len(t.states)
	t.states = append(t.states, t.stack[k:]...)
	part := t.states[from:len(t.states):len(t.states)]
	t.stack = t.stack[:k]
	slices.Sort(part)
	for _, j := range part {
		t.on[j] = false
	}
	t.parts = append(t.parts, part)
}
