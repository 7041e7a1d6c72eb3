package thermal

import (
	"math"
	"testing"

	"lagbook/network"
)

// stamp is room for a law with so many ports, unknowns and drives.
func stamp(ports, unknowns, drives int) *network.Stamp {
	rows, cols := ports+unknowns, ports+unknowns+drives
	return &network.Stamp{X: make([]float64, cols), Rate: make([]float64, cols), F: make([]float64, rows),
		DF: make([]float64, rows*cols), DStoredBy: make([]float64, unknowns)}
}

// at evaluates a law at x, in place.
func at(law network.Law, s *network.Stamp, x ...float64) *network.Stamp {
	copy(s.X, x)
	clear(s.F)
	clear(s.DF)
	s.Stored, s.DStored = 0, 0
	law.Eval(s)
	return s
}

// jacobian holds the derivatives of a law against central differences of steps h. The tolerance
// is what the difference itself leaves of the digits, and the curvature within a step.
func jacobian(t testing.TB, what string, law network.Law, s *network.Stamp, h []float64, tol float64, x ...float64) {
	t.Helper()
	at(law, s, x...)
	df, f := append([]float64(nil), s.DF...), append([]float64(nil), s.F...)
	slope := s.DStored
	near := func(name string, got, want, size float64) {
		if !(math.Abs(got-want) <= tol*(math.Abs(want)+size)) {
			t.Errorf("%s at %v: %s is %.10g, by differences %.10g", what, x, name, got, want)
		}
	}
	for j := range s.X {
		y := append([]float64(nil), x...)
		y[j] = x[j] + h[j]
		at(law, s, y...)
		up, stored := append([]float64(nil), s.F...), s.Stored
		y[j] = x[j] - h[j]
		at(law, s, y...)
		for i := range s.F {
			near("∂F"+string(rune('0'+i))+"/∂x"+string(rune('0'+j)), df[i*len(s.X)+j], (up[i]-s.F[i])/(2*h[j]), math.Abs(f[i])/math.Max(math.Abs(x[j]), 1)/100)
		}
		if j == 0 && slope != 0 {
			near("∂stored/∂x0", slope, (stored-s.Stored)/(2*h[0]), 0)
		}
	}
}

// passes checks that what leaves the first port enters the second, bit for bit.
func passes(t testing.TB, what string, s *network.Stamp) {
	t.Helper()
	if s.F[0] != -s.F[1] {
		t.Errorf("%s: %g leaves and %g enters", what, -s.F[0], s.F[1])
	}
}

// monotone checks of a flow that more at the first end is never less flow, and more at the
// second never more.
func monotone(t testing.TB, what string, f network.Flow, a, b, step float64) {
	t.Helper()
	q, da, db := f.Flow(a, b)
	more, _, _ := f.Flow(a+step, b)
	less, _, _ := f.Flow(a, b+step)
	if more < q || less > q || da < 0 || db > 0 {
		t.Errorf("%s from %g to %g: %g, %g with a hotter first end, %g with a hotter second; slopes %g, %g", what, a, b, q, more, less, da, db)
	}
}
