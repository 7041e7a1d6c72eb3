package network

import "lagbook/network/internal/sparse"

// fill sets z to the unknowns and to what the waves say at t.
func (e *equations) fill(t float64, x []float64) {
	copy(e.z, x)
	e.tell(t)
}

// tell sets what the waves say at t.
func (e *equations) tell(t float64) {
	if e.told && t == e.at {
		return
	}
	e.told, e.at = true, t
	for _, i := range e.moving {
		k := int(i) - e.l.size
		v := e.courses[k].at(t)
		if floor := e.floor[k]; floor > 0 && v < floor && v > -floor {
			v = floor
		}
		e.z[i] = v
	}
}

// slopes sets the derivatives of what the waves say.
func (e *equations) slopes(t float64) {
	for _, i := range e.moving {
		c := &e.courses[int(i)-e.l.size]
		e.dz[i], e.ddz[i] = c.rate(t), c.bend(t)
	}
}

// sum adds up the balances, the drives of the inertances and the rows of elements.
func (e *equations) sum() {
	e.sumBranches()
	for k := range e.through {
		w := &e.through[k]
		if w.shut {
			continue
		}
		q, _, _ := w.flow.Flow(e.z[w.a], e.z[w.b])
		if w.scale != none {
			q *= e.z[w.scale]
		}
		w.q = q
		e.acc[w.ra] -= q
		e.acc[w.rb] += q
	}
	e.sumLaws()
}

// sumBranches begins the balances with what is linear, and with the inertances.
func (e *equations) sumBranches() {
	z, acc, g, p := e.z, e.acc, e.g, e.now
	clear(acc)
	for k := range e.wires {
		w := &e.wires[k]
		q := p.G[k] * (z[w.a] - z[w.b])
		acc[w.ra] -= q
		acc[w.rb] += q
	}
	l := e.l
	for k := range g.oneWays {
		b := &g.oneWays[k]
		acc[l.balance[b.to]] += p.W[k] * (z[l.level[b.from]] - z[l.level[b.to]])
	}
	for k := range g.feedbacks {
		b := &g.feedbacks[k]
		acc[l.balance[b.to]] += p.K[k] * (z[l.level[b.from]] - p.About[k])
	}
	for k := range g.inputs {
		if in := &g.inputs[k]; !in.held {
			acc[l.balance[in.node]] += in.sign * z[l.source[k]]
		}
	}
	for k := range g.inertances {
		e.flowing(k)
	}
}

// sumLaws adds the elements that are more than a flow between two levels.
func (e *equations) sumLaws() {
	for k := range e.law {
		if s := &e.law[k]; !s.idle() {
			e.eval(s)
			e.add(s)
		}
	}
}

// flowing adds inertance k: its flow to the balances, and what drives it.
func (e *equations) flowing(k int) {
	b, at := &e.g.inertances[k], e.l.flow[k]
	if e.now.Shut[k] {
		return
	}
	q := e.z[at]
	e.acc[e.l.balance[b.from]] -= q
	e.acc[e.l.balance[b.to]] += q
	v := e.z[e.l.level[b.from]] - e.z[e.l.level[b.to]] - e.now.LR[k]*q
	if d := e.p.Drop[k]; d != nil {
		h, _ := d.Drop(q)
		v -= h
	}
	e.acc[at] = v
}

// add adds what an element was computed to bring.
func (e *equations) add(s *stamped) {
	for r, at := range s.rows {
		e.acc[at] += s.s.F[r]
	}
	if s.storing != none {
		e.acc[s.storing] -= s.s.Stored
	}
}

// rates sets f to F(t, x).
func (e *equations) rates(t float64, x, f []float64) {
	e.fill(t, x)
	e.sum()
	e.finish(t, f)
}

// finish turns the balances into rows.
func (e *equations) finish(t float64, f []float64) {
	l := e.l
	copy(f, e.acc[:l.size])
	for i, s := range l.stored {
		if s != none {
			at := l.level[i]
			f[at] += e.z[s] - e.g.capacityOf(e.now, NodeID(i))*e.z[at]
		}
	}
	if !e.rest {
		if len(e.joint) > 0 {
			e.slopes(t)
		}
		for k := range e.joint {
			f[e.joint[k].row] = e.change(&e.joint[k], f)
		}
	}
	for k := range e.top.kept {
		f[e.top.kept[k].row] = 0
	}
}

// jacobian sets jac to ∂F/∂x, f to F and ft to ∂F/∂t. f or ft may be nil.
func (e *equations) jacobian(t float64, x, f, ft []float64, jac *sparse.Matrix) {
	e.fill(t, x)
	if ft != nil {
		e.slopes(t)
		clear(ft)
	}
	val := jac.Val
	copy(val, e.base)
	e.sumBranches()
	e.throughJacobian(val, ft)
	e.sumLaws()
	e.lawJacobian(val, ft)
	if f != nil {
		e.finish(t, f)
	}
	for k, d := range e.p.Drop {
		if d != nil && !e.now.Shut[k] {
			_, dh := d.Drop(e.z[e.l.flow[k]])
			val[e.dropAt[k]] -= dh
		}
	}
	if ft != nil && len(e.moving) > 0 {
		e.branchSlopes(ft)
	}
	e.jointJacobian(val, ft)
}

