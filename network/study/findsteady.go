package study

import (
	"fmt"
	"math"

	"lagbook/network"
	"lagbook/network/casefile"
	"lagbook/network/quantity"
)

// A losing is the search for the value of a given value at which the steady state is lost.
type losing struct {
	m     *Model
	index int
	under *casefile.Scenario // the scenario in force, less what it says of the given value
	like  []quantity.Value   // the given values
	at    float64            // s: the loads count as they are then
	scale float64            // in which steps are taken
	fine  float64            // to which the value is found
}

// A footing is a steady state on the way: of a linear network only its slowest pole.
type footing struct {
	v     float64
	state *network.State
	slow  float64 // the largest real part of a pole that is not 0 for good, 1/s
}

const (
	widestSearch = 1000.0 // in steps, where no range is stated
	losingFine   = 1e-9   // share of a step to which the value is found
)

// steadyLost finds the value of a given value at which the steady state is lost: nearest
// to the one stated, upwards first, or within the range stated. The loads are those at the
// instant at which the sources of heat give most together.
//
// Method: the steady state is followed from value to value, in steps that grow while it is
// found and stable and shrink where it is not. Near a fold of the balance the slowest pole
// goes to 0 as the root of the distance, so that the fold is where its square is 0, by the
// last two states; of a linear network a pole crosses 0.
func (m *Model) steadyLost(ask casefile.AskFind) (Find, []Warning, error) {
	x, err := m.newLosing(ask)
	if err != nil {
		return Find{}, nil, err
	}
	own := x.like[x.index]
	f := Find{Name: ask.Name, Of: ask.Vary, Unit: unitOf(own.Dim), Kind: kindOf(own.Kind)}
	if own.Dim == dims["Pa"] && own.Kind == quantity.Level {
		f.Kind = kindLevel
	}
	value := func(v float64) string { return m.Show.Value(v, f.Unit, f.Kind) }
	loads := " with every load for ever as at " + m.Show.Time(x.at)
	lo, hi := x.ends(ask)
	from := min(max(own.SI, lo), hi)
	first, ok := x.stand(from, nil)
	if !ok {
		if ask.HasRange { // it may be there at another end
			for _, v := range []float64{lo, hi} {
				if first, ok = x.stand(v, nil); ok {
					from = v
					break
				}
			}
		}
		if !ok {
			f.Text = fmt.Sprintf("no steady state is found with %s at %s,%s", ask.Vary, value(from), loads)
			return f, []Warning{{"no-steady-state", fmt.Sprintf("find %q: %s", ask.Name, f.Text)}}, nil
		}
	}
	for _, end := range []float64{hi, lo} {
		if v, ok := x.follow(first, end); ok {
			word := "above"
			if end < from {
				word = "below"
			}
			f.Value = &v
			f.Text = fmt.Sprintf("the steady state is lost with %s %s %s,%s", ask.Vary, word, value(v), loads)
			return f, nil, nil
		}
	}
	f.Text = fmt.Sprintf("the steady state is not lost with %s from %s to %s,%s", ask.Vary, value(lo), value(hi), loads)
	return f, nil, nil
}

// newLosing prepares the search.
func (m *Model) newLosing(ask casefile.AskFind) (*losing, error) {
	x := &losing{m: m.copied(), under: m.under, like: append([]quantity.Value(nil), m.given...)}
	if x.like == nil {
		x.like = m.Case.GivenValues()
	}
	x.index, _ = m.Case.GivenIndex(ask.Vary)
	if m.under != nil {
		rest := *m.under
		rest.Set = nil
		for _, s := range m.under.Set {
			if s.Given == ask.Vary {
				x.like[x.index].SI, x.like[x.index].Exact = m.val.Num[s.Slot], nil
			} else {
				rest.Set = append(rest.Set, s)
			}
		}
		x.under = &rest
	}
	if m.Nonlinear() {
		if err := x.m.findEnd(); err != nil {
			return nil, err
		}
		x.at = x.m.heaviest()
	} else if _, err := x.m.response(); err == nil {
		x.at = x.m.heaviest()
	}
	own := x.like[x.index]
	switch {
	case ask.HasRange:
		x.scale = (m.val.Num[ask.Range[1]] - m.val.Num[ask.Range[0]]) / 64
	case own.Dim == dims["K"]:
		x.scale = 1
	case own.SI != 0:
		x.scale = math.Abs(own.SI) / 16
	default:
		x.scale = 1
	}
	x.fine = losingFine * x.scale
	return x, nil
}

