package laplace

import (
	"math"
	"math/cmplx"
)

// reach raises peak to what the state of each mode may grow to within the piece, by
// the triangle inequality; a growing mode is largest at the end, which the caller
// has. A block is taken at its start.
func (p *piece) reach(peak *vector) {
	for k, pole := range p.m.real {
		g := memory(math.Abs(pole), p.length)
		x := math.Abs(p.z.real[k]) + g*(math.Abs(p.a.real[k])+p.length*math.Abs(p.b.real[k]))
		if p.bent != nil {
			x += g * p.sizeOfBent(func(v *vector) float64 { return math.Abs(v.real[k]) })
		}
		for i := range p.forced {
			f := &p.forced[i]
			x += math.Abs(f.in.real[k]) * f.size(complex(pole, 0), p.length)
		}
		peak.real[k] = max(peak.real[k], x)
	}
	for k, pole := range p.m.pair {
		g := 2 * memory(cmplx.Abs(pole), p.length)
		x := cmplx.Abs(p.z.pair[k]) + g*(cmplx.Abs(p.a.pair[k])+p.length*cmplx.Abs(p.b.pair[k]))
		if p.bent != nil {
			x += g * p.sizeOfBent(func(v *vector) float64 { return cmplx.Abs(v.pair[k]) })
		}
		for i := range p.forced {
			f := &p.forced[i]
			x += cmplx.Abs(f.in.pair[k]) * f.size(pole, p.length)
		}
		peak.pair[k] = complex(max(real(peak.pair[k]), x), max(imag(peak.pair[k]), x))
	}
	peak.widen(&vector{block: p.z.block})
}

// memory returns how long a mode sums up its input: 1/|p|, or the whole length.
func memory(p, length float64) float64 {
	if p*length > 1 {
		return 1 / p
	}
	return length
}

// size bounds the response of a mode to the exponential.
func (f *forcing) size(p complex128, length float64) float64 {
	grown := math.Exp(max(0, real(f.rate)*length))
	return 2 * cmplx.Abs(f.amp) * memory(cmplx.Abs(f.rate-p)/2, length) * grown
}
