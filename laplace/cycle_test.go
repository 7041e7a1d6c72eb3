package laplace

import (
	"encoding/json"
	"errors"
	"math"
	"os"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"
)

// periodicCase is one of testdata/periodic.json: answers of 30 digits, rounded.
type periodicCase struct {
	ID              string
	Input, Output   int
	Period, On      float64
	Max, Min        float64
	AtOn            float64 `json:"at_on_edge"`
	AtOff           float64 `json:"at_off_edge"`
	TimeMax         float64 `json:"t_max"`
	TimeMin         float64 `json:"t_min"`
	Source, Convent string
}

func loadPeriodic(t testing.TB) []periodicCase {
	t.Helper()
	b, err := os.ReadFile("testdata/periodic.json")
	if err != nil {
		t.Fatal(err)
	}
	var f struct{ Cases []periodicCase }
	if err := json.Unmarshal(b, &f); err != nil {
		t.Fatal(err)
	}
	return f.Cases
}

// cycleTol is relative to the largest value [measured: 1.4e-13 for T41, whose losses and feedback nearly cancel, 1.1e-14 for all others]; an output that is a
// difference of levels gets what Rounding states.
const cycleTol = 1e-12

func TestCycleSuite(t *testing.T) {
	systems := map[string]*suiteCase{}
	for _, c := range loadSuite(t) {
		systems[c.ID] = c
	}
	for _, p := range loadPeriodic(t) {
		c := systems[p.ID]
		t.Run(p.ID+" "+c.Inputs[p.Input]+" to "+c.Outputs[p.Output], func(t *testing.T) { p.check(t, c.only(p.Output).system(t)) })
	}
}

// only returns the case with one output: what others see is no concern of it.
func (c *suiteCase) only(out int) *suiteCase {
	row := func(list []triplet) (kept []triplet) {
		for _, v := range list {
			if int(v[0]) == out {
				kept = append(kept, triplet{0, v[1], v[2]})
			}
		}
		return kept
	}
	one := *c
	one.C, one.D, one.Outputs = row(c.C), row(c.D), c.Outputs[out:out+1]
	return &one
}

func (p *periodicCase) check(t *testing.T, s *System) {
	u := make([]Waveform, len(s.b))
	u[p.Input] = wave(t)(Pulse(PulseTrain{High: 1, Width: p.On, Period: p.Period}))
	c, err := s.Cycle(u, nil)
	if err != nil {
		t.Fatal(err)
	}
	const out = 0
	size := max(math.Abs(p.Max), math.Abs(p.Min))
	tol := max(cycleTol*size, c.Response().Rounding(out))
	is := func(what string, got, want float64) {
		t.Helper()
		if d := math.Abs(got - want); !(d <= tol) {
			t.Errorf("%s is %v, want %v: off by %.1e of %.1e", what, got, want, d, size)
		}
	}
	if c.Period != p.Period {
		t.Errorf("period %v, want %v", c.Period, p.Period)
	}
	hi, lo := c.Max(out), c.Min(out)
	is("max", hi.Y, p.Max)
	is("min", lo.Y, p.Min)
	is("at the on-edge", c.At(out, 0), p.AtOn)
	is("at the off-edge", c.Left(out, p.On), p.AtOff)
	is("one period later", c.At(out, 7*p.Period), p.AtOn)
	if g, ok := s.Gain(p.Input, out); ok {
		is("mean", c.Mean(out), g*p.On/p.Period)
	}
	p.when(t, c, "max", hi, p.TimeMax, p.Max, tol)
	p.when(t, c, "min", lo, p.TimeMin, p.Min, tol)
}

// when compares instants where the extreme is sharp: the instant found need not be
// the one of the reference where the output is as high there within the tolerance.
func (p *periodicCase) when(t *testing.T, c *Cycle, what string, e Extreme, want, y, tol float64) {
	d := math.Abs(math.Mod(e.T-want+1.5*p.Period, p.Period) - 0.5*p.Period)
	flat := math.Min(math.Abs(c.At(0, want)-y), math.Abs(c.Left(0, want)-y)) <= tol
	if d > 1e-9*p.Period && !flat {
		t.Errorf("t_%s is %v, want %v", what, e.T, want)
	}
	if d > 1e-3*p.Period {
		t.Logf("t_%s is %v, reference %v: as %s there", what, e.T, want, what)
	}
}

