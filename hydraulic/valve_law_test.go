package hydraulic

import (
	"math"
	"testing"

	"lagbook/network"
)

// Published characteristics: 2 % of Kv for R = 50 is met by the straight foot only in the
// limit, above it R^(h−1) (IEC 60534-2-4).
func TestTrims(t *testing.T) {
	points := [][2]float64{{0, 0}, {0.4, 0.1}, {1, 1}}
	for _, c := range []struct {
		trim characteristic
		h    float64
		want float64
	}{
		{characteristic{trim: linearTrim}, 0.3, 0.3},
		{characteristic{trim: equalPercentage, spread: 50}, 0.5, math.Pow(50, -0.5)},
		{characteristic{trim: equalPercentage, spread: 50}, 1, 1},
		{characteristic{trim: equalPercentage, spread: 50}, 0, 0},
		{characteristic{trim: quickOpening}, 0.25, 0.5},
		{characteristic{trim: quickOpening}, 0, 0},
		{characteristic{trim: pointsTrim, points: points}, 0.7, 0.55},
		{characteristic{trim: pointsTrim, points: points}, 0, 0},
		{characteristic{trim: pointsTrim, points: points}, 1, 1},
	} {
		if got, _ := c.trim.at(c.h); math.Abs(got-c.want) > 1e-15 {
			t.Errorf("trim %d at %v: %v, want %v", c.trim.trim, c.h, got, c.want)
		}
	}
	for _, trim := range []characteristic{{trim: linearTrim}, {trim: equalPercentage, spread: 30}, {trim: quickOpening}, {trim: pointsTrim, points: points}} {
		before := math.Inf(-1)
		for h := -0.105; h < 1.1; h += 0.03 {
			share, slope := trim.at(h)
			a, _ := trim.at(h + 1e-7)
			b, _ := trim.at(h - 1e-7)
			if math.Abs((a-b)/2e-7-slope) > 1e-6 || share < before {
				t.Errorf("trim %d at %v: slope %v, by differences %v; %v after %v", trim.trim, h, slope, (a-b)/2e-7, share, before)
			}
			before = share
		}
	}
}

func valveOf(kv, density float64, c choke) *valveLaw {
	a := kv / 3600 * math.Sqrt(waterDensity/oneBar)
	return &valveLaw{open: rooted(a/math.Sqrt(density), a, 0), choke: c}
}

// IEC 60534-2-1, example 1 (from memory): water at 363 K, 360 m³/h from 680 to 220 kPa
// absolute, FL = 0.90: Kv = 165, FF = 0.944, not choked (dp choked 497 kPa).
func TestLiquidSizing(t *testing.T) {
	const density, vapour, critical = 965.4, 70100, 22.12e6
	ff := criticalRatio(vapour, critical)
	if math.Abs(ff-0.9442375225233299) > 1e-15 {
		t.Errorf("FF = %v", ff)
	}
	v := valveOf(164.9214832948513, density, choke{checked: true, recovery: 0.81, least: ff * vapour})
	if q, _, _ := v.through(680e3, 220e3, wayOpen); math.Abs(q*3600/360-1) > 1e-9 {
		t.Errorf("%v m³/h, want 360", q*3600)
	}
	most, _ := v.choke.limit(680e3)
	if math.Abs(most/497185.2492336028-1) > 1e-12 {
		t.Errorf("chokes at %v Pa", most)
	}
	free, _, _ := v.through(680e3, 680e3-most, wayOpen)
	choked, _, db := v.through(680e3, 1e5, valveChoked)
	if math.Abs(choked/free-1) > seep || db >= 0 {
		t.Errorf("choked %v, at the limit %v; by the pressure behind it %v", choked, free, db)
	}
	if back, _, _ := v.through(1e5, 680e3, valveChoked); back != -choked {
		t.Errorf("backwards %v, forwards %v", back, free)
	}
}

