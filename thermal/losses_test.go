package thermal

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestLossesAreSound(t *testing.T) {
	loss := &tabled{"x", curveOf([2]float64{300, 5}, [2]float64{350, 8}, [2]float64{400, 30})}
	rapid.Check(t, func(rt *rapid.T) {
		T, on := rapid.Float64Range(280, 420).Draw(rt, "T"), rapid.Float64Range(280, 420).Draw(rt, "on")
		for _, kink := range loss.loss.x {
			if math.Abs(on-kink) < 1e-3 || math.Abs(T-kink) < 1e-3 {
				return
			}
		}
		for _, f := range []factor{&doubling{"x", 300, 10}, &proportional{0.004, 300}, loss} {
			for _, sign := range []float64{1, -1} {
				law := &losing{sign, 0, f}
				s := stamp(1, 0, 1)
				jacobian(t, "loss", law, s, []float64{1e-4, 1e-3}, 1e-6, T, 12)
				y, _ := f.factor(T, follows)
				near(t, "loss", at(law, s, T, 12).F[0], sign*12*y)
				s = stamp(2, 0, 1)
				jacobian(t, "loss that follows", law, s, []float64{1e-4, 1e-4, 1e-3}, 1e-6, T, on, 12)
				y, _ = f.factor(on, follows)
				near(t, "loss that follows", at(law, s, T, on, 12).F[0], sign*12*y)
			}
		}
	})
}

// A leakage that doubles runs away in numbers: it is finite whatever the temperature, is held at a
// million times its drive once a march comes there, and says so.
func TestDoublingStaysFinite(t *testing.T) {
	d := &doubling{"leak", 300, 10}
	for _, c := range []struct {
		T    float64
		mode int
		want float64
	}{{300, follows, 1}, {310, follows, 2}, {290, follows, 0.5}, {500, follows, 1 << 20}, {510, follows, (1 << 20) * (1 + math.Ln2)},
		{1e6, isHeld, 1 << 20}, {-1e200, follows, 0}} {
		if f, slope := d.factor(c.T, c.mode); math.Abs(f-c.want) > 1e-12*c.want || math.IsNaN(slope) || math.IsInf(slope, 0) || slope < 0 {
			t.Errorf("factor at %g K is %g with slope %g, want %g", c.T, f, slope, c.want)
		}
	}
	if f, slope := d.factor(1e200, follows); math.IsInf(f, 0) || math.IsInf(slope, 0) {
		t.Errorf("factor %g with slope %g far beyond", f, slope)
	}
	law := lawOf(losing{1, 1, d}).(*leaking)
	g := make([]float64, 1)
	s := at(law, stamp(1, 0, 1), 499, 3)
	if code, _ := law.Caution(s); code != "" {
		t.Error("a caution before it is held")
	}
	if law.Guards(s, g); g[0] <= 0 {
		t.Error("held too early")
	}
	s = at(law, s, 501, 3)
	if code, text := law.Caution(s); code == "" || text == "" {
		t.Error("no caution where it is held")
	}
	if law.Guards(s, g); g[0] >= 0 {
		t.Error("not held")
	}
	s.Mode, _, _ = law.Next(s, 0)
	if law.Guards(s, g); g[0] <= 0 || at(law, s, 501, 3).F[0] != 3*(1<<20-1) {
		t.Errorf("held: guard %g, %g W", g[0], s.F[0])
	}
}
