package laplace

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/mat"
	"pgregory.net/rapid"

	"lagbook/laplace/matrix"
)

// drawSystem is a random system: a network of resistances and capacitances, one
// with one-way exchanges and feedback as well, or a plain matrix that may grow.
func drawSystem(t *rapid.T, kinds ...string) *System {
	n := rapid.IntRange(1, 6).Draw(t, "order")
	inputs, outputs := rapid.IntRange(1, 2).Draw(t, "inputs"), rapid.IntRange(1, 2).Draw(t, "outputs")
	value := func(what string) float64 {
		return math.Ldexp(rapid.Float64Range(0.5, 1).Draw(t, what), rapid.IntRange(-6, 6).Draw(t, "exponent"))
	}
	rows := func(what string, m, n int) [][]float64 {
		r := make([][]float64, m)
		for i := range r {
			r[i] = make([]float64, n)
			for k := range r[i] {
				if rapid.Bool().Draw(t, what) {
					r[i][k] = value(what) * float64(1-2*rapid.IntRange(0, 1).Draw(t, "sign"))
				}
			}
		}
		return r
	}
	kind := rapid.SampledFrom(kinds).Draw(t, "kind")
	bal := matrix.Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
	for i := range n {
		bal.C[i] = value("C")
		bal.Leak[i] = value("leak")
		for j := range i {
			if g := value("F"); rapid.Bool().Draw(t, "joined") {
				bal.F[i*n+j], bal.F[j*n+i] = g, g
			}
			if kind != "rc" && rapid.Bool().Draw(t, "one way") {
				bal.F[i*n+j] += value("W")
			}
		}
	}
	var s *System
	var err error
	b, c, d := rows("B", inputs, n), rows("C", outputs, n), rows("D", outputs, inputs)
	if kind == "plain" {
		a := bal.Dense()
		for k, v := range joined(rows("A", n, n)) {
			a[k] += v / 8
		}
		s, err = FromMatrices(mat.NewDense(n, n, a), mat.NewDense(inputs, n, joined(b)).T(),
			mat.NewDense(outputs, n, joined(c)), mat.NewDense(outputs, inputs, joined(d)))
	} else {
		s, err = New(Realisation{Balance: bal, B: b, Output: c, D: d})
	}
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// ordinary draws numbers of [low, high] from a grid of 2⁻²⁰ of half its width: of
// what is not 0 products are normal numbers too, and roundings of what is large stay
// small beside them.
func ordinary(low, high float64) *rapid.Generator[float64] {
	const steps = 1 << 20
	return rapid.Map(rapid.IntRange(-steps, steps), func(k int) float64 {
		return (low+high)/2 + (high-low)/2*float64(k)/steps
	})
}

// drawWave is a random waveform over about [0, end].
func drawWave(t *rapid.T, end float64) Waveform {
	v := ordinary(-2, 2)
	at := func() float64 { return end * rapid.Float64Range(0, 1.2).Draw(t, "at") }
	var w Waveform
	var err error
	switch rapid.SampledFrom([]string{"step", "points", "stairs", "pulse", "train", "sine", "decay", "repeated", "bent", "bent again"}).Draw(t, "wave") {
	case "step":
		return Step(v.Draw(t, "from"), v.Draw(t, "to"), at())
	case "points", "repeated":
		p := [][2]float64{{0, v.Draw(t, "v")}}
		for range rapid.IntRange(1, 4).Draw(t, "points") {
			p = append(p, [2]float64{p[len(p)-1][0] + at()/3 + end/1000, v.Draw(t, "v")})
		}
		if w, err = Points(p); err == nil && len(p)%2 == 0 {
			w, err = w.Repeated(end / 3)
		}
	case "stairs":
		w, err = Stairs([][2]float64{{0, v.Draw(t, "v")}, {at(), v.Draw(t, "v")}, {2 * end, v.Draw(t, "v")}})
	case "pulse":
		w, err = Pulse(PulseTrain{High: v.Draw(t, "high"), Width: at() + end/1000, At: at(), Count: 1})
	case "train":
		w, err = Pulse(PulseTrain{High: v.Draw(t, "high"), Width: end / 30, Period: end / 9, At: at() - end/2})
	case "sine":
		return Sine(v.Draw(t, "mean"), v.Draw(t, "amplitude"), rapid.Float64Range(0.1, 30).Draw(t, "omega")/end, v.Draw(t, "phase"))
	case "bent", "bent again":
		for at := 0.0; len(w.Segments) < 3; at += end * rapid.Float64Range(0.01, 0.6).Draw(t, "length") {
			g := Segment{At: at, A: v.Draw(t, "A"), B: v.Draw(t, "B") / end}
			for k := range rapid.IntRange(0, MaxDegree-1).Draw(t, "degree") {
				g.Poly = append(g.Poly, v.Draw(t, "c")*math.Pow(end, -float64(k+2)))
			}
			w.Segments = append(w.Segments, g)
		}
		if rapid.Bool().Draw(t, "again") {
			w, err = w.Repeated(end / 3)
		}
	case "decay":
		w, err = Decay([][2]float64{{v.Draw(t, "a"), at() + end/30}, {v.Draw(t, "a"), end}})
	}
	if err != nil {
		t.Fatal(err)
	}
	return w
}

// span is a time over which the system does something and nothing overflows.
func (s *System) span() float64 {
	fast := 0.0
	for _, p := range s.poles {
		fast = max(fast, cmplx.Abs(p.P))
	}
	if fast == 0 {
		return 1
	}
	return 16 / fast
}

func drawWaves(t *rapid.T, s *System, end float64) []Waveform {
	u := make([]Waveform, len(s.b))
	for i := range u {
		u[i] = drawWave(t, end)
	}
	return u
}

func mustRespond(t *rapid.T, s *System, u []Waveform, end float64) *Response {
	r, err := s.Respond(u, nil, end)
	if err != nil {
		t.Fatal(err)
	}
	return r
}
