package laplace

import (
	"fmt"
	"math"
	"math/cmplx"
)

// unresolvedPole is a pole the methods do not resolve: seen from a ray close above.
type unresolvedPole struct {
	p      complex128
	weight float64 // |residue|
	slack  float64 // of Re p
}

// inspect looks at F where the methods do not: right of the abscissa, where nothing
// may be, and up a ray for oscillations faster than any they can follow. It also
// sets the range by |sF(s)|, the weighted mean of the response up to about 1/s.
func (v *inversion) inspect(lo, hi float64) error {
	n := int(math.Ceil(math.Log2(hi/lo))) + 1
	for k := range n + 1 {
		t := lo * math.Pow(hi/lo, float64(k)/float64(n))
		y := cmplx.Abs(v.g(complex(v.o.Abscissa+1/t, 0))) / t
		if isNumber(y) {
			v.base = max(v.base, y)
			if grown := y * math.Exp(v.o.Abscissa*t); !math.IsInf(grown, 0) {
				v.span = max(v.span, grown)
			}
		}
	}
	if err := v.mirrored(hi); err != nil {
		return err
	}
	if err := v.right(lo, hi); err != nil {
		return err
	}
	return v.scanRay(lo, hi)
}

// mirrored checks that F is conjugate on conjugate arguments.
func (v *inversion) mirrored(t float64) error {
	s := complex(v.o.Abscissa+2/t, 3/t)
	a, b := v.g(s), v.g(cmplx.Conj(s))
	if d := cmplx.Abs(a - cmplx.Conj(b)); d > 1e-10*cmplx.Abs(a) {
		return &NotInverted{s, "F is not the transform of a real response: F of the conjugate is not the conjugate of F"}
	}
	return nil
}

// right compares F with its mean over circles right of the abscissa (the mean value
// property of functions without singularities), and refuses a growth no transform
// has. The circles cover an angle of 37 degrees either side of the real axis; a
// singularity at the abscissa itself shifts their means by 0.6⁶⁴ = 6e-15 of F there.
func (v *inversion) right(lo, hi float64) error {
	const points, radius, step = 64, 0.6, 3.5
	last, level := 0.0, v.base
	if y := cmplx.Abs(v.g(complex(v.o.Abscissa+0.02/hi, 0))); isNumber(y) {
		level = max(level, y*0.02/hi) // the response to come: before a delay it is all there is
	}
	for x := 2 / hi; x < 1e4/lo; x *= step {
		c := complex(v.o.Abscissa+x, 0)
		centre, top := v.g(c), 0.0
		var mean complex128
		for k := 0; k <= points/2; k++ {
			sin, cos := math.Sincos(2 * math.Pi * float64(k) / points)
			y := v.g(c + complex(radius*x*cos, radius*x*sin))
			top = worse(top, cmplx.Abs(y))
			if k > 0 && k < points/2 {
				y *= 2
			}
			mean += complex(real(y)/points, 0)
		}
		top = worse(top, cmplx.Abs(centre))
		if math.IsInf(top, 1) || top*x < 1e-3*v.o.Tolerance*v.base {
			return nil
		}
		if d := cmplx.Abs(mean - centre); d > 1e-9*top && d*x > 1e-10*level {
			return &NotInverted{c, fmt.Sprintf("F has a singularity right of the abscissa %g, or is not a transform", v.o.Abscissa)}
		}
		if last > 0 && top > last*step*step*step*10 {
			return &NotInverted{c, "F grows to the right faster than any power: not a transform of a response after t = 0"}
		}
		last = top
	}
	return nil
}

// The ray of scanRay: five degrees right of the imaginary axis, in steps of 4 %.
const (
	rayAngle = 85 * math.Pi / 180
	rayStep  = 0.04 // h, in ln s
	rayOrder = 8    // of the differences
)

