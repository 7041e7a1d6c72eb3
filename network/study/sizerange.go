package study

import (
	"fmt"
	"math"
	"slices"
)

const (
	sizeGrid       = 33    // values at which a range is looked at first
	sizeGridMarch  = 17    // of a case that is marched
	sizeFine       = 1e-10 // relative, to which a crossing is found
	sizeFineMarch  = 1e-8  // of a march, whose own tolerance is coarser
	summitSteps    = 24    // in which a margin that only comes near 0 is followed to its extreme
	summitStepsFew = 10
	nearZero       = 1e-6 // of the range: how far from 0 it is searched where 0 cannot be computed
)

// search finds the size in a range: every crossing first, then the value that is wanted.
func (z *sizing) search(s *Size) (sized, error) {
	lo, hi := z.m.val.Num[z.ask.Range[0]], z.m.val.Num[z.ask.Range[1]]
	if lo == 0 || hi == 0 { // where 0 itself means nothing, the search stays a little away from it
		if p := z.at(0); p.why != "" {
			if lo == 0 {
				lo = nearZero * hi
			} else {
				hi = nearZero * lo
			}
		}
	}
	s.Range = []float64{lo, hi}
	log := lo > 0 && z.kind != kindLevel
	to, from := func(v float64) float64 { return v }, func(x float64) float64 { return x }
	if log {
		to, from = math.Log, math.Exp
	}
	grid, steps := sizeGrid, summitSteps
	if z.m.Nonlinear() && !z.m.linearly {
		grid, steps = sizeGridMarch, summitStepsFew
	}
	var list []sized
	for i := range grid {
		v := from(to(lo) + (to(hi)-to(lo))*float64(i)/float64(grid-1))
		switch i {
		case 0:
			v = lo
		case grid - 1:
			v = hi
		}
		list = append(list, z.at(v))
	}
	if z.refused != nil && !slices.ContainsFunc(list, func(p sized) bool { return p.least > math.Inf(-1) }) {
		return sized{}, z.refused
	}
	if !slices.ContainsFunc(list, func(p sized) bool { return p.least != list[0].least }) && judgeable(list[0].least) {
		z.notes = append(z.notes, Warning{nothingChanges, fmt.Sprintf("size %q: no margin changes with %s", z.ask.Name, z.ask.Vary)})
	}
	list = z.dips(list, to, from, steps)
	list = z.crossings(s, list, to, from, log)
	return z.pick(s, list)
}

// dips looks between three values of one sign where the margin comes nearest to 0 in the
// middle, and adds its extreme: two crossings may lie there.
func (z *sizing) dips(list []sized, to, from func(float64) float64, steps int) []sized {
	all := list[:1:1]
	for i := 1; i < len(list); i++ {
		if i+1 < len(list) {
			a, b, c := list[i-1], list[i], list[i+1]
			sign := -1.0 // of what is looked for the greatest value
			if !b.meets() {
				sign = 1
			}
			one := a.meets() == b.meets() && b.meets() == c.meets() && judgeable(a.least) && judgeable(b.least) && judgeable(c.least)
			if one && sign*b.least > sign*a.least && sign*b.least >= sign*c.least {
				found := b
				summit(func(x float64) float64 {
					p := z.at(from(x))
					if sign*p.least > sign*found.least {
						found = p
					}
					return sign * p.least
				}, to(a.v), to(b.v), sign*b.least, to(c.v), steps, 0)
				if found.v < b.v {
					all = append(all, found)
				}
				all = append(all, b)
				if found.v > b.v {
					all = append(all, found)
				}
				continue
			}
		}
		all = append(all, list[i])
	}
	slices.SortStableFunc(all, func(a, b sized) int {
		switch {
		case a.v < b.v:
			return -1
		case a.v > b.v:
			return 1
		}
		return 0
	})
	return all
}

// crossings narrows every change of sign, and adds the values on both its sides.
func (z *sizing) crossings(s *Size, list []sized, to, from func(float64) float64, log bool) []sized {
	rel := sizeFine
	if z.m.Nonlinear() {
		rel = sizeFineMarch
	}
	fine := func(a, b float64) float64 { // in the scale that is searched
		if log {
			return rel
		}
		return rel * math.Max(math.Abs(a), math.Abs(b))
	}
	all := list[:1:1]
	for i := 1; i < len(list); i++ {
		a, b := list[i-1], list[i]
		if a.meets() != b.meets() {
			seen := map[float64]sized{to(a.v): a, to(b.v): b}
			no, yes := signChange(func(x float64) float64 {
				p := z.at(from(x))
				seen[x] = p
				return p.least
			}, to(a.v), a.least, to(b.v), b.least, fine)
			met, unmet := seen[yes], seen[no]
			by := met
			if met.limit.Name == "" || math.IsInf(unmet.least, -1) { // nothing limits on that side, or all of a sudden
				by = unmet
			}
			side := "above"
			if unmet.v > met.v {
				side = "below"
			}
			s.Crossings = append(s.Crossings, Crossing{Value: met.v, Met: side, Limit: by.limit.Name, Scenario: by.scenario})
			if side == "above" {
				all = append(all, unmet, met)
			} else {
				all = append(all, met, unmet)
			}
		}
		all = append(all, b)
	}
	return all
}

// pick takes of all values, lowest first, the one that is wanted or, where none meets the
// limits, the one that comes nearest.
func (z *sizing) pick(s *Size, list []sized) (sized, error) {
	first, last := -1, -1
	near := 0
	for i, p := range list {
		if p.meets() {
			if first < 0 {
				first = i
			}
			last = i
		}
		if p.least > list[near].least {
			near = i
		}
	}
	if first < 0 {
		p := list[near]
		z.tell(s, p)
		if math.IsInf(p.least, -1) {
			s.Value = nil
		}
		s.Text = z.nothing(p, list)
		return p, nil
	}
	want := z.wanted(list[0], list[len(list)-1])
	k, end := first, list[0]
	if want == theLargest {
		k, end = last, list[len(list)-1]
	}
	p := list[k]
	s.Met = true
	z.tell(s, p)
	s.Text = z.found(s, p, want, end)
	if z.ask.Series != "" {
		return z.prefer(s, p, want)
	}
	return p, nil
}

const (
	theSmallest = "smallest"
	theLargest  = "largest"
)

// wanted is which end is wanted: where it is not said, the smallest value unless it is the
// small ones that meet the limits and the large ones that do not.
func (z *sizing) wanted(lo, hi sized) string {
	switch {
	case z.ask.Want != "":
		return z.ask.Want
	case lo.meets() && !hi.meets():
		return theLargest
	}
	return theSmallest
}
