package laplace

import "math/cmplx"

// A cancellation is what is left of poles and zeros, and what met.
type cancellation struct {
	poles []Pole
	from  []int // the index each of poles had
	zeros []Pole
	gone  []Pole
}

// cancel removes poles and zeros that coincide, the nearest first. Where it is
// known how many do, as many go; a pair within some roundings of each other goes in
// any case, and where nothing is known, one whose distance is within the sum of the
// error bounds.
func cancel(poles, zeros []Pole, f facts) cancellation {
	p, z := append([]Pole(nil), poles...), append([]Pole(nil), zeros...)
	var c cancellation
	for left := f.common; ; {
		i, j := nearest(p, z, func(d float64, p, z Pole) bool {
			return left > 0 || d <= 8*epsilon*cmplx.Abs(p.P) || !f.ok && d <= bound(p)+bound(z)
		})
		if i < 0 {
			break
		}
		gone := p[i]
		gone.Mult = min(p[i].Mult, z[j].Mult)
		gone.Radius = max(gone.Radius, cmplx.Abs(p[i].P-z[j].P))
		c.gone = append(c.gone, gone)
		p[i].Mult -= gone.Mult
		z[j].Mult -= gone.Mult
		left -= gone.Mult
	}
	for i := range p {
		if p[i].Mult > 0 {
			c.poles, c.from = append(c.poles, p[i]), append(c.from, i)
		}
	}
	for j := range z {
		if z[j].Mult > 0 {
			c.zeros = append(c.zeros, z[j])
		}
	}
	return c
}

// nearest returns the pair of pole and zero that meet and lie closest, relative to
// the pole; −1 if none does.
func nearest(p, z []Pole, meet func(d float64, p, z Pole) bool) (i, j int) {
	i, j = -1, -1
	best := 0.0
	for a := range p {
		for b := range z {
			if p[a].Mult == 0 || z[b].Mult == 0 {
				continue
			}
			d := cmplx.Abs(p[a].P - z[b].P)
			share := d
			if m := cmplx.Abs(p[a].P); m > 0 {
				share /= m
			}
			if (i < 0 || share < best) && meet(d, p[a], z[b]) {
				i, j, best = a, b, share
			}
		}
	}
	return i, j
}

// bound returns how far P may be off: of a multiple one it is a mean, far better
// known than its members.
func bound(p Pole) float64 {
	if p.Mult > 1 {
		return min(p.Radius, 1e-10*cmplx.Abs(p.P))
	}
	return p.Radius + 4*epsilon*cmplx.Abs(p.P)
}

// gathered adds up the multiplicities of poles that meet and sorts them.
func gathered(list []Pole) []Pole {
	var members []seated
	for _, p := range list {
		for range p.Mult {
			members = append(members, seated{p: p.P, radius: bound(p)})
		}
	}
	poles, _ := gather(members)
	return poles
}
