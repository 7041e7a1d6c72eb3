package hydraulic

import (
	"fmt"
	"math"
	"testing"

	"lagbook/network/casefile/casetest"

	"pgregory.net/rapid"
)

// Whatever pipe it is: it does not matter which end is named first, what came in went out
// or is stored, and a passive network never holds more energy than it was given.
func TestPipesHoldWhatTheyMust(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		bore := rapid.Float64Range(0.005, 0.3).Draw(rt, "bore")
		viscosity := math.Pow(10, rapid.Float64Range(-3.3, -1).Draw(rt, "viscosity"))
		lumps := rapid.IntRange(1, 4).Draw(rt, "lumps")
		losses := rapid.Float64Range(0, 10).Draw(rt, "losses")
		start := rapid.Float64Range(1, 20).Draw(rt, "start")
		text := func(between string) string {
			return fmt.Sprintf(`
[hydraulic]
density = "900 kg/m³"
viscosity = "%g Pa·s"
bulk_modulus = "1.5 GPa"
[hydraulic.node.a]
compliance = "1e-9 m³/Pa"
start = "%g bar"
[hydraulic.node.b]
compliance = "3e-9 m³/Pa"
start = "1 bar"
[hydraulic.line.pipe]
between = %s
start = "0 L/s"
pipe = { length = "20 m", bore = "%g m", roughness = "0.02 mm", losses = %g, lumps = %d }
`, viscosity, start, between, bore, losses, lumps)
		}
		one := casetest.Read(t, "pipe.toml", text(`["a", "b"]`), Vocabulary()...)
		other := casetest.Read(t, "pipe.toml", text(`["b", "a"]`), Vocabulary()...)
		p, q := one.March(0.5, "a", "b", "flow of pipe at a", "flow of pipe at b"), other.March(0.5, "a", "b", "flow of pipe at a", "flow of pipe at b")
		inner := 900.0 * 20 / (math.Pi / 4 * bore * bore) / float64(lumps) / 2 // of one section, per flow squared
		energy := func(at float64) float64 {
			a, b := p.At(0, at), p.At(1, at)
			return 0.5e-9*a*a + 1.5e-9*b*b + inner*p.At(2, at)*p.At(2, at)
		}
		given := energy(0) + 0.5*(start*1e5)*(start*1e5)*math.Pi/4*bore*bore*20/1.5e9 // the liquid in the pipe starts between the two
		for _, at := range []float64{0.01, 0.03, 0.1, 0.2, 0.5} {
			for k, sign := range []float64{1, 1, -1, -1} {
				if d := math.Abs(p.At(k, at) - sign*q.At(k, at)); d > 1e-5*(math.Abs(p.At(k, at))+[]float64{1e5, 1e5, 1e-6, 1e-6}[k]) {
					rt.Fatalf("output %d at %g s: %g, and %g the other way round", k, at, p.At(k, at), q.At(k, at))
				}
			}
			if e := energy(at); e > given*(1+1e-6) {
				rt.Fatalf("%g J at %g s of %g J at first", e, at, given)
			}
		}
		if b := p.Balance(); b > 1e-9 {
			rt.Fatalf("the balance closes to %g", b)
		}
	})
}
