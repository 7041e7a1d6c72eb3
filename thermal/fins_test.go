package thermal

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// Fin efficiency against the closed form at two published fins, and its series against it.
func TestFinEfficiency(t *testing.T) {
	square := func(h, k, thick, stand, factor float64) jet { return plain(factor * h / (k * thick) * stand * stand) }
	// Holman, Example 2-8: 3 mm aluminium, 7.5 cm; heat 359 W for a metre at 250 K (it rounds m to 5.774)
	eta := finEfficiency(square(10, 200, 0.003, 0.0765, 2)).v
	if q := eta * 10 * 2 * 0.0765 * 250; math.Abs(q-359) > 1.5 {
		t.Errorf("straight fin: %.2f W, printed 359", q)
	}
	for y := 1e-12; y < 1e4; y *= 1.7 {
		x := math.Sqrt(y)
		got := finEfficiency(jet{v: y, t: 1})
		if want := math.Tanh(x) / x; math.Abs(got.v-want) > 1e-14 {
			t.Errorf("efficiency at %g: %.16g, want %.16g", x, got.v, want)
		}
		d := (finEfficiency(plain(y*(1+1e-5))).v - finEfficiency(plain(y*(1-1e-5))).v) / (2e-5 * y)
		if math.Abs(got.t-d) > 1e-5*math.Abs(d)+1e-11/y {
			t.Errorf("slope at %g: %.10g, by difference %.10g", x, got.t, d)
		}
	}
}

// Cengel, Example 9-3: base 12 by 18 cm, plates 1 mm thick and 2.4 cm high, 80 °C in air of 30 °C:
// best spacing 7.45 mm, there 14 plates and Nu = 1.307.
func TestBestSpacing(t *testing.T) {
	ra := 9.81 / 328.15 * 50 * math.Pow(0.18, 3) / (1.847e-5 * 1.847e-5) * 0.7215
	s := optimum(0.18, ra)
	if math.Abs(s-0.00745) > 1e-5 {
		t.Errorf("best spacing %.4g m, printed 7.45 mm", s)
	}
	el := ra * math.Pow(s/0.18, 4)
	if nu := channel(plain(el)).v; math.Abs(nu-1.307) > 0.001 {
		t.Errorf("Nu at the best spacing %.5g, printed 1.307", nu)
	}
	// the spacing of the formula is where plates, each of no thickness, carry most: h(s)/s is flat there
	carried := func(s float64) float64 { return channel(plain(ra*math.Pow(s/0.18, 4))).v / (s * s) }
	if !(carried(s) > carried(0.97*s) && carried(s) > carried(1.03*s)) {
		t.Error("the best spacing does not carry most")
	}
	f := cengelSink(14)
	f.width = 14*0.001 + 13*s
	g, h := f.convect(353.15, 303.15, 0)
	// 29.4 W through 14 plates, all by the channel and without the base and the efficiency; properties differ by 3 %.
	// The base between them adds a sixth.
	if plates := 2 * 14 * 0.024 * 0.18 * h.v * 50; math.Abs(plates/29.4-1) > 0.05 {
		t.Errorf("plates carry %.2f W, the example 29.4", plates)
	}
	if q := g.v * 50; !(q > 29.4 && q < 36) {
		t.Errorf("array carries %.2f W", q)
	}
}

func cengelSink(count float64) *finArray {
	return &finArray{medium: medium{pressure: 101325}, count: count, thickness: 0.001, height: 0.024, length: 0.18, width: 0.12, conductivity: 177}
}

// Ends of the channel: fully developed El/24 (Elenbaas), single plates 0.59 El^(1/4). Of the blown
// one: Re*·Pr/2, all heat the air can take; and the developing flow along a plate.
func TestChannelEnds(t *testing.T) {
	for _, c := range []struct{ got, want, within float64 }{
		{channel(plain(1e-3)).v, 1e-3 / 24, 1e-8},
		{channel(plain(1e9)).v, 0.59 * math.Pow(1e9, 0.25), 0.1},
		{blownChannel(plain(1e-4), plain(0.7)).v, 1e-4 * 0.7 / 2, 1e-11},
		{blownChannel(plain(1e8), plain(0.7)).v, 0.664 * 1e4 * math.Cbrt(0.7), 2},
		// the formula as printed, at 10: ((10·0.7/2)^−3 + (0.664·√10·0.7^⅓·√(1+3.65/√10))^−3)^(−1/3)
		{blownChannel(plain(10), plain(0.7)).v, math.Pow(math.Pow(3.5, -3)+math.Pow(0.664*math.Sqrt(10)*math.Cbrt(0.7)*math.Sqrt(1+3.65/math.Sqrt(10)), -3), -1./3), 1e-12},
	} {
		if math.Abs(c.got-c.want) > c.within {
			t.Errorf("%.8g, want %.8g", c.got, c.want)
		}
	}
}

func arrays() []*finArray {
	plates := cengelSink(14)
	blown := cengelSink(14)
	blown.blown = true
	pins := &finArray{pins: true, medium: medium{pressure: 101325}, count: 60, diameter: 0.004, height: 0.03, length: 0.1, width: 0.1, conductivity: 150}
	blownPins := *pins
	blownPins.blown = true
	return []*finArray{plates, blown, pins, &blownPins}
}

func TestJacobianOfFins(t *testing.T) {
	for i, f := range arrays() {
		law := &convecting{of: f, blown: f.blown}
		drives, steps := 0, []float64{1e-4, 1e-4}
		if f.blown {
			drives, steps = 1, append(steps, 1e-5)
		}
		s := stamp(2, 0, drives)
		rapid.Check(t, func(r *rapid.T) {
			b := rapid.Float64Range(250, 400).Draw(r, "b")
			x := []float64{b + rapid.SampledFrom([]float64{-1, 1}).Draw(r, "sign")*rapid.Float64Range(0.5, 120).Draw(r, "difference"), b}
			if f.blown {
				x = append(x, rapid.Float64Range(0.05, 20).Draw(r, "speed"))
			}
			jacobian(t, "fins", law, s, steps, 2e-5, x...)
			passes(t, "fins", at(law, s, x...))
		})
		if g, _ := f.convect(300, 300, 0); !(g.v > 0) && !f.blown {
			t.Errorf("array %d carries nothing at no difference", i)
		}
		last := 0.0
		for delta := 1.0; delta < 200; delta++ {
			g, _ := f.convect(300+delta, 300, 1)
			if q := g.v * delta; q <= last {
				t.Fatalf("array %d: %g W at %g K after %g", i, q, delta, last)
			} else {
				last = q
			}
		}
		for _, a := range []float64{-1e30, 0, 300, 1e30} {
			for _, u := range []float64{0, 1e-300, 1e5} {
				if f.blown {
					at(law, s, a, 300, u)
				} else {
					at(law, s, a, 300)
				}
				law.Caution(s)
				for _, v := range append(append([]float64{}, s.F...), s.DF...) {
					if math.IsNaN(v) || math.IsInf(v, 0) {
						t.Fatalf("array %d at %g, %g m/s: %v", i, a, u, s.DF)
					}
				}
			}
		}
	}
}
