package laplace_test

import (
	"fmt"

	"lagbook/laplace"
)

// A heater of 2 s behind a gain of 12, and a sensor that lags by 0.5 s in the return.
func ExampleFeedback() {
	heater, err := laplace.FromRatio([]float64{12}, []float64{1, 2})
	if err != nil {
		panic(err)
	}
	sensor, err := laplace.FromRatio([]float64{1}, []float64{1, 0.5})
	if err != nil {
		panic(err)
	}
	loop, err := laplace.Feedback(heater, sensor)
	if err != nil {
		panic(err)
	}
	f := loop.TimeConstants()
	fmt.Printf("gain %.4f, lead %.2f s, %.4f rad/s with damping %.4f\n",
		f.Gain, f.Numerator[0].T, f.Denominator[0].Omega, f.Denominator[0].Zeta)
	outside, _ := loop.Outside(laplace.Region{Damping: 0.5})
	fmt.Println(len(outside), "poles are damped less than 0.5")
	// Output:
	// gain 0.9231, lead 0.50 s, 3.6056 rad/s with damping 0.3467
	// 2 poles are damped less than 0.5
}

func ExampleFrequencyResponse_FallsBelow() {
	h, err := ladder().Transfer(0, 1)
	if err != nil {
		panic(err)
	}
	r, err := h.Frequency()
	if err != nil {
		panic(err)
	}
	c, _ := r.FallsBelow(0.01)
	w := r.At(c.Omega)
	fmt.Printf("ω = %.4f rad/s: gain %.4f, phase %.1f°, lag %.3f s\n", w.Omega, w.Gain, w.Phase, w.Lag())
	// Output: ω = 6.0162 rad/s: gain 0.0100, phase -154.1°, lag 0.447 s
}
