package thermal

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// A ladder keeps the sum of the resistances and the first moment of its impedance: Σ R_i τ_i = Σ C_k ρ_k², with ρ_k the
// resistance from cell k to the far end (the heat each capacitance holds under a steady flow, weighted by what it feels).
func TestLadderKeepsItsMoments(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, maxTerms).Draw(t, "terms")
		terms := make([]term, n)
		sum, moment, tau := 0.0, 0.0, 1e-9
		for i := range terms {
			tau *= rapid.Float64Range(1.2, 10).Draw(t, "next τ")
			terms[i] = term{math.Pow(10, rapid.Float64Range(-4, 2).Draw(t, "log R")), tau}
			sum += terms[i].r
			moment += terms[i].r * terms[i].tau
		}
		var l ladder
		l.fromFoster(terms)
		if !l.within(1e-90, 1e90) {
			return // refused by the setter: too many time constants too close together
		}
		rest, first := 0.0, 0.0
		for k := l.n - 1; k >= 0; k-- {
			rest += l.r[k]
			first += l.c[k] * rest * rest
		}
		if math.Abs(rest/sum-1) > 1e-13 || math.Abs(first/moment-1) > 1e-13 {
			t.Fatalf("ΣR %g, want %g; first moment %g, want %g", rest, sum, first, moment)
		}
	})
}

// However a wall is cut, its resistance and its capacitance are those of its layers.
func TestWallKeepsResistanceAndCapacitance(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		lumps := rapid.IntRange(1, 20).Draw(rt, "lumps")
		var layers []string
		total, store := 0.0, 0.0
		for range rapid.IntRange(1, 5).Draw(rt, "layers") {
			x := make([]float64, 5)
			for i := range x {
				x[i] = math.Pow(10, rapid.Float64Range(-2, 3).Draw(rt, "log"))
			}
			layers = append(layers, fmt.Sprintf(
				`{ conductivity = "%g W/(m·K)", density = "%g kg/m³", specific_heat = "%g J/(kg·K)", thickness = "%g m", area = "%g m²" }`, x[0], x[1], x[2], x[3], x[4]))
			total += x[3] / (x[0] * x[4])
			store += x[1] * x[2] * x[3] * x[4]
		}
		m := read(t, "wall", fmt.Sprintf(`
[thermal.node.a]
held = "1 °C"
[thermal.node.b]
held = "0 °C"
[thermal.wall.w]
between = ["a", "b"]
layers  = [%s]
lumps   = %d
[[table]]
show  = ["a"]
times = ["0 s", "1 s"]
`, strings.Join(layers, ", "), lumps))
		r, c := 0.0, 0.0
		for _, g := range m.Params.G {
			r += 1 / g
		}
		for _, x := range m.Params.C {
			c += x
		}
		if math.Abs(r/total-1) > 1e-13 || math.Abs(c/store-1) > 1e-13 {
			rt.Fatalf("resistance %g, want %g; capacitance %g, want %g", r, total, c, store)
		}
	})
}

// The same part in SI and in the units of the American trade.
func TestUnitsAgree(t *testing.T) {
	text := func(layer, film, start, drive string) string {
		return `
[thermal.node.room]
held = "` + start + `"
[thermal.node.plate]
capacitance = "` + drive + `"
[thermal.node.face]
[thermal.resistance.layer]
between = ["plate", "face"]
layer   = ` + layer + `
[thermal.resistance.film]
between = ["face", "room"]
film    = ` + film + `
[[table]]
show  = ["plate"]
times = ["0 s", "1 s"]
`
	}
	us := read(t, "US", text(`{ conductivity = "8 BTU/(h·ft·°F)", thickness = "0.25 in", area = "2 ft²" }`,
		`{ coefficient = "1.5 BTU/(h·ft²·°F)", area = "2 ft²" }`, "212 °F", "3 BTU/°F"))
	si := read(t, "SI", text(`{ conductivity = "13.84587733097113 W/(m·K)", thickness = "6.35 mm", area = "0.18580608 m²" }`,
		`{ coefficient = "8.517395011670232 W/(m²·K)", area = "0.18580608 m²" }`, "100 °C", "5697.301604148 J/K"))
	for i := range us.Params.G {
		near(t, "conductance", us.Params.G[i], si.Params.G[i], 4*0x1p-52)
	}
	near(t, "capacitance", us.Params.C[0], si.Params.C[0], 4*0x1p-52)
	near(t, "level", us.Params.Wave[0].Before, si.Params.Wave[0].Before, 4*0x1p-52)
}
