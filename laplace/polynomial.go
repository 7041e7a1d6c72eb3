package laplace

// polynomials fills Numerator and Denominator up to MaxRatioOrder. They come from
// the matrix in exact arithmetic; only where a factor has cancelled are they the
// products of the poles and zeros left, which lose digits when those are multiple.
func (h *Transfer) polynomials(sub *System, cancelled bool) {
	if sub.plant.n > MaxRatioOrder {
		return
	}
	num, den, err := sub.plant.asStores().Ratio(sub.b[0], sub.c[0], sub.d[0][0], sub.rateOf(0, 0))
	if err != nil || len(num) == 0 {
		return
	}
	if !cancelled {
		h.Numerator, h.Denominator = num, den
		return
	}
	den, num = product(1, h.Poles), product(num[len(num)-1], h.Zeros)
	if finite("", den...) == nil && finite("", num...) == nil {
		h.Numerator, h.Denominator = num, den
	}
}

// product returns lead·Π(s − p)^mult, ascending. Conjugates are multiplied as one
// real factor.
func product(lead float64, list []Pole) []float64 {
	c := []float64{lead}
	for _, p := range list {
		for range p.Mult {
			switch re, im := real(p.P), imag(p.P); {
			case im == 0:
				c = times(c, []float64{-re, 1})
			case im > 0:
				c = times(c, []float64{re*re + im*im, -2 * re, 1})
			}
		}
	}
	return c
}

func times(a, b []float64) []float64 {
	c := make([]float64, len(a)+len(b)-1)
	for i, x := range a {
		for j, y := range b {
			c[i+j] += x * y
		}
	}
	return c
}
