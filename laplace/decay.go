package laplace

import "fmt"

// Decay returns Σ a·exp(−t/τ) from t = 0 on, over terms {a, τ} with the time
// constant τ > 0 in s. Before t = 0 it holds the value it has there.
func Decay(terms [][2]float64) (Waveform, error) {
	if len(terms) == 0 {
		return Waveform{}, fmt.Errorf("there is no term")
	}
	w := Waveform{Segments: make([]Segment, 1)}
	for i, p := range terms {
		if err := finite(fmt.Sprintf("term %d", i+1), p[0], p[1]); err != nil {
			return Waveform{}, err
		}
		if !(p[1] > 0) || 1/p[1] == 0 || 1/p[1] > 1e300 {
			return Waveform{}, fmt.Errorf("the time constant of term %d is %g s, must be positive", i+1, p[1])
		}
		e := Exponential{Amplitude: complex(p[0], 0), Rate: complex(-1/p[1], 0)}
		w.Segments[0].Exp = append(w.Segments[0].Exp, e)
		w.Before += p[0]
	}
	return w, nil
}
