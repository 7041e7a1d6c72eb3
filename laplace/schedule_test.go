package laplace

import (
	"errors"
	"math"
	"testing"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"lagbook/laplace/matrix"
)

// A turning is a network of n stores, one input and one output for each store, whose
// exchanges F and leaks are scaled by a wave each.
type turning struct {
	n       int
	C, b    []float64
	F, leak [2][]float64 // fixed, and scaled
}

func (w *turning) realisation(scale float64) Realisation {
	r := Realisation{Balance: matrix.Balance{N: w.n, C: w.C, F: make([]float64, w.n*w.n), Leak: make([]float64, w.n)}}
	for i := range r.Balance.F {
		r.Balance.F[i] = w.F[0][i] + scale*w.F[1][i]
	}
	for i := range r.Balance.Leak {
		r.Balance.Leak[i] = w.leak[0][i] + scale*w.leak[1][i]
	}
	r.B = [][]float64{w.b}
	for i := range w.n {
		row := make([]float64, w.n)
		row[i] = 1
		r.Output = append(r.Output, row)
	}
	return r
}

func (w *turning) schedule(wave Waveform) *Schedule {
	return &Schedule{Waves: []Waveform{wave}, Pick: func(v []float64) (Kind, error) {
		s, err := NewCarrying(w.realisation(v[0]))
		return Kind{s, make([]float64, w.n)}, err
	}}
}

// march carries x over h with the constant input u by the exponential of the whole
// equations, constant included (gonum, Padé): no modes, no φ-functions.
func (w *turning) march(x []float64, scale, u, h float64) []float64 {
	n, r := w.n, w.realisation(scale)
	a := mat.NewDense(n+1, n+1, nil)
	for i := range n {
		sum := r.Balance.Leak[i]
		for j := range n {
			if i != j {
				a.Set(i, j, h*r.Balance.F[i*n+j]/w.C[i])
				sum += r.Balance.F[i*n+j]
			}
		}
		a.Set(i, i, -h*sum/w.C[i])
		a.Set(i, n, h*u*w.b[i]/w.C[i])
	}
	var e mat.Dense
	e.Exp(a)
	y := make([]float64, n)
	for i := range y {
		y[i] = e.At(i, n)
		for j := range n {
			y[i] += e.At(i, j) * x[j]
		}
	}
	return y
}

func anyTurning(t *rapid.T) *turning {
	n := rapid.IntRange(1, 4).Draw(t, "stores")
	w := &turning{n: n}
	for k := range 2 {
		w.F[k], w.leak[k] = make([]float64, n*n), make([]float64, n)
	}
	oneWay := rapid.Bool().Draw(t, "one way")
	for i := range n {
		w.C = append(w.C, rapid.Float64Range(0.5, 5).Draw(t, "C"))
		w.b = append(w.b, rapid.Float64Range(0.05, 1).Draw(t, "b")) // levels of one size: rounding is that of the largest
		w.leak[rapid.IntRange(0, 1).Draw(t, "which")][i] = rapid.Float64Range(0.1, 2).Draw(t, "leak")
		for j := range i {
			f := rapid.Float64Range(0.1, 2).Draw(t, "F")
			k := rapid.IntRange(0, 1).Draw(t, "which")
			w.F[k][i*n+j] = f
			if w.F[k][j*n+i] = f; oneWay {
				w.F[k][j*n+i] = 0
			}
		}
	}
	w.leak[0][0] += 0.1
	if n > 1 && rapid.Bool().Draw(t, "swings") { // a pair of poles while the scale is not 0
		w.F[1][1], w.F[1][n] = w.F[1][1]+3, w.F[1][n]-3
		w.leak[1][1] += 6
	}
	return w
}

