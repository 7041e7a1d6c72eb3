package laplace

import (
	"math"
	"testing"
)

// tableWaves are inputs that between them use every kind of segment.
func tableWaves(end float64) map[string]Waveform {
	points, _ := Points([][2]float64{{0, 1}, {end / 3, 4}, {end / 3, -2}, {end, 5}})
	decay, _ := Decay([][2]float64{{2, end / 7}, {-1, end / 100}})
	train, _ := Pulse(PulseTrain{Low: 0.1, High: 2, Width: end / 40, Period: end / 11, At: end / 50})
	return map[string]Waveform{
		"step":   Step(0, 1, 0),
		"points": points,
		"decay":  decay,
		"train":  train,
		"sine":   Sine(0.3, 1, 9/end, 0.4),
	}
}

// The product of two small tables and the plain sum over modes are two routes that
// share only the φ-functions.
func TestTableAgreesWithAt(t *testing.T) {
	check := func(t *testing.T, s *System, end float64) {
		for name, w := range tableWaves(end) {
			u := make([]Waveform, len(s.b))
			for i := range u {
				u[i] = w.Scaled(1 / float64(i+1))
			}
			base := make([]float64, len(s.c))
			for m := range base {
				base[m] = float64(m)
			}
			r, err := s.Respond(u, base, end)
			if err != nil {
				t.Fatal(err)
			}
			uniform, free := make([]float64, 277), make([]float64, 50)
			for i := range uniform {
				uniform[i] = end * float64(i) / 276
			}
			for i := range free {
				free[i] = end * math.Pow(10, 6*(float64(i)/49-1))
			}
			for _, times := range [][]float64{uniform, free} {
				y := make([][]float64, len(s.c))
				for m := range y {
					y[m] = make([]float64, len(times))
				}
				r.Table(times, y)
				for m := range y {
					rounding := r.Rounding(m)
					for i, v := range y[m] {
						// a uniform time is known to some units, and y with it
						want := r.At(m, times[i])
						late := math.Abs(r.At(m, times[i]*(1+8*0x1p-52)) - want)
						tol := 8*rounding + 2*late + 1e-15
						if d := math.Abs(v - want); !(d <= tol) {
							t.Fatalf("%s: output %d at %g s: %g and %g differ by %g, tolerance %g", name, m, times[i], v, want, d, tol)
						}
					}
				}
			}
		}
	}
	for _, n := range []int{1, 10, 50} {
		s := tableSystem(t, n)
		check(t, s, 5/-real(s.Poles()[0].P))
	}
	for _, c := range loadSuite(t) {
		t.Run(c.ID, func(t *testing.T) {
			s := c.system(t)
			slow := 0.0
			for _, p := range s.Poles() {
				if m := math.Abs(real(p.P)); m > 0 && slow == 0 {
					slow = m
				}
			}
			if slow == 0 {
				slow = 1
			}
			check(t, s, 3/slow)
		})
	}
}
