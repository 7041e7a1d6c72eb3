package thermal

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

// Worked examples in print, by the law alone. What "exact" says follows from the same inputs in
// arithmetic of 30 digits, with the σ of 2018 or that of the book.
func TestRadiationInPrint(t *testing.T) {
	for _, c := range []struct {
		name, source string
		k, area      float64 // k/σ in m²
		a, b         float64
		heat, within float64
		h, withinH   float64
	}{
		{"heated rod in a furnace, 1 m of it", "Kreith, Manglik, Bohn: Principles of Heat Transfer, 7th ed., example 1.4 (printed values from memory)",
			0.9 * math.Pi * 0.02, math.Pi * 0.02, 1000, 800, 1893, 1, 151, 0.5},
		{"a person in a room", "Cengel: Heat and Mass Transfer, 2nd ed., example 1-10 (from memory)",
			0.95 * 1.6, 1.6, 302, 293, 81.7, 0.06, 81.7 / (1.6 * 9), 0.005}, // the book takes 0 °C as 273 K
		{"black furnace, top to bottom", "Cengel: Heat and Mass Transfer, 2nd ed., example 13-6 (from memory)",
			25 * 0.2, 25, 1500, 800, 1319e3, 700, 1319e3 / (25 * 700.0), 0.05},
		{"black furnace, bottom to sides", "the same", 25 * 0.8, 25, 800, 500, 394e3, 700, 394e3 / (25 * 300.0), 0.1},
	} {
		r := &radiant{stefanBoltzmann * c.k, c.area}
		q, _, _ := r.Flow(c.a, c.b)
		if math.Abs(q-c.heat) > c.within {
			t.Errorf("%s: %.5g W, printed %g (%s)", c.name, q, c.heat, c.source)
		}
		if h, _, _ := r.Coefficient(c.a, c.b); math.Abs(h-c.h) > c.withinH {
			t.Errorf("%s: h_r = %.5g, want %g (%s)", c.name, h, c.h, c.source)
		}
	}
}

// The law has its derivatives, passes on what it takes, and more is never less, over all that a
// body or a search may see. Its coefficient is the flow over area and difference.
func TestRadiationIsSound(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		a, b := rapid.Float64Range(100, 4000).Draw(rt, "a"), rapid.Float64Range(100, 4000).Draw(rt, "b")
		r := &radiant{stefanBoltzmann * rapid.Float64Range(1e-4, 1e3).Draw(rt, "εFA"), 0.7}
		s := stamp(2, 0, 1)
		law := &partLaw[*radiant]{network.Through{Flow: r}, r}
		jacobian(t, "radiation", law, s, []float64{1e-3, 1e-3, 1e-3}, 1e-6, a, b, 0.5)
		passes(t, "radiation", at(law, s, a, b, 0.5))
		monotone(t, "radiation", r, a-2000, b-2000, 1)
		monotone(t, "radiation", r, a*1e3, b*1e3, 1)
		q, _, _ := r.Flow(a, b)
		h, da, db := r.Coefficient(a, b)
		near(t, "coefficient", h*r.area*(a-b), q, 1e-12)
		up, _, _ := r.Coefficient(a+1e-2, b)
		down, _, _ := r.Coefficient(a-1e-2, b)
		near(t, "its slope", da, (up-down)/2e-2, 1e-6)
		up, _, _ = r.Coefficient(a, b+1e-2)
		down, _, _ = r.Coefficient(a, b-1e-2)
		near(t, "its slope", db, (up-down)/2e-2, 1e-6)
	})
}

// Two levels a hair apart keep their digits.
func TestRadiationOfASmallDifference(t *testing.T) {
	r := &radiant{1, 1}
	a := 300.0000001
	d := a - 300
	q, _, _ := r.Flow(a, 300)
	near(t, "heat", q, d*(4*300*300*300+6*300*300*d), 1e-14)
}
