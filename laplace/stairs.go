package laplace

// Stairs returns the wave that holds each point's value, {t, value} with t in s,
// until the next point. Before the first point it holds the first value; of two
// points at one time the second counts after it.
func Stairs(pts [][2]float64) (Waveform, error) {
	if err := checkPoints(pts); err != nil {
		return Waveform{}, err
	}
	w := Waveform{Before: pts[0][1]}
	for _, p := range pts {
		if p[0] < 0 {
			w.Before = p[1]
		}
	}
	w.Segments = []Segment{{A: w.Before}}
	for _, p := range pts {
		last := &w.Segments[len(w.Segments)-1]
		switch {
		case p[0] < 0:
		case p[0] == last.At:
			last.A = p[1]
		default:
			w.Segments = append(w.Segments, Segment{At: p[0], A: p[1]})
		}
	}
	return w, nil
}
