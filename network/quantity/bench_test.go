package quantity

import "testing"

func BenchmarkParse(b *testing.B) {
	for _, s := range []string{"0.35 K/W", "40 °C", "12.5 W/(m²·K)"} {
		b.Run(s, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := Parse(s); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

func BenchmarkEval(b *testing.B) {
	e, err := Compile("= thickness/(k*area) + 0.02 K/W", testNames("thickness", "k", "area"))
	if err != nil {
		b.Fatal(err)
	}
	values := parsed(b, "2 mm", "200 W/(m·K)", "4 cm²")
	run := func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			if _, err := e.Eval(values); err != nil {
				b.Fatal(err)
			}
		}
	}
	b.Run("fractions", run)
	for i := range values {
		values[i].Exact = nil
	}
	b.Run("doubles", run)
}
