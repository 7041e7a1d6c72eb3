package laplace

import "math"

// Sine returns mean + amplitude·sin(omega·t + phase) from t = 0 on, omega in rad/s
// and phase in rad. Before t = 0 it holds the value it has there.
func Sine(mean, amplitude, omega, phase float64) Waveform {
	sin, cos := math.Sincos(phase)
	g := Segment{A: mean, Exp: []Exponential{{
		Amplitude: complex(amplitude*sin, -amplitude*cos), // −i·amplitude·exp(i·phase)
		Rate:      complex(0, omega),
	}}}
	return Waveform{Before: mean + amplitude*sin, Segments: []Segment{g}}
}