// Switching at stairs, with a stepping input: the closed form agrees with matrix
// exponentials chained over every change.
func TestScheduleAgainstExponentials(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := anyTurning(t)
		var scale, load [][2]float64
		at := 0.0
		for range rapid.IntRange(1, 6).Draw(t, "phases") {
			scale = append(scale, [2]float64{at, rapid.SampledFrom([]float64{0, 0.3, 1, 4}).Draw(t, "scale")})
			load = append(load, [2]float64{at, ordinary(-1, 1).Draw(t, "load")})
			at += rapid.Float64Range(0.05, 3).Draw(t, "length")
		}
		sw, err := Stairs(scale)
		if err != nil {
			t.Fatal(err)
		}
		u, err := Stairs(load)
		if err != nil {
			t.Fatal(err)
		}
		r, err := w.schedule(sw).Respond([]Waveform{u}, at)
		if err != nil {
			t.Fatal(err)
		}
		x := make([]float64, w.n)
		for k := range scale {
			end := at
			if k+1 < len(scale) {
				end = scale[k+1][0]
			}
			x = w.march(x, scale[k][1], load[k][1], end-scale[k][0])
			for i := range x {
				nearly(t, "level", r.Left(i, end), x[i], 1e-12)
				nearly(t, "level after", r.At(i, end), x[i], 1e-12)
			}
		}
	})
}

// The cycle of a door that opens and shuts is where 500 of them lead.
func TestScheduleCycle(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := anyTurning(t)
		width := rapid.Float64Range(0.2, 2).Draw(t, "open")
		door, err := Pulse(PulseTrain{Low: 0, High: 3, Width: width, Period: 3, At: 0.5})
		if err != nil {
			t.Fatal(err)
		}
		load, err := Pulse(PulseTrain{High: 1, Width: 2, Period: 6})
		if err != nil {
			t.Fatal(err)
		}
		s := w.schedule(door)
		c, err := s.Cycle([]Waveform{load})
		if err != nil {
			t.Fatal(err)
		}
		if c.Period != 6 {
			t.Fatalf("period %v", c.Period)
		}
		const cycles = 500
		r, err := s.Respond([]Waveform{load}, cycles*6)
		if err != nil {
			t.Fatal(err)
		}
		a, err := c.Approach(r)
		if err != nil {
			t.Fatal(err)
		}
		for i := range w.n {
			hi, lo := c.Max(i), c.Min(i)
			for k := range 60 {
				at := 0.1 * float64(k)
				v := c.At(i, at)
				nearly(t, "after 499 cycles", r.At(i, (cycles-1)*6+at), v, 1e-11) // 3000 s is known to 5e-13 s
				if v > hi.Y+1e-12 || v < lo.Y-1e-12 {
					t.Errorf("%v at %v outside [%v, %v]", v, at, lo.Y, hi.Y)
				}
			}
			n, ok, err := a.Cycles(i, 0.02)
			if err != nil {
				t.Fatal(err)
			}
			if !ok {
				continue
			}
			excess := func(cycle float64) float64 { return farthest(r, c, i, cycle*6, cycle*6+6, 1200) }
			band := 0.02 * c.Swing(i)
			if worst := excess(n); worst > band*(1+1e-9) {
				t.Errorf("after %v cycles %v off, band %v", n, worst, band)
			}
			// samples are 0.15 of the fastest time constant apart and may miss the last excess
			if n > 0 && excess(n-1) < band*0.8 {
				t.Errorf("%v cycles, but %v off a cycle earlier already, band %v", n, excess(n-1), band)
			}
		}
	})
}

