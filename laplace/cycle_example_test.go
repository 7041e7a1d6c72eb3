package laplace_test

import (
	"fmt"

	"lagbook/laplace"
	"lagbook/laplace/matrix"
)

// A load that is on for 3 s in every 10 s: what the ladder's first store does in the
// long run, and how soon a start from rest has come to it.
func ExampleSystem_Cycle() {
	s := ladder()
	load, err := laplace.Pulse(laplace.PulseTrain{High: 10, Width: 3, Period: 10})
	if err != nil {
		panic(err)
	}
	u := []laplace.Waveform{load}
	c, err := s.Cycle(u, []float64{20, 20})
	if err != nil {
		panic(err)
	}
	high, low := c.Max(0), c.Min(0)
	fmt.Printf("from %.4f at %.3f s to %.4f at %.3f s, mean %.4f\n", low.Y, low.T, high.Y, high.T, c.Mean(0))
	r, err := s.Respond(u, []float64{20, 20}, 60)
	if err != nil {
		panic(err)
	}
	a, err := c.Approach(r)
	if err != nil {
		panic(err)
	}
	n, ok, err := a.Cycles(0, 0.02)
	fmt.Println(n, "cycles until within 2 % of the swing for good", ok, err)
	// Output:
	// from 24.8880 at 0.000 s to 29.2529 at 3.000 s, mean 26.7500
	// 6 cycles until within 2 % of the swing for good true <nil>
}

// A store of 100 that loses 0.5 to the outside and, while a fan runs, 2 more. The fan
// stops from 100 s to 160 s.
func ExampleSchedule() {
	fan, err := laplace.Pulse(laplace.PulseTrain{Low: 1, High: 0, At: 100, Width: 60, Count: 1})
	if err != nil {
		panic(err)
	}
	s := laplace.Schedule{Waves: []laplace.Waveform{fan}, Pick: func(now []float64) (laplace.Kind, error) {
		sys, err := laplace.NewCarrying(laplace.Realisation{
			Balance: matrix.Balance{N: 1, C: []float64{100}, F: []float64{0}, Leak: []float64{0.5 + 2*now[0]}},
			B:       [][]float64{{1}},
			Output:  [][]float64{{1}},
		})
		return laplace.Kind{System: sys, Base: []float64{20}}, err
	}}
	r, err := s.Respond([]laplace.Waveform{laplace.Step(0, 50, 0)}, 1000)
	if err != nil {
		panic(err)
	}
	top := r.Max(0, 0, 1000)
	fmt.Printf("highest %.3f at %.1f s\n", top.Y, top.T)
	if back, ok := r.LastOutside(0, 40, 1, 0, 1000); ok {
		fmt.Printf("within 1 of 40 for good after %.2f s\n", back.T)
	}
	// Output:
	// highest 59.518 at 160.0 s
	// within 1 of 40 for good after 278.85 s
}
