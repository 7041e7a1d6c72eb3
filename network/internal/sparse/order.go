package sparse

import "slices"

// order returns an order of elimination that keeps the fill of LU with pivots on the
// diagonal small: minimum degree on the pattern of A + Aᵀ, with the approximate external
// degrees, the absorption of elements and the supervariables of Amestoy, Davis, Duff,
// An approximate minimum degree ordering algorithm, SIAM J. Matrix Anal. Appl. 17 (1996).
func order(m *Matrix) []int32 {
	q := newQuotient(m)
	for k := 0; k < m.N; {
		k += q.eliminate(q.least())
	}
	return q.sequence()
}

// A quotient graph: what is left of A + Aᵀ while it is being eliminated. An eliminated
// variable becomes an element: the set of variables that its elimination joined.
type quotient struct {
	n        int
	vars     [][]int32 // of a variable: variables next to it that no element tells of
	elements [][]int32 // of a variable: elements it belongs to
	members  [][]int32 // of an element
	weight   []int32   // variables that a principal variable stands for; 0: absorbed or eliminated
	degree   []int32   // bound on the external degree, in variables
	alive    []bool    // of an element
	parent   []int32   // element that absorbed an element; −1
	stands   [][]int32 // variables absorbed by a principal variable
	done     []int32   // principal variables in the order of elimination

	head, next, prev []int32 // principal variables by degree
	lowest           int

	mark    []int32 // of variables: == stamp where in the new element
	outside []int32 // of elements: weight of members outside the new element, + stamp
	stamp   int32
	bucket  [][]int32 // scratch: candidates for supervariables by hash
	keys    []uint32
}

func newQuotient(m *Matrix) *quotient {
	n := m.N
	q := &quotient{n: n, vars: make([][]int32, n), elements: make([][]int32, n), members: make([][]int32, n),
		weight: make([]int32, n), degree: make([]int32, n), alive: make([]bool, n), parent: make([]int32, n), stands: make([][]int32, n),
		head: make([]int32, n+1), next: make([]int32, n), prev: make([]int32, n), mark: make([]int32, n), outside: make([]int32, n),
		bucket: make([][]int32, n)}
	count := make([]int32, n)
	for j := range n {
		count[j] += m.Start[j+1] - m.Start[j]
		for _, i := range m.Row[m.Start[j]:m.Start[j+1]] {
			count[i]++
		}
	}
	for i, room := range count {
		q.vars[i] = make([]int32, 0, room)
	}
	for j := range n {
		for _, i := range m.Row[m.Start[j]:m.Start[j+1]] {
			if int(i) != j {
				q.vars[i] = append(q.vars[i], int32(j))
				q.vars[j] = append(q.vars[j], i)
			}
		}
	}
	for d := range q.head {
		q.head[d] = -1
	}
	for i := n - 1; i >= 0; i-- { // the lowest-numbered of equal degree comes first
		slices.Sort(q.vars[i])
		q.vars[i] = slices.Compact(q.vars[i])
		q.weight[i], q.degree[i], q.parent[i] = 1, int32(len(q.vars[i])), -1
		q.insert(int32(i))
	}
	return q
}

func (q *quotient) insert(i int32) {
	d := q.degree[i]
	q.next[i], q.prev[i] = q.head[d], -1
	if q.head[d] >= 0 {
		q.prev[q.head[d]] = i
	}
	q.head[d] = i
	q.lowest = min(q.lowest, int(d))
}

func (q *quotient) remove(i int32) {
	if q.prev[i] >= 0 {
		q.next[q.prev[i]] = q.next[i]
	} else {
		q.head[q.degree[i]] = q.next[i]
	}
	if q.next[i] >= 0 {
		q.prev[q.next[i]] = q.prev[i]
	}
}

// least takes out a variable of least degree.
func (q *quotient) least() int32 {
	for q.head[q.lowest] < 0 {
		q.lowest++
	}
	p := q.head[q.lowest]
	q.remove(p)
	return p
}

// eliminate turns variable p into an element and returns how many variables that takes out.
func (q *quotient) eliminate(p int32) int {
	taken := int(q.weight[p])
	members, size := q.join(p)
	for _, i := range members {
		q.remove(i)
	}
	q.measure(members)
	left := members[:0]
	for _, i := range members {
		if q.update(p, i, size) {
			left = append(left, i)
			continue
		}
		taken += int(q.weight[i]) // nothing but the new element: it goes along at no cost
		q.absorb(p, i)
	}
	q.members[p], q.alive[p] = q.merge(left), true
	for _, i := range q.members[p] {
		q.degree[i] = min(q.degree[i], int32(q.n-taken))
		q.insert(i)
	}
	q.weight[p] = 0
	q.done = append(q.done, p)
	return taken
}

