package matrix

// An edge is a resistance between the stores i < j.
type edge struct {
	i, j int
	g    float64
}

// islands is a network split into its connected parts.
type islands struct {
	count       int
	edges       []edge
	order       []int // stores, island by island
	first       []int // island → its begin in order; one more at the end
	root        []int // store → smallest store joined to it
	next        []int
	degree      []int
	near        []edge  // up to two resistances at each store
	most, least float64 // largest and smallest exchange above 0
}

// find checks that b is an RC network and splits it.
func (s *islands) find(b *Balance) error {
	if err := s.read(b); err != nil {
		return err
	}
	s.join(b.N)
	s.group(b.N)
	return nil
}

// read lists the resistances. One pass over the pairs serves the checks too:
// they are a good part of the time of a small network.
func (s *islands) read(b *Balance) error {
	n := b.N
	if n < 0 || len(b.C) != n || len(b.Leak) != n || len(b.F) < n || n > 0 && len(b.F)/n != n {
		return ErrShape
	}
	s.edges, s.most, s.least = s.edges[:0], 0, maxFinite
	for i := range n {
		if c := b.C[i]; !(c > 0 && c <= maxFinite) {
			return ErrValue
		}
		if l := b.Leak[i]; !s.note(l) {
			return b.refusal()
		}
		row := b.F[i*n : i*n+n]
		mirror := i*n + i
		for j := i + 1; j < len(row); j++ {
			mirror += n
			g := row[j]
			if g == 0 && b.F[mirror] == 0 {
				continue
			}
			if g != b.F[mirror] || !s.note(g) {
				return b.refusal()
			}
			s.edges = append(s.edges, edge{i, j, g})
		}
	}
	return nil
}

// note keeps the extremes of the exchanges; false where g is not in [0, ∞).
func (s *islands) note(g float64) bool {
	if g > 0 {
		s.most, s.least = max(s.most, g), min(s.least, g)
	}
	return g >= 0 && g <= maxFinite
}

// refusal says why b is not an RC network.
func (b *Balance) refusal() error {
	if err := b.check(); err != nil {
		return err
	}
	return ErrNotRC
}

// join links the stores that exchange: root[i] becomes the smallest store of
// the island of i (disjoint sets, the smaller root wins).
func (s *islands) join(n int) {
	s.root, s.degree = resized(s.root, n), resized(s.degree, n)
	if cap(s.near) < 2*n {
		s.near = make([]edge, 2*n)
	}
	s.near = s.near[:2*n]
	for i := range n {
		s.root[i], s.degree[i] = i, 0
	}
	for _, e := range s.edges {
		s.touch(e.i, e)
		s.touch(e.j, e)
		p, q := s.top(e.i), s.top(e.j)
		s.root[max(p, q)] = min(p, q)
	}
}

// touch counts e among the resistances at store i.
func (s *islands) touch(i int, e edge) {
	if s.degree[i] < 2 {
		s.near[2*i+s.degree[i]] = e
	}
	s.degree[i]++
}

// touching returns the resistances at store i, of which it has at most two.
func (s *islands) touching(i int) []edge { return s.near[2*i : 2*i+s.degree[i]] }

// top returns the smallest store known to be joined to i and shortens the way.
func (s *islands) top(i int) int {
	for s.root[i] != i {
		s.root[i] = s.root[s.root[i]]
		i = s.root[i]
	}
	return i
}

// group lists the stores island by island, by their smallest store.
func (s *islands) group(n int) {
	s.order, s.next = resized(s.order, n), resized(s.next, n)
	s.first = resized(s.first, n+1)
	s.count = 0
	for i := range n { // count the stores of each island at its root's place
		if s.root[i] = s.top(i); s.root[i] == i {
			s.next[i] = 0
		}
		s.next[s.root[i]]++
	}
	at := 0
	for i := range n {
		if s.root[i] == i {
			s.first[s.count] = at
			s.count++
			at, s.next[i] = at+s.next[i], at
		}
	}
	s.first[s.count] = at
	for i := range n {
		r := s.root[i]
		s.order[s.next[r]] = i
		s.next[r]++
	}
}

// stores returns the stores of island i.
func (s *islands) stores(i int) []int { return s.order[s.first[i]:s.first[i+1]] }
