package thermal

import (
	"math"
	"testing"
)

// series is the exact constriction of a round source of uniform flux on a round plate, mean over the
// source or in its middle, in K/W: Yovanovich, Muzychka and Culham, J. Thermophysics
// and Heat Transfer 13 (1999) 495.
func series(a, b, t, k, h float64, middle bool) float64 {
	e, tau, biot := a/b, t/b, h*b/k
	sum, z := 0.0, 3.8317
	const terms = 3000
	for range terms {
		for range 3 { // Newton for J1(z) = 0
			z -= math.J1(z) / (math.J0(z) - math.J1(z)/z)
		}
		tanh := math.Tanh(z * tau)
		phi := (tanh + z/biot) / (1 + z/biot*tanh)
		j := math.J0(z)
		w := 4 * math.J1(z*e) * math.J1(z*e) / (e * e * z * z * z * j * j)
		if middle {
			w = 2 * math.J1(z*e) / (e * z * z * j * j)
		}
		sum += w * phi
		z += math.Pi
	}
	return sum / (math.Pi * k * b)
}

// The closed form is within 10 % of the exact series up to Bi = 0.1 and within 15 % at Bi = 1, or else within 2 % of the
// whole rise, where the source is no more than 0.6 of the plate across; what the plate conducts
// straight through is exact.
func TestSpreadingAgainstTheSeries(t *testing.T) {
	const k, b = 200.0, 0.05
	for _, e := range []float64{0.1, 0.2, 0.4, 0.6} {
		for _, tau := range []float64{0.05, 0.2, 1} {
			for _, biot := range []float64{0.01, 0.1, 1} {
				a, th, h := e*b, tau*b, biot*k/b
				within := 0.1
				if biot == 1 {
					within = 0.15
				}
				for _, highest := range []bool{false, true} {
					got := spread(math.Pi*a*a, math.Pi*b*b, th, k, h, highest) - th/(k*math.Pi*b*b)
					want := series(a, b, th, k, h, highest)
					if whole := want + th/(k*math.Pi*b*b) + 1/(h*math.Pi*b*b); math.Abs(got-want) > within*want && math.Abs(got-want) > 0.02*whole {
						t.Errorf("ε %g, τ %g, Bi %g, highest %v: %.4g, series %.4g", e, tau, biot, highest, got, want)
					}
				}
			}
		}
	}
	// no constriction where the source covers the plate
	if r := spread(0.01, 0.01, 0.005, 200, 50, true); math.Abs(r-0.005/(200*0.01)) > 1e-15 {
		t.Errorf("%g", r)
	}
	// Half-space, uniform flux, mean: 8/(3π²·k·a) (Carslaw and Jaeger, 8.2). The closed form is 4 % above it.
	if r := spread(1e-6, 1, 0.2, 100, 1e6, false) * 100 * math.Sqrt(1e-6/math.Pi); math.Abs(r/(8/(3*math.Pi*math.Pi))-1) > 0.05 {
		t.Errorf("half-space: %g", r)
	}
}
