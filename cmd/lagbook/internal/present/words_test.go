package present

import "testing"

func TestPolish(t *testing.T) {
	for s, want := range map[string]string{
		"116.7 °C":                    "116.7_°C",
		"highest 59.83 °C at 20 min":  "highest 59.83_°C at 20_min",
		"-0.805 %":                    "−0.805_%",
		"-0.4158 ± 2.139i":            "−0.4158 ±_2.139i",
		"1.642e-10 m³/(Pa·s)":         "1.642×10⁻¹⁰_m³/(Pa·s)",
		"40 °C + 125 W·0.1587 K/W":    "40_°C + 125_W·0.1587_K/W",
		"exp(-3/1.4), a - b, x-1":     "exp(−3/1.4), a - b, x-1",
		"2025-03-10, 1e+09, 5e-7b":    "2025-03-10, 1×10⁹, 5e-7b",
		"module.3 (23.17 J/K)":        "module.3 (23.17_J/K)",
		"loss → junction":             "loss →_junction",
		"1. the first; ends at 40. A": "1. the first; ends at 40. A",
		"--flag -x node-2 -.5":        "--flag -x node-2 −.5",
		"1 mm · 9 m² = 3 L":           "1_mm ·_9_m² =_3_L",
		"< 125 °C, ± 0.5 K":           "<_125_°C, ±_0.5_K",
	} {
		if got := underscored(polish(s)); got != want {
			t.Errorf("%q: %q, want %q", s, got, want)
		}
	}
	if got := underscored(polishHead("flow of fins / W")); got != "flow of fins_/_W" {
		t.Errorf("%q", got)
	}
}

// underscored shows the spaces that do not break.
func underscored(s string) string {
	out := []rune(s)
	for i, r := range out {
		if r == nbsp {
			out[i] = '_'
		}
	}
	return string(out)
}
