package network

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

// traced returns a trajectory of one output from a list of quartics on steps.
func traced(times []float64, curves []quartic, before float64) *Trajectory {
	t := &Trajectory{times: times, curves: [][]quartic{curves}, before: []float64{before}, breaks: times[:1], miss: make([]float64, 1), size: make([]float64, 1)}
	for _, c := range curves {
		t.size[0] = max(t.size[0], c.bound())
	}
	return t
}

// anyTrajectory draws steps of any length; neighbours join unless they jump.
func anyTrajectory(t *rapid.T) *Trajectory {
	n := rapid.IntRange(1, 6).Draw(t, "steps")
	times, curves := []float64{rapid.Float64Range(-2, 2).Draw(t, "start")}, []quartic{}
	y := rapid.Float64Range(-3, 3).Draw(t, "y")
	for range n {
		var c quartic
		for k := range c {
			c[k] = float64(rapid.IntRange(-12, 12).Draw(t, "c")) / 4
		}
		if c[0] = y; rapid.IntRange(0, 3).Draw(t, "jumps") == 0 {
			c[0] += float64(rapid.IntRange(-3, 3).Draw(t, "jump"))
		}
		curves, y = append(curves, c), c.at(1)
		times = append(times, times[len(times)-1]+rapid.Float64Range(0.1, 3).Draw(t, "length"))
	}
	return traced(times, curves, rapid.Float64Range(-3, 3).Draw(t, "before"))
}

// span draws an interval that may reach beyond the run.
func anySpan(t *rapid.T, r *Trajectory) (t0, t1 float64) {
	a, b := r.times[0], r.Until()
	t0 = rapid.Float64Range(a, b).Draw(t, "t0")
	return t0, rapid.Float64Range(t0, b+0.5).Draw(t, "t1")
}

// No sample lies above the maximum, and the maximum is a value of the output.
func TestExtremesBoundEverySample(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := anyTrajectory(t)
		t0, t1 := anySpan(t, r)
		hi, lo := r.Max(0, t0, t1), r.Min(0, t0, t1)
		for k := range 400 {
			at := min(t0+(t1-t0)*float64(k)/399, t1)
			if y := r.At(0, at); y > hi.Y+1e-12 || y < lo.Y-1e-12 {
				t.Fatalf("y(%v) = %v outside [%v, %v]", at, y, lo.Y, hi.Y)
			}
		}
		for _, e := range []struct{ T, Y, y float64 }{{hi.T, hi.Y, valueAtSide(r, hi.T, hi.AtLeft)}, {lo.T, lo.Y, valueAtSide(r, lo.T, lo.AtLeft)}} {
			if math.Abs(e.Y-e.y) > 1e-12 {
				t.Fatalf("extreme %v at %v, where the output is %v", e.Y, e.T, e.y)
			}
		}
	})
}

func valueAtSide(r *Trajectory, at float64, left bool) float64 {
	if left {
		return r.Left(0, at)
	}
	return r.At(0, at)
}

// The first crossing is where samples say it is, and the output has the level there or
// jumps over it.
func TestFirstIsFirst(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := anyTrajectory(t)
		t0, t1 := anySpan(t, r)
		level := rapid.Float64Range(-4, 4).Draw(t, "level")
		x, ok := r.First(0, level, t0, t1)
		end := min(t1, r.Until())
		if ok {
			a, b := r.Left(0, x.T)-level, r.At(0, x.T)-level
			if a*b > 1e-13 {
				t.Fatalf("at %v the output goes from %v to %v beside the level", x.T, a, b)
			}
			if x.Hi-x.Lo > 1e-15*max(1, math.Abs(x.T)) {
				t.Fatalf("bracket [%v, %v]", x.Lo, x.Hi)
			}
			end = x.T
		}
		side := 0.0
		for k := range 300 {
			at := t0 + (end-t0)*float64(k)/300
			d := r.At(0, at) - level
			if at >= end || math.Abs(d) < 1e-9 {
				continue
			}
			if side*d < 0 {
				t.Fatalf("the output crosses %v before %v, and First says %v %v", level, at, x, ok)
			}
			side = math.Copysign(1, d)
		}
	})
}

// After the last instant outside a band no sample is outside, at it the output is no
// nearer than the edge; before the first instant outside no sample is outside.
func TestOutsideIsFirstAndLast(t *testing.T) {
	const hair = 1e-9
	rapid.Check(t, func(t *rapid.T) {
		r := anyTrajectory(t)
		t0, end := r.times[0], r.Until()
		mid, band := rapid.Float64Range(-3, 3).Draw(t, "mid"), rapid.Float64Range(0, 3).Draw(t, "band")
		beyond := func(at float64) float64 {
			return max(math.Abs(r.At(0, at)-mid), math.Abs(r.Left(0, at)-mid)) - band
		}
		first, ok := r.FirstOutside(0, mid-band, mid+band, t0, end)
		last, okLast := r.LastOutside(0, mid, band, t0, end)
		if ok != okLast {
			t.Fatalf("first %v %v, last %v %v", first, ok, last, okLast)
		}
		if !ok {
			first.T, last.T = end, t0-1
		} else if beyond(first.T) < -hair || beyond(last.T) < -hair {
			t.Fatalf("first at %v, last at %v, where the output is inside by %v and %v", first.T, last.T, beyond(first.T), beyond(last.T))
		}
		for k := 1; k < 300; k++ {
			at := t0 + (end-t0)*float64(k)/300
			if (at < first.T || at > last.T) && math.Abs(r.At(0, at)-mid)-band > hair {
				t.Fatalf("outside at %v, which is not between the first %v and the last %v", at, first.T, last.T)
			}
		}
	})
}

