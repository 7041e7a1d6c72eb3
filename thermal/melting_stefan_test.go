package thermal

import (
	"fmt"
	"math"
	"strings"
	"testing"
)

// Stefan's problem: a half-space at its melting point, its face suddenly hotter by c·ΔT/L = Ste. The
// front has come 2λ√(αt) far and the face has taken up 2k·ΔT·√t/(√(πα)·erf λ), with λ·exp(λ²)·erf(λ) =
// Ste/√π: H. S. Carslaw and J. C. Jaeger: Conduction of Heat in Solids, 2nd ed., section 11.2 (Neumann's
// solution); V. Alexiades and A. D. Solomon: Mathematical Modeling of Melting and Freezing Processes,
// 1993, section 2.1.
//
// Here a wall of n lumps of 1 m², each with half its resistance on either side, that melts over 0.02 K. The
// front is read as the molten share of all lumps. Found are 0.016 lumps at most between the two, and 0.17 % of
// the heat, the latter at Ste = 0.1, where only eight lumps melt.
func TestStefan(t *testing.T) {
	const (
		k, rho, c, latent = 0.6, 900.0, 2000.0, 200e3
		length, n         = 0.1, 50
		at                = 3600.0
	)
	dx := length / n
	alpha := k / (rho * c)
	for _, s := range []struct{ ste, lambda float64 }{{0.1, 0.220016272742937856}, {0.5, 0.464785920646244446}, {1, 0.620062633313595496}} {
		front := 2 * s.lambda * math.Sqrt(alpha*at)
		heat := 2 * k * s.ste * latent / c * math.Sqrt(at/(math.Pi*alpha)) / math.Erf(s.lambda)
		if front > 0.9*length {
			t.Fatalf("the wall is too thin: %g m", front)
		}
		m := read(t, fmt.Sprintf("Ste %g", s.ste), stefanCase(n, fmt.Sprintf("%.15g K", 330+s.ste*latent/c)))
		var names []string
		for i := range n {
			names = append(names, fmt.Sprintf("liquid fraction of l%d", i+1), fmt.Sprintf("stored of l%d", i+1))
		}
		run := m.March(at, names...)
		molten, taken := 0.0, 0.0
		for i := range n {
			molten += run.At(2*i, at) * dx
			taken += run.At(2*i+1, at) - run.At(2*i+1, 0)
		}
		if math.Abs(molten-front) > 0.03*dx {
			t.Errorf("Ste %g: the front has come %.4g mm, want %.4g", s.ste, molten*1e3, front*1e3)
		}
		if math.Abs(taken/heat-1) > 0.003 {
			t.Errorf("Ste %g: %.5g J taken up, want %.5g", s.ste, taken, heat)
		}
		if b := run.Balance(); math.Abs(b) > 1e-6 {
			t.Errorf("Ste %g: balance %g", s.ste, b)
		}
	}
}

// stefanCase is the wall with its face held at a temperature, beginning a hair below the range in which it melts.
func stefanCase(n int, face string) string {
	var text strings.Builder
	fmt.Fprintf(&text, `
[given]
dx   = "= 0.1 m / %d"
half = "= dx / (2 * 0.6 W/(m·K) * 1 m²)"
[run]
start = "329.989 K"
[material.wax]
density       = "900 kg/m³"
specific_heat = "2 kJ/(kg·K)"
[thermal.node.face]
held = "%s"
`, n, face)
	before := "face"
	for i := 1; i <= n; i++ {
		r := "= 2 * half"
		if i == 1 {
			r = "= half"
		}
		fmt.Fprintf(&text, `
[thermal.node.l%d]
lump = { material = "wax", volume = "= dx * 1 m²", melts = { at = "330 K", over = "0.02 K", latent = "200 kJ/kg" } }
[thermal.resistance.r%d]
between = ["%s", "l%d"]
value   = "%s"
`, i, i, before, i, r)
		before = fmt.Sprintf("l%d", i)
	}
	text.WriteString("[[table]]\nshow = [\"l1\"]\ntimes = [\"0 s\", \"1 h\"]\n")
	return text.String()
}
