package laplace

import "fmt"

// Points returns the wave that runs straight from point to point, {t, value} with
// t in s. Before the first point it holds the first value, after the last the
// last; a repeated time is a jump. What lies before t = 0 only counts by the value
// it reaches there, which is also the value held for t < 0.
func Points(pts [][2]float64) (Waveform, error) {
	if err := checkPoints(pts); err != nil {
		return Waveform{}, err
	}
	before, rest := fromZero(pts)
	w := Waveform{Before: before}
	if len(rest) == 0 || rest[0][0] > 0 {
		rest = append([][2]float64{{0, before}}, rest...)
	}
	for i, p := range rest {
		if i+1 < len(rest) && rest[i+1][0] == p[0] {
			continue // a jump: the value after it counts
		}
		g := Segment{At: p[0], A: p[1]}
		if i+1 < len(rest) {
			g.B = (rest[i+1][1] - p[1]) / (rest[i+1][0] - p[0])
		}
		if err := finite(fmt.Sprintf("the slope after %g s", p[0]), g.B); err != nil {
			return Waveform{}, err
		}
		w.Segments = append(w.Segments, g)
	}
	return w, nil
}

// fromZero returns the value just before t = 0 and the points at t ≥ 0.
func fromZero(pts [][2]float64) (before float64, rest [][2]float64) {
	k := 0
	for k < len(pts) && pts[k][0] < 0 {
		k++
	}
	switch {
	case k == 0:
		before = pts[0][1]
	case k == len(pts):
		before = pts[k-1][1]
	default:
		a, b := pts[k-1], pts[k]
		before = a[1] + (b[1]-a[1])*(-a[0]/(b[0]-a[0]))
	}
	return before, pts[k:]
}

func checkPoints(pts [][2]float64) error {
	if len(pts) == 0 {
		return fmt.Errorf("there is no point")
	}
	for i, p := range pts {
		if err := finite(fmt.Sprintf("point %d", i+1), p[0], p[1]); err != nil {
			return err
		}
		if i > 0 && p[0] < pts[i-1][0] {
			return fmt.Errorf("point %d at %g s lies before point %d at %g s", i+1, p[0], i, pts[i-1][0])
		}
		if i > 1 && p[0] == pts[i-2][0] {
			return fmt.Errorf("points %d to %d share the time %g s; a jump takes two", i-1, i+1, p[0])
		}
	}
	return nil
}
