package network

import "math"

// Laws for tests: invented numbers, shapes as in the trade.

// quadratic is the flow of an orifice, k·sign(Δ)·√|Δ|, with a laminar core below Δ = core
// that joins it with the same slope.
type quadratic struct{ k, core float64 }

func (l quadratic) Flow(a, b float64) (q, da, db float64) {
	d := a - b
	root := math.Sqrt(math.Sqrt(d*d + l.core*l.core))
	q = l.k * d / root
	slope := l.k / root * (1 - d*d/(2*(d*d+l.core*l.core)))
	return q, slope, -slope
}

// radiating is k·(a⁴ − b⁴), odd about 0.
type radiating struct{ k float64 }

func (l radiating) Flow(a, b float64) (q, da, db float64) {
	pow := func(x float64) (p, dp float64) { return x * math.Abs(x*x*x), 4 * math.Abs(x*x*x) }
	pa, dpa := pow(a)
	pb, dpb := pow(b)
	return l.k * (pa - pb), l.k * dpa, -l.k * dpb
}

// pipeDrop is r·q·√(q² + core²): turbulent with a laminar core.
type pipeDrop struct{ r, core float64 }

func (d pipeDrop) Drop(q float64) (h, dh float64) {
	root := math.Sqrt(q*q + d.core*d.core)
	return d.r * q * root, d.r * (root + q*q/root)
}

// melting stores C·x and a latent heat about a level.
type melting struct{ c, latent, at, over float64 }

func (l melting) Eval(s *Stamp) {
	u := (s.X[0] - l.at) / l.over
	s.Stored = l.c*s.X[0] + l.latent*(1+math.Tanh(u))/2
	sech := 1 / math.Cosh(min(math.Abs(u), 300))
	s.DStored = l.c + l.latent*sech*sech/(2*l.over)
}

// thermostat brings power into its first port while on, watching the second.
type thermostat struct{ power, on, off float64 }

func (l thermostat) Eval(s *Stamp) {
	if s.Mode == 0 {
		s.F[0] = l.power
	}
}

func (l thermostat) Guards(s *Stamp, g []float64) int {
	if s.Mode == 0 {
		g[0] = l.off - s.X[1]
	} else {
		g[0] = s.X[1] - l.on
	}
	return 1
}

func (l thermostat) Next(s *Stamp, _ int) (int, string, bool) {
	return 1 - s.Mode, [2]string{"off", "on"}[s.Mode], false
}

func (l thermostat) Shut(int) bool { return false }

// checking lets flow through from its first port to its second alone: open in mode 0.
type checking struct{ quadratic }

func (l checking) Eval(s *Stamp) {
	if s.Mode == 1 {
		return
	}
	q, da, db := l.Flow(s.X[0], s.X[1])
	s.F[0], s.DF[0], s.DF[1] = -q, -da, -db
	s.F[1], s.DF[2], s.DF[3] = q, da, db
}

func (l checking) Guards(s *Stamp, g []float64) int {
	if g[0] = s.X[0] - s.X[1]; s.Mode == 1 {
		g[0] = -g[0]
	}
	return 1
}

func (l checking) Next(s *Stamp, _ int) (int, string, bool) {
	return 1 - s.Mode, [2]string{"shut", "open"}[s.Mode], false
}

func (l checking) Shut(mode int) bool { return mode == 1 }

// displacing takes its drive out of the first port and brings it into the second.
type displacing struct{}

func (displacing) Eval(s *Stamp) {
	q := s.X[2]
	s.F[0], s.DF[2] = -q, -1
	s.F[1], s.DF[5] = q, 1
}

// filling has a column of its own as an unknown: l·q' = a − b − r·q|q|.
type filling struct{ l, r, core float64 }

func (f filling) Eval(s *Stamp) {
	q := s.X[2]
	h, dh := pipeDrop{f.r, f.core}.Drop(q)
	s.F[0], s.DF[2] = -q, -1
	s.F[1], s.DF[5] = q, 1
	s.F[2] = (s.X[0] - s.X[1] - h) / f.l
	s.DF[6], s.DF[7], s.DF[8] = 1/f.l, -1/f.l, -dh/f.l
}

// sluggish is a passage whose flow is an unknown: algebraic in mode 0, with a column of its
// own in mode 1.
type sluggish struct{ filling }

func (l sluggish) Algebraic(mode, _ int) bool { return mode == 0 }

// charged is gas over liquid: its law is a straight line through what it was told at the
// start, (level, stored), of which it knows the slope alone.
type charged struct{ slope float64 }

func (l charged) Eval(s *Stamp) {
	s.Stored, s.DStored = s.Mem[1]+l.slope*(s.X[0]-s.Mem[0]), l.slope
}

func (l charged) Begin(s *Stamp, steady bool) {
	s.Mem[0], s.Mem[1] = s.X[0], 7
	if steady {
		s.Mem[1] = 8
	}
}
