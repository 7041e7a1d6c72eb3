package study

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"lagbook/network/quantity"
)

// Sizes answers [size]: of those named, of all where none is. The margin of the limits is
// followed as a function of the given value, over every scenario; the values at which it is
// 0 are roots, not points of a grid.
func (m *Model) Sizes(names []string) (*Sizes, error) {
	asks := m.Case.Questions.Sizes
	known := make([]string, len(asks))
	for i := range asks {
		known[i] = asks[i].Name
	}
	for _, n := range names {
		if !slices.Contains(known, n) {
			return nil, noSize(n, known)
		}
	}
	a := &Sizes{Title: m.Case.Title, Sizes: []Size{}, Met: true}
	var said *Evidence
	for _, ask := range asks {
		if len(names) > 0 && !slices.Contains(names, ask.Name) {
			continue
		}
		z, err := m.newSizing(ask)
		if err != nil {
			return nil, err
		}
		s, p, err := z.answer()
		if err != nil {
			return nil, err
		}
		s.Tried, s.Unit, s.Kind = z.tried, z.unit, z.kind
		a.Sizes, a.Met = append(a.Sizes, s), a.Met && s.Met
		e := z.evidence(p)
		if said == nil {
			said = &e
			continue
		}
		for _, w := range e.Warnings {
			if !slices.Contains(said.Warnings, w) {
				said.Warnings = append(said.Warnings, w)
			}
		}
	}
	if said == nil {
		a.Evidence = m.evidence([]Warning{{"no-sizes", "the case states no [size]: there is nothing to size"}})
		return a, nil
	}
	a.Evidence = *said
	return a, nil
}

// NoSize is a size that is asked for and that the case does not have.
type NoSize struct{ Text string }

func (e *NoSize) Error() string { return e.Text }

func noSize(name string, known []string) error {
	switch near, ok := quantity.Nearest(name, known); {
	case ok:
		return &NoSize{fmt.Sprintf("%q is no size of the case; did you mean %q?", name, near)}
	case len(known) == 0:
		return &NoSize{fmt.Sprintf("%q is no size: the case has none", name)}
	}
	return &NoSize{fmt.Sprintf("%q is no size of the case, which has %s", name, join(known))}
}

// answer finds the size, and the point that its evidence is of.
func (z *sizing) answer() (Size, sized, error) {
	s := Size{Name: z.ask.Name, Vary: z.ask.Vary, Crossings: []Crossing{}}
	var p sized
	var err error
	switch {
	case z.ask.HasRange:
		p, err = z.search(&s)
	case z.ask.Catalogue != nil:
		p, err = z.choose(&s, z.parts())
	default:
		p, err = z.choose(&s, z.listed())
	}
	return s, p, err
}

// tell fills in how the limits stand at the answer.
func (z *sizing) tell(s *Size, p sized) {
	v := p.v
	s.Value, s.Just = &v, p.just()
	s.GoverningLimit, s.Scenario, s.MarginUnit, s.Margin = p.limit.Name, p.scenario, p.limit.Unit, p.limit.Margin
	if p.limit.Name != "" {
		need := p.need
		s.MarginAsked = &need
	}
}

// evidence is what stands beside the answer, under every scenario.
func (z *sizing) evidence(p sized) Evidence {
	given := p.given
	if given == nil {
		given = z.with(p.v)
	}
	var said []Evidence
	for _, s := range z.scenarios {
		z.warnings = nil
		z.under(s, given)
		warn := z.warnings
		if s != nil {
			for _, set := range s.Set {
				if set.Given == z.ask.Vary && !strings.HasPrefix(strings.TrimSpace(set.Text), "=") {
					warn = append(warn, Warning{"not-varied", fmt.Sprintf("size %q: the scenario sets %s itself: under it nothing varies", z.ask.Name, set.Given)})
				}
			}
		}
		said = append(said, z.m.evidence(warn))
	}
	e := together(namesOf(z.scenarios), said)
	e.Warnings = append(e.Warnings, z.notes...)
	return e
}

// judgeable reports whether a margin is a number that can be interpolated.
func judgeable(x float64) bool { return !math.IsInf(x, 0) && !math.IsNaN(x) }
