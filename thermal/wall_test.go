package thermal

import (
	"fmt"
	"math"
	"testing"
)

// slab is a wall of steel heated by a film on one face, the other insulated.
func slab(lumps int, h float64) string {
	return fmt.Sprintf(`
[run]
start = "0 °C"
[thermal.node.fluid]
held = "1 °C"
[thermal.node.face]
[thermal.node.back]
[thermal.resistance.film]
between = ["fluid", "face"]
film    = { coefficient = "%g W/(m²·K)", area = "2 m²" }
[thermal.wall.w]
between = ["face", "back"]
layers  = [{ conductivity = "60 W/(m·K)", density = "7800 kg/m³", specific_heat = "450 J/(kg·K)", thickness = "4 cm" }]
area    = "2 m²"
lumps   = %d
[[table]]
show  = ["back"]
times = ["0 s", "1 s"]
`, h, lumps)
}

// exactSlab is 1 − Σ C cos(ζ ξ) exp(−ζ² Fo) with ζ tan ζ = Bi, C = 4 sin ζ/(2ζ + sin 2ζ): ξ = 0 at the insulated face
// (Carslaw and Jaeger, Conduction of Heat in Solids, section 3.11; Incropera, equation 5.42).
func exactSlab(bi, xi, fo float64) float64 {
	sum := 0.0
	for n := range 60 {
		lo, hi := float64(n)*math.Pi, (float64(n)+0.5)*math.Pi
		for range 200 {
			if mid := (lo + hi) / 2; mid*math.Sin(mid) > bi*math.Cos(mid) == (n%2 == 0) {
				hi = mid
			} else {
				lo = mid
			}
		}
		z := lo
		sum += 4 * math.Sin(z) / (2*z + math.Sin(2*z)) * math.Cos(z*xi) * math.Exp(-z*z*fo)
	}
	return 1 - sum
}

// First eigenvalues of the plane wall, Incropera Table 5.1: the exact solution of this test is the published one.
func TestExactSlabIsThePublishedOne(t *testing.T) {
	for bi, zeta := range map[float64]float64{0.1: 0.3110528482002977, 1: 0.8603335890193797, 10: 1.428870011214077} {
		// far on, one exponential is left: its rate is ζ²
		a, b := 1-exactSlab(bi, 0, 20/(zeta*zeta)), 1-exactSlab(bi, 0, 21/(zeta*zeta))
		near(t, fmt.Sprintf("rate at Bi = %g", bi), math.Log(a/b), 1, 1e-6)
	}
}

// Lumps with half a resistance on either side converge to the exact slab at the second order.
func TestWallConvergesAtSecondOrder(t *testing.T) {
	alpha, l := 60/(7800*450.0), 0.04
	for _, h := range []float64{150, 1500, 15000} {
		for _, fo := range []float64{0.3, 1} {
			at := fo * l * l / alpha
			for _, place := range []struct {
				node string
				xi   float64
			}{{"back", 0}, {"face", 1}} {
				exact := exactSlab(h*l/60, place.xi, fo)
				var errors []float64
				for _, n := range []int{8, 16, 32, 64} {
					m := read(t, "slab", slab(n, h))
					errors = append(errors, math.Abs(m.Respond(at, place.node).At(0, at)-273.15-exact))
				}
				for i := 1; i < len(errors); i++ {
					if order := math.Log2(errors[i-1] / errors[i]); order < 1.9 || order > 2.2 {
						t.Errorf("h %g, Fo %g, %s: errors %.2e fall at order %.2f, want 2", h, fo, place.node, errors, order)
					}
				}
				if errors[3] > 2e-4 {
					t.Errorf("h %g, Fo %g, %s: 64 lumps are off by %.1e of the step", h, fo, place.node, errors[3])
				}
			}
		}
	}
}

