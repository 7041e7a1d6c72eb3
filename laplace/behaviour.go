package laplace

import (
	"math"
	"math/cmplx"
)

// behaviour names how the response to a step moves, from the poles left after
// cancellation; empty where there is none:
//
//	"unstable"           a pole has Re p > 0, or a repeated one lies on the imaginary axis
//	"integrating"        a pole lies at 0
//	"undamped"           a pair lies on the imaginary axis
//	"underdamped"        there is a pair
//	"critically damped"  all poles are real and the slowest is repeated
//	"overdamped"         all poles are real, a single one included
//
// The first that holds. Within its error bound a pole counts as on the axis.
func behaviour(poles []Pole) string {
	var unstable, integrating, undamped, pair bool
	for _, p := range poles {
		re := real(p.P)
		switch onAxis := math.Abs(re) <= p.Radius; {
		case cmplx.Abs(p.P) <= p.Radius:
			integrating = true
		case re > 0 && !onAxis, onAxis && p.Mult > 1:
			unstable = true
		case onAxis:
			undamped = true
		case imag(p.P) != 0:
			pair = true
		}
	}
	switch {
	case len(poles) == 0:
		return ""
	case unstable:
		return "unstable"
	case integrating:
		return "integrating"
	case undamped:
		return "undamped"
	case pair:
		return "underdamped"
	case poles[0].Mult > 1:
		return "critically damped"
	}
	return "overdamped"
}
