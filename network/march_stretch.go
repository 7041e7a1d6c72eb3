package network

import (
	"cmp"
	"math"
	"slices"

	"lagbook/laplace"
)

// A bend is an instant at which a wave jumps, bends or begins another law.
type bend struct {
	at   float64
	wave int // place in waves
}

// waves returns every wave that a march follows, in a fixed order.
func (p *Params) waves() []laplace.Waveform {
	all := slices.Clone(p.Wave)
	for _, list := range p.Drive {
		all = append(all, list...)
	}
	return append(all, p.Switch...)
}

// bends returns the bends of waves within [t0, t1], ascending.
func bends(waves []laplace.Waveform, t0, t1 float64) ([]bend, error) {
	var list []bend
	for k, w := range waves {
		if w.Constant() {
			continue
		}
		at, err := w.Breaks(t0, t1, laplace.MaxBreaks-len(list))
		if err != nil {
			return nil, err
		}
		for _, t := range at {
			list = append(list, bend{t, k})
		}
	}
	slices.SortFunc(list, func(a, b bend) int { return cmp.Or(cmp.Compare(a.at, b.at), cmp.Compare(a.wave, b.wave)) })
	return list, nil
}

// A stretch is a span of time in which no wave bends.
type stretch struct {
	t0, t1 float64
	kind   uint64 // the same for stretches that begin with bends of the same waves
}

// stretches cuts [t0, t1] where waves bend; a bend at t1 makes a last one of no length.
func stretches(list []bend, t0, t1 float64) []stretch {
	const offset, prime = 14695981039346656037, 1099511628211 // of the hash FNV-1a, 64 bits
	now := stretch{t0, t1, offset}
	var all []stretch
	for _, b := range list {
		if b.at > now.t0 {
			now.t1 = b.at
			all = append(all, now)
			now = stretch{b.at, t1, offset}
		}
		now.kind = (now.kind ^ uint64(b.wave+1)) * prime
	}
	return append(all, now)
}

// A swing bounds the step by what a wave does, so that an output that shows it, and no
// unknown follows it, is right between the ends of a step too.
type swing struct {
	rate  float64 // 1/s
	until float64 // s; when it has died out
}

// swinging returns the waves that have exponentials in them.
func swinging(waves []laplace.Waveform) (some []laplace.Waveform) {
	for _, w := range waves {
		if slices.ContainsFunc(w.Segments, func(g laplace.Segment) bool { return len(g.Exp) > 0 }) {
			some = append(some, w)
		}
	}
	return some
}

// swings returns those of the segments in force in (t0, t1).
func swings(waves []laplace.Waveform, t0, t1, tol float64) []swing {
	var list []swing
	for k := range waves {
		c := courseOf(&waves[k], t0+(t1-t0)/2)
		for _, e := range c.exp {
			s := swing{rate: math.Hypot(real(e.Rate), imag(e.Rate)), until: math.Inf(1)}
			if real(e.Rate) < 0 {
				s.until = c.start - math.Log(1/tol)/real(e.Rate)
			}
			if s.rate > 0 && e.Amplitude != 0 && s.until > t0 {
				list = append(list, s)
			}
		}
	}
	return list
}

// longest returns the longest step from t on that the swings allow: a quartic through five
// points of exp(iωt) over h errs by 2 (ωh/4)⁵/5! at most.
func longest(list []swing, t, tol float64) float64 {
	fastest := 0.0
	for _, s := range list {
		if t < s.until {
			fastest = max(fastest, s.rate)
		}
	}
	if fastest == 0 {
		return math.Inf(1)
	}
	return 4 * math.Pow(60*tol, 0.2) / fastest
}
