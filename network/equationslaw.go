package network

// A stamped is an element with its places.
type stamped struct {
	law       Law
	s         Stamp
	at        []int32 // local variables, in z
	rows      []int32 // ports and unknowns, in acc
	slot      []int32 // of DF, by row and column; −1: none
	ports     int
	gate      int32 // place in z of the drive that shuts it; −1
	shut      bool
	through   int32 // place among the throughs; −1: it is evaluated as a Law
	storing   int32 // row of the level that says what is stored; −1
	storeSlot []int32
	held      bool // it stores at a held node
	passive   bool

	switching Switching
	mixed     Mixed
}

// A throughAt is an element of a Through with its places: what most of a network is made of.
type throughAt struct {
	flow         Flow
	a, b, ra, rb int32
	scale        int32 // in z; −1
	shut         bool
	slot         [4]int32

	q, da, db, dscale float64 // what was found last: the flow, and its derivatives by both levels and by the scale
}

// layLaws finds the places of all elements.
func (e *equations) layLaws() {
	for k := range e.g.elements {
		shape := &e.g.elements[k].Shape
		at, rows := e.l.locals(e.g, k)
		f := len(rows)
		s := stamped{law: e.p.Law[k], at: at, rows: rows, ports: len(shape.Ports), passive: shape.Passive, gate: none, through: none, storing: none}
		s.s = Stamp{X: make([]float64, len(at)), Mem: e.mem[k], F: make([]float64, f), DF: make([]float64, f*len(at)), DStoredBy: make([]float64, len(shape.Unknowns))}
		for _, r := range rows {
			for _, c := range at {
				s.slot = append(s.slot, e.slot(r, c))
			}
		}
		if shape.Gate > 0 {
			s.gate = e.l.drive[k][shape.Gate-1]
		}
		if shape.Stores {
			s.place(e, shape, k)
		}
		s.switching, _ = s.law.(Switching)
		s.mixed, _ = s.law.(Mixed)
		if t, ok := s.law.(*Through); ok {
			s.through = int32(len(e.through))
			e.through = append(e.through, e.throughOf(t, &s))
		}
		e.law = append(e.law, s)
	}
}

// place finds where what an element stores is said.
func (s *stamped) place(e *equations, shape *Shape, k int) {
	node := shape.Ports[0]
	if e.l.stored[node] == none {
		s.held = true
		return
	}
	s.storing = e.l.level[node]
	s.storeSlot = []int32{e.slot(s.storing, s.storing)}
	for _, u := range e.l.unknown[k] {
		s.storeSlot = append(s.storeSlot, e.slot(s.storing, u))
	}
}

func (e *equations) throughOf(t *Through, s *stamped) throughAt {
	w := throughAt{flow: t.Flow, a: s.at[0], b: s.at[1], ra: s.rows[0], rb: s.rows[1], scale: none}
	if len(s.at) > 2 {
		w.scale = s.at[2]
	}
	w.slot = [4]int32{e.slot(w.ra, w.a), e.slot(w.ra, w.b), e.slot(w.rb, w.a), e.slot(w.rb, w.b)}
	return w
}

// gather puts what an element sees into its stamp.
func (e *equations) gather(s *stamped) {
	for i, at := range s.at {
		s.s.X[i] = e.z[at]
	}
	s.s.T = e.at
}

// eval computes an element from z. Of one that is shut no flow is left.
func (e *equations) eval(s *stamped) {
	e.gather(s)
	clear(s.s.F)
	clear(s.s.DF)
	clear(s.s.DStoredBy)
	s.s.Stored, s.s.DStored = 0, 0
	s.law.Eval(&s.s)
	if s.shut {
		clear(s.s.F[:s.ports])
		clear(s.s.DF[:s.ports*len(s.at)])
	}
}

// idle tells whether nothing of an element takes part in the rows.
func (s *stamped) idle() bool {
	return s.through != none || s.passive || s.shut && len(s.rows) == s.ports && s.storing == none || len(s.rows) == 0
}

// heed puts what an element and the rates of what it sees are into its stamp.
func (e *equations) heed(s *stamped, rate []float64) *Stamp {
	e.gather(s)
	if len(s.s.Rate) != len(s.at) {
		s.s.Rate = make([]float64, len(s.at))
	}
	for i, at := range s.at {
		switch {
		case int(at) >= e.l.size:
			s.s.Rate[i] = e.dz[at]
		case rate != nil:
			s.s.Rate[i] = rate[at]
		default:
			s.s.Rate[i] = 0
		}
	}
	return &s.s
}

// guardRoom is how many guards there can be at once: few laws have more than two ways
// out of a mode.
func (e *equations) guardRoom() int {
	room := 0
	for k := range e.law {
		if e.law[k].switching != nil {
			room += maxGuards
		}
	}
	return room
}

// maxGuards is how many guards a law may have in one mode.
const maxGuards = 8

// guards writes the guards in force into g, which has guardRoom places, each positive while
// its mode lasts, and says whose they are (the slice is overwritten by the next call).
// rate is dx/dt, nil where it is not known: laws then see zeros for it.
func (e *equations) guards(t float64, x, rate, g []float64) []guardRef {
	e.refs = e.refs[:0]
	e.fill(t, x)
	e.slopes(t)
	var some [maxGuards]float64
	for k := range e.law {
		s := &e.law[k]
		if s.switching == nil {
			continue
		}
		count := s.switching.Guards(e.heed(s, rate), some[:])
		for i, v := range some[:count] {
			g[len(e.refs)] = v
			e.refs = append(e.refs, guardRef{ElementID(k), i})
		}
	}
	return e.refs
}

// next puts the mode in force that follows when a guard has passed through zero. It
// changes the modes and memories kept here and unknowns in x. Enter the stretch from t on
// with e.state(t, x) and call project afterwards.
func (e *equations) next(t float64, x, rate []float64, ref guardRef) (what string, last bool) {
	e.fill(t, x)
	e.slopes(t)
	s := &e.law[ref.Element]
	mode, what, last := s.switching.Next(e.heed(s, rate), ref.Index)
	e.modes[ref.Element], s.s.Mode = mode, mode
	for u, at := range e.l.unknown[ref.Element] {
		x[at] = s.s.X[s.ports+u]
	}
	return what, last
}

// cautions calls report for each caution that a law gives at x.
func (e *equations) cautions(t float64, x []float64, report func(id ElementID, code, text string)) {
	e.fill(t, x)
	for k := range e.law {
		s := &e.law[k]
		c, ok := s.law.(Cautious)
		if !ok || s.shut {
			continue
		}
		e.gather(s)
		if code, text := c.Caution(&s.s); code != "" {
			report(ElementID(k), code, text)
		}
	}
}
