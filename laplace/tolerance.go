package laplace

import (
	"math"
	"math/cmplx"
)

// A Dropped is a pole and a zero that were taken as one.
type Dropped struct {
	Pole, Zero complex128
	Mult       int

	// Change bounds the relative change of H(iω) that this brings, over all ω:
	// |p − z|/|Re p|; +Inf where the pole lies on the imaginary axis.
	Change float64
}

// WithoutPairs returns the transfer without the pairs of pole and zero that lie
// within rel of each other, relative to the pole, the nearest first, with its gain at
// rest kept, or its behaviour for ω → ∞ where there is none. It says what was
// dropped. Nothing is dropped on the right of the imaginary axis or on it, however
// close: what grows there grows in fact, whether the output shows it or not.
func (h *Transfer) WithoutPairs(rel float64) (*Transfer, []Dropped, error) {
	poles, zeros := clonePoles(h.Poles), clonePoles(h.Zeros)
	var list []Dropped
	for {
		i, j := nearest(poles, zeros, func(d float64, p, _ Pole) bool {
			return real(p.P) < -p.Radius && d <= rel*cmplx.Abs(p.P)
		})
		if i < 0 {
			break
		}
		n := min(poles[i].Mult, zeros[j].Mult)
		list = append(list, Dropped{poles[i].P, zeros[j].P, n, cmplx.Abs(poles[i].P-zeros[j].P) / math.Abs(real(poles[i].P))})
		poles[i].Mult -= n
		zeros[j].Mult -= n
	}
	if len(list) == 0 {
		return h, nil, nil
	}
	poles, zeros = evened(poles), evened(zeros)
	lead := h.Lead()
	if h.HasGain && h.Gain != 0 {
		lead = h.Gain / real(rootRatio(zeros, poles))
	}
	r, err := FromRoots(lead, zeros, poles)
	return r, list, err
}

func clonePoles(list []Pole) []Pole { return append([]Pole(nil), list...) }

// evened drops roots that are used up; of a conjugate pair both members go or stay.
func evened(list []Pole) []Pole {
	var left []Pole
	for _, p := range list {
		if p.Mult > 0 {
			left = append(left, p)
		}
	}
	return left
}

// rootRatio returns Π(−z)/Π(−p) of the roots that are not 0, each pole beside a zero
// so that neither product leaves the range.
func rootRatio(zeros, poles []Pole) complex128 {
	var z, p []complex128
	spread := func(list []Pole) (all []complex128) {
		for _, r := range list {
			for k := 0; k < r.Mult && r.P != 0; k++ {
				all = append(all, -r.P)
			}
		}
		return all
	}
	z, p = spread(zeros), spread(poles)
	x := complex(1, 0)
	for k := range max(len(z), len(p)) {
		if k < len(z) {
			x *= z[k]
		}
		if k < len(p) {
			x /= p[k]
		}
	}
	return x
}
