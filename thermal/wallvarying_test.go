package thermal

import (
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Two stretches that meet carry the same, with slopes as differences say.
func TestMeeting(t *testing.T) {
	m := &meeting{joined: true,
		first:  conducting{g: 3, k: curveOf([2]float64{280, 0.5}, [2]float64{350, 1.5}, [2]float64{500, 1.2})},
		second: conducting{g: 20, k: curveOf([2]float64{300, 0.04})}}
	rapid.Check(t, func(r *rapid.T) {
		a, b := rapid.Float64Range(250, 600).Draw(r, "a"), rapid.Float64Range(250, 600).Draw(r, "b")
		q, da, db := m.Flow(a, b)
		T := m.meets(a, b)
		other, _, _ := m.second.Flow(T, b)
		if math.Abs(other-q) > 1e-11*(math.Abs(q)+100) {
			r.Fatalf("%g arrives and %g goes on", q, other)
		}
		for _, bend := range []float64{280, 300, 350, 500} {
			if math.Abs(a-bend) < 1e-3 || math.Abs(b-bend) < 1e-3 || math.Abs(T-bend) < 1e-3 {
				return
			}
		}
		const h = 1e-4
		up, _, _ := m.Flow(a+h, b)
		down, _, _ := m.Flow(a-h, b)
		near(t, "slope by a", da, (up-down)/(2*h), 1e-5)
		up, _, _ = m.Flow(a, b+h)
		down, _, _ = m.Flow(a, b-h)
		near(t, "slope by b", db, (up-down)/(2*h), 1e-5)
	})
	for _, x := range []float64{-1e30, 0, 300, 1e30} {
		for _, y := range []float64{-1e30, 0, 300, 1e30} {
			if q, da, db := m.Flow(x, y); math.IsNaN(q+da+db) || math.IsInf(q, 0) {
				t.Errorf("from %g to %g: %g, %g, %g", x, y, q, da, db)
			}
		}
	}
}

// warmed is a slab whose conductivity and specific heat both grow by 1/400 K, from 0 °C on: the temperature's
// integral ∫(1 + T/400 K) dT then follows the linear equation (Carslaw and Jaeger, Conduction of Heat in
// Solids, sections 1.6 and 2.16).
func warmed(lumps int) string {
	return fmt.Sprintf(`
[run]
start = "0 °C"
[material.m]
density       = "2000 kg/m³"
specific_heat = [["0 °C", "800 J/(kg·K)"], ["400 °C", "1600 J/(kg·K)"]]
conductivity  = [["0 °C", "2 W/(m·K)"], ["400 °C", "4 W/(m·K)"]]
[thermal.node.face]
held = "200 °C"
[thermal.node.back]
[thermal.wall.w]
between = ["face", "back"]
layers  = [{ material = "m", thickness = "5 cm", area = "1 m²" }]
lumps   = %d
[[table]]
show  = ["back"]
times = ["0 s", "1 s"]
`, lumps)
}

func TestVaryingWallAgainstTheTransformedSlab(t *testing.T) {
	potential := func(T float64) float64 { return T + T*T/800 }
	const alpha, l = 2.0 / (2000 * 800), 0.05
	for _, fo := range []float64{0.15, 0.5} {
		at := fo * l * l / alpha
		// a held face: Bi without end
		share := 0.0
		for n := range 80 {
			z := (float64(n) + 0.5) * math.Pi
			share += 2 * math.Sin(z) / z * math.Exp(-z*z*fo)
		}
		theta := potential(200) * (1 - share)
		exact := 400 * (math.Sqrt(1+theta/200) - 1)
		var errors []float64
		for _, n := range []int{8, 16, 32} {
			errors = append(errors, math.Abs(read(t, "warmed.toml", warmed(n)).March(at, "back").At(0, at)-kelvin-exact))
		}
		for i := 1; i < len(errors); i++ {
			if order := math.Log2(errors[i-1] / errors[i]); order < 1.8 || order > 2.3 {
				t.Errorf("Fo %g: errors %.2e fall at order %.2f, want 2", fo, errors, order)
			}
		}
		if errors[2] > 0.05 {
			t.Errorf("Fo %g: 32 lumps are off by %.3f K of %.1f", fo, errors[2], exact)
		}
	}
}

// The steady flow through layers of which each has a conductivity of its own kind is exact however few the lumps:
// 0.9 W/(m·K) at the mean temperature of the first, and the second as ever; by hand from the quadratic
// q = 20·(Θ(300) − Θ(T)) = 50·0.5·(T − 20), Θ = 0.5 T + T²/1000 in °C.
func TestSteadyVaryingWall(t *testing.T) {
	m := read(t, "two.toml", `
[material.fire]
density = "1000 kg/m³"
specific_heat = "900 J/(kg·K)"
conductivity = [["0 °C", "0.5 W/(m·K)"], ["1000 °C", "2.5 W/(m·K)"]]
[thermal.node.hot]
held = "300 °C"
[thermal.node.cold]
held = "20 °C"
[thermal.wall.w]
between = ["hot", "cold"]
area = "1 m²"
layers = [{ material = "fire", thickness = "5 cm" }, { conductivity = "0.5 W/(m·K)", density = "800 kg/m³", specific_heat = "900 J/(kg·K)", thickness = "2 cm" }]
lumps = 2
[[table]]
show = ["flow of w"]
times = ["0 s", "1 s"]
`)
	theta := func(T float64) float64 { return 0.5*T + T*T/1000 }
	// 0.02 T² + 35 T − (20 Θ(300) + 500) = 0
	T := (-35 + math.Sqrt(35*35+4*0.02*(20*theta(300)+500))) / 0.04
	state := m.Operate(0)
	want := 25 * (T - 20)
	for _, name := range []string{"flow of w", "flow of w at hot", "flow of w at cold"} {
		near(t, name, m.At(state, name)[0], want, 1e-10)
	}
	if d := m.Derived("resistance of layer 2 of w"); math.Abs(d.SI-0.04) > 1e-15 {
		t.Errorf("%+v", d)
	}
}
