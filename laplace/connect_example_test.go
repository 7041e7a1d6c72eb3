package laplace_test

import (
	"fmt"

	"lagbook/laplace"
)

// (1 + 3 s)/(1 + 5 s + 4 s²): coefficients ascending, as everywhere.
func ExampleFromRatio() {
	h, err := laplace.FromRatio([]float64{1, 3}, []float64{1, 5, 4})
	if err != nil {
		panic(err)
	}
	for i, p := range h.Poles {
		fmt.Printf("pole %.2f, residue %.4f\n", real(p.P), real(h.Residues[i][0]))
	}
	for _, z := range h.Zeros {
		fmt.Printf("zero %.4f\n", real(z.P))
	}
	m, err := h.Step()
	if err != nil {
		panic(err)
	}
	fmt.Printf("rises in %.3f s\n", *m.RiseTime)
	// Output:
	// pole -0.25, residue 0.0833
	// pole -1.00, residue 0.6667
	// zero -0.3333
	// rises in 4.858 s
}

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

func ExampleTransfer_Frequency() {
	h, err := ladder().Transfer(0, 1)
	if err != nil {
		panic(err)
	}
	r, err := h.Frequency()
	if err != nil {
		panic(err)
	}
	for _, omega := range laplace.FrequencyGrid(0.01, 10, 1) {
		w := r.At(omega)
		fmt.Printf("ω = %5.2f rad/s: gain %.5f, phase %7.2f°\n", w.Omega, w.Gain, w.Phase)
	}
	// Output:
	// ω =  0.01 rad/s: gain 1.98027, phase   -8.25°
	// ω =  0.10 rad/s: gain 1.15374, phase  -56.77°
	// ω =  1.00 rad/s: gain 0.13296, phase -105.42°
	// ω = 10.00 rad/s: gain 0.00385, phase -163.80°
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
