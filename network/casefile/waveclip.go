package casefile

import (
	"math"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// stepwiseStep takes any step between waveforms that are constant between their breaks: the
// outcome is one, too. ok is false where one of them is not.
func stepwiseStep(st quantity.Step) (w laplace.Waveform, ok bool, err error) {
	var carrier laplace.Waveform // that has the breaks of all
	for i, t := range st.Terms {
		u := waveOf(t)
		if laplace.NotStairs([]laplace.Waveform{u}) >= 0 {
			return w, false, nil
		}
		if i == 0 {
			carrier = u
		} else if carrier, err = laplace.Sum(carrier, u); err != nil {
			return w, true, err
		}
	}
	x := make([]float64, len(st.Terms))
	at := func(t float64) float64 {
		for i := range st.Terms {
			x[i] = waveOf(st.Terms[i]).At(t)
		}
		return st.Function(x)
	}
	w = laplace.Waveform{Before: at(-1), Repeat: carrier.Repeat, Period: carrier.Period}
	if notFinite(w.Before) {
		return w, true, &laplace.NoValue{At: -1, Value: w.Before}
	}
	for i := range carrier.Segments {
		begin := carrier.Segments[i].At
		y := at(begin + lengthOf(&carrier, i, 1)/2)
		if notFinite(y) {
			return w, true, &laplace.NoValue{At: begin, Value: y}
		}
		w.Segments = append(w.Segments, laplace.Segment{At: begin, A: y})
	}
	return w, true, nil
}

func notFinite(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) }

// lengthOf is how long segment i of a wave lasts, or endless for one that never ends.
func lengthOf(w *laplace.Waveform, i int, endless float64) float64 {
	switch {
	case i+1 < len(w.Segments):
		return w.Segments[i+1].At - w.Segments[i].At
	case w.Period > 0:
		return w.Segments[w.Repeat].At + w.Period - w.Segments[i].At
	}
	return endless
}

// clippedStep takes min, max and abs of waveforms that run straight: they bend where the
// operands cross. The error is a *laplace.NotClosed for any other step.
func clippedStep(st quantity.Step) (laplace.Waveform, error) {
	switch st.Operation {
	case quantity.Abs: // a − 2·min(a, 0)
		a := waveOf(st.Terms[0])
		low, err := below(a)
		if err != nil {
			return low, err
		}
		return laplace.Sum(a, low.Scaled(-2))
	case quantity.Min, quantity.Max:
		w := waveOf(st.Terms[0])
		for _, t := range st.Terms[1:] {
			var err error
			if w, err = lesser(w, waveOf(t), st.Operation == quantity.Max); err != nil {
				return w, err
			}
		}
		return w, nil
	}
	return laplace.Waveform{}, &laplace.NotClosed{Why: "a function of it"}
}

// lesser returns b + min(a − b, 0), the smaller of both, or a − min(a − b, 0), the larger.
func lesser(a, b laplace.Waveform, larger bool) (laplace.Waveform, error) {
	d, err := laplace.Sum(a, b.Scaled(-1))
	if err != nil {
		return d, err
	}
	low, err := below(d)
	switch {
	case err != nil:
		return low, err
	case larger:
		return laplace.Sum(a, low.Scaled(-1))
	}
	return laplace.Sum(b, low)
}

// below returns min(w, 0) of a waveform that runs straight.
func below(w laplace.Waveform) (laplace.Waveform, error) {
	low := laplace.Waveform{Before: min(w.Before, 0), Period: w.Period}
	for i := range w.Segments {
		g := w.Segments[i]
		if len(g.Poly) > 0 || len(g.Exp) > 0 {
			return low, &laplace.NotClosed{At: g.At, Why: "a curve that may cross another"}
		}
		if i == w.Repeat {
			low.Repeat = len(low.Segments)
		}
		cross := -g.A / g.B // s after its start; NaN and ±Inf where it does not cross
		crosses := cross > 0 && cross < lengthOf(&w, i, math.Inf(1))
		at := g.At + cross
		if crosses && at == g.At || g.A == 0 { // it begins at 0, within rounding
			low.Segments = append(low.Segments, lowPart(g, g.B < 0))
			continue
		}
		low.Segments = append(low.Segments, lowPart(g, g.A < 0))
		if crosses {
			low.Segments = append(low.Segments, lowPart(laplace.Segment{At: at, B: g.B}, g.B < 0))
		}
	}
	return low, nil
}

// lowPart keeps a segment that lies below 0.
func lowPart(g laplace.Segment, is bool) laplace.Segment {
	if is {
		return g
	}
	return laplace.Segment{At: g.At}
}