// Kv 10 at 2 L/s of oil of 870 kg/m³ loses 45.1008 kPa, and its slope there is R = 2·Δp/Q
// (law). Cv over Kv is 1.1561 (tables of valve makers give 1.156).
func TestKv(t *testing.T) {
	v := valveOf(10, 870, choke{})
	q, da, _ := v.through(45100.8, 0, wayOpen)
	if math.Abs(q/0.002-1) > 1e-9 || math.Abs(1/da/45100800-1) > 1e-9 {
		t.Errorf("%v m³/s, R = %v", q, 1/da)
	}
	kv := cubicHour * math.Sqrt(waterDensity/oneBar)
	cv := gallonMinute * math.Sqrt(waterDensity/onePsi)
	if math.Abs(kv/cv/1.156099228275067-1) > 1e-9 {
		t.Errorf("Cv/Kv = %v", kv/cv)
	}
}

func TestValves(t *testing.T) {
	for _, c := range []choke{{recovery: lowRecovery}, {checked: true, recovery: 0.81, least: 2000, first: 101325, second: 99000}} {
		v := valveOf(16, 998, c)
		v.trim = characteristic{trim: equalPercentage, spread: 50}
		for _, d := range drops {
			for _, sign := range []float64{1, -1} {
				for _, h := range []float64{0, 0.1, 0.6, 0.99} {
					x := []float64{3e5, 3e5 - sign*d, h}
					for mode := range valveChoked + 1 {
						(&trial{law: v, ports: 2, x: x, step: []float64{1e-4*d + 1e-9*3e5, 1e-4*d + 1e-9*3e5, 1e-6}, mode: mode}).jacobian(t, "valve", true)
					}
				}
			}
		}
	}
}

// Shut, a valve passes nothing, and opening it lets through the slope of its trim.
func TestShutValveOpens(t *testing.T) {
	v := valveOf(16, 998, choke{recovery: lowRecovery})
	c := trial{law: v, ports: 2, x: []float64{2e5, 0, 0}}
	s := c.stamp(c.x)
	open, _, _ := v.through(2e5, 0, wayOpen)
	if s.F[0] != 0 || s.F[1] != 0 || s.DF[2] != -open || s.DF[5] != open || s.DF[0] != 0 || s.DF[4] != 0 {
		t.Errorf("F %v, DF %v, fully open %v", s.F, s.DF, open)
	}
	if code, _ := v.Caution(s); code != "" {
		t.Errorf("a shut valve warns: %s", code)
	}
	s.X[2] = 1
	if code, _ := v.Caution(s); code != "choking-unchecked" {
		t.Errorf("2 bar(a) against vacuum, no recovery stated: %q", code)
	}
}

// A valve chokes at its greatest drop, and no more once the drop has fallen below it; it
// shuts and opens with its stroke.
func TestValveTells(t *testing.T) {
	v := valveOf(165, 965.4, choke{checked: true, recovery: 0.81, least: 66e3})
	s := &network.Stamp{X: []float64{680e3, 600e3, 1}, Rate: []float64{0, 0, 0}}
	v.Begin(s, false)
	g := make([]float64, 2)
	for _, step := range []struct {
		behind, stroke float64
		what           string
	}{{1e5, 1, "chokes"}, {3e5, 1, "chokes no more"}, {3e5, 0, "shuts"}, {3e5, 0.5, "opens"}, {1e5, 0.5, "chokes"}, {1e5, 1e-6, "shuts"}} {
		s.X[1], s.X[2] = step.behind, step.stroke
		said := ""
		for k := range v.Guards(s, g) {
			if g[k] < 0 && said == "" {
				s.Mode, said, _ = v.Next(s, k)
			}
		}
		if said != step.what {
			t.Errorf("at %v it says %q", step, said)
		}
		if code, _ := v.Caution(s); (code == "choked") != (said == "chokes") {
			t.Errorf("at %v it warns %q", step, code)
		}
	}
	s.X[1], s.X[2] = 1e5, 1
	if v.Begin(s, true); s.Mode != valveChoked {
		t.Errorf("begins in mode %d where it chokes", s.Mode)
	}
}
