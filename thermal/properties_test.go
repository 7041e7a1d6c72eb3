package thermal

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

func curveOf(points ...[2]float64) curve {
	var c curve
	c.set(len(points), func(i int) (float64, float64) { return points[i][0], points[i][1] })
	return c
}

// The integral of a curve against the trapezoidal rule on a grid that holds its points.
func TestCurveIntegral(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		c := curveOf([2]float64{10, 1}, [2]float64{20, rapid.Float64Range(0.1, 9).Draw(rt, "y")}, [2]float64{50, 2})
		a, b := float64(rapid.IntRange(0, 80).Draw(rt, "a")), float64(rapid.IntRange(0, 80).Draw(rt, "b"))
		sum, lo, hi := 0.0, math.Min(a, b), math.Max(a, b)
		for x := lo; x < hi; x++ {
			y, _ := c.value(x)
			z, _ := c.value(x + 1)
			sum += (y + z) / 2
		}
		if got := c.between(a, b); math.Abs(got-math.Copysign(sum, a-b)) > 1e-12*math.Max(sum, 1) {
			t.Errorf("∫ from %g to %g is %.15g, want %.15g", b, a, got, math.Copysign(sum, a-b))
		}
	})
}

// A slab whose conductivity is k₀(1 + β(T − T₀)) carries k at the mean of its two temperatures:
// Carslaw and Jaeger, 2nd ed., section 1.6; here between two points of a curve, and beyond.
func TestConductivityAgainstTemperature(t *testing.T) {
	layer := &conducting{g: 2, k: curveOf([2]float64{300, 1}, [2]float64{400, 3})}
	q, da, db := layer.Flow(380, 320)
	near(t, "flow", q, 2*60*(1+0.02*50), 1e-14)
	near(t, "slope", da, 2*2.6, 1e-14)
	near(t, "slope", db, -2*1.4, 1e-14)
	// in 1,000 thin slices in series the same, each with the conductivity of its own middle
	const n = 1000
	T, most := 320.0, 0.0
	for range n {
		k, _ := layer.k.value(T)
		dT := q / (layer.g * n * k)
		k, _ = layer.k.value(T + dT/2)
		T += q / (layer.g * n * k)
		most = math.Max(most, dT)
	}
	near(t, "level after the slices", T, 380, 1e-6) // midpoint rule: (1/n)² of a term of order 1
	rapid.Check(t, func(rt *rapid.T) {
		a, b := rapid.Float64Range(250, 450).Draw(rt, "a"), rapid.Float64Range(250, 450).Draw(rt, "b")
		s := stamp(2, 0, 0)
		law := &partLaw[*conducting]{network.Through{Flow: layer}, layer}
		for _, kink := range []float64{300, 400} {
			if math.Abs(a-kink) < 1e-3 || math.Abs(b-kink) < 1e-3 {
				return
			}
		}
		jacobian(t, "layer", law, s, []float64{1e-4, 1e-4}, 1e-6, a, b)
		passes(t, "layer", at(law, s, a, b))
		monotone(t, "layer", layer, a, b, 1)
	})
}
