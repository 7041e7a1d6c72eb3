package matrix

import (
	"fmt"
	"math"
	"testing"
)

func FuzzBlockForm(f *testing.F) {
	f.Add(uint8(3), []byte{1, 2, 3, 200, 100, 7, 9, 0, 255})
	f.Add(uint8(4), []byte("one way and both ways, all of it"))
	f.Fuzz(func(t *testing.T, size uint8, text []byte) {
		n := int(size%6) + 1
		next := func() float64 {
			if len(text) == 0 {
				return 0
			}
			v := float64(int8(text[0]))
			text = text[1:]
			if v > 100 || v < -100 {
				return math.Copysign(math.Exp(v-90), v)
			}
			return v / 8
		}
		b := &Balance{N: n, C: make([]float64, n), F: make([]float64, n*n), Leak: make([]float64, n)}
		for i := range n {
			b.C[i] = math.Abs(next()) + 0x1p-20
			b.Leak[i] = next()
			for j := range n {
				if j != i {
					b.F[i*n+j] = next()
				}
			}
		}
		form, err := b.BlockForm()
		if err != nil {
			return
		}
		in, out := unit(n, 0), unit(n, n-1)
		for _, v := range append(form.In(in), form.Out(out)...) {
			if math.IsNaN(v) {
				t.Fatal("NaN in a row")
			}
		}
		for _, p := range form.Poles {
			if math.IsNaN(p.Re) || math.IsNaN(p.Im) || !(p.Radius >= 0) {
				t.Fatalf("pole %+v", p)
			}
		}
		for _, k := range form.Blocks {
			e, p1, p2 := Phi(k.N, k.T, 1.5)
			for i := range e {
				if math.IsNaN(e[i]) || math.IsNaN(p1[i]) || math.IsNaN(p2[i]) {
					t.Fatalf("NaN in φ of %v", k.T)
				}
			}
		}
		zeros, err := b.Zeros(in, out, 0)
		if err != nil {
			return
		}
		for _, z := range zeros {
			if math.IsNaN(z.Re) || math.IsNaN(z.Im) || !(z.Radius >= 0) {
				t.Fatalf("zero %+v", z)
			}
		}
		keep := b.Path(in, out)
		part := b.Restrict(keep)
		num, _, err := part.Ratio(pick(in, keep), pick(out, keep), 0)
		if err != nil {
			t.Fatal(err)
		}
		if len(num) != len(zeros)+1 {
			t.Fatal(fmt.Sprint(len(zeros), " zeros of ", num))
		}
	})
}

func FuzzPhi(f *testing.F) {
	f.Add(1.0, -2.0, 3.0, 0.5, 10.0)
	f.Add(1e300, -1e300, 1e-300, 0.0, 1e10)
	f.Fuzz(func(t *testing.T, a, b, c, d, at float64) {
		for _, v := range []float64{a, b, c, d, at} {
			if math.IsNaN(v) || math.Abs(v) > 1e150 {
				return
			}
		}
		for n, T := range map[int][]float64{1: {a}, 2: {a, b, c, d}, 3: {a, b, c, 0, d, a, 0, b, d}} {
			e, p1, p2 := Phi(n, T, at)
			for i := range e {
				if math.IsNaN(e[i]) || math.IsNaN(p1[i]) || math.IsNaN(p2[i]) {
					t.Fatalf("n = %d, T = %v, t = %g: %v %v %v", n, T, at, e, p1, p2)
				}
			}
		}
	})
}
