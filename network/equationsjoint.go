package network

import "math"

// A jointRow is the row of a joint: d/dt of what flows in, Σ ±F_q/L + Σ sign·u' and what
// elements that bring a flow of their own change.
type jointRow struct {
	row     int32
	ends    []jointEnd
	sources []jointSource
	ports   []jointPort
	fixed   []slotValue // of the Jacobian, from linear inertances
	drops   []slotDrop
}

type jointSource struct {
	at   int32 // in z
	sign float64
}

// A jointPort is an element that brings a flow into a joint without tying it to anything.
type jointPort struct {
	element, port int
	slot          []int32 // of what the element sees, in the row of the joint; −1: none
}

type slotValue struct {
	slot int32
	v    float64
}

type slotDrop struct {
	slot int32
	k    float64
	b    InertanceID
}

// layJoints prepares the rows that are no balances.
func (e *equations) layJoints() {
	e.joint, e.dead = e.joint[:0], e.dead[:0]
	for _, m := range e.top.kept {
		e.m[m.row] = 1
		e.dead = append(e.dead, e.rowAt[m.row]...)
	}
	for _, m := range e.top.joints {
		e.dead = append(e.dead, e.rowAt[m.row]...)
		e.joint = append(e.joint, e.jointRow(&m))
	}
}

func (e *equations) jointRow(m *meeting) jointRow {
	l := e.l
	r := jointRow{row: m.row, ends: m.ends}
	for _, n := range m.nodes {
		for _, k := range e.tied.sources[n] {
			r.sources = append(r.sources, jointSource{l.source[k], e.g.inputs[k].sign})
		}
		for _, p := range e.tied.pushes[n] {
			if s := &e.law[p.element]; !s.shut {
				p.slot = make([]int32, len(s.at))
				for c, at := range s.at {
					p.slot[c] = e.slot(m.row, at)
				}
				r.ports = append(r.ports, p)
			}
		}
	}
	for _, end := range m.ends {
		b, k := &e.g.inertances[end.b], end.sign/e.p.L[end.b]
		put := func(col int32, v float64) {
			if slot := e.slot(m.row, col); slot != none {
				r.fixed = append(r.fixed, slotValue{slot, v})
			}
		}
		put(l.level[b.from], k)
		put(l.level[b.to], -k)
		put(l.flow[end.b], -k*e.now.LR[end.b])
		if e.p.Drop[end.b] != nil {
			r.drops = append(r.drops, slotDrop{e.slot(m.row, l.flow[end.b]), k, end.b})
		}
	}
	return r
}

// change returns d/dt of what flows into a joint; f holds the other rows.
func (e *equations) change(r *jointRow, f []float64) float64 {
	sum := 0.0
	for _, end := range r.ends {
		sum += end.sign * f[e.l.flow[end.b]] / e.p.L[end.b]
	}
	for _, s := range r.sources {
		sum += s.sign * e.dz[s.at]
	}
	for _, p := range r.ports {
		s := &e.law[p.element]
		row := s.s.DF[p.port*len(s.at):][:len(s.at)]
		for c, at := range s.at {
			switch {
			case int(at) >= e.l.size:
				sum += row[c] * e.dz[at]
			case e.m[at] != 0:
				sum += row[c] * f[at] / e.m[at]
			}
		}
	}
	return sum
}

// jointJacobian puts the rows of joints, and the empty rows of what is kept, in the place
// of balances.
func (e *equations) jointJacobian(val, ft []float64) {
	if e.rest {
		for _, m := range e.top.kept {
			for _, slot := range e.rowAt[m.row] {
				val[slot] = 0
			}
		}
		return
	}
	for _, slot := range e.dead {
		val[slot] = 0
	}
	for k := range e.joint {
		r := &e.joint[k]
		for _, s := range r.fixed {
			val[s.slot] += s.v
		}
		for _, d := range r.drops {
			_, dh := e.p.Drop[d.b].Drop(e.z[e.l.flow[d.b]])
			val[d.slot] -= d.k * dh
		}
		for i := range r.ports {
			e.pushJacobian(&r.ports[i], val)
		}
		if ft != nil {
			ft[r.row] = e.bend(r, ft)
		}
	}
	if ft != nil {
		for _, m := range e.top.kept {
			ft[m.row] = 0
		}
	}
}

// pushJacobian adds what an element brings that has a flow, or what makes one, as an
// unknown: its flow's slope by the unknown times the unknown's own row. How that slope
// changes is left out.
func (e *equations) pushJacobian(p *jointPort, val []float64) {
	s := &e.law[p.element]
	df, n := s.s.DF, len(s.at)
	for row := s.ports; row < len(s.rows); row++ {
		k := df[p.port*n+row]
		if k == 0 || e.m[s.rows[row]] == 0 {
			continue
		}
		for c, slot := range p.slot {
			if slot != none {
				val[slot] += k * df[row*n+c]
			}
		}
	}
}

// bend returns ∂/∂t of the row of a joint.
func (e *equations) bend(r *jointRow, ft []float64) float64 {
	sum := 0.0
	for _, end := range r.ends {
		sum += end.sign * ft[e.l.flow[end.b]] / e.p.L[end.b]
	}
	for _, s := range r.sources {
		sum += s.sign * e.ddz[s.at]
	}
	for _, p := range r.ports {
		s := &e.law[p.element]
		row := s.s.DF[p.port*len(s.at):][:len(s.at)]
		for c, at := range s.at {
			switch {
			case int(at) >= e.l.size:
				sum += row[c] * e.ddz[at]
			case e.m[at] != 0:
				sum += row[c] * ft[at] / e.m[at]
			}
		}
	}
	return sum
}

// arriving returns what flows into a meeting at the z that sum has seen last, and the
// sum of the sizes of the flows.
func (e *equations) arriving(m *meeting) (sum, size float64) {
	for _, n := range m.nodes {
		at := e.l.balance[n]
		sum += e.acc[at]
		size += math.Abs(e.acc[at])
	}
	for _, end := range m.ends {
		size += math.Abs(e.z[e.l.flow[end.b]])
	}
	return sum, size
}
