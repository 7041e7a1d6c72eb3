package draw

import (
	"cmp"
	"math"
	"slices"
	"strconv"
	"strings"
)

// A scale maps numbers to the share of an axis, 0 at its beginning and 1 at its end.
type scale struct {
	share func(v float64) float64
	ticks []tick
}

// A tick without a label is a minor one.
type tick struct {
	at    float64
	label string
}

// linear is a scale from lo to hi with round steps out of steps, times a power of ten.
func linear(lo, hi float64, about int, steps []float64) scale {
	s := scale{share: func(v float64) float64 { return (v - lo) / (hi - lo) }}
	step := roundStep((hi-lo)/float64(about), steps)
	for k := math.Ceil(lo/step - 1e-9); k*step <= hi+1e-9*step; k++ {
		s.ticks = append(s.ticks, tick{k * step, decimal(k*step, step)})
	}
	return s
}

// ordinary are the steps of an axis in decimal numbers.
var ordinary = []float64{1, 2, 5}

// roundStep returns the least round number of at least least.
func roundStep(least float64, steps []float64) float64 {
	if len(steps) > len(ordinary) { // hours, minutes: the list as it is, while it lasts
		for _, s := range steps {
			if s >= least {
				return s
			}
		}
	}
	power := math.Pow(10, math.Floor(math.Log10(least)))
	for _, s := range ordinary {
		if s*power >= least*(1-1e-9) {
			return s * power
		}
	}
	return 10 * power
}

// timeSteps are the steps of a time axis in that unit.
func timeSteps(unit string) []float64 {
	switch unit {
	case "h":
		return []float64{0.1, 0.2, 0.5, 1, 2, 3, 6, 12, 24, 48, 96, 240}
	case "min", "s":
		return []float64{0.1, 0.2, 0.5, 1, 2, 5, 10, 15, 20, 30, 60, 120, 300, 600}
	}
	return ordinary
}

// decimal writes a number with the decimals that its step has.
func decimal(v, step float64) string {
	if math.Abs(v) < 1e-9*step {
		return "0"
	}
	if a := max(math.Abs(v), step); a >= 1e6 || step < 1e-5 {
		return minus(strconv.FormatFloat(v, 'g', 6, 64))
	}
	places := max(0, int(math.Ceil(-math.Log10(step)-1e-9)))
	s := strconv.FormatFloat(v, 'f', places, 64)
	return minus(s)
}

// minus writes the sign of a negative number as long as a plus.
func minus(s string) string { return strings.Replace(s, "-", "−", 1) }

// logarithmic is a scale from lo to hi > 0; decades are labelled, all of them or as
// many as there is room for.
func logarithmic(lo, hi float64, most int) scale {
	l, h := math.Log10(lo), math.Log10(hi)
	s := scale{share: func(v float64) float64 { return (math.Log10(v) - l) / (h - l) }}
	every := max(1, int(math.Ceil((h-l)/float64(most))))
	for e := int(math.Floor(l)); e <= int(math.Ceil(h)); e++ {
		for k := 1; k < 10; k++ {
			v := float64(k) * math.Pow(10, float64(e))
			if v < lo*(1-1e-9) || v > hi*(1+1e-9) {
				continue
			}
			t := tick{at: v}
			switch {
			case k == 1 && e%every == 0, h-l < 1.5 && (k == 2 || k == 5):
				t.label = power(float64(k), e)
			case k > 1 && (every > 1 || h-l > 7):
				continue
			}
			s.ticks = append(s.ticks, t)
		}
	}
	return s
}

// power writes k·10^e, plainly where that is short.
func power(k float64, e int) string {
	if e >= -3 && e <= 4 {
		return strconv.FormatFloat(k*math.Pow(10, float64(e)), 'f', max(0, -e), 64)
	}
	return strconv.FormatFloat(k, 'f', 0, 64) + "e" + strconv.Itoa(e) // as in tables: not every typeface has raised signs
}

// folded is a scale through 0 from lo to hi, logarithmic beyond ±knee and linear
// between, one decade for the linear part on each side.
func folded(lo, hi, knee float64, most int) scale {
	fold := func(v float64) float64 {
		a := math.Abs(v) / knee
		if a <= 1 {
			return v / knee
		}
		return math.Copysign(1+math.Log10(a), v)
	}
	l, h := fold(lo), fold(hi)
	s := scale{share: func(v float64) float64 { return (fold(v) - l) / (h - l) }}
	s.ticks = append(s.ticks, tick{0, "0"})
	every := max(1, int(math.Ceil((h-l)/float64(most))))
	for e := int(math.Ceil(math.Log10(knee) - 1e-9)); e < 30; e++ {
		v := math.Pow(10, float64(e))
		label := ""
		if e%every == 0 {
			label = power(1, e)
		}
		if v <= hi*(1+1e-9) {
			s.ticks = append(s.ticks, tick{v, label})
		}
		if -v >= lo*(1+1e-9) {
			if label != "" {
				label = "−" + label
			}
			s.ticks = append(s.ticks, tick{-v, label})
		}
		if v > hi && -v < lo {
			break
		}
	}
	slices.SortFunc(s.ticks, func(a, b tick) int { return cmp.Compare(a.at, b.at) })
	return s
}

// unfold is the inverse of folded: the number at a share of the axis.
func unfold(share, lo, hi, knee float64) float64 {
	fold := func(v float64) float64 {
		a := math.Abs(v) / knee
		if a <= 1 {
			return v / knee
		}
		return math.Copysign(1+math.Log10(a), v)
	}
	v := fold(lo) + share*(fold(hi)-fold(lo))
	if math.Abs(v) <= 1 {
		return v * knee
	}
	return math.Copysign(knee*math.Pow(10, math.Abs(v)-1), v)
}
