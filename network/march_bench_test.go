package network_test

import (
	"math"
	"testing"

	"lagbook/laplace"
	"lagbook/network"
)

// splitmix is the generator splitmix64, from which the same network can be built in
// another language.
type splitmix uint64

func (r *splitmix) next() float64 {
	*r += 0x9E3779B97F4A7C15
	z := uint64(*r)
	z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9
	z = (z ^ (z >> 27)) * 0x94D049BB133111EB
	return (float64((z^(z>>31))>>11) + 0.5) * 0x1p-53
}

// spread returns exp(sigma·n), n normal.
func (r *splitmix) spread(sigma float64) float64 {
	a, b := r.next(), r.next()
	return math.Exp(sigma * math.Sqrt(-2*math.Log(a)) * math.Cos(6.283185307179586*b))
}

// cooling is radiation to surroundings with natural convection beside it, flow from the
// body a to the surroundings b.
type cooling struct{ radiates, convects float64 }

func (c *cooling) Flow(a, b float64) (q, da, db float64) {
	d := a - b
	root := math.Sqrt(math.Sqrt(math.Abs(d)))
	q = c.radiates*(a*a*a*a-b*b*b*b) + c.convects*root*d
	da = 4*c.radiates*a*a*a + 1.25*c.convects*root
	db = -4*c.radiates*b*b*b - 1.25*c.convects*root
	return q, da, db
}

// plate is a plate of 40 × 25 nodes with invented numbers that radiates and convects
// from every node and is heated in some places by pulses of 20 s every 60 s.
type plate struct {
	net    *network.Network
	p      *network.Params
	nodes  []network.NodeID
	heated []bool
}

const (
	ambient = 293.15
	plateX  = 40
	plateY  = 25
	pulses  = 100
)

func newPlate(tb testing.TB) *plate {
	const N = plateX * plateY
	r := splitmix(500)
	C, cool, heat := make([]float64, N), make([]*cooling, N), make([]float64, N)
	for i := range N {
		C[i] = 2 * r.spread(0.3)
		radiates := 0.8 * 5.670374419e-8 * 2e-3 * r.spread(0.3)
		cool[i] = &cooling{radiates, 1.4 * 2e-3 * r.spread(0.3)}
	}
	for range 20 {
		heat[int(r.next()*N)] += 20
	}
	b, w := network.NewBuilder(), &plate{}
	around := b.Node("surroundings", network.NoRef)
	b.Hold(around, network.NoRef)
	for range N {
		n := b.Node("n", network.NoRef)
		b.Capacity(n, network.NoRef)
		w.nodes = append(w.nodes, n)
	}
	var G []float64
	for j := range plateY {
		for i := range plateX {
			at := i + plateX*j
			for _, next := range [2]struct {
				there bool
				k     int
			}{{i+1 < plateX, at + 1}, {j+1 < plateY, at + plateX}} {
				if next.there {
					b.Resistance("r", w.nodes[at], w.nodes[next.k], network.NoRef)
					G = append(G, 0.2*r.spread(0.5))
				}
			}
		}
	}
	var heated []float64
	for i, v := range heat {
		b.Between("c", w.nodes[i], around, false, network.NoRef)
		if v > 0 {
			b.Source("heat", w.nodes[i], 1, network.NoRef)
			heated = append(heated, v)
		}
		w.heated = append(w.heated, v > 0)
	}
	net, err := b.Build()
	if err != nil {
		tb.Fatal(err)
	}
	w.net, w.p = net, net.NewParams()
	copy(w.p.C, C)
	copy(w.p.G, G)
	for i, c := range cool {
		w.p.Law[i] = &network.Through{Flow: c}
	}
	w.p.Wave[0] = laplace.Constant(ambient)
	for k, v := range heated {
		w.p.Wave[k+1], err = laplace.Pulse(laplace.PulseTrain{High: v, Width: 20, Period: 60, Count: pulses})
		if err != nil {
			tb.Fatal(err)
		}
	}
	w.p.HasAllStart, w.p.AllStart = true, ambient
	return w
}

// march runs the pulses and returns levels at every edge: of all heated nodes and a tenth of
// the others if many, else of three.
func (w *plate) march(tb testing.TB, tol float64, many bool) ([][]float64, *network.Trajectory) {
	from, err := w.net.Begin(w.p)
	if err != nil {
		tb.Fatal(err)
	}
	var outs []network.Output
	for i, n := range w.nodes {
		if many && (i%10 == 0 || w.heated[i]) || i < 3 {
			outs = append(outs, w.net.Level(n))
		}
	}
	run, err := w.net.March(w.p, from, outs, network.Run{Until: 60 * pulses, RelTol: tol})
	if err != nil {
		tb.Fatal(err)
	}
	var at []float64
	for k := range pulses {
		at = append(at, 60*float64(k)+20, 60*float64(k)+60)
	}
	y := make([][]float64, len(outs))
	for i := range y {
		y[i] = make([]float64, len(at))
	}
	run.Table(at, y)
	return y, run
}

// BenchmarkMarch marches the plate at a tolerance and reports the largest error at the
// edges of the pulses against a run at 1e-7, in mK.
func BenchmarkMarch(b *testing.B) {
	w := newPlate(b)
	ref, _ := w.march(b, 1e-7, true)
	hottest := 0.0
	for _, row := range ref {
		for _, v := range row {
			hottest = max(hottest, v)
		}
	}
	for _, tol := range []struct {
		name string
		v    float64
	}{{"1e-3", 1e-3}, {"1e-5", 1e-5}} {
		b.Run("nodes=1000/pulses=100/tol="+tol.name, func(b *testing.B) {
			y, run := w.march(b, tol.v, true)
			worst := 0.0
			for i, row := range y {
				for k, v := range row {
					worst = max(worst, math.Abs(v-ref[i][k]))
				}
			}
			for b.Loop() {
				w.march(b, tol.v, false)
			}
			taken, missed := run.Steps()
			b.ReportMetric(1000*worst, "mK")
			b.ReportMetric(hottest, "K")
			b.ReportMetric(float64(taken), "steps")
			b.ReportMetric(float64(missed), "back")
		})
	}
}
