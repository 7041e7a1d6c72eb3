package casefile

import (
	"cmp"
	"math"
	"strings"

	"lagbook/laplace"
	"lagbook/network/quantity"
)

// findHorizon finds how far sampled waveforms must go: to the end of the run and the
// latest time that a question names.
func (r *reader) findHorizon(root *node) {
	q := &r.c.Questions
	if q.HasTo {
		r.c.horizon = r.c.slots[q.To].si
	}
	if len(r.c.profiles) == 0 {
		return
	}
	for _, word := range []string{"table", "limit"} {
		n := root.get(word)
		if n == nil {
			continue
		}
		for _, item := range n.items { // [[table]]
			r.latest(item)
		}
		for i := 0; n.table != nil && i < len(n.table.keys); i++ { // [limit.NAME]
			r.latest(n.table.keys[i].value)
		}
	}
}

// latest looks for the times that a question names.
func (r *reader) latest(question *node) {
	for _, name := range []string{"to", "times", "after", "within", "until"} {
		n := question.get(name)
		if n == nil {
			continue
		}
		last := n
		if len(n.items) > 0 { // they go up
			last = n.items[len(n.items)-1]
		}
		if v, ok := r.peek(last); ok && v.Dim == dimTime {
			r.c.horizon = max(r.c.horizon, v.SI)
		}
	}
}

// inRange checks what an expression comes to against the bounds of its field, at the
// breaks of the waveform and between. A value that is beyond a bound by rounding only
// stays.
func (m *maker) inRange(made *laplace.Waveform) {
	f := m.w.field
	if !f.HasMin && !f.HasMax && f.Kind != quantity.Level {
		return
	}
	number := *f
	number.Name = cmp.Or(f.Name, "value")
	text := *m.w.text
	if !strings.HasPrefix(strings.TrimSpace(text.text), "=") {
		text.text = "= " + text.text // so that the message shows what it comes to
	}
	x := slot{field: &number, n: &text, owner: m.w.owner}
	bad := func(t, y float64) bool {
		d := m.c.inRange(&x, within(y, f))
		if d == nil {
			return false
		}
		when := " at " + quantity.Duration(t)
		if t < 0 {
			when = " before 0 s"
		}
		d.Text = strings.Replace(d.Text, d.Found, d.Found+when, 1)
		m.diags = append(m.diags, *d)
		return true
	}
	if bad(-1, made.Before) {
		return
	}
	for i := range made.Segments {
		g := &made.Segments[i]
		length := lengthOf(made, i, max(m.s.until-g.At, 0))
		parts := 1
		if len(g.Poly) > 0 || len(g.Exp) > 0 {
			parts = 16
		}
		for k := 0; k <= parts; k++ {
			tau := length * float64(k) / float64(parts)
			y := g.A
			if tau > 0 {
				y = laplace.Waveform{Segments: []laplace.Segment{{A: g.A, B: g.B, Poly: g.Poly, Exp: g.Exp}}}.At(tau)
			}
			if bad(g.At+tau, y) {
				return
			}
		}
	}
}

// within takes a value back to a bound that it passes by rounding only.
func within(y float64, f *Field) float64 {
	near := func(bound float64) bool { return math.Abs(y-bound) <= 1e-12*max(1, math.Abs(bound)) }
	switch {
	case f.HasMin && !f.MinOpen && y < f.Min && near(f.Min):
		return f.Min
	case f.HasMax && y > f.Max && near(f.Max):
		return f.Max
	}
	return y
}
