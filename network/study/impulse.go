package study

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// impulsesIn returns the impulses of an output in [t0, t1], those of one instant
// together. A response, which was found, has no more jumps than it may: that is the
// only error there is. A march has none.
func impulsesIn(resp answers, out int, t0, t1 float64) []laplace.Impulse {
	closed, ok := resp.(interface {
		Impulses(out int) ([]laplace.Impulse, error)
	})
	if !ok {
		return nil
	}
	all, _ := closed.Impulses(out)
	return gathered(all, t0, t1)
}

func gathered(all []laplace.Impulse, t0, t1 float64) (list []laplace.Impulse) {
	for _, p := range all {
		if p.T < t0 || p.T > t1 {
			continue
		}
		if n := len(list); n > 0 && list[n-1].T == p.T {
			list[n-1].Weight += p.Weight
			continue
		}
		list = append(list, p)
	}
	kept := list[:0]
	for _, p := range list {
		if p.Weight != 0 {
			kept = append(kept, p)
		}
	}
	return kept
}

// impulseWords says what impulses there are: what they bring, when.
func (p Printer) impulseWords(w shown, list []laplace.Impulse) string {
	s := "an impulse of " + p.Value(list[0].Weight, impulseUnit(w.unit), "") + " at " + p.Time(list[0].T)
	if n := len(list) - 1; n > 0 {
		s += fmt.Sprintf(" and %d more", n)
	}
	return s
}

// impulseUnit is the unit of a quantity times a second: m³ of m³/s, J of W.
func impulseUnit(unit string) string {
	perSecond := quantity.Dim{0, 0, -1, 0, 0}
	return unitOf(over(dimOf(unit), perSecond))
}

// impulseWarning says that an output has impulses, nil where it has none.
func (m *Model) impulseWarning(w shown, list []laplace.Impulse) []Warning {
	if len(list) == 0 {
		return nil
	}
	return []Warning{{"impulse", w.name + " has " + m.Show.impulseWords(w, list) + ", where what it follows the derivative of jumps: " +
		"it lasts no time, stands in no number shown, and a real jump takes a time that makes of it a high short peak"}}
}
