package quantity

import "math"

// FitTime returns the unit that suits a column of times spanning so many
// seconds, and its length in s: seconds up to 5 min, minutes up to 3 h, hours
// up to 4 d, days above; ms, µs and ns below 2 of the next.
func FitTime(spanSeconds float64) (unit string, factor float64) {
	t := math.Abs(spanSeconds)
	switch {
	case t == 0:
		return "s", 1
	case t < 2e-6:
		return "ns", 1e-9
	case t < 2e-3:
		return "µs", 1e-6
	case t < 2:
		return "ms", 1e-3
	case t <= 300:
		return "s", 1
	case t <= 3*3600:
		return "min", 60
	case t <= 4*86400:
		return "h", 3600
	}
	return "d", 86400
}

// timeUnit returns the unit for a single time: 13.2 min, 26.1 h.
func timeUnit(seconds float64) (unit string, factor float64) {
	t := math.Abs(seconds)
	switch {
	case t == 0:
		return "s", 1
	case t < 0.9995e-6:
		return "ns", 1e-9
	case t < 0.9995e-3:
		return "µs", 1e-6
	case t < 0.9995:
		return "ms", 1e-3
	case t < 120:
		return "s", 1
	case t < 120*60:
		return "min", 60
	case t < 48*3600:
		return "h", 3600
	case t < 2*365.25*86400:
		return "d", 86400
	}
	return "a", 365.25 * 86400
}

// Duration returns a time in the unit that suits it, to three significant
// digits: "13.2 min", "26.1 h".
func Duration(seconds float64) string {
	unit, factor := timeUnit(seconds)
	return Number(seconds/factor, 3) + " " + unit
}
