package study

import (
	"math"
	"math/cmplx"

	"lagbook/laplace"
)

// askedEnd is the end of the run in s: [run] to where it is said, else the latest
// time any question names; false where nothing says so.
func (m *Model) askedEnd() (end float64, ok bool) {
	q, num := &m.Case.Questions, m.val.Num
	if q.HasTo {
		return num[q.To], true
	}
	for _, t := range q.Tables {
		for _, s := range t.Times {
			end = math.Max(end, num[s])
		}
		if t.HasTo {
			end = math.Max(end, num[t.To])
		}
	}
	for _, l := range q.Limits {
		after := 0.0
		if l.HasAfter {
			after = num[l.After]
		}
		if l.HasUntil {
			end = math.Max(end, num[l.Until])
		}
		if l.HasWithin {
			end = math.Max(end, after+num[l.Within])
		}
	}
	return end, end > 0
}

// settled is five of the slowest time constants, three doublings of the slowest
// growth or, where there is neither, five swings of the slowest undamped pair or 1 s.
func settled(sys *laplace.System) float64 {
	end := 1.0
	for _, p := range sys.Poles() {
		switch re := real(p.P); {
		case math.Abs(re) <= p.Radius: // at 0 or on the axis: no time constant
			if w := cmplx.Abs(p.P); w > p.Radius && end == 1 {
				end = 5 * 2 * math.Pi / w
			}
		case re < 0:
			return 5 / -re
		case re > 0:
			return 3 * math.Ln2 / re
		}
	}
	return end
}
