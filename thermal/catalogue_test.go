package thermal

import (
	"math"
	"testing"

	"lagbook/network"

	"pgregory.net/rapid"
)

// Oil and winding of a transformer at rated load and above, by the exponents of IEC 60076-7 (its
// characteristics for forced air, as public code citing the standard has them): top-oil rise 52 K
// with the losses (1 + R·K²)/(1 + R) to the power x = 0.8, R = 6, and the winding's gradient 26 K as
// K^y with y = 1.3, so that the flows go with the powers 1/x and 2/y of their rises.
func TestTransformerExponents(t *testing.T) {
	const R, x, y = 6, 0.8, 1.3
	oil := &falling{g: 1.0 / 52, atRise: 52, exponent: 1/x - 1} // 1 W at 52 K
	winding := &falling{g: 1.0 / 26, atRise: 26, exponent: 2/y - 1}
	for _, c := range []struct{ load, oil, gradient float64 }{
		{0.8, 58.70804176213455 - 20, 78.16120947684507 - 58.70804176213455},
		{1, 52, 26}, // the 98 °C of the standard, at 20 °C
		{1.3, 95.41071600037995 - 20, 131.97858950456498 - 95.41071600037995},
	} {
		q, _, _ := oil.Flow(c.oil, 0)
		near(t, "loss through the oil", q, (1+R*c.load*c.load)/(1+R), 1e-6) // δ: half an exponent times a millionth
		q, _, _ = winding.Flow(c.gradient, 0)
		near(t, "loss through the winding", q, c.load*c.load, 1e-6)
	}
}

// However the rise is, the law has its derivatives and is monotone, and at no rise a conductance.
func TestFallingIsSound(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		f := &falling{g: 3, atRise: rapid.Float64Range(0.1, 200).Draw(rt, "at_rise"), exponent: rapid.Float64Range(0, 3).Draw(rt, "n")}
		rise := f.atRise * math.Pow(10, rapid.Float64Range(-5, 2).Draw(rt, "log rise"))
		s := stamp(2, 0, 0)
		law := &partLaw[*falling]{network.Through{Flow: f}, f}
		h := rise * 1e-5
		jacobian(t, "falling", law, s, []float64{h, h}, 1e-6, rise, 0)
		passes(t, "falling", at(law, s, rise, 0))
		monotone(t, "falling", f, 300+rise, 300, f.atRise/1e4)
		monotone(t, "falling", f, 300, 300+rise, f.atRise/1e4)
		monotone(t, "falling, far", f, 1e9, -1e9, 1e6)
		q, _, _ := f.Flow(f.atRise, 0)
		near(t, "at the stated rise", q, f.g*f.atRise, 1e-14)
		back, _, _ := f.Flow(0, f.atRise)
		near(t, "the other way", back, -q, 1e-14)
		_, slope, _ := f.Flow(0, 0)
		if !(slope > 0) || math.IsInf(slope, 0) {
			t.Errorf("conductance %g at no rise, exponent %g", slope, f.exponent)
		}
	})
}

func TestChartedIsStraightBetweenItsPoints(t *testing.T) {
	c := &charted{name: "sink"}
	c.at.set(3, func(i int) (float64, float64) {
		return []float64{10, 30, 60}[i], []float64{2, 1.2, 0.9}[i]
	})
	for _, p := range []struct{ rise, r float64 }{{0, 2}, {5, 2}, {10, 2}, {20, 1.6}, {30, 1.2}, {45, 1.05}, {60, 0.9}, {100, 0.9}} {
		q, slope, _ := c.Flow(300+p.rise, 300)
		near(t, "flow", q, p.rise/p.r, 1e-13)
		if p.rise == 0 {
			near(t, "conductance at no rise", slope, 1/p.r, 1e-15)
		}
	}
	s := stamp(2, 0, 0)
	law := &partLaw[*charted]{network.Through{Flow: c}, c}
	for _, d := range []float64{-80, -25, -3, 4, 17, 44, 90} {
		jacobian(t, "charted", law, s, []float64{1e-4, 1e-4}, 1e-6, 350+d, 350)
		passes(t, "charted", at(law, s, 350+d, 350))
		monotone(t, "charted", c, 350+d, 350, 0.5)
	}
	if code, _ := law.Caution(at(law, s, 360, 300)); code != "" {
		t.Errorf("caution %q at the last point", code)
	}
	if code, text := law.Caution(at(law, s, 361, 300)); code == "" || text == "" {
		t.Error("no caution beyond the last point")
	}
	if _, bad := c.falls(); bad {
		t.Error("a flow that grows is taken for one that falls")
	}
	c.at.set(2, func(i int) (float64, float64) { return []float64{10, 30}[i], []float64{1, 3.5}[i] })
	if i, bad := c.falls(); !bad || i != 1 {
		t.Error("a flow that falls is not found")
	}
}

// The resistance of the moment, and its slopes by central differences.
func TestResistanceOfTheMoment(t *testing.T) {
	f := &falling{g: 2, atRise: 40, exponent: 0.5}
	r, _, _ := resistanceOf(f, 340, 300)
	near(t, "at the stated rise", r, 0.5, 1e-13)
	at10, da, db := resistanceOf(f, 310, 300)
	near(t, "at a quarter of it", at10, 0.5*2, 1e-4) // δ
	up, _, _ := resistanceOf(f, 310.01, 300)
	down, _, _ := resistanceOf(f, 309.99, 300)
	near(t, "slope", da, (up-down)/0.02, 1e-5)
	near(t, "slope the other way", db, -da, 1e-12)
	none, _, _ := resistanceOf(f, 300, 300)
	_, slope, _ := f.Flow(300, 300)
	near(t, "at no rise", none, 1/slope, 1e-2) // a millikelvin on 40 K
}
