package network

import (
	"slices"

	"lagbook/laplace"
)

// enter sets the stretch [t0, t1] (s), t1 > t0, which holds no break of any wave, drive or
// switch inside, and the modes and memories of s (levels and flows of s are not read).
// Values at t0 and t1 are those within the stretch: after a jump at t0, before one at t1.
// It returns *ParamFault where what is shut leaves something without a meaning.
func (e *equations) enter(s *State, t0, t1 float64) error {
	mid := t0 + (t1-t0)/2
	now, err := e.numbers(mid)
	if err != nil {
		return err
	}
	e.rest, e.t0, e.t1 = false, t0, t1
	return e.set(s, now, t0, t1, func(w *laplace.Waveform) course { return courseOf(w, mid) })
}

// numbers returns the parameters in force at t, between switches.
func (e *equations) numbers(t float64) (*Params, error) {
	if !e.p.Turns() {
		return e.p, nil
	}
	values := make([]float64, len(e.p.Switch))
	for i, w := range e.p.Switch {
		values[i] = w.At(t)
	}
	if slices.Equal(values, e.now.Now) {
		return e.now, nil
	}
	if slices.Equal(values, e.p.Now) {
		return e.p, nil
	}
	now, err := e.p.Turn(values)
	if err != nil {
		return nil, err
	}
	now = now.Clone()
	now.Now = values
	return now, e.n.Check(now)
}

// freeze holds every wave at one value for ever.
func (e *equations) freeze(s *State, now *Params, value func(w *laplace.Waveform) float64) error {
	return e.hold(s, now, value, asMarched)
}

// Whether things move: at rest the balances of joints stand for themselves.
const (
	asMarched = false
	asRest    = true
)

func (e *equations) hold(s *State, now *Params, value func(w *laplace.Waveform) float64, rest bool) error {
	e.rest, e.t0, e.t1 = rest, 0, 1
	return e.set(s, now, 0, 1, func(w *laplace.Waveform) course { return course{a: value(w)} })
}

func (e *equations) set(s *State, now *Params, t0, t1 float64, pick func(w *laplace.Waveform) course) error {
	e.follow(t0, t1, pick)
	if s != nil {
		copy(e.modes, s.Modes)
		for k := range e.mem {
			copy(e.mem[k], s.Mem[k])
		}
	}
	key := e.shutting(now)
	if e.entered && now == e.now && slices.Equal(key, e.key) {
		return nil
	}
	e.entered, e.now, e.key = true, now, key
	e.weigh()
	if err := e.arrange(); err != nil {
		e.entered = false
		return err
	}
	e.assemble()
	return nil
}

// follow takes the courses of the waves for a stretch.
func (e *equations) follow(t0, t1 float64, pick func(w *laplace.Waveform) course) {
	l := e.l
	put := func(at int32, w *laplace.Waveform) { e.courses[int(at)-l.size] = pick(w) }
	for k, in := range e.g.inputs {
		if in.held {
			put(l.level[in.node], &e.p.Wave[k])
		} else {
			put(l.source[k], &e.p.Wave[k])
		}
	}
	for k, places := range l.drive {
		for d, at := range places {
			put(at, &e.p.Drive[k][d])
		}
	}
	e.moving, e.told = e.moving[:0], false
	clear(e.dz)
	clear(e.ddz)
	clear(e.floor)
	for i := range e.courses {
		if c := &e.courses[i]; c.constant() {
			e.z[l.size+i] = c.a
		} else {
			e.moving = append(e.moving, int32(l.size+i))
		}
	}
	for k := range e.law {
		if at := e.law[k].gate; at != none {
			if c := &e.courses[int(at)-l.size]; !c.constant() {
				e.floor[int(at)-l.size] = gateFloor * c.most(t0, t1)
			}
		}
	}
}

// gateFloor is the share of its largest value in a stretch below which the drive of a
// gate is not let fall: what hangs on parts that all open from 0 keeps the level they
// give it, for a flow that is nothing beside those that come.
const gateFloor = 1e-12

// shutting finds which elements are shut and lists all that the rows depend on.
func (e *equations) shutting(now *Params) (key []bool) {
	for k := range e.law {
		s := &e.law[k]
		s.s.Mode = e.modes[k]
		s.shut = s.switching != nil && s.switching.Shut(e.modes[k])
		if s.gate != none {
			c := &e.courses[int(s.gate)-e.l.size]
			s.shut = s.shut || c.constant() && c.a == 0
		}
		if s.through != none {
			e.through[s.through].shut = s.shut
		}
		key = append(key, s.shut)
		for u := range e.l.unknown[k] {
			key = append(key, e.algebraic(k, u))
		}
	}
	return key
}

// algebraic tells whether the row of an unknown of element k is 0 = f now.
func (e *equations) algebraic(k, u int) bool {
	if s := &e.law[k]; s.mixed != nil {
		return s.mixed.Algebraic(e.modes[k], u)
	}
	return e.g.elements[k].Unknowns[u].Algebraic
}

// weigh sets the masses but for nodes that the topology decides on.
func (e *equations) weigh() {
	l := e.l
	for i, at := range l.level {
		if int(at) >= l.size {
			continue
		}
		e.m[at] = 0
		if l.stored[i] != none {
			e.m[l.stored[i]] = 1
		} else {
			e.m[at] = e.g.capacityOf(e.now, NodeID(i))
		}
	}
	for b, at := range l.flow {
		if e.m[at] = e.p.L[b]; e.now.Shut[b] {
			e.m[at] = 1
		}
	}
	for k, places := range l.unknown {
		for u, at := range places {
			if e.m[at] = 1; e.algebraic(k, u) {
				e.m[at] = 0
			}
		}
	}
}
