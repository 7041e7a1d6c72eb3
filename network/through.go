package network

// A Flow is a law of flow between two levels: q runs from a to b, with its derivatives
// by both. It must be continuous, smooth but for kinks, finite for any finite levels,
// and q must not fall as a rises nor rise as b does.
type Flow interface {
	Flow(a, b float64) (q, da, db float64)
}

// Through is the law of an element between two ports through which a Flow runs, times
// the drive where the element has one: what leaves the first port enters the second.
type Through struct {
	Flow Flow
}

// Between adds the element of a Through. Where scaled is set its drive, scale, multiplies
// the flow, and shuts the element while it is 0.
func (b *Builder) Between(name string, from, to NodeID, scaled bool, r Ref) ElementID {
	s := Shape{Name: name, Ports: []NodeID{from, to}, Joins: true}
	if scaled {
		s.Drives, s.Gate = []string{"scale of " + name}, 1
	}
	return b.Element(s, r)
}

// Eval implements Law.
func (l *Through) Eval(s *Stamp) {
	q, da, db := l.Flow.Flow(s.X[0], s.X[1])
	n, scale := len(s.X), 1.0
	if n > 2 {
		scale = s.X[2]
		s.DF[2], s.DF[n+2] = -q, q
	}
	s.F[0], s.DF[0], s.DF[1] = -scale*q, -scale*da, -scale*db
	s.F[1], s.DF[n], s.DF[n+1] = scale*q, scale*da, scale*db
}

// Caution passes on what the Flow says about itself.
func (l *Through) Caution(s *Stamp) (code, text string) {
	if c, ok := l.Flow.(interface {
		Caution(a, b float64) (code, text string)
	}); ok {
		return c.Caution(s.X[0], s.X[1])
	}
	return "", ""
}
