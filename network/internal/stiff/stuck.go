package stiff

import (
	"fmt"
	"math"
)

// A Stuck error says that no step of any length worth taking meets the tolerance.
type Stuck struct {
	T, Step float64 // s; where, and the step that was still too long
	Unknown int     // whose error is the largest; -1 where a step cannot be worked out at all
}

func (e *Stuck) Error() string {
	if e.Unknown < 0 {
		return fmt.Sprintf("no step from t = %.9g s can be computed, however short (%.2g s)", e.T, e.Step)
	}
	return fmt.Sprintf("no step from t = %.9g s meets the tolerance, however short (%.2g s)", e.T, e.Step)
}

// stuck puts the state back and says what is wrong.
func (g *Integrator) stuck(t, end float64) error {
	e := &Stuck{T: t, Step: g.h, Unknown: -1}
	worst := 0.0
	for k := range g.u {
		v := math.Abs(g.u[k][stages-1]) / g.size(k)
		if v > worst && !math.IsInf(v, 0) {
			worst, e.Unknown = v, k
		}
	}
	copy(g.X1, g.X0)
	return e
}
