package study

import (
	"fmt"
	"math"
	"strings"

	"lagbook/laplace"
)

// wavePieces is how many pieces of a waveform are put in words before it is summed up.
const wavePieces = 6

// waveWords puts a waveform in words: "30 W before 0 s, 75 W from 0 s, 60 W from 8 s".
func waveWords(w laplace.Waveform, value func(float64) string, time func(float64) string) string {
	if w.Constant() {
		return value(w.At(0)) + ", constant"
	}
	text := fmt.Sprintf("%d pieces, the first from %s", len(w.Segments), value(w.At(0)))
	if len(w.Segments) <= wavePieces+1 {
		text = pieces(w, value, time)
	}
	if w.Period > 0 {
		text += ", repeated every " + time(w.Period)
		if at := w.Segments[w.Repeat].At; at > 0 {
			text += " from " + time(at)
		}
	}
	if w.Before != w.At(0) {
		text = value(w.Before) + " before 0 s, " + text
	}
	return text
}

// pieces lists the segments one by one; straight pieces that join become one.
func pieces(w laplace.Waveform, value, time func(float64) string) string {
	var b []string
	joined, at := math.NaN(), math.NaN() // where the straight piece before ends
	for i, s := range w.Segments {
		end, open := pieceEnd(w, i)
		switch {
		case len(s.Exp) > 0:
			b, joined = append(b, exponentialWords(s, value, time)), math.NaN()
		case len(s.Poly) > 0 && open:
			b = append(b, "from "+value(s.A)+" at "+time(s.At)+" on along a curve")
		case len(s.Poly) > 0:
			to := w.Left(end)
			b = append(b, "curved from "+value(s.A)+" at "+time(s.At)+" to "+value(to)+" at "+time(end))
			joined, at = to, end
		case s.B != 0 && open:
			b = append(b, "from "+value(s.A)+" at "+time(s.At)+" straight on by "+value(s.B)+" a second")
		case s.B != 0:
			to := s.A + s.B*(end-s.At)
			if math.Abs(to) < 1e-12*math.Abs(s.A) {
				to = 0 // what it is, but for the rounding of the slope
			}
			if s.At != at || math.Abs(s.A-joined) > 1e-9*math.Abs(s.A) {
				b = append(b, "straight from "+value(s.A)+" at "+time(s.At))
			}
			b[len(b)-1] += " to " + value(to) + " at " + time(end)
			joined, at = to, end
		default:
			b, joined = append(b, value(s.A)+" from "+time(s.At)), math.NaN()
		}
	}
	return strings.Join(b, ", ")
}

// pieceEnd is where segment i ends; open where it goes on for ever.
func pieceEnd(w laplace.Waveform, i int) (end float64, open bool) {
	switch {
	case i+1 < len(w.Segments):
		return w.Segments[i+1].At, false
	case w.Period > 0:
		return w.Segments[w.Repeat].At + w.Period, false
	}
	return 0, true
}

// exponentialWords describes a sine or a decay.
func exponentialWords(s laplace.Segment, value, time func(float64) string) string {
	if len(s.Exp) == 1 && real(s.Exp[0].Rate) == 0 && imag(s.Exp[0].Rate) != 0 {
		return fmt.Sprintf("a sine of period %s about %s from %s", time(2*math.Pi/math.Abs(imag(s.Exp[0].Rate))), value(s.A), time(s.At))
	}
	return fmt.Sprintf("%d exponentials on %s from %s", len(s.Exp), value(s.A), time(s.At))
}