// scanRay goes up the ray and takes eighth differences over x = ln s. They are 5e-9 of F
// where F has singularities on the negative real axis only, and tell place and weight
// of a pole near the imaginary axis, or right of it, even when it carries little:
// A/(x−x_p) has the difference 8!·h⁸·A/Π(x+jh−x_p), of which two give x_p and A.
func (v *inversion) scanRay(lo, hi float64) error {
	sin, cos := math.Sincos(rayAngle)
	var f [rayOrder + 1]complex128
	var before complex128 // the difference one step down
	var guess [3]complex128
	for k := 0; ; k++ {
		r := 8 / hi * math.Exp(rayStep*float64(k)) // x counts from 8/hi, to be the same in any unit of time
		copy(f[:], f[1:])
		f[rayOrder] = v.g(complex(v.o.Abscissa+r*cos, r*sin))
		if y := cmplx.Abs(f[rayOrder]); !(y*r >= 1e-3*v.o.Tolerance*v.base) || math.IsInf(y, 1) || r >= 1e5/lo {
			return nil
		}
		if k < rayOrder {
			continue
		}
		d := difference(f)
		guess[0], guess[1], guess[2] = guess[1], guess[2], 0
		if cmplx.Abs(d) > 5e-8*cmplx.Abs(f[rayOrder/2]) && before != 0 {
			q := d / before
			far := (rayOrder + 1) * rayStep * q / (1 - q) // x − x_p, of the first point of before
			guess[2] = complex(float64(k-rayOrder-1)*rayStep, rayAngle) - far
			if !steady(guess) {
				v.noteMaximum(f, d, r*math.Exp(-rayStep*rayOrder/2))
			} else if err := v.note(guess, far, before, hi); err != nil {
				return err
			}
		}
		before = d
	}
}

func difference(f [rayOrder + 1]complex128) complex128 {
	return f[0] + f[8] - 8*(f[1]+f[7]) + 28*(f[2]+f[6]) - 56*(f[3]+f[5]) + 70*f[4]
}

// steady tells a pole, which stays where it is, from the running phase of a delay.
func steady(x [3]complex128) bool {
	return x[0] != 0 && x[1] != 0 && cmplx.Abs(x[1]-x[0]) < rayStep/3 && cmplx.Abs(x[2]-x[1]) < rayStep/3
}

// noteMaximum remembers a maximum of |F| on the ray, which a delay does not make, but
// poles so close to each other that their places are not found.
func (v *inversion) noteMaximum(f [rayOrder + 1]complex128, d complex128, r float64) {
	const m = rayOrder / 2
	y := cmplx.Abs(f[m])
	if cmplx.Abs(d) > 1e-3*y && y > cmplx.Abs(f[m-1]) && y > cmplx.Abs(f[m+1]) {
		v.hidden = append(v.hidden, unresolvedPole{complex(v.o.Abscissa, r), y * r * math.Cos(rayAngle), 0})
	}
}

// note remembers a pole 8/hi·e^x, x guessed three times, the last from the difference d
// a distance far away, where it could matter, and refuses one right of the abscissa.
func (v *inversion) note(guess [3]complex128, far, d complex128, hi float64) error {
	weight := d / complex(40320*math.Pow(rayStep, rayOrder), 0)
	for j := range rayOrder + 1 {
		weight *= far + complex(float64(j)*rayStep, 0)
	}
	p := cmplx.Exp(guess[2]) * complex(8/hi, 0)
	w := cmplx.Abs(weight * p)
	if !isNumber(w) || w < 1e-4*v.o.Tolerance*v.base {
		return nil
	}
	if real(p)*hi > 2 && real(p) > 0.3*cmplx.Abs(p) {
		return &NotInverted{p + complex(v.o.Abscissa, 0), fmt.Sprintf("F has a singularity right of the abscissa %g", v.o.Abscissa)}
	}
	slack := 0.005 + 5*max(cmplx.Abs(guess[1]-guess[0]), cmplx.Abs(guess[2]-guess[1])) // two poles pass for one
	v.hidden = append(v.hidden, unresolvedPole{p + complex(v.o.Abscissa, 0), w, slack * cmplx.Abs(p)})
	return nil
}

// growth is the most e^{pt} can be in [lo, hi], as far as p is known and not right of
// the abscissa.
func (v *inversion) growth(h unresolvedPole, lo, hi float64) float64 {
	re := min(real(h.p)+h.slack, max(v.o.Abscissa, real(h.p)-h.slack))
	return math.Exp(max(re*lo, re*hi))
}

// unresolved returns how much poles beyond what the methods resolve, reach radians, may
// add at times of [lo, hi], and a warning where that is too much. A pole is noted
// from several places of the ray, so that the largest of each counts.
func (v *inversion) unresolved(lo, hi, reach float64) (missed float64, note string) {
	top, last := 0.0, unresolvedPole{}
	for _, h := range v.hidden {
		w := 2 * h.weight * v.growth(h, lo, hi)
		if !(cmplx.Abs(h.p)*hi > reach) {
			continue
		}
		if cmplx.Abs(h.p-last.p) > rayStep/3*cmplx.Abs(h.p) {
			missed += w
			last = h
		}
		if w > top && w > 0.1*v.o.Tolerance*v.rangeWith(0) {
			top = w
			note = fmt.Sprintf("F has an oscillation of %.3g rad/s, too fast to follow at this time", math.Abs(imag(h.p)))
		}
	}
	return 2 * missed, note
}
