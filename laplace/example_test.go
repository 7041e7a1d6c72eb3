package laplace_test

import (
	"fmt"

	"gonum.org/v1/gonum/mat"

	"lagbook/laplace"
	"lagbook/laplace/matrix"
)

// ladder is two stores of 2 and 5 in a row, joined by an exchange of 4; the second
// loses 0.5 to the outside. The input flows into the first.
func ladder() *laplace.System {
	s, err := laplace.New(laplace.Realisation{
		Balance: matrix.Balance{N: 2, C: []float64{2, 5}, F: []float64{0, 4, 4, 0}, Leak: []float64{0, 0.5}},
		B:       [][]float64{{1, 0}},
		Output:  [][]float64{{1, 0}, {0, 1}},
	})
	if err != nil {
		panic(err)
	}
	return s
}

func ExampleNew() {
	for _, p := range ladder().Poles() {
		fmt.Printf("p = %.6f rad/s, time constant %.4f s\n", real(p.P), -1/real(p.P))
	}
	// Output:
	// p = -0.070689 rad/s, time constant 14.1466 s
	// p = -2.829311 rad/s, time constant 0.3534 s
}

func ExampleFromMatrices() {
	// x' = A x + B u: a mass of 1 on a spring of 4 with a damper of 0.4
	a := mat.NewDense(2, 2, []float64{0, 1, -4, -0.4})
	s, err := laplace.FromMatrices(a, mat.NewDense(2, 1, []float64{0, 1}), mat.NewDense(1, 2, []float64{1, 0}), nil)
	if err != nil {
		panic(err)
	}
	m, err := s.Step(0, 0)
	if err != nil {
		panic(err)
	}
	fmt.Printf("settles at %.3f, overshoot %.1f %%, peak after %.4f s\n", *m.Final, *m.Overshoot, *m.PeakTime)
	// Output: settles at 0.250, overshoot 72.9 %, peak after 1.5787 s
}

func ExampleSystem_Transfer() {
	h, err := ladder().Transfer(0, 1)
	if err != nil {
		panic(err)
	}
	fmt.Println(h.Form, h.Behaviour, "gain", h.Gain)
	fmt.Println("numerator", h.Numerator, "denominator", h.Denominator)
	for i, p := range h.Poles {
		fmt.Printf("%.4f carries %.1f %%\n", real(p.P), 100*h.Weights[i])
	}
	// Output:
	// strictly proper overdamped gain 2
	// numerator [0.4] denominator [0.2 2.9 1]
	// -0.0707 carries 102.6 %
	// -2.8293 carries -2.6 %
}

func ExampleSystem_Respond() {
	load, err := laplace.Pulse(laplace.PulseTrain{High: 10, Width: 3, Count: 1})
	if err != nil {
		panic(err)
	}
	r, err := ladder().Respond([]laplace.Waveform{load}, []float64{20, 20}, 60)
	if err != nil {
		panic(err)
	}
	top := r.Max(0, 0, 60)
	fmt.Printf("highest %.4f at %.3f s\n", top.Y, top.T)
	if x, ok := r.First(1, 23, 0, 60); ok {
		fmt.Printf("23 reached at %.4f s\n", x.T)
	}
	if x, ok := r.LastOutside(0, 20, 0.5, 0, 60); ok {
		fmt.Printf("within 0.5 for good after %.4f s\n", x.T)
	}
	end, _ := r.Final(0)
	fmt.Printf("in the end %g\n", end)
	// Output:
	// highest 25.2990 at 3.000 s
	// 23 reached at 2.6568 s
	// within 0.5 for good after 32.6391 s
	// in the end 20
}

func ExampleResponse_Table() {
	r, err := ladder().Respond([]laplace.Waveform{laplace.Step(0, 1, 0)}, nil, 30)
	if err != nil {
		panic(err)
	}
	t := []float64{0, 10, 20, 30}
	y := [][]float64{make([]float64, len(t)), make([]float64, len(t))}
	r.Table(t, y)
	for i := range t {
		fmt.Printf("%4g s %8.4f %8.4f\n", t[i], y[0][i], y[1][i])
	}
	// Output:
	//    0 s   0.0000   0.0000
	//   10 s   1.2013   0.9884
	//   20 s   1.7328   1.5011
	//   30 s   1.9949   1.7539
}

func ExamplePulse() {
	w, err := laplace.Pulse(laplace.PulseTrain{Low: 2, High: 5, Width: 1, Period: 4, At: 1})
	if err != nil {
		panic(err)
	}
	jumps, _ := w.JumpTimes(0, 12, 100)
	fmt.Println(w.Left(1), w.At(1), w.At(2), jumps)
	// Output: 2 5 2 [1 2 5 6 9 10]
}

func ExampleWaveform_Repeated() {
	day, err := laplace.Points([][2]float64{{0, 10}, {12, 20}, {24, 10}})
	if err != nil {
		panic(err)
	}
	year, err := day.Repeated(24)
	if err != nil {
		panic(err)
	}
	fmt.Println(year.At(6), year.At(24*100+6), year.At(24*100+18))
	// Output: 15 15 15
}
