package matrix

import (
	"encoding/json"
	"math"
	"os"
	"testing"
)

// reference is testdata/general.json: networks of every kind with their poles,
// zeros, polynomials and step responses.
type reference struct {
	Note     string
	Networks []refNetwork
}

type refNetwork struct {
	ID       string
	Form     string // "balance", or "stores" where g has a diagonal of its own
	N        int
	Capacity []float64
	G        [][3]float64
	Leak     []float64
	Poles    [][3]float64 // re, im, multiplicity
	Pairs    []refPair
}

type refPair struct {
	Name             string
	In, Out          []float64
	D                float64
	Zero             bool
	Zeros, Cancelled [][3]float64
	Degree           int
	Num, Den         []float64
	T, Y             []float64
}

func readReference(t testing.TB) reference {
	t.Helper()
	text, err := os.ReadFile("testdata/general.json")
	if err != nil {
		t.Fatal(err)
	}
	var r reference
	if err := json.Unmarshal(text, &r); err != nil {
		t.Fatal(err)
	}
	return r
}

func (r refNetwork) dense() []float64 {
	g := make([]float64, r.N*r.N)
	for _, e := range r.G {
		g[int(e[0])*r.N+int(e[1])] = e[2]
	}
	return g
}

func (r refNetwork) balance() *Balance {
	return &Balance{N: r.N, C: r.Capacity, F: r.dense(), Leak: r.Leak}
}

func (r refNetwork) stores() *Stores {
	return &Stores{Balance: Balance{N: r.N, C: r.Capacity, F: make([]float64, r.N*r.N), Leak: make([]float64, r.N)}, K: r.dense()}
}

func (r refNetwork) blockForm(t testing.TB) *BlockForm {
	t.Helper()
	var f *BlockForm
	var err error
	if r.Form == "stores" {
		f, err = r.stores().BlockForm()
	} else {
		f, err = r.balance().BlockForm()
	}
	if err != nil {
		t.Fatalf("%s: %v", r.ID, err)
	}
	return f
}

// step is the step response at t by φ₁ of every block, and the sum of the moduli
// of what is added up, store by store of the output.
func (f *BlockForm) step(in, out []float64, d, t float64) (y, size float64) {
	y, _ = f.weigh(in, out, d, t)
	for i, w := range out {
		if w != 0 {
			one := make([]float64, len(out))
			one[i] = w
			_, s := f.weigh(in, one, 0, t)
			size += s
		}
	}
	return y, size + math.Abs(d)
}

func (f *BlockForm) weigh(in, out []float64, d, t float64) (y, size float64) {
	b, c := f.In(in), f.Out(out)
	y, size = d, math.Abs(d)
	for _, k := range f.Blocks {
		_, p, _ := Phi(k.N, k.T, t)
		for i := 0; i < k.N; i++ {
			for j := 0; j < k.N; j++ {
				v := t * c[k.First+i] * p[i*k.N+j] * b[k.First+j]
				y += v
				size += math.Abs(v)
			}
		}
	}
	return y, size
}

// matchRoots pairs each wanted root (with its multiplicity) with the nearest root
// left over and calls report with both.
func matchRoots(t *testing.T, name string, got []Root, want [][3]float64, report func(g Root, re, im float64, mult int)) {
	t.Helper()
	used := make([]bool, len(got))
	total := 0
	for _, w := range want {
		for m := 0; m < int(w[2]); m++ {
			total++
			best, dist := -1, math.Inf(1)
			for i, g := range got {
				if d := math.Hypot(g.Re-w[0], g.Im-w[1]); !used[i] && d < dist {
					best, dist = i, d
				}
			}
			if best < 0 {
				t.Errorf("%s: a root %v is missing", name, w)
				continue
			}
			used[best] = true
			report(got[best], w[0], w[1], int(w[2]))
		}
	}
	if total != len(got) {
		t.Errorf("%s: %d roots, want %d", name, len(got), total)
	}
}

func TestBlockFormPoles(t *testing.T) {
	for _, r := range readReference(t).Networks {
		f := r.blockForm(t)
		worst := 0.0
		matchRoots(t, r.ID, f.Poles, r.Poles, func(g Root, re, im float64, mult int) {
			size := math.Hypot(re, im)
			dist := math.Hypot(g.Re-re, g.Im-im)
			if size == 0 {
				if dist != 0 {
					t.Errorf("%s: pole %g%+gi, want exactly 0", r.ID, g.Re, g.Im)
				}
				return
			}
			worst = math.Max(worst, dist/size)
			if dist > 1e-12*size {
				t.Errorf("%s: pole %g%+gi, want %g%+gi: off by %.2g", r.ID, g.Re, g.Im, re, im, dist/size)
			}
			if dist > g.Radius+2*eps*size {
				t.Errorf("%s: pole %g%+gi is off by %.2g, its radius is %.2g (relative)", r.ID, re, im, dist/size, g.Radius/size)
			}
		})
		t.Logf("%-24s %2d blocks %2d parts  worst pole %.2g  coupling %.2g", r.ID, len(f.Blocks), len(f.parts), worst, f.Coupling)
	}
}

func TestBlockFormSteps(t *testing.T) {
	for _, r := range readReference(t).Networks {
		f := r.blockForm(t)
		worst := 0.0
		for _, p := range r.Pairs {
			var off, size float64
			for k, at := range p.T {
				y, sum := f.step(p.In, p.Out, p.D, at)
				off, size = math.Max(off, math.Abs(y-p.Y[k])), math.Max(size, sum)
			}
			if !(off <= 1e-12*size) {
				t.Errorf("%s %s: step off by %.2g, sum of sizes %.2g", r.ID, p.Name, off, size)
			}
			if size > 0 {
				worst = math.Max(worst, off/size)
			}
		}
		t.Logf("%-24s worst step %.2g", r.ID, worst)
	}
}
