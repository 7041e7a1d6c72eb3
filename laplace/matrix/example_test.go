package matrix_test

import (
	"fmt"

	"lagbook/laplace/matrix"
)

// A wall of three stores, one of which loses next to nothing: its slow pole keeps all
// its digits, although the leak is far below the rounding of the diagonal sum.
func ExampleRCWork_Modes() {
	b := matrix.Balance{N: 3, C: []float64{1, 1, 2}, F: []float64{0, 1, 0, 1, 0, 1, 0, 1, 0}, Leak: []float64{0, 0, 1e-20}}
	var w matrix.RCWork
	heated := []float64{1, 0, 0}
	m, err := w.Modes(&b, [][]float64{heated})
	if err != nil {
		panic(err)
	}
	for k, lambda := range m.Lambda {
		p := m.Port[0][k]
		fmt.Printf("pole %.6g, residue %.4f\n", -lambda, p*p)
	}
	// Output:
	// pole -2.5e-21, residue 0.2500
	// pole -0.719224, residue 0.5266
	// pole -2.78078, residue 0.2234
}

// The same wall at rest under a flow of 1: the levels are set by the leak alone.
func ExampleBalance_Eliminate() {
	b := matrix.Balance{N: 3, C: []float64{1, 1, 2}, F: []float64{0, 1, 0, 1, 0, 1, 0, 1, 0}, Leak: []float64{0, 0, 1e-20}}
	e, err := b.Eliminate()
	if err != nil {
		panic(err)
	}
	fmt.Println(e.Solve([]float64{1, 0, 0}))
	b.Leak[2] = 0
	_, err = b.Eliminate()
	fmt.Println(err)
	// Output:
	// [1e+20 1e+20 1e+20]
	// matrix: the levels of 3 stores are not determined
}

// A mass on a spring: two poles that are a pair share a block, whose φ-functions give
// the response to a step without dividing by the distance of two poles.
func ExampleDenseBlockForm() {
	f, err := matrix.DenseBlockForm(2, []float64{0, 1, -4, -0.4}, nil)
	if err != nil {
		panic(err)
	}
	for _, p := range f.Poles {
		fmt.Printf("%.4f%+.4fi\n", p.Re, p.Im)
	}
	const t = 1.5
	in, out, y := f.In([]float64{0, 1}), f.Out([]float64{1, 0}), 0.0
	for _, b := range f.Blocks {
		_, p1, _ := matrix.Phi(b.N, b.T, t)
		for i := range b.N {
			for j := range b.N {
				y += out[b.First+i] * t * p1[i*b.N+j] * in[b.First+j]
			}
		}
	}
	fmt.Printf("y(%g) = %.6f\n", t, y)
	// Output:
	// -0.2000-1.9900i
	// -0.2000+1.9900i
	// y(1.5) = 0.430034
}

// (s + 2)/(s² + 3 s + 5) in companion form has its zero at −2, exactly.
func ExampleDenseZeros() {
	z, err := matrix.DenseZeros(2, []float64{0, 1, -5, -3}, []float64{0, 1}, []float64{2, 1}, 0)
	if err != nil {
		panic(err)
	}
	fmt.Println(len(z), z[0].Re, z[0].Im)
	// Output:
	// 1 -2 0
}

// A tank and the flow in a pipe to it: stores of both kinds, coupled by K.
func ExampleStores() {
	s := matrix.Stores{
		Balance: matrix.Balance{N: 2, C: []float64{2, 0.5}, F: make([]float64, 4), Leak: []float64{0, 0.3}},
		K:       []float64{0, 1, -1, 0}, // the flow fills the tank, the tank's level holds it back
	}
	f, err := s.BlockForm()
	if err != nil {
		panic(err)
	}
	for _, p := range f.Poles {
		fmt.Printf("%.4f%+.4fi\n", p.Re, p.Im)
	}
	num, den, err := s.Ratio([]float64{0, 1}, []float64{1, 0}, 0, 0)
	fmt.Println(num, den, err)
	// Output:
	// -0.3000-0.9539i
	// -0.3000+0.9539i
	// [1] [1 0.6 1] <nil>
}