// The integral is that of Lobatto's rule on each step, which is exact for quartics, adds
// up, and changes its sign with its direction.
func TestIntegralIsExact(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := anyTrajectory(t)
		a, c := r.times[0]-1, r.Until()+1
		b := rapid.Float64Range(a, c).Draw(t, "b")
		whole := r.Integral(0, a, c)
		if parts := r.Integral(0, a, b) - r.Integral(0, c, b); math.Abs(parts-whole) > 1e-12*100 {
			t.Fatalf("parts %v, whole %v", parts, whole)
		}
		want := r.before[0] + r.At(0, c)
		for j := range r.curves[0] {
			for k, w := range nodeWeights {
				want += w * (r.times[j+1] - r.times[j]) * r.curves[0][j].at(nodes[k])
			}
		}
		if math.Abs(want-whole) > 1e-12*100 {
			t.Fatalf("integral %v, want %v", whole, want)
		}
	})
}

// A table holds what At says.
func TestTableIsAt(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		r := anyTrajectory(t)
		at := []float64{r.times[0] - 1}
		for range 20 {
			at = append(at, at[len(at)-1]+rapid.SampledFrom([]float64{0, 0.01, 0.3, 2}).Draw(t, "step"))
		}
		for _, v := range r.times {
			k := 0
			for k < len(at) && at[k] < v {
				k++
			}
			at = append(at[:k:k], append([]float64{v}, at[k:]...)...)
		}
		y := [][]float64{make([]float64, len(at))}
		r.Table(at, y)
		for i := range at {
			if y[0][i] != r.At(0, at[i]) {
				t.Fatalf("at %v: table %v, At %v", at[i], y[0][i], r.At(0, at[i]))
			}
		}
	})
}

// The quartic through five values of a quartic is that quartic.
func TestThroughNodes(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var c quartic
		for k := range c {
			c[k] = rapid.Float64Range(-5, 5).Draw(t, "c")
		}
		var y [len(nodes)]float64
		for k, theta := range nodes {
			y[k] = c.at(theta)
		}
		got := through(&y)
		for k := range c {
			if math.Abs(got[k]-c[k]) > 1e-12 {
				t.Fatalf("%v, want %v", got, c)
			}
		}
	})
}

// A limit that the output only grazes is told apart from one it passes.
func TestTouch(t *testing.T) {
	r := traced([]float64{0, 1}, []quartic{{0, 4, -4}}, 0) // 4θ(1−θ): 1 at θ = 1/2
	r.miss[0] = 1e-6
	x, ok := r.First(0, 1+1e-7, 0, 1)
	if !ok || !x.Touch || math.Abs(x.T-0.5) > 1e-9 {
		t.Errorf("First just above the peak: %+v %v, want a touch at 0.5", x, ok)
	}
	if x, ok = r.First(0, 1.1, 0, 1); ok {
		t.Errorf("First above the peak: %+v", x)
	}
	if x, ok = r.First(0, 0.75, 0, 1); !ok || x.Touch || math.Abs(x.T-0.25) > 1e-15 {
		t.Errorf("First below the peak: %+v %v, want 0.25", x, ok)
	}
	if x, ok = r.FirstOutside(0, -1, 1, 0, 1); ok {
		t.Errorf("outside a limit that is just met: %+v", x)
	}
	if x, ok = r.LastOutside(0, 0, 0.75, 0, 1); !ok || math.Abs(x.T-0.75) > 1e-5 {
		t.Errorf("last outside: %+v %v, want 0.75", x, ok)
	}
}

// A part of a quartic is the quartic there.
func TestPartOfQuartic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var c quartic
		for k := range c {
			c[k] = rapid.Float64Range(-5, 5).Draw(t, "c")
		}
		a := rapid.Float64Range(0, 1).Draw(t, "a")
		b := rapid.Float64Range(a, 1).Draw(t, "b")
		p := c.part(a, b)
		for k := range 9 {
			theta := float64(k) / 8
			if got, want := p.at(theta), c.at(a+theta*(b-a)); math.Abs(got-want) > 1e-13*25 {
				t.Fatalf("at %v of [%v, %v]: %v, want %v", theta, a, b, got, want)
			}
		}
	})
}

// Steps and polynomials have a limit.
func TestRecorderFills(t *testing.T) {
	r := &recorder{t: &Trajectory{times: make([]float64, mostSteps)}}
	if r.full() {
		t.Error("full of nothing")
	}
	if r.t.times = append(r.t.times, 1); !r.full() {
		t.Error("room for more steps than allowed")
	}
	r = &recorder{t: &Trajectory{times: make([]float64, mostPieces/100+1)}, outs: make([]Output, 100)}
	if !r.full() {
		t.Error("room for more polynomials than allowed")
	}
}
