package thermal

import "math"

// An arrangement is how the two streams of an exchanger run. Its effectiveness is what the
// stream of the smaller capacity rate changes by, as a share of the difference between the two
// entries, against ntu = UA/C_min and the ratio r = C_min/C_max in 0…1: W. M. Kays and
// A. L. London: Compact Heat Exchangers; as F. P. Incropera, D. P. DeWitt, T. L. Bergman and
// A. S. Lavine: Fundamentals of Heat and Mass Transfer, 6th ed., table 11.3, print them (the numbers
// of their equations are from memory).
type arrangement func(ntu, r float64) float64

// counterflow is eq. 11.29 of the table, written so that r = 1 is no exception.
func counterflow(ntu, r float64) float64 {
	// (1 − e)/(1 − r·e) with e = exp(−ntu·(1 − r)) = 1 − (1 − r)·m
	m := ntu
	if d := 1 - r; d > 0 {
		m = -math.Expm1(-ntu*d) / d
	}
	return m / (1 + r*m)
}

// parallelFlow is eq. 11.28.
func parallelFlow(ntu, r float64) float64 { return -math.Expm1(-ntu*(1+r)) / (1 + r) }

// bothUnmixed is crossflow with both streams unmixed, eq. 11.32: exact for r = 1, a close
// approximation below.
func bothUnmixed(ntu, r float64) float64 {
	if r*ntu < 1e-12 { // the limit of one stream that hardly changes
		return -math.Expm1(-ntu)
	}
	return -math.Expm1(math.Pow(ntu, 0.22) / r * math.Expm1(-r*math.Pow(ntu, 0.78)))
}

// smallerUnmixed is crossflow with the stream of the larger rate mixed, eq. 11.33.
func smallerUnmixed(ntu, r float64) float64 {
	own := -math.Expm1(-ntu)
	if r < 1e-12 {
		return own
	}
	return -math.Expm1(-r*own) / r
}

// smallerMixed is crossflow with the stream of the smaller rate mixed, eq. 11.34.
func smallerMixed(ntu, r float64) float64 {
	other := ntu
	if r*ntu > 1e-12 {
		other = -math.Expm1(-r*ntu) / r
	}
	return -math.Expm1(-other)
}

// shellAndTube is a shell of one pass with two, four, … passes of tubes, eqs. 11.30; of several
// such shells in series eq. 11.31.
func shellAndTube(shells int) arrangement {
	n := float64(shells)
	return func(ntu, r float64) float64 {
		root := math.Hypot(1, r)
		one := 2 / (1 + r + root/math.Tanh(ntu/n*root/2)) // 1/tanh(x/2) = (1 + e⁻ˣ)/(1 − e⁻ˣ), infinite at 0
		if r == 1 {
			return n * one / (1 + (n-1)*one)
		}
		// ((1 − ε·r)/(1 − ε))ⁿ by its logarithm, which keeps the digits as r comes to 1
		m := math.Expm1(n * math.Log1p(one*(1-r)/(1-one)))
		return m / (m + (1 - r))
	}
}

// A mixing says which of the two streams of a crossflow is mixed across its path.
type mixing int

const (
	mixesNone mixing = iota
	mixesFirst
	mixesSecond
)

// crossflow is the effectiveness for the two rates; which stream is the smaller decides.
func crossflow(m mixing, first, second float64) arrangement {
	switch {
	case m == mixesNone:
		return bothUnmixed
	case (m == mixesFirst) == (first <= second):
		return smallerMixed
	}
	return smallerUnmixed
}

// exchanged is ε·C_min in W/K, the rate at which an exchanger of conductance ua exchanges
// between two streams of these capacity rates: what leaves the first is the entry of the first
// less this share of the difference of the entries. 0 where a stream is at rest.
func exchanged(of arrangement, ua, first, second float64) float64 {
	least, most := math.Min(first, second), math.Max(first, second)
	if !(least > 0) {
		return 0
	}
	return least * of(ua/least, least/most)
}
