package laplace

// Constant returns the wave that holds v for ever, before t = 0 too.
func Constant(v float64) Waveform {
	return Waveform{Before: v, Segments: []Segment{{A: v}}}
}

// Step returns the wave that holds from until the instant at (s) and to after it.
// An instant before 0 lies in the past: the wave is then to for ever.
func Step(from, to, at float64) Waveform {
	switch {
	case at < 0:
		return Constant(to)
	case at == 0:
		return Waveform{Before: from, Segments: []Segment{{A: to}}}
	}
	return Waveform{Before: from, Segments: []Segment{{A: from}, {At: at, A: to}}}
}
