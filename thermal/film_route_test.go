package thermal

import (
	"math"
	"testing"

	"lagbook/network/casefile/casetest"
)

// Whole cases against a second route: the same formulas written again in arithmetic of 40 digits, and
// what the source prints, which has other tables of air.
func TestFilmsAgainstASecondRoute(t *testing.T) {
	for _, c := range []struct {
		name, source string
		hot, cold    string
		part         string
		want         float64 // W, first end to second
		published    float64 // W; 0: none
		share        float64 // by which its properties of air differ
	}{
		{"hot-water pipe", "Cengel, Heat and Mass Transfer, Example 9-1: 443 W of 6 m", "70 °C", "20 °C",
			`film = { natural = "horizontal cylinder", diameter = "8 cm", area = "1.508 m²" }`, 449.22130329297839, 443, 0.02},
		{"firescreen", "Incropera, 6th ed., Example 9.2: 1060 W", "232 °C", "23 °C",
			`film = { natural = "vertical plate", height = "0.71 m", area = "0.7242 m²" }`, 1067.7416229331979, 1060, 0.01},
		{"steam pipe in wind", "Cengel, Example 7-5: 1093 W of 1 m", "110 °C", "10 °C",
			`film = { forced = "cylinder", diameter = "10 cm", area = "0.31416 m²", speed = "8 m/s" }`, 1116.5414355632109, 1093, 0.025},
		{"duct in an attic", "Cengel, Example 8-6: h 13.5 W/(m²·K), of 20 K on 6.4 m² here", "60 °C", "80 °C",
			`film = { forced = "duct", diameter = "0.2 m", length = "8 m", area = "6.4 m²", speed = "3.75 m/s" }`, -1692.8729174584372, -13.5 * 6.4 * 20, 0.03},
		{"plate", "", "50 °C", "26 °C",
			`film = { forced = "plate", length = "0.5 m", area = "0.25 m²", speed = "2 m/s" }`, 47.008078642522492, 0, 0},
		{"upright gap", "", "20 °C", "5 °C",
			`film = { natural = "enclosure", height = "0.8 m", gap = "20 mm", area = "1 m²" }`, 27.588630181621137, 0, 0},
		{"finned sink", "", "80 °C", "30 °C",
			`fins = { count = 14, thickness = "1 mm", height = "24 mm", length = "180 mm", width = "120 mm", conductivity = "237 W/(m·K)" }`, 37.888362374584152, 0, 0},
	} {
		m := casetest.Read(t, c.name+".toml", `
[thermal.node.a]
held = "`+c.hot+`"
[thermal.node.b]
held = "`+c.cold+`"
[thermal.node.c]
capacitance = "1 J/K"
start = "20 °C"
[thermal.resistance.tie]
between = ["c", "a"]
value = "1 K/W"
[thermal.resistance.x]
between = ["a", "b"]
`+c.part+`
[[table]]
show  = ["flow of x"]
times = ["0 s", "1 s"]
`, Vocabulary()...)
		got := m.March(1, "flow of x").At(0, 1)
		if math.Abs(got-c.want) > 1e-12*math.Abs(c.want) {
			t.Errorf("%s: %.15g W, by the second route %.15g", c.name, got, c.want)
		}
		if math.Abs(got-c.published) > c.share*math.Abs(c.published) && c.published != 0 {
			t.Errorf("%s: %.4g W, %s", c.name, got, c.source)
		}
	}
}
