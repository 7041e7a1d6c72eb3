package network

import "math"

// Shares by which a run counts as settled: of the way that an unknown has gone, what it
// would still go if its present rate lasted as long as the run did, and what it lacks
// of the steady state of the equations linearised at the end.
const (
	settledRate = 1e-4
	settledWay  = 1e-3
)

// settled works out what the outputs settle to if the run ends at rest.
func (m *marching) settled(t *Trajectory) {
	length := m.t - t.times[0]
	if !(length > 0) || !m.wavesRest() {
		return
	}
	f, ft := make([]float64, len(m.x)), make([]float64, len(m.x))
	m.sys.linearise(m.t, m.x, f, ft)
	moves := m.moving()
	way := make([]float64, len(m.x))
	for k, c := range m.sys.mass {
		way[k] = max(m.hi[k]-m.lo[k], 1e3*m.tol*m.scale[k])
		if c != 0 && moves[k] && math.Abs(f[k]/c)*length > settledRate*way[k] {
			return
		}
	}
	if !m.lacks(f, moves, way) {
		return
	}
	for k := range f {
		f[k] += m.x[k]
	}
	t.final, t.settled = make([]float64, len(m.rec.outs)), make([]bool, len(m.rec.outs))
	for i := range m.rec.outs {
		now := m.e.value(&m.rec.outs[i], m.t, m.x, nil)
		t.final[i] = m.e.value(&m.rec.outs[i], m.t, f, nil)
		slope := t.endSlope(i)
		gone := max(t.size[i], math.Abs(now))
		t.settled[i] = math.Abs(slope)*length <= settledWay*gone && math.Abs(t.final[i]-now) <= settledWay*gone
	}
}

// endSlope is the rate of an output in the last step that has a length.
func (t *Trajectory) endSlope(out int) float64 {
	for j := len(t.times) - 2; j >= 0; j-- {
		if h := t.times[j+1] - t.times[j]; h > 0 {
			return t.curves[out][j].slope(1) / h
		}
	}
	return 0
}

// wavesRest reports that every wave has come to where it stays.
func (m *marching) wavesRest() bool {
	for _, w := range m.waves {
		v, ok := w.Final()
		if !ok || math.Abs(w.At(m.t)-v) > 1e-9*(math.Abs(v)+math.Abs(w.Before)) {
			return false
		}
	}
	return true
}

// moving tells of each unknown whether anything depends on it: an integral that is only
// read goes on for ever, and the rest is at rest all the same.
func (m *marching) moving() []bool {
	jac := m.sys.jac
	moves := make([]bool, jac.N)
	for k := range moves {
		for _, v := range jac.Val[jac.Start[k]:jac.Start[k+1]] {
			moves[k] = moves[k] || v != 0
		}
	}
	return moves
}

// lacks replaces f by what the state lacks of the steady state, by one Newton step, and
// reports whether that is little. Where there is no one steady state it is nothing.
func (m *marching) lacks(f []float64, moves []bool, way []float64) bool {
	for k, v := range m.sys.jac.Val {
		m.sys.matrix.Val[k] = -v
	}
	for k := range moves {
		if !moves[k] {
			m.sys.matrix.Val[m.sys.diagonal[k]] = 1
			f[k] = 0
		}
	}
	if m.sys.lu.Factor(m.sys.matrix) != nil {
		clear(f)
		return true
	}
	m.sys.lu.Solve(f)
	for k, v := range f {
		if !moves[k] {
			f[k] = 0
		} else if !(math.Abs(v) <= settledWay*way[k]) {
			return false
		}
	}
	return true
}
