package thermal

import (
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
)

// A partLaw is the law of a part between two nodes with one flow.
type partLaw[F network.Flow] struct {
	network.Through
	flow F
}

// coefficientFlow is a flow that is known by a coefficient in W/(m²·K) at its two levels.
type coefficientFlow interface {
	network.Flow
	Coefficient(a, b float64) (h, da, db float64)
}

// Read implements network.Readable: the coefficient where the flow has one, else the resistance of
// the moment, both as they are without scale.
func (l *partLaw[F]) Read(s *network.Stamp, _ int, grad []float64) float64 {
	var v, da, db float64
	if f, ok := any(l.flow).(coefficientFlow); ok {
		v, da, db = f.Coefficient(s.X[0], s.X[1])
	} else {
		v, da, db = resistanceOf(l.flow, s.X[0], s.X[1])
	}
	if grad != nil {
		grad[0] += da
		grad[1] += db
	}
	return v
}

// resistanceOf is the difference over the flow in K/W, with its derivatives. Of levels closer than a
// millikelvin it is that of a millikelvin between them, which a resistance that bends over kelvins
// does not tell apart.
func resistanceOf(f network.Flow, a, b float64) (r, da, db float64) {
	const apart = 1e-3
	if mid := (a + b) / 2; math.Abs(a-b) < apart {
		a, b = mid+apart/2, mid-apart/2
	}
	q, qa, qb := f.Flow(a, b)
	d := a - b
	return d / q, (q - d*qa) / (q * q), (-q - d*qb) / (q * q)
}

// ends is where a part is built.
type ends struct {
	b        *network.Builder
	from, to network.NodeID
}

// buildPart builds a resistance that is not linear, or whose scale changes otherwise than in
// steps: fresh makes the flow of one set of numbers, set writes the numbers.
func buildPart[F network.Flow](e *casefile.Element, at ends, fresh func() F, set func(v casefile.Values, f F)) casefile.Setter {
	shape := network.Shape{Name: e.FullName(), Ports: []network.NodeID{at.from, at.to}, Joins: true}
	var wave casefile.WaveSlot
	scaled := e.Has("scale")
	if scaled {
		shape.Drives, shape.Gate, wave = []string{"scale of " + e.FullName()}, 1, e.Wave("scale")
	}
	word := "resistance"
	if _, known := any(fresh()).(coefficientFlow); known {
		word = "coefficient"
	}
	shape.Readings = []string{word}
	id := at.b.Element(shape, e.Ref)
	e.Shows(word, network.Output{Reading: &network.ReadingTerm{Element: id, Sign: 1}})
	return func(v casefile.Values, p *network.Params) error {
		l, ok := p.Law[id].(*partLaw[F])
		if !ok {
			f := fresh()
			l = &partLaw[F]{network.Through{Flow: f}, f}
			p.Law[id] = l
		}
		set(v, l.flow)
		if scaled {
			p.Drive[id][0] = v.Wave[wave]
		}
		return nil
	}
}

// ohmic is a flow that is linear, for a part whose scale is not.
type ohmic struct{ g float64 }

// Flow implements network.Flow.
func (o *ohmic) Flow(a, b float64) (q, da, db float64) { return o.g * (a - b), o.g, -o.g }