// ends are those between which a value is sought.
func (x *losing) ends(ask casefile.AskFind) (lo, hi float64) {
	if ask.HasRange {
		return x.m.val.Num[ask.Range[0]], x.m.val.Num[ask.Range[1]]
	}
	own := x.like[x.index]
	lo, hi = own.SI-widestSearch*x.scale, own.SI+widestSearch*x.scale
	switch {
	case own.Dim == dims["K"] && own.Kind == quantity.Level:
		lo = math.Max(lo, 1)
	case own.SI > 0 && own.Dim != dims["K"]:
		lo = own.SI / widestSearch
	}
	return lo, hi
}

// stand returns the steady state at a value, false where there is none that holds itself.
func (x *losing) stand(v float64, from *footing) (*footing, bool) {
	p, ok := x.params(v)
	if !ok {
		return nil, false
	}
	f := &footing{v: v}
	red, err := x.reduced(p, f, from)
	if err != nil {
		return nil, false
	}
	f.slow = math.Inf(-1)
	for _, q := range red.System.Poles() {
		if q.P != 0 { // a sum that counts without an end
			f.slow = math.Max(f.slow, real(q.P))
		}
	}
	return f, f.slow < 0
}

// reduced is the linear network at a value, about its steady state where it is not linear.
func (x *losing) reduced(p *network.Params, f, from *footing) (*network.Reduction, error) {
	if !x.m.Nonlinear() {
		return x.m.Net.Reduce(p, nil)
	}
	near := x.m.lastState()
	if from != nil {
		near = from.state
	}
	var err error
	if f.state, err = x.m.Net.Operate(p, x.at, near); err != nil {
		return nil, err
	}
	lin, err := x.m.Net.Linearise(p, f.state)
	if err != nil {
		return nil, err
	}
	return lin.Net.Reduce(lin.Params, nil)
}

// params are the numbers of the network at a value; false where it does not admit them.
func (x *losing) params(v float64) (*network.Params, bool) {
	given := append([]quantity.Value(nil), x.like...)
	given[x.index].SI, given[x.index].Exact = v, nil
	num, ds := x.m.Case.Under(x.under, given)
	if casefile.Failed(ds) {
		return nil, false
	}
	p := x.m.Net.NewParams()
	for _, set := range x.m.set {
		if set(num, p) != nil {
			return nil, false
		}
	}
	x.m.val, x.m.par = num, p
	return p, x.m.turn(num) == nil && x.m.Net.Check(p) == nil
}

// follow goes from a steady state towards an end, and returns the value at which none
// follows; false where there is one up to the end.
func (x *losing) follow(from *footing, end float64) (float64, bool) {
	step, lost := math.Copysign(x.scale, end-from.v), false
	var before *footing // the one before the last
	beyond := end
	for math.Abs(step) > x.fine {
		v := from.v + step
		if (end-v)*step <= 0 {
			v = end
		}
		if lost && (beyond-v)*step <= 0 { // known to be beyond
			step /= 2
			continue
		}
		next, ok := x.stand(v, from)
		if ok && from.state != nil && x.m.leaps(from.state, next.state, math.Max(1, math.Abs(step))) {
			ok = false
		}
		if !ok {
			lost, beyond = true, v
			step = (v - from.v) / 4
			continue
		}
		if before, from = from, next; v == end {
			return 0, false
		}
		if !lost {
			step *= 2
		}
	}
	if !lost {
		return 0, false
	}
	return x.refined(before, from, beyond), true
}

// refined is the value at which the square of the slowest pole, or for a linear network the
// pole, would be 0 by the last two states, where that lies between the last that stands and
// the first that does not.
func (x *losing) refined(before, last *footing, beyond float64) float64 {
	if before == nil || before.v == last.v {
		return last.v
	}
	a, b := before.slow, last.slow
	if last.state != nil {
		a, b = a*a, b*b
	}
	v := last.v - b*(last.v-before.v)/(b-a)
	if (v-last.v)*(beyond-v) >= 0 {
		return v
	}
	return last.v
}