// One store whose loss stops for a while: two time constants, by hand; its extremes
// and crossings are found through the switches.
func TestScheduleFanStop(t *testing.T) {
	w := &turning{n: 1, C: []float64{100}, b: []float64{1}}
	w.F = [2][]float64{{0}, {0}}
	w.leak = [2][]float64{{0.5}, {2}}
	fan := wave(t)(Pulse(PulseTrain{Low: 1, High: 0, Width: 60, At: 100, Count: 1}))
	r, err := w.schedule(fan).Respond([]Waveform{Step(0, 50, 0)}, 1000)
	if err != nil {
		t.Fatal(err)
	}
	run, still := 100/2.5, 100/0.5
	at100 := -20 * math.Expm1(-100/run)
	at160 := 100 + (at100-100)*math.Exp(-60/still)
	at := func(t float64) float64 {
		switch {
		case t < 100:
			return -20 * math.Expm1(-t/run)
		case t < 160:
			return 100 + (at100-100)*math.Exp(-(t-100)/still)
		}
		return 20 + (at160-20)*math.Exp(-(t-160)/run)
	}
	times := make([]float64, 101)
	for i := range times {
		times[i] = 10 * float64(i)
	}
	y := [][]float64{make([]float64, len(times))}
	r.Table(times, y)
	for i, v := range times {
		nearly(t, "table", y[0][i], at(v), 1e-14)
		nearly(t, "value", r.At(0, v), at(v), 1e-14)
	}
	hi := r.Max(0, 0, 1000)
	nearly(t, "peak", hi.Y, at160, 1e-14)
	nearly(t, "when", hi.T, 160, 1e-15)
	x, ok := r.First(0, 30, 0, 1000)
	nearly(t, "crossing", x.T, 100+still*math.Log((100-at100)/70), 1e-13)
	back, ok2 := r.LastOutside(0, 20, 1, 0, 1000)
	nearly(t, "back", back.T, 160+run*math.Log(at160-20), 1e-13)
	final, ok3 := r.Final(0)
	nearly(t, "final", final, 20, 1e-14)
	if !ok || !ok2 || !ok3 {
		t.Error("a root or the final value is missing")
	}
}

// Waves that do not change anything give the plain response bit for bit, and a
// system that is lost at a switch says when.
func TestScheduleEdges(t *testing.T) {
	w := &turning{n: 2, C: []float64{1, 3}, b: []float64{1, 0.5}, F: [2][]float64{{0, 0.7, 0.7, 0}, {0, 0, 0, 0}}, leak: [2][]float64{{0.2, 0}, {0, 0.4}}}
	ones := wave(t)(Stairs([][2]float64{{0, 1}, {2, 1}, {3, 1}}))
	u := []Waveform{Sine(0, 1, 2, 0)}
	r, err := w.schedule(ones).Respond(u, 10)
	if err != nil {
		t.Fatal(err)
	}
	s, err := NewCarrying(w.realisation(1))
	if err != nil {
		t.Fatal(err)
	}
	plain, err := s.Respond(u, nil, 10)
	if err != nil {
		t.Fatal(err)
	}
	for k := range 101 {
		if a, b := r.At(1, 0.1*float64(k)), plain.At(1, 0.1*float64(k)); a != b {
			t.Errorf("%v, want %v", a, b)
		}
	}
	lost := errors.New("lost")
	bad := &Schedule{Waves: []Waveform{Step(1, 0, 4)}, Pick: func(v []float64) (Kind, error) {
		if v[0] == 0 {
			return Kind{}, lost
		}
		return Kind{s, make([]float64, 2)}, nil
	}}
	var at *SwitchError
	if _, err := bad.Respond(u, 10); !errors.As(err, &at) || at.At != 4 || !errors.Is(err, lost) {
		t.Error(err)
	}
	// a gain for a short while in a long run is no overflow
	short := &turning{n: 1, C: []float64{1}, b: []float64{1}, F: [2][]float64{{0}, {0}}, leak: [2][]float64{{0.01}, {-1}}}
	burst := wave(t)(Pulse(PulseTrain{High: 1, Width: 5, At: 10, Count: 1}))
	if r, err := short.schedule(burst).Respond([]Waveform{Step(0, 1, 0)}, 1e6); err != nil {
		t.Error(err)
	} else {
		nearly(t, "in the end", r.At(0, 1e6), 100, 1e-13)
	}
	// a gain that outweighs the loss on the mean
	grow := &turning{n: 1, C: []float64{1}, b: []float64{1}, F: [2][]float64{{0}, {0}}, leak: [2][]float64{{-0.5}, {0.9}}}
	turn := wave(t)(Pulse(PulseTrain{High: 1, Width: 1, Period: 2}))
	var n *NotContracting
	if _, err := grow.schedule(turn).Cycle([]Waveform{Constant(1)}); !errors.As(err, &n) {
		t.Error(err)
	} else {
		nearly(t, "multiplier", real(n.Multiplier), math.Exp(0.5*2-0.9), 1e-14)
	}
}
