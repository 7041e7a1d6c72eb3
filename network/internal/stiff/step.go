package stiff

import "math"

// Step takes one step towards end, of at most longest, and ends exactly at end where it
// comes near. The error is *Stuck.
func (g *Integrator) Step(end, longest float64) error {
	g.evaluate()
	t := g.T1
	g.T0 = t
	g.X0, g.X1 = g.X1, g.X0
	tried := g.h
	for {
		h, last := g.stepTo(t, end, longest)
		if t+h <= t || h < shortest(t, end) && !last {
			if g.lenient {
				return g.stuck(t, end)
			}
			g.lenient, g.h = true, tried
			continue
		}
		failed := !g.attempt(t, h)
		miss := math.Inf(1)
		if !failed {
			if miss = g.miss(); miss <= 1 && g.drifting {
				miss = max(miss, g.missBetween(t, h)/interior)
			}
		}
		if miss <= 1 {
			g.lenient = g.lenient && g.strictly() > 1
			if g.T1 = t + h; last {
				g.T1 = end
			}
			g.h = g.pace.after(h, miss)
			g.known = false
			g.Taken++
			return nil
		}
		g.h = g.pace.again(h, miss)
		g.Missed++
		if g.pace.backs == 2 && g.sys.Settle(t, g.X0) {
			g.reconsider(t)
		}
	}
}

// lenience is how much more the errors of algebraic unknowns may be where no step is short
// enough otherwise, until a step passes without. One that next to nothing determines, as
// the pressure between a column of liquid and a valve about to shut, is known no better than
// the roundings of what determines it let it be.
const lenience = 1e4

// reconsider works out the rates at (t, X0) again. A step may end as far off its algebraic
// rows as the tolerance allows, which can be far where they bend: beginning there, no
// step is short enough for an error that does not come from its length.
func (g *Integrator) reconsider(t float64) {
	g.X0, g.X1 = g.X1, g.X0
	g.T1, g.known = t, false
	g.evaluate()
	g.X0, g.X1 = g.X1, g.X0
}

// shortest is the least step worth taking: below it the rounding of time spoils the rates.
func shortest(t, end float64) float64 {
	return 64 * 0x1p-52 * max(math.Abs(t), math.Abs(end-t)*0x1p-30)
}

// stepTo returns the step to try, and whether it is the rest of the way. A rest of
// less than two steps is halved, so that no tiny step is left over.
func (g *Integrator) stepTo(t, end, longest float64) (h float64, last bool) {
	h = min(g.h, longest)
	switch rest := end - t; {
	case h >= rest*(1-1e-10):
		return rest, true
	case h > rest/2:
		return rest / 2, false
	}
	return h, false
}

// attempt works out the stages of a step from (t, X0) and the new state X1. It returns
// false where the matrix is singular or a number is none.
func (g *Integrator) attempt(t, h float64) bool {
	if g.sys.Factor(1/(h*gamma)) != nil {
		return false
	}
	copy(g.f, g.rate)
	for i := range stages {
		if i > 0 {
			g.stageState(i)
			g.sys.Rates(t+stageTime[i]*h, g.at, g.f)
			g.carry(i, 1/h)
		}
		if g.drifting && i < len(drifts) {
			d := drifts[i] * h
			for k, v := range g.drift {
				g.f[k] += d * v
			}
		}
		g.sys.Solve(g.f)
		sum := 0.0
		for k, v := range g.f {
			g.u[k][i] = v
			sum += v
		}
		if sum-sum != 0 {
			clear(g.u) // a stage not worked out yet must be finite
			return false
		}
	}
	for k, v := range g.at {
		g.X1[k] = v + g.u[k][stages-1]
	}
	return true
}

// stageState sets the state at which stage i is evaluated. Stages not worked out yet
// have coefficients 0, and what stands in their place is finite.
func (g *Integrator) stageState(i int) {
	if i >= len(stageAt) {
		for k := range g.at {
			g.at[k] += g.u[k][i-1]
		}
		return
	}
	a := &stageAt[i]
	for k, x := range g.X0 {
		g.at[k] = x + dot(a, &g.u[k])
	}
}

// carry adds M Σ (C_ij/h) u_j to the right-hand side of stage i.
func (g *Integrator) carry(i int, perStep float64) {
	c := carried[i]
	for j := range c {
		c[j] *= perStep
	}
	for k, m := range g.mass {
		if m != 0 {
			g.f[k] += m * dot(&c, &g.u[k])
		}
	}
}

// miss returns the largest error of the step as a share of what is allowed.
func (g *Integrator) miss() float64 {
	most := 0.0
	for k := range g.u {
		if e := math.Abs(g.u[k][stages-1]) / g.size(k); !(e <= most) {
			most = e
		}
	}
	return most / g.control.RelTol
}

// strictly is miss without lenience.
func (g *Integrator) strictly() float64 {
	g.lenient = false
	most := g.miss()
	g.lenient = true
	return most
}

// size is what the error of unknown k is judged by.
func (g *Integrator) size(k int) float64 {
	size := max(math.Abs(g.X0[k]), math.Abs(g.X1[k]), g.control.Scale[k])
	if g.lenient && g.mass[k] == 0 {
		size *= lenience
	}
	return size
}

// interior is how much more than at its end a step may err in its middle.
const interior = 2

// missBetween estimates the error in the middle of the step, as a share of what is
// allowed: one Newton step on what the polynomial leaves of the equations there. Where a
// stiff part follows something driven by time the step is exact at its end, however
// long, and this alone sees that the polynomial is not.
func (g *Integrator) missBetween(t, h float64) float64 {
	for k := range g.at {
		g.at[k] = g.At(k, 0.5)
	}
	g.sys.Rates(t+h/2, g.at, g.f)
	for k, m := range g.mass {
		if m != 0 {
			c := g.Polynomial(k)
			g.f[k] -= m / h * (c[1] + c[2] + 0.75*c[3] + 0.5*c[4])
		}
	}
	g.sys.Solve(g.f)
	copy(g.middle, g.f)
	most := 0.0
	for k, v := range g.f {
		if e := math.Abs(v) / g.size(k); !(e <= most) {
			most = e
		}
	}
	return most / g.control.RelTol
}

// Miss returns the estimate of the error of unknown k in the last step: at its end, or in
// its middle where that is larger.
func (g *Integrator) Miss(k int) float64 {
	end := g.u[k][stages-1]
	if g.drifting && math.Abs(g.middle[k]) > math.Abs(end) {
		return g.middle[k]
	}
	return end
}

// At returns unknown k at T0 + θ (T1 − T0), 0 ≤ θ ≤ 1.
func (g *Integrator) At(k int, theta float64) float64 {
	c := g.Polynomial(k)
	return (((c[4]*theta+c[3])*theta+c[2])*theta+c[1])*theta + c[0]
}

// Polynomial returns the coefficients of unknown k over the last step, by powers of θ.
func (g *Integrator) Polynomial(k int) [5]float64 {
	u, x0, x1 := &g.u[k], g.X0[k], g.X1[k]
	k1, k2, k3 := dot(&between[0], u), dot(&between[1], u), dot(&between[2], u)
	return [5]float64{x0, x1 - x0 + k1, k2 - k1, k3 - k2, -k3}
}
