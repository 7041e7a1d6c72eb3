package laplace

import (
	"math"
	"slices"
	"sort"
)

// A joint is the time of several waves: the instants at which one of them begins another
// segment, up to the end of the first common period where they repeat.
type joint struct {
	times  []float64
	repeat int     // the index from which on the times repeat
	period float64 // s; 0: they do not
	near   float64 // share of a time within which two breaks count as one
}

// joinBreaks finds it. Where none repeats, all breaks are kept as they are.
func joinBreaks(w []*Waveform) (joint, error) {
	repeats := false
	for i := range w {
		w[i].check()
		if _, ok := w[i].Final(); w[i].Period > 0 && !ok {
			repeats = true
		}
	}
	if !repeats {
		j := joint{times: []float64{0}}
		for i := range w {
			for k := range w[i].Segments {
				j.times = append(j.times, w[i].Segments[k].At)
			}
		}
		j.times = distinct(j.times, 0)
		return j, nil
	}
	period, from, err := commonTurn(w)
	if err != nil {
		return joint{}, err
	}
	for i := range w {
		if why := w[i].lasts(); why != "" {
			return joint{}, &NotClosed{At: w[i].Segments[len(w[i].Segments)-1].At, Why: why}
		}
	}
	return joinOver(w, from, period)
}

// commonTurn returns the common period of waves of which one repeats, and from when on each
// does what it does for ever, but for what dies away.
func commonTurn(w []*Waveform) (period, from float64, err error) {
	list := make([]Waveform, len(w))
	for i := range w {
		list[i] = *w[i]
		if _, err := w[i].inTheLongRun(i); err != nil {
			return 0, 0, &NotClosed{At: w[i].Segments[len(w[i].Segments)-1].At, Why: "one part repeats, of another " + err.(*Unsettled).Why}
		}
	}
	return CommonPeriod(list)
}

// lasts says why a wave does not repeat exactly, although it does in the long run: its
// last segment dies away.
func (w *Waveform) lasts() string {
	if w.Period > 0 || len(w.Segments) == 0 {
		return ""
	}
	for _, e := range w.Segments[len(w.Segments)-1].Exp {
		if e.Amplitude != 0 && real(e.Rate) < 0 {
			return "one part repeats, another dies away"
		}
	}
	return ""
}

// joinOver joins the breaks up to from and over one period from there on.
func joinOver(w []*Waveform, from, period float64) (joint, error) {
	j := joint{period: period, near: sameInstant}
	end := from + period
	list := []float64{0, from}
	for i := range w {
		starts, err := w[i].starts(end, MaxBreaks)
		if err != nil {
			return joint{}, err
		}
		for _, t := range starts {
			if t < end-j.near*end {
				list = append(list, t)
			}
		}
	}
	if len(list) > MaxBreaks {
		return joint{}, &TooMany{Found: len(list), Limit: MaxBreaks}
	}
	j.times = apartFrom(list, j.near)
	j.repeat = sort.Search(len(j.times), func(i int) bool { return j.times[i] > from }) - 1 // from, or the break that is one with it
	j.times[j.repeat] = from
	return j, nil
}

// apartFrom sorts instants and keeps the first of those that differ by a share near of
// themselves only: repeated breaks of two waves that are one but for rounding.
func apartFrom(t []float64, near float64) []float64 {
	slices.Sort(t)
	n := min(len(t), 1)
	for _, next := range t[n:] {
		if next-t[n-1] > near*next {
			t[n] = next
			n++
		}
	}
	return t[:n]
}

// law returns what the wave does from t on, as a segment that begins at 0; breaks within
// the share near of t count as t.
func (w *Waveform) law(t, near float64) Segment {
	if len(w.Segments) == 0 {
		return Segment{A: w.Before}
	}
	n, k := w.locate(t+near*t, false)
	tau := t - w.start(n, k)
	if math.Abs(tau) <= near*t {
		tau = 0
	}
	g := w.Segments[k].from(tau)
	g.At = 0
	return g
}
