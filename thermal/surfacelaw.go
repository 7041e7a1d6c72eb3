package thermal

import "lagbook/network"

// A facing is the law of a surface: convection to the air and radiation to the sky, which may
// be the same node. Its ports are the surface, the air where it has a film, and the
// sky where it radiates elsewhere than to the air; its drive is the speed, where the
// fluid is blown.
type facing struct {
	of       *film // nil: no film
	radiant  radiant
	air, sky int // places of their ports; 0: none
	blown    bool
}

// Eval implements network.Law.
func (l *facing) Eval(s *network.Stamp) {
	n := len(s.X)
	if l.of != nil {
		a, b, u := l.levels(s)
		g, _ := l.of.convect(a, b, u)
		q, da, db, du := g.flow(a - b)
		l.carry(s, l.air, q, da, db)
		if l.blown {
			s.DF[n-1] -= du
			s.DF[l.air*n+n-1] += du
		}
	}
	if l.sky > 0 {
		q, da, db := l.radiant.Flow(s.X[0], s.X[l.sky])
		l.carry(s, l.sky, q, da, db)
	}
}

func (l *facing) levels(s *network.Stamp) (a, b, u float64) {
	if l.blown {
		u = s.X[len(s.X)-1]
	}
	return s.X[0], s.X[l.air], u
}

// carry takes heat q from the surface to another port.
func (l *facing) carry(s *network.Stamp, to int, q, da, db float64) {
	n := len(s.X)
	s.F[0] -= q
	s.DF[0] -= da
	s.DF[to] -= db
	s.F[to] += q
	s.DF[to*n] += da
	s.DF[to*n+to] += db
}

// Read implements network.Readable: the coefficient of the film.
func (l *facing) Read(s *network.Stamp, _ int, grad []float64) float64 {
	a, b, u := l.levels(s)
	_, h := l.of.convect(a, b, u)
	if grad != nil {
		da, db := h.slopes(a - b)
		grad[0] += da
		grad[l.air] += db
		if l.blown {
			grad[len(s.X)-1] += h.s
		}
	}
	return h.v
}

// Caution implements network.Cautious.
func (l *facing) Caution(s *network.Stamp) (code, text string) {
	if l.of == nil {
		return "", ""
	}
	return l.of.doubt(l.levels(s))
}
