package study

import (
	"math"
	"slices"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// mark fills what is read from a frequency response as a whole, and says what to
// doubt of it.
func (t *FrequencyTransfer) mark(name string, h *laplace.Transfer, r *laplace.FrequencyResponse) []Warning {
	if h.Behaviour == "unstable" {
		return []Warning{{"no-steady-swing", name + ": unstable, so that no steady swing ever sets in; gain and phase are those of the equations only"}}
	}
	peak := r.Peak()
	switch {
	case h.RelativeDegree < 0:
		return []Warning{{"improper", name + ": improper, so that the gain grows with the frequency without end; a real part gives way somewhere beyond what is shown"}}
	case math.IsInf(peak.Gain, 1) && peak.Omega > 0:
		t.Undamped = markAt(peak.Omega, peak.Gain)
		return []Warning{{"undamped", name + ": an undamped pole: at its own frequency the swing grows without end, and away from it a swing of its own stays beside the one shown"}}
	case peak.Omega > 0 && !math.IsInf(peak.Omega, 1) && h.HasGain && peak.Gain > math.Abs(h.Gain)*(1+1e-9):
		t.Peak = markAt(peak.Omega, peak.Gain)
	}
	if h.HasGain && h.Gain != 0 {
		level := math.Abs(h.Gain) * math.Sqrt(0.5)
		if c, ok := r.FallsBelow(level); ok && c.Omega > 0 && !c.Capped {
			t.Cutoff = markAt(c.Omega, level)
		}
	}
	if peak.Capped {
		return []Warning{{"search-stopped", name + ": the search for the largest gain was given up"}}
	}
	return nil
}

// ripple answers for the transfer functions that lead from the unit of the ripple
// to that of the level.
func (q *FrequencyQuestion) ripple(t *FrequencyTransfer, p pair, r *laplace.FrequencyResponse) {
	from := p.from
	if !(q.Ripple > 0) || from != q.RippleUnit || p.show.unit != q.BelowUnit {
		return
	}
	b := &RippleMark{Ripple: q.Ripple, RippleUnit: from, Level: q.Below, LevelUnit: p.show.unit}
	t.Below = b
	switch c, ok := r.FallsBelow(q.Below / q.Ripple); {
	case !ok:
		b.Never = true
	case c.Omega == 0:
		b.Always = true
	default:
		omega, period := c.Omega, 2*math.Pi/c.Omega
		b.Omega, b.Period, b.Touch = &omega, &period, c.Touch
	}
}

// ParseRipple reads the amplitude of a ripple and the level it is to stay below: a
// heat flow or a difference of temperature each.
func (q *FrequencyQuestion) ParseRipple(ripple, below string) error {
	var err error
	if q.Ripple, q.RippleUnit, err = amplitude(ripple); err != nil {
		return err
	}
	q.Below, q.BelowUnit, err = amplitude(below)
	return err
}

// roundPeriods are periods a person would ask for, from ten times the slowest
// corner to where the gain is spent or a tenth of the fastest.
func roundPeriods(h *laplace.Transfer, r *laplace.FrequencyResponse) []float64 {
	lo, hi := span(h, r)
	var list []float64
	for _, t := range periods() {
		if w := 2 * math.Pi / t; w > lo/1.6 && w < hi*1.6 {
			list = append(list, w)
		}
	}
	if len(list) < 4 { // shorter or longer than people count in
		list = laplace.FrequencyGrid(lo, hi, 4)
	}
	slices.Sort(list)
	for len(list) > fewPeriods {
		list = everySecond(list)
	}
	return list
}

// fewPeriods is how many periods nobody asked for are enough.
const fewPeriods = 20

func everySecond(list []float64) []float64 {
	var few []float64
	for i := 0; i < len(list); i += 2 {
		few = append(few, list[i])
	}
	return few
}

// spent is the share of its largest below which a gain is of no more interest.
const spent = 1e-3

// span returns the frequencies between which a transfer function does something.
func span(h *laplace.Transfer, r *laplace.FrequencyResponse) (lo, hi float64) {
	c := h.Corners()
	if len(c) == 0 {
		return 2 * math.Pi / 86400, 2 * math.Pi
	}
	lo, hi = c[0].Omega/10, c[len(c)-1].Omega*10
	top := r.At(lo).Gain
	for _, x := range c {
		if g := r.At(x.Omega).Gain; !math.IsInf(g, 0) {
			top = max(top, g)
		}
	}
	if f, ok := r.FallsBelow(spent * top); ok && f.Omega > lo {
		hi = min(hi, f.Omega)
	}
	return lo, hi
}

// periods in s, longest first: 1–2–5 up to 20 s and beyond 10 d, between them as a
// clock divides.
func periods() []float64 {
	const min, h, d = 60, 3600, 86400
	list := []float64{30, min, 2 * min, 5 * min, 10 * min, 20 * min, 30 * min, h, 2 * h, 3 * h, 6 * h, 12 * h, d, 2 * d, 5 * d, 10 * d, 20 * d, 50 * d, 100 * d, 365 * d}
	for e := -9; e <= 1; e++ {
		for _, k := range []float64{1, 2, 5} {
			if t := k * math.Pow10(e); t < 30 {
				list = append(list, t)
			}
		}
	}
	for e := 8; e <= 11; e++ {
		for _, k := range []float64{1, 2, 5} {
			list = append(list, k*math.Pow10(e))
		}
	}
	slices.Sort(list)
	slices.Reverse(list)
	return list
}

// amplitude reads an amplitude in one of the units that inputs and outputs have.
func amplitude(text string) (float64, string, error) {
	v, err := quantity.Parse(text)
	if err != nil {
		return 0, "", err
	}
	for _, unit := range []string{"W", "K", "Pa", "m³/s"} {
		if d, ok := dims[unit]; !ok || v.Dim != d {
			continue
		}
		kind := quantity.Plain
		if unit == "K" || unit == "Pa" {
			kind = quantity.Difference
		}
		x, err := v.Want(dims[unit], kind)
		if err == nil && !(x > 0) {
			err = positive(text)
		}
		return x, unit, err
	}
	_, err = v.Want(dims["K"], quantity.Difference)
	return 0, "", err
}

type positive string

func (t positive) Error() string { return string(t) + ": an amplitude must be positive" }
