package study

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"lagbook/network/quantity"
)

// runnersUp is how many of the next best are told.
const runnersUp = 3

// An offer is one thing that may be chosen.
type offer struct {
	name  string
	v     float64 // of the given value that is sized
	given []quantity.Value
	sets  []Set
	least *float64
}

// listed are the values of choose_from, the best first.
func (z *sizing) listed() (list []offer) {
	for _, slot := range z.ask.Choose {
		v := z.m.val.Num[slot]
		list = append(list, offer{name: z.value(v), v: v, given: z.with(v)})
	}
	z.bestFirst(list)
	return list
}

// parts are those of the catalogue, the best first.
func (z *sizing) parts() (list []offer) {
	c := z.ask.Catalogue
	for i, name := range c.Parts {
		o := offer{name: name, given: slices.Clone(z.base)}
		for _, col := range c.Columns {
			k, _ := z.m.Case.GivenIndex(col.Given)
			x := z.base[k]
			z.set(o.given, k, col.Values[i])
			kind := kindOf(o.given[k].Kind)
			o.sets = append(o.sets, Set{col.Given, col.Values[i], unitOf(x.Dim), kind})
			if col.Given == z.ask.Vary {
				o.v = col.Values[i]
			}
		}
		if c.Least != "" {
			o.least = &c.Cost[i]
		}
		list = append(list, o)
	}
	z.bestFirst(list)
	return list
}

// bestFirst orders offers: by the column of which less is better, else by the value, the
// smallest first unless the largest is wanted. What is equal stays in the order of the case.
func (z *sizing) bestFirst(list []offer) {
	slices.SortStableFunc(list, func(a, b offer) int {
		if a.least != nil && *a.least != *b.least {
			return cmp.Compare(*a.least, *b.least)
		}
		if z.ask.Want == theLargest {
			return cmp.Compare(b.v, a.v)
		}
		return cmp.Compare(a.v, b.v)
	})
}

// choose tries offers, the best first, until one and its runners-up meet the limits.
func (z *sizing) choose(s *Size, list []offer) (sized, error) {
	var best, near *offer
	nearest := math.Inf(-1)
	for i := range list {
		o := &list[i]
		p := z.judge(o.given)
		p.v = o.v
		if near == nil || p.least > nearest {
			near, nearest = o, p.least
		}
		if !p.meets() {
			continue
		}
		if best == nil {
			best = o
			continue
		}
		if s.RunnersUp = append(s.RunnersUp, z.chosen(o, p)); len(s.RunnersUp) == runnersUp {
			break
		}
	}
	if best == nil && math.IsInf(nearest, -1) && z.refused != nil {
		return sized{}, z.refused
	}
	o := best
	if o == nil {
		o = near
	}
	p := z.judge(o.given)
	p.v, p.given = o.v, o.given
	s.Met = best != nil
	z.tell(s, p)
	c := z.chosen(o, p)
	s.Choice = &c
	what := fmt.Sprintf("of %d values", len(list))
	if z.ask.Catalogue != nil {
		what = fmt.Sprintf("of %d parts in %s", len(list), z.ask.Catalogue.File)
	}
	if s.Met {
		s.Text = fmt.Sprintf("%s %s is the first to meet %s; %s", what, z.offerWords(c), z.limitsWords(), z.stands(p))
		return p, nil
	}
	s.Text = fmt.Sprintf("%s none meets %s; nearest comes %s: %s", what, z.limitsWords(), z.offerWords(c), z.stands(p))
	return p, nil
}

// offerWords name a choice, with the column by which it was chosen.
func (z *sizing) offerWords(c Choice) string {
	if c.Least == nil {
		return c.Name
	}
	return fmt.Sprintf("%s, %s %s,", c.Name, z.ask.Catalogue.Least, quantity.Join(quantity.Number(*c.Least, 6), c.LeastUnit))
}

// chosen is an offer with how it stands.
func (z *sizing) chosen(o *offer, p sized) Choice {
	c := z.choice(o.name, p)
	c.Sets, c.Least = o.sets, o.least
	if o.least != nil {
		c.LeastUnit = z.ask.Catalogue.Unit
	}
	return c
}

// choice is a value with how it stands.
func (z *sizing) choice(name string, p sized) Choice {
	return Choice{Name: name, Value: p.v, Met: p.meets(), Margin: p.limit.Margin, Unit: p.limit.Unit, Limit: p.limit.Name, Scenario: p.scenario}
}
