package laplace_test

import (
	"fmt"
	"math/cmplx"

	"lagbook/laplace"
)

// The far face of an insulated slab after a step at the near one, in units of its
// diffusion time: no poles are sought.
func ExampleInvert() {
	slab := func(s complex128) complex128 { return 1 / (s * cmplx.Cosh(cmplx.Sqrt(s))) }
	out, err := laplace.Invert(slab, []float64{0.1, 0.5, 2}, laplace.InvertOptions{})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, e := range out {
		fmt.Printf("%.9f %t %t\n", e.Y, e.Trusted, e.Error < 1e-11)
	}
	// Output:
	// 0.050694637 true true
	// 0.629222570 true true
	// 0.990843010 true true
}

// A pipe's outlet one unit after a mixed tank: at the front the response jumps, which
// is said, and stating the delay brings the digits back.
func ExampleInvert_delay() {
	pipe := func(s complex128) complex128 { return cmplx.Exp(-s) / (s + 1) }
	blind, err := laplace.Invert(pipe, []float64{1}, laplace.InvertOptions{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(blind[0].Trusted, blind[0].Note)
	told, err := laplace.Invert(pipe, []float64{0.9, 1.1}, laplace.InvertOptions{Delay: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, e := range told {
		fmt.Printf("%.9f %t\n", e.Y, e.Trusted)
	}
	// Output:
	// false the response seems to jump by about 0.99 near this instant
	// 0.000000000 true
	// 0.904837418 true
}
