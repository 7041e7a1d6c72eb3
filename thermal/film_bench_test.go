package thermal

import "testing"

// What one evaluation of a film costs, Jacobian included.
func BenchmarkFilm(b *testing.B) {
	for _, name := range [][2]string{{"natural", "vertical plate"}, {"natural", "horizontal plate"}, {"forced", "tube"}} {
		b.Run(name[1], func(b *testing.B) {
			f := &film{correlation: correlationNamed(name[0], name[1]), medium: medium{pressure: 101325}, height: 0.3, diameter: 0.1, area: 1, efficiency: 1}
			law := &convecting{of: f, blown: name[0] == "forced"}
			s := stamp(2, 0, 1)
			b.ReportAllocs()
			for b.Loop() {
				at(law, s, 330, 300, 3)
			}
		})
	}
}
