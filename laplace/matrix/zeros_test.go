package matrix

import (
	"errors"
	"math"
	"testing"
)

func (r refNetwork) zeros(p refPair) ([]Root, error) {
	if r.Form == "balance" {
		return r.balance().Zeros(p.In, p.Out, p.D)
	}
	return r.stores().Zeros(p.In, p.Out, p.D, 0)
}

func TestZeros(t *testing.T) {
	for _, r := range readReference(t).Networks {
		for _, p := range r.Pairs {
			got, err := r.zeros(p)
			if p.Zero {
				if !errors.Is(err, ErrZeroTransfer) {
					t.Errorf("%s %s: %v, want ErrZeroTransfer", r.ID, p.Name, err)
				}
				continue
			}
			if err != nil {
				t.Errorf("%s %s: %v", r.ID, p.Name, err)
				continue
			}
			want := p.Zeros
			for _, w := range p.Cancelled {
				if countRoots(want)+int(w[2]) <= len(got) {
					want = append(want, w)
				}
			}
			worst := 0.0
			matchRoots(t, r.ID+" "+p.Name, got, want, func(g Root, re, im float64, mult int) {
				size, dist := math.Hypot(re, im), math.Hypot(g.Re-re, g.Im-im)
				if size == 0 && dist != 0 {
					t.Errorf("%s %s: zero %g%+gi, want exactly 0", r.ID, p.Name, g.Re, g.Im)
				}
				if dist > g.Radius+4*eps*size {
					t.Errorf("%s %s: zero %g%+gi, want %g%+gi: off by %.2g, radius %.2g, relative", r.ID, p.Name, g.Re, g.Im, re, im, dist/size, g.Radius/size)
				}
				if size != 0 {
					worst = math.Max(worst, dist/size)
				}
			})
			t.Logf("%s %s: %d zeros, worst %.2g", r.ID, p.Name, len(got), worst)
		}
	}
}

func countRoots(list [][3]float64) (n int) {
	for _, w := range list {
		n += int(w[2])
	}
	return n
}