// A pipeline wall warmed by hot oil, Incropera Example 5.4: 42.9 °C outside and 45.2 °C inside after 8 min (the book's
// one-term table interpolated: 0.15 and 0.2 K); the full series gives 43.0175 and 45.3635 °C with its α of 1.88e-5 m²/s.
func TestPipelineWall(t *testing.T) {
	m := read(t, "pipeline", `
[given]
k     = "63.9 W/(m·K)"
alpha = "1.88e-5 m²/s"
[run]
start = "-20 °C"
[thermal.node.oil]
held = "60 °C"
[thermal.node.inside]
[thermal.node.outside]
[thermal.resistance.film]
between = ["oil", "inside"]
film    = { coefficient = "500 W/(m²·K)", area = "1 m²" }
[thermal.wall.pipe]
between = ["inside", "outside"]
layers  = [{ conductivity = "= k", density = "7832 kg/m³", specific_heat = "= k / (alpha * 7832 kg/m³)", thickness = "40 mm" }]
area    = "1 m²"
lumps   = 100
[[table]]
show  = ["outside"]
times = ["0 s", "480 s"]
`)
	r := m.Respond(480, "outside", "inside")
	out, in := r.At(0, 480)-273.15, r.At(1, 480)-273.15
	if math.Abs(out-43.01745141519361) > 2e-3 || math.Abs(in-45.363548120648815) > 2e-3 {
		t.Errorf("%.4f °C outside, %.4f °C inside after 8 min, want 43.0175 and 45.3635", out, in)
	}
	if math.Abs(out-42.9) > 0.15 || math.Abs(in-45.2) > 0.2 {
		t.Errorf("%.2f and %.2f °C, printed 42.9 and 45.2", out, in)
	}
}

// Layers of several materials: the resistances add up to t/(kA), the capacitances to ρctA, and each layer's own area holds.
func TestLayersOfAWall(t *testing.T) {
	m := read(t, "layers", `
[thermal.node.a]
held = "100 °C"
[thermal.node.b]
held = "0 °C"
[thermal.wall.w]
between = ["a", "b"]
layers  = [{ material = "copper", thickness = "5 mm", area = "2 cm²" }, { material = "brick", thickness = "10 cm" }, { material = "aluminium", thickness = "1 cm" }]
area    = "300 cm²"
lumps   = 3
start   = "10 °C"
[[table]]
show  = ["a"]
times = ["0 s", "1 s"]
`)
	total := 5e-3/(401*2e-4) + 0.1/(0.72*300e-4) + 1e-2/(237*300e-4)
	final, _ := m.Respond(1, "flow of w").Final(0)
	near(t, "flow in the end", final, 100/total)
	store := 0.0
	for _, c := range m.Params.C {
		store += c
	}
	near(t, "heat stored", store, 8933*385*5e-3*2e-4+1920*835*0.1*300e-4+2702*903*1e-2*300e-4)
	if n := len(m.Params.C); n != 9 {
		t.Errorf("%d lumps, want 9", n)
	}
	r := m.Respond(0, "w.1", "w.9")
	near(t, "start", r.At(0, 0), 283.15)
	near(t, "start", r.At(1, 0), 283.15)
	near(t, "resistance of layer 2", m.Derived("resistance of layer 2 of w").SI, 0.1/(0.72*300e-4))
	near(t, "capacitance of layer 1", m.Derived("capacitance of layer 1 of w").SI, 8933*385*5e-3*2e-4)
}

// A slab whose faces step to one temperature, Carslaw and Jaeger, Conduction of Heat in Solids, sections 3.3 and 3.4:
// what is left of the step in the middle, with Fo = α t/L² and L the half thickness.
func TestSlabStep(t *testing.T) {
	m := read(t, "step", `
[run]
start = "1 °C"
[thermal.node.face]
held = "0 °C"
[thermal.node.middle]
[thermal.wall.half]
between = ["face", "middle"]
layers  = [{ conductivity = "1 W/(m·K)", density = "1000 kg/m³", specific_heat = "1000 J/(kg·K)", thickness = "1 cm" }]
area    = "1 m²"
lumps   = 150
[[table]]
show  = ["middle"]
times = ["0 s", "1 s"]
`)
	r := m.Respond(100, "middle")
	for fo, want := range map[float64]float64{0.05: 0.9968691954839949, 0.1: 0.9493053626844704, 0.2: 0.7723116068585906, 0.5: 0.3707774297995239, 1: 0.10797704444410901} {
		if got := r.At(0, 100*fo) - 273.15; math.Abs(got-want) > 3e-5 {
			t.Errorf("Fo = %g: %.6f of the step is left in the middle, want %.6f", fo, got, want)
		}
	}
}