// parallelLags returns one input through lags of time constant tau, summed.
func parallelLags(t testing.TB, tau ...float64) *System {
	t.Helper()
	n := len(tau)
	a, b, c := mat.NewDense(n, n, nil), mat.NewDense(n, 1, nil), mat.NewDense(1, n, nil)
	for i, v := range tau {
		a.Set(i, i, -1/v)
		b.Set(i, 0, 1/v)
		c.Set(0, i, 1)
	}
	return fromMatrices(t, a, b, c)
}

func fromMatrices(t testing.TB, a, b, c mat.Matrix) *System {
	t.Helper()
	s, err := FromMatrices(a, b, c, nil)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func cycleOf(t testing.TB, s *System, u ...Waveform) *Cycle {
	t.Helper()
	c, err := s.Cycle(u, nil)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// A lag under a sine: amplitude, lag and mean by hand; two days of it as well.
func TestCycleOfSine(t *testing.T) {
	const tau, T = 7.0, 24.0
	w := 2 * math.Pi / T
	c := cycleOf(t, parallelLags(t, tau), Sine(3, 2, w, 0.4))
	if c.Period != T {
		t.Errorf("period %v, want %v", c.Period, T)
	}
	amp, lag := 2/math.Hypot(1, w*tau), math.Atan(w*tau)
	for _, at := range []float64{0, 1, 5, 17, 23.9, 100, -3} {
		nearly(t, "value", c.At(0, at), 3+amp*math.Sin(w*at+0.4-lag), 1e-14)
	}
	nearly(t, "max", c.Max(0).Y, 3+amp, 1e-14)
	nearly(t, "when", c.Max(0).T, (math.Pi/2-0.4+lag)/w, 1e-7)
	nearly(t, "mean", c.Mean(0), 3, 1e-14)
	nearly(t, "swing", c.Swing(0), 2*amp, 1e-14)
}

// From rest a lag is off the cycle by the cycle's own start, dying away: by hand.
func TestCyclesUntilSettled(t *testing.T) {
	const tau, period, on = 1000.0, 60.0, 20.0
	s := parallelLags(t, tau)
	u := wave(t)(Pulse(PulseTrain{High: 1, Width: on, Period: period}))
	c := cycleOf(t, s, u)
	start := (math.Exp((on-period)/tau) - math.Exp(-period/tau)) / -math.Expm1(-period/tau)
	swing := start*math.Exp(-on/tau) - math.Expm1(-on/tau) - start
	nearly(t, "start", c.At(0, 0), start, 1e-14)
	nearly(t, "swing", c.Swing(0), swing, 1e-13)
	want := math.Ceil(tau * math.Log(start/(0.02*swing)) / period)
	rest, err := s.Respond([]Waveform{u}, nil, 1)
	if err != nil {
		t.Fatal(err)
	}
	cycles := func(r *Response) float64 {
		t.Helper()
		a, err := c.Approach(r)
		if err != nil {
			t.Fatal(err)
		}
		n, ok, err := a.Cycles(0, 0.02)
		if err != nil || !ok {
			t.Fatalf("%v, %v", ok, err)
		}
		return n
	}
	if n := cycles(rest); n != want {
		t.Errorf("from rest %v cycles, want %v", n, want)
	}
	in, err := c.Respond([]Waveform{u}, 100*period)
	if err != nil {
		t.Fatal(err)
	}
	if n := cycles(in); n != 0 {
		t.Errorf("from the cycle itself %v cycles", n)
	}
	nearly(t, "a hundred periods later", in.Left(0, 100*period), start, 1e-13)
}

func nearly(t interface {
	Helper()
	Errorf(string, ...any)
}, what string, got, want, tol float64) {
	t.Helper()
	if d := math.Abs(got - want); !(d <= tol*max(1, math.Abs(want))) {
		t.Errorf("%s is %v, want %v: off by %.1e", what, got, want, d)
	}
}

// The ratio of periods is decided on doubles, whatever way they came about.
func TestCommonPeriod(t *testing.T) {
	sine := func(period float64) Waveform { return Sine(0, 1, 2*math.Pi/period, 0) }
	pulse := func(period float64) Waveform {
		return wave(t)(Pulse(PulseTrain{High: 1, Width: period / 3, Period: period}))
	}
	for _, x := range []struct {
		u    []Waveform
		want float64
	}{
		{[]Waveform{sine(86400), pulse(43200)}, 86400},
		{[]Waveform{pulse(0.1), pulse(0.3)}, 0.3},
		{[]Waveform{pulse(0.2), pulse(0.3)}, 0.6},
		{[]Waveform{sine(1.0 / 50), sine(1.0 / 60)}, 0.1},
		{[]Waveform{pulse(7 * 3600), sine(24 * 3600)}, 168 * 3600},
		{[]Waveform{sine(86400)}, 86400},
		{[]Waveform{Sine(0, 1, 2*math.Pi*(1/31556952.0), 0), pulse(31556952)}, 31556952},
	} {
		in := mat.NewDense(1, len(x.u), nil)
		for i := range x.u {
			in.Set(0, i, 1)
		}
		s := fromMatrices(t, mat.NewDense(1, 1, []float64{-1}), in, mat.NewDense(1, 1, []float64{1}))
		nearly(t, "period", cycleOf(t, s, x.u...).Period, x.want, 4e-16)
	}
	s := fromMatrices(t, mat.NewDense(1, 1, []float64{-1}), mat.NewDense(1, 2, []float64{1, 1}), mat.NewDense(1, 1, []float64{1}))
	var n *NotCommensurate
	for _, other := range []float64{math.Sqrt2, math.Pi, 1.0001} {
		if _, err := s.Cycle([]Waveform{pulse(1), sine(other)}, nil); other == 1.0001 != (err == nil) {
			t.Errorf("periods 1 and %v: %v", other, err)
		} else if err != nil && (!errors.As(err, &n) || n.Inputs != [2]int{0, 1} || n.Periods[0] != 1 || math.Abs(n.Periods[1]-other) > 1e-15) {
			t.Errorf("periods 1 and %v: %v", other, err)
		}
	}
}

// What has no steady cycle is refused, each for its own reason.
func TestCycleRefusals(t *testing.T) {
	pulse := wave(t)(Pulse(PulseTrain{High: 1, Width: 1, Period: 2}))
	one := mat.NewDense(1, 1, []float64{1})
	system := func(a ...float64) *System {
		n := int(math.Sqrt(float64(len(a))))
		b, c := mat.NewDense(n, 1, nil), mat.NewDense(1, n, nil)
		b.Set(n-1, 0, 1)
		c.Set(0, 0, 1)
		return fromMatrices(t, mat.NewDense(n, n, a), b, c)
	}
	refused := func(what string, s *System, u Waveform, as any) {
		t.Helper()
		if _, err := s.Cycle([]Waveform{u}, nil); err == nil || !errors.As(err, as) {
			t.Errorf("%s: %v", what, err)
		}
	}
	lag := fromMatrices(t, mat.NewDense(1, 1, []float64{-1}), one, one)
	ramp := Waveform{Segments: []Segment{{B: 1}}}
	refused("a ramp", lag, ramp, new(*Unsettled))
	refused("growth", lag, Waveform{Segments: []Segment{{Exp: []Exponential{{1, 0.1}}}}}, new(*Unsettled))
	w := 2 * math.Pi
	refused("resonance", system(0, 1, -w*w, 0), pulse, new(*Resonant))
	refused("undamped", system(0, 1, -2, 0), pulse, new(*NotDecaying))
	refused("unstable", system(0.5), pulse, new(*NotDecaying))
	refused("integrator", system(0), pulse, new(*Drifting))
	refused("integrator at rest", system(0), Step(0, 1, 5), new(*Drifting))
	refused("double integrator", system(0, 1, 0, 0), pulse.Plus(-0.5), new(*NotDecaying))
	var d *Drifting
	if _, err := system(0).Cycle([]Waveform{pulse}, nil); errors.As(err, &d) {
		nearly(t, "drift in a period", d.PerPeriod, 1, 1e-14)
	}
}

// An integrator under a balanced load has a cycle, at the level that the start and
// whatever came before the load was periodic have left.
func TestCycleOfIntegrator(t *testing.T) {
	one := mat.NewDense(1, 1, []float64{1})
	s := fromMatrices(t, mat.NewDense(1, 1, nil), one, one)
	u := wave(t)(Pulse(PulseTrain{Low: -1, High: 1, Width: 1, Period: 2, At: 5}))
	c := cycleOf(t, s, u.WithBefore(0))
	// −1 from 0 to 5 s, then up by 1 and down by 1
	nearly(t, "at 5 s", c.At(0, 5), -5, 1e-14)
	nearly(t, "max", c.Max(0).Y, -4, 1e-14)
	nearly(t, "mean", c.Mean(0), -4.5, 1e-14)
	settled, err := s.Cycle([]Waveform{wave(t)(Decay([][2]float64{{3, 4}}))}, nil)
	if err != nil {
		t.Fatal(err)
	}
	nearly(t, "after a decay", settled.At(0, 0), 12, 1e-14)
}

// The cycle is what the response itself comes to, and comes to it when Cycles says:
// random systems with close and repeated poles, random loads, a late start.
func TestCycleIsTheLimit(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		n := rapid.IntRange(1, 4).Draw(rt, "order")
		a, b, c := mat.NewDense(n, n, nil), mat.NewDense(n, 2, nil), mat.NewDense(1, n, nil)
		for i := range n {
			a.Set(i, i, -rapid.SampledFrom([]float64{0.3, 0.3, 1, 1.0000001, 5}).Draw(rt, "pole"))
			for j := range i {
				a.Set(i, j, ordinary(-1, 1).Draw(rt, "coupling"))
			}
			b.Set(i, 0, ordinary(-1, 1).Draw(rt, "b"))
			b.Set(i, 1, ordinary(-1, 1).Draw(rt, "b"))
			c.Set(0, i, ordinary(-1, 1).Draw(rt, "c"))
		}
		if n > 1 && rapid.Bool().Draw(rt, "swings") {
			a.Set(0, 1, -3)
			a.Set(1, 0, 3)
		}
		s, err := FromMatrices(a, b, c, nil)
		if err != nil {
			rt.Fatal(err)
		}
		period := float64(rapid.IntRange(1, 5).Draw(rt, "period"))
		train, err := Pulse(PulseTrain{High: 1, Width: 0.4 * period, Period: period, At: rapid.Float64Range(0, 12).Draw(rt, "at")})
		if err != nil {
			rt.Fatal(err)
		}
		u := []Waveform{train, Sine(0.5, 0.3, 2*math.Pi/3, 1)}
		cycle, err := s.Cycle(u, nil)
		if errors.As(err, new(*NotDecaying)) {
			rt.Skip("the coupling made it unstable")
		}
		if err != nil {
			rt.Fatal(err)
		}
		r, err := s.Respond(u, nil, 400)
		if err != nil {
			rt.Fatal(err)
		}
		late := math.Floor(350/cycle.Period) * cycle.Period
		for k := range 20 {
			at := float64(k) * cycle.Period / 19
			nearly(rt, "late response", r.At(0, late+at), cycle.At(0, at), 1e-9)
		}
		approach, err := cycle.Approach(r)
		if err != nil {
			rt.Fatal(err)
		}
		m, ok, err := approach.Cycles(0, 0.02)
		if err != nil {
			rt.Fatal(err)
		}
		if !ok {
			rt.Skip("no swing")
		}
		off := func(from, to float64) float64 { return farthest(r, cycle, 0, from, to, 1000) }
		band := 0.02 * cycle.Swing(0)
		if after := off(m*cycle.Period, min(m*cycle.Period+60, 400)); after > band*(1+1e-9) {
			rt.Errorf("%v cycles: still %v off, band %v", m, after, band)
		}
		// samples may miss the top of the last excess
		if before := off((m-1)*cycle.Period, m*cycle.Period); m > 0 && before < 0.8*band {
			rt.Errorf("%v cycles, but only %v off in the last of them, band %v", m, before, band)
		}
	})
}

// farthest returns the largest of n distances between a response and a cycle over
// [from, to].
func farthest(r *Response, c *Cycle, out int, from, to float64, n int) (most float64) {
	from = max(from, 0)
	if to <= from {
		return 0
	}
	t, y := make([]float64, n), make([][]float64, out+1)
	for k := range t {
		t[k] = from + (to-from)*float64(k)/float64(n)
	}
	y[out] = make([]float64, n)
	r.Table(t, y)
	for k, v := range y[out] {
		most = max(most, math.Abs(v-c.At(out, t[k])))
	}
	return most
}