// join forms the element of p: all that p touches. Its own elements are absorbed.
func (q *quotient) join(p int32) (members []int32, size int32) {
	q.stamp++
	q.mark[p] = q.stamp
	add := func(list []int32) {
		for _, i := range list {
			if q.weight[i] > 0 && q.mark[i] != q.stamp {
				q.mark[i] = q.stamp
				members = append(members, i)
				size += q.weight[i]
			}
		}
	}
	add(q.vars[p])
	for _, e := range q.elements[p] {
		if q.alive[e] {
			add(q.members[e])
			q.alive[e], q.parent[e], q.members[e] = false, p, nil
		}
	}
	q.vars[p], q.elements[p] = nil, nil
	return members, size
}

// measure finds the weight of every element outside the new one.
func (q *quotient) measure(members []int32) {
	for _, i := range members {
		for _, e := range q.elements[i] {
			q.outside[e] = -1
		}
	}
	for _, i := range members {
		for _, e := range q.elements[i] {
			if !q.alive[e] {
				continue
			}
			if q.outside[e] < 0 {
				q.outside[e] = 0
				for _, j := range q.members[e] {
					q.outside[e] += q.weight[j]
				}
			}
			q.outside[e] -= q.weight[i]
		}
	}
}

// update renews the lists of a member of the new element p and the bound on its degree.
// It returns false where nothing but p is left of them.
func (q *quotient) update(p, i, size int32) bool {
	elements, sum := q.elements[i][:0], int32(0)
	for _, e := range q.elements[i] {
		switch {
		case !q.alive[e]:
		case q.outside[e] == 0: // it lies within the new one
			q.alive[e], q.parent[e], q.members[e] = false, p, nil
		default:
			elements = append(elements, e)
			sum += q.outside[e]
		}
	}
	vars := q.vars[i][:0]
	for _, j := range q.vars[i] {
		if q.weight[j] > 0 && q.mark[j] != q.stamp {
			vars = append(vars, j)
			sum += q.weight[j]
		}
	}
	q.vars[i] = vars
	q.elements[i] = append(elements, p)
	rest := size - q.weight[i]
	q.degree[i] = min(q.degree[i]+rest, sum+rest)
	return sum > 0 || len(elements) > 0
}

// absorb lets p stand for i from now on.
func (q *quotient) absorb(p, i int32) {
	q.stands[p] = append(append(q.stands[p], i), q.stands[i]...)
	q.weight[i], q.stands[i], q.vars[i], q.elements[i] = 0, nil, nil, nil
}

// merge joins members that touch the same variables and elements into supervariables,
// and returns those that are left.
func (q *quotient) merge(members []int32) []int32 {
	q.keys = q.keys[:0]
	for _, i := range members {
		h := uint32(0)
		for _, j := range q.vars[i] {
			h += uint32(j) * 2654435761
		}
		for _, e := range q.elements[i] {
			h += uint32(e) * 40503
		}
		h %= uint32(q.n)
		if len(q.bucket[h]) == 0 {
			q.keys = append(q.keys, h)
		}
		q.bucket[h] = append(q.bucket[h], i)
	}
	for _, h := range q.keys {
		q.mergeAmong(q.bucket[h])
		q.bucket[h] = q.bucket[h][:0]
	}
	left := members[:0]
	for _, i := range members {
		if q.weight[i] > 0 {
			left = append(left, i)
		}
	}
	return left
}

func (q *quotient) mergeAmong(list []int32) {
	for a, i := range list {
		if q.weight[i] == 0 || a+1 == len(list) {
			continue
		}
		slices.Sort(q.vars[i])
		slices.Sort(q.elements[i])
		for _, j := range list[a+1:] {
			if q.weight[j] == 0 || len(q.vars[i]) != len(q.vars[j]) || len(q.elements[i]) != len(q.elements[j]) {
				continue
			}
			slices.Sort(q.vars[j])
			slices.Sort(q.elements[j])
			if slices.Equal(q.vars[i], q.vars[j]) && slices.Equal(q.elements[i], q.elements[j]) {
				q.degree[i] -= q.weight[j]
				q.weight[i] += q.weight[j]
				q.absorb(i, j)
			}
		}
	}
}

// sequence returns the variables in an order that visits the tree of elements from its
// leaves, each subtree in one piece: the same fill, and columns of one pattern come together.
func (q *quotient) sequence() []int32 {
	children := make([][]int32, q.n)
	var roots []int32
	for _, e := range q.done {
		if p := q.parent[e]; p >= 0 {
			children[p] = append(children[p], e)
		} else {
			roots = append(roots, e)
		}
	}
	seq := make([]int32, 0, q.n)
	type visit struct {
		e    int32
		next int
	}
	var stack []visit
	for _, r := range roots {
		stack = append(stack, visit{r, 0})
		for len(stack) > 0 {
			top := &stack[len(stack)-1]
			if top.next < len(children[top.e]) {
				top.next++
				stack = append(stack, visit{children[top.e][top.next-1], 0})
				continue
			}
			seq = append(append(seq, top.e), q.stands[top.e]...)
			stack = stack[:len(stack)-1]
		}
	}
	return seq
}