// throughJacobian adds the flows between two levels, to the balances too.
func (e *equations) throughJacobian(val, ft []float64) {
	for k := range e.through {
		w := &e.through[k]
		if w.shut {
			continue
		}
		q, da, db := w.flow.Flow(e.z[w.a], e.z[w.b])
		slope := 0.0
		if w.scale != none {
			v := e.z[w.scale]
			w.dscale = q
			q, da, db, slope = q*v, da*v, db*v, q*e.dz[w.scale]
		}
		w.q, w.da, w.db = q, da, db
		e.acc[w.ra] -= q
		e.acc[w.rb] += q
		put := func(slot int32, v float64) {
			if slot != none {
				val[slot] += v
			}
		}
		put(w.slot[0], -da)
		put(w.slot[1], -db)
		put(w.slot[2], da)
		put(w.slot[3], db)
		if ft != nil && len(e.moving) > 0 {
			slope += da*e.dz[w.a] + db*e.dz[w.b]
			e.slope(ft, w.ra, -slope)
			e.slope(ft, w.rb, slope)
		}
	}
}

// slope adds to ∂F/∂t of a row, if it is one.
func (e *equations) slope(ft []float64, row int32, v float64) {
	if int(row) < len(ft) {
		ft[row] += v
	}
}

// lawJacobian adds the elements as sum has evaluated them.
func (e *equations) lawJacobian(val, ft []float64) {
	for k := range e.law {
		s := &e.law[k]
		if s.idle() {
			continue
		}
		df := s.s.DF
		for i, slot := range s.slot {
			if slot != none {
				val[slot] += df[i]
			}
		}
		for i, slot := range s.storeSlot {
			if i == 0 {
				val[slot] -= s.s.DStored
			} else {
				val[slot] -= s.s.DStoredBy[i-1]
			}
		}
		if ft == nil || len(e.moving) == 0 {
			continue
		}
		for r, row := range s.rows {
			for c, at := range s.at {
				e.slope(ft, row, df[r*len(s.at)+c]*e.dz[at])
			}
		}
	}
}

// branchSlopes adds what the waves change in the rows of linear branches.
func (e *equations) branchSlopes(ft []float64) {
	l, g, p, dz := e.l, e.g, e.now, e.dz
	for k := range e.wires {
		w := &e.wires[k]
		if d := dz[w.a] - dz[w.b]; d != 0 {
			e.slope(ft, w.ra, -p.G[k]*d)
			e.slope(ft, w.rb, p.G[k]*d)
		}
	}
	for k, b := range g.oneWays {
		e.slope(ft, l.balance[b.to], p.W[k]*(dz[l.level[b.from]]-dz[l.level[b.to]]))
	}
	for k, b := range g.feedbacks {
		e.slope(ft, l.balance[b.to], p.K[k]*dz[l.level[b.from]])
	}
	for k, in := range g.inputs {
		if !in.held {
			e.slope(ft, l.balance[in.node], in.sign*dz[l.source[k]])
		}
	}
	for k, b := range g.inertances {
		if !p.Shut[k] {
			e.slope(ft, l.flow[k], dz[l.level[b.from]]-dz[l.level[b.to]])
		}
	}
}

// assemble sets what linear branches bring into the Jacobian.
func (e *equations) assemble() {
	l, g, p := e.l, e.g, e.now
	clear(e.base)
	put := func(row, col int32, v float64) {
		if slot := e.slot(row, col); slot != none {
			e.base[slot] += v
		}
	}
	for k := range e.wires {
		w := &e.wires[k]
		for i, sign := range [4]float64{-1, 1, 1, -1} {
			if w.slot[i] != none {
				e.base[w.slot[i]] += sign * p.G[k]
			}
		}
	}
	for k, b := range g.oneWays {
		put(l.balance[b.to], l.level[b.from], p.W[k])
		put(l.balance[b.to], l.level[b.to], -p.W[k])
	}
	for k, b := range g.feedbacks {
		put(l.balance[b.to], l.level[b.from], p.K[k])
	}
	for k, b := range g.inertances {
		if at := l.flow[k]; !p.Shut[k] {
			put(l.balance[b.from], at, -1)
			put(l.balance[b.to], at, 1)
			put(at, l.level[b.from], 1)
			put(at, l.level[b.to], -1)
			put(at, at, -p.LR[k])
		}
	}
	for i, s := range l.stored {
		if s != none {
			put(l.level[i], s, 1)
			put(l.level[i], l.level[i], -g.capacityOf(p, NodeID(i)))
		}
	}
}
