package study

import (
	"errors"
	"fmt"
	"strings"

	"lagbook/laplace"
	"lagbook/network"
	"lagbook/network/casefile"
)

// resulting answers for results that are no outputs of the network too: each is an answer
// of its own, of which output 0 is asked.
type resulting struct {
	answers
	made map[int]answers
}

// withResults returns what a run from t0 to t1 (s) is answered by, with the results that
// are worked out of its outputs.
func (m *Model) withResults(base answers, t0, t1 float64) (answers, error) {
	r := &resulting{answers: base, made: map[int]answers{}}
	for k := range m.shows { // each stands after those it is made of
		if !m.shows[k].derived() {
			continue
		}
		d := m.shows[k].from
		if d.ask.IntegralOf != nil {
			from := t0
			if d.ask.HasAfter {
				from = max(t0, m.val.Num[d.ask.After])
			}
			r.made[k] = newIntegral(r, d.of[0], from, t0, t1)
			continue
		}
		x, err := m.newExpression(r, d, t0, t1)
		var none *network.NoValue
		if errors.As(err, &none) {
			return nil, fmt.Errorf("result %q has no value at %s: a division by zero, or the like, in %s", d.ask.Name, m.Show.Time(none.At), spelled(d.ask))
		}
		if err != nil {
			return nil, err
		}
		r.made[k] = x
	}
	if len(r.made) == 0 {
		return base, nil
	}
	return r, nil
}

// sampledWarnings say which results are known between instants by curves through them.
func (m *Model) sampledWarnings(resp answers) []Warning {
	r, ok := resp.(*resulting)
	if !ok {
		return nil
	}
	var warn []Warning
	for k := range m.shows {
		w := &m.shows[k]
		switch x := r.made[k].(type) {
		case *expression:
			warn = append(warn, Warning{"sampled-result", fmt.Sprintf("result %q, %s, is exact at each instant; its extremes, crossings and integral are those of curves through %d instants, which miss it by up to %s where they were compared",
				w.name, spelled(w.from.ask), x.pieces(), m.Show.Value(x.Trajectory.Rounding(0)/4, w.unit, differenceOf(w.kind)))})
		case *integral:
			if x.capped {
				warn = append(warn, Warning{"search-stopped", fmt.Sprintf("result %q: what it is the integral of changes its sign too often; its extremes are not all looked for", w.name)})
			}
		}
	}
	return warn
}

// spelled is what states a result, in a sentence.
func spelled(ask *casefile.AskResult) string {
	return strings.TrimSpace(strings.TrimPrefix(ask.Text, "="))
}

func (r *resulting) At(out int, t float64) float64 {
	if a := r.made[out]; a != nil {
		return a.At(0, t)
	}
	return r.answers.At(out, t)
}

func (r *resulting) Left(out int, t float64) float64 {
	if a := r.made[out]; a != nil {
		return a.Left(0, t)
	}
	return r.answers.Left(out, t)
}

func (r *resulting) Table(at []float64, y [][]float64) {
	own := append([][]float64(nil), y...)
	for k := range y {
		if a := r.made[k]; a != nil && y[k] != nil {
			a.Table(at, y[k:k+1])
			own[k] = nil
		}
	}
	r.answers.Table(at, own)
}

func (r *resulting) Max(out int, t0, t1 float64) laplace.Extreme {
	if a := r.made[out]; a != nil {
		return a.Max(0, t0, t1)
	}
	return r.answers.Max(out, t0, t1)
}

func (r *resulting) Min(out int, t0, t1 float64) laplace.Extreme {
	if a := r.made[out]; a != nil {
		return a.Min(0, t0, t1)
	}
	return r.answers.Min(out, t0, t1)
}

func (r *resulting) MaxRate(out int, t0, t1 float64) laplace.Extreme {
	if a := r.made[out]; a != nil {
		return a.MaxRate(0, t0, t1)
	}
	return r.answers.MaxRate(out, t0, t1)
}

func (r *resulting) MinRate(out int, t0, t1 float64) laplace.Extreme {
	if a := r.made[out]; a != nil {
		return a.MinRate(0, t0, t1)
	}
	return r.answers.MinRate(out, t0, t1)
}

func (r *resulting) Integral(out int, t0, t1 float64) float64 {
	if a := r.made[out]; a != nil {
		return a.Integral(0, t0, t1)
	}
	return r.answers.Integral(out, t0, t1)
}

func (r *resulting) First(out int, level, t0, t1 float64) (laplace.Root, bool) {
	if a := r.made[out]; a != nil {
		return a.First(0, level, t0, t1)
	}
	return r.answers.First(out, level, t0, t1)
}

func (r *resulting) FirstOutside(out int, lo, hi, t0, t1 float64) (laplace.Root, bool) {
	if a := r.made[out]; a != nil {
		return a.FirstOutside(0, lo, hi, t0, t1)
	}
	return r.answers.FirstOutside(out, lo, hi, t0, t1)
}

func (r *resulting) LastOutside(out int, mid, band, t0, t1 float64) (laplace.Root, bool) {
	if a := r.made[out]; a != nil {
		return a.LastOutside(0, mid, band, t0, t1)
	}
	return r.answers.LastOutside(out, mid, band, t0, t1)
}

func (r *resulting) Final(out int) (float64, bool) {
	if a := r.made[out]; a != nil {
		return a.Final(0)
	}
	return r.answers.Final(out)
}

func (r *resulting) Rounding(out int) float64 {
	if a := r.made[out]; a != nil {
		return a.Rounding(0)
	}
	return r.answers.Rounding(out)
}

// Impulses are those of an output of the network; an expression has those of what it is
// made of, an integral none: they are its jumps.
func (r *resulting) Impulses(out int) ([]laplace.Impulse, error) {
	switch a := r.made[out].(type) {
	case *expression:
		return a.impulses(), nil
	case *integral:
		return nil, nil
	}
	if a, ok := r.answers.(interface {
		Impulses(out int) ([]laplace.Impulse, error)
	}); ok {
		return a.Impulses(out)
	}
	return nil, nil
}
